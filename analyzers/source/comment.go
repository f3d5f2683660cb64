package source

import (
	"bytes"
	"slices"

	"dextral/rules"
)

// Comment is a comment, or one line of a longer one.
type Comment struct {
	Span Span   // with its marks
	Text string // without its marks, trimmed
}

// Directive is a comment that speaks to dextral, not to people, about some lines
// of its file.
type Directive struct {
	Text        string
	Place       rules.Place
	First, Last int // the lines it speaks of
}

// Directives picks the comments, given in order, that are addressed to dextral.
// One that stands beside something speaks of its own lines; one that has its
// line to itself speaks of the next line that is not such a comment too.
func (f *File) Directives(comments []Comment, addressed func(text string) bool) []Directive {
	var found []Directive
	for i, c := range comments {
		if !addressed(c.Text) {
			continue
		}
		d := Directive{Text: c.Text, Place: f.Place(c.Span), First: f.Line(c.Span.From), Last: f.Line(max(c.Span.From, c.Span.To-1))}
		if f.alone(c.Span) {
			next := d.Last + 1
			for _, below := range comments[i+1:] {
				if f.Line(below.Span.From) != next || !f.alone(below.Span) {
					break
				}
				next = f.Line(max(below.Span.From, below.Span.To-1)) + 1
			}
			d.First, d.Last = next, next
		}
		found = append(found, d)
	}
	return found
}

// alone reports whether nothing but white space stands beside a span on its
// lines.
func (f *File) alone(s Span) bool {
	first, last := f.LineSpan(f.Line(s.From)), f.LineSpan(f.Line(max(s.From, s.To-1)))
	before, after := f.Text[first.From:max(first.From, s.From)], f.Text[min(s.To, last.To):last.To]
	return len(bytes.TrimSpace(before)) == 0 && len(bytes.TrimSpace(after)) == 0
}

// HeadComments are the comment lines, begun by one of the marks, that a text
// opens with; empty lines between them do not end them.
func (f *File) HeadComments(marks ...string) []Comment {
	var found []Comment
	for line := 1; line <= f.Lines(); line++ {
		span := f.LineSpan(line)
		text := bytes.TrimSpace(f.Text[span.From:span.To])
		i := slices.IndexFunc(marks, func(m string) bool { return bytes.HasPrefix(text, []byte(m)) })
		switch {
		case i >= 0:
			found = append(found, Comment{span, string(bytes.Trim(text, marks[i]+" \t"))})
		case len(text) > 0:
			return found
		}
	}
	return found
}
