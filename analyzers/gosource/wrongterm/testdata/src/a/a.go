// Package a has rotations with slips in them, and near-misses that are none.
package a

import "math"

// Quat is a unit quaternion.
type Quat struct{ W, X, Y, Z float64 }

// Vec is a vector.
type Vec struct{ X, Y, Z float64 }

// Mat is a rotation matrix, row by row.
type Mat [3][3]float64

func Mul(a, b Quat) Quat { // as it should be
	return Quat{
		W: a.W*b.W - a.X*b.X - a.Y*b.Y - a.Z*b.Z,
		X: a.W*b.X + a.X*b.W + a.Y*b.Z - a.Z*b.Y,
		Y: a.W*b.Y - a.X*b.Z + a.Y*b.W + a.Z*b.X,
		Z: a.W*b.Z + a.X*b.Y - a.Y*b.X + a.Z*b.W,
	}
}

func (a Quat) Times(b Quat) Quat { // want `wrong-term: Quat.Times is not quite the product that its name says: result.Z: found a.Y\*b.Y where -a.Y\*b.X is expected`
	return Quat{
		W: a.W*b.W - a.X*b.X - a.Y*b.Y - a.Z*b.Z,
		X: a.W*b.X + a.X*b.W + a.Y*b.Z - a.Z*b.Y,
		Y: a.W*b.Y - a.X*b.Z + a.Y*b.W + a.Z*b.X,
		Z: a.W*b.Z + a.X*b.Y + a.Y*b.Y + a.Z*b.W,
	}
}

func (a Quat) Sandwich(v Vec) Vec { // silent: it calls what is reported
	r := a.Times(Quat{0, v.X, v.Y, v.Z}).Times(Quat{a.W, -a.X, -a.Y, -a.Z})
	return Vec{r.X, r.Y, r.Z}
}

// ToMatrix has one sign wrong.
func ToMatrix(q Quat) Mat { // want `result\[0\]\[1\]: the term 2\*q.W\*q.Z enters with the wrong sign; off by up to [0-9.]+ deg`
	w, x, y, z := q.W, q.X, q.Y, q.Z
	return Mat{
		{1 - 2*(y*y+z*z), 2 * (x*y + w*z), 2 * (x*z + w*y)},
		{2 * (x*y + w*z), 1 - 2*(x*x+z*z), 2 * (y*z - w*x)},
		{2 * (x*z - w*y), 2 * (y*z + w*x), 1 - 2*(x*x+y*y)},
	}
}

// QuatFromMatrix is wrong in its second branch only.
func QuatFromMatrix(m Mat) Quat { // want `for m\[0\]\[0\] > m\[2\]\[2\] result.Y \(four times its product with result.X\): the term m\[1\]\[0\] enters with the wrong sign`
	if t := m[0][0] + m[1][1] + m[2][2]; t > 0 {
		s := math.Sqrt(t+1) * 2
		return Quat{s / 4, (m[2][1] - m[1][2]) / s, (m[0][2] - m[2][0]) / s, (m[1][0] - m[0][1]) / s}
	}
	if m[0][0] > m[1][1] && m[0][0] > m[2][2] {
		s := math.Sqrt(1+m[0][0]-m[1][1]-m[2][2]) * 2
		return Quat{(m[2][1] - m[1][2]) / s, s / 4, (m[0][1] - m[1][0]) / s, (m[0][2] + m[2][0]) / s}
	}
	if m[1][1] > m[2][2] {
		s := math.Sqrt(1+m[1][1]-m[0][0]-m[2][2]) * 2
		return Quat{(m[0][2] - m[2][0]) / s, (m[0][1] + m[1][0]) / s, s / 4, (m[1][2] + m[2][1]) / s}
	}
	s := math.Sqrt(1+m[2][2]-m[0][0]-m[1][1]) * 2
	return Quat{(m[1][0] - m[0][1]) / s, (m[0][2] + m[2][0]) / s, (m[1][2] + m[2][1]) / s, s / 4}
}

// RGBA is a colour: four numbers that nobody rotates by.
type RGBA struct{ R, G, B, A float64 }

// Mul multiplies by components.
func (c RGBA) Mul(d RGBA) RGBA { return RGBA{c.R * d.R, c.G * d.G, c.B * d.B, c.A * d.A} }

// Shear is a matrix that no rotation is; nobody calls it one.
func Shear(q Quat) Mat {
	return Mat{{1, q.X, 0}, {0, 1, q.Y}, {0, 0, 1}}
}

// FromAxisAngle forgets that the angle is halved.
func FromAxisAngle(axis Vec, angle float64) Quat { // silent: the comment knows
	s, c := math.Sincos(angle)
	return Quat{c, axis.X * s, axis.Y * s, axis.Z * s}
}

// AxisAngleQuat makes a rotation about a unit axis.
func AxisAngleQuat(axis Vec, angle float64) Quat { // want `AxisAngleQuat is not quite the rotation of axis and angle that its name says: it turns by twice what it is given, in radians`
	s, c := math.Sincos(angle)
	return Quat{c, axis.X * s, axis.Y * s, axis.Z * s}
}

// Derivative is that of q for rates in body axes.
func Derivative(q Quat, rate Vec) Quat { // want `Derivative is not quite the quaternion derivative that its name says: it turns by twice`
	return q.product(Quat{0, rate.X, rate.Y, rate.Z})
}

func (a Quat) product(b Quat) Quat { return Mul(a, b) }
