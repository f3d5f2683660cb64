package report

import (
	"fmt"
	"strings"

	"dextral/rules"
)

// cell is one entry of a column: words, or a number taken apart at its point.
type cell struct {
	words       string
	whole, rest string // rest begins with the point, the exponent or the unit
	number      bool
}

func cellOf(q rules.Quantity, text func(rules.Quantity) string) cell {
	switch {
	case !q.Known:
		return cell{}
	case q.Text != "":
		return cell{words: clean(q.Text)}
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
		c.words = max(c.words, width(e.words))
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

// entry is a cell at the width of the column: points below each other.
func (c column) entry(e cell) string {
	if !e.number {
		return pad(e.words, c.wide)
	}
	s := strings.Repeat(" ", c.whole-width(e.whole)) + e.whole + pad(e.rest, c.rest)
	if c.words > 0 {
		return pad(s, c.wide)
	}
	return strings.Repeat(" ", c.wide-width(s)) + s
}

// evidence lays out the table: a heading and one line a row, with the columns
// that have content. The first column of the heading is named evidence.
func evidence(rows []rules.Evidence) []string {
	const name = "evidence"
	what := width(name) - 2
	var stated, computed, residual []cell
	for _, r := range rows {
		what = max(what, width(clean(r.What)))
		stated = append(stated, cellOf(r.Stated, statedText))
		computed = append(computed, cellOf(r.Computed, func(q rules.Quantity) string { return computedText(q, r.Stated) }))
		residual = append(residual, cellOf(r.Residual, residualText))
	}
	heading := name + strings.Repeat(" ", what+2-width(name))
	lines := make([]string, len(rows))
	for i, r := range rows {
		lines[i] = "  " + pad(clean(r.What), what)
	}
	for _, c := range []column{newColumn("stated", stated), newColumn("computed", computed), newColumn("residual", residual)} {
		if c.empty() {
			continue
		}
		heading += "  " + c.heading()
		for i := range lines {
			lines[i] += "  " + c.entry(c.cells[i])
		}
	}
	table := append([]string{heading}, lines...)
	for i := range table {
		table[i] = strings.TrimRight(table[i], " ")
	}
	return table
}

// grouped prints a count with commas: 12,400.
func grouped[T int | int64](n T) string {
	s := fmt.Sprint(n)
	for i := len(s) - 3; i > 0; i -= 3 {
		s = s[:i] + "," + s[i:]
	}
	return s
}
