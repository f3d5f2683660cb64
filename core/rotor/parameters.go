package rotor

import "math"

// FromAxisAngle returns the rotor of a right-handed turn by angle about axis,
// which need not be a unit vector. It reports false, with One, when the axis is
// zero or not finite or the angle is not finite.
func FromAxisAngle(axis Vec, angle float64) (Rotor, bool) {
	n, ok := axis.Unit()
	if !ok || !finite(angle) {
		return One, false
	}
	sin, cos := math.Sincos(angle / 2)
	return Rotor{cos, -sin * n.X, -sin * n.Y, -sin * n.Z}, true
}

// AxisAngle returns the unit axis and the angle (0..pi) of the rotation that r
// and -r stand for, whatever the norm of r. At angle zero nothing determines
// the axis and e3 is returned; at pi both senses are right and r decides.
func (r Rotor) AxisAngle() (Vec, float64) {
	n, ok := r.upper().Bivector().Axis().Neg().Unit()
	if !ok {
		return Vec{Z: 1}, r.TurnAngle() // zero, unless r is NaN
	}
	return n, r.TurnAngle()
}

// upper returns r or -r, whichever has no negative scalar part: the turn by at
// most 180 degrees.
func (r Rotor) upper() Rotor {
	if r.S < 0 {
		return r.Neg()
	}
	return r
}

// FromRotationVector returns the rotor of a turn by |v| about v. Vectors longer
// than pi count: a turn by 2 pi gives -1.
func FromRotationVector(v Vec) Rotor { return Exp(v.Plane().Scale(-0.5)) }

// RotationVector returns the axis times the angle (0..pi) of the rotation that
// r and -r stand for, whatever the norm of r.
func (r Rotor) RotationVector() Vec { return r.upper().Log().Axis().Scale(-2) }

// FromMRP returns the rotor of modified Rodrigues parameters p, axis times
// tan(angle/4). Vectors longer than one are turns by more than 180 degrees.
func FromMRP(p Vec) Rotor {
	if far, ok := Shadow(p); ok && p.Norm() > 2 {
		return FromMRP(far).Neg() // p.Dot(p) might overflow
	}
	n := p.Dot(p)
	f := 1 / (1 + n)
	return Rotor{(1 - n) * f, -2 * f * p.X, -2 * f * p.Y, -2 * f * p.Z}
}

// MRP returns the modified Rodrigues parameters, axis times tan(angle/4), of
// the rotation that r and -r stand for, whatever the norm: those with |p| <= 1.
// The others, of the same rotation by the turn the other way round, are their
// [Shadow]. At a half turn both sets have |p| = 1.
func (r Rotor) MRP() Vec {
	r = r.upper()
	return r.Bivector().Axis().Scale(-1 / (r.Norm() + r.S))
}

// Shadow returns -p/|p|^2, the other modified Rodrigues parameters of the
// rotation of p. It reports false, with p, when p is zero, whose shadow is
// infinite, or not finite.
func Shadow(p Vec) (Vec, bool) {
	n, ok := p.Unit()
	if !ok {
		return p, false
	}
	return n.Scale(-1 / p.Norm()), true
}

// FromGibbs returns the rotor of the Gibbs (Rodrigues) vector g, axis times
// tan(angle/2).
func FromGibbs(g Vec) Rotor {
	f := 1 / norm(1, g.X, g.Y, g.Z)
	return Rotor{f, -f * g.X, -f * g.Y, -f * g.Z}
}

// Gibbs returns the Gibbs (Rodrigues) vector, axis times tan(angle/2), of the
// rotation that r and -r stand for, whatever the norm. It reports false at a
// half turn, where the vector is infinite.
func (r Rotor) Gibbs() (Vec, bool) {
	g := r.Bivector().Axis().Scale(-1 / r.S)
	return g, g.Finite()
}
