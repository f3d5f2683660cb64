package kinematics

import (
	"math"

	"dextral/core/rotor"
)

// MaxJumps is the number of sign jumps whose particulars a [Continuity] keeps.
const MaxJumps = 16

// Continuity is a fold over a series of rotors of any norm, in constant memory
// and without allocation. The zero value is the fold over nothing. The fields
// are results, written by [Continuity.Push] and [Continuity.Merge] only.
//
// A sign jump is a step in which the scalar product of two neighbours is
// negative, so that the shorter way from R is to minus the next rotor, though
// the rotation itself moves by at most 90 degrees. When it moves by more, a
// changed sign and a turn the long way round look alike; such steps are Wide
// and no jumps.
//
// Rows that are zero or not finite are tallied and otherwise passed over: the
// rows on either side of them count as neighbours.
//
// The state consists of counts, of first rows, and of least and greatest values
// with the first row that has them. There are no sums to depend on an order, so
// the fold over parts, merged in order, equals the fold over the whole to the
// byte, however the series was split.
type Continuity struct {
	Rows      int64 // all of them
	NonFinite Tally
	Zero      Tally

	// Of the rows that are neither zero nor without end:

	MinNorm, MaxNorm Extreme
	NegativeScalar   Tally

	JumpCount  int64
	Jumps      [MaxJumps]Jump // the first of them
	JumpScalar float64        // greatest |S|, for norm one, on either side of a jump
	Wide       Tally          // steps of more than 90 degrees with a change of sign
	Largest    Move           // the widest step, signs ignored; zero if nothing moves

	leaps       leaps
	rotors      int64 // rows that are neither
	first, last sample
}

// Place is where in a series something was seen.
type Place struct {
	Row int64
	T   float64
}

// Tally counts rows of one kind and remembers the first.
type Tally struct {
	Count int64
	First Place // if Count > 0
}

// Extreme is a least or greatest value and the first row that has it.
type Extreme struct {
	Value float64
	Place
}

// Jump is a step in which the rotor changes sign and the rotation does not ask
// for it.
type Jump struct {
	Place            // of the later row
	Moved    float64 // angle of the rotation between the two, 0..pi/2
	Apparent float64 // angle between the two as 4-vectors, pi - Moved/2
}

// Move is the rotation between two neighbours.
type Move struct {
	Place         // of the later row
	Angle float64 // 0..pi

	square float64 // of the distance between the nearer of the unit 4-vectors
}

// sample is a row that is neither zero nor without end.
type sample struct {
	place Place
	r     rotor.Rotor // of norm one
}

// Push adds the next row. The rotor may have any norm. Four numbers of any
// quaternion convention do, as long as the scalar, where it matters, stands in
// S: neither norms nor scalar products know conventions.
func (c *Continuity) Push(row int64, t float64, r rotor.Rotor) {
	here := Place{row, t}
	c.Rows++
	unit, ok := r.Unit()
	switch {
	case ok:
		c.push(sample{here, unit}, Extreme{r.Norm(), here})
	case r.Finite():
		c.Zero.add(Tally{1, here})
	default:
		c.NonFinite.add(Tally{1, here})
	}
}

func (c *Continuity) push(s sample, norm Extreme) {
	if s.r.S < 0 {
		c.NegativeScalar.add(Tally{1, s.place})
	}
	if c.rotors == 0 {
		c.first, c.MinNorm, c.MaxNorm = s, norm, norm
	} else {
		c.norms(norm, norm)
		c.step(c.last, s)
	}
	c.last = s
	c.rotors++
}

// Merge adds the fold over the rows that follow those of c.
func (c *Continuity) Merge(next Continuity) {
	c.Rows += next.Rows
	c.NonFinite.add(next.NonFinite)
	c.Zero.add(next.Zero)
	switch {
	case next.rotors == 0:
	case c.rotors == 0:
		next.Rows, next.NonFinite, next.Zero = c.Rows, c.NonFinite, c.Zero
		*c = next
	default:
		c.step(c.last, next.first) // the seam comes before what follows it
		c.follow(next)
	}
}

// follow adds what was found behind the seam.
func (c *Continuity) follow(next Continuity) {
	c.norms(next.MinNorm, next.MaxNorm)
	c.NegativeScalar.add(next.NegativeScalar)
	if c.JumpCount < MaxJumps {
		copy(c.Jumps[c.JumpCount:], next.Jumps[:min(next.JumpCount, MaxJumps)])
	}
	c.JumpCount += next.JumpCount
	c.JumpScalar = max(c.JumpScalar, next.JumpScalar)
	c.Wide.add(next.Wide)
	c.move(next.Largest)
	c.leaps.merge(&next.leaps)
	c.last = next.last
	c.rotors += next.rotors
}

// step accounts for the step between neighbours.
func (c *Continuity) step(a, b sample) {
	dot := a.r.Dot(b.r)
	d := b.r.Sub(a.r)
	if dot < 0 {
		d = b.r.Add(a.r)
	}
	m := Move{Place: b.place, square: d.Dot(d)}
	c.leaps.step(&a, &b, m.square)
	if dot < 0 || m.square > c.Largest.square { // else the angle is of no interest
		m.Angle = rotor.Angle(a.r, b.r)
		c.move(m)
	}
	switch {
	case !(dot < 0):
	case m.Angle <= math.Pi/2:
		if c.JumpCount < MaxJumps {
			c.Jumps[c.JumpCount] = Jump{b.place, m.Angle, math.Pi - m.Angle/2}
		}
		c.JumpCount++
		c.JumpScalar = max(c.JumpScalar, math.Abs(a.r.S), math.Abs(b.r.S))
	default:
		c.Wide.add(Tally{1, b.place})
	}
}

func (c *Continuity) move(m Move) {
	if m.square > c.Largest.square {
		c.Largest = m
	}
}

func (c *Continuity) norms(low, high Extreme) {
	if low.Value < c.MinNorm.Value {
		c.MinNorm = low
	}
	if high.Value > c.MaxNorm.Value {
		c.MaxNorm = high
	}
}

func (t *Tally) add(next Tally) {
	if t.Count == 0 {
		t.First = next.First
	}
	t.Count += next.Count
}

// WorstNorm returns the norm farthest from one, the earlier row of equals. It
// reports false when every row is zero or not finite.
func (c *Continuity) WorstNorm() (Extreme, bool) {
	low, high := 1-c.MinNorm.Value, c.MaxNorm.Value-1
	if low > high || low == high && c.MinNorm.Row <= c.MaxNorm.Row {
		return c.MinNorm, c.rotors > 0
	}
	return c.MaxNorm, c.rotors > 0
}

// ForcedScalar reports whether the sign jumps look like the work of a recorder
// that keeps the scalar part from being negative: there are jumps, and no
// scalar part is negative. At each jump the scalar part is then near zero, as
// JumpScalar shows: on the continuous path it changes sign there, so it is no
// greater on either side than the step is long, 2 sin(Moved/4).
func (c *Continuity) ForcedScalar() bool {
	return c.JumpCount > 0 && c.NegativeScalar.Count == 0
}
