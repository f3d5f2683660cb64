package rotor_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/rotor"
)

// sameRotation is the gap between rotations, up to sign.
func sameRotation(a, b rotor.Rotor) float64 { return min(gapR(a, b), gapR(a, b.Neg())) }

// TestParameterRoundTrips: every set of parameters gives the rotation back, for
// r and -r alike, at special turns and around them. Rounding in the Gibbs
// vector is relative, so its rotor is as accurate at large vectors.
func TestParameterRoundTrips(t *testing.T) {
	rng := source()
	for i := range trials {
		r := randomTurn(rng)
		if i < len(special()) {
			r = special()[i]
		}
		for _, r := range []rotor.Rotor{r, r.Neg(), r.Scale(7)} {
			unit, _ := r.Unit()
			axis, angle := r.AxisAngle()
			back, ok := rotor.FromAxisAngle(axis, angle)
			assert.True(t, ok)
			within(t, 8*ulp, sameRotation(back, unit), "axis and angle, r = %+v", r)
			within(t, 4*ulp, math.Abs(axis.Norm()-1), "axis, r = %+v", r)
			assert.True(t, angle >= 0 && angle <= math.Pi, "angle %v", angle)

			v := r.RotationVector()
			within(t, 8*ulp, sameRotation(rotor.FromRotationVector(v), unit), "rotation vector, r = %+v", r)
			within(t, 8*ulp, gapV(v, axis.Scale(angle)), "axis times angle, r = %+v", r)

			p := r.MRP()
			within(t, 8*ulp, sameRotation(rotor.FromMRP(p), unit), "MRP, r = %+v", r)
			within(t, 8*ulp, gapV(p, axis.Scale(math.Tan(angle/4))), "axis times tan(angle/4), r = %+v", r)
			assert.LessOrEqual(t, p.Norm(), 1+2*ulp)
			if far, ok := rotor.Shadow(p); ok {
				within(t, 8*ulp, sameRotation(rotor.FromMRP(far), unit), "shadow, r = %+v", r)
				within(t, 8*ulp, gapR(rotor.FromMRP(far), rotor.FromMRP(p).Neg()), "the shadow is the turn the other way round, r = %+v", r)
			}

			if g, ok := r.Gibbs(); ok {
				within(t, 8*ulp, sameRotation(rotor.FromGibbs(g), unit), "Gibbs, r = %+v", r)
				if tan := math.Tan(angle / 2); angle < 3 {
					within(t, 64*ulp*(1+tan*tan), gapV(g, axis.Scale(tan)), "axis times tan(angle/2), r = %+v", r)
				}
			}
		}
	}
}

// TestTinyTurns: parameters of tiny turns are proportional to the turn, to
// full relative accuracy, where 1 - cos has long lost everything.
func TestTinyTurns(t *testing.T) {
	for _, size := range []float64{1e-4, 1e-8, 1e-12, 1e-100, 1e-200, 1e-300} {
		v := rotor.Vec{X: size, Y: -2 * size, Z: 3 * size}
		r := rotor.FromRotationVector(v)
		cubic := size * size // of the terms left out, relative
		within(t, 8*ulp*size, gapV(r.RotationVector(), v), "rotation vector of size %g", size)
		within(t, (8*ulp+2*cubic)*size, gapV(r.MRP(), v.Scale(1./4)), "MRP of size %g", size)
		g, ok := r.Gibbs()
		assert.True(t, ok)
		within(t, (8*ulp+4*cubic)*size, gapV(g, v.Scale(1./2)), "Gibbs of size %g", size)
		_, angle := r.AxisAngle()
		within(t, 8*ulp*angle, math.Abs(angle-v.Norm()), "angle of size %g", size)
	}
}

func TestParameterEnds(t *testing.T) {
	axis, angle := rotor.One.AxisAngle()
	assert.Equal(t, rotor.Vec{Z: 1}, axis, "documented choice")
	assert.Zero(t, angle)
	axis, angle = rotor.One.Neg().AxisAngle()
	assert.Equal(t, rotor.Vec{Z: 1}, axis)
	assert.Zero(t, angle)

	_, ok := rotor.Rotor{E12: 1}.Gibbs()
	assert.False(t, ok, "half turn")
	// A Gibbs vector of any finite length is a rotation.
	within(t, ulp, gapR(rotor.FromGibbs(rotor.Vec{X: 1e300}), rotor.Rotor{S: 1e-300, E23: -1}), "nearly a half turn")

	_, ok = rotor.Shadow(rotor.Vec{})
	assert.False(t, ok)
	far, ok := rotor.Shadow(rotor.Vec{Y: 1e-300})
	assert.True(t, ok)
	within(t, 1e285, gapV(far, rotor.Vec{Y: -1e300}), "shadow of a tiny turn")
	within(t, ulp, gapR(rotor.FromMRP(far), rotor.Rotor{S: -1}), "is nearly a full turn")
	within(t, 2*ulp, gapR(rotor.FromMRP(rotor.Vec{Z: 1}), rotor.Rotor{E12: -1}), "|p| = 1 is a half turn")
	for _, size := range []float64{1, 1 + ulp, 2, 2 + 2*ulp, 1e200} {
		within(t, 4*ulp, math.Abs(rotor.FromMRP(rotor.Vec{X: 0.6 * size, Z: 0.8 * size}).Norm()-1), "|p| = %g", size)
	}

	_, ok = rotor.FromAxisAngle(rotor.Vec{}, 1)
	assert.False(t, ok, "no axis")
	r, ok := rotor.FromAxisAngle(rotor.Vec{X: 1e-200, Y: 1e-200}, math.Pi)
	assert.True(t, ok, "an axis of any length")
	within(t, 2*ulp, gapR(r, rotor.Rotor{E23: -math.Sqrt2 / 2, E31: -math.Sqrt2 / 2}), "half turn about a tiny axis")
}
