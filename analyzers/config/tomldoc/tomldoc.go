// Package tomldoc reads TOML into a tree.
//
// It uses the syntax nodes of github.com/pelletier/go-toml/v2, which keep byte
// offsets, and joins what a TOML file may write in several places: tables, arrays
// of tables and dotted keys. A key that stands twice is kept twice, as the other
// readers do, although TOML forbids it.
package tomldoc

import (
	"errors"
	"fmt"

	"github.com/pelletier/go-toml/v2/unstable"

	"dextral/analyzers/config/tree"
	"dextral/analyzers/source"
)

// Read reads a TOML file. Errors are of type *source.Error.
func Read(f *source.File) (*tree.Document, error) {
	text, base := f.Body()
	if err := tree.CheckCount(f, text, ",", "=", "[", "."); err != nil {
		return nil, err
	}
	root := &tree.Node{Kind: tree.Map, Span: source.Span{From: base, To: len(f.Text)}}
	r := reader{file: f, base: base, root: root, table: root, first: map[place]*tree.Node{}}
	r.parser.Reset(text[:len(text):len(text)]) // the parser counts offsets from the end of the capacity
	for r.parser.NextExpression() {
		if err := r.expression(r.parser.Expression()); err != nil {
			return nil, err
		}
	}
	if err := r.parser.Error(); err != nil {
		return nil, r.parseError(err)
	}
	comments := tree.HashComments(f, base, r.texts, "")
	return &tree.Document{File: f, Roots: []*tree.Node{root}, Comments: comments, UniqueKeys: true}, nil
}

// reader builds the tree of one file.
type reader struct {
	file   *source.File
	base   int // offset of the parser's first byte in the file
	parser unstable.Parser
	root   *tree.Node
	table  *tree.Node    // that the last header opened
	texts  []source.Span // strings and quoted keys, in which a # is no comment
	first  map[place]*tree.Node
}

// place is a key of a map. A file may have as many tables as lines, so that each
// must be found without a search.
type place struct {
	in  *tree.Node
	key string
}

// add adds an entry to a map.
func (r *reader) add(m *tree.Node, k key, value *tree.Node) {
	m.Entries = append(m.Entries, tree.Entry{Key: k.text, KeyAt: k.at, Value: value})
	if r.first[place{m, k.text}] == nil {
		r.first[place{m, k.text}] = value
	}
}

// key is a part of a dotted key.
type key struct {
	text string
	at   source.Span
}

func (r *reader) span(raw unstable.Range) source.Span {
	from := r.base + int(raw.Offset)
	return source.Span{From: from, To: from + int(raw.Length)}
}

// keys reads a dotted key.
func (r *reader) keys(it unstable.Iterator) []key {
	var keys []key
	for it.Next() {
		if n := it.Node(); n.Kind == unstable.Key {
			span := r.span(n.Raw)
			if quoted(r.file, span) {
				r.texts = append(r.texts, span)
				span = source.Span{From: span.From + 1, To: span.To - 1}
			}
			keys = append(keys, key{string(n.Data), span})
		}
	}
	return keys
}

func quoted(f *source.File, s source.Span) bool {
	return !s.Empty() && (f.Text[s.From] == '"' || f.Text[s.From] == '\'')
}

// expression takes up a header or a key with its value.
func (r *reader) expression(n *unstable.Node) error {
	switch n.Kind {
	case unstable.Table, unstable.ArrayTable:
		keys := r.keys(n.Key())
		if err := r.checkDepth(keys[0].at, len(keys)); err != nil {
			return err
		}
		r.table = r.open(r.root, keys, n.Kind == unstable.ArrayTable)
	case unstable.KeyValue:
		_, err := r.keyValue(r.table, n, 1)
		return err
	}
	return nil
}

// checkDepth holds nesting within the bounds of package tree.
func (r *reader) checkDepth(at source.Span, depth int) error {
	if depth <= tree.MaxDepth {
		return nil
	}
	return r.file.ErrorAt(at, fmt.Sprintf("nested deeper than %d levels", tree.MaxDepth), "flatten the file, or exclude it from the audit")
}

// open finds or makes the map that a dotted key names. The last part of the
// header of an array of tables makes a new one.
func (r *reader) open(m *tree.Node, keys []key, array bool) *tree.Node {
	for i, k := range keys {
		last := i == len(keys)-1
		next := r.first[place{m, k.text}]
		switch {
		case next != nil && next.Kind == tree.List && last && array:
			item := &tree.Node{Kind: tree.Map, Span: k.at}
			next.Items = append(next.Items, item)
			next.Span.To = k.at.To
			next = item
		case next != nil && next.Kind == tree.List && len(next.Items) > 0:
			next = next.Items[len(next.Items)-1]
		case next == nil || next.Kind != tree.Map:
			next = &tree.Node{Kind: tree.Map, Span: k.at}
			value := next
			if last && array {
				value = &tree.Node{Kind: tree.List, Span: k.at, Items: []*tree.Node{next}}
			}
			r.add(m, k, value)
		}
		m = next
	}
	return m
}

// keyValue adds a key with its value to a map, and returns where the value ends.
func (r *reader) keyValue(m *tree.Node, n *unstable.Node, depth int) (int, error) {
	keys := r.keys(n.Key())
	last := keys[len(keys)-1]
	depth += len(keys)
	if err := r.checkDepth(last.at, depth); err != nil {
		return 0, err
	}
	m = r.open(m, keys[:len(keys)-1], false)
	at := last.at.To
	for at < len(r.file.Text) && r.file.Text[at] != '=' {
		at++
	}
	value, err := r.value(n.Value(), skipBlank(r.file.Text, min(at+1, len(r.file.Text))), depth)
	if err != nil {
		return 0, err
	}
	r.add(m, last, value)
	m.Span = m.Span.Cover(source.Span{From: last.at.From, To: value.Span.To})
	return value.Span.To, nil
}

// value reads a value that begins at an offset.
func (r *reader) value(n *unstable.Node, at, depth int) (*tree.Node, error) {
	if err := r.checkDepth(source.Span{From: at, To: at}, depth); err != nil {
		return nil, err
	}
	switch n.Kind {
	case unstable.Array, unstable.InlineTable:
		return r.container(n, at, depth)
	}
	value := &tree.Node{Span: r.span(n.Raw), Text: string(n.Data)}
	raw := value.Span
	if n.Kind == unstable.String {
		r.texts = append(r.texts, raw)
		raw = insideQuotes(r.file.Text, raw)
	}
	value.SetRaw(r.file, raw)
	return value, nil
}

// container reads what stands between brackets. The parser says where the parts
// begin, not where the whole does.
func (r *reader) container(n *unstable.Node, at, depth int) (*tree.Node, error) {
	value := &tree.Node{Kind: tree.List, Span: source.Span{From: at, To: at + 1}}
	if n.Kind == unstable.InlineTable {
		value.Kind = tree.Map
	}
	next := at + 1
	for it := n.Children(); it.Next(); {
		child := it.Node()
		if child.Kind == unstable.Comment {
			continue
		}
		next = skipBlank(r.file.Text, next)
		if child.Kind == unstable.KeyValue {
			end, err := r.keyValue(value, child, depth)
			if err != nil {
				return nil, err
			}
			next = end
			continue
		}
		item, err := r.value(child, next, depth+1)
		if err != nil {
			return nil, err
		}
		value.Items = append(value.Items, item)
		next = item.Span.To
	}
	value.Span.To = min(skipBlank(r.file.Text, next)+1, len(r.file.Text)) // the closing bracket
	return value, nil
}

// insideQuotes is a string's span without its quotes, one or three on a side.
func insideQuotes(text []byte, s source.Span) source.Span {
	n := 1
	if q := text[s.From]; s.To-s.From >= 6 && text[s.From+1] == q && text[s.From+2] == q {
		n = 3
	}
	return source.Span{From: s.From + n, To: s.To - n}
}

// skipBlank skips white space, commas and comments.
func skipBlank(text []byte, at int) int {
	for at < len(text) {
		switch text[at] {
		case ' ', '\t', '\r', '\n', ',':
			at++
		case '#':
			for at < len(text) && text[at] != '\n' {
				at++
			}
		default:
			return at
		}
	}
	return at
}

// parseError gives an error of the library its place.
func (r *reader) parseError(err error) error {
	at, remedy := len(r.file.Text), "mend the file, or exclude it from the audit"
	var p *unstable.ParserError
	if errors.As(err, &p) {
		at = r.base + int(r.parser.Range(p.Highlight).Offset)
	}
	e := r.file.ErrorAt(source.Span{From: at, To: min(at+1, len(r.file.Text))}, "this is not TOML: "+err.Error(), remedy)
	e.Err = err
	return e
}
