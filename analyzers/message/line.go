package message

import (
	"bufio"
	"errors"
	"io"
	"strings"
	"unicode/utf8"

	"dextral/rules"
)

// line is one line of a message in key-value notation.
type line struct {
	text   string // without its end
	number int
	key    string // "" if there is no =
	value  string
	unit   string // in square brackets behind the value
	at     int    // of the value, in bytes
}

// longest is how much of a line is read. The standard allows 254 characters.
const longest = 1 << 16

// lines reads a message line by line.
type lines struct {
	in     *bufio.Reader
	path   string
	number int
}

func newLines(path string, r io.Reader) *lines {
	return &lines{in: bufio.NewReaderSize(r, longest), path: path}
}

// next is the next line; io.EOF after the last. Of a line that is too long the
// beginning is returned.
func (l *lines) next() (line, error) {
	raw, err := l.in.ReadSlice('\n')
	if errors.Is(err, bufio.ErrBufferFull) {
		text := string(raw)
		for errors.Is(err, bufio.ErrBufferFull) {
			_, err = l.in.ReadSlice('\n')
		}
		raw = []byte(text)
	}
	if err != nil && (!errors.Is(err, io.EOF) || len(raw) == 0) {
		return line{}, err
	}
	l.number++
	n := line{text: strings.TrimRight(string(raw), "\r\n"), number: l.number}
	key, value, ok := strings.Cut(n.text, "=")
	if !ok {
		return n, nil
	}
	n.key = strings.TrimSpace(key)
	n.at = len(key) + 1 + len(value) - len(strings.TrimLeft(value, " \t"))
	n.value = strings.TrimSpace(value)
	if open := strings.LastIndexByte(n.value, '['); open > 0 && strings.HasSuffix(n.value, "]") {
		n.value, n.unit = strings.TrimSpace(n.value[:open]), n.value[open+1:len(n.value)-1]
	}
	return n, nil
}

// word is the first word of a line: a keyword that stands alone, or COMMENT.
func (n line) word() string {
	word, _, _ := strings.Cut(strings.TrimSpace(n.text), " ")
	return word
}

// place is that of the value, or of the line.
func (l *lines) place(n line) rules.Place {
	from, to := 0, len(n.text)
	if n.key != "" {
		from = min(n.at, to)
		to = from + len(n.value)
	}
	column := func(at int) int { return utf8.RuneCountInString(n.text[:min(at, len(n.text))]) + 1 }
	return rules.Place{Path: l.path, Line: n.number, Column: column(from), EndLine: n.number, EndColumn: column(to)}
}
