package rotor_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/rotor"
)

// TestAngle compares with the angle computed in 300 bits: to relative accuracy
// from angles far below one ulp of a component up to half a turn, at either
// sign and at other norms.
func TestAngle(t *testing.T) {
	rng := source()
	for _, turn := range angles() {
		for range 50 {
			a := randomRotor(rng)
			q, _ := rotor.FromAxisAngle(randomUnit(rng), turn)
			b := a.Mul(q)
			want := exactAngle(a, b)
			bound := 8 * ulp * want
			within(t, bound, math.Abs(rotor.Angle(a, b)-want), "a = %+v, b = %+v", a, b)
			within(t, bound, math.Abs(rotor.Angle(b, a.Neg())-want), "sign and order, a = %+v, b = %+v", a, b)
			// Dividing out other norms rounds each component.
			for _, scale := range []float64{0.999, 30, 0x1p-600, 0x1p+600} {
				within(t, bound+8*ulp, math.Abs(rotor.Angle(a, b.Scale(scale))-want), "a = %+v, b = %+v, scale %g", a, b, scale)
				within(t, bound+8*ulp, math.Abs(rotor.Angle(a.Scale(scale), b.Scale(scale))-want), "a = %+v, b = %+v, both scaled %g", a, b, scale)
			}
		}
	}
}

func TestAngleAtTheEnds(t *testing.T) {
	for _, r := range special() {
		assert.Zero(t, rotor.Angle(r, r))
		assert.Zero(t, rotor.Angle(r, r.Neg()))
		within(t, 2*ulp, math.Abs(rotor.Angle(r, r.Mul(rotor.Rotor{E31: 1}))-math.Pi), "half a turn from %+v", r)
	}
	assert.Equal(t, 2e-200, rotor.Angle(rotor.One, rotor.Rotor{S: 1, E23: 1e-200}))
	assert.Zero(t, rotor.Angle(rotor.Rotor{}, rotor.One))
	for _, bad := range []float64{math.NaN(), math.Inf(1), math.Inf(-1)} {
		assert.True(t, math.IsNaN(rotor.Angle(rotor.Rotor{S: bad}, rotor.One)))
		assert.True(t, math.IsNaN(rotor.Angle(rotor.One, rotor.Rotor{E12: bad})))
	}
}

// TestAngleIsADistance: the metric laws of the angle between rotations.
func TestAngleIsADistance(t *testing.T) {
	rng := source()
	for range trials {
		a, b, c := randomTurn(rng), randomTurn(rng), randomTurn(rng)
		ab := rotor.Angle(a, b)
		within(t, 8*ulp, math.Abs(ab-rotor.Angle(b, a)), "a = %+v, b = %+v", a, b)
		within(t, 16*ulp, math.Abs(ab-rotor.Angle(c.Mul(a), c.Mul(b))), "turned from the left by %+v", c)
		within(t, 16*ulp, math.Abs(ab-rotor.Angle(a.Mul(c), b.Mul(c))), "turned from the right by %+v", c)
		assert.LessOrEqual(t, ab, rotor.Angle(a, c)+rotor.Angle(c, b)+16*ulp)
		within(t, 8*ulp, math.Abs(a.TurnAngle()-rotor.Angle(a, rotor.One)), "a = %+v", a)
	}
}

// TestRelative: a (a~ b) = b, and the small bivector part of near rotors to
// relative accuracy, which the product a~ b itself does not have.
func TestRelative(t *testing.T) {
	rng := source()
	worst := 0.0
	for range trials {
		a := randomRotor(rng)
		b := a.Mul(randomTurn(rng))
		within(t, 12*ulp, gapR(a.Mul(rotor.Relative(a, b)), b), "a = %+v, b = %+v", a, b)

		tiny, _ := rotor.FromAxisAngle(randomUnit(rng), math.Pow(10, -15*rng.Float64()))
		b = a.Mul(tiny)
		for _, b := range []rotor.Rotor{b, b.Neg()} {
			want := exactRotor(a).reverse().mul(exactRotor(b)).float64().Bivector()
			within(t, 8*ulp*want.Norm(), gapV(rotor.Relative(a, b).Bivector().Axis(), want.Axis()), "a = %+v, b = %+v", a, b)
			plain := a.Reverse().Mul(b).Bivector()
			worst = max(worst, gapV(plain.Axis(), want.Axis())/want.Norm())
		}
	}
	assert.Greater(t, worst, 1e-4, "the detour would be needless")
}
