// Package source turns byte offsets of a text file into lines and columns.
//
// Readers keep byte offsets, which are what parsers know and what slices the
// text again; a line and a column are worked out only when somebody is to be
// told. The rules are those of package rules: lines and columns count from 1, a
// column counts Unicode code points, ends are exclusive. A line ends with LF;
// the CR of a CRLF is the last character of its line. A byte order mark at the
// head of the file stands nowhere: the character after it is at 1:1.
package source

import (
	"bytes"
	"sort"
	"unicode/utf8"

	"dextral/rules"
)

// Span is a stretch of a file in bytes; To is exclusive.
type Span struct{ From, To int }

// Empty reports whether the span holds no byte.
func (s Span) Empty() bool { return s.To <= s.From }

// Cover is the shortest span that holds both.
func (s Span) Cover(t Span) Span { return Span{min(s.From, t.From), max(s.To, t.To)} }

// Holds reports whether t lies inside s.
func (s Span) Holds(t Span) bool { return s.From <= t.From && t.To <= s.To }

// File is a text file with an index of its lines.
type File struct {
	Path string
	Text []byte

	lines []int // offset of each line's first byte
	runes []int // code points before each block; nil if all of the text is ASCII
}

// block is the distance in bytes between entries of File.runes. It bounds the
// bytes that one look-up counts, so that a minified file of one long line costs
// no more per place than any other.
const block = 1024

// ByteOrderMark is U+FEFF in UTF-8.
const ByteOrderMark = "\ufeff"

// New indexes a file. The text is kept, not copied.
func New(path string, text []byte) *File {
	f := &File{Path: path, Text: text, lines: []int{0}}
	for from := 0; ; {
		i := bytes.IndexByte(text[from:], '\n')
		if i < 0 {
			break
		}
		from += i + 1
		f.lines = append(f.lines, from)
	}
	if !ascii(text) {
		f.runes = make([]int, 0, len(text)/block+1)
		n := 0
		for from := 0; from < len(text); from += block {
			f.runes = append(f.runes, n)
			n += starts(text[from:min(from+block, len(text))])
		}
	}
	return f
}

func ascii(text []byte) bool {
	for _, b := range text {
		if b >= utf8.RuneSelf {
			return false
		}
	}
	return true
}

// starts counts the bytes that begin a code point.
func starts(text []byte) int {
	n := 0
	for _, b := range text {
		if utf8.RuneStart(b) {
			n++
		}
	}
	return n
}

// codePoints counts the code points that begin before an offset, without a byte
// order mark at the head.
func (f *File) codePoints(offset int) int {
	n := offset
	if k := offset / block; f.runes != nil {
		if k == len(f.runes) { // the end of a text that fills its last block
			k--
		}
		n = f.runes[k] + starts(f.Text[k*block:offset])
		if offset >= len(ByteOrderMark) && bytes.HasPrefix(f.Text, []byte(ByteOrderMark)) {
			n--
		}
	}
	return n
}

// Body is the text without a byte order mark, and the offset at which it begins.
func (f *File) Body() ([]byte, int) {
	body := bytes.TrimPrefix(f.Text, []byte(ByteOrderMark))
	return body, len(f.Text) - len(body)
}

// Line is the number of the line, from 1, that an offset stands on. Offsets
// outside the text count as its nearest end.
func (f *File) Line(offset int) int {
	return sort.SearchInts(f.lines, min(max(offset, 0), len(f.Text))+1)
}

// Lines is the number of lines. A text that ends with LF has an empty last one.
func (f *File) Lines() int { return len(f.lines) }

// LineSpan is the stretch of a line without its line end, empty outside the file.
func (f *File) LineSpan(line int) Span {
	if line < 1 || line > len(f.lines) {
		return Span{len(f.Text), len(f.Text)}
	}
	from, to := f.lines[line-1], len(f.Text)
	if line < len(f.lines) {
		to = f.lines[line] - 1
	}
	if to > from && f.Text[to-1] == '\r' {
		to--
	}
	if line == 1 && bytes.HasPrefix(f.Text[from:to], []byte(ByteOrderMark)) {
		from += len(ByteOrderMark)
	}
	return Span{from, to}
}

// Position gives line and column, from 1, of an offset. An offset inside a code
// point belongs to the column after it; offsets outside the text count as its
// nearest end.
func (f *File) Position(offset int) (line, column int) {
	offset = min(max(offset, 0), len(f.Text))
	line = f.Line(offset)
	return line, f.codePoints(offset) - f.codePoints(f.lines[line-1]) + 1
}

// Offset is where a line and column, as Position gives them, begin; false if the
// file has no such place.
func (f *File) Offset(line, column int) (int, bool) {
	if line < 1 || line > len(f.lines) || column < 1 {
		return 0, false
	}
	at, end := f.LineSpan(line).From, len(f.Text)
	if line < len(f.lines) {
		end = f.lines[line]
	}
	for range column - 1 {
		_, size := utf8.DecodeRune(f.Text[at:end])
		if size == 0 {
			return 0, false
		}
		at += size
	}
	return at, true
}

// Place is the place of a span.
func (f *File) Place(s Span) rules.Place {
	p := rules.Place{Path: f.Path}
	p.Line, p.Column = f.Position(s.From)
	p.EndLine, p.EndColumn = f.Position(max(s.From, s.To))
	return p
}

// Slice is the text of a span.
func (f *File) Slice(s Span) string { return string(f.Text[s.From:s.To]) }
