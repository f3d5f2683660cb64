package series

import (
	"fmt"
	"math"
	"slices"

	"dextral/analyzers/series/columns"
	"dextral/analyzers/series/fold"
	"dextral/core/convention"
	"dextral/core/matrix"
	"dextral/rules"
)

// shapes are the tables without header that custom knows, by their width: a time
// or a frame number, a position and a quaternion with the scalar last (the
// trajectory format of the TUM RGB-D benchmark); the first three rows of a
// homogeneous matrix (the pose format of the KITTI odometry benchmark). Both
// are claims by shape: nothing in such a file says so.
var shapes = []struct {
	width  int
	form   convention.Form
	first  int // column of the first number
	rows   int
	stamps bool
}{
	{8, convention.Quaternion, 4, 0, true},  // t x y z, qx qy qz qw
	{7, convention.Quaternion, 3, 0, false}, // x y z, qx qy qz qw
	{12, convention.Transform, 0, 3, false},
	{13, convention.Transform, 1, 3, true},
	{16, convention.Transform, 0, 4, false},
	{17, convention.Transform, 1, 4, true},
}

// byNumbers finds channels in a log without header. Columns that have unit norm,
// or make a rotation matrix, in the rows at its start are what a shape says if
// they stand where it has them. Four other columns of unit norm are
// undecided: they may be a quaternion either way round, or not be one. Rows with
// words among the numbers are no log without header, but something with keys.
func byNumbers(h *head) columns.Found {
	var f columns.Found
	words := 0
	for _, row := range h.rows {
		if slices.ContainsFunc(row, func(c fold.Cell) bool { return c.State == fold.Gap }) {
			words++
		}
	}
	if 10*words > len(h.rows) {
		return f
	}
	for _, s := range shapes {
		if s.width != h.width {
			continue
		}
		c := h.shaped(s.form, s.first, s.rows)
		if h.looksRight(&c) {
			if s.form == convention.Quaternion {
				c.Value.Claims = append(c.Value.Claims, rules.Claim{Says: convention.ScalarLast, Source: rules.Shape, Place: c.Value.Place})
			}
			if s.stamps {
				f.Time = &columns.Time{Column: 0, Fine: -1}
			}
			f.Channels = append(f.Channels, c)
			return f
		}
	}
	if len(h.rows) < fewest {
		return f
	}
	for first := 0; first+4 <= h.width; first++ {
		c := h.shaped(convention.Quaternion, first, 0)
		if h.looksRight(&c) {
			c.Value.Why = "four columns of unit norm without a header: nothing says that they are a quaternion, nor where its scalar is"
			f.Undecided = append(f.Undecided, c)
			first += 3
		}
	}
	return f
}

// fewest is the number of rows in which four columns must have unit norm: numbers
// of size one do so within a hundredth once in a few hundred times by chance.
const fewest = 5

// shaped is the channel of the columns from first on.
func (h *head) shaped(form convention.Form, first, rows int) columns.Channel {
	n := 4
	c := columns.Channel{}
	if form == convention.Transform {
		n = 4 * rows
		c.Value.Rows, c.Value.Cols = rows, 4
	}
	for i := range n {
		c.Columns = append(c.Columns, first+i)
	}
	at := 0
	for at < len(h.rows)-1 && h.rows[at] == nil {
		at++
	}
	c.Value.Form = form
	c.Value.Key = fmt.Sprintf("columns %d-%d", first+1, first+n)
	c.Value.Place = h.number(at, first).Place.To(h.number(at, first+n-1).Place)
	c.Value.Claims = rules.Claims{{Says: form, Source: rules.Shape, Place: c.Value.Place}}
	return c
}

// looksRight reports whether the numbers of the first rows are what the channel
// says, and are not all whole: rows of zeros with a single one are labels.
func (h *head) looksRight(c *columns.Channel) bool {
	const near = 0.01
	good, all, whole := 0, 0, true
	for _, row := range h.rows {
		if row == nil {
			continue
		}
		all++
		if c.Value.Form == convention.Quaternion {
			n := 0.0
			for _, i := range c.Columns {
				n = math.Hypot(n, row[i].Value())
			}
			if math.Abs(n-1) < near {
				good++
			}
		} else if m := rotationOf(&c.Value, c.Columns, row); matrix.Defect(m) < near && lastRow(c, row) {
			good++
		}
		whole = whole && !slices.ContainsFunc(c.Columns, func(i int) bool {
			v := row[i].Value()
			return v != math.Trunc(v)
		})
	}
	return all > 0 && !whole && 10*good >= 9*all
}

// lastRow reports whether the fourth row of a 4x4, if there is one, is 0 0 0 1.
func lastRow(c *columns.Channel, row []fold.Cell) bool {
	for i, want := range []float64{0, 0, 0, 1} {
		if at := 12 + i; at < len(c.Columns) && row[c.Columns[at]].Value() != want {
			return false
		}
	}
	return true
}
