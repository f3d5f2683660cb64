package identify

import (
	"fmt"
	"math"
	"strings"

	"dextral/core/angle"
	"dextral/core/rotor"
)

// Turns says how three written angles make a rotation.
type Turns struct {
	Sequence angle.Sequence
	Order    [3]uint8 // turn k is by number Order[k] of the three as written
	Negated  [3]bool  // number i as written has the wrong sign
}

// String prints sequence, order and signs.
func (t Turns) String() string {
	r := angle.Reading{Seq: t.Sequence}
	for k, o := range t.Order {
		r.Order[k] = int(o)
	}
	text := r.String()
	var negated []string
	for i, n := range t.Negated {
		if n {
			negated = append(negated, fmt.Sprint(i+1))
		}
	}
	if negated != nil {
		text += " with number " + strings.Join(negated, " and ") + " negated"
	}
	return text
}

// reverse names the turns that undo those of t, which are about moving axes:
// the same ones backwards.
func (t Turns) reverse() Turns {
	t.Sequence.Axes[0], t.Sequence.Axes[2] = t.Sequence.Axes[2], t.Sequence.Axes[0]
	t.Order[0], t.Order[2] = t.Order[2], t.Order[0]
	for i := range t.Negated {
		t.Negated[i] = !t.Negated[i]
	}
	return t
}

// relabel carries the axes of the turns over by a map: a turn about -y is the
// negated turn about y.
func (t Turns) relabel(c Cube) Turns {
	for k, axis := range t.Sequence.Axes {
		to := axisMaps[c][axis]
		t.Sequence.Axes[k] = angle.Axis(to.axis)
		if to.negated {
			t.Negated[t.Order[k]] = !t.Negated[t.Order[k]]
		}
	}
	return t
}

// turnNames lists, for each of the 72 ways in which three numbers make turns, its
// two names: about moving axes, and backwards about fixed ones.
var turnNames = func() (names [72][2]Turns) {
	orders := [6][3]uint8{{0, 1, 2}, {0, 2, 1}, {1, 0, 2}, {1, 2, 0}, {2, 0, 1}, {2, 1, 0}}
	at := 0
	for _, s := range angle.Sequences() {
		if s.Fixed {
			continue
		}
		for _, o := range orders {
			names[at][0] = Turns{Sequence: s, Order: o}
			names[at][1] = Turns{Sequence: s.Twin(), Order: [3]uint8{o[2], o[1], o[0]}}
			at++
		}
	}
	return names
}()

// named is what a reading of angles costs before units and signs, and under
// which name it is cheapest.
type named struct {
	cost int8
	set  changeSet
	name uint8
}

// nameAll prices the 72 ways against the allowed ones.
func nameAll(allowed []angle.Reading) (table [72]named) {
	for i := range turnNames {
		table[i].cost = math.MaxInt8
		for n, name := range turnNames[i] {
			for _, r := range allowed {
				if cost, set := stray(name, r); cost < table[i].cost {
					table[i] = named{cost, set, uint8(n)}
				}
			}
		}
	}
	return table
}

// stray is how far a way of making turns is from an allowed reading. Numbers
// that follow their axes into another sequence are not out of order: roll
// stays roll.
func stray(t Turns, from angle.Reading) (int8, changeSet) {
	var s changeSet
	cost := int8(0)
	switch {
	case t.Sequence == from.Seq:
	case t.Sequence.Axes == from.Seq.Axes:
		s, cost = set(MovingFixed), 1
	default:
		s, cost = set(Sequence), 2
	}
	sameOrder, sameAxes := true, !t.Sequence.Proper() && !from.Seq.Proper()
	for k, o := range t.Order {
		sameOrder = sameOrder && int(o) == from.Order[k]
		for l, p := range from.Order {
			if p == int(o) && from.Seq.Axes[l] != t.Sequence.Axes[k] {
				sameAxes = false
			}
		}
	}
	if !sameOrder && !sameAxes {
		s |= set(AngleOrder)
		cost += 2
	}
	return cost, s
}

// halfTurn is the sine and cosine of half an angle.
type halfTurn struct{ sin, cos float64 }

func halfTurns(n []float64, unit float64) (h [3]halfTurn) {
	for i := range h {
		h[i].sin, h[i].cos = math.Sincos(n[i] * unit / 2)
	}
	return h
}

// rotor multiplies the three turns of t, which are about moving axes.
func (t *Turns) rotor(h *[3]halfTurn, negated *[3]bool) rotor.Rotor {
	a, b, c := h[t.Order[0]], h[t.Order[1]], h[t.Order[2]]
	if negated[t.Order[0]] {
		a.sin = -a.sin
	}
	if negated[t.Order[1]] {
		b.sin = -b.sin
	}
	if negated[t.Order[2]] {
		c.sin = -c.sin
	}
	i, j, k := t.Sequence.Axes[0], t.Sequence.Axes[1], t.Sequence.Axes[2]
	e := 1.0 // +1 if i, j and the remaining axis are an even permutation
	if (i+1)%3 != j {
		e = -1
	}
	var q [3]float64 // Hamilton's i, j, k
	var s float64
	if i == k {
		s = b.cos * (a.cos*c.cos - a.sin*c.sin)
		q[i] = b.cos * (a.sin*c.cos + a.cos*c.sin)
		q[j] = b.sin * (a.cos*c.cos + a.sin*c.sin)
		q[3-i-j] = e * b.sin * (a.sin*c.cos - a.cos*c.sin)
	} else {
		s = a.cos*b.cos*c.cos - e*a.sin*b.sin*c.sin
		q[i] = a.sin*b.cos*c.cos + e*a.cos*b.sin*c.sin
		q[j] = a.cos*b.sin*c.cos - e*a.sin*b.cos*c.sin
		q[k] = a.cos*b.cos*c.sin + e*a.sin*b.sin*c.cos
	}
	return rotor.FromQuaternion(s, q[0], q[1], q[2])
}
