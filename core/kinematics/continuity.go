package kinematics

import (
	"math"

	"dextral/core/rotor"
)

// MaxJumps is the number of sign jumps of which a [Continuity] keeps the
// particulars; all are counted.
const MaxJumps = 16

// Place is where in a series something was seen.
type Place struct {
	Row int64
	T   float64
}

// Tally counts rows of one kind and remembers the first.
type Tally struct {
	Count int64
	First Place // valid if Count > 0
}

// Extreme is a least or greatest value and the first row that has it.
type Extreme struct {
	Value float64
	Place
}

// Jump is a step between neighbours in which the rotor changes its sign though the rotation does
// not ask for it.
type Jump struct {
	Place            // of the later of the two rows
	Moved    float64 // angle of the rotation between the two, rad, 0..pi/2
	Apparent float64 // angle between the two as 4-vectors, rad, pi - Moved/2
}

// Move is the rotation between two neighbours.
type Move struct {
	Place         // of the later of the two rows
	Angle float64 // rad, 0..pi

	square float64 // of the distance of the nearer signs as unit 4-vectors
}

// Continuity is a fold over a series of rotors of any norm, in constant memory and without
// allocation. The zero value is the fold over nothing. Fields are results; only
// [Continuity.Push] and [Continuity.Merge] write them.
//
// A sign jump is a step in which the scalar product of the two unit rotors is
// negative, so that the shorter way to the new rotation is by way of -R, and the rotation itself
// moves by at most 90 degrees. Beyond 90 degrees nobody can tell a changed
// sign from a turn the long way round: such steps are tallied as Wide.
//
// Rows that are zero or not finite are tallied and otherwise passed over: the
// neighbours of such a gap are neighbours.
//
// The state holds counts, firsts, least and greatest values, and no sums, so a
// fold over parts, merged in order, is equal to the byte to the fold over the
// whole, whatever the split.
type Continuity struct {
	Rows      int64
	NonFinite Tally
	Zero      Tally

	MinNorm, MaxNorm Extreme // over rows that are neither

	Jumps     [MaxJumps]Jump // the first of them
	JumpCount int64
	// JumpScalar is the greatest scalar part, as a part of the norm and without
	// sign, on either side of a jump.
	JumpScalar     float64
	Wide           Tally
	NegativeScalar Tally
	Largest        Move // between neighbours, sign ignored

	first, last sample
	rotors      int64
}

// sample is a usable row.
type sample struct {
	place Place
	r     rotor.Rotor // unit
}

// Push adds the next row. The rotor may have any norm; the numbers of a
// quaternion in any convention do as well, as long as the scalar stands in S.
func (c *Continuity) Push(row int64, t float64, r rotor.Rotor) {
	here := Place{row, t}
	c.Rows++
	u, ok := r.Unit()
	switch {
	case ok:
		c.push(sample{here, u}, r.Norm())
	case r.Finite():
		c.Zero.add(Tally{1, here})
	default:
		c.NonFinite.add(Tally{1, here})
	}
}

func (c *Continuity) push(s sample, norm float64) {
	if s.r.S < 0 {
		c.NegativeScalar.add(Tally{1, s.place})
	}
	if c.rotors == 0 {
		c.first = s
		c.MinNorm, c.MaxNorm = Extreme{norm, s.place}, Extreme{norm, s.place}
	} else {
		c.norms(Extreme{norm, s.place}, Extreme{norm, s.place})
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
	if next.rotors == 0 {
		return
	}
	if c.rotors == 0 {
		next.Rows, next.NonFinite, next.Zero = c.Rows, c.NonFinite, c.Zero
		*c = next
		return
	}
	c.norms(next.MinNorm, next.MaxNorm)
	c.NegativeScalar.add(next.NegativeScalar)
	c.step(c.last, next.first)
	if c.JumpCount < MaxJumps {
		copy(c.Jumps[c.JumpCount:], next.Jumps[:min(next.JumpCount, MaxJumps)])
	}
	c.JumpCount += next.JumpCount
	c.JumpScalar = max(c.JumpScalar, next.JumpScalar)
	c.Wide.add(next.Wide)
	c.larger(next.Largest)
	c.last = next.last
	c.rotors += next.rotors
}

// WorstNorm returns the norm farthest from one. It reports false when there
// was no usable row.
func (c *Continuity) WorstNorm() (Extreme, bool) {
	low, high := 1-c.MinNorm.Value, c.MaxNorm.Value-1
	if low > high || low == high && c.MinNorm.Row <= c.MaxNorm.Row {
		return c.MinNorm, c.rotors > 0
	}
	return c.MaxNorm, c.rotors > 0
}

// ForcedScalar reports whether the sign jumps look like the work of a recorder
// that keeps the scalar part from being negative: there are jumps, and no
// scalar part is negative. The scalar is then near zero at every jump
// (JumpScalar says how near): on the continuous path it changes sign there, and it cannot
// change by more than the rotor does.
func (c *Continuity) ForcedScalar() bool {
	return c.JumpCount > 0 && c.NegativeScalar.Count == 0
}

// step accounts for the step between neighbours.
func (c *Continuity) step(a, b sample) {
	near := b.r
	dot := a.r.Dot(b.r)
	if dot < 0 {
		near = near.Neg()
	}
	d := near.Sub(a.r)
	s := Move{Place: b.place, square: d.Dot(d)}
	if s.square > c.Largest.square || dot < 0 {
		s.Angle = rotor.Angle(a.r, b.r)
		c.larger(s)
	}
	switch {
	case dot >= 0:
	case s.Angle <= math.Pi/2:
		if c.JumpCount < MaxJumps {
			c.Jumps[c.JumpCount] = Jump{b.place, s.Angle, math.Pi - s.Angle/2}
		}
		c.JumpCount++
		c.JumpScalar = max(c.JumpScalar, math.Abs(a.r.S), math.Abs(b.r.S))
	default:
		c.Wide.add(Tally{1, b.place})
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

func (c *Continuity) larger(s Move) {
	if s.square > c.Largest.square {
		c.Largest = s
	}
}

func (t *Tally) add(next Tally) {
	if t.Count == 0 {
		t.First = next.First
	}
	t.Count += next.Count
}
