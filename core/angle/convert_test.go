package angle_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"

	"dextral/core/angle"
	"dextral/core/matrix"
	"dextral/core/rotor"
)

// ulp is the distance from 1 to the next float64: 2^-52.
const ulp = 0x1p-52

// turn is one turn about a coordinate axis, made without package angle.
func turn(t assert.TestingT, axis angle.Axis, a float64) rotor.Rotor {
	r, ok := rotor.FromAxisAngle([]rotor.Vec{{X: 1}, {Y: 1}, {Z: 1}}[axis], a)
	assert.True(t, ok)
	return r
}

// byTurns is the definition of a sequence: moving axes multiply on the right,
// fixed axes on the left.
func byTurns(t assert.TestingT, s angle.Sequence, n [3]float64) rotor.Rotor {
	r := rotor.One
	for k, axis := range s.Axes {
		if s.Fixed {
			r = turn(t, axis, n[k]).Mul(r)
		} else {
			r = r.Mul(turn(t, axis, n[k]))
		}
	}
	return r
}

func rebuilt(s angle.Sequence, a angle.Triple) rotor.Rotor { return s.Rotor(a.A, a.B, a.C) }

// random is a rotor uniform over all orientations.
func random(rng *rand.Rand) rotor.Rotor {
	r, _ := rotor.Rotor{S: rng.NormFloat64(), E23: rng.NormFloat64(), E31: rng.NormFloat64(), E12: rng.NormFloat64()}.Unit()
	return r
}

func source() *rand.Rand { return rand.New(rand.NewPCG(24, 12)) }

// anySequence and anyRotor draw for properties; rotors are often singular for some sequence.
var anySequence = rapid.SampledFrom(angle.Sequences())

func anyRotor() *rapid.Generator[rotor.Rotor] {
	number := rapid.OneOf(rapid.Float64Range(-1, 1), rapid.SampledFrom([]float64{0, 1, -1, 0.5, math.Sqrt2, 1e-9, 1e-17}))
	return rapid.Custom(func(t *rapid.T) rotor.Rotor {
		r, ok := rotor.Rotor{S: number.Draw(t, "s"), E23: number.Draw(t, "e23"), E31: number.Draw(t, "e31"), E12: number.Draw(t, "e12")}.Unit()
		if !ok {
			t.Skip("zero")
		}
		return r
	})
}

// TestRotorIsTheProductOfTurns: both sides carry two products of unit rotors
// and three half angles rounded to a unit each, so Rounding a piece.
func TestRotorIsTheProductOfTurns(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		s := anySequence.Draw(rt, "sequence")
		var n [3]float64
		for k := range n {
			n[k] = rapid.Float64Range(-7, 7).Draw(rt, "angle")
		}
		r := s.Rotor(n[0], n[1], n[2])
		want := byTurns(rt, s, n)
		assert.LessOrEqual(rt, rotor.Angle(r, want), 4*angle.Rounding, "%v %v", s.Words(), n)
		assert.Positive(rt, r.Dot(want), "%v %v: the sign is that of the product", s.Words(), n)
	})
}

// TestRotorIsTheProductOfMatrices holds the convention to matrices that are written out here.
func TestRotorIsTheProductOfMatrices(t *testing.T) {
	about := func(axis angle.Axis, a float64) matrix.Mat3 {
		s, c := math.Sincos(a)
		return []matrix.Mat3{
			{{1, 0, 0}, {0, c, -s}, {0, s, c}},
			{{c, 0, s}, {0, 1, 0}, {-s, 0, c}},
			{{c, -s, 0}, {s, c, 0}, {0, 0, 1}},
		}[axis]
	}
	for _, s := range angle.Sequences() {
		ma, mb, mc := about(s.Axes[0], 0.3), about(s.Axes[1], -0.8), about(s.Axes[2], 2.5)
		want := ma.Mul(mb).Mul(mc)
		if s.Fixed {
			want = mc.Mul(mb).Mul(ma)
		}
		got := matrix.FromRotor(s.Rotor(0.3, -0.8, 2.5))
		assert.Less(t, got.Sub(want).Norm(), 8*ulp, s.Words())
	}
}

func TestAnglesInRange(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		s, r := anySequence.Draw(rt, "sequence"), anyRotor().Draw(rt, "rotor")
		a := s.Angles(r)
		for _, outer := range []float64{a.A, a.C} {
			assert.True(rt, outer > -math.Pi && outer <= math.Pi, "%v", a)
		}
		low, high := -math.Pi/2, math.Pi/2
		if s.Proper() {
			low, high = 0, math.Pi
		}
		assert.True(rt, a.B >= low && a.B <= high, "%v", a)
		assert.Equal(rt, a, s.Angles(r.Neg()), "R and -R are one rotation")
		assert.LessOrEqual(rt, rotor.Angle(r, rebuilt(s, s.Angles(r.Scale(1e-9)))), 4*angle.Rounding, "the norm does not matter")
	})
}

// TestAnglesReproduce: however near a singular point, and at it, the angles
// give back the rotor. Arctangents are within an ulp of numbers up to pi, 2 ulp of
// 1 each; the singular band may add its width.
func TestAnglesReproduce(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		s, r := anySequence.Draw(rt, "sequence"), anyRotor().Draw(rt, "rotor")
		a := s.Angles(r)
		assert.LessOrEqual(rt, rotor.Angle(r, rebuilt(s, a)), 3*2*ulp+2*angle.Rounding, "%s %v", s.Words(), a)
	})
}

// TestAnglesOfRotor: the numbers themselves come back, with an error that grows as
// the singular point comes near, as Amplification says.
func TestAnglesOfRotor(t *testing.T) {
	rng := source()
	for _, s := range angle.Sequences() {
		for range 2000 {
			n := [3]float64{(rng.Float64() - 0.5) * 2 * math.Pi, (rng.Float64() - 0.5) * math.Pi, (rng.Float64() - 0.5) * 2 * math.Pi}
			if s.Proper() {
				n[1] += math.Pi / 2
			}
			a := s.Angles(s.Rotor(n[0], n[1], n[2]))
			tolerance := 2 * angle.Rounding * s.Amplification(n[1])
			assert.LessOrEqual(t, math.Abs(angle.Wrap(a.A-n[0])), tolerance, "%s %v", s.Words(), n)
			assert.LessOrEqual(t, math.Abs(a.B-n[1]), 2*angle.Rounding, "%s %v", s.Words(), n)
			assert.LessOrEqual(t, math.Abs(angle.Wrap(a.C-n[2])), tolerance, "%s %v", s.Words(), n)
			assert.Equal(t, angle.Regular, a.Band)
		}
	}
}

// singular are the two singular middle angles of a sequence.
func singular(s angle.Sequence) [2]float64 {
	if s.Proper() {
		return [2]float64{0, math.Pi}
	}
	return [2]float64{math.Pi / 2, -math.Pi / 2}
}

func TestSingular(t *testing.T) {
	rng := source()
	for _, s := range angle.Sequences() {
		for _, b := range singular(s) {
			for range 500 {
				a, c := (rng.Float64()-0.5)*6, (rng.Float64()-0.5)*6
				r := s.Rotor(a, b, c)
				got := s.Angles(r)
				assert.Equal(t, b, got.B)
				assert.Equal(t, 0.0, got.C)
				assert.False(t, math.Signbit(got.C))
				switch got.Band {
				case angle.OnlySum:
					assert.InDelta(t, 0, angle.Wrap(got.A-(a+c)), angle.Rounding, s.Words())
				case angle.OnlyDifference:
					assert.InDelta(t, 0, angle.Wrap(got.A-(a-c)), angle.Rounding, s.Words())
				default:
					t.Errorf("%s (%v, %v, %v): %v", s.Words(), a, b, c, got)
				}
				// The other combination may be changed at will.
				shift := rng.Float64()
				other := s.Rotor(a+shift, b, c-shift)
				if got.Band == angle.OnlyDifference {
					other = s.Rotor(a+shift, b, c+shift)
				}
				assert.LessOrEqual(t, rotor.Angle(r, other), 2*angle.Rounding, s.Words())
			}
		}
	}
}

// TestBandOfKnownSequences pins which combination is determined (common
// practice: at pitch +90 degrees only yaw - roll of moving z-y-x is, for ZXZ at
// 0 only the sum).
func TestBandOfKnownSequences(t *testing.T) {
	assert.Equal(t, angle.OnlyDifference, moving(z, y, x).Angles(moving(z, y, x).Rotor(1, math.Pi/2, 0.4)).Band)
	assert.Equal(t, angle.OnlySum, moving(z, y, x).Angles(moving(z, y, x).Rotor(1, -math.Pi/2, 0.4)).Band)
	assert.Equal(t, angle.OnlySum, moving(z, x, z).Angles(moving(z, x, z).Rotor(1, 0, 0.4)).Band)
	assert.Equal(t, angle.OnlyDifference, moving(z, x, z).Angles(moving(z, x, z).Rotor(1, math.Pi, 0.4)).Band)
	assert.Equal(t, "only first+third is determined", angle.OnlySum.String())
	assert.Equal(t, "only first-third is determined", angle.OnlyDifference.String())
	assert.Equal(t, "regular", angle.Regular.String())
}

// TestBandIsThePrecision: the band begins exactly where the nearest singular
// rotation comes within the precision, and the angles given there are that close to the rotor.
func TestBandIsThePrecision(t *testing.T) {
	rng := source()
	for _, s := range angle.Sequences() {
		for _, b := range singular(s) {
			for range 200 {
				off := math.Exp(-rng.Float64() * 20) // 2e-9 to 1
				r := s.Rotor((rng.Float64()-0.5)*6, b+off*sign(rng), (rng.Float64()-0.5)*6)
				for range 20 { // no singular rotation is nearer
					near := s.Rotor((rng.Float64()-0.5)*6, b, (rng.Float64()-0.5)*6)
					assert.GreaterOrEqual(t, rotor.Angle(r, near), off*(1-1e-9)-4*angle.Rounding)
				}
				inside, outside := s.AnglesWithin(r, off*1.001), s.AnglesWithin(r, off*0.999)
				assert.Equal(t, angle.Regular, outside.Band, "%s off %v", s.Words(), off)
				assert.NotEqual(t, angle.Regular, inside.Band, "%s off %v", s.Words(), off)
				assert.Equal(t, 0.0, inside.C)
				assert.InDelta(t, off, rotor.Angle(r, rebuilt(s, inside)), 4*angle.Rounding, "the nearest")
			}
		}
	}
}

func sign(rng *rand.Rand) float64 { return float64(2*rng.IntN(2) - 1) }

// TestBandAtRoundingError: a singular rotor stays in the band after it has been
// through a product, which is what Rounding is derived from.
func TestBandAtRoundingError(t *testing.T) {
	rng := source()
	for _, s := range angle.Sequences() {
		for range 2000 {
			r, q := s.Rotor((rng.Float64()-0.5)*6, singular(s)[rng.IntN(2)], (rng.Float64()-0.5)*6), random(rng)
			assert.NotEqual(t, angle.Regular, s.Angles(q.Mul(q.Reverse().Mul(r))).Band, s.Words())
		}
	}
}

// TestBandIsNarrow: 1e-14 rad from the singular point the angles are still
// told apart, and reproduce the rotor to 1e-15.
func TestBandIsNarrow(t *testing.T) {
	for _, s := range angle.Sequences() {
		r := s.Rotor(0.4, singular(s)[0]-1e-14, 1.1)
		a := s.Angles(r)
		assert.Equal(t, angle.Regular, a.Band, s.Words())
		assert.Less(t, rotor.Angle(r, rebuilt(s, a)), 1e-15, s.Words())
	}
}

// TestQuotientBySignedZero: an outer angle of 90 degrees whose cosine comes out as -0.
func TestQuotientBySignedZero(t *testing.T) {
	r := rotor.Rotor{E23: math.Sqrt2 / 2, E12: math.Sqrt2 / 2}
	for _, s := range angle.Sequences() {
		for _, q := range []rotor.Rotor{r, r.Neg(), {E31: r.E23, E12: r.E12}, {E31: -r.E23, E12: r.E12}, {S: r.E23, E31: -r.E12}} {
			assert.LessOrEqual(t, rotor.Angle(q, rebuilt(s, s.Angles(q))), angle.Rounding, "%s %v", s.Words(), q)
		}
	}
}

func TestNoPrecisionAtAll(t *testing.T) {
	r := moving(z, y, x).Rotor(1, 1, 1)
	for _, precision := range []float64{math.Pi / 2, math.Pi, math.Inf(1)} {
		assert.NotEqual(t, angle.Regular, moving(z, y, x).AnglesWithin(r, precision).Band)
	}
	for _, precision := range []float64{0, -1, math.NaN()} {
		assert.Equal(t, angle.Regular, moving(z, y, x).AnglesWithin(r, precision).Band)
		exact := moving(z, x, z).AnglesWithin(rotor.One, precision)
		assert.Equal(t, angle.Triple{Band: angle.OnlySum}, exact, "exactly singular at any precision")
	}
}

func TestBadInput(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	for _, s := range append(angle.Sequences(), angle.Sequence{}, fixed(x, x, y), fixed(9, 1, 2)) {
		assert.Equal(t, s.Valid(), s.Rotor(1, 1, 1).Finite(), s.Words())
		assert.Equal(t, s.Valid(), !math.IsNaN(s.Angles(rotor.One).A+s.Angles(rotor.One).B), s.Words())
		for _, bad := range []rotor.Rotor{{}, {S: nan}, {S: 1, E12: nan}, {S: inf}, {S: inf, E23: inf}, {E31: -inf}} {
			a := s.Angles(bad)
			assert.True(t, math.IsNaN(a.A) && math.IsNaN(a.B) && math.IsNaN(a.C), "%s %v: %v", s.Words(), bad, a)
			assert.Equal(t, angle.Regular, a.Band)
		}
		for _, bad := range []float64{nan, inf, -inf} {
			assert.False(t, s.Rotor(1, bad, 1).Finite())
			assert.False(t, s.Rotor(bad, 1, 1).Finite())
		}
	}
}

func TestTinyAngles(t *testing.T) {
	for _, s := range angle.Sequences() {
		if s.Proper() {
			continue // tiny middle angles are singular
		}
		a := s.Angles(s.Rotor(1e-9, -2e-9, 3e-9))
		assert.InDelta(t, 1e-9, a.A, 2*ulp)
		assert.InDelta(t, -2e-9, a.B, 2*ulp)
		assert.InDelta(t, 3e-9, a.C, 2*ulp)
	}
}

func TestOther(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		s, r := anySequence.Draw(rt, "sequence"), anyRotor().Draw(rt, "rotor")
		a := s.Angles(r)
		o := s.Other(a)
		assert.LessOrEqual(rt, rotor.Angle(r, rebuilt(s, o)), 4*angle.Rounding, "%s %v %v", s.Words(), a, o)
		assert.Equal(rt, a.Band, o.Band)
		assert.InDelta(rt, math.Pi, math.Abs(a.A-o.A), 4*ulp, "%v %v", a, o)
	})
}

func TestWrap(t *testing.T) {
	for _, c := range []struct{ in, want float64 }{
		{0, 0}, {math.Pi, math.Pi}, {-math.Pi, math.Pi}, {3 * math.Pi, math.Pi}, {-3 * math.Pi, math.Pi},
		{2 * math.Pi, 0}, {-2 * math.Pi, 0}, {1.5 * math.Pi, -0.5 * math.Pi}, {-1.5 * math.Pi, 0.5 * math.Pi},
		{math.Nextafter(math.Pi, 4), -math.Pi + 2*ulp}, {math.Nextafter(-math.Pi, 0), math.Nextafter(-math.Pi, 0)},
	} {
		assert.Equal(t, c.want, angle.Wrap(c.in), "%v", c.in)
	}
	for _, bad := range []float64{math.NaN(), math.Inf(1), math.Inf(-1)} {
		assert.True(t, math.IsNaN(angle.Wrap(bad)))
	}
	rapid.Check(t, func(rt *rapid.T) {
		a := rapid.Float64Range(-1000, 1000).Draw(rt, "angle")
		w := angle.Wrap(a)
		assert.True(rt, w > -math.Pi && w <= math.Pi, "%v", w)
		turns := math.Round((a - w) / (2 * math.Pi))
		assert.InDelta(rt, a, w+turns*2*math.Pi, 1000*ulp)
		assert.Equal(rt, w, angle.Wrap(w))
	})
}

func TestUnwrap(t *testing.T) {
	assert.InDelta(t, 3.3, angle.Unwrap(3.0, 3.3-2*math.Pi), 8*ulp)
	assert.InDelta(t, 3.3-2*math.Pi, angle.Unwrap(-3.0, 3.3), 8*ulp)
	turning := 0.0
	for k := 1; k <= 100; k++ { // ten turns in steps of 36 degrees
		turning = angle.Unwrap(turning, angle.Wrap(float64(k)*math.Pi/5))
		assert.InDelta(t, float64(k)*math.Pi/5, turning, 1e-13)
	}
	assert.Equal(t, math.Pi, angle.Unwrap(0, -math.Pi), "half a turn away: the later one")
}
