// Package linedoc reads formats that have one statement on a line into a tree:
//
//	INI and properties    [section], key = value, key: value
//	parameter files       NAME,VALUE and NAME VALUE
//	calibration text      KEY: numbers
//	key-value notation    KEY = value [unit], of CCSDS messages
//	tables by name        a header, and a row for each thing
//	text kernels          NAME = ( numbers ), of SPICE
//	pose graphs           EDGE_SE3:QUAT 0 1 numbers
//
// None of them has a grammar that everybody keeps to, so the readers take the
// lines that they understand and leave out the others. They do not fail.
package linedoc

import (
	"bytes"
	"fmt"
	"strings"

	"dextral/analyzers/config/tree"
	"dextral/analyzers/source"
)

// reader goes through the lines of one file.
type reader struct {
	file *source.File
	doc  *tree.Document
	root *tree.Node
}

func newReader(f *source.File) (*reader, error) {
	text, base := f.Body()
	if err := tree.CheckCount(f, text, "\n"); err != nil {
		return nil, err
	}
	root := &tree.Node{Kind: tree.Map, Span: source.Span{From: base, To: len(f.Text)}}
	return &reader{file: f, root: root, doc: &tree.Document{File: f, Roots: []*tree.Node{root}}}, nil
}

// each calls see with every line that is not blank, trimmed.
func (r *reader) each(see func(source.Span)) {
	for line := 1; line <= r.file.Lines(); line++ {
		if s := r.trim(r.file.LineSpan(line)); !s.Empty() {
			see(s)
		}
	}
}

// trim takes white space off both ends of a span.
func (r *reader) trim(s source.Span) source.Span {
	text := r.file.Text[s.From:s.To]
	s.From += len(text) - len(bytes.TrimLeft(text, " \t"))
	return source.Span{From: s.From, To: s.From + len(bytes.Trim(text, " \t"))}
}

// comment cuts a comment off a line: from one of the marks, at the head of the
// line or behind white space, to its end.
func (r *reader) comment(s source.Span, marks ...string) source.Span {
	text := r.file.Slice(s)
	for i := range text {
		if i > 0 && text[i-1] != ' ' && text[i-1] != '\t' {
			continue
		}
		for _, m := range marks {
			if strings.HasPrefix(text[i:], m) {
				r.note(source.Span{From: s.From + i, To: s.To}, m)
				return r.trim(source.Span{From: s.From, To: s.From + i})
			}
		}
	}
	return s
}

// note keeps a comment that begins with a mark.
func (r *reader) note(s source.Span, mark string) {
	text := strings.TrimSpace(strings.TrimLeft(r.file.Slice(s), mark+" \t"))
	r.doc.Comments = append(r.doc.Comments, tree.Comment{Span: s, Text: text})
}

// cut splits a span around the first byte that is one of the separators.
func (r *reader) cut(s source.Span, separators string) (left, right source.Span, ok bool) {
	i := strings.IndexAny(r.file.Slice(s), separators)
	if i < 0 {
		return s, source.Span{From: s.To, To: s.To}, false
	}
	return r.trim(source.Span{From: s.From, To: s.From + i}), r.trim(source.Span{From: s.From + i + 1, To: s.To}), true
}

// scalar makes a scalar of a span, without quotes around it.
func (r *reader) scalar(s source.Span) *tree.Node {
	n := &tree.Node{Span: s}
	raw := s
	if text := r.file.Slice(s); len(text) >= 2 && (text[0] == '"' || text[0] == '\'') && text[len(text)-1] == text[0] {
		raw = source.Span{From: s.From + 1, To: s.To - 1}
	}
	n.Text, n.Raw = r.file.Slice(raw), raw
	return n
}

// entry adds an entry to a map.
func (r *reader) entry(m *tree.Node, key source.Span, value *tree.Node) {
	m.Entries = append(m.Entries, tree.Entry{Key: r.file.Slice(key), KeyAt: key, Value: value})
	m.Span = m.Span.Cover(key).Cover(value.Span)
}

// tooDeep is the error of blocks inside blocks without end.
func (r *reader) tooDeep(s source.Span) error {
	return r.file.ErrorAt(s, fmt.Sprintf("nested deeper than %d levels", tree.MaxDepth), "flatten the file, or exclude it from the audit")
}
