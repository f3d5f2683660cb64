package angle_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"

	"dextral/core/angle"
	"dextral/core/rotor"
)

func drawAngles(rt *rapid.T) (s angle.Sequence, n, rates [3]float64) {
	s = anySequence.Draw(rt, "sequence")
	for k := range n {
		n[k] = rapid.Float64Range(-4, 4).Draw(rt, "angle")
		rates[k] = rapid.Float64Range(-2, 2).Draw(rt, "rate")
	}
	return s, n, rates
}

// moved is the rotor a time dt later.
func moved(s angle.Sequence, n, rates [3]float64, dt float64) rotor.Rotor {
	return s.Rotor(n[0]+rates[0]*dt, n[1]+rates[1]*dt, n[2]+rates[2]*dt)
}

// TestRatesAgainstDifferences: central differences of the rotor, whose error
// is h^2/6 of a third derivative, itself at most the cube of the summed rates (6
// rad/s), and rounding of 1e-15/h.
func TestRatesAgainstDifferences(t *testing.T) {
	const h = 1e-5
	rapid.Check(t, func(rt *rapid.T) {
		s, n, rates := drawAngles(rt)
		before, after := moved(s, n, rates, -h), moved(s, n, rates, h)
		space := after.Mul(before.Reverse()).RotationVector().Scale(1 / (2 * h))
		body := before.Reverse().Mul(after).RotationVector().Scale(1 / (2 * h))
		const tolerance = h*h*6*6*6/6 + 1e-14/h
		assert.Less(rt, s.SpaceFromRates(n, rates).Sub(space).Norm(), tolerance, "%s %v %v", s.Words(), n, rates)
		assert.Less(rt, s.BodyFromRates(n, rates).Sub(body).Norm(), tolerance, "%s %v %v", s.Words(), n, rates)
	})
}

func TestRatesThereAndBack(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		s, n, rates := drawAngles(rt)
		amplified := 40 * angle.Rounding * s.Amplification(n[1])
		if fromSpace, ok := s.RatesFromSpace(n, s.SpaceFromRates(n, rates)); ok {
			fromBody, okBody := s.RatesFromBody(n, s.BodyFromRates(n, rates))
			assert.True(rt, okBody)
			for k := range rates {
				assert.InDelta(rt, rates[k], fromSpace[k], amplified, "%s %v", s.Words(), n)
				assert.InDelta(rt, rates[k], fromBody[k], amplified, "%s %v", s.Words(), n)
			}
		}
	})
}

// TestRatesOfTwin: the twin has the same velocities with the numbers reversed.
func TestRatesOfTwin(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		s, n, rates := drawAngles(rt)
		back, backRates := [3]float64{n[2], n[1], n[0]}, [3]float64{rates[2], rates[1], rates[0]}
		assert.Less(rt, s.BodyFromRates(n, rates).Sub(s.Twin().BodyFromRates(back, backRates)).Norm(), 8*angle.Rounding)
	})
}

// TestAircraftRates pins the textbook matrix of yaw, pitch and roll (common
// practice): p = roll' - yaw' sin pitch, q = pitch' cos roll + yaw' cos pitch sin roll,
// r = -pitch' sin roll + yaw' cos pitch cos roll.
func TestAircraftRates(t *testing.T) {
	yaw, pitch, roll := 0.4, -0.9, 1.7
	dYaw, dPitch, dRoll := 0.3, -0.2, 0.5
	got := moving(z, y, x).BodyFromRates([3]float64{yaw, pitch, roll}, [3]float64{dYaw, dPitch, dRoll})
	assert.InDelta(t, dRoll-dYaw*math.Sin(pitch), got.X, 4*ulp)
	assert.InDelta(t, dPitch*math.Cos(roll)+dYaw*math.Cos(pitch)*math.Sin(roll), got.Y, 4*ulp)
	assert.InDelta(t, -dPitch*math.Sin(roll)+dYaw*math.Cos(pitch)*math.Cos(roll), got.Z, 4*ulp)
}

func TestRatesAtSingularPoint(t *testing.T) {
	for _, s := range angle.Sequences() {
		for _, b := range singular(s) {
			_, ok := s.RatesFromBody([3]float64{0.3, b, 1.2}, rotor.Vec{X: 1, Y: 1, Z: 1})
			assert.False(t, ok, s.Words())
		}
		for _, b := range []float64{1, singular(s)[0] - 1e-9, singular(s)[1] + 1e-9} {
			_, ok := s.RatesFromBody([3]float64{0.3, b, 1.2}, rotor.Vec{X: 1, Y: 1, Z: 1})
			assert.True(t, ok, s.Words())
		}
	}
	_, ok := moving(z, y, x).RatesFromBody([3]float64{0.3, math.NaN(), 1.2}, rotor.Vec{})
	assert.False(t, ok)
	_, ok = angle.Sequence{}.RatesFromSpace([3]float64{1, 1, 1}, rotor.Vec{X: 1})
	assert.False(t, ok)
}

// TestAmplification: over all velocities of 1 rad/s an outer angle changes by
// up to the amplification, and by no more; the middle angle by up to 1.
func TestAmplification(t *testing.T) {
	rng := source()
	for _, s := range angle.Sequences() {
		for range 20 {
			n := [3]float64{rng.NormFloat64(), rng.NormFloat64(), rng.NormFloat64()}
			worst := [3]float64{}
			for range 3000 {
				v, _ := rotor.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()}.Unit()
				rates, ok := s.RatesFromSpace(n, v)
				assert.True(t, ok)
				for k := range rates {
					worst[k] = math.Max(worst[k], math.Abs(rates[k]))
				}
			}
			for k, most := range [3]float64{s.Amplification(n[1]), 1, s.Amplification(n[1])} {
				assert.LessOrEqual(t, worst[k], most*(1+1e-12), s.Words())
				assert.Greater(t, worst[k], most*0.97, s.Words())
			}
		}
	}
	assert.InDelta(t, 2, moving(z, y, x).Amplification(math.Pi/3), 8*ulp)
	assert.InDelta(t, 2, fixed(z, x, z).Amplification(math.Pi/6), 8*ulp)
	assert.True(t, math.IsInf(moving(z, x, z).Amplification(0), 1))
}
