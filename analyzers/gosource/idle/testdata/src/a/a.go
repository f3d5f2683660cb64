package a

import "math"

// Quat is a rotation.
type Quat struct{ W, X, Y, Z float64 }

// Rotate turns a vector.
func (q Quat) Rotate(v [3]float64) [3]float64 {
	x, y, z := q.W*v[0]+q.Y*v[2]-q.Z*v[1], q.W*v[1]+q.Z*v[0]-q.X*v[2], q.W*v[2]+q.X*v[1]-q.Y*v[0]
	return [3]float64{v[0] + 2*(q.Y*z-q.Z*y), v[1] + 2*(q.Z*x-q.X*z), v[2] + 2*(q.X*y-q.Y*x)}
}

// Mix does not use its fraction.
func Mix(a, b Quat, t float64) Quat {
	w, x, y, z := a.W+b.W, a.X+b.X, a.Y+b.Y, a.Z+b.Z
	n := math.Sqrt(w*w + x*x + y*y + z*z)
	return Quat{w / n, x / n, y / n, z / n}
}

func Middle(a, b Quat, _ float64) Quat { return Mix(a, b, 0) }

// Conjugate changes q.
func (q *Quat) Conjugate() Quat { // want `receiver-changed: Quat.Conjugate returns a value and changes its receiver`
	q.X, q.Y, q.Z = -q.X, -q.Y, -q.Z
	return *q
}

// Conj does not.
func (q *Quat) Conj() Quat { return Quat{q.W, -q.X, -q.Y, -q.Z} }

// Flip says what it does.
func (q *Quat) Flip() *Quat {
	q.W, q.X, q.Y, q.Z = -q.W, -q.X, -q.Y, -q.Z
	return q
}
