package tree

import (
	"bytes"
	"sort"
	"strings"

	"dextral/analyzers/source"
)

// OnLines returns the comments that begin on the lines of a span and stand
// beside something: a comment that has its line to itself is not among them.
func (d *Document) OnLines(s source.Span) []Comment {
	first, last := d.File.Line(s.From), d.File.Line(max(s.From, s.To-1))
	from, to := d.File.LineSpan(first).From, d.File.LineSpan(last).To
	var beside []Comment
	for i := d.commentAt(from); i < len(d.Comments) && d.Comments[i].Span.From < to; i++ {
		if !d.alone(d.Comments[i]) {
			beside = append(beside, d.Comments[i])
		}
	}
	return beside
}

// maxAbove is the most lines of comment above a key that can speak of it; what
// stands further up speaks of more.
const maxAbove = 20

// Above returns the comments that have the lines directly above a line to
// themselves, from the top, up to the first line that is anything else.
func (d *Document) Above(line int) []Comment {
	end := d.commentAt(d.File.LineSpan(line).From)
	begin := end
	for begin > 0 && end-begin < maxAbove && d.File.Line(d.Comments[begin-1].Span.From) == line-1 && d.alone(d.Comments[begin-1]) {
		begin--
		line--
	}
	return d.Comments[begin:end]
}

// commentAt is the index of the first comment at or after an offset.
func (d *Document) commentAt(offset int) int {
	return sort.Search(len(d.Comments), func(i int) bool { return d.Comments[i].Span.From >= offset })
}

// alone reports whether only white space stands before a comment on its line.
func (d *Document) alone(c Comment) bool {
	line := d.File.LineSpan(d.File.Line(c.Span.From))
	return len(bytes.TrimSpace(d.File.Text[line.From:max(line.From, c.Span.From)])) == 0
}

// HashComment makes a Comment of a span that begins with # and ends with its
// line.
func HashComment(f *source.File, s source.Span) Comment {
	return Comment{Span: s, Text: strings.TrimSpace(strings.TrimLeft(f.Slice(s), "# \t"))}
}
