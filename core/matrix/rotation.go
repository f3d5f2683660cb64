package matrix

import "dextral/core/rotor"

// FromRotor returns the matrix of a unit rotor as an active rotation: m v is
// r v r~. The passive matrix, which re-expresses a fixed vector in turned axes, is
// its transpose.
func FromRotor(r rotor.Rotor) Mat3 {
	s, a, b, c := r.S, r.E23, r.E31, r.E12
	a2, b2, c2 := 2*a, 2*b, 2*c
	aa, bb, cc := a*a2, b*b2, c*c2
	ab, bc, ca := a*b2, b*c2, c*a2
	sa, sb, sc := s*a2, s*b2, s*c2
	return Mat3{
		{1 - bb - cc, ab + sc, ca - sb},
		{ab - sc, 1 - aa - cc, bc + sa},
		{ca + sb, bc - sa, 1 - aa - bb},
	}
}

// Rotor returns a unit rotor of the rotation m, taken as active. It is meant for matrices
// that are rotations up to rounding; for others see [Nearest].
//
// The sixteen products of the components of the rotor, times four, are sums of
// elements of m. Each of four columns of that table is a multiple of the
// rotor; the one with the largest diagonal, at least one, is taken and normalised, so that no
// trace is a bad one (S. W. Shepperd, "Quaternion from rotation matrix", J. Guidance and Control 1 (1978) 223).
func (m Mat3) Rotor() rotor.Rotor {
	x, y, z := m[0][0], m[1][1], m[2][2]
	var r rotor.Rotor
	switch s := x + y + z; {
	case s >= x && s >= y && s >= z:
		r = rotor.Rotor{S: 1 + s, E23: m[1][2] - m[2][1], E31: m[2][0] - m[0][2], E12: m[0][1] - m[1][0]}
	case x >= y && x >= z:
		r = rotor.Rotor{S: m[1][2] - m[2][1], E23: 1 + x - y - z, E31: m[0][1] + m[1][0], E12: m[2][0] + m[0][2]}
	case y >= z:
		r = rotor.Rotor{S: m[2][0] - m[0][2], E23: m[0][1] + m[1][0], E31: 1 + y - z - x, E12: m[1][2] + m[2][1]}
	default:
		r = rotor.Rotor{S: m[0][1] - m[1][0], E23: m[2][0] + m[0][2], E31: m[1][2] + m[2][1], E12: 1 + z - x - y}
	}
	u, _ := r.Unit()
	return u
}
