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
// a 4-vector. Neither overflow nor underflow spoils it unless the norm itself is
// out of range. With a NaN component it is NaN.
func (r Rotor) Norm() float64 { return norm(r.S, r.E23, r.E31, r.E12) }

// norm is the length of four numbers.
func norm(a, b, c, d float64) float64 {
	if sum := a*a + b*b + c*c + d*d; sum >= smallSum && sum <= largeSum {
		return math.Sqrt(sum)
	}
	r := Rotor{a, b, c, d}
	top := r.top()
	if top == 0 || !finite(top) {
		return top
	}
	r, exp := r.rescale(top)
	return math.Ldexp(math.Sqrt(r.Dot(r)), exp)
}

// Unit returns r at norm one. It reports false, with the zero multivector,
// when r is zero or not finite.
func (r Rotor) Unit() (Rotor, bool) {
	sum := r.Dot(r)
	if !(sum >= smallSum && sum <= largeSum) {
		top := r.top()
		if top == 0 || !finite(top) {
			return Rotor{}, false
		}
		r, _ = r.rescale(top)
		sum = r.Dot(r)
	}
	return r.Scale(1 / math.Sqrt(sum)), true
}

// top returns the greatest magnitude of a component, NaN if one is NaN.
func (r Rotor) top() float64 {
	return max(math.Abs(r.S), math.Abs(r.E23), math.Abs(r.E31), math.Abs(r.E12))
}

// rescale returns the s with r = 2^exp s whose greatest component is between
// 1/2 and 1. Powers of two cost no accuracy.
func (r Rotor) rescale(top float64) (s Rotor, exp int) {
	_, exp = math.Frexp(top)
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
