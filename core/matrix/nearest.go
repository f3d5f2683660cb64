package matrix

import "dextral/core/rotor"

// Defect returns the Frobenius norm of m^T m - 1: zero when the columns of m are
// orthonormal, whatever the sign of the determinant.
func Defect(m Mat3) float64 { return m.Transpose().Mul(m).Sub(Identity).Norm() }

// Nearest returns the proper rotation nearest to m and its distance, both in the Frobenius
// norm.
func Nearest(m Mat3) (rotation Mat3, distance float64, ok bool) {
	r, _, ok := davenport(m).Maximum()
	if !ok {
		return Identity, 0, false
	}
	rotation = FromRotor(r)
	return rotation, m.Sub(rotation).Norm(), true
}

// NearestOrthogonal returns the orthogonal matrix nearest to m, a rotation or a
// rotation with a mirror as the determinant of m says.
func NearestOrthogonal(m Mat3) (orthogonal Mat3, distance float64, ok bool) {
	if m.Det() >= 0 {
		return Nearest(m)
	}
	r, distance, ok := Nearest(m.Scale(-1))
	return r.Scale(-1), distance, ok
}

// Scale returns the s that brings s R nearest to m, R the nearest rotation, and
// the distance that remains, as a part of s.
func Scale(m Mat3) (s, residual float64, ok bool) {
	r, value, ok := davenport(m).Maximum()
	if !ok || value <= 0 {
		return 0, 0, false
	}
	s = value / 3
	return s, m.Scale(1 / s).Sub(FromRotor(r)).Norm(), true
}

// davenport returns the form whose value at a unit rotor is trace(R^T m).
func davenport(m Mat3) rotor.Form {
	x, y, z := m[0][0], m[1][1], m[2][2]
	sa, sb, sc := m[1][2]-m[2][1], m[2][0]-m[0][2], m[0][1]-m[1][0]
	ab, bc, ca := m[0][1]+m[1][0], m[1][2]+m[2][1], m[2][0]+m[0][2]
	return rotor.Form{
		{x + y + z, sa, sb, sc},
		{sa, x - y - z, ab, ca},
		{sb, ab, y - z - x, bc},
		{sc, ca, bc, z - x - y},
	}
}
