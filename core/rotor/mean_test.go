package rotor_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/rotor"
)

// TestMean: of two rotations it is the one half-way; of rotations spread
// evenly about one, that one; signs and norms do not matter.
func TestMean(t *testing.T) {
	rng := source()
	for range trials / 4 {
		a, b := randomRotor(rng), randomRotor(rng)
		if rotor.Angle(a, b) > 3 {
			continue // nearly half a turn apart: badly determined
		}
		half, ok := rotor.Mean([]rotor.Rotor{a, b.Scale(-3)})
		assert.True(t, ok)
		// The two eigenvalues are 1 +- |cos|: an error of a few ulp over their
		// gap.
		bound := 32 * ulp / math.Abs(a.Dot(b))
		within(t, bound, sameRotation(half, rotor.Slerp(a, b, .5)), "a = %+v, b = %+v", a, b)
		assert.GreaterOrEqual(t, half.Dot(a), 0.0, "on the side of the first")

		var star []rotor.Rotor
		for range 5 {
			v := randomVec(rng).Scale(0.2)
			star = append(star, a.Mul(rotor.FromRotationVector(v)), a.Mul(rotor.FromRotationVector(v.Neg())).Neg())
		}
		centre, ok := rotor.Mean(star)
		assert.True(t, ok)
		within(t, 64*ulp, sameRotation(centre, a), "spread about a = %+v", a)
		left, _ := rotor.Mean([]rotor.Rotor{b.Mul(star[0]), b.Mul(star[2]), b.Mul(star[4])})
		right, _ := rotor.Mean([]rotor.Rotor{star[0], star[2], star[4]})
		within(t, 64*ulp, sameRotation(left, b.Mul(right)), "the mean turns with the rotations")
	}
}

// TestMeanIsBest compares with its neighbours: none has a lesser sum of the
// squared sines of half the angles.
func TestMeanIsBest(t *testing.T) {
	rng := source()
	cost := func(m rotor.Rotor, rs []rotor.Rotor) (sum float64) {
		for _, r := range rs {
			s := math.Sin(rotor.Angle(m, r) / 2)
			sum += s * s
		}
		return sum
	}
	for range 100 {
		rs := []rotor.Rotor{randomRotor(rng), randomRotor(rng), randomRotor(rng), randomRotor(rng)}
		m, ok := rotor.Mean(rs)
		assert.True(t, ok)
		for range 20 {
			other := m.Mul(rotor.FromRotationVector(randomVec(rng).Scale(0.01)))
			assert.LessOrEqual(t, cost(m, rs), cost(other, rs)+1e-14)
			assert.LessOrEqual(t, cost(m, rs), cost(randomRotor(rng), rs)+1e-14)
		}
	}
}

func TestMeanUndetermined(t *testing.T) {
	rng := source()
	_, ok := rotor.Mean(nil)
	assert.False(t, ok, "of nothing")
	for _, bad := range []rotor.Rotor{{}, {S: math.NaN()}, {E12: math.Inf(1)}} {
		_, ok := rotor.Mean([]rotor.Rotor{rotor.One, bad})
		assert.False(t, ok, "%+v", bad)
	}
	for range trials {
		r, half := randomRotor(rng), rotor.Exp(randomUnit(rng).Plane().Scale(math.Pi/2))
		m, ok := rotor.Mean([]rotor.Rotor{r, r.Mul(half)})
		assert.False(t, ok, "half a turn apart: %+v and %+v", r, r.Mul(half))
		assert.Equal(t, rotor.One, m)
		_, ok = rotor.Mean([]rotor.Rotor{r, r.Mul(half), r})
		assert.True(t, ok, "the odd one decides")
	}
	_, ok = rotor.Mean([]rotor.Rotor{rotor.One, {E23: 1}, {E31: 1}, {E12: 1}})
	assert.False(t, ok, "evenly spread over all rotations")
}

// TestPeak: forms with known eigenvalues and vectors, of any size.
func TestPeak(t *testing.T) {
	rng := source()
	for range trials {
		// a, b, c, d are orthonormal: multiplication by r turns the basis.
		r := randomRotor(rng)
		at := []rotor.Rotor{r, r.Mul(rotor.Rotor{E23: 1}), r.Mul(rotor.Rotor{E31: 1}), r.Mul(rotor.Rotor{E12: 1})}
		scale := math.Ldexp(1, rng.IntN(1000)-500)
		values := []float64{3, 2, -1, -5}
		var f rotor.Form
		for i, v := range at {
			f.AddSquare(v, values[i]*scale)
		}
		p, ok := f.Peak()
		assert.True(t, ok)
		within(t, 64*ulp, sameRotation(p.At, r), "r = %+v", r)
		within(t, 64*ulp*scale, math.Abs(p.Value-3*scale), "greatest value")
		within(t, 64*ulp*scale, math.Abs(p.Next-2*scale), "next value")
		assert.True(t, p.Single(1000))
		gap := (p.Value - p.Next) / (ulp * p.Size)
		assert.True(t, p.Single(0.999*gap))
		assert.False(t, p.Single(1.001*gap))
		assert.LessOrEqual(t, p.Size, 5*scale*(1+8*ulp), "no element exceeds the greatest eigenvalue")
	}
	p, ok := rotor.Form{}.Peak()
	assert.True(t, ok)
	assert.False(t, p.Single(0), "the zero form")
	for _, bad := range []float64{math.NaN(), math.Inf(-1)} {
		_, ok = rotor.Form{1: {2: bad}}.Peak()
		assert.False(t, ok)
	}
	p, ok = rotor.Form{{0: math.MaxFloat64}, {1: -math.MaxFloat64}}.Peak()
	assert.True(t, ok)
	assert.Equal(t, rotor.One, p.At)
	assert.Equal(t, math.MaxFloat64, p.Value)
}
