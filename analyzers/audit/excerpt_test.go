package audit

import (
	"bytes"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"dextral/rules"
	"dextral/rules/report"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func TestExcerpts(t *testing.T) {
	dir := t.TempDir()
	write := func(name, text string) string {
		file := filepath.Join(dir, name)
		require.NoError(t, os.WriteFile(file, []byte(text), 0o644))
		return file
	}
	at := func(path string, line, end int) *rules.Finding {
		return &rules.Finding{Place: rules.Place{Path: path, Line: line, Column: 1, EndLine: end, EndColumn: 2}}
	}
	mount := write("mount.yaml", "one\r\ntwo\r\nthree\r\nfour")
	long := write("long.json", "{\n"+strings.Repeat("x", maxLine+10)+"\n}\n")
	tall := write("tall.txt", strings.Repeat("line\n", 100))
	packed := write("log.gz", "\x1f\x8b\x00\xff\n\n\xfe")
	first, last := at(mount, 1, 1), at(mount, 4, 4)
	all := []*rules.Finding{first, first, last, at(long, 1, 3), at(tall, 10, 90), at(packed, 1, 1), at(filepath.Join(dir, "gone"), 1, 1), at(dir, 1, 1), at(mount, 99, 99), at(mount, 0, 0)}
	got := Excerpts(all)
	assert.Equal(t, []report.SourceLine{{Number: 1, Text: "one"}, {Number: 2, Text: "two"}}, got[first.Place], "once for two findings")
	assert.Equal(t, []report.SourceLine{{Number: 3, Text: "three"}, {Number: 4, Text: "four"}}, got[last.Place], "no line end at the end")
	assert.Equal(t, []report.SourceLine{{Number: 1, Text: "{"}, {Number: 3, Text: "}"}}, got[all[3].Place], "without the line too long to show")
	assert.Len(t, got[all[4].Place], maxExcerpt)
	for _, f := range all[5:] {
		for _, l := range got[f.Place] {
			assert.False(t, bytes.ContainsRune([]byte(l.Text), 0))
		}
	}
	assert.Len(t, got, 4+1, "and an empty line between binary ones")
}
