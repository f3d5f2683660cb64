package rotor

import "math"

// Sums of squares within these bounds have lost nothing to overflow or
// underflow: a square below the smallest normal number, 2^-1022, is wrong by
// at most 2^-1075, which is 2^-115 of the lower bound.
const (
	smallSum = 0x1p-960
	largeSum = math.MaxFloat64
)

// Norm returns the square root of the scalar part of r~ r, the length of r as
// a 4-vector. Neither overflow nor underflow spoils it unless the norm itself
// is out of range. With a NaN component it is NaN.
func (r Rotor) Norm() float64 { return norm(r.S, r.E23, r.E31, r.E12) }

// norm is the length of four numbers.
func norm(a, b, c, d float64) float64 {
	if sum := a*a + b*b + c*c + d*d; sum >= smallSum && sum <= largeSum {
		return math.Sqrt(sum)
	}
	r, exp := Rotor{a, b, c, d}.rescale()
	return math.Ldexp(math.Sqrt(r.Dot(r)), exp)
}

// Unit returns r at norm one. It reports false, with the zero multivector,
// when r is zero or not finite.
func (r Rotor) Unit() (Rotor, bool) {
	sum := r.Dot(r)
	if !(sum >= smallSum && sum <= largeSum) {
		r, _ = r.rescale()
		if sum = r.Dot(r); sum == 0 || !finite(sum) {
			return Rotor{}, false
		}
	}
	return r.Scale(1 / math.Sqrt(sum)), true
}

// rescale returns the s with r = 2^exp s whose greatest component is between
// 1/2 and 1, since powers of two cost no accuracy. Zero, infinity and NaN stay
// what they are.
func (r Rotor) rescale() (s Rotor, exp int) {
	_, exp = math.Frexp(max(math.Abs(r.S), math.Abs(r.E23), math.Abs(r.E31), math.Abs(r.E12)))
	return Rotor{
		math.Ldexp(r.S, -exp), math.Ldexp(r.E23, -exp),
		math.Ldexp(r.E31, -exp), math.Ldexp(r.E12, -exp),
	}, exp
}

// Finite reports whether no component is NaN or infinite.
func (r Rotor) Finite() bool {
	return finite(r.S) && finite(r.E23) && finite(r.E31) && finite(r.E12)
}

// finite holds because infinity - infinity is NaN.
func finite(x float64) bool { return x-x == 0 }
