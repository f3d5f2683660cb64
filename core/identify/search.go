package identify

import (
	"math"
	"slices"

	"dextral/core/rotor"
)

// maxWide bounds the searches for maps of axes and half angles, which join
// every pair of readings and would otherwise be most of the set.
const maxWide = 4

// arithmetic is what two rotors in float64 may differ by for no other reason
// than rounding: each reading is the product of three turns at most, of which
// every component is off by a few units in the last place.
const arithmetic = 0x1p-49

// candidate is a hypothesis with its measure.
type candidate struct {
	Hypothesis
	key      alias
	residual float64     // rad
	open     float64     // rad: how far the digits leave the two rotations apart
	at       rotor.Rotor // the rotation that a is
}

func (c candidate) fits() bool { return c.residual <= c.open }
func (c candidate) near() bool { return c.residual <= margin*c.open }

// search walks the hypotheses about two statements in order of cost.
type search struct {
	a, b    side
	inverse int // cost of taking one as the reverse of the other: 0 or 1
	tried   int // hypotheses compared so far

	found   []candidate // those that fit or nearly fit
	nearest []candidate // the nearest of the others, one of each alias, nearest first
	forward candidate   // the nearest that costs nothing and is not reversed
}

const maxNearest = 6

// level compares all hypotheses that cost c.
func (s *search) level(c int) {
	s.pairs(c, func(a, b *reading) {
		s.compare(a, b, b.rotor, relation{}, c, 0)
	})
	if c >= s.inverse {
		s.pairs(c-s.inverse, func(a, b *reading) {
			s.compare(a, b, b.rotor.Reverse(), relation{inverse: true}, c, s.inverseSet())
		})
	}
	for _, inverse := range [2]bool{false, true} {
		rest, changes := c, changeSet(0)
		if inverse {
			rest, changes = c-s.inverse, s.inverseSet()
		}
		if s.a.mirrored != s.b.mirrored {
			s.pairs(rest, func(a, b *reading) { s.flips(a, b, inverse, c, changes) })
		}
		if c <= maxWide {
			s.wide(c, rest, inverse, changes)
		}
	}
}

func (s *search) inverseSet() changeSet {
	if s.inverse > 0 {
		return set(Inverse)
	}
	return 0
}

// wide compares half angles and maps of axes; rest is what the readings may
// cost together with these.
func (s *search) wide(c, rest int, inverse bool, changes changeSet) {
	rel := relation{inverse: inverse}
	if p := rest - HalfAngle.Cost(); p >= 0 && (s.a.powers || s.b.powers) {
		s.pairs(p, func(a, b *reading) { s.halfAngle(a, b, rel, c, changes|set(HalfAngle)) })
	}
	if p := rest - Remap.Cost(); p >= 0 {
		s.pairs(p, func(a, b *reading) { s.remap(a, b, rel, c, changes|set(Remap)) })
	}
	if p := rest - 2*Remap.Cost(); p >= 0 {
		s.pairs(p, func(a, b *reading) { s.remapBoth(a, b, rel, c, changes|set(Remap)) })
	}
}

// pairs calls each for every pair of readings that cost c together.
func (s *search) pairs(c int, each func(a, b *reading)) {
	for ca := range c + 1 {
		as, bs := s.a.at(ca), s.b.at(c-ca)
		for i := range as {
			for j := range bs {
				each(&as[i], &bs[j])
			}
		}
	}
}

// compare measures one hypothesis, a against what b is under the relation, and
// keeps it if it fits, or is among the nearest.
func (s *search) compare(a, b *reading, target rotor.Rotor, rel relation, cost int, changes changeSet) {
	s.tried++
	from, open := a.rotor, a.tol+b.tol+arithmetic
	switch rel.power {
	case 1:
		from, open = from.Mul(from), open+a.tol
	case 2:
		open += b.tol
	}
	cos := math.Abs(from.Dot(target))
	forward := cost == 0 && !rel.inverse
	last := len(s.nearest) - 1
	if !forward && !within(cos, margin*open) && last == maxNearest-1 && !within(cos, s.nearest[last].residual) {
		return
	}
	c := candidate{residual: rotor.Angle(from, target), open: open, at: a.rotor}
	c.Hypothesis = Hypothesis{
		A: s.a.reading(a.code), B: s.b.reading(b.code), relation: rel,
		changes: a.set | b.set | changes, changesA: a.set, changesB: b.set, cost: cost,
	}
	c.key = s.aliasOf(a.code, b.code, rel)
	if forward && c.residual < s.forward.residual {
		s.forward = c
	}
	if c.near() {
		s.found = append(s.found, c)
		return
	}
	s.keepNearest(c)
}

// within reports whether two rotors whose scalar product is cos may be within
// an angle of each other. It is true for some that are a little farther apart, since
// 1 - x^2/8 lies below cos(x/2), and false for none that are nearer.
func within(cos, angle float64) bool { return cos >= 1-angle*angle/8-0x1p-50 }

// keepNearest holds the list sorted, with one candidate of each alias. Nothing
// near the distance of another one is news: hypotheses that happen to be one
// rotation are listed once.
func (s *search) keepNearest(c candidate) {
	for i := range s.nearest {
		if s.nearest[i].key == c.key {
			if c.residual >= s.nearest[i].residual {
				return
			}
			s.nearest = slices.Delete(s.nearest, i, i+1)
			break
		}
	}
	at := len(s.nearest)
	for at > 0 && s.nearest[at-1].residual > c.residual {
		at--
	}
	if at == maxNearest {
		return
	}
	if len(s.nearest) == maxNearest {
		s.nearest = s.nearest[:maxNearest-1]
	}
	s.nearest = slices.Insert(s.nearest, at, c)
}

// halfAngle compares twice the turn of either with the other. Of Gibbs vectors
// and modified Rodrigues parameters one is twice the other already.
func (s *search) halfAngle(a, b *reading, rel relation, cost int, changes changeSet) {
	if a.parameters != AxisTimesAngle || b.parameters != AxisTimesAngle {
		return
	}
	target := b.rotor
	if rel.inverse {
		target = target.Reverse()
	}
	rel.power = 1
	s.compare(a, b, target, rel, cost, changes)
	rel.power = 2
	s.compare(a, b, target.Mul(target), rel, cost, changes)
}

// flips compares a rotation with a mirrored one whose negative is b or a: with
// the half turn about an axis it has that axis negated before or after.
func (s *search) flips(a, b *reading, inverse bool, cost int, changes changeSet) {
	for c := cube(1); c <= 3; c++ {
		s.mapped(a, b, relation{inverse: inverse, left: c}, cost, changes)
		s.mapped(a, b, relation{inverse: inverse, right: c}, cost, changes)
	}
}

// mapped compares a with left b right.
func (s *search) mapped(a, b *reading, rel relation, cost int, changes changeSet) {
	target := b.rotor
	if rel.inverse {
		target = target.Reverse()
	}
	s.compare(a, b, cubes[rel.left].Mul(target).Mul(cubes[rel.right]), rel, cost, changes)
}

// remap looks for the map of axes that carries b to a: on the side of the
// result, on that of the argument, or on both. The first two are solved: what
// is left between the rotations must be a cube.
func (s *search) remap(a, b *reading, rel relation, cost int, changes changeSet) {
	target := b.rotor
	if rel.inverse {
		target = target.Reverse()
	}
	back := target.Reverse()
	s.tried += 3 * 22 // each solution stands for 23 comparisons
	if left := a.rotor.Mul(back); s.worth(cubeDot(left), a, b) {
		s.mapped(a, b, relation{inverse: rel.inverse, left: nearestCube(left)}, cost, changes)
	}
	if right := back.Mul(a.rotor); s.worth(cubeDot(right), a, b) {
		s.mapped(a, b, relation{inverse: rel.inverse, right: nearestCube(right)}, cost, changes)
	}
	if math.Abs(math.Abs(a.rotor.S)-math.Abs(target.S)) > margin*(a.tol+b.tol+arithmetic) {
		return // a map on both sides keeps the angle
	}
	for c := cube(1); c < 24; c++ {
		moved := cubes[c].Mul(target).Mul(cubes[inverses[c]])
		if s.worth(math.Abs(moved.Dot(a.rotor)), a, b) {
			s.mapped(a, b, relation{rel.inverse, 0, c, inverses[c]}, cost, changes)
		}
	}
}

// remapBoth looks for two maps of axes that have nothing to do with each other.
func (s *search) remapBoth(a, b *reading, rel relation, cost int, changes changeSet) {
	target := b.rotor
	if rel.inverse {
		target = target.Reverse()
	}
	s.tried += 23 * 22
	for c := cube(1); c < 24; c++ {
		rest := cubes[c].Mul(target).Reverse().Mul(a.rotor)
		if s.worth(cubeDot(rest), a, b) {
			s.mapped(a, b, relation{rel.inverse, 0, c, nearestCube(rest)}, cost, changes)
		}
	}
}

// worth reports whether a hypothesis with the given cosine of half its
// residual may fit or nearly fit.
func (s *search) worth(cos float64, a, b *reading) bool {
	return within(cos, margin*(a.tol+b.tol+arithmetic))
}
