package rotor

import "math"

// Vec is a vector: its coordinates along e1, e2 and e3.
type Vec struct{ X, Y, Z float64 }

// Add returns v + w.
func (v Vec) Add(w Vec) Vec { return Vec{v.X + w.X, v.Y + w.Y, v.Z + w.Z} }

// Sub returns v - w.
func (v Vec) Sub(w Vec) Vec { return Vec{v.X - w.X, v.Y - w.Y, v.Z - w.Z} }

// Scale returns s v.
func (v Vec) Scale(s float64) Vec { return Vec{s * v.X, s * v.Y, s * v.Z} }

// Neg returns -v.
func (v Vec) Neg() Vec { return Vec{-v.X, -v.Y, -v.Z} }

// Dot returns the scalar product of v and w.
func (v Vec) Dot(w Vec) float64 { return v.X*w.X + v.Y*w.Y + v.Z*w.Z }

// Cross returns the axis of the plane v ^ w, so that e1 x e2 = e3.
func (v Vec) Cross(w Vec) Vec {
	return Vec{v.Y*w.Z - v.Z*w.Y, v.Z*w.X - v.X*w.Z, v.X*w.Y - v.Y*w.X}
}

// Wedge returns the plane v ^ w with the area of the parallelogram of v and w:
// I (v x w), so that e1 ^ e2 = e12.
func (v Vec) Wedge(w Vec) Bivector { return v.Cross(w).Plane() }

// Norm returns the length of v. It neither overflows nor underflows before the
// length itself does; with a NaN coordinate it is NaN.
func (v Vec) Norm() float64 { return norm(v.X, v.Y, v.Z, 0) }

// Unit returns v at length one. It reports false, with the zero vector, when v
// is zero or not finite.
func (v Vec) Unit() (Vec, bool) {
	u, ok := Rotor{0, v.X, v.Y, v.Z}.Unit()
	return Vec{u.E23, u.E31, u.E12}, ok
}

// Finite reports whether no coordinate is NaN or infinite.
func (v Vec) Finite() bool { return finite(v.X) && finite(v.Y) && finite(v.Z) }

// Angle returns the angle between the directions of v and w, 0..pi, to full
// accuracy at every angle (W. Kahan's formula, from memory). To the zero vector
// it is zero.
func (v Vec) Angle(w Vec) float64 {
	a, okV := v.Unit()
	b, okW := w.Unit()
	if !okV || !okW {
		return nanUnless(v.Finite() && w.Finite())
	}
	return 2 * math.Atan2(a.Sub(b).Norm(), a.Add(b).Norm())
}

// Plane returns the bivector I v: the plane perpendicular to v, with the sense
// of a right-handed turn about v and area |v|. Plane of e3 is e12.
func (v Vec) Plane() Bivector { return Bivector{v.X, v.Y, v.Z} }

// Bivector is an oriented plane with an area: E23 e2e3 + E31 e3e1 + E12 e1e2.
type Bivector struct{ E23, E31, E12 float64 }

// Axis returns the vector n with B = I n: the axis of a turn in the plane B,
// right-handed. Axis of e12 is e3.
func (b Bivector) Axis() Vec { return Vec{b.E23, b.E31, b.E12} }

// Scale returns s b.
func (b Bivector) Scale(s float64) Bivector { return Bivector{s * b.E23, s * b.E31, s * b.E12} }

// Norm returns the area of b, with the care of [Vec.Norm].
func (b Bivector) Norm() float64 { return norm(b.E23, b.E31, b.E12, 0) }
