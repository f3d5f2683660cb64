package rotor

import "math"

// Angle returns the angle (0..pi) of the rotation that carries one orientation
// into the other, whatever the signs and norms of the two rotors.
//
// It is accurate at every angle, since nothing passes through an arc cosine,
// which near 0 and pi loses half the digits. Between rotors of norm one small
// angles even come out to full relative accuracy, see [Relative]; other norms
// are divided out first, which moves each rotor by an ulp. The angle to a zero
// rotor is zero, to one that is not finite NaN.
func Angle(a, b Rotor) float64 {
	if nearOne(a.Dot(a)) && nearOne(b.Dot(b)) {
		return Relative(a, b).TurnAngle()
	}
	ua, okA := a.Unit()
	ub, okB := b.Unit()
	if !okA || !okB {
		return nanUnless(a.Finite() && b.Finite())
	}
	return Relative(ua, ub).TurnAngle()
}

// nearOne reports whether rotors with this square may be taken as they are:
// the difference of two in the same place is then no longer than they are.
func nearOne(square float64) bool { return square > 0.5 && square < 2 }

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

// Relative returns a~ b of two rotors of norm one, the turn that carries a into
// b: a (a~ b) = b.
//
// Since a~ a is a scalar, a~ b has the bivector part of a~ (b - a) and of
// a~ (b + a), and one of the two differences is small and, between near rotors,
// exact. So the bivector part, which holds the axis and the angle, keeps its
// relative accuracy however near b comes to a or to -a.
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
