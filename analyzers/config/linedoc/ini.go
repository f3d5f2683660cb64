package linedoc

import (
	"strings"

	"dextral/analyzers/config/tree"
	"dextral/analyzers/source"
)

// Sections reads INI and properties files. A line that is indented and has no
// separator goes on with the value above it, so that a matrix may have a row on
// each line.
func Sections(f *source.File) (*tree.Document, error) {
	r, err := newReader(f)
	if err != nil {
		return nil, err
	}
	r.doc.UniqueKeys = true
	sections := map[string]*tree.Node{}
	section := r.root
	var last *tree.Node // the value above, if a line may go on with it
	r.each(func(s source.Span) {
		s = r.comment(s, "#", ";", "!")
		if s.Empty() {
			return
		}
		if text := r.file.Slice(s); text[0] == '[' && strings.HasSuffix(text, "]") && !looksLikeList(text) {
			name := r.trim(source.Span{From: s.From + 1, To: s.To - 1})
			section, last = sections[r.file.Slice(name)], nil
			if section == nil {
				section = &tree.Node{Kind: tree.Map, Span: s}
				sections[r.file.Slice(name)] = section
				r.entry(r.root, name, section)
			}
			return
		}
		key, value, ok := r.cut(s, "=:")
		indented := s.From > r.file.LineSpan(r.file.Line(s.From)).From
		switch {
		case ok && !key.Empty():
			last = r.scalar(value)
			r.entry(section, key, last)
		case !ok && indented && last != nil && len(r.doc.Comments) == r.commentsBefore(last):
			last.Span.To = s.To
			last.Raw = last.Span
			last.Text = r.file.Slice(last.Raw)
			section.Span = section.Span.Cover(s)
		default:
			last = nil
		}
	})
	return r.doc, nil
}

// commentsBefore is the number of comments that stand before the end of a value.
func (r *reader) commentsBefore(n *tree.Node) int {
	count := len(r.doc.Comments)
	for count > 0 && r.doc.Comments[count-1].Span.From >= n.Span.From {
		count--
	}
	return count
}

// looksLikeList reports whether brackets hold numbers and not the name of a
// section.
func looksLikeList(text string) bool {
	inner := strings.Trim(text, "[] \t")
	return inner == "" || strings.Trim(inner, "0123456789.,+-eE \t") == ""
}
