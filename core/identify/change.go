package identify

import (
	"math/bits"
	"strings"
)

// Change is one step away from what is claimed.
type Change uint8

// The changes. What each costs is the whole of dextral's taste in explanations:
// of all readings that fit, the cheapest is reported, and equal costs are a tie.
//
//	0  Sign         R and -R are one rotation
//	1  ScalarOrder  the scalar stands at the other end (2 where components carry names)
//	   Inverse      one of the two is the reverse of the other
//	   Transposed   the nine numbers fill the matrix the other way round
//	   UnitSlip     degrees for radians
//	   MovingFixed  the same order about the other kind of axes
//	   RateAxes     rates about body axes for rates about space axes
//	   RateSign     all rates negated
//	2  HalfAngle    twice the turn, or half of it
//	   AngleOrder   the three numbers belong to other turns
//	   Sequence     another one of the 24 sequences
//	   AngleSign    some of the three angles negated
//	   Kind         another kind of three-number rotation
//	   Remap        axes exchanged or negated, handedness kept
//	3  Mirror       an axis negated, handedness not kept
//
// One slip of habit costs 1: a single bit that two libraries set differently.
// What cannot happen by one bit costs 2, and what no convention permits 3.
const (
	Sign Change = iota
	ScalarOrder
	Inverse
	Transposed
	UnitSlip
	MovingFixed
	RateAxes
	RateSign
	HalfAngle
	AngleOrder
	Sequence
	AngleSign
	Kind
	Remap
	Mirror
	numChanges
)

var changeTable = [numChanges]struct {
	name string
	cost int
}{
	Sign:        {"sign", 0},
	ScalarOrder: {"scalar place", 1},
	Inverse:     {"direction", 1},
	Transposed:  {"storage order", 1},
	UnitSlip:    {"unit", 1},
	MovingFixed: {"moving or fixed axes", 1},
	RateAxes:    {"axes of the rates", 1},
	RateSign:    {"sign of the rates", 1},
	HalfAngle:   {"half angle", 2},
	AngleOrder:  {"order of the angles", 2},
	Sequence:    {"sequence", 2},
	AngleSign:   {"sign of angles", 2},
	Kind:        {"kind of parameters", 2},
	Remap:       {"axes", 2},
	Mirror:      {"handedness", 3},
}

// Cost is the price of the change: see the table at the constants.
func (c Change) Cost() int {
	if c >= numChanges {
		return 0
	}
	return changeTable[c].cost
}

// String names what is changed.
func (c Change) String() string {
	if c >= numChanges {
		return "?"
	}
	return changeTable[c].name
}

// changeSet is a set of changes.
type changeSet uint16

func set(changes ...Change) changeSet {
	var s changeSet
	for _, c := range changes {
		s |= 1 << c
	}
	return s
}

func (s changeSet) has(c Change) bool { return s&(1<<c) != 0 }

// list gives the changes in order of the constants.
func (s changeSet) list() []Change {
	if s == 0 {
		return nil
	}
	all := make([]Change, 0, bits.OnesCount16(uint16(s)))
	for c := range numChanges {
		if s.has(c) {
			all = append(all, c)
		}
	}
	return all
}

func (s changeSet) String() string {
	var names []string
	for _, c := range s.list() {
		names = append(names, c.String())
	}
	return strings.Join(names, ", ")
}
