package report

import (
	"bufio"
	"fmt"
	"io"
	"strings"
	"unicode"
	"unicode/utf8"

	"github.com/mattn/go-runewidth"
)

// Options say how text is laid out. The zero value suits files and pipes.
type Options struct {
	Width int  // wrap at this width; 0: never. Tables are folded as far as they can be, commands never
	Color bool // use ANSI colours
	ASCII bool // print other characters as escapes
}

// ANSI styles.
const (
	bold    = "1"
	faint   = "2"
	red     = "1;31"
	yellow  = "1;33"
	blue    = "1;34"
	noStyle = ""
)

// printer writes lines. Its buffer keeps the first error until it is flushed.
type printer struct {
	*bufio.Writer
	o Options
}

func newPrinter(w io.Writer, o Options) *printer { return &printer{bufio.NewWriter(w), o} }

// WriteString writes text, for terminals that show nothing but ASCII with other
// characters as Go would escape them. Columns behind such a one are shifted.
func (p *printer) WriteString(s string) (int, error) {
	if p.o.ASCII {
		s = ascii(s)
	}
	return p.Writer.WriteString(s)
}

func ascii(s string) string {
	var b strings.Builder
	for _, r := range s {
		switch {
		case r < utf8.RuneSelf:
			b.WriteRune(r)
		case r < 0x10000:
			fmt.Fprintf(&b, `\u%04x`, r)
		default:
			fmt.Fprintf(&b, `\U%08x`, r)
		}
	}
	return b.String()
}

func (p *printer) line(s string) {
	p.WriteString(s)
	p.WriteByte('\n')
}

// styled wraps s in a style, if colours are wanted.
func (p *printer) styled(style, s string) string {
	if !p.o.Color || style == noStyle || s == "" {
		return s
	}
	return "\x1b[" + style + "m" + s + "\x1b[0m"
}

// labelled writes text beside a word in the left margin; lines that follow are
// indented as far as the first.
func (p *printer) labelled(margin, style, word, text string, size int) {
	indent := width(margin) + size
	lead := margin + p.styled(style, word) + strings.Repeat(" ", max(size-width(word), 1))
	for i, l := range wrap(text, p.o.Width-indent, p.o.Width > 0) {
		if i > 0 {
			lead = strings.Repeat(" ", indent)
		}
		p.line(strings.TrimRight(lead+l, " "))
	}
}

// minimum is the narrowest column into which text is wrapped: below it lines
// are left long rather than broken at every word.
const minimum = 24

// wrap breaks text at spaces. Words longer than the width stay whole, so that
// paths and commands can be copied.
func wrap(text string, limit int, on bool) []string {
	if !on || width(text) <= limit {
		return []string{text}
	}
	limit = max(limit, minimum)
	var lines []string
	line := ""
	for _, word := range strings.Fields(text) {
		switch {
		case line == "":
			line = word
		case width(line)+1+width(word) <= limit:
			line += " " + word
		default:
			lines = append(lines, line)
			line = word
		}
	}
	return append(lines, line)
}

// metric measures text as terminals outside East Asia do, whatever the
// environment says: output must not depend on it.
var metric = &runewidth.Condition{StrictEmojiNeutral: true}

// width is the number of terminal columns of s.
func width(s string) int { return metric.StringWidth(s) }

// pad fills s with spaces on the right.
func pad(s string, columns int) string {
	return s + strings.Repeat(" ", max(columns-width(s), 0))
}

// clean makes text from audited files harmless on one line: control characters,
// line and paragraph separators and direction marks become escapes.
func clean(s string) string {
	harmful := func(r rune) bool { return unicode.IsControl(r) || unicode.In(r, unicode.Cf, unicode.Zl, unicode.Zp) }
	s = strings.ToValidUTF8(s, "\ufffd")
	if strings.IndexFunc(s, harmful) < 0 {
		return s
	}
	var b strings.Builder
	for _, r := range s {
		switch {
		case !harmful(r):
			b.WriteRune(r)
		case r == '\t':
			b.WriteByte(' ')
		case r == '\n':
			b.WriteString(`\n`)
		case r < 0x100:
			fmt.Fprintf(&b, `\x%02x`, r)
		default:
			fmt.Fprintf(&b, `\u%04x`, r)
		}
	}
	return b.String()
}

// plural is "1 error" or "3 errors".
func plural[T int | int64](n T, one string) string {
	if n == 1 {
		return "1 " + one
	}
	return grouped(n) + " " + one + "s"
}
