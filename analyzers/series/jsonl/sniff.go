package jsonl

import (
	"bytes"
	"fmt"
	"slices"
	"unicode/utf8"

	"dextral/analyzers/series/fold"
	"dextral/analyzers/series/text"
	"dextral/rules"
)

// Limits on what is learnt from the first rows.
const (
	sample     = 64   // rows
	maxColumns = 2048 // paths
	maxItems   = 16   // items of an array that count as columns; longer ones are data of another kind
)

// Head is what the first rows say about all of the file.
type Head struct {
	Table
	Names  []text.Field // path of each column, and where its name stands where it is met first
	Rows   []text.Row
	Offset int // of the first row
}

// Sniff looks at the start of a file, of which last says that it is all. It
// reports false unless the first two lines are objects, or the only one is, with
// a number somewhere.
func Sniff(path string, head []byte, last bool) (*Head, bool) {
	h := &Head{}
	h.root = &node{column: -1}
	number := int64(1)
	rest := bytes.TrimPrefix(head, []byte("\xef\xbb\xbf"))
	h.Offset = len(head) - len(rest)
	for len(rest) > 0 && len(h.Rows) < sample {
		record, next, lines, ok := h.Record(rest, last)
		if !ok {
			break
		}
		if len(bytes.TrimSpace(record)) > 0 {
			l := learner{walk: walk{text: record, table: &h.Table}, head: h, path: path, line: int(number)}
			l.space()
			if l.peek() != '{' || !l.learn(h.root, "") || l.at < len(record) {
				if len(h.Rows) < 2 {
					return nil, false
				}
			} else {
				h.Rows = append(h.Rows, text.Row{Text: record, Line: number})
			}
		}
		rest, number = next, number+int64(lines)
	}
	if len(h.Names) == 0 || !h.numbers() {
		return nil, false
	}
	h.Width = len(h.Names)
	h.Cells = slices.Repeat([]int{-1}, h.Width)
	return h, true
}

// numbers reports whether one of the columns has one.
func (h *Head) numbers() bool {
	return slices.ContainsFunc(h.Rows, func(r text.Row) bool {
		return slices.ContainsFunc(h.Loose(r), func(c fold.Cell) bool { return c.State == fold.Written })
	})
}

// Loose reads all columns of a row, as far as they are numbers; words count as gaps.
func (h *Head) Loose(r text.Row) []fold.Cell {
	all := Table{Width: len(h.Names), Cells: make([]int, len(h.Names)), root: h.root}
	for i := range all.Cells {
		all.Cells[i] = i
	}
	cells := make([]fold.Cell, len(h.Names))
	if f := all.Row(r.Text, cells); f.Kind == text.Garbled || f.Kind == text.TooLong {
		return nil
	}
	return cells
}

// Number is a number of a row as it stands in the file.
func (h *Head) Number(path string, r text.Row, column int) rules.Number {
	l := learner{walk: walk{text: r.Text}, path: path, line: int(r.Line), want: column, head: h}
	l.space()
	l.learn(h.root, "")
	return l.found
}

// learner walks a row and grows the tree, or looks for the number of a column.
type learner struct {
	walk
	head  *Head
	path  string
	line  int
	want  int
	found rules.Number
}

// learn passes over a value and gives it a column if it is one of its own.
func (l *learner) learn(n *node, name string) bool { return l.leaf(n, name, l.at, l.at, 0) }

// leaf learns a value whose name stands at from..to, with all that is in it.
func (l *learner) leaf(n *node, name string, from, to, depth int) bool {
	switch {
	case depth > maxDepth:
		return false
	case l.peek() == '{':
		return l.members(n, name, depth)
	case l.peek() == '[':
		return l.list(n, name, depth)
	}
	start := l.at
	if !l.value(nil, depth) {
		return false
	}
	end := len(bytes.TrimRight(l.text[:l.at], " \t\r"))
	if from == to { // an item has no name: it stands for itself
		from, to = start, end
	}
	if n.column < 0 && len(l.head.Names) < maxColumns && !l.frozen() {
		n.column = len(l.head.Names)
		l.head.Names = append(l.head.Names, text.Field{Text: name, Place: l.place(from, to)})
	}
	if l.frozen() && n.column == l.want && l.found.Text == "" {
		l.number(start, end)
	}
	return true
}

// frozen reports whether the tree is complete and a number is looked for.
func (l *learner) frozen() bool { return l.head.Width > 0 }

func (l *learner) number(start, end int) {
	raw := l.text[start:end]
	clean := text.Unquote(raw)
	start += bytes.Index(raw, clean)
	var c fold.Cell
	text.Read(clean, '.', &c)
	l.found = rules.Number{Text: string(clean), Value: c.Value(), Place: l.place(start, start+len(clean))}
}

func (l *learner) members(n *node, name string, depth int) bool {
	l.take('{')
	if l.take('}') {
		return true
	}
	for {
		from := l.at + 1
		if l.peek() != '"' || !l.quoted() {
			return false
		}
		to := l.at - 1
		key := string(l.text[from:to])
		member := n.members[key]
		if member == nil {
			member = &node{column: -1}
			if !l.frozen() {
				n.grow(key, member)
			}
		}
		path := key
		if name != "" {
			path = name + "." + key
		}
		l.space()
		if !l.take(':') || !l.leaf(member, path, from, to, depth+1) {
			return false
		}
		if !l.take(',') {
			return l.take('}')
		}
	}
}

func (n *node) grow(key string, member *node) {
	if n.members == nil {
		n.members = map[string]*node{}
	}
	n.members[key] = member
}

func (l *learner) list(n *node, name string, depth int) bool {
	l.take('[')
	if l.take(']') {
		return true
	}
	for i := 0; ; i++ {
		if i >= maxItems {
			if !l.value(nil, depth+1) {
				return false
			}
		} else {
			if i == len(n.items) && !l.frozen() {
				n.items = append(n.items, &node{column: -1})
			}
			item := &node{column: -1}
			if i < len(n.items) {
				item = n.items[i]
			}
			if !l.leaf(item, fmt.Sprintf("%s[%d]", name, i), 0, 0, depth+1) {
				return false
			}
		}
		if !l.take(',') {
			return l.take(']')
		}
	}
}

func (l *learner) place(from, to int) rules.Place {
	column := func(at int) int { return utf8.RuneCount(l.text[:at]) + 1 }
	return rules.Place{Path: l.path, Line: l.line, Column: column(from), EndLine: l.line, EndColumn: column(to)}
}
