package identify

import (
	"math"

	"dextral/core/matrix"
	"dextral/core/rotor"
)

// maxWide bounds the searches for maps of axes and half angles, which join
// every pair of readings and would otherwise be most of the set.
const maxWide = 4

// wide compares mirrors, half angles and maps of axes; cost is what the
// readings may cost together with these.
func (s *search) wide(cost int, t trial) {
	if s.a.mirrored != s.b.mirrored {
		s.pairs(cost, func(a, b *reading) { s.flips(a, b, t) })
	}
	if t.cost > maxWide {
		return
	}
	if s.a.powers || s.b.powers {
		doubled := t
		doubled.changes |= set(HalfAngle)
		s.pairs(cost-HalfAngle.Cost(), func(a, b *reading) { s.halfAngle(a, b, doubled) })
	}
	t.changes |= set(Remap)
	s.pairs(cost-Remap.Cost(), func(a, b *reading) { s.remap(a, b, t) })
	s.pairs(cost-2*Remap.Cost(), func(a, b *reading) { s.remapBoth(a, b, t) })
}

// halfAngle compares twice the turn of either with the other. Of Gibbs vectors
// and modified Rodrigues parameters one is twice the other already.
func (s *search) halfAngle(a, b *reading, t trial) {
	if a.parameters != AxisTimesAngle || b.parameters != AxisTimesAngle {
		return
	}
	s.tried += 2
	target := t.target(b)
	if twice := a.rotor.Mul(a.rotor); s.news(twice.Dot(target), 2*a.tol+b.tol) {
		t.power = 1
		s.keep(a, b, &twice, target, t, a.tol)
	}
	if target = target.Mul(target); s.news(a.rotor.Dot(target), a.tol+2*b.tol) {
		t.power = 2
		s.keep(a, b, &a.rotor, target, t, b.tol)
	}
}

// flips compares a rotation with a mirrored one whose negative is b or a: with
// the half turn about an axis it has that axis negated before or after.
func (s *search) flips(a, b *reading, t trial) {
	for c := Cube(1); c <= 3; c++ {
		s.tried += 2
		s.mapped(a, b, t, c, 0)
		s.mapped(a, b, t, 0, c)
	}
}

// mapped compares a with left b right, if that is news.
func (s *search) mapped(a, b *reading, t trial, left, right Cube) {
	t.left, t.right = left, right
	target := cubes[left].Mul(t.target(b)).Mul(cubes[right])
	if s.news(a.rotor.Dot(target), a.tol+b.tol) {
		s.keep(a, b, &a.rotor, target, t, 0)
	}
}

// remap looks for the map of axes that carries b to a: on the side of the
// result, on that of the argument, or the same on both. The first two are
// solved: what is left between the rotations must be a cube.
func (s *search) remap(a, b *reading, t trial) {
	s.tried += 3 * 23
	if !s.mappable(a, b) {
		return
	}
	target := t.target(b)
	back := target.Reverse()
	if left := a.rotor.Mul(back); s.worth(cubeDot(left), a, b) {
		s.mapped(a, b, t, nearestCube(left), 0)
	}
	if right := back.Mul(a.rotor); s.worth(cubeDot(right), a, b) {
		s.mapped(a, b, t, 0, nearestCube(right))
	}
	for c := Cube(1); c < 24; c++ {
		moved := cubes[c].Mul(target).Mul(cubes[inverses[c]])
		if s.worth(moved.Dot(a.rotor), a, b) {
			s.mapped(a, b, t, c, inverses[c])
		}
	}
}

// remapBoth looks for two maps of axes that have nothing to do with each other.
func (s *search) remapBoth(a, b *reading, t trial) {
	s.tried += 23 * 22
	if !s.mappable(a, b) {
		return
	}
	target := t.target(b)
	for c := Cube(1); c < 24; c++ {
		rest := cubes[c].Mul(target).Reverse().Mul(a.rotor)
		if s.worth(cubeDot(rest), a, b) {
			s.mapped(a, b, t, c, nearestCube(rest))
		}
	}
}

// worth reports whether a hypothesis with the given cosine of half its
// residual may fit or nearly fit.
func (s *search) worth(cos float64, a, b *reading) bool {
	return within(cos, margin*(a.tol+b.tol+arithmetic))
}

// spread is the sum of the fourth powers of the elements of the matrix of a
// rotor. Maps of axes before and after exchange and negate rows and columns, and the
// reverse exchanges the two, so all of these keep it.
func spread(r rotor.Rotor) float64 {
	sum := 0.0
	for _, row := range matrix.FromRotor(r) {
		for _, x := range row {
			sum += x * x * x * x
		}
	}
	return sum
}

// spreading bounds how fast spread changes, per rad: its gradient is four times
// the cubes of the elements, at most 4 sqrt 3 long since none exceeds one, and a
// turn by t changes the matrix by sqrt 2 t.
const spreading = 4 * 1.7320508075688772 * math.Sqrt2

// mappable reports whether any maps of axes could carry one rotation to the other.
func (s *search) mappable(a, b *reading) bool {
	return math.Abs(a.spread-b.spread) <= spreading*margin*(a.tol+b.tol+arithmetic)+1e-12
}
