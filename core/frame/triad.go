package frame

import (
	"fmt"
	"math"

	"dextral/core/convention"
	"dextral/core/matrix"
)

// Triad is the directions of a frame's three axes, and the handedness that
// was stated for it, if any; the handedness it has is Handedness.
type Triad struct {
	X, Y, Z Way
	Hand    convention.Hand
}

// Subject is OfHand: a triad is stated to be right- or left-handed.
func (Triad) Subject() convention.Subject { return convention.OfHand }

// Setting is where the three ways are perpendicular to one another; NoSetting
// if nowhere.
func (t Triad) Setting() Setting {
	for s := Body; s <= Screen; s++ {
		var seen [3]bool
		for _, w := range t.ways() {
			if axis, _, ok := w.in(s); ok {
				seen[axis] = true
			}
		}
		if seen == [3]bool{true, true, true} {
			return s
		}
	}
	return NoSetting
}

// Valid reports whether the three ways are perpendicular to one another.
func (t Triad) Valid() bool { return t.Setting() != NoSetting }

func (t Triad) ways() [3]Way { return [3]Way{t.X, t.Y, t.Z} }

// Matrix has the axes of the triad as columns, written in the right-handed
// reference triad of its setting: v_reference = M v. Zero for a triad that is not Valid.
func (t Triad) Matrix() matrix.Mat3 {
	var m matrix.Mat3
	s := t.Setting()
	if s == NoSetting {
		return m
	}
	for column, w := range t.ways() {
		axis, sign, _ := w.in(s)
		m[axis][column] = sign
	}
	return m
}

// Handedness is the one the triad has, whatever is stated; unstated if it is not Valid.
func (t Triad) Handedness() convention.Hand {
	switch det := t.Matrix().Det(); {
	case det > 0:
		return convention.RightHanded
	case det < 0:
		return convention.LeftHanded
	}
	return convention.HandUnstated
}

// Same reports whether the axes are the same ones.
func (t Triad) Same(other Triad) bool { return t.ways() == other.ways() }

// Code is the three letters of a triad of a body or of the local level, such
// as FLU and NED; "" for others.
func (t Triad) Code() string {
	if s := t.Setting(); s != Body && s != Level {
		return ""
	}
	return string([]byte{letters[t.X], letters[t.Y], letters[t.Z]})
}

// String is the axes in words, with the code if there is one.
func (t Triad) String() string {
	words := fmt.Sprintf("x %s, y %s, z %s", t.X, t.Y, t.Z)
	if code := t.Code(); code != "" {
		return code + " (" + words + ")"
	}
	return words
}

// AxisMap is the signed permutation P with v_to = P v_from; its determinant is -1
// between triads of different hand. It is false if the two are not Valid triads of one setting.
func AxisMap(to, from Triad) (matrix.Mat3, bool) {
	if s := to.Setting(); s == NoSetting || s != from.Setting() {
		return matrix.Mat3{}, false
	}
	return to.Matrix().Transpose().Mul(from.Matrix()), true
}

// mirrored is -1 for a map of negative determinant, else 1.
func mirrored(p matrix.Mat3) float64 { return math.Copysign(1, p.Det()) }
