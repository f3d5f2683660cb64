package audit

import (
	"context"
	"fmt"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"
	"time"

	"dextral/rules"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// demoRow is a row of a table in the demo's README: a place, a rule or form, prose.
var demoRow = regexp.MustCompile("^\\| `([^`]+:\\d+)` \\| ([^|]+) \\|")

// demoTables reads the tables by heading, each as place and second column.
func demoTables(t *testing.T, name string) map[string][]string {
	text, err := os.ReadFile(name)
	require.NoError(t, err)
	tables := map[string][]string{}
	heading := ""
	for line := range strings.Lines(string(text)) {
		if h, ok := strings.CutPrefix(line, "## "); ok {
			heading = strings.TrimSpace(h)
		}
		if m := demoRow.FindStringSubmatch(line); m != nil {
			tables[heading] = append(tables[heading], m[1]+" "+m[2])
		}
	}
	return tables
}

// TestDemo holds the demo's README against the audit: what is planted is
// reported where it says, nothing else is, and the near-misses are read as it
// says, so that their silence means something.
func TestDemo(t *testing.T) {
	t.Chdir(filepath.Join("..", "..", "fixtures", "demo"))
	// Before the demo's waiver ends, whatever the day.
	result, err := Run(context.Background(), Options{Today: time.Date(2030, 1, 1, 0, 0, 0, 0, time.UTC)})
	require.NoError(t, err)
	require.Empty(t, result.Report.Failed)
	tables := demoTables(t, "README.md")

	reported := map[string][]string{}
	for _, f := range result.Report.Findings {
		table := "Planted mistakes"
		if f.Waiver != nil {
			table = "Accepted"
		} else if f.Level == rules.Note {
			table = "Notes"
		}
		reported[table] = append(reported[table], fmt.Sprintf("%s:%d %s", f.Place.Path, f.Place.Line, f.Rule))
	}
	for _, table := range []string{"Planted mistakes", "Accepted", "Notes"} {
		assert.Equal(t, tables[table], reported[table], table)
	}
	seen := map[string]bool{}
	for _, row := range tables["Planted mistakes"] {
		_, rule, _ := strings.Cut(row, " ")
		assert.False(t, seen[rule], "%s is planted twice", rule)
		seen[rule] = true
	}

	read := map[string]string{}
	values := result.Values
	for _, s := range result.Series {
		values = append(values, &s.Value)
	}
	for _, v := range values {
		at := fmt.Sprintf("%s:%d", v.Place.Path, v.Place.Line)
		if _, two := read[at]; v.Decided() && !two {
			read[at] = v.Form.String()
		}
	}
	require.NotEmpty(t, tables["Near-misses"])
	for _, row := range tables["Near-misses"] {
		place, form, _ := strings.Cut(row, " ")
		if form == "nothing" {
			form = ""
		}
		assert.Equal(t, form, read[place], place)
		for _, list := range reported {
			for _, r := range list {
				// the log's channels share the line of the header; its findings stand at rows
				assert.False(t, strings.HasPrefix(r, place+" "), "a near-miss is reported: %s", r)
			}
		}
	}
}
