package identify

import (
	"math"
	"sync"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/core/rotor"
)

// relation is what stands between the two rotations of a pair of readings:
//
//	a = left b^ right
//
// with b^ being b or its reverse, and a or b squared for a half angle.
type relation struct {
	inverse     bool
	power       int8 // 1: a squared, 2: b squared
	left, right Cube
}

// Hypothesis is one way to read both statements so that they could describe
// one orientation.
type Hypothesis struct {
	A, B Reading
	relation
	changes            changeSet
	changesA, changesB changeSet // those about one reading alone
	cost               int
}

// Changes lists what the hypothesis changes about the claims.
func (h Hypothesis) Changes() []Change { return h.changes.list() }

// Cost is the sum of the costs of the changes; a change made on both sides
// counts twice.
func (h Hypothesis) Cost() int { return h.cost }

// Reversed reports whether one of the two is the reverse of the other.
func (h Hypothesis) Reversed() bool { return h.inverse }

// alias is what all hypotheses share that no numbers can tell apart, however
// they are worded: a conjugate in one place is a transpose in the other, fixed
// axes are moving axes backwards, the same map of axes in both frames of three
// angles is another sequence, negating two of them is a map by a half turn, and what is read alike on
// both sides agrees exactly if the numbers are the same.
//
// A rotor is written as numbers by a fixed linear map, or by turns. The turns
// are brought to a standard form, a relabelling and perhaps a reversal away. All that
// is left is one linear map from the rotor numbers of b to those of a, up to sign.
type alias struct {
	formA, formB   convention.Form
	unitA, unitB   convention.Unit
	kindA, kindB   Parameters
	turnsA, turnsB uint16 // in standard form
	power          int8
	squared        convention.ScalarPlace // of the side that is squared, which is not linear
	linear         [16]int8
}

// frame carries a standard rotor to the one meant: r = c s c~, or its reverse
// if reversed, with the scalar moved from the last place if last.
type frame struct {
	c        Cube
	reversed bool
	last     bool
}

func (f frame) apply(r rotor.Rotor) rotor.Rotor {
	if f.last {
		w, x, y, z := r.Quaternion()
		r = rotor.FromQuaternion(z, w, x, y)
	}
	if f.reversed {
		r = r.Reverse()
	}
	return cubes[f.c].Mul(r).Mul(cubes[inverses[f.c]])
}

func (f frame) undo(r rotor.Rotor) rotor.Rotor {
	r = cubes[inverses[f.c]].Mul(r).Mul(cubes[f.c])
	if f.reversed {
		r = r.Reverse()
	}
	if f.last {
		w, x, y, z := r.Quaternion()
		r = rotor.FromQuaternion(x, y, z, w)
	}
	return r
}

// aliasOf is the alias of two readings in a relation.
func (s *search) aliasOf(a, b code, rel relation) alias {
	k := alias{
		formA: s.a.form, formB: s.b.form, unitA: a.unit, unitB: b.unit,
		kindA: a.parameters, kindB: b.parameters, power: rel.power,
	}
	frameA, frameB := frame{last: a.scalar == convention.ScalarLast}, frame{last: b.scalar == convention.ScalarLast}
	switch rel.power {
	case 1:
		k.squared, frameA.last = a.scalar, false
	case 2:
		k.squared, frameB.last = b.scalar, false
	}
	if s.a.form == convention.Angles {
		k.turnsA, frameA = a.standard()
	}
	if s.b.form == convention.Angles {
		k.turnsB, frameB = b.standard()
	}
	k.linear = rel.linear(frameA, frameB)
	if k.power == 0 && k.unitA == k.unitB && k.kindA == k.kindB && k.turnsA == k.turnsB && k.linear == same {
		k = alias{formA: k.formA, formB: k.formB, linear: same} // equal numbers agree in every unit and sequence
	}
	return k
}

// linear is the map from b in its frame to a in its frame, in quarters; the
// entries are 0, 1/2, sqrt(1/2) and 1. The first that is not zero is positive.
func (rel relation) linear(frameA, frameB frame) [16]int8 {
	var m [16]int8
	sign := 0.0
	for i, e := range [4]rotor.Rotor{{S: 1}, {E23: 1}, {E31: 1}, {E12: 1}} {
		r := frameB.apply(e)
		if rel.inverse {
			r = r.Reverse()
		}
		r = frameA.undo(cubes[rel.left].Mul(r).Mul(cubes[rel.right]))
		for j, x := range [4]float64{r.S, r.E23, r.E31, r.E12} {
			x = math.Round(4 * x)
			if sign == 0 && x != 0 {
				sign = math.Copysign(1, x)
			}
			m[4*i+j] = int8(sign * x)
		}
	}
	return m
}

// same is the identity in quarters.
var same = relation{}.linear(frame{}, frame{})

// standardTurns holds the standard form of each way and signs, and the frame
// that leads back from it.
type standardTurns struct {
	id uint16
	frame
}

func (c code) standard() (uint16, frame) {
	t := &standards()[c.way][c.signs]
	return t.id, t.frame
}

// standards relabels the axes of turns about moving axes so that the first two
// are about +x and +y, forwards or reversed, whichever comes first in the list.
var standards = sync.OnceValue(func() *[72][8]standardTurns {
	ids := map[Turns]uint16{}
	for way := range turnNames {
		for signs, negated := range negations {
			t := turnNames[way][0]
			t.Negated = negated
			ids[t] = uint16(8*way + signs)
		}
	}
	var table [72][8]standardTurns
	for t, id := range ids {
		forward, f := relabelled(t)
		backward, b := relabelled(t.reverse())
		best := standardTurns{ids[forward], f}
		if back := ids[backward]; back < best.id {
			b.reversed = true
			best = standardTurns{back, b}
		}
		table[id/8][id%8] = best
	}
	return &table
})

// relabelled turns t so that its first two turns are about +x and +y.
func relabelled(t Turns) (Turns, frame) {
	for c := range Cube(24) {
		moved := t.relabel(c)
		axes := moved.Sequence.Axes
		if axes[0] == angle.X && axes[1] == angle.Y && !moved.Negated[moved.Order[0]] && !moved.Negated[moved.Order[1]] {
			return moved, frame{c: inverses[c]}
		}
	}
	return t, frame{} // never: two axes at right angles can be carried onto any two
}
