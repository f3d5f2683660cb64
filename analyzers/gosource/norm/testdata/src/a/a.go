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

// Normalized has norm one.
func (q Quat) Normalized() Quat {
	n := math.Sqrt(q.W*q.W + q.X*q.X + q.Y*q.Y + q.Z*q.Z)
	return Quat{q.W / n, q.X / n, q.Y / n, q.Z / n}
}

// Inverse undoes q.
func (q Quat) Inverse() Quat { // want `norm-not-kept: Quat.Inverse is called inverse and computes the conjugate`
	return Quat{q.W, -q.X, -q.Y, -q.Z}
}

// Inv undoes a unit quaternion.
func (q Quat) Inv() Quat { return Quat{q.W, -q.X, -q.Y, -q.Z} }

// Advance integrates a body rate.
func (q Quat) Advance(w [3]float64, dt float64) Quat { // want `norm-not-kept: Quat.Advance integrates to first order and does not normalise: after 1000 steps of 0.01 rad the norm has grown to 1.0126`
	d := q.Mul(Quat{0, w[0] * dt / 2, w[1] * dt / 2, w[2] * dt / 2})
	return Quat{q.W + d.W, q.X + d.X, q.Y + d.Y, q.Z + d.Z}
}
