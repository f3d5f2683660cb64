package linedoc

import (
	"bytes"
	"strings"

	"dextral/analyzers/config/tree"
	"dextral/analyzers/source"
)

// IsKernel reports whether a text begins as a SPICE text kernel does: with KPL/ and
// its kind, or with a block of data.
func IsKernel(head []byte) bool {
	head = bytes.TrimPrefix(head, []byte(source.ByteOrderMark))
	return bytes.HasPrefix(head, []byte("KPL/")) || bytes.HasPrefix(head, []byte(`\begindata`)) || bytes.Contains(head, []byte("\n\\begindata"))
}

// Kernel reads a SPICE text kernel: NAME = value, NAME = ( values ) over many lines,
// NAME += value, between lines \begindata and \begintext; the text between is comment. A
// variable that is assigned to again has the later value, as it has for the toolkit
// (NAIF, Kernel Required Reading). A value in several pieces is a list of them.
func Kernel(f *source.File) (*tree.Document, error) {
	r, err := newReader(f)
	if err != nil {
		return nil, err
	}
	r.doc.Fortran = true
	k := kernel{reader: r, at: map[string]int{}}
	data := false
	r.each(func(s source.Span) {
		switch text := r.file.Slice(s); {
		case text == `\begindata`:
			data = true
		case text == `\begintext`:
			data = false
		case data:
			k.line(s)
		default:
			r.note(s, "")
		}
	})
	k.end()
	return r.doc, nil
}

// kernel is a kernel that is being read.
type kernel struct {
	*reader
	at    map[string]int // of entries, by key
	open  bool           // a value in brackets goes on
	key   source.Span
	value source.Span
	more  bool // +=
}

// line reads a line of data.
func (k *kernel) line(s source.Span) {
	if !k.open {
		key, value, ok := k.cut(s, "=")
		if !ok || key.Empty() || value.Empty() {
			return
		}
		if k.more = k.file.Text[key.To-1] == '+'; k.more {
			key = k.trim(source.Span{From: key.From, To: key.To - 1})
		}
		k.key, k.value = key, value
		k.open = k.file.Text[value.From] == '('
	}
	if k.open {
		k.value.To = s.To
		if k.file.Text[s.To-1] != ')' {
			return
		}
	}
	k.end()
}

// end keeps what was read last.
func (k *kernel) end() {
	if k.key.Empty() {
		return
	}
	value := k.value
	if text := k.file.Slice(value); strings.HasPrefix(text, "(") && strings.HasSuffix(text, ")") && len(text) > 1 {
		value = source.Span{From: value.From + 1, To: value.To - 1}
		text := k.file.Text[value.From:value.To]
		value.From += len(text) - len(bytes.TrimLeft(text, " \t\r\n"))
		value.To = value.From + len(bytes.TrimSpace(text))
	}
	n := k.scalar(value)
	at, known := k.at[k.file.Slice(k.key)]
	switch {
	case known && k.more:
		old := k.root.Entries[at].Value
		if old.Kind != tree.List {
			old = &tree.Node{Kind: tree.List, Span: old.Span, Items: []*tree.Node{old}}
			k.root.Entries[at].Value = old
		}
		old.Items, old.Span = append(old.Items, n), old.Span.Cover(n.Span)
	case known:
		k.root.Entries[at].KeyAt, k.root.Entries[at].Value = k.key, n
	default:
		k.at[k.file.Slice(k.key)] = len(k.root.Entries)
		k.entry(k.root, k.key, n)
	}
	k.key, k.open = source.Span{}, false
}
