package main

import (
	"bytes"
	"os"
	"path/filepath"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/rules/report"
)

func TestWhatATerminalShows(t *testing.T) {
	for _, c := range []struct {
		env  map[string]string
		want report.Options
	}{
		{map[string]string{"LANG": "en_GB.UTF-8", "TERM": "xterm"}, report.Options{Color: true}},
		{map[string]string{"LC_ALL": "C.utf8"}, report.Options{Color: true}},
		{map[string]string{"LANG": "en_GB.UTF-8", "NO_COLOR": "1"}, report.Options{}},
		{map[string]string{"LC_CTYPE": "en_GB.UTF-8", "LANG": "C", "TERM": "dumb"}, report.Options{}},
		{map[string]string{"LC_ALL": "POSIX", "LANG": "en_GB.UTF-8"}, report.Options{Color: true, ASCII: true}},
		{map[string]string{"LANG": "de_DE.ISO-8859-1", "TERM": "dumb"}, report.Options{ASCII: true}},
		{nil, report.Options{Color: true, ASCII: true}},
	} {
		assert.Equal(t, c.want, shown(func(name string) string { return c.env[name] }, "linux"), "%v", c.env)
	}
	assert.Equal(t, report.Options{Color: true}, shown(func(string) string { return "" }, "windows"))
}

// A file and a pipe are no terminals, whatever the environment says.
func TestPipesGetPlainLines(t *testing.T) {
	t.Setenv("TERM", "xterm")
	t.Setenv("LC_ALL", "C")
	assert.Equal(t, report.Options{}, layout(&bytes.Buffer{}))
	f, err := os.Create(filepath.Join(t.TempDir(), "report.txt"))
	require.NoError(t, err)
	defer f.Close()
	assert.Equal(t, report.Options{}, layout(f))
}
