package rotor

import "math"

// Reflections returns the rotor of two reflections, first in the plane
// perpendicular to a, then in the one perpendicular to b: the product b a of
// the unit vectors. It turns in the plane a ^ b by twice the angle from a to
// b. It reports false, with One, when a vector is zero or not finite.
func Reflections(a, b Vec) (Rotor, bool) {
	a, okA := a.Unit()
	b, okB := b.Unit()
	if !okA || !okB {
		return One, false
	}
	n := crossUnits(a, b)
	return Rotor{a.Dot(b), -n.X, -n.Y, -n.Z}, true
}

// Between returns the rotor that turns the direction of a into that of b the
// shorter way, in the plane a ^ b: the reflection in a followed by the one in
// the vector half-way between a and b. It is accurate at every angle.
//
// Opposite directions leave the plane open. Between then turns in the plane of
// a and of that one of e1, e2, e3 to which a is most nearly perpendicular, the
// first of equals. It reports false, with One, when a vector is zero or not
// finite.
func Between(a, b Vec) (Rotor, bool) {
	a, okA := a.Unit()
	b, okB := b.Unit()
	if !okA || !okB {
		return One, false
	}
	n := crossUnits(a, b)
	cos := a.Dot(b)
	if cos >= 0 {
		// h a with h = a + b, up to its norm.
		return Rotor{1 + cos, -n.X, -n.Y, -n.Z}.Unit()
	}
	// Towards opposite vectors 1 + cos would cancel; the lengths of a + b and
	// a - b, twice the cosine and sine of half the angle, do not.
	if n.Norm() < openPlane {
		n = a.Cross(leastAlong(a))
	}
	n, _ = n.Unit()
	n = n.Scale(a.Sub(b).Norm())
	return Rotor{a.Add(b).Norm(), -n.X, -n.Y, -n.Z}.Unit()
}

// openPlane is the sine of the angle below which two unit vectors span no
// plane of their own. Each coordinate is rounded by up to 2^-54, which moves
// each vector by up to sqrt(3) 2^-54 and their cross product by the sum,
// 2^-52.2. A result that treats them as parallel is wrong by no more than this
// angle.
const openPlane = 0x1p-51

// crossUnits returns a x b of unit vectors as a x (b - a) or a x (b + a).
// Between nearly parallel vectors one of the two is exact, and the product
// keeps its relative accuracy.
func crossUnits(a, b Vec) Vec {
	if a.Dot(b) < 0 {
		return a.Cross(b.Add(a))
	}
	return a.Cross(b.Sub(a))
}

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
