package audit

import (
	"bytes"
	"context"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"dextral/rules/report"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// TestReadme holds the output that README.md shows against the audit of the
// demo. Lines of three dots stand for what is left out.
func TestReadme(t *testing.T) {
	t.Chdir(filepath.Join("..", ".."))
	text, err := os.ReadFile("README.md")
	require.NoError(t, err)
	_, rest, _ := strings.Cut(string(text), "```text\n")
	shown, _, found := strings.Cut(rest, "\n```")
	require.True(t, found, "README.md shows no output")

	result, err := Run(context.Background(), Options{Paths: []string{"fixtures/demo"}, Today: time.Date(2030, 1, 1, 0, 0, 0, 0, time.UTC)})
	require.NoError(t, err)
	var out bytes.Buffer
	require.NoError(t, report.Text(&out, &result.Report, report.Options{}))

	updated := shown
	for part := range strings.SplitSeq(strings.TrimSuffix(shown, "\n..."), "\n...\n") {
		if *update {
			updated = strings.Replace(updated, part, fresh(part, out.String()), 1)
			continue
		}
		assert.Contains(t, "\n"+out.String(), "\n"+part+"\n")
	}
	if *update {
		require.NoError(t, os.WriteFile("README.md", []byte(strings.Replace(string(text), shown, updated, 1)), 0o644))
	}
}

// fresh is what the output now has in the place of a part of it: as many lines
// of the summary, or the finding with the same place and rule.
func fresh(part, out string) string {
	head := strings.Join(strings.SplitAfterN(part, ": ", 3)[:2], "")
	if strings.HasPrefix(part, "audited") {
		head = "audited"
	}
	_, after, _ := strings.Cut("\n"+out, "\n"+head)
	paragraph, _, _ := strings.Cut(head+after, "\n\n")
	if head == "audited" {
		lines := strings.Split(paragraph, "\n")
		paragraph = strings.Join(lines[:strings.Count(part, "\n")+1], "\n")
	}
	return paragraph
}
