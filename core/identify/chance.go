package identify

import (
	"math"
	"slices"

	"dextral/core/convention"
	"dextral/core/rotor"
)

const (
	// margin is the factor by which every other reading must miss what the
	// digits leave open before one is preferred. A tolerance too small by this
	// factor, as for numbers that were rounded three times on their way, then still
	// gives no wrong answer.
	margin = 4

	// accidents bounds the number of hypotheses that are expected to fit
	// two orientations that have nothing to do with each other. The expectation is a
	// bound itself: measured wrong decisions are some tens of times rarer.
	accidents = 3e-4
)

// widths are, in rad, the room that the three numbers of an orientation leave
// to chance: how far the orientation is from the nearest places at which readings
// coincide.
//
// Exchanging and negating components of a rotor (scalar place, reverse, maps of
// axes) are reflections of the 4-dimensional cube, whose mirrors are where a
// component is zero or two are of equal size. On a mirror two readings are one rotation;
// nearer to it than the tolerance nothing distinguishes them. An orientation that is d
// away from a mirror could have been anywhere within d of it and have the same small
// numbers, so a hypothesis fits an unrelated orientation of that kind
// within an angle eps with a chance of about eps/d, for each of the three directions.
type widths [3]float64

// rotorWidths are the distances of r to the nearest three mirrors. Turning by an
// angle t moves a unit rotor by t/2, and two components of difference g meet after g/sqrt 2.
func rotorWidths(r rotor.Rotor) widths {
	c := [4]float64{math.Abs(r.S), math.Abs(r.E23), math.Abs(r.E31), math.Abs(r.E12)}
	slices.Sort(c[:])
	d := [4]float64{2 * c[0], math.Sqrt2 * (c[1] - c[0]), math.Sqrt2 * (c[2] - c[1]), math.Sqrt2 * (c[3] - c[2])}
	slices.Sort(d[:])
	return widths(d[:3])
}

// angleWidths are the distances of three angles from where signs and orders
// coincide, up to right angles: a multiple of a right angle, and equal sizes.
func angleWidths(n [3]float64, unit convention.Unit) widths {
	var r [3]float64
	for i, a := range n {
		r[i] = math.Abs(math.Remainder(a*unit.InRadians(), math.Pi/2))
	}
	slices.Sort(r[:])
	return widths{r[0], (r[1] - r[0]) / math.Sqrt2, (r[2] - r[1]) / math.Sqrt2}
}

// chance is the probability that a hypothesis fits within eps by accident.
func (w widths) chance(eps float64) float64 {
	p := 1.0
	for _, d := range w {
		if d > eps {
			p *= eps / d
		}
	}
	return p
}

// numbers counts the independent numbers that carry evidence.
func (w widths) numbers(eps float64) int {
	n := 0
	for _, d := range w {
		if d > margin*eps {
			n++
		}
	}
	return n
}

// wholeDegrees is the room of a single turn by a whole number of degrees: such
// numbers are chosen, and one in 360 is another one.
const wholeDegrees = math.Pi / 360

// evidence is how well a hypothesis that fits is supported.
type evidence struct {
	expected float64 // accidental fits among all hypotheses that cost as much or less
	numbers  int     // independent numbers that carry it
}

// weigh measures the evidence for c after so many hypotheses were tried.
func (s *search) weigh(c candidate, tried int) evidence {
	w := rotorWidths(c.at)
	e := evidence{w.chance(c.open), w.numbers(c.open)}
	for _, side := range [2]struct {
		d   *side
		how Reading
	}{{&s.a, c.A}, {&s.b, c.B}} {
		if side.how.Form == convention.Angles {
			w := angleWidths(side.d.angles, side.how.Unit)
			e.expected = max(e.expected, w.chance(c.open))
			e.numbers = min(e.numbers, w.numbers(c.open))
		}
	}
	if turn := c.at.TurnAngle(); e.numbers <= 1 && c.changes&^set(UnitSlip) != 0 &&
		math.Abs(math.Remainder(turn, 2*wholeDegrees)) <= c.open {
		e.expected = max(e.expected, wholeDegrees/max(turn, wholeDegrees))
	}
	e.expected *= float64(tried)
	return e
}

// enough reports whether the evidence supports so many changes: accidents are
// ruled out, and there is a number for each change unless there are all three. One number
// cannot tell an exchange from a sign from a coincidence, however many digits it has.
func (e evidence) enough(cost int) bool {
	return e.expected <= accidents && (e.numbers == 3 || cost <= e.numbers)
}
