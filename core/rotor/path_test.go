package rotor_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/rotor"
)

// TestSlerp: ends, constant rate, one plane, the shorter way; the long way
// makes up the full turn.
func TestSlerp(t *testing.T) {
	rng := source()
	for range trials {
		a := randomRotor(rng)
		b := a.Mul(randomTurn(rng))
		turn := rotor.Angle(a, b)
		within(t, 8*ulp, gapR(rotor.Slerp(a, b, 0), a), "start")
		within(t, 16*ulp, sameRotation(rotor.Slerp(a, b, 1), b), "end, a = %+v, b = %+v", a, b)
		within(t, 16*ulp, sameRotation(rotor.SlerpLong(a, b, 1), b), "long end, a = %+v, b = %+v", a, b)

		s := rng.Float64()
		short, long := rotor.Slerp(a, b, s), rotor.SlerpLong(a, b, s)
		within(t, 16*ulp, math.Abs(rotor.Angle(a, short)-s*turn), "rate, a = %+v, b = %+v, t = %v", a, b, s)
		within(t, 16*ulp, math.Abs(rotor.Angle(a, short)+rotor.Angle(short, b)-turn), "on the shorter way")
		within(t, 16*ulp, math.Abs(2*a.Reverse().Mul(long).Log().Norm()-s*(2*math.Pi-turn)), "long rate, a = %+v, b = %+v, t = %v", a, b, s)
		within(t, 8*ulp, math.Abs(short.Norm()-1), "norm")
		if math.Abs(a.Dot(b)) > 4*ulp { // at half a turn they decide
			within(t, 16*ulp, sameRotation(short, rotor.Slerp(a.Neg(), b, s)), "signs do not matter to the shorter way, a = %+v, b = %+v", a, b)
		}
		within(t, 32*ulp, sameRotation(short, rotor.Slerp(b, a, 1-s)), "backwards, a = %+v, b = %+v, t = %v", a, b, s)

		// Short and long are in one plane, on opposite sides of a.
		p, q := rotor.Relative(a, short).Bivector().Axis(), rotor.Relative(a, long).Bivector().Axis()
		within(t, 64*ulp, p.Cross(q).Norm(), "plane, a = %+v, b = %+v", a, b)
		assert.LessOrEqual(t, p.Dot(q), 64*ulp)
	}
}

func TestSlerpAtTheEnds(t *testing.T) {
	for _, a := range special() {
		within(t, 2*ulp, gapR(rotor.Slerp(a, a, 0.3), a), "at rest at %+v", a)
		within(t, 2*ulp, gapR(rotor.Slerp(a, a.Neg(), 0.3), a), "at rest, sign changed, at %+v", a)
		half := rotor.SlerpLong(a, a, 0.5)
		within(t, 4*ulp, gapR(half, a.Mul(rotor.Rotor{E12: 1})), "half of a full turn from %+v: documented plane", a)
		within(t, 4*ulp, gapR(rotor.SlerpLong(a, a, 1), a.Neg()), "the full turn ends at -R")
	}
	a, b := rotor.One, rotor.Rotor{E12: -1} // half a turn about z: b's sign decides
	within(t, ulp, gapV(rotor.Slerp(a, b, .5).Rotate(rotor.Vec{X: 1}), rotor.Vec{Y: 1}), "by way of y")
	within(t, ulp, gapV(rotor.SlerpLong(a, b, .5).Rotate(rotor.Vec{X: 1}), rotor.Vec{Y: -1}), "by way of -y")
}

// TestLift: a path with signs changed at random comes back continuous, and a
// full turn ends at minus its start.
func TestLift(t *testing.T) {
	rng := source()
	const n = 500
	var path, mixed []rotor.Rotor
	for i := range n + 1 {
		r := rotor.Exp(rotor.Bivector{E23: 0.6, E31: 0.8}.Scale(math.Pi * float64(i) / n))
		path = append(path, r)
		if rng.IntN(2) == 0 && i > 0 {
			r = r.Neg()
		}
		mixed = append(mixed, r)
	}
	rotor.Lift(mixed)
	assert.Equal(t, path, mixed)
	within(t, 4*ulp, gapR(mixed[n], mixed[0].Neg()), "a full turn")
}

// TestLiftOverGaps: what is no rotor passes, and does not break the path.
func TestLiftOverGaps(t *testing.T) {
	nan := rotor.Rotor{S: math.NaN()}
	series := []rotor.Rotor{{}, {E12: -1}, {}, nan, {E12: 1}, {S: math.Inf(1)}, {S: .6, E12: .8}}
	rotor.Lift(series)
	assert.Equal(t, rotor.Rotor{E12: -1}, series[1])
	assert.Equal(t, rotor.Rotor{}, series[2])
	assert.True(t, math.IsNaN(series[3].S))
	assert.Equal(t, rotor.Rotor{E12: -1}, series[4])
	assert.Equal(t, rotor.Rotor{S: -.6, E12: -.8}, series[6])
	rotor.Lift(nil)
}
