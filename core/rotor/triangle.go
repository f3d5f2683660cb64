package rotor

import "math"

// Triangle shows the composition of two turns on the unit sphere.
//
// A rotor is an arc: if R = v u, then R is the arc from the point u to the
// point v, which lies in the plane of R and is half as long as its turn, and
// which may slide along its great circle. Slide two arcs until one begins
// where the other ends, at V, where their planes meet:
//
//	b = V U    a = W V    a b = W V V U = W U
//
// so the product closes the triangle (O. Rodrigues 1840, W. R. Hamilton 1843).
// Its sides are half angles, and the angles between its planes obey spherical
// trigonometry:
//
//	cos C = cos A cos B + sin A sin B cos AtV
//	sin A / sin AtU = sin B / sin AtW = sin C / sin AtV
//
// AtV is the supplement of the angle between the axes of a and b, and AtU and
// AtW are the angles that the axis of a b makes with those of b and a.
type Triangle struct {
	U, V, W Vec
	// A, B and C are half the turns of a, b and a b, 0..pi: the sides V W,
	// U V and U W.
	A, B, C float64
	// AtU, AtV and AtW are the angles at the corners, 0..pi.
	AtU, AtV, AtW float64
}

// Compose returns the triangle of two unit rotors and their product a b. It
// reports false when one of the three is 1 or -1 and so has no plane of its
// own: corners and sides are right even then, but the angles are zero.
func Compose(a, b Rotor) (Triangle, bool) {
	c := a.Mul(b)
	v := commonLine(a.Bivector(), b.Bivector())
	m := v.Multivector()
	t := Triangle{
		U: m.Mul(b.Multivector()).Vec(),
		V: v,
		W: a.Multivector().Mul(m).Vec(),
		A: a.Log().Norm(), B: b.Log().Norm(), C: c.Log().Norm(),
	}
	na, okA := a.Bivector().Axis().Neg().Unit()
	nb, okB := b.Bivector().Axis().Neg().Unit()
	nc, okC := c.Bivector().Axis().Neg().Unit()
	if !okA || !okB || !okC {
		return t, false
	}
	t.AtU, t.AtV, t.AtW = nb.Angle(nc), math.Pi-na.Angle(nb), na.Angle(nc)
	return t, true
}

// commonLine returns a unit vector that lies in both planes: perpendicular to
// both axes or, when they are parallel up to rounding, to the longer one.
func commonLine(a, b Bivector) Vec {
	na, nb := a.Axis(), b.Axis()
	if nb.Norm() > na.Norm() {
		na, nb = nb, na
	}
	na, ok := na.Unit()
	if !ok {
		return Vec{X: 1}
	}
	nb, _ = nb.Unit()
	n := crossUnits(na, nb)
	if n.Norm() < openPlane {
		n = na.Cross(leastAlong(na))
	}
	n, _ = n.Unit()
	return n
}
