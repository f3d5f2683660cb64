package rules

import (
	"math"

	"dextral/core/rotor"
)

// Turn is two rotations that a finding holds against each other, both in the axes
// of the same frame. Both are units.
type Turn struct {
	Stated, Computed rotor.Rotor
	By, Against      string // what states the one and what the other
}

// Angle is the angle between the two, in radians from 0 to pi.
func (t *Turn) Angle() float64 { return rotor.Angle(t.Stated, t.Computed) }

// turnBetween shows the residual in radians of a finding on the value odd, which
// stands against other: of the readings that their claims leave open, the two that lie as
// far apart as the residual says. It is nil where none do, so that nothing is ever
// shown beside numbers that it does not agree with.
func turnBetween(odd, other *Value, residual float64) *Turn {
	if !odd.comparable() || !other.comparable() {
		return nil
	}
	var best *Turn
	worst := noticeable
	for _, a := range odd.stances() {
		for _, b := range other.stances() {
			for _, r := range []rotor.Rotor{b.Rotor, b.Reverse()} { // directions may be opposite
				t := &Turn{Stated: a.Rotor, Computed: r, By: odd.name(), Against: other.name()}
				if miss := math.Abs(t.Angle() - residual); miss < worst {
					best, worst = t, miss
				}
			}
		}
	}
	return best
}

// turnAround shows what a loop leaves open: the axes at its start, and the same
// axes carried around it. It is nil where the loop is not off by the residual.
func turnAround(closure rotor.Rotor, residual float64) *Turn {
	r, ok := closure.Unit()
	t := &Turn{Stated: rotor.One, Computed: r, By: "start of the loop", Against: "carried around it"}
	if !ok || math.Abs(t.Angle()-residual) > noticeable {
		return nil
	}
	return t
}
