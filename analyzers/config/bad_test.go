package config

import (
	"fmt"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/analyzers/source"
)

func TestBadInput(t *testing.T) {
	var bomb strings.Builder
	bomb.WriteString("a0: &a0 [1, 0, 0, 0]\n")
	for i := 1; i < 12; i++ {
		fmt.Fprintf(&bomb, "a%d: &a%d [%s]\n", i, i, strings.TrimSuffix(strings.Repeat(fmt.Sprintf("*a%d, ", i-1), 9), ", "))
	}
	for _, c := range []struct{ name, text, want string }{
		{"m.json", `{"q": [1, 0, 0`, "m.json:1:15: this is not JSON: parsing array after value: unexpected EOF; the file ends too early: complete it, or exclude it from the audit"},
		{"m.yaml", "\x7fELF\x02\x01\x00", "m.yaml:1:7: this is not text: it holds a NUL byte; give a binary file another name, or exclude it from the audit"},
		{"m.yaml", "yaw: 3 # \xb0", "m.yaml:1:10: byte 0xB0 is not UTF-8; save the file as UTF-8, or exclude it from the audit if it is not text"},
		{"m.yaml", "a:\n\tb: 1\n", "m.yaml:2:1: this is not YAML: found character that cannot start any token; indent with spaces"},
		{"m.yaml", bomb.String(), "expand to more than 100000 items; write the values out, or exclude the file from the audit"},
		{"m.json", strings.Repeat("[", 1000), "m.json:1:501: nested deeper than 500 levels; flatten the file, or exclude it from the audit"},
		{"m.yaml", strings.Repeat("[", 1000) + strings.Repeat("]", 1000), "m.yaml:1:501: nested deeper than 500 levels; flatten the file, or exclude it from the audit"},
		{"m.json", strings.Repeat(" ", source.MaxBytes+1), "m.json: 104857601 bytes are more than the 100 MB that are read of one configuration file; split it, or exclude it from the audit"},
	} {
		_, err := Read(c.name, []byte(c.text))
		var e *source.Error
		require.ErrorAs(t, err, &e)
		assert.Contains(t, err.Error(), c.want)
	}
	for _, text := range []string{"", "#", "---\n", "{}", "[]", "~", "1", "q:", "R: []", "rows: 3\ncols: 3\ndata:", "quaternion: {}", "axes: ''", "? [q]\n: [1, 0, 0, 0]\n"} {
		_, err := Read("m.yaml", []byte(text))
		assert.NoError(t, err, text)
	}
}

// Many values in one map, on one line, cost no more each than few.
func TestManyValues(t *testing.T) {
	var b strings.Builder
	b.WriteString("{")
	for i := range 20_000 {
		fmt.Fprintf(&b, `"q_%d": [1, 0, 0, 0], `, i)
	}
	b.WriteString(`"é": 0}`)
	r, err := Read("m.json", []byte(b.String()))
	require.NoError(t, err)
	assert.Len(t, r.Values, 20_000)
}
