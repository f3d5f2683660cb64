package source_test

import (
	"bytes"
	"strings"
	"testing"
	"unicode/utf8"

	"github.com/stretchr/testify/assert"

	"dextral/analyzers/source"
)

// comments finds those that begin with # anywhere.
func comments(f *source.File) []source.Comment {
	var found []source.Comment
	for line := 1; line <= f.Lines(); line++ {
		span := f.LineSpan(line)
		if i := bytes.IndexByte(f.Text[span.From:span.To], '#'); i >= 0 {
			span.From += i
			found = append(found, source.Comment{Span: span, Text: strings.TrimLeft(f.Slice(span), "# ")})
		}
	}
	return found
}

func TestDirectivesSpeakOfLines(t *testing.T) {
	for text, want := range map[string][][2]int{
		"a: 1 # d:x\nb: 2\n":                      {{1, 1}},
		"# d:x\nb: 2\n":                           {{2, 2}},
		"  # d:x\r\n# words\r\n# d:y\r\nb: 2\r\n": {{4, 4}, {4, 4}},
		"# d:x\n\nb: 2\n":                         {{2, 2}},
		"# d:x":                                   {{2, 2}},
		"a: 1 # d:x\n# d:y\nb: 2 # d:z\n":         {{1, 1}, {3, 3}, {3, 3}},
		"# x d:x\n":                               nil,
	} {
		f := source.New("a.yaml", []byte(text))
		var got [][2]int
		for _, d := range f.Directives(comments(f), func(s string) bool { return strings.HasPrefix(s, "d:") }) {
			got = append(got, [2]int{d.First, d.Last})
			assert.Equal(t, "a.yaml", d.Place.Path)
		}
		assert.Equal(t, want, got, "%q", text)
	}
}

func TestHeadComments(t *testing.T) {
	f := source.New("a.csv", []byte("\ufeff# one\r\n\r\n%% two \r\nt,q\r\n# three\r\n"))
	var texts []string
	for _, c := range f.HeadComments("#", "%") {
		texts = append(texts, c.Text)
	}
	assert.Equal(t, []string{"one", "two"}, texts)
	assert.Empty(t, source.New("a", nil).HeadComments("#"))
}

// Offset undoes Position at every code point.
func TestOffset(t *testing.T) {
	f := source.New("a", []byte("\ufeffaé\r\n\nq̂ x\xff!\n"))
	for at := len(source.ByteOrderMark); at <= len(f.Text); at++ {
		if at < len(f.Text) && !utf8.RuneStart(f.Text[at]) {
			continue
		}
		got, ok := f.Offset(f.Position(at))
		assert.True(t, ok)
		assert.Equal(t, at, got)
	}
	for _, p := range [][2]int{{0, 1}, {1, 0}, {9, 1}, {1, 9}, {4, 2}} {
		_, ok := f.Offset(p[0], p[1])
		assert.False(t, ok, "%v", p)
	}
}
