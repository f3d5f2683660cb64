// Package fold is what one pass over a log remembers of it.
//
// A reader of whatever format hands rows of cells to a Fold; the Fold keeps
// counts, firsts and extremes, so its size does not depend on the length of the
// log, and Row allocates nothing. Folds over consecutive parts of a log merge
// to the fold over the whole, equal to the byte however the log was cut:
// nothing is summed in floating point, the row numbers are those of the whole
// log from the start, and what is sampled is chosen by row number.
package fold

import (
	"math"

	"dextral/analyzers/series/decimal"
	"dextral/core/convention"
	"dextral/core/identify"
	"dextral/core/kinematics"
	"dextral/core/rotor"
)

// Cell is one number of a row. The zero value is a gap: nothing was written.
type Cell struct {
	decimal.Number
	State State
}

// State says what stands in a cell.
type State uint8

// The states.
const (
	Gap     State = iota // nothing, or a word for nothing
	Written              // a decimal number
	Binary               // a float64 without digits: of Number, only Value is set
)

// Value is the number, NaN for a gap.
func (c *Cell) Value() float64 {
	if c.State == Gap {
		return math.NaN()
	}
	return c.Number.Value
}

// Layout says what the cells of a row are. It is fixed before the first row.
type Layout struct {
	Channels []Channel
	Time     int // cell of the time stamp; -1 for none
	Fine     int // cell of its fraction, in 1/Per; -1 for none
	Per      int64
	Start    Stamp    // from which times are counted
	Pairs    [][2]int // channels that state the same orientation
	Rates    []Rates  // quaternions with angular rates beside them
}

// Channel says which cells make an orientation.
type Channel struct {
	Form  convention.Form
	Cells []int // in the order of the numbers of the channel
	// Rotation lists the nine cells of the rotation, row by row, of a matrix; the
	// three of angles; those of a quaternion with the scalar first. If the place of
	// the scalar is not known it is as written.
	Rotation []int
}

// Rates says which cells hold the angular rates beside a quaternion.
type Rates struct {
	Channel   int
	Cells     [3]int
	PerSecond float64 // units of time in a second
}

// Fold is the summary of the rows of a log, or of consecutive ones. Make it with New.
type Fold struct {
	Rows     int64
	Channels []Summary
	Clock    Clock
	Pairs    []Sample
	Rates    []identify.SeriesFold

	layout *Layout
}

// New makes a fold over nothing.
func New(l *Layout) *Fold {
	f := &Fold{Channels: make([]Summary, len(l.Channels)), Pairs: make([]Sample, len(l.Pairs)),
		Rates: make([]identify.SeriesFold, len(l.Rates)), layout: l}
	for i, c := range l.Channels {
		f.Channels[i].Ranges = make([]Range, len(c.Cells))
	}
	return f
}

// Reset makes f a fold over nothing again.
func (f *Fold) Reset() {
	f.Rows, f.Clock = 0, Clock{}
	for i := range f.Channels {
		ranges := f.Channels[i].Ranges
		clear(ranges)
		f.Channels[i] = Summary{Ranges: ranges}
	}
	for i := range f.Pairs {
		f.Pairs[i].reset()
	}
	for i := range f.Rates {
		f.Rates[i].Reset()
	}
}

// Row adds the next row. Row numbers grow, with or without steps.
func (f *Fold) Row(row int64, cells []Cell) {
	f.Rows++
	at := kinematics.Place{Row: row, T: math.NaN()}
	if f.layout.Time >= 0 {
		s := f.layout.stamp(cells)
		if s.known {
			at.T = since(&s, &f.layout.Start)
		}
		f.Clock.push(at, &s)
	}
	for i := range f.Channels {
		f.Channels[i].push(&f.layout.Channels[i], at, cells)
	}
	for i := range f.Pairs {
		a, b := &f.layout.Channels[f.layout.Pairs[i][0]], &f.layout.Channels[f.layout.Pairs[i][1]]
		f.Pairs[i].push(row, a, b, cells)
	}
	for i := range f.Rates {
		f.layout.Rates[i].push(&f.Rates[i], f.layout, at, cells)
	}
}

// Merge adds the fold over the rows that follow those of f. Both have the same layout.
func (f *Fold) Merge(next *Fold) {
	f.Rows += next.Rows
	f.Clock.merge(&next.Clock)
	for i := range f.Channels {
		f.Channels[i].merge(&next.Channels[i])
	}
	for i := range f.Pairs {
		f.Pairs[i].merge(&next.Pairs[i])
	}
	for i := range f.Rates {
		f.Rates[i].Merge(&next.Rates[i])
	}
}

// push adds the quaternion as written and the rates of a row.
func (r *Rates) push(f *identify.SeriesFold, l *Layout, at kinematics.Place, cells []Cell) {
	s := identify.Sample{Row: at.Row, T: at.T / r.PerSecond}
	for i, c := range l.Channels[r.Channel].Cells {
		s.Q[i] = cells[c].Value()
	}
	s.W = rotor.Vec{X: cells[r.Cells[0]].Value(), Y: cells[r.Cells[1]].Value(), Z: cells[r.Cells[2]].Value()}
	f.Add(s)
}
