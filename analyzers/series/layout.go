package series

import (
	"cmp"
	"fmt"
	"math"
	"slices"
	"strings"

	"dextral/analyzers/series/columns"
	"dextral/analyzers/series/fold"
	"dextral/core/convention"
	"dextral/core/matrix"
	"dextral/rules"
)

// head is what any reader knows of a log before it folds the first row: the
// names that columns may have and the first rows.
type head struct {
	width   int
	headers [][]columns.Column // the likeliest first; none if nothing names the columns
	rows    [][]fold.Cell      // a few dozen, all columns; nil where a row cannot be read
	// number is a number of one of the rows as it stands in the file.
	number func(row, column int) rules.Number
}

// layout is the plan of a log: which columns are read, and what they are.
type layout struct {
	fold      fold.Layout
	cells     []int // for each column of the file its cell, or -1
	width     int   // number of cells
	channels  []columns.Channel
	names     [][]string // of the columns of each channel
	undecided []*rules.Value
	time      *columns.Time
	clock     rules.Clock // column, place, unit
	rates     columns.Rates
	rateNames []string
	timeless  bool // rates without time stamps
}

// MaxChannels bounds the channels of a log, and so the memory of its fold.
const MaxChannels = 256

// any reports whether something was found, even if it stays undecided.
func (l *layout) any() bool { return len(l.channels)+len(l.undecided) > 0 }

// plan finds the channels of a log and decides which of them are read.
func plan(h *head, opts Options) *layout {
	found, header := named(h)
	if len(h.headers) == 0 {
		found = byNumbers(h)
	}
	l := &layout{cells: slices.Repeat([]int{-1}, h.width)}
	l.fold.Time, l.fold.Fine = -1, -1
	list := found.Time == nil && h.list()
	for _, c := range slices.Concat(found.Channels, found.Undecided) {
		row := firstComplete(h.rows, c.Columns)
		for _, column := range c.Columns {
			c.Value.Numbers = append(c.Value.Numbers, h.number(max(row, 0), column))
		}
		if opts.Declare != nil {
			opts.Declare(&c.Value)
		}
		switch {
		case c.Value.Why != "":
		case len(l.channels) == MaxChannels:
			c.Value.Why = fmt.Sprintf("the log has more than %d channels", MaxChannels)
		case list:
			c.Value.Why = "the rows have names and no time stamps: a list of orientations, not a series"
		default:
			c.Value.Why = doubt(&c, h.rows, row)
		}
		if !readable(&c.Value) {
			l.undecided = append(l.undecided, &c.Value)
			continue
		}
		l.add(c, header)
	}
	if len(l.channels) > 0 {
		l.pair()
		l.setTime(timeColumn(found.Time, header, opts.Time), h, header)
		l.setRates(header)
	}
	return l
}

// list reports whether the rows are things with names, of which a column of
// words gives every row another, and not samples of one thing.
func (h *head) list() bool {
	for column := range h.width {
		seen := map[string]bool{}
		for row, cells := range h.rows {
			if cells == nil || cells[column].State != fold.Gap {
				break
			}
			seen[h.number(row, column).Text] = true
		}
		if !seen[""] && len(seen) == len(h.rows) && len(seen) > 1 {
			return true
		}
	}
	return false
}

// named tries the possible headers and takes the first of those that name
// channels best: lines by themselves, with units from a line of units if there is
// one, then two lines joined, group above component.
func named(h *head) (columns.Found, []columns.Column) {
	var best columns.Found
	var bestHeader []columns.Column
	bestRank := 0
	for _, header := range possible(h.headers) {
		f := columns.Find(header)
		rank := min(1, len(f.Undecided)) // then doubtful channels, then others
		for _, c := range f.Channels {
			rank = max(rank, 2)
			if !c.Doubtful {
				rank = 3
			}
		}
		if rank > bestRank {
			best, bestHeader, bestRank = f, header, rank
		}
	}
	return best, bestHeader
}

// possible lists what may be the names of the columns.
func possible(headers [][]columns.Column) [][]columns.Column {
	var all [][]columns.Column
	for i, header := range headers {
		for j, other := range headers {
			if i != j && unitRow(other) {
				header = withUnits(header, other)
				break
			}
		}
		all = append(all, header)
	}
	for i := 0; i+1 < len(headers); i++ {
		all = append(all, joined(headers[i+1], headers[i]))
	}
	return all
}

// unitRow reports whether a line above the data gives units: at least half of its fields do.
func unitRow(header []columns.Column) bool {
	n := 0
	for _, c := range header {
		if columns.IsUnit(c.Text) {
			n++
		}
	}
	return 2*n >= len(header)
}

func withUnits(header, units []columns.Column) []columns.Column {
	out := slices.Clone(header)
	for i := range out {
		out[i].Unit = strings.Trim(units[i].Text, "[]() ")
	}
	return out
}

// joined names columns by a line of groups and one of components. A group holds
// until the next one begins.
func joined(groups, components []columns.Column) []columns.Column {
	out := slices.Clone(components)
	group := ""
	for i := range out {
		group = cmp.Or(groups[i].Text, group)
		if group != "" {
			out[i].Text = group + "." + out[i].Text
		}
	}
	return out
}

// firstComplete is the first row in which all columns have a number, or -1.
func firstComplete(rows [][]fold.Cell, which []int) int {
	return slices.IndexFunc(rows, func(row []fold.Cell) bool {
		return row != nil && !slices.ContainsFunc(which, func(c int) bool { return math.IsNaN(row[c].Value()) })
	})
}

// readable reports whether a channel is of a kind that is folded.
func readable(v *rules.Value) bool {
	if !v.Decided() {
		return false
	}
	switch v.Form {
	case convention.Quaternion:
		return len(v.Numbers) == 4
	case convention.Angles, convention.RotationVector:
		return len(v.Numbers) == 3
	case convention.Rotation, convention.Transform:
		return len(v.Numbers) == v.Rows*v.Cols && v.Rows >= 3 && v.Cols >= 3
	}
	return false
}

// doubt looks whether the numbers of a channel that is named by custom alone are
// at all like what custom says. Most rows, not all: a log may begin before its
// filter has converged.
func doubt(c *columns.Channel, rows [][]fold.Cell, first int) string {
	claim, _ := c.Value.FormClaim()
	if !c.Doubtful || claim.Source >= rules.Declaration {
		return ""
	}
	if first < 0 {
		return "named by custom alone, and the first rows have no numbers that could tell"
	}
	good, all := 0, 0
	least, greatest := math.Inf(1), 0.0
	for _, row := range rows {
		if row == nil || slices.ContainsFunc(c.Columns, func(i int) bool { return math.IsNaN(row[i].Value()) }) {
			continue
		}
		all++
		miss, size := 0.0, 0.0
		if c.Value.Form == convention.Quaternion {
			for _, i := range c.Columns {
				size = math.Hypot(size, row[i].Value())
			}
			miss = math.Abs(size - 1)
		} else {
			m := rotationOf(&c.Value, c.Columns, row)
			size = math.Abs(m.Det())
			miss = matrix.Defect(m)
		}
		least, greatest = math.Min(least, size), math.Max(greatest, size)
		if miss < 0.1 {
			good++
		}
	}
	switch {
	case 4*good >= 3*all:
		return ""
	case c.Value.Form == convention.Quaternion:
		return fmt.Sprintf("named like a quaternion, but the norm of the first rows is %.4g to %.4g", least, greatest)
	}
	return fmt.Sprintf("named like a rotation, but the columns of the first rows are not orthonormal (determinant %.4g to %.4g in size)", least, greatest)
}

func rotationOf(v *rules.Value, which []int, row []fold.Cell) matrix.Mat3 {
	var m matrix.Mat3
	for k, i := range rotationPart(v) {
		m[k/3][k%3] = row[which[i]].Value()
	}
	return m
}

// rotationPart lists which of a channel's numbers make the rotation, in the
// order that package fold wants.
func rotationPart(v *rules.Value) []int {
	switch v.Form {
	case convention.Quaternion:
		if v.Claims.Scalar() == convention.ScalarLast {
			return []int{3, 0, 1, 2}
		}
		return []int{0, 1, 2, 3}
	case convention.Rotation, convention.Transform:
		var part []int
		for i := range 3 {
			for j := range 3 {
				if v.Claims.Storage() == convention.ColumnMajor {
					part = append(part, j*v.Rows+i)
				} else {
					part = append(part, i*v.Cols+j)
				}
			}
		}
		return part
	}
	return []int{0, 1, 2}
}

// cell is the cell that a column is read into.
func (l *layout) cell(column int) int {
	if l.cells[column] < 0 {
		l.cells[column] = l.width
		l.width++
	}
	return l.cells[column]
}

func (l *layout) add(c columns.Channel, header []columns.Column) {
	f := fold.Channel{Form: c.Value.Form}
	var names []string
	for _, column := range c.Columns {
		f.Cells = append(f.Cells, l.cell(column))
		if header != nil {
			names = append(names, header[column].Text)
		} else {
			names = append(names, fmt.Sprintf("column %d", column+1))
		}
	}
	for _, i := range rotationPart(&c.Value) {
		f.Rotation = append(f.Rotation, f.Cells[i])
	}
	l.fold.Channels = append(l.fold.Channels, f)
	l.channels = append(l.channels, c)
	l.names = append(l.names, names)
}

// pair finds channels that state the same orientation in different forms: those
// with equal stems, where the stem has one channel of each form.
func (l *layout) pair() {
	type kind struct {
		stem string
		form convention.Form
	}
	kindOf := func(i int) kind { return kind{l.channels[i].Stem, l.channels[i].Value.Form} }
	count := map[kind]int{}
	for i := range l.channels {
		count[kindOf(i)]++
	}
	for i := range l.channels {
		for j := i + 1; j < len(l.channels); j++ {
			a, b := kindOf(i), kindOf(j)
			if a.stem == b.stem && a.form != b.form && count[a] == 1 && count[b] == 1 {
				l.fold.Pairs = append(l.fold.Pairs, [2]int{i, j})
			}
		}
	}
}
