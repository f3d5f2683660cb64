package rotor

import "math"

// Reflections returns the rotor of two reflections, first in the plane
// perpendicular to a, then in the one perpendicular to b: the product b a of
// the unit vectors. It turns in the plane a ^ b by twice the angle from a to b.
// It reports false, with One, when a vector is zero or not finite.
func Reflections(a, b Vec) (Rotor, bool) {
	a, okA := a.Unit()
	b, okB := b.Unit()
	if !okA || !okB {
		return One, false
	}
	c := a.Cross(b)
	return Rotor{a.Dot(b), -c.X, -c.Y, -c.Z}, true
}

// Between returns the rotor that turns the direction of a into that of b by the
// shorter way, in the plane a ^ b: the reflection in a followed by
// the one in the vector half-way between a and b.
//
// Opposite directions leave the plane open. Between then turns in the plane
// of a and that one of e1, e2, e3 to which a is most nearly perpendicular (the first
// of equals). It reports false, with One, when a vector is zero or not finite.
func Between(a, b Vec) (Rotor, bool) {
	a, okA := a.Unit()
	b, okB := b.Unit()
	if !okA || !okB {
		return One, false
	}
	if cos := a.Dot(b); cos >= 0 {
		// a x b = a x (b - a), without cancellation when b is near a.
		c := a.Cross(b.Sub(a))
		return Rotor{1 + cos, -c.X, -c.Y, -c.Z}.Unit()
	}
	h := a.Add(b) // exact where it matters, when b is near -a
	n := a.Cross(h)
	if n.Norm() < openPlane {
		n = a.Cross(leastAlong(a))
	}
	n, _ = n.Unit()
	cos, sin := h.Norm()/2, a.Sub(b).Norm()/2
	return Rotor{cos, -sin * n.X, -sin * n.Y, -sin * n.Z}.Unit()
}

// openPlane is the sine below which two opposite unit vectors span no plane:
// each coordinate of each is rounded by up to half a unit in the last place,
// 2^-54, and a x (a + b) by as much again.
const openPlane = 0x1p-51

// leastAlong returns the basis vector to which a is most nearly perpendicular.
func leastAlong(a Vec) Vec {
	x, y, z := math.Abs(a.X), math.Abs(a.Y), math.Abs(a.Z)
	switch {
	case x <= y && x <= z:
		return Vec{X: 1}
	case y <= z:
		return Vec{Y: 1}
	}
	return Vec{Z: 1}
}
