package identify

import (
	"math"
	"slices"

	"dextral/core/rotor"
)

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
	reach   float64     // rad: residual above which a hypothesis is no news
}

const maxNearest = 6

// trial is what all hypotheses of one round of the search share: their cost,
// and what is changed beside the readings.
type trial struct {
	relation
	cost    int
	changes changeSet
}

// level compares all hypotheses that cost c.
func (s *search) level(c int) {
	forward := trial{cost: c}
	backward := trial{relation: relation{inverse: true}, cost: c}
	if s.inverse > 0 {
		backward.changes = set(Inverse)
	}
	s.plain(c, forward)
	s.plain(c-s.inverse, backward)
	s.wide(c, forward)
	s.wide(c-s.inverse, backward)
}

// plain compares readings that cost so much together as they are. The scalar
// products of a rotor with another and its reverse are sum and difference of two parts.
func (s *search) plain(cost int, t trial) {
	sign := 1.0
	if t.inverse {
		sign = -1
	}
	s.pairs(cost, func(a, b *reading) {
		s.tried++
		p, q := &a.rotor, &b.rotor
		dot := p.S*q.S + sign*(p.E23*q.E23+p.E31*q.E31+p.E12*q.E12)
		if s.news(dot, a.tol+b.tol) {
			s.keep(a, b, p, t.target(b), t, 0)
		}
	})
}

// target is b as the relation of the trial has it, without maps.
func (t *trial) target(b *reading) rotor.Rotor {
	if t.inverse {
		return b.rotor.Reverse()
	}
	return b.rotor
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

// news reports whether a hypothesis may fit or be among the nearest, by the
// cosine of half its residual and what the digits leave open.
func (s *search) news(cos, open float64) bool {
	return within(cos, max(s.reach, margin*(open+arithmetic)))
}

// within reports whether two rotors whose scalar product is cos may be within
// an angle of each other. It is true for some that are a little farther apart, since
// 1 - x^2/8 lies below cos(x/2), and false for none that are nearer.
func within(cos, angle float64) bool { return math.Abs(cos) >= 1-angle*angle/8-0x1p-50 }

// keep measures a hypothesis, from against target, and keeps it if it fits or is
// among the nearest. Extra is what a doubled angle adds to what is open.
func (s *search) keep(a, b *reading, from *rotor.Rotor, target rotor.Rotor, t trial, extra float64) {
	c := candidate{residual: rotor.Angle(*from, target), open: a.tol + b.tol + extra + arithmetic, at: a.rotor}
	c.Hypothesis = Hypothesis{
		A: s.a.reading(a.code), B: s.b.reading(b.code), relation: t.relation,
		changes: a.set | b.set | t.changes, changesA: a.set, changesB: b.set, cost: t.cost,
	}
	c.key = s.aliasOf(a.code, b.code, t.relation)
	if t.cost == 0 && !t.inverse && c.residual < s.forward.residual {
		s.forward = c
	}
	if c.near() {
		s.found = append(s.found, c)
		return
	}
	s.keepNearest(c)
}

// keepNearest holds the list sorted, with one candidate of each alias.
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
	s.reach = math.Pi
	if len(s.nearest) == maxNearest {
		s.reach = s.nearest[maxNearest-1].residual
	}
}
