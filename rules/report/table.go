package report

import (
	"fmt"
	"strings"

	"dextral/rules"
)

// cell is one entry of a column: words on one line or more, or a number taken
// apart at its point.
type cell struct {
	words       []string
	whole, rest string // rest begins with the point, the exponent or the unit
	number      bool
}

// maxWords and maxWhat bound the columns of words; longer ones are folded. Where
// the table is too wide, columns are folded down to minWords.
const (
	maxWords = 40
	minWords = 24
	maxWhat  = 52
)

func cellOf(q rules.Quantity, words int, text func(rules.Quantity) string) cell {
	switch {
	case !q.Known:
		return cell{}
	case q.Text != "":
		return cell{words: wrap(clean(q.Text), words, true)}
	}
	s := text(q)
	c := cell{whole: s, number: true}
	if i := strings.IndexAny(s, ".e"); i >= 0 && !notFinite(q.Value) {
		c.whole, c.rest = s[:i], s[i:]
	}
	if q.Unit != "" {
		c.rest += " " + clean(q.Unit)
	}
	return c
}

// column is a column of evidence with the widths that align it.
type column struct {
	head                     string
	cells                    []cell
	words, whole, rest, wide int
}

func newColumn(head string, cells []cell) column {
	c := column{head: head, cells: cells}
	for _, e := range cells {
		for _, l := range e.words {
			c.words = max(c.words, width(l))
		}
		c.whole, c.rest = max(c.whole, width(e.whole)), max(c.rest, width(e.rest))
	}
	c.wide = max(c.words, c.whole+c.rest, width(head))
	return c
}

// empty reports whether there is nothing in the column.
func (c column) empty() bool { return c.words == 0 && c.whole == 0 }

// heading stands to the right over numbers and to the left over words.
func (c column) heading() string {
	if c.words > 0 {
		return pad(c.head, c.wide)
	}
	return strings.Repeat(" ", c.wide-width(c.head)) + c.head
}

// entry is a line of a cell at the width of the column: points below each other.
func (c column) entry(row, line int) string {
	e := c.cells[row]
	switch {
	case !e.number && line < len(e.words):
		return pad(e.words[line], c.wide)
	case !e.number || line > 0:
		return strings.Repeat(" ", c.wide)
	}
	s := strings.Repeat(" ", c.whole-width(e.whole)) + e.whole + pad(e.rest, c.rest)
	if c.words > 0 {
		return pad(s, c.wide)
	}
	return strings.Repeat(" ", c.wide-width(s)) + s
}

// evidence lays out the table: a heading and the rows, with the columns that
// have content. The first column of the heading is named evidence; its words
// are folded so that the table keeps to a width, if one is given and it can.
func evidence(rows []rules.Evidence, limit int) []string {
	columns, taken := columnsOf(rows, maxWords)
	for words := maxWords - 4; limit > 0 && limit-taken < minimum+4 && words >= minWords; words -= 4 {
		columns, taken = columnsOf(rows, words)
	}
	room := maxWhat + 2
	if limit > 0 {
		room = min(room, limit-taken)
	}
	whats, what := labels(rows, room)
	heading := pad("evidence", what)
	for _, c := range columns {
		heading += "  " + c.heading()
	}
	table := []string{heading}
	for i := range rows {
		for line := range tallest(columns, i, len(whats[i])) {
			l := ""
			if line < len(whats[i]) {
				l = whats[i][line]
			}
			l = pad(l, what)
			for _, c := range columns {
				l += "  " + c.entry(i, line)
			}
			table = append(table, l)
		}
	}
	for i := range table {
		table[i] = strings.TrimRight(table[i], " ")
	}
	return table
}

// columnsOf are the columns that have content, with words folded at a width, and
// how wide they are together.
func columnsOf(rows []rules.Evidence, words int) (columns []column, taken int) {
	var stated, computed, residual []cell
	for _, r := range rows {
		stated = append(stated, cellOf(r.Stated, words, statedText))
		computed = append(computed, cellOf(r.Computed, words, func(q rules.Quantity) string { return computedText(q, r.Stated) }))
		residual = append(residual, cellOf(r.Residual, words, residualText))
	}
	for _, c := range []column{newColumn("stated", stated), newColumn("computed", computed), newColumn("residual", residual)} {
		if !c.empty() {
			columns = append(columns, c)
			taken += c.wide + 2
		}
	}
	return columns, taken
}

// labels folds the first column, indented below the heading, and returns its
// width.
func labels(rows []rules.Evidence, room int) (folded [][]string, wide int) {
	wide = width("evidence")
	for _, r := range rows {
		var lines []string
		for i, l := range wrap(clean(r.What), room-4, width(clean(r.What)) > room-2) {
			indent := "  "
			if i > 0 {
				indent = "    "
			}
			lines = append(lines, indent+l)
			wide = max(wide, width(indent+l))
		}
		folded = append(folded, lines)
	}
	return folded, wide
}

// tallest is the number of lines of a row.
func tallest(columns []column, row, lines int) int {
	for _, c := range columns {
		lines = max(lines, len(c.cells[row].words))
	}
	return lines
}

// grouped prints a count with commas: 12,400.
func grouped[T int | int64](n T) string {
	s := fmt.Sprint(n)
	for i := len(s) - 3; i > 0; i -= 3 {
		s = s[:i] + "," + s[i:]
	}
	return s
}
