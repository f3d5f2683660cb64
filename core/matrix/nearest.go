package matrix

import "dextral/core/rotor"

// rounding is the error of a form made from a matrix in units in the last place
// of its greatest element: sums of up to three elements, each known to half a
// unit, in a norm of four by four, and the eigenvalues.
const rounding = 32

// Defect returns the Frobenius norm of m^T m - 1: zero when the columns of m
// are orthonormal, whatever the sign of the determinant. Of a matrix that is
// not finite it is NaN or infinite.
func Defect(m Mat3) float64 { return m.Transpose().Mul(m).Sub(Identity).Norm() }

// Nearest returns the proper rotation nearest to m, and how far it is, in the
// Frobenius norm. It is the rotation R with the greatest trace(R^T m): for a
// positive determinant the orthogonal factor of the polar decomposition, for a
// negative one the best that can be done without a mirror (G. Wahba's problem;
// see [rotor.Form]).
//
// It reports false, with the identity, when m is not finite or several
// rotations do equally well up to rounding: when the rank is below two, or the
// determinant is negative and the two least singular values are equal, as in a
// pure mirror.
func Nearest(m Mat3) (rotation Mat3, distance float64, ok bool) {
	peak, ok := traceForm(m).Peak()
	if !ok || !peak.Single(rounding) {
		return Identity, 0, false
	}
	rotation = FromRotor(peak.At)
	return rotation, m.Sub(rotation).Norm(), true
}

// NearestOrthogonal returns the orthogonal matrix nearest to m, and how far it
// is, in the Frobenius norm: the orthogonal factor of the polar decomposition,
// with a mirror if the determinant of m is negative. It reports false as
// [Nearest] does; a mirror by itself is no obstacle.
func NearestOrthogonal(m Mat3) (orthogonal Mat3, distance float64, ok bool) {
	if !(m.Scale(1/m.Norm()).Det() < 0) { // cubes of elements may be out of range
		return Nearest(m)
	}
	r, distance, ok := Nearest(m.Scale(-1)) // -1 commutes with everything
	return r.Scale(-1), distance, ok
}

// Scale returns the factor s for which s R is nearest to m, R being the nearest
// rotation, and the distance that remains, as a part of s, in the Frobenius
// norm. It reports false as [Nearest] does.
func Scale(m Mat3) (s, residual float64, ok bool) {
	peak, ok := traceForm(m).Peak()
	if !ok || !peak.Single(rounding) {
		return 0, 0, false
	}
	s = peak.Value / 3 // positive, since the eigenvalues add up to zero
	return s, m.Scale(1 / s).Sub(FromRotor(peak.At)).Norm(), true
}

// traceForm returns the form whose value at a unit rotor r is trace(R^T m), R
// being the matrix of r. Its eigenvalues are x+y+z, x-y-z, y-z-x and z-x-y with
// the singular values x >= y >= z of m, z with the sign of the determinant.
func traceForm(m Mat3) rotor.Form {
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
