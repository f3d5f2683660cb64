package rotor

import "math"

// Angle returns the angle (0..pi) of the rotation that carries one orientation
// into the other, whatever the signs and norms of the two rotors.
//
// Small angles come out to full relative accuracy and angles near pi to full
// accuracy as well, see [Relative]: nothing passes through an arc cosine,
// which near 0 and pi loses half the digits. The angle to a zero rotor is
// zero, to one that is not finite NaN.
func Angle(a, b Rotor) float64 {
	r := Relative(a, b)
	sum := r.Dot(r) // |a|^2 |b|^2
	if !(sum >= smallSum && sum <= largeSum) {
		return farAngle(a, b)
	}
	return r.TurnAngle()
}

// farAngle is Angle where products of components overflow or underflow.
func farAngle(a, b Rotor) float64 {
	ua, okA := a.Unit()
	ub, okB := b.Unit()
	if !okA || !okB {
		return nanUnless(a.Finite() && b.Finite())
	}
	return Relative(ua, ub).TurnAngle()
}

func nanUnless(ok bool) float64 {
	if ok {
		return 0
	}
	return math.NaN()
}

// TurnAngle returns the angle (0..pi) of the rotation that r and -r stand for,
// whatever the norm of r. The turn of r itself, which may be up to 2 pi, is
// twice the norm of its [Rotor.Log].
func (r Rotor) TurnAngle() float64 {
	return 2 * math.Atan2(r.Bivector().Norm(), math.Abs(r.S))
}

// Relative returns a~ b, the rotor that carries a into b: a (a~ b) = b for a
// of norm one.
//
// Since a~ a is a scalar, a~ b has the bivector part of a~ (b - a) and of
// a~ (b + a), and one of the two differences is small and, between near rotors,
// exact. So the bivector part, which holds the axis and the angle, keeps its relative
// accuracy however near b comes to a or to -a.
func Relative(a, b Rotor) Rotor {
	cos := a.Dot(b)
	d := b.Sub(a)
	if cos < 0 {
		d = b.Add(a)
	}
	r := a.Reverse().Mul(d)
	r.S = cos
	return r
}
