package rotor

import "math"

// FromAxisAngle returns the rotor of a right-handed turn by angle (rad) about
// axis, which need not be a unit vector. It reports false, with One, when the
// axis is zero or not finite or the angle is not finite.
func FromAxisAngle(axis Vec, angle float64) (Rotor, bool) {
	n, ok := axis.Unit()
	if !ok || !finite(angle) {
		return One, false
	}
	sin, cos := math.Sincos(angle / 2)
	return Rotor{cos, -sin * n.X, -sin * n.Y, -sin * n.Z}, true
}

// AxisAngle returns the unit axis and the angle (rad, 0..pi) of the rotation
// that r and -r stand for. At angle zero the axis is undetermined and e3 is
// returned; at pi both axes are right, and the bivector part of r decides.
func (r Rotor) AxisAngle() (Vec, float64) {
	n, ok := r.halfTurnSide().Bivector().Axis().Neg().Unit()
	if !ok {
		return Vec{Z: 1}, 0
	}
	return n, r.TurnAngle()
}

// halfTurnSide returns r or -r, whichever has a scalar part that is not negative.
func (r Rotor) halfTurnSide() Rotor {
	if r.S < 0 {
		return r.Neg()
	}
	return r
}

// FromRotationVector returns the rotor of a turn by |v| (rad) about v. Longer
// vectors than pi keep their count of turns in the sign of the rotor.
func FromRotationVector(v Vec) Rotor { return Exp(v.Plane().Scale(-0.5)) }

// RotationVector returns the axis times the angle (rad) of the rotation that r
// and -r stand for, with the angle in 0..pi.
func (r Rotor) RotationVector() Vec { return r.halfTurnSide().Log().Axis().Scale(-2) }

// FromMRP returns the rotor of modified Rodrigues parameters p, axis times
// tan(angle/4). Longer vectors than one are turns by more than 180 degrees.
func FromMRP(p Vec) Rotor {
	n := p.Dot(p)
	f := 1 / (1 + n)
	return Rotor{(1 - n) * f, -2 * f * p.X, -2 * f * p.Y, -2 * f * p.Z}
}

// MRP returns the modified Rodrigues parameters of the rotation that r and -r
// stand for, axis times tan(angle/4), taken from the set with |p| <= 1. The other set,
// which describes the same rotation by the turn the other way round, is
// [Shadow] of it.
func (r Rotor) MRP() Vec {
	r = r.halfTurnSide()
	return r.Bivector().Axis().Scale(-1 / (r.Norm() + r.S))
}

// Shadow returns -p/|p|^2, the other modified Rodrigues parameters of the same
// rotation. The shadow of zero, a full turn, is infinite and comes back as NaN.
func Shadow(p Vec) Vec { return p.Scale(-1 / p.Dot(p)) }

// FromGibbs returns the rotor of the Gibbs (Rodrigues) vector g, axis times
// tan(angle/2).
func FromGibbs(g Vec) Rotor {
	r, _ := Rotor{1, -g.X, -g.Y, -g.Z}.Unit()
	return r
}

// Gibbs returns the Gibbs (Rodrigues) vector of r, axis times tan(angle/2),
// the same for r and -r. It reports false when r is a half turn, where the vector is
// infinite.
func (r Rotor) Gibbs() (Vec, bool) {
	g := r.Bivector().Axis().Scale(-1 / r.S)
	return g, g.Finite()
}
