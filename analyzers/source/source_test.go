package source

import (
	"errors"
	"strings"
	"testing"
	"unicode/utf8"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"
)

// slow counts lines and columns from the head of the text, code point by code
// point, as an independent twin of Position.
func slow(text []byte, offset int) (line, column int) {
	line, column = 1, 1
	for i := 0; i < offset; {
		r, n := utf8.DecodeRune(text[i:])
		switch {
		case i == 0 && r == '\ufeff':
		case r == '\n':
			line, column = line+1, 1
		default:
			column++
		}
		i += n
	}
	return line, column
}

func TestPositionAgainstSlowTwin(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		text := strings.Join(rapid.SliceOfN(rapid.SampledFrom([]string{
			"a", "\n", "\r\n", "\r", "é", "°", "姿", "🛩", "\t", "\ufeff", strings.Repeat("x", 700), strings.Repeat("ü", 700)}), 0, 12).Draw(t, "text"), "")
		f := New("mount.yaml", []byte(text))
		for at := range text + "\x00" {
			line, column := f.Position(at)
			wantLine, wantColumn := slow([]byte(text), at)
			if line != wantLine || column != wantColumn {
				t.Fatalf("offset %d of %q: got %d:%d, want %d:%d", at, text, line, column, wantLine, wantColumn)
			}
			if s := f.LineSpan(line); s.From > at && at > 2 {
				t.Fatalf("offset %d of %q lies before its line %d, %v", at, text, line, s)
			}
		}
	})
}

func TestPositionOutsideTheText(t *testing.T) {
	f := New("mount.yaml", []byte("ab\nc"))
	for _, c := range []struct{ offset, line, column int }{{-3, 1, 1}, {0, 1, 1}, {2, 1, 3}, {3, 2, 1}, {4, 2, 2}, {99, 2, 2}} {
		line, column := f.Position(c.offset)
		assert.Equal(t, [2]int{c.line, c.column}, [2]int{line, column}, "offset %d", c.offset)
	}
}

func TestLineSpan(t *testing.T) {
	f := New("mount.yaml", []byte("\ufeffone\r\ntwo\n\nvier"))
	for line, want := range map[int]string{0: "", 1: "one", 2: "two", 3: "", 4: "vier", 5: ""} {
		assert.Equal(t, want, f.Slice(f.LineSpan(line)), "line %d", line)
	}
	assert.Equal(t, 4, f.Lines())
}

func TestPlaceIsOneBasedAndExclusive(t *testing.T) {
	text := "µ: 1\nq: [0.5, 0.5]\n"
	f := New("mount.yaml", []byte(text))
	from := strings.Index(text, "[")
	p := f.Place(Span{from, from + len("[0.5, 0.5]")})
	assert.Equal(t, "mount.yaml:2:4", p.String())
	assert.Equal(t, [2]int{2, 14}, [2]int{p.EndLine, p.EndColumn})
}

func TestCheckText(t *testing.T) {
	for _, c := range []struct{ name, text, at, problem string }{
		{"plain", "q: 1\n", "", ""},
		{"empty", "", "", ""},
		{"with a byte order mark", "\ufeffq: 1\n", "", ""},
		{"binary", "PK\x03\x04\nab\x00\x00", "mount.yaml:2:3", "NUL byte"},
		{"Latin-1 degree sign", "yaw: 3 # \xb0\n", "mount.yaml:1:10", "byte 0xB0 is not UTF-8"},
		{"cut code point", "# 3 \xc2", "mount.yaml:1:5", "byte 0xC2 is not UTF-8"},
		{"UTF-16", "\xff\xfeq\x00", "mount.yaml:1:1", "UTF-16"},
	} {
		err := New("mount.yaml", []byte(c.text)).CheckText()
		if c.at == "" {
			assert.NoError(t, err, c.name)
			continue
		}
		var e *Error
		require.ErrorAs(t, err, &e, c.name)
		assert.Equal(t, c.at, e.Place.String(), c.name)
		assert.Contains(t, e.Problem, c.problem, c.name)
		assert.NotEmpty(t, e.Remedy, c.name)
	}
}

func TestCheckSize(t *testing.T) {
	assert.NoError(t, CheckSize("mount.yaml", MaxBytes))
	assert.ErrorContains(t, CheckSize("mount.yaml", MaxBytes+1), "mount.yaml: 104857601 bytes are more than the 100 MB")
	assert.Error(t, New("mount.yaml", make([]byte, MaxBytes+1)).CheckText())
}

func TestErrorUnwraps(t *testing.T) {
	cause := errors.New("cause")
	e := New("mount.yaml", []byte("a")).ErrorAt(Span{0, 1}, "it is wrong", "mend it")
	e.Err = cause
	assert.ErrorIs(t, e, cause)
	assert.EqualError(t, e, "mount.yaml:1:1: it is wrong; mend it")
}

// A minified file of one line must not cost a count of the line per place.
func BenchmarkPositionInOneLongLine(b *testing.B) {
	f := New("mount.json", []byte(strings.Repeat("1.25, ", 1<<20)+"é"))
	for i := range b.N {
		f.Position(i * 6 % len(f.Text))
	}
}
