package matrix_test

import (
	"math"
	"slices"
	"testing"

	"github.com/stretchr/testify/assert"
	"gonum.org/v1/gonum/mat"

	"dextral/core/matrix"
)

// decomposition is gonum's singular value decomposition m = u diag(s) v^T, the
// outside view of the nearest rotation.
func decomposition(m matrix.Mat3) (u, v matrix.Mat3, s []float64) {
	var svd mat.SVD
	if !svd.Factorize(mat.NewDense(3, 3, slices.Concat(m[0][:], m[1][:], m[2][:])), mat.SVDFull) {
		panic("no decomposition")
	}
	var du, dv mat.Dense
	svd.UTo(&du)
	svd.VTo(&dv)
	for i := range 3 {
		for j := range 3 {
			u[i][j], v[i][j] = du.At(i, j), dv.At(i, j)
		}
	}
	return u, v, svd.Values(nil)
}

// compose returns u diag(s) v^T.
func compose(u, v matrix.Mat3, s ...float64) matrix.Mat3 {
	return u.Mul(matrix.Mat3{{s[0]}, {0, s[1]}, {0, 0, s[2]}}).Mul(v.Transpose())
}

// TestNearest compares with gonum: u v^T, with the sign of the last axis such
// that the determinant is positive. What separates the best rotation from
// another is twice the sum of the two least singular values, the last one with
// the sign of the determinant.
func TestNearest(t *testing.T) {
	rng := source()
	for i := range trials {
		m := randomMat(rng)
		if i%2 == 0 {
			m = noisy(rng, matrix.FromRotor(randomRotor(rng)), math.Pow(10, -15*rng.Float64()))
		}
		u, v, s := decomposition(m)
		sign := math.Copysign(1, u.Det()*v.Det())
		bound := 64 * ulp * s[0] / (s[1] + sign*s[2])

		got, distance, ok := matrix.Nearest(m)
		assert.True(t, ok)
		want := compose(u, v, 1, 1, sign)
		within(t, bound, gap(got, want), "m = %v", m)
		wantDistance := math.Sqrt((s[0]-1)*(s[0]-1) + (s[1]-1)*(s[1]-1) + (sign*s[2]-1)*(sign*s[2]-1))
		within(t, 3*bound, math.Abs(distance-wantDistance), "distance, m = %v", m)
		within(t, 16*ulp, matrix.Defect(got), "a rotation, m = %v", m)
		within(t, 16*ulp, math.Abs(got.Det()-1), "a proper one, m = %v", m)

		polar, polarDistance, ok := matrix.NearestOrthogonal(m)
		assert.True(t, ok)
		bound = 64 * ulp * s[0] / (s[1] + s[2])
		within(t, bound, gap(polar, u.Mul(v.Transpose())), "polar, m = %v", m)
		within(t, 3*bound, math.Abs(polarDistance-matrix.Mat3{{s[0] - 1}, {0, s[1] - 1}, {0, 0, s[2] - 1}}.Norm()), "polar distance, m = %v", m)
		assert.Equal(t, math.Signbit(m.Det()), math.Signbit(polar.Det()))
	}
}

// TestNearestOfRotations: rotations are their own nearest, and errors of size e
// lead to a rotation no farther than e.
func TestNearestOfRotations(t *testing.T) {
	rng := source()
	for i := range trials {
		r := randomRotor(rng)
		if i < len(special()) {
			r = special()[i]
		}
		m := matrix.FromRotor(r)
		got, distance, ok := matrix.Nearest(m)
		assert.True(t, ok)
		within(t, 16*ulp, gap(got, m), "m = %v", m)
		within(t, 32*ulp, distance, "m = %v", m)

		n := noisy(rng, m, 1e-4)
		e := n.Sub(m).Norm()
		_, distance, ok = matrix.Nearest(n)
		assert.True(t, ok)
		assert.LessOrEqual(t, distance, e)
		assert.LessOrEqual(t, matrix.Defect(n), 2*e+e*e, "the defect of R + E is R^T E + E^T R + E^T E")
	}
}

// TestNearestUndetermined: too low a rank, a mirror, infinities.
func TestNearestUndetermined(t *testing.T) {
	rng := source()
	for range trials {
		u, v := matrix.FromRotor(randomRotor(rng)), matrix.FromRotor(randomRotor(rng))
		for _, c := range []struct {
			what             string
			s                []float64
			rotation, either bool
		}{
			{"rank one", []float64{2, 0, 0}, false, false},
			{"rank two", []float64{2, 1, 0}, true, true},
			{"a mirror", []float64{1, 1, -1}, false, true},
			{"the least two equal, mirrored", []float64{2, 1, -1}, false, true},
			{"the least one mirrored", []float64{2, 1, -.5}, true, true},
			{"all mirrored", []float64{-1, -1, -1}, false, true},
		} {
			m := compose(u, v, c.s...)
			r, distance, ok := matrix.Nearest(m)
			assert.Equal(t, c.rotation, ok, "%s: %v", c.what, m)
			if !ok {
				assert.Equal(t, matrix.Identity, r)
				assert.Zero(t, distance)
			}
			_, _, ok = matrix.NearestOrthogonal(m)
			assert.Equal(t, c.either, ok, "%s, with mirrors: %v", c.what, m)
		}
	}
	for _, m := range []matrix.Mat3{{}, {{math.NaN()}}, {{1}, {0, math.Inf(1)}, {0, 0, 1}}} {
		_, _, ok := matrix.Nearest(m)
		assert.False(t, ok, "%v", m)
		_, _, ok = matrix.NearestOrthogonal(m)
		assert.False(t, ok, "%v", m)
		_, _, ok = matrix.Scale(m)
		assert.False(t, ok, "%v", m)
	}
}

// TestMirrorsOfAnySize: the sign of a determinant that is itself out of range.
func TestMirrorsOfAnySize(t *testing.T) {
	for _, size := range []float64{1e-300, 1e-150, 1, 1e150, 1e300} {
		q, _, ok := matrix.NearestOrthogonal(matrix.Mat3{{size}, {0, 2 * size}, {0, 0, -3 * size}})
		assert.True(t, ok)
		within(t, 4*ulp, gap(q, matrix.Mat3{{1}, {0, 1}, {0, 0, -1}}), "size %g", size)
	}
}

// TestScale: a common factor is found whatever its size, with what remains
// measured as a part of it.
func TestScale(t *testing.T) {
	rng := source()
	for range trials {
		m := matrix.FromRotor(randomRotor(rng))
		factor := math.Exp(20 * rng.NormFloat64())
		s, residual, ok := matrix.Scale(m.Scale(factor))
		assert.True(t, ok)
		within(t, 16*ulp*factor, math.Abs(s-factor), "m = %v, factor %g", m, factor)
		within(t, 64*ulp, residual, "m = %v, factor %g", m, factor)

		n := noisy(rng, m, 0.01)
		_, _, values := decomposition(n)
		s, residual, ok = matrix.Scale(n.Scale(factor))
		assert.True(t, ok)
		mean := (values[0] + values[1] + values[2]) / 3
		within(t, 32*ulp*factor, math.Abs(s-factor*mean), "the mean singular value, n = %v", n)
		spread := matrix.Mat3{{values[0]/mean - 1}, {0, values[1]/mean - 1}, {0, 0, values[2]/mean - 1}}.Norm()
		within(t, 64*ulp, math.Abs(residual-spread), "their spread, n = %v", n)
	}
	_, _, ok := matrix.Scale(matrix.Identity.Scale(-2))
	assert.False(t, ok, "a mirror")
	for _, factor := range []float64{1e-300, 1e300} {
		s, _, ok := matrix.Scale(matrix.Identity.Scale(factor))
		assert.True(t, ok)
		within(t, 4*ulp*factor, math.Abs(s-factor), "factor %g", factor)
	}
}

// TestWahba: the rotor that best carries vectors onto others is the peak of the
// same form, built from pairs instead of a matrix.
func TestWahba(t *testing.T) {
	rng := source()
	for range 200 {
		r := randomRotor(rng)
		var m matrix.Mat3
		for range 4 {
			v := randomVec(rng)
			w := r.Rotate(v)
			m = m.Sub(matrix.FromColumns(w.Scale(v.X), w.Scale(v.Y), w.Scale(v.Z)).Scale(-1)) // + w v^T
		}
		got, _, ok := matrix.Nearest(m)
		assert.True(t, ok)
		_, _, s := decomposition(m)
		within(t, 64*ulp*s[0]/s[1], gap(got, matrix.FromRotor(r)), "r = %+v", r)
	}
}
