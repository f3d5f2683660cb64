// Package jsonl reads JSON lines: one object to a line, a row each.
//
// The members of an object are the columns, named by their path:
// pose.orientation.w, q[0]. Which paths there are is learnt from the first rows;
// after that a row is walked once, along a tree of the paths that are wanted, and
// everything else is passed over without being decoded. So a row allocates
// nothing, members may come in any order, and one that is missing is a gap.
package jsonl

import (
	"bytes"

	"dextral/analyzers/series/fold"
	"dextral/analyzers/series/text"
)

// Table says which members of a row go to which cell.
type Table struct {
	Width int
	Cells []int // for each column the cell that it goes to, or -1
	root  *node
}

// node is a place in the tree of paths. A value that is met is a number if it is
// a column, and an object or array if it has members.
type node struct {
	column  int // -1: none
	members map[string]*node
	items   []*node
}

// maxDepth bounds the nesting of a row.
const maxDepth = 64

// Record takes the first line off data; see text.Table.
func (t *Table) Record(data []byte, last bool) (record, rest []byte, lines int, ok bool) {
	end := bytes.IndexByte(data, '\n')
	if end < 0 {
		if !last {
			return nil, data, 0, false
		}
		return data, nil, 0, true
	}
	return data[:end], data[end+1:], 1, true
}

// Cut is the length of the lines that are whole.
func (t *Table) Cut(data []byte) int { return bytes.LastIndexByte(data, '\n') + 1 }

// Plain reports true: every line is a record.
func (t *Table) Plain([]byte) bool { return true }

// Row reads the cells of a record. What it leaves in cells when there is a
// fault has no meaning.
func (t *Table) Row(record []byte, cells []fold.Cell) text.Fault {
	if len(record) > text.MaxRecord {
		return text.Fault{Kind: text.TooLong}
	}
	for i := range cells {
		cells[i].State = fold.Gap
	}
	w := walk{text: record, cells: cells, table: t}
	w.space()
	if w.at == len(record) {
		return text.Fault{Kind: text.Empty}
	}
	if w.peek() != '{' || !w.value(t.root, 0) {
		if w.fault.Kind == text.None {
			w.fault.Kind = text.Garbled
		}
		return w.fault
	}
	if w.space(); w.at < len(record) {
		return text.Fault{Kind: text.Garbled}
	}
	return w.fault
}

// walk is a pass over one record.
type walk struct {
	text  []byte
	at    int
	cells []fold.Cell
	table *Table
	fault text.Fault // a value that should have been a number; the walk goes on
}

func (w *walk) space() {
	for w.at < len(w.text) && (w.text[w.at] == ' ' || w.text[w.at] == '\t' || w.text[w.at] == '\r') {
		w.at++
	}
}

// peek is the next byte, 0 at the end.
func (w *walk) peek() byte {
	if w.at < len(w.text) {
		return w.text[w.at]
	}
	return 0
}

// take passes over a byte if it comes next.
func (w *walk) take(b byte) bool {
	if w.peek() != b {
		return false
	}
	w.at++
	w.space()
	return true
}

// value passes over a value, which is at n in the tree or, if n is nil, nowhere. It
// reports false where the text is no JSON.
func (w *walk) value(n *node, depth int) bool {
	if depth > maxDepth {
		return false
	}
	switch w.peek() {
	case '{':
		return w.object(n, depth)
	case '[':
		return w.array(n, depth)
	}
	from := w.at
	if w.peek() == '"' {
		if !w.quoted() {
			return false
		}
	} else {
		for w.at < len(w.text) && !ends(w.text[w.at]) {
			w.at++
		}
	}
	if w.at == from {
		return false
	}
	if n != nil && n.column >= 0 && w.table.Cells[n.column] >= 0 {
		if !text.Read(w.text[from:w.at], '.', &w.cells[w.table.Cells[n.column]]) && w.fault.Kind == text.None {
			w.fault = text.Fault{Kind: text.NotNumber, Column: n.column}
		}
	}
	w.space()
	return true
}

// ends reports whether a byte ends a number or a word.
func ends(b byte) bool {
	switch b {
	case ',', ']', '}', ' ', '\t', '\r', ':', '[', '{', '"':
		return true
	}
	return false
}

// quoted passes over a string.
func (w *walk) quoted() bool {
	for w.at++; w.at < len(w.text); w.at++ {
		switch w.text[w.at] {
		case '\\':
			w.at++
		case '"':
			w.at++
			return true
		}
	}
	w.at = len(w.text)
	return false
}

func (w *walk) object(n *node, depth int) bool {
	w.take('{')
	if w.take('}') {
		return true
	}
	for {
		from := w.at
		if w.peek() != '"' || !w.quoted() {
			return false
		}
		var member *node
		if n != nil {
			member = n.members[string(w.text[from+1:w.at-1])]
		}
		w.space()
		if !w.take(':') || !w.value(member, depth+1) {
			return false
		}
		if !w.take(',') {
			return w.take('}')
		}
	}
}

func (w *walk) array(n *node, depth int) bool {
	w.take('[')
	if w.take(']') {
		return true
	}
	for i := 0; ; i++ {
		var item *node
		if n != nil && i < len(n.items) {
			item = n.items[i]
		}
		if !w.value(item, depth+1) {
			return false
		}
		if !w.take(',') {
			return w.take(']')
		}
	}
}
