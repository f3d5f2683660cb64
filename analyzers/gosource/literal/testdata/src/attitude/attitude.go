// Package attitude has types whose package name says what they are.
package attitude

// Quaternion is w + x i + y j + z k.
type Quaternion struct{ W, X, Y, Z float64 }

type Matrix [3][3]float64

type Vector struct{ X, Y, Z float64 }

func (q Quaternion) Normalize() Quaternion { return q }

func (q *Quaternion) SetScalar(w float64) { q.W = w }

func Normalise(q Quaternion) Quaternion { return q }

func Rotate(q Quaternion, v Vector) Vector { return v }
