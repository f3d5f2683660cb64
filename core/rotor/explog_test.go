package rotor_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/rotor"
)

// TestExpLog: the two undo each other, in both signs of the rotor, and the
// logarithm's norm is half the turn: up to pi, not only up to pi/2.
func TestExpLog(t *testing.T) {
	rng := source()
	for i := range trials {
		r := randomTurn(rng)
		if i < len(special()) {
			r = special()[i]
		}
		within(t, 8*ulp, gapR(rotor.Exp(r.Log()), r), "exp(log r), r = %+v", r)
		half := r.Log().Norm()
		within(t, 4*ulp, math.Abs(math.Cos(half)-r.S), "cos of half the turn, r = %+v", r)
		assert.LessOrEqual(t, half, math.Pi*(1+ulp))
		// Scale does not matter to the logarithm of the direction.
		within(t, 8*ulp, gapV(r.Scale(1e-3).Log().Axis(), r.Log().Axis()), "r = %+v", r)
	}
}

// TestLogOfExp: from the plane and back, with relative accuracy. Tiny turns
// keep their digits, and turns near the full one, |b| = pi, where the bivector
// part of the rotor is small, keep their plane.
func TestLogOfExp(t *testing.T) {
	rng := source()
	for _, size := range []float64{5e-324, 1e-310, 1e-160, 1e-100, 1e-20, 1e-8, 1e-3, 1, math.Pi / 2, 3, 3.1415, math.Pi - 1e-8} {
		for range 100 {
			b := randomUnit(rng).Plane().Scale(size)
			bound := 8*ulp*size + 5e-324 // the least number there is
			within(t, bound, gapV(rotor.Exp(b).Log().Axis(), b.Axis()), "b = %+v", b)
		}
	}
}

// TestFullTurn: a turn that grows to 360 degrees ends at -1, one that grows to
// 720 degrees at 1.
func TestFullTurn(t *testing.T) {
	plane := rotor.Bivector{E23: 2, E31: -1, E12: 2}.Scale(1. / 3)
	full := rotor.Exp(plane.Scale(-math.Pi))
	within(t, 2*ulp, gapR(full, rotor.One.Neg()), "360 deg")
	within(t, 4*ulp, gapR(rotor.Exp(plane.Scale(-2*math.Pi)), rotor.One), "720 deg")
	within(t, 4*ulp, gapR(full.Mul(full), rotor.One), "twice 360 deg")

	v := rotor.FromRotationVector(rotor.Vec{Z: 2*math.Pi - 1e-6})
	within(t, 1e-15, math.Abs(2*v.Log().Norm()-(2*math.Pi-1e-6)), "a turn by nearly 360 deg keeps its length")
	within(t, 1e-15, gapV(v.RotationVector(), rotor.Vec{Z: -1e-6}), "as a rotation it is short")
}

// TestLogAtTheEnds: the places where the logarithm has no plane of its own.
func TestLogAtTheEnds(t *testing.T) {
	assert.Equal(t, rotor.Bivector{}, rotor.One.Log())
	assert.Equal(t, rotor.Bivector{E12: math.Pi}, rotor.One.Neg().Log(), "documented choice")
	assert.Equal(t, rotor.Bivector{}, rotor.Rotor{}.Log())
	assert.Equal(t, rotor.One, rotor.Exp(rotor.Bivector{}))
	// Next to a full turn a plane one can only just see decides.
	for _, tiny := range []float64{1e-10, 1e-300, 5e-324} {
		near := rotor.Rotor{S: -1, E31: -tiny}
		within(t, ulp, gapV(near.Log().Axis(), rotor.Vec{Y: -math.Pi + tiny}), "tiny = %g", tiny)
	}
}

// TestExpOfPlanes compares the closed form with the power series, summed until
// it no longer changes, for planes of up to unit area.
func TestExpOfPlanes(t *testing.T) {
	rng := source()
	for range 200 {
		b := randomUnit(rng).Plane().Scale(rng.Float64())
		term, sum := rotor.One, rotor.One
		for n := 1.0; n < 25; n++ {
			term = term.Mul(rotor.Rotor{E23: b.E23, E31: b.E31, E12: b.E12}).Scale(1 / n)
			sum = sum.Add(term)
		}
		within(t, 8*ulp, gapR(rotor.Exp(b), sum), "b = %+v", b)
	}
}
