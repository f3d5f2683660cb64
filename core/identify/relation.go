package identify

import "dextral/core/convention"

// relation is what stands between the two rotations of a pair of readings:
//
//	a = left b^ right
//
// with b^ being b or its reverse, and a or b squared for a half angle.
type relation struct {
	inverse     bool
	power       int8 // 1: a squared, 2: b squared
	left, right cube
}

// Hypothesis is one way to read both statements so that they could describe
// one orientation.
type Hypothesis struct {
	A, B Reading
	relation
	changes changeSet
	cost    int
}

// Changes lists what the hypothesis changes about the claims.
func (h Hypothesis) Changes() []Change { return h.changes.list() }

// Cost is the sum of the costs of the changes; a change made on both sides
// counts twice.
func (h Hypothesis) Cost() int { return h.cost }

// Reversed reports whether one of the two is the reverse of the other.
func (h Hypothesis) Reversed() bool { return h.inverse }

// alias brings a hypothesis into the form that all hypotheses share which no
// numbers can tell from it:
//
//   - a map of axes on both sides, c b c~, relabels the axes of angles;
//   - the reverse of angles are the same turns backwards and negated;
//   - fixed axes are moving axes backwards;
//   - numbers read alike on both sides agree exactly if they are the same
//     numbers, however they are read.
//
// Costs, names and changes do not take part.
func (h Hypothesis) alias() Hypothesis {
	h.changes, h.cost = 0, 0
	anglesA, anglesB := h.A.Form == convention.Angles, h.B.Form == convention.Angles
	if anglesA {
		h.A.Turns = h.A.Turns.moving()
	}
	if anglesB {
		h.B.Turns = h.B.Turns.moving()
	}
	if h.right == inverses[h.left] && h.left != 0 {
		switch {
		case anglesB:
			h.B.Turns, h.left, h.right = h.B.Turns.relabel(h.left), 0, 0
		case anglesA:
			h.A.Turns, h.left, h.right = h.A.Turns.relabel(h.right), 0, 0
		}
	}
	if h.inverse && (anglesA || anglesB) {
		h = h.foldReverse(anglesB)
	}
	if anglesA && anglesB && h.left == 0 && h.right == 0 {
		h.A.Turns, h.B.Turns = standard(h.A.Turns, h.B.Turns)
	}
	if h.A == h.B && h.relation == (relation{}) {
		h.A = Reading{Form: h.A.Form}
		h.B = h.A
	}
	return h
}

// foldReverse turns a = l b~ r into a = l b' r, b' being the turns of b
// backwards; with angles only in a, a = l b~ r into a' = r~ b l~.
func (h Hypothesis) foldReverse(anglesB bool) Hypothesis {
	h.inverse = false
	if anglesB {
		h.B.Turns = h.B.Turns.reverse()
		return h
	}
	h.A.Turns = h.A.Turns.reverse()
	h.left, h.right = inverses[h.right], inverses[h.left]
	return h
}

// standard relabels the axes of two triples of turns together, and reverses
// both, so that b's first two turns are about +x and +y: that relation between
// numbers does not depend on the names of the axes. Of the two directions the
// one that comes first in the order of less stands.
func standard(a, b Turns) (Turns, Turns) {
	forwardA, forwardB := relabelTo(a, b)
	backA, backB := relabelTo(a.reverse(), b.reverse())
	if less(backB, forwardB) || backB == forwardB && less(backA, forwardA) {
		return backA, backB
	}
	return forwardA, forwardB
}

func relabelTo(a, b Turns) (Turns, Turns) {
	for c := range axisMaps {
		moved := b.relabel(cube(c))
		axes := moved.Sequence.Axes
		if axes[0] == 0 && axes[1] == 1 && !moved.Negated[moved.Order[0]] && !moved.Negated[moved.Order[1]] {
			return a.relabel(cube(c)), moved
		}
	}
	return a, b
}

func less(a, b Turns) bool { return a.rank() < b.rank() }

// rank numbers the turns about moving axes.
func (t Turns) rank() int {
	n := 0
	for k := range 3 {
		n = n*9 + int(t.Sequence.Axes[k])*3 + int(t.Order[k])
		n *= 2
		if t.Negated[k] {
			n++
		}
	}
	return n
}
