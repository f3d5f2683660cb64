package report

import (
	"fmt"
	"io"
	"slices"
	"strings"

	"dextral/core/convention"
	"dextral/rules"
)

// Readings lists orientation values in the order of their places: for each how
// it is read and which claims decide that, or why it is undecided.
func Readings(w io.Writer, values []*rules.Value, o Options) error {
	p := newPrinter(w, o)
	sorted := slices.Clone(values)
	slices.SortStableFunc(sorted, func(a, b *rules.Value) int { return a.Place.Compare(b.Place) })
	undecided := 0
	for _, v := range sorted {
		p.reading(v)
		if !v.Decided() {
			undecided++
		}
	}
	p.line(fmt.Sprintf("%s: %s read, %s undecided", plural(len(sorted), "orientation value"),
		grouped(len(sorted)-undecided), grouped(undecided)))
	return p.Flush()
}

// marginWidth holds the words in the margin of a reading and two spaces.
const marginWidth = len("undecided") + 2

func (p *printer) reading(v *rules.Value) {
	label := func(style, word, text string) { p.labelled("  ", style, word, text, marginWidth) }
	first := p.styled(bold, clean(v.Place.String())+":")
	if v.Key != "" {
		first += " " + clean(v.Key)
	}
	p.line(first)
	if v.Decided() {
		label(noStyle, "read", clean(v.Reading())+sizeText(v))
	} else {
		label(yellow, "undecided", clean(v.Why))
	}
	said := ""
	because := func(style, word string, c rules.Claim) {
		if word == said {
			word = ""
		} else {
			said = word
		}
		label(style, word, claimText(c, v.Place))
	}
	for _, s := range convention.Subjects() {
		c, ok := v.Claims.On(s)
		if !ok {
			continue
		}
		because(faint, "because", c)
		for _, other := range v.Claims.Conflicts(s) {
			because(red, "but", other)
		}
	}
	if v.Uncertainty > 0 {
		label(faint, "within", fmt.Sprintf("%s deg, declared", residualText(rules.Degrees(v.Uncertainty))))
	}
	if v.Offset > 0 {
		label(faint, "within", fmt.Sprintf("%s in the unit of its translation, declared", residualText(rules.Plain(v.Offset))))
	}
}

// sizeText says how large a matrix is.
func sizeText(v *rules.Value) string {
	if v.Rows == 0 || v.Cols == 0 {
		return ""
	}
	return fmt.Sprintf(", %dx%d", v.Rows, v.Cols)
}

// claimText says what a claim says, who says it, in which words and where. The
// path is left out where it is that of the value.
func claimText(c rules.Claim, near rules.Place) string {
	s := clean(c.Says.String()) + ", by " + c.Source.String()
	if c.Text != "" {
		s += " " + quoted(shortened(clean(c.Text)))
	}
	switch {
	case c.Place.Line == 0 || c.Source == rules.Shape:
	case c.Place.Path != near.Path:
		s += " (" + clean(c.Place.String()) + ")"
	default:
		s += fmt.Sprintf(" (line %d)", c.Place.Line)
	}
	return s
}

// quoted puts a text between quotes that it does not hold.
func quoted(s string) string {
	if strings.Contains(s, `"`) {
		return "'" + s + "'"
	}
	return `"` + s + `"`
}

// maxQuoted bounds the words of a file that a reading quotes: who wants the
// whole comment has its line.
const maxQuoted = 60

func shortened(s string) string {
	if runes := []rune(s); len(runes) > maxQuoted {
		return strings.TrimRight(string(runes[:maxQuoted-3]), " ") + "..."
	}
	return s
}
