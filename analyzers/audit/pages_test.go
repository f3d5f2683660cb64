package audit

import (
	"bytes"
	"context"
	"flag"
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"dextral/rules"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

var update = flag.Bool("update", false, "rewrite the findings quoted in rules/pages")

// headings are the sections of a rule's page, in order.
var headings = []string{"The claim it tests", "The evidence it computes", "A worked contradiction",
	"When it stays silent", "Remedy", "Sources"}

// TestPages executes the examples of every rule's page. A fence such as
//
//	```yaml file=mount.yaml report
//
// is a file of the example that its section gives; silent instead of report
// says that nothing is found, and neither that the file only belongs to
// it. What a section reports is quoted, line for line, in a fence "text finding".
func TestPages(t *testing.T) {
	dir, err := filepath.Abs(filepath.Join("..", "..", "rules", "pages"))
	require.NoError(t, err)
	for _, rule := range rules.Catalogue() {
		t.Run(rule.Name, func(t *testing.T) {
			page := rule.Page()
			sections := strings.Split(page, "\n## ")
			assert.Equal(t, "# "+rule.Name+"\n\n"+rule.Summary+"\n", sections[0], "a page opens with name and summary")
			var found []string
			kinds := map[string]bool{}
			for _, section := range sections[1:] {
				heading, body, _ := strings.Cut(section, "\n")
				found = append(found, heading)
				e := parseExample(t, body)
				kinds[e.kind] = true
				switch e.kind {
				case "report":
					got := e.run(t)
					if *update {
						page = strings.Replace(page, body, e.quote(body, got), 1)
						continue
					}
					assert.Equal(t, strings.Join(got, "\n"), unwrap(e.finding), "%s: the findings of its example", heading)
					assert.Contains(t, strings.Join(got, "\n"), ": "+rule.Name+": ", "%s: the rule of the page", heading)
				case "silent":
					assert.Empty(t, e.run(t), "%s: its example", heading)
				}
			}
			assert.Equal(t, headings, found)
			assert.True(t, kinds["report"] && kinds["silent"], "a page shows what is reported and what is not")
			if *update {
				require.NoError(t, os.WriteFile(filepath.Join(dir, rule.Name+".md"), []byte(page), 0o644))
			}
		})
	}
}

// example is what the fences of one section say.
type example struct {
	kind    string // report, silent or ""
	files   map[string]string
	finding string
}

func parseExample(t *testing.T, body string) example {
	e := example{files: map[string]string{}}
	for i, part := range strings.Split(body, "\n```") {
		if i%2 == 0 {
			continue // prose
		}
		info, text, _ := strings.Cut(part, "\n")
		words := strings.Fields(info)
		if info == "text finding" {
			e.finding = text
		}
		for _, word := range words[1:] {
			if name, ok := strings.CutPrefix(word, "file="); ok {
				e.files[name] = text + "\n"
			} else if word == "report" || word == "silent" {
				require.Empty(t, e.kind, "one example to a section")
				e.kind = word
			}
		}
	}
	return e
}

// run audits the files and returns the findings that are not waived, as the first
// lines of reports.
func (e example) run(t *testing.T) []string {
	dir := t.TempDir()
	for name, text := range e.files {
		require.NoError(t, os.WriteFile(filepath.Join(dir, name), []byte(text), 0o644))
	}
	t.Chdir(dir)
	result, err := Run(context.Background(), Options{Today: time.Now()})
	require.NoError(t, err)
	assert.Empty(t, result.Report.Failed)
	var lines []string
	for _, f := range result.Report.Findings {
		if f.Waiver == nil {
			lines = append(lines, fmt.Sprintf("%s: %s: %s", f.Place, f.Rule, f.Message))
		}
	}
	return lines
}

// unwrap joins the lines that wrap put apart.
func unwrap(text string) string { return strings.ReplaceAll(text, "\n  ", " ") }

// wrap breaks a line at blanks, with every further line indented.
func wrap(line string) string {
	const width = 82
	var b bytes.Buffer
	column := 0
	for i, word := range strings.Split(line, " ") {
		if i > 0 && column+1+len(word) > width {
			b.WriteString("\n ")
			column = 1
		}
		if i > 0 {
			b.WriteByte(' ')
			column++
		}
		b.WriteString(word)
		column += len(word)
	}
	return b.String()
}

// quote puts findings into the fence of a section.
func (e example) quote(body string, findings []string) string {
	for i := range findings {
		findings[i] = wrap(findings[i])
	}
	fence := "```text finding\n" + strings.Join(findings, "\n") + "\n```"
	if old := "```text finding\n" + e.finding + "\n```"; strings.Contains(body, old) {
		return strings.Replace(body, old, fence, 1)
	}
	return strings.TrimRight(body, "\n") + "\n\n" + fence + "\n"
}
