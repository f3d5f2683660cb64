package rotor

import "math"

// Exp returns the exponential of b, cos |b| + b sin |b| / |b|. The rotor that
// turns by angle a in the unit plane B is Exp(-B a/2).
func Exp(b Bivector) Rotor {
	n := b.Norm()
	if n == 0 {
		return One
	}
	sin, cos := math.Sincos(n)
	f := sin / n
	return Rotor{cos, f * b.E23, f * b.E31, f * b.E12}
}

// Log returns the bivector b of least area with Exp(b) = r/|r|. Its norm is
// half the turn that r stands for, 0..pi. The sign counts: a turn by more than
// 180 degrees keeps its length, and Exp(Log(r)) is r and never -r.
//
// The logarithm of -1, a full turn, has no plane of its own: it is pi e12. That
// of zero is zero.
func (r Rotor) Log() Bivector {
	b := r.Bivector()
	n := b.Norm()
	angle := math.Atan2(n, r.S)
	if n < 0x1p-1022 { // angle/n would overflow
		return tinyLog(b, angle)
	}
	return b.Scale(angle / n)
}

func tinyLog(b Bivector, angle float64) Bivector {
	u, ok := b.Axis().Unit()
	if !ok && angle > 0 {
		u = Vec{Z: 1}
	}
	return u.Plane().Scale(angle)
}
