package linedoc

import (
	"bytes"
	"strings"

	"dextral/analyzers/config/tree"
	"dextral/analyzers/source"
)

// KeyValue reads the key-value notation of CCSDS messages: KEY = value [unit].
// What stands between X_START and X_STOP is a map under the key X; blocks that
// repeat are a list; a unit is the tag of its value. Lines of data without a key are left out. COMMENT lines are
// comments.
func KeyValue(f *source.File) (*tree.Document, error) {
	r, err := newReader(f)
	if err != nil {
		return nil, err
	}
	open := []block{{node: r.root}}
	var deep error
	r.each(func(s source.Span) {
		text := r.file.Slice(s)
		top := open[len(open)-1]
		if strings.HasPrefix(text, "COMMENT") {
			r.note(s, "COMMENT")
			return
		}
		if key, value, ok := r.cut(s, "="); ok && !key.Empty() {
			number, unit := r.cutUnit(value)
			n := r.scalar(number)
			n.Tag = unit
			r.entry(top.node, key, n)
			return
		}
		if name, ok := strings.CutSuffix(text, "_START"); ok && name != "" && !strings.ContainsAny(name, " \t") {
			if len(open) > tree.MaxDepth {
				deep = r.tooDeep(s)
				return
			}
			key := source.Span{From: s.From, To: s.From + len(name)}
			open = append(open, block{name, key, &tree.Node{Kind: tree.Map, Span: s}})
		} else if name, ok := strings.CutSuffix(text, "_STOP"); ok && len(open) > 1 && name == top.name {
			open = r.closed(open)
		}
	})
	for len(open) > 1 {
		open = r.closed(open)
	}
	tree.Gather(r.root)
	return r.doc, deep
}

// block is a block that is being read.
type block struct {
	name string
	key  source.Span
	node *tree.Node
}

// closed hands the innermost block to the one around it.
func (r *reader) closed(open []block) []block {
	b := open[len(open)-1]
	open = open[:len(open)-1]
	tree.Gather(b.node)
	r.entry(open[len(open)-1].node, b.key, b.node)
	return open
}

// cutUnit takes a unit in brackets off the end of a value.
func (r *reader) cutUnit(s source.Span) (source.Span, string) {
	text := r.file.Text[s.From:s.To]
	if i := bytes.LastIndexByte(text, '['); i > 0 && text[len(text)-1] == ']' {
		return r.trim(source.Span{From: s.From, To: s.From + i}), string(text[i:])
	}
	return s, ""
}
