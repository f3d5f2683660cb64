// Package jsondoc reads JSON, with comments and trailing commas, into a tree.
//
// It uses github.com/tailscale/hujson, which keeps byte offsets. Two things come
// before it: a scan that bounds depth and size (that parser recurses) and finds
// the comments, and leave for NaN, Infinity and -Infinity, which are not JSON
// but which common writers write. They are hidden from the parser behind a
// number of the same length; the tree is cut from the text as it stands.
package jsondoc

import (
	"encoding/json"
	"regexp"
	"strconv"
	"strings"

	"github.com/tailscale/hujson"

	"dextral/analyzers/config/tree"
	"dextral/analyzers/source"
)

// Read reads a JSON file. Errors are of type *source.Error.
func Read(f *source.File) (*tree.Document, error) {
	body, base := f.Body()
	s, err := scan(f, base)
	if err != nil {
		return nil, err
	}
	if len(s.nonFinite) > 0 {
		body = hide(body, base, s.nonFinite)
	}
	v, err := hujson.Parse(body)
	if err != nil {
		return nil, parseError(f, body, base, err)
	}
	r := reader{f, base}
	return &tree.Document{File: f, Roots: []*tree.Node{r.node(&v)}, Comments: s.comments, UniqueKeys: true}, nil
}

// hide replaces the words for numbers that are not finite by numbers of the same
// length.
func hide(body []byte, base int, words []source.Span) []byte {
	body = append([]byte(nil), body...)
	for _, w := range words {
		copy(body[w.From-base:], "0e"+strings.Repeat("0", w.To-w.From-2))
	}
	return body
}

type reader struct {
	file *source.File
	base int // offset of the parser's first byte in the file
}

func (r reader) span(v *hujson.Value) source.Span {
	return source.Span{From: r.base + v.StartOffset, To: r.base + v.EndOffset}
}

func (r reader) node(v *hujson.Value) *tree.Node {
	n := &tree.Node{Span: r.span(v)}
	switch t := v.Value.(type) {
	case *hujson.Object:
		n.Kind = tree.Map
		for i := range t.Members {
			m := &t.Members[i]
			key := r.node(&m.Name)
			n.Entries = append(n.Entries, tree.Entry{Key: key.Text, KeyAt: inside(key.Span), Value: r.node(&m.Value)})
		}
	case *hujson.Array:
		n.Kind = tree.List
		for i := range t.Elements {
			n.Items = append(n.Items, r.node(&t.Elements[i]))
		}
	case hujson.Literal:
		r.literal(n)
	}
	return n
}

// literal reads a string, number or word from the text as it stands.
func (r reader) literal(n *tree.Node) {
	n.Text = r.file.Slice(n.Span)
	raw := n.Span
	if strings.HasPrefix(n.Text, `"`) {
		quoted := n.Text
		raw = inside(n.Span)
		if strings.IndexByte(quoted, '\\') < 0 {
			n.Text, n.Raw = quoted[1:len(quoted)-1], raw
			return
		}
		// The parser has accepted the string, so that this cannot fail but for
		// a lone surrogate, which becomes U+FFFD.
		if json.Unmarshal([]byte(quoted), &n.Text) != nil {
			n.Text = quoted
		}
	}
	n.SetRaw(r.file, raw)
}

// inside is a string's span without its quotes.
func inside(s source.Span) source.Span { return source.Span{From: s.From + 1, To: s.To - 1} }

var positionInError = regexp.MustCompile(`^hujson: line (\d+), column (\d+): (.*)$`)

// parseError gives an error of the library its place. The library counts columns
// in bytes of the text that it was given.
func parseError(f *source.File, body []byte, base int, err error) error {
	at, problem := len(body), err.Error()
	if m := positionInError.FindStringSubmatch(err.Error()); m != nil {
		line, _ := strconv.Atoi(m[1])
		column, _ := strconv.Atoi(m[2])
		at, problem = column-1, m[3]
		if line > 1 {
			at += f.LineSpan(line).From - base
		}
	}
	remedy := "mend the file, or exclude it from the audit"
	if at >= len(body) {
		remedy = "the file ends too early: complete it, or exclude it from the audit"
	}
	at = base + min(at, len(body))
	e := f.ErrorAt(source.Span{From: at, To: min(at+1, len(f.Text))}, "this is not JSON: "+problem, remedy)
	e.Err = err
	return e
}
