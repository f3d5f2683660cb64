package matrix_test

import (
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/convention"
	"dextral/core/matrix"
	"dextral/core/rotor"
)

// TestRigid: the laws of a group that acts on points, with the inverse
// (R^T, -R^T T) and not (R^T, -T).
func TestRigid(t *testing.T) {
	rng := source()
	for range trials {
		g := matrix.Rigid{R: matrix.FromRotor(randomRotor(rng)), T: randomVec(rng)}
		h := matrix.Rigid{R: matrix.FromRotor(randomRotor(rng)), T: randomVec(rng)}
		p := randomVec(rng)
		bound := 16 * ulp * (1 + p.Norm() + g.T.Norm() + h.T.Norm())
		within(t, bound, gapV(g.Mul(h).Apply(p), g.Apply(h.Apply(p))), "g = %v, h = %v", g, h)
		within(t, bound, gapV(g.Inverse().Apply(g.Apply(p)), p), "g = %v", g)
		one := g.Mul(g.Inverse())
		within(t, bound, gap(one.R, matrix.Identity), "g = %v", g)
		within(t, bound, gapV(one.T, rotor.Vec{}), "g = %v", g)
		within(t, bound, gapV(g.Mul(h).Inverse().T, h.Inverse().Mul(g.Inverse()).T), "g = %v, h = %v", g, h)
	}
}

// TestFlatTransforms: sixteen and twelve numbers in both orders, and what the
// bottom row tells about the wrong order.
func TestFlatTransforms(t *testing.T) {
	want := matrix.Rigid{R: matrix.Mat3{{1, 2, 3}, {4, 5, 6}, {7, 8, 9}}, T: rotor.Vec{X: 10, Y: 20, Z: 30}}
	rows := []float64{1, 2, 3, 10, 4, 5, 6, 20, 7, 8, 9, 30, 0, 0, 0, 1}
	columns := []float64{1, 4, 7, 0, 2, 5, 8, 0, 3, 6, 9, 0, 10, 20, 30, 1}
	for _, c := range []struct {
		numbers []float64
		order   convention.Storage
	}{{rows, convention.RowMajor}, {columns, convention.ColumnMajor}} {
		g, bottom, ok := matrix.FromFlat16(c.numbers, c.order)
		assert.True(t, ok)
		assert.Equal(t, want, g)
		assert.Zero(t, bottom)
	}
	g, ok := matrix.FromFlat12(rows[:12], convention.RowMajor)
	assert.True(t, ok)
	assert.Equal(t, want, g)
	g, ok = matrix.FromFlat12([]float64{1, 4, 7, 2, 5, 8, 3, 6, 9, 10, 20, 30}, convention.ColumnMajor)
	assert.True(t, ok)
	assert.Equal(t, want, g)
	assert.Equal(t, want, matrix.FromRows34([3][4]float64{{1, 2, 3, 10}, {4, 5, 6, 20}, {7, 8, 9, 30}}))

	_, bottom, ok := matrix.FromFlat16(columns, convention.RowMajor)
	assert.True(t, ok)
	assert.Equal(t, 30.0, bottom, "the translation stands in the bottom row")
	rows[15] = 0.5
	_, bottom, _ = matrix.FromFlat16(rows, convention.RowMajor)
	assert.Equal(t, 0.5, bottom)

	for _, bad := range [][]float64{nil, rows[:15], rows[:9]} {
		_, _, ok := matrix.FromFlat16(bad, convention.RowMajor)
		assert.False(t, ok)
		_, ok = matrix.FromFlat12(bad, convention.RowMajor)
		assert.False(t, ok)
	}
	_, _, ok = matrix.FromFlat16(rows, convention.StorageUnstated)
	assert.False(t, ok)
	_, ok = matrix.FromFlat12(rows[:12], convention.StorageUnstated)
	assert.False(t, ok)
}
