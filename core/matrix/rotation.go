package matrix

import (
	"math"

	"dextral/core/rotor"
)

// FromRotor returns the matrix of a unit rotor as an active rotation, whose
// product with v is r v r~. The passive matrix, which re-expresses a fixed
// vector in turned axes, is its transpose.
func FromRotor(r rotor.Rotor) (m Mat3) {
	fromRotor(&m, r)
	return m
}

func fromRotor(m *Mat3, r rotor.Rotor) {
	s, a, b, c := r.S, r.E23, r.E31, r.E12
	a2, b2, c2 := 2*a, 2*b, 2*c
	aa, bb, cc := a*a2, b*b2, c*c2
	ab, bc, ca := a*b2, b*c2, c*a2
	sa, sb, sc := s*a2, s*b2, s*c2
	m[0] = [3]float64{1 - bb - cc, ab + sc, ca - sb}
	m[1] = [3]float64{ab - sc, 1 - aa - cc, bc + sa}
	m[2] = [3]float64{ca + sb, bc - sa, 1 - aa - bb}
}

// Rotor returns the unit rotor, or its negative, of a rotation matrix, taken as
// active. It is meant for rotations up to rounding; for others [Nearest] is.
//
// The ten products of two components of a rotor, times four, are sums of
// elements of m: the table
//
//	4 S^2      4 S E23    4 S E31    4 S E12
//	           4 E23^2    4 E23 E31  4 E12 E23
//	                      4 E31^2    4 E31 E12
//	                                 4 E12^2
//
// Each row is a multiple of the rotor. The one with the greatest square, which
// is at least one, is taken and brought to norm one, so that no trace is a bad
// one (S. W. Shepperd, "Quaternion from rotation matrix", J. Guidance and
// Control 1 (1978) 223).
func (m Mat3) Rotor() rotor.Rotor { return fromRotation(&m) }

func fromRotation(m *Mat3) rotor.Rotor {
	x, y, z := m[0][0], m[1][1], m[2][2]
	var r rotor.Rotor
	switch trace := x + y + z; {
	case trace >= x && trace >= y && trace >= z:
		r = rotor.Rotor{S: 1 + trace, E23: m[1][2] - m[2][1], E31: m[2][0] - m[0][2], E12: m[0][1] - m[1][0]}
	case x >= y && x >= z:
		r = rotor.Rotor{S: m[1][2] - m[2][1], E23: 1 + x - y - z, E31: m[0][1] + m[1][0], E12: m[2][0] + m[0][2]}
	case y >= z:
		r = rotor.Rotor{S: m[2][0] - m[0][2], E23: m[0][1] + m[1][0], E31: 1 + y - z - x, E12: m[1][2] + m[2][1]}
	default:
		r = rotor.Rotor{S: m[0][1] - m[1][0], E23: m[2][0] + m[0][2], E31: m[1][2] + m[2][1], E12: 1 + z - x - y}
	}
	return r.Scale(1 / math.Sqrt(r.Dot(r)))
}
