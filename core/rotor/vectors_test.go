package rotor_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/rotor"
)

// apart returns two unit vectors at the given angle.
func apart(a, side rotor.Vec, angle float64) (rotor.Vec, rotor.Vec) {
	side, _ = side.Sub(a.Scale(a.Dot(side))).Unit()
	b, _ := a.Scale(math.Cos(angle)).Add(side.Scale(math.Sin(angle))).Unit()
	return a, b
}

// angles reach from nothing to the half turn and crowd at both ends.
func angles() []float64 {
	all := []float64{0, math.Pi, math.Pi / 2, 1, 2, 3}
	for e := 1.0; e <= 17; e++ {
		all = append(all, math.Pow(10, -e), math.Pi-math.Pow(10, -e), math.Pi/2-math.Pow(10, -e), math.Pi/2+math.Pow(10, -e))
	}
	return all
}

// TestBetween: the rotor carries a to b, by the angle between them, without
// moving what is perpendicular to both; also where a and b nearly coincide or
// are nearly opposite.
func TestBetween(t *testing.T) {
	rng := source()
	for _, angle := range angles() {
		for range 100 {
			a, b := apart(randomUnit(rng), randomUnit(rng), angle)
			r, ok := rotor.Between(a.Scale(3), b.Scale(0.1))
			assert.True(t, ok)
			within(t, 8*ulp, gapV(r.Rotate(a), b), "a = %+v, b = %+v", a, b)
			within(t, 2*ulp, math.Abs(r.Norm()-1), "norm, a = %+v, b = %+v", a, b)
			within(t, 8*ulp, math.Abs(r.TurnAngle()-a.Angle(b)), "turn, a = %+v, b = %+v", a, b)
			assert.GreaterOrEqual(t, r.S, 0.0, "the shorter way")
			within(t, 4*ulp, math.Abs(r.Bivector().Axis().Dot(a)), "a lies in the plane, a = %+v, b = %+v", a, b)
		}
	}
}

// TestBetweenIsHalfwayReflection: h a, with h half-way between a and b.
func TestBetweenIsHalfwayReflection(t *testing.T) {
	rng := source()
	for range trials {
		a, b := randomUnit(rng), randomUnit(rng)
		between, _ := rotor.Between(a, b)
		mirrors, ok := rotor.Reflections(a, a.Add(b))
		assert.True(t, ok)
		bound := 8 * ulp / a.Add(b).Norm() // the direction of a + b is known to this
		within(t, bound, gapR(between, mirrors), "a = %+v, b = %+v", a, b)
	}
}

// TestOpposite: the documented plane, for a along and off the basis vectors.
func TestOpposite(t *testing.T) {
	for _, c := range []struct{ a, other rotor.Vec }{
		{rotor.Vec{X: 1}, rotor.Vec{Y: 1}}, // least along: e2 and e3 are equal, the first counts
		{rotor.Vec{Y: 1}, rotor.Vec{X: 1}},
		{rotor.Vec{Z: -1}, rotor.Vec{X: 1}},
		{rotor.Vec{X: 3, Y: 2, Z: 1}, rotor.Vec{Z: 1}},
		{rotor.Vec{X: -2, Y: 1, Z: 3}, rotor.Vec{Y: 1}},
		{rotor.Vec{X: 1, Y: 1, Z: 1}, rotor.Vec{X: 1}},
	} {
		r, ok := rotor.Between(c.a, c.a.Neg())
		assert.True(t, ok)
		plane, _ := c.a.Cross(c.other).Unit()
		within(t, 2*ulp, gapR(r, rotor.Rotor{E23: -plane.X, E31: -plane.Y, E12: -plane.Z}), "a = %+v", c.a)
	}
}

// TestReflections: -b(-a v a)b is the sandwich with b a, a turn by twice the
// angle, and the product of two such rotors that share a mirror loses it.
func TestReflections(t *testing.T) {
	rng := source()
	for range trials {
		a, b, c, v := randomUnit(rng), randomUnit(rng), randomUnit(rng), randomVec(rng)
		r, ok := rotor.Reflections(a, b)
		assert.True(t, ok)
		within(t, 4*ulp, gap(r.Multivector(), b.Multivector().Mul(a.Multivector())), "b a, a = %+v, b = %+v", a, b)
		within(t, 16*ulp*v.Norm(), gapV(r.Rotate(v), mirror(b, mirror(a, v))), "a = %+v, b = %+v, v = %+v", a, b, v)
		within(t, 8*ulp, math.Abs(r.Log().Norm()-a.Angle(b)), "half the turn is the angle, a = %+v, b = %+v", a, b)
		s, _ := rotor.Reflections(b, c)
		both, _ := rotor.Reflections(a, c)
		within(t, 8*ulp, gapR(s.Mul(r), both), "(c b)(b a) = c a")
	}
}

// mirror is the textbook reflection v - 2 (a.v) a.
func mirror(a, v rotor.Vec) rotor.Vec { return v.Sub(a.Scale(2 * a.Dot(v))) }

// TestVecAngle is accurate at both ends, where the arc cosine is not.
func TestVecAngle(t *testing.T) {
	for _, angle := range angles() {
		if angle > math.Pi {
			continue
		}
		b := rotor.Vec{X: math.Cos(angle), Z: math.Sin(angle)}
		got := rotor.Vec{X: 2}.Angle(b.Scale(5))
		within(t, 4*ulp*min(1, angle*1e8)+2*ulp*angle, math.Abs(got-angle), "angle %v", angle)
	}
	assert.Zero(t, rotor.Vec{}.Angle(rotor.Vec{X: 1}))
	assert.True(t, math.IsNaN(rotor.Vec{X: math.NaN()}.Angle(rotor.Vec{X: 1})))
}

func TestNoDirection(t *testing.T) {
	for _, bad := range []rotor.Vec{{}, {X: math.NaN()}, {Y: math.Inf(1), Z: 1}} {
		for _, f := range []func(a, b rotor.Vec) (rotor.Rotor, bool){rotor.Between, rotor.Reflections} {
			r, ok := f(bad, rotor.Vec{X: 1})
			assert.False(t, ok)
			assert.Equal(t, rotor.One, r)
			_, ok = f(rotor.Vec{X: 1}, bad)
			assert.False(t, ok)
		}
	}
}
