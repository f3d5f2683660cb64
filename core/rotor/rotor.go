package rotor

import "math"

// Rotor is an even multivector S + E23 e2e3 + E31 e3e1 + E12 e1e2. It is a
// rotor proper, and stands for a rotation, when its norm is one; the product,
// reverse and norm hold for every even multivector.
type Rotor struct{ S, E23, E31, E12 float64 }

// One is the rotor that turns nothing.
var One = Rotor{S: 1}

// Mul returns the geometric product r q. As a rotation it is q first, r second.
func (r Rotor) Mul(q Rotor) Rotor {
	return Rotor{
		S:   r.S*q.S - r.E23*q.E23 - r.E31*q.E31 - r.E12*q.E12,
		E23: r.S*q.E23 + r.E23*q.S - r.E31*q.E12 + r.E12*q.E31,
		E31: r.S*q.E31 + r.E31*q.S - r.E12*q.E23 + r.E23*q.E12,
		E12: r.S*q.E12 + r.E12*q.S - r.E23*q.E31 + r.E31*q.E23,
	}
}

// Reverse returns r~, the product of the same vectors in reverse order. Of a
// unit rotor it is the inverse.
func (r Rotor) Reverse() Rotor { return Rotor{r.S, -r.E23, -r.E31, -r.E12} }

// Neg returns -r: the same rotation, reached by the turn the other way round.
func (r Rotor) Neg() Rotor { return Rotor{-r.S, -r.E23, -r.E31, -r.E12} }

// Add returns r + q.
func (r Rotor) Add(q Rotor) Rotor {
	return Rotor{r.S + q.S, r.E23 + q.E23, r.E31 + q.E31, r.E12 + q.E12}
}

// Sub returns r - q.
func (r Rotor) Sub(q Rotor) Rotor {
	return Rotor{r.S - q.S, r.E23 - q.E23, r.E31 - q.E31, r.E12 - q.E12}
}

// Scale returns s r.
func (r Rotor) Scale(s float64) Rotor { return Rotor{s * r.S, s * r.E23, s * r.E31, s * r.E12} }

// Dot returns the scalar part of r~ q: the scalar product of the two as
// 4-vectors. For unit rotors it is the cosine of half the angle between them.
func (r Rotor) Dot(q Rotor) float64 {
	return r.S*q.S + r.E23*q.E23 + r.E31*q.E31 + r.E12*q.E12
}

// Bivector returns the bivector part of r.
func (r Rotor) Bivector() Bivector { return Bivector{r.E23, r.E31, r.E12} }

// Norm returns the square root of the scalar part of r~ r, the length of r as
// a 4-vector, with the care of [Vec.Norm].
func (r Rotor) Norm() float64 { return norm4(r.S, r.E23, r.E31, r.E12) }

// Unit returns r at norm one. It reports false, with the zero multivector,
// when r is zero or not finite.
func (r Rotor) Unit() (Rotor, bool) {
	if n := r.Dot(r); n >= smallSum && n <= largeSum {
		return r.Scale(1 / math.Sqrt(n)), true
	}
	top := max(math.Abs(r.S), math.Abs(r.E23), math.Abs(r.E31), math.Abs(r.E12))
	if top == 0 || !finite(top) {
		return Rotor{}, false
	}
	_, e := math.Frexp(top)
	s := Rotor{math.Ldexp(r.S, -e), math.Ldexp(r.E23, -e), math.Ldexp(r.E31, -e), math.Ldexp(r.E12, -e)}
	return s.Scale(1 / math.Sqrt(s.Dot(s))), true
}

// Finite reports whether no component is NaN or infinite.
func (r Rotor) Finite() bool {
	return finite(r.S) && finite(r.E23) && finite(r.E31) && finite(r.E12)
}

// Rotate returns the sandwich r v r~ of a unit rotor.
//
// Of the unit rotor it uses that r r~ = 1, which saves a third of the work: with an r
// of norm n it returns v + n^2 (v' - v), v' the turned vector.
func (r Rotor) Rotate(v Vec) Vec {
	// v' = v + s t + t x b with b the axis of the bivector part, t = 2 v x b.
	tx := 2 * (v.Y*r.E12 - v.Z*r.E31)
	ty := 2 * (v.Z*r.E23 - v.X*r.E12)
	tz := 2 * (v.X*r.E31 - v.Y*r.E23)
	return Vec{
		v.X + r.S*tx + (ty*r.E12 - tz*r.E31),
		v.Y + r.S*ty + (tz*r.E23 - tx*r.E12),
		v.Z + r.S*tz + (tx*r.E31 - ty*r.E23),
	}
}

// RotateBivector returns the sandwich r b r~ of a unit rotor. The pseudoscalar
// commutes with every rotor, so a plane turns as its axis does.
func (r Rotor) RotateBivector(b Bivector) Bivector { return r.Rotate(b.Axis()).Plane() }
