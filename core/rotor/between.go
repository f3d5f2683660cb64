package rotor

import "math"

// Angle returns the angle (rad, 0..pi) of the rotation that carries one
// orientation into the other. Neither the signs nor the norms of a and b matter.
//
// Small angles come out to full relative accuracy, because a~ (b - a) has the
// bivector part of a~ b, and the difference of near rotors is exact; angles near pi come out to
// full accuracy too, since nothing goes through an arc cosine. NaN in, NaN out; zero rotors are at angle zero to all.
func Angle(a, b Rotor) float64 {
	cos := a.Dot(b)
	if cos < 0 {
		b, cos = b.Neg(), -cos
	}
	return 2 * math.Atan2(a.Reverse().Mul(b.Sub(a)).Bivector().Norm(), cos)
}

// TurnAngle returns the angle (rad, 0..pi) of the rotation that r and -r stand
// for. The turn of r itself, which may be up to 2 pi, is 2 |Log(r)|.
func (r Rotor) TurnAngle() float64 {
	return 2 * math.Atan2(r.Bivector().Norm(), math.Abs(r.S))
}

// Slerp returns the rotor at part t of the shorter turn from a to b (both of
// norm one), at constant rate: a at t = 0, b or -b at t = 1.
func Slerp(a, b Rotor, t float64) Rotor {
	if a.Dot(b) < 0 {
		b = b.Neg()
	}
	return along(a, b, t)
}

// SlerpLong returns the rotor at part t of the longer turn from a to b, the
// other way round in the same plane. From a to a it is a full turn in the
// plane e12 of the frame that a turns.
func SlerpLong(a, b Rotor, t float64) Rotor {
	if a.Dot(b) > 0 {
		b = b.Neg()
	}
	return along(a, b, t)
}

// along returns a exp(t log(a~ b)).
func along(a, b Rotor, t float64) Rotor {
	return a.Mul(Exp(Relative(a, b).Log().Scale(t)))
}

// Relative returns a~ b, the rotor that a must be multiplied with on the right
// to give b. Its bivector part is relatively accurate even when b is near a or near -a.
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
