package a

import "math"

// Quat is a rotation.
type Quat struct{ W, X, Y, Z float64 }

// Mul composes two rotations.
func (a Quat) Mul(b Quat) Quat {
	return Quat{
		a.W*b.W - a.X*b.X - a.Y*b.Y - a.Z*b.Z,
		a.W*b.X + a.X*b.W + a.Y*b.Z - a.Z*b.Y,
		a.W*b.Y - a.X*b.Z + a.Y*b.W + a.Z*b.X,
		a.W*b.Z + a.X*b.Y - a.Y*b.X + a.Z*b.W,
	}
}

// Rotate turns a vector.
func (q Quat) Rotate(v [3]float64) [3]float64 {
	x, y, z := q.W*v[0]+q.Y*v[2]-q.Z*v[1], q.W*v[1]+q.Z*v[0]-q.X*v[2], q.W*v[2]+q.X*v[1]-q.Y*v[0]
	return [3]float64{v[0] + 2*(q.Y*z-q.Z*y), v[1] + 2*(q.Z*x-q.X*z), v[2] + 2*(q.X*y-q.Y*x)}
}

// Conj reverses a rotation.
func (q Quat) Conj() Quat { return Quat{q.W, -q.X, -q.Y, -q.Z} }

// FromAxisAngle turns about a unit axis.
func FromAxisAngle(axis [3]float64, a float64) Quat { // want `conventions-mixed: FromAxisAngle computes the rotation of axis and angle with Quat stored as x y z w; [23] other functions`
	s, c := math.Sincos(a / 2)
	return Quat{axis[0] * s, axis[1] * s, axis[2] * s, c}
}
