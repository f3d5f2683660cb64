package matrix_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/convention"
	"dextral/core/matrix"
	"dextral/core/rotor"
)

// special turns: none, and thirds, quarters and halves of a turn about axes
// and diagonals. At half turns traces and scalar parts vanish.
func special() []rotor.Rotor {
	var all []rotor.Rotor
	for _, axis := range []rotor.Vec{
		{X: 1}, {Y: 1}, {Z: 1}, {X: 1, Y: 1}, {Y: 1, Z: -1}, {Z: 1, X: 1}, {X: 1, Y: 1, Z: 1}, {X: -1, Y: 2, Z: 3},
	} {
		for _, angle := range []float64{0, math.Pi / 3, math.Pi / 2, 2 * math.Pi / 3, math.Pi, 3 * math.Pi / 2} {
			r, _ := rotor.FromAxisAngle(axis, angle)
			all = append(all, r, r.Neg())
		}
	}
	return all
}

// TestFromRotor: the matrix does what the sandwich does, its columns are the
// images of the basis, and it is a proper rotation. Elements are wrong by up to
// four ulp, a trace by three of them, a determinant by somewhat more.
func TestFromRotor(t *testing.T) {
	rng := source()
	for i := range trials {
		r := randomRotor(rng)
		if i < len(special()) {
			r = special()[i]
		}
		m, v := matrix.FromRotor(r), randomVec(rng)
		within(t, 8*ulp*v.Norm(), gapV(m.Apply(v), r.Rotate(v)), "r = %+v, v = %+v", r, v)
		for j, e := range []rotor.Vec{{X: 1}, {Y: 1}, {Z: 1}} {
			within(t, 4*ulp, gapV(m.Column(j), r.Rotate(e)), "column %d, r = %+v", j, r)
		}
		within(t, 16*ulp, matrix.Defect(m), "r = %+v", r)
		within(t, 16*ulp, math.Abs(m.Det()-1), "determinant, r = %+v", r)
		within(t, 16*ulp, math.Abs(m.Trace()-(1+2*math.Cos(r.TurnAngle()))), "trace, r = %+v", r)
		assert.Equal(t, m, matrix.FromRotor(r.Neg()), "-R is the same rotation")
		within(t, 2*ulp, gap(m.Transpose(), matrix.FromRotor(r.Reverse())), "the reverse is the transpose, r = %+v", r)
		q := randomRotor(rng)
		within(t, 16*ulp, gap(m.Mul(matrix.FromRotor(q)), matrix.FromRotor(r.Mul(q))), "M(r) M(q) = M(r q)")
	}
}

// TestRotor: the way back is stable at every trace, those around -1, where
// formulas that divide by the scalar part break down, among them.
func TestRotor(t *testing.T) {
	rng := source()
	for i := range 4 * trials {
		r := randomRotor(rng)
		switch {
		case i < len(special()):
			r = special()[i]
		case i%4 > 0: // almost half a turn, or almost none
			angle := []float64{0, math.Pi, -math.Pi}[i%3] + math.Pow(10, -17*rng.Float64())
			r, _ = rotor.FromAxisAngle(randomVec(rng), angle)
		}
		back := matrix.FromRotor(r).Rotor()
		within(t, 8*ulp, sameRotation(back, r), "r = %+v", r)
		within(t, 2*ulp, math.Abs(back.Norm()-1), "norm, r = %+v", r)
	}
}

// TestRotorOfRounded: float32 and six printed digits stay near, and the result
// is a unit rotor all the same.
func TestRotorOfRounded(t *testing.T) {
	rng := source()
	for range trials {
		r := randomRotor(rng)
		m := matrix.FromRotor(r)
		for _, digit := range []float64{0x1p-24, 1e-6} {
			n := m
			for i := range n {
				for j := range n[i] {
					n[i][j] = digit * math.Round(n[i][j]/digit)
				}
			}
			// A row of the table is a sum of up to four elements, each wrong by
			// up to digit/2, in each of four components, over a norm of at
			// least two.
			within(t, 2*digit, sameRotation(n.Rotor(), r), "r = %+v, digit %g", r, digit)
			within(t, 2*ulp, math.Abs(n.Rotor().Norm()-1), "norm, r = %+v", r)
		}
	}
	assert.Equal(t, rotor.One, matrix.Identity.Rotor())
	assert.Equal(t, rotor.One, matrix.Mat3{}.Rotor(), "no rotation, no panic")
	assert.False(t, matrix.Mat3{{math.NaN()}}.Rotor().Finite())
}

func TestElements(t *testing.T) {
	m := matrix.Mat3{{1, 2, 3}, {4, 5, 6}, {7, 8, 10}}
	assert.Equal(t, rotor.Vec{X: 4, Y: 5, Z: 6}, m.Row(1))
	assert.Equal(t, rotor.Vec{X: 2, Y: 5, Z: 8}, m.Column(1))
	assert.Equal(t, m, matrix.FromColumns(m.Column(0), m.Column(1), m.Column(2)))
	assert.Equal(t, m.Transpose(), matrix.FromColumns(m.Row(0), m.Row(1), m.Row(2)))
	assert.Equal(t, 16.0, m.Trace())
	assert.Equal(t, -3.0, m.Det())
	assert.Equal(t, matrix.Mat3{{2, 4, 6}, {8, 10, 12}, {14, 16, 20}}, m.Scale(2))
	assert.Equal(t, m, m.Scale(2).Sub(m))
	assert.Equal(t, rotor.Vec{X: 14, Y: 32, Z: 53}, m.Apply(rotor.Vec{X: 1, Y: 2, Z: 3}))
	assert.Equal(t, m, m.Mul(matrix.Identity))
	assert.Equal(t, matrix.Mat3{{0, 1, 3}, {0, 4, 6}, {0, 7, 10}}, m.Mul(matrix.Mat3{{0, 1, 0}, {0, 0, 0}, {0, 0, 1}}), "columns are taken")
	within(t, 16*ulp, math.Abs(m.Norm()-math.Sqrt(304)), "norm")
	assert.True(t, m.Finite())
	for i := range 9 {
		n := m
		n[i/3][i%3] = math.Inf(-1)
		assert.False(t, n.Finite())
		assert.True(t, math.IsInf(n.Norm(), 1))
	}
}

func TestFromFlat(t *testing.T) {
	nine := []float64{1, 2, 3, 4, 5, 6, 7, 8, 9}
	rows, ok := matrix.FromFlat(nine, convention.RowMajor)
	assert.True(t, ok)
	assert.Equal(t, matrix.Mat3{{1, 2, 3}, {4, 5, 6}, {7, 8, 9}}, rows)
	columns, ok := matrix.FromFlat(nine, convention.ColumnMajor)
	assert.True(t, ok)
	assert.Equal(t, rows.Transpose(), columns)
	for _, bad := range [][]float64{nil, nine[:8], append(nine, 10)} {
		_, ok := matrix.FromFlat(bad, convention.RowMajor)
		assert.False(t, ok)
	}
	_, ok = matrix.FromFlat(nine, convention.StorageUnstated)
	assert.False(t, ok)
}
