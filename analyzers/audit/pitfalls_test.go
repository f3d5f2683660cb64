package audit

import (
	"context"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"
	"time"

	"dextral/rules"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"golang.org/x/tools/txtar"
)

var expectedRule = regexp.MustCompile(`(?m)^rule: (\S+)$`)

// TestPitfalls runs the documented pitfalls: the broken twin is reported by the right
// rule, the corrected one is silent but for notes.
func TestPitfalls(t *testing.T) {
	dir := filepath.Join("..", "..", "fixtures", "pitfalls")
	readme, err := os.ReadFile(filepath.Join(dir, "README.md"))
	require.NoError(t, err)
	names, err := filepath.Glob(filepath.Join(dir, "*.txtar"))
	require.NoError(t, err)
	require.NotEmpty(t, names)
	for _, name := range names {
		slug := strings.TrimSuffix(filepath.Base(name), ".txtar")
		archive, err := txtar.ParseFile(name)
		require.NoError(t, err)
		t.Run(slug, func(t *testing.T) {
			found := expectedRule.FindSubmatch(archive.Comment)
			require.NotNil(t, found, "the prose names the rule")
			rule := string(found[1])
			assert.Contains(t, string(readme), "| `"+slug+"` | "+rule+" |")
			assert.Contains(t, string(archive.Comment), "Source: ")
			broken := twin(t, archive, "broken/")
			var reported []string
			for _, f := range broken {
				reported = append(reported, f.Rule)
			}
			assert.Contains(t, reported, rule)
			for _, f := range twin(t, archive, "corrected/") {
				assert.Equal(t, rules.Note, f.Level, "%s: %s: %s", f.Place, f.Rule, f.Message)
			}
		})
	}
}

// twin audits one side of an archive.
func twin(t *testing.T, archive *txtar.Archive, side string) []*rules.Finding {
	dir := t.TempDir()
	for _, f := range archive.Files {
		if name, ok := strings.CutPrefix(f.Name, side); ok {
			require.NoError(t, os.WriteFile(filepath.Join(dir, name), f.Data, 0o644))
		}
	}
	t.Chdir(dir)
	result, err := Run(context.Background(), Options{Today: time.Date(2030, 1, 1, 0, 0, 0, 0, time.UTC)})
	require.NoError(t, err)
	require.Empty(t, result.Report.Failed)
	require.NotZero(t, result.Report.Audited.Values+result.Report.Audited.GoFiles)
	return result.Report.Findings
}
