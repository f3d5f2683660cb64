package series

import (
	"math"
	"strconv"

	"dextral/analyzers/series/columns"
	"dextral/analyzers/series/fold"
	"dextral/rules"
)

// collector folds the rows of one table of a binary log as they come. The first
// rows are held until they suffice to plan.
//
// Binary logs have no lines: the places of their values and rows are the file and
// the number of the row within its table, from 1.
type collector struct {
	path    string
	format  string
	columns []columns.Column
	single  []bool // columns of float32
	opts    Options

	held [][]fold.Cell
	plan *layout
	part part
	row  int64
	line []fold.Cell
}

// holdRows is how many rows a plan looks at.
const holdRows = 32

// newCollector makes one for the columns that the orientations among them need,
// with the index of each; nil if there is none.
func newCollector(path, format string, all []columns.Column, single []bool, opts Options) (*collector, []int) {
	found := columns.Find(all)
	wanted := make([]bool, len(all))
	n := 0
	for _, c := range append(found.Channels, found.Undecided...) {
		for _, i := range c.Columns {
			wanted[i] = true
			n++
		}
	}
	if n == 0 {
		return nil, nil
	}
	if found.Time != nil {
		wanted[found.Time.Column] = true
		if found.Time.Fine >= 0 {
			wanted[found.Time.Fine] = true
		}
	}
	c := &collector{path: path, format: format, opts: opts}
	var which []int
	for i, w := range wanted {
		if w {
			which = append(which, i)
			c.columns, c.single = append(c.columns, all[i]), append(c.single, single[i])
		}
	}
	return c, which
}

// push adds the next row, of all columns.
func (c *collector) push(cells []fold.Cell) {
	if c.plan == nil {
		c.held = append(c.held, append([]fold.Cell(nil), cells...))
		if len(c.held) == holdRows {
			c.decide()
		}
		return
	}
	c.add(cells)
}

// decide plans the table and folds what was held.
func (c *collector) decide() {
	h := &head{width: len(c.columns), headers: [][]columns.Column{c.columns}, rows: c.held, number: c.number}
	c.plan = plan(h, c.opts)
	c.part.fold = fold.New(&c.plan.fold)
	c.line = make([]fold.Cell, c.plan.width)
	for _, row := range c.held {
		c.add(row)
	}
	c.held = nil
}

func (c *collector) add(cells []fold.Cell) {
	c.row++
	if len(c.plan.channels) == 0 {
		return
	}
	for column, cell := range c.plan.cells {
		if cell >= 0 {
			c.line[cell] = cells[column]
		}
	}
	c.part.fold.Row(c.row, c.line)
}

func (c *collector) number(row, column int) rules.Number {
	n := rules.Number{Value: math.NaN(), Place: c.place(int64(row + 1))}
	if row >= len(c.held) {
		return n
	}
	cell := &c.held[row][column]
	n.Value = cell.Value()
	switch {
	case cell.State == fold.Written && cell.Exact && cell.Exponent == 0:
		n.Text = strconv.FormatUint(cell.Mantissa, 10)
		if cell.Negative {
			n.Text = "-" + n.Text
		}
	case c.single[column]:
		n.Text = strconv.FormatFloat(n.Value, 'g', -1, 32)
	default:
		n.Text = strconv.FormatFloat(n.Value, 'g', -1, 64)
	}
	return n
}

func (c *collector) place(row int64) rules.Place { return rules.Place{Path: c.path, Row: row} }

// finish puts what was folded into a result that others may be in already.
func (c *collector) finish(r *Result) {
	if c.row == 0 && len(c.held) == 0 {
		return // a subscription to what never came
	}
	if c.plan == nil {
		c.decide()
	}
	one := c.plan.result(c.path, c.format, 0, &c.part)
	for _, s := range one.Channels {
		s.RowPlace = c.place
	}
	r.Channels = append(r.Channels, one.Channels...)
	r.Pairs = append(r.Pairs, one.Pairs...)
	r.Undecided = append(r.Undecided, one.Undecided...)
	r.Rows += one.Rows
	if r.Clock == nil {
		r.Clock = one.Clock
	}
}
