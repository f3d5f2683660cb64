package kinematics_test

import (
	"fmt"
	"math"
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/kinematics"
	"dextral/core/rotor"
)

const ulp = 0x1p-52

// source is the source of random cases: the same on every run.
func source() *rand.Rand { return rand.New(rand.NewPCG(20240917, 1843)) }

func randomVec(rng *rand.Rand) rotor.Vec {
	return rotor.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()}
}

func randomRotor(rng *rand.Rand) rotor.Rotor {
	r, _ := rotor.Rotor{S: rng.NormFloat64(), E23: rng.NormFloat64(), E31: rng.NormFloat64(), E12: rng.NormFloat64()}.Unit()
	return r
}

func gapV(a, b rotor.Vec) float64   { return a.Sub(b).Norm() }
func gapR(a, b rotor.Rotor) float64 { return a.Sub(b).Norm() }

// within fails the test unless the error is at most the bound; NaN fails.
func within(t *testing.T, bound, err float64, format string, args ...any) {
	t.Helper()
	if !(err <= bound) {
		t.Errorf("%s: error %.3g, allowed %.3g", fmt.Sprintf(format, args...), err, bound)
	}
}

// tumble is a motion whose rates are known in closed form: a turn about z by
// f(t), and within it one about x by g(t). In body axes the rate is f' times
// the z axis as the body sees it, and g' about x.
func tumble(t float64) (r rotor.Rotor, bodyRate rotor.Vec) {
	f, df := 1.3*t+0.4*math.Sin(2*t), 1.3+0.8*math.Cos(2*t)
	g, dg := 0.7*math.Cos(3*t)-0.5*t, -2.1*math.Sin(3*t)-0.5
	outer, inner := rotor.FromRotationVector(rotor.Vec{Z: f}), rotor.FromRotationVector(rotor.Vec{X: g})
	seen := inner.Reverse().Rotate(rotor.Vec{Z: df})
	return outer.Mul(inner), seen.Add(rotor.Vec{X: dg})
}

// TestDerivative compares R' with differences of the motion, and with the two
// quaternion forms, component by component.
func TestDerivative(t *testing.T) {
	for _, at := range []float64{0, 0.3, 1, 2, 5} {
		const h = 1e-5 // the difference is wrong by h^2 and by ulp/h
		before, _ := tumble(at - h)
		after, _ := tumble(at + h)
		r, rate := tumble(at)
		got := kinematics.Derivative(r, rate)
		within(t, 1e-9, gapR(got, after.Sub(before).Scale(1/(2*h))), "t = %v", at)
		space := r.Rotate(rate)
		half := space.Scale(-0.5)
		within(t, 8*ulp*rate.Norm(), gapR(got, rotor.Rotor{E23: half.X, E31: half.Y, E12: half.Z}.Mul(r)), "-Omega_space R / 2")

		// M. D. Shuster 1993, q' = Omega(omega) q / 2 (from memory), with
		// Omega = [[-[omega x], omega], [-omega^T, 0]] on (x, y, z, w).
		w, x, y, z := r.Quaternion()
		v := rotor.Vec{X: x, Y: y, Z: z}
		dv := rate.Scale(w).Sub(rate.Cross(v)).Scale(0.5)
		dw := -0.5 * rate.Dot(v)
		within(t, 8*ulp*rate.Norm(), gapR(got, rotor.FromQuaternion(dw, dv.X, dv.Y, dv.Z)), "Shuster's form")
	}
}

// TestConstantRate: what Step does, the rates see, in both kinds of axes, for
// either sign of the rotors and for the reverse series.
func TestConstantRate(t *testing.T) {
	rng := source()
	for range 2000 {
		a, omega := randomRotor(rng), randomVec(rng)
		dt := 3 / omega.Norm() * rng.Float64() // less than half a turn
		b := kinematics.Step(a, omega, dt)
		bound := 32 * ulp * (omega.Norm() + 1/dt)
		within(t, bound, gapV(kinematics.BodyRate(a, b, dt), omega), "body")
		within(t, bound, gapV(kinematics.BodyRate(a, b.Neg(), dt), omega), "body, sign changed")
		space := a.Rotate(omega)
		within(t, bound, gapV(kinematics.SpaceRate(a, b, dt), space), "space")
		within(t, bound, gapV(kinematics.SpaceRate(a.Neg(), b, dt), space), "space, sign changed")
		within(t, bound, gapV(kinematics.BodyRate(b, a, -dt), omega), "backwards")

		within(t, bound, gapV(kinematics.SpaceRate(a.Reverse(), b.Reverse(), dt).Neg(), omega), "body rate of the reverse series")
		within(t, bound, gapV(kinematics.BodyRate(a.Reverse(), b.Reverse(), dt).Neg(), space), "space rate of the reverse series")
	}
	assert.False(t, kinematics.BodyRate(rotor.One, rotor.Rotor{E12: 1}, 0).Finite())
	assert.Equal(t, rotor.Vec{}, kinematics.BodyRate(rotor.One, rotor.One, 0.1))
}

// order estimates the power of the step with which an error falls, from a step
// and half of it.
func order(err func(h float64) float64, h float64) float64 {
	return math.Log2(err(h) / err(h/2))
}

// TestRateOrder: the rate between two orientations is that of the middle, with
// an error of second order; that of the start, of first order.
func TestRateOrder(t *testing.T) {
	rateError := func(at float64) func(h float64) float64 {
		return func(h float64) (worst float64) {
			for start := 0.0; start < 3; start += 0.1 {
				a, _ := tumble(start)
				b, _ := tumble(start + h)
				_, want := tumble(start + at*h)
				worst = max(worst, gapV(kinematics.BodyRate(a, b, h), want))
			}
			return worst
		}
	}
	within(t, 0.1, math.Abs(order(rateError(0.5), 1e-3)-2), "middle")
	within(t, 0.1, math.Abs(order(rateError(0), 1e-3)-1), "start")
}

// TestIncrementOrder integrates a gyro over three seconds. Without the coning
// term a rate linear in time is integrated to second order only, with it to
// fourth.
func TestIncrementOrder(t *testing.T) {
	linear := func(t float64) rotor.Vec {
		return rotor.Vec{X: 1, Y: -0.5, Z: 0.3}.Add(rotor.Vec{X: -0.8, Y: 0.6, Z: 1.1}.Scale(t))
	}
	tumbling := func(t float64) rotor.Vec { _, rate := tumble(t); return rate }
	trapezium := func(a, b rotor.Vec, h float64) rotor.Vec { return a.Add(b).Scale(h / 2) }
	start := func(a, _ rotor.Vec, h float64) rotor.Vec { return a.Scale(h) }

	integrate := func(rate func(float64) rotor.Vec, increment func(a, b rotor.Vec, h float64) rotor.Vec, h float64) rotor.Rotor {
		r, steps := rotor.One, math.Round(3/h)
		for i := range int(steps) {
			at := 3 * float64(i) / steps
			r = r.Mul(rotor.FromRotationVector(increment(rate(at), rate(at+3/steps), 3/steps)))
		}
		return r
	}
	for _, c := range []struct {
		name      string
		rate      func(float64) rotor.Vec
		increment func(a, b rotor.Vec, h float64) rotor.Vec
		want      float64
	}{
		{"linear rate, Increment", linear, kinematics.Increment, 4},
		{"linear rate, without the coning term", linear, trapezium, 2},
		{"tumbling, Increment", tumbling, kinematics.Increment, 2},
		{"tumbling, rate of the start", tumbling, start, 1},
	} {
		truth := integrate(c.rate, kinematics.Increment, 1e-4)
		err := func(h float64) float64 { return rotor.Angle(integrate(c.rate, c.increment, h), truth) }
		within(t, 0.15, math.Abs(order(err, 0.02)-c.want), "%s: order %.2f instead of %v", c.name, order(err, 0.02), c.want)
	}
}

// TestInterpolate: exact at both ends, third order between, one order better
// than interpolation at constant rate.
func TestInterpolate(t *testing.T) {
	sample := func(at float64) kinematics.Sample {
		r, rate := tumble(at)
		return kinematics.Sample{T: at, R: r, Rate: rate}
	}
	worst := func(between func(a, b kinematics.Sample, t float64) rotor.Rotor) func(h float64) float64 {
		return func(h float64) (worst float64) {
			for start := 0.0; start < 3; start += 0.05 {
				for _, part := range []float64{0.2, 0.5, 0.7} {
					want, _ := tumble(start + part*h)
					got := between(sample(start), sample(start+h), start+part*h)
					worst = max(worst, rotor.Angle(got, want))
				}
			}
			return worst
		}
	}
	slerp := func(a, b kinematics.Sample, t float64) rotor.Rotor {
		return rotor.Slerp(a.R, b.R, (t-a.T)/(b.T-a.T))
	}
	within(t, 0.15, math.Abs(order(worst(kinematics.Interpolate), 0.02)-3), "with the gyro")
	within(t, 0.15, math.Abs(order(worst(slerp), 0.02)-2), "without")

	a, b := sample(1), sample(1.1)
	within(t, 8*ulp, gapR(kinematics.Interpolate(a, b, a.T), a.R), "start")
	within(t, 16*ulp, rotor.Angle(kinematics.Interpolate(a, b, b.T), b.R), "end")
	b.R = b.R.Neg()
	within(t, 16*ulp, rotor.Angle(kinematics.Interpolate(a, b, b.T), b.R), "end, sign changed")

	// A gyro with a constant bias is corrected at both ends and costs nothing
	// when the rate is constant: the spread of the miss undoes it.
	steady := kinematics.Sample{T: 0, R: rotor.One, Rate: rotor.Vec{Z: 1.1}}
	later := kinematics.Sample{T: 1, R: rotor.FromRotationVector(rotor.Vec{Z: 1}), Rate: rotor.Vec{Z: 1.1}}
	within(t, 16*ulp, rotor.Angle(kinematics.Interpolate(steady, later, 0.4), rotor.FromRotationVector(rotor.Vec{Z: 0.4})), "bias")
}
