package angle

import (
	"fmt"

	"dextral/core/rotor"
)

// Reading is one way to turn three written numbers into a rotation.
type Reading struct {
	Seq     Sequence
	Order   [3]int // turn k is by number Order[k] of the three as written
	Inverse bool   // the numbers describe the reverse of the rotation meant
}

// Rotor is the rotation meant by the numbers n, in radians, as written.
// NaN if Seq is not Valid or Order is no permutation of 0, 1, 2.
func (r Reading) Rotor(n [3]float64) rotor.Rotor {
	if !r.Valid() {
		return Sequence{}.Rotor(0, 0, 0)
	}
	turned := r.Seq.Rotor(n[r.Order[0]], n[r.Order[1]], n[r.Order[2]])
	if r.Inverse {
		return turned.Reverse()
	}
	return turned
}

// Numbers are the angles, in the order as written, with which r means the rotation.
func (r Reading) Numbers(rotation rotor.Rotor) Triple {
	if !r.Valid() {
		return Sequence{}.Angles(rotation)
	}
	if r.Inverse {
		rotation = rotation.Reverse()
	}
	t := r.Seq.Angles(rotation)
	var n [3]float64
	for k, number := range t.Numbers() {
		n[r.Order[k]] = number
	}
	return Triple{n[0], n[1], n[2], t.Band}
}

// Valid reports whether Seq is one of the 24 and Order a permutation.
func (r Reading) Valid() bool {
	var seen [3]bool
	for _, o := range r.Order {
		if o < 0 || o > 2 || seen[o] {
			return false
		}
		seen[o] = true
	}
	return r.Seq.Valid()
}

// Canonical is the same reading about moving axes: two readings give every
// three numbers the same rotation exactly if their canonical forms are equal.
func (r Reading) Canonical() Reading {
	if r.Seq.Fixed {
		r.Seq = r.Seq.Twin()
		r.Order[0], r.Order[2] = r.Order[2], r.Order[0]
	}
	return r
}

// Listed is the same reading by the name, of the two that it has, under which the
// numbers stand in the order of the turns, if there is one: fixed x-y-z instead of
// moving z-y-x of numbers 3, 2, 1.
func (r Reading) Listed() Reading {
	if r.Order == [3]int{2, 1, 0} {
		r.Seq, r.Order = r.Seq.Twin(), [3]int{0, 1, 2}
	}
	return r
}

// String names the sequence with its kind of axes and, where they are not as
// expected, the order of the numbers and the direction.
func (r Reading) String() string {
	text := r.Seq.Words()
	if r.Order != [3]int{0, 1, 2} {
		text += fmt.Sprintf(" of numbers %d, %d, %d", r.Order[0]+1, r.Order[1]+1, r.Order[2]+1)
	}
	if r.Inverse {
		text = "reverse of " + text
	}
	return text
}
