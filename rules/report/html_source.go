package report

import (
	"strings"

	"dextral/rules"
)

// sourceView is a source line in three parts, of which the finding is about the second.
type sourceView struct {
	Number              int
	Before, Mark, After string
}

// Of a long line, such as a file written on one, this many code points are shown,
// and so many of them before the mark.
const (
	maxShown   = 240
	shownAhead = 60
)

// sourceViews cuts lines where the place begins and ends. Columns count code points.
func sourceViews(p rules.Place, lines []SourceLine) []sourceView {
	var views []sourceView
	for _, l := range lines {
		text := []rune(l.Text)
		from, to := 0, 0
		switch end := max(p.EndLine, p.Line); {
		case l.Number < p.Line || l.Number > end:
		default:
			to = len(text)
			if l.Number == p.Line {
				from = p.Column - 1
			}
			if l.Number == end && p.EndColumn > 0 {
				to = p.EndColumn - 1
			}
		}
		from = min(max(from, 0), len(text))
		to = min(max(to, from), len(text))
		views = append(views, clipped(l.Number, text, from, to))
	}
	return views
}

func clipped(number int, text []rune, from, to int) sourceView {
	first := 0
	if len(text) > maxShown {
		first = min(max(from-shownAhead, 0), len(text)-maxShown)
	}
	last := min(first+maxShown, len(text))
	to = min(to, last)
	v := sourceView{number, source(text[first:from]), source(text[from:to]), source(text[to:last])}
	if first > 0 {
		v.Before = "…" + v.Before
	}
	if last < len(text) {
		v.After += "…"
	}
	return v
}

// source keeps tabs visible as such and makes the rest harmless.
func source(text []rune) string { return clean(strings.ReplaceAll(string(text), "\t", "    ")) }
