package rotor_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/rotor"
)

// arc is the rotor from the unit vector u to the unit vector v.
func arc(u, v rotor.Vec) rotor.Rotor { return v.Multivector().Mul(u.Multivector()).Even() }

// TestCompose: corners that give the rotors back, sides that are half angles,
// and the laws of spherical trigonometry between sides and angles.
func TestCompose(t *testing.T) {
	const bound = 32 * ulp
	rng := source()
	for range trials {
		a, b := randomRotor(rng), randomRotor(rng)
		tri, ok := rotor.Compose(a, b)
		assert.True(t, ok)
		within(t, bound, gapR(arc(tri.V, tri.W), a), "a = W V, a = %+v, b = %+v", a, b)
		within(t, bound, gapR(arc(tri.U, tri.V), b), "b = V U, a = %+v, b = %+v", a, b)
		within(t, bound, gapR(arc(tri.U, tri.W), a.Mul(b)), "a b = W U, a = %+v, b = %+v", a, b)
		within(t, bound, math.Abs(tri.A-tri.V.Angle(tri.W)), "side A, a = %+v, b = %+v", a, b)
		within(t, bound, math.Abs(tri.B-tri.U.Angle(tri.V)), "side B, a = %+v, b = %+v", a, b)
		within(t, bound, math.Abs(tri.C-tri.U.Angle(tri.W)), "side C, a = %+v, b = %+v", a, b)

		cosines(t, tri.C, tri.A, tri.B, tri.AtV)
		cosines(t, tri.A, tri.B, tri.C, tri.AtU)
		cosines(t, tri.B, tri.C, tri.A, tri.AtW)
		sin := math.Sin
		within(t, bound, math.Abs(sin(tri.A)*sin(tri.AtV)-sin(tri.C)*sin(tri.AtU)), "sines, a = %+v, b = %+v", a, b)
		within(t, bound, math.Abs(sin(tri.B)*sin(tri.AtV)-sin(tri.C)*sin(tri.AtW)), "sines, a = %+v, b = %+v", a, b)
		assert.Greater(t, tri.AtU+tri.AtV+tri.AtW, math.Pi, "the angles of a spherical triangle exceed two right ones")
	}
}

// cosines checks the law of cosines for the side c across the angle between a
// and b.
func cosines(t *testing.T, c, a, b, angle float64) {
	t.Helper()
	law := math.Cos(a)*math.Cos(b) + math.Sin(a)*math.Sin(b)*math.Cos(angle)
	within(t, 32*ulp, math.Abs(law-math.Cos(c)), "sides %v, %v, %v, angle %v", c, a, b, angle)
}

// TestQuarterTurns is the octant: quarter turns about z and x, by hand. Their
// product is a third of a turn about the diagonal x - y + z, for which
// cos 60 = cos 45 cos 45.
func TestQuarterTurns(t *testing.T) {
	a, _ := rotor.FromAxisAngle(rotor.Vec{X: 1}, math.Pi/2)
	b, _ := rotor.FromAxisAngle(rotor.Vec{Z: 1}, math.Pi/2)
	tri, ok := rotor.Compose(a, b)
	assert.True(t, ok)
	for got, want := range map[float64]float64{tri.A: 45, tri.B: 45, tri.C: 60, tri.AtV: 90, tri.AtU: tri.AtW * 180 / math.Pi} {
		within(t, 1e-14, math.Abs(got-want*math.Pi/180), "%v deg", want)
	}
	axis, angle := a.Mul(b).AxisAngle()
	within(t, 4*ulp, math.Abs(angle-2*math.Pi/3), "angle")
	within(t, 4*ulp, gapV(axis.Scale(math.Sqrt(3)), rotor.Vec{X: 1, Y: -1, Z: 1}), "axis")
}

// TestComposeWithoutTriangle: turns in one plane, half and full turns and none
// leave angles open, but never the corners.
func TestComposeWithoutTriangle(t *testing.T) {
	rng := source()
	check := func(a, b rotor.Rotor) bool {
		tri, ok := rotor.Compose(a, b)
		within(t, 32*ulp, gapR(arc(tri.V, tri.W), a), "a = W V, a = %+v, b = %+v", a, b)
		within(t, 32*ulp, gapR(arc(tri.U, tri.V), b), "b = V U, a = %+v, b = %+v", a, b)
		within(t, 4*ulp, math.Abs(tri.V.Norm()-1), "V, a = %+v, b = %+v", a, b)
		within(t, 32*ulp, math.Abs(tri.A-tri.V.Angle(tri.W)), "side A, a = %+v, b = %+v", a, b)
		return ok
	}
	for _, a := range special() {
		for _, b := range special() {
			check(a, b)
		}
		r := randomRotor(rng)
		check(a, r)
		check(r, a)
	}
	for range trials {
		r := randomRotor(rng)
		same := rotor.Exp(r.Log().Scale(3 * rng.Float64()))
		check(r, same)
		check(same, r.Mul(rotor.FromRotationVector(randomVec(rng).Scale(1e-16))))
	}
	assert.False(t, check(rotor.One, rotor.Rotor{E12: 1}))
	assert.False(t, check(rotor.Rotor{E12: 1}, rotor.One.Neg()))
	assert.False(t, check(rotor.Rotor{E12: 1}, rotor.Rotor{E12: -1}), "the product is 1")
	assert.False(t, check(rotor.One, rotor.One))
}
