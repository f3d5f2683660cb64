package config

import (
	"slices"
	"strings"

	"dextral/analyzers/claims"
	"dextral/analyzers/config/tree"
	"dextral/analyzers/source"
	"dextral/core/convention"
	"dextral/rules"
)

// remark is a comment about a value.
type remark struct {
	*claims.Comment
	place  rules.Place
	beside bool // on the lines of the value, not above it
}

func (r remark) claim(says convention.Term, from rules.Source) rules.Claim {
	return rules.Claim{Says: says, Source: from, Text: r.Text, Place: r.place}
}

// remarks are the comments on the lines of a value and of its key, and those on
// the lines directly above the key, which count as one text. A line of
// configuration that is switched off ends them.
func (w *walker) remarks(s *spot) []remark {
	var found []remark
	var seen []source.Span
	for _, span := range s.lines() {
		for _, c := range w.doc.OnLines(span) {
			if !slices.Contains(seen, c.Span) && !claims.IsCode(c.Text) {
				seen = append(seen, c.Span)
				found = append(found, remark{w.comment(c.Span, c.Text), w.doc.File.Place(c.Span), true})
			}
		}
	}
	if s.keyAt.Empty() {
		return found
	}
	above := w.doc.Above(w.doc.File.Line(s.keyAt.From))
	for i := len(above) - 1; i >= 0; i-- {
		if claims.IsCode(above[i].Text) {
			above = above[i+1:]
			break
		}
	}
	if len(above) > 0 {
		span := above[0].Span.Cover(above[len(above)-1].Span)
		found = append(found, remark{w.comment(span, text(above)), w.doc.File.Place(span), false})
	}
	return found
}

func text(comments []tree.Comment) string {
	var lines []string
	for _, c := range comments {
		lines = append(lines, c.Text)
	}
	return strings.Join(lines, " ")
}

// lines are the stretches on whose lines a comment speaks of the spot. A value
// that a reference leads to does not stand with its key.
func (s *spot) lines() []source.Span {
	switch {
	case s.parts != nil:
		return append([]source.Span{s.keyAt}, s.parts...)
	case s.keyAt.Empty():
		return []source.Span{s.node.Span}
	case s.node.Span.From >= s.keyAt.From && s.in != nil && s.in.node.Kind == tree.Map:
		return []source.Span{s.keyAt.Cover(s.node.Span)}
	}
	return []source.Span{s.keyAt, s.node.Span}
}
