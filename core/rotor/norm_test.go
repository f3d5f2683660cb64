package rotor_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/rotor"
)

// TestNorm: the size of numbers does not matter, from the greatest to near the
// least, where squares are far out of range.
func TestNorm(t *testing.T) {
	rng := source()
	for range trials {
		r := randomRotor(rng)
		v := r.Bivector().Axis()
		within(t, 4*ulp, math.Abs(r.Norm()-1), "r = %+v", r)
		for _, exp := range []int{1000, 600, 400, -400, -600, -900} {
			s := math.Ldexp(1, exp)
			within(t, ulp, math.Abs(r.Norm()-r.Scale(s).Norm()/s), "r = %+v, exp %d", r, exp)
			within(t, ulp, math.Abs(v.Norm()-v.Scale(s).Norm()/s), "v = %+v, exp %d", v, exp)
			assert.Equal(t, v.Plane().Norm(), v.Norm())
			u, ok := r.Scale(s).Unit()
			assert.True(t, ok)
			within(t, 4*ulp, gapR(u, r), "r = %+v, exp %d", r, exp)
			w, ok := v.Scale(s).Unit()
			assert.True(t, ok)
			within(t, 4*ulp, math.Abs(w.Norm()-1), "v = %+v, exp %d", v, exp)
			within(t, 4*ulp, w.Cross(v).Norm(), "v = %+v, exp %d", v, exp)
		}
	}
	assert.Equal(t, 5e-324, rotor.Vec{Y: -5e-324}.Norm())
	assert.Equal(t, math.MaxFloat64, rotor.Rotor{S: -math.MaxFloat64}.Norm())
	assert.Equal(t, 0.0, rotor.Rotor{}.Norm())
	assert.Equal(t, 5.0, rotor.Vec{X: 3, Z: -4}.Norm())
}

func TestNotFinite(t *testing.T) {
	inf, nan := math.Inf(1), math.NaN()
	assert.True(t, math.IsInf(rotor.Vec{X: inf}.Norm(), 1))
	assert.True(t, math.IsNaN(rotor.Vec{X: inf, Y: nan}.Norm()))
	assert.True(t, math.IsNaN(rotor.Rotor{E12: nan}.Norm()))
	for i := range 4 {
		for _, x := range []float64{inf, -inf, nan} {
			var c [4]float64
			c[i] = x
			r := rotor.Rotor{S: c[0], E23: c[1], E31: c[2], E12: c[3]}
			assert.False(t, r.Finite())
			u, ok := r.Unit()
			assert.False(t, ok)
			assert.Equal(t, rotor.Rotor{}, u)
			if i > 0 {
				assert.False(t, r.Bivector().Axis().Finite())
			}
		}
	}
	u, ok := rotor.Vec{}.Unit()
	assert.False(t, ok)
	assert.Equal(t, rotor.Vec{}, u)
	assert.True(t, rotor.One.Finite())
}

// TestNothingPanics runs everything on every mixture of awkward numbers.
func TestNothingPanics(t *testing.T) {
	awkward := []float64{0, math.Copysign(0, -1), 1, -1, 5e-324, math.MaxFloat64, math.Inf(1), math.Inf(-1), math.NaN()}
	for _, a := range awkward {
		for _, b := range awkward {
			for _, c := range awkward {
				r, q := rotor.Rotor{S: a, E23: b, E12: c}, rotor.Rotor{S: c, E31: a, E12: b}
				v := rotor.Vec{X: a, Y: b, Z: c}
				r.AxisAngle()
				r.Gibbs()
				r.Unit()
				rotor.Compose(r, q)
				rotor.Mean([]rotor.Rotor{r, q})
				rotor.Between(v, q.Bivector().Axis())
				rotor.Reflections(v, q.Bivector().Axis())
				rotor.FromAxisAngle(v, a)
				rotor.Shadow(v)
				for _, x := range []rotor.Rotor{
					r.Mul(q), rotor.Exp(v.Plane()), rotor.Exp(r.Log()), rotor.FromMRP(v), rotor.FromMRP(r.MRP()), rotor.FromGibbs(v),
					rotor.FromRotationVector(r.RotationVector()), rotor.Slerp(r, q, a), rotor.SlerpLong(r, q, b), rotor.Relative(r, q),
				} {
					x.TurnAngle()
				}
				if r.Finite() && q.Finite() {
					angle := rotor.Angle(r, q)
					assert.True(t, angle >= 0 && angle <= math.Pi, "angle %v between %+v and %+v", angle, r, q)
				} else {
					assert.True(t, math.IsNaN(rotor.Angle(r, q)), "%+v and %+v", r, q)
				}
			}
		}
	}
}
