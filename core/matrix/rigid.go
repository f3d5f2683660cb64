package matrix

import (
	"math"

	"dextral/core/convention"
	"dextral/core/rotor"
)

// Rigid is the map v -> R v + T of points: for a rigid transform R is a rotation.
type Rigid struct {
	R Mat3
	T rotor.Vec
}

// Apply returns the image of the point v.
func (g Rigid) Apply(v rotor.Vec) rotor.Vec { return g.R.Apply(v).Add(g.T) }

// Mul returns the composition g h: h first, g second.
func (g Rigid) Mul(h Rigid) Rigid { return Rigid{g.R.Mul(h.R), g.Apply(h.T)} }

// Inverse returns (R^T, -R^T T), the inverse when R is orthogonal.
func (g Rigid) Inverse() Rigid {
	back := g.R.Transpose()
	return Rigid{back, back.Apply(g.T).Neg()}
}

// FromRows34 returns the transform of three rows [R | T].
func FromRows34(rows [3][4]float64) Rigid {
	var g Rigid
	for i, row := range rows {
		copy(g.R[i][:], row[:3])
	}
	g.T = rotor.Vec{X: rows[0][3], Y: rows[1][3], Z: rows[2][3]}
	return g
}

// FromFlat12 fills a 3x4 transform [R | T] with twelve numbers in the given
// storage order. It reports false when there are not twelve or the order is
// unstated.
func FromFlat12(twelve []float64, order convention.Storage) (Rigid, bool) {
	var rows [3][4]float64
	if len(twelve) != 12 || order == convention.StorageUnstated {
		return Rigid{}, false
	}
	for i, x := range twelve {
		if order == convention.RowMajor {
			rows[i/4][i%4] = x
		} else {
			rows[i%3][i/3] = x
		}
	}
	return FromRows34(rows), true
}

// FromFlat16 fills a 4x4 transform with sixteen numbers in the given storage
// order. Bottom is how far the bottom row is from 0 0 0 1, its largest
// deviation: a transform written for row vectors, or in the other order, has
// its translation there. It reports false when there are not sixteen numbers or
// the order is unstated.
func FromFlat16(sixteen []float64, order convention.Storage) (g Rigid, bottom float64, ok bool) {
	if len(sixteen) != 16 || order == convention.StorageUnstated {
		return Rigid{}, 0, false
	}
	var rows [4][4]float64
	for i, x := range sixteen {
		if order == convention.RowMajor {
			rows[i/4][i%4] = x
		} else {
			rows[i%4][i/4] = x
		}
	}
	for j, want := range [4]float64{0, 0, 0, 1} {
		bottom = max(bottom, math.Abs(rows[3][j]-want))
	}
	return FromRows34([3][4]float64(rows[:3])), bottom, true
}
