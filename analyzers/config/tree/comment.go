package tree

import (
	"bytes"
	"slices"
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

// HashComments finds the comments of a file that begin with # and end with their
// line: from an offset on, outside the given texts, behind one of the bytes
// before (any byte if before is empty) or at the head of the file.
func HashComments(f *source.File, from int, texts []source.Span, before string) []Comment {
	slices.SortFunc(texts, func(a, b source.Span) int { return a.From - b.From })
	var found []Comment
	for at := from; at < len(f.Text); {
		hash := bytes.IndexByte(f.Text[at:], '#')
		if hash < 0 {
			break
		}
		at += hash
		for len(texts) > 0 && texts[0].To <= at {
			texts = texts[1:]
		}
		switch {
		case len(texts) > 0 && texts[0].From <= at:
			at = texts[0].To
		case at > from && before != "" && strings.IndexByte(before, f.Text[at-1]) < 0:
			at++
		default:
			span := source.Span{From: at, To: lineEnd(f.Text, at)}
			found = append(found, Comment{Span: span, Text: strings.TrimSpace(strings.TrimLeft(f.Slice(span), "# \t"))})
			at = span.To
		}
	}
	return found
}

// lineEnd is the offset of the LF or CRLF that ends a line, or of the end of the
// text.
func lineEnd(text []byte, at int) int {
	end := len(text)
	if i := bytes.IndexByte(text[at:], '\n'); i >= 0 {
		end = at + i
	}
	if end > at && text[end-1] == '\r' {
		end--
	}
	return end
}
