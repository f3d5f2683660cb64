package kinematics_test

import (
	"fmt"
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"

	"dextral/core/kinematics"
	"dextral/core/rotor"
)

// fold pushes a series with rows counted from 1 and ten rows a second.
func fold(series []rotor.Rotor) (c kinematics.Continuity) {
	for i, r := range series {
		c.Push(int64(i+1), float64(i)/10, r)
	}
	return c
}

// roll is a steady turn about x, in n steps of the given angle.
func roll(n int, step float64) []rotor.Rotor {
	series := make([]rotor.Rotor, n)
	for i := range series {
		series[i] = rotor.FromRotationVector(rotor.Vec{X: float64(i) * step})
	}
	return series
}

func place(row int64) kinematics.Place { return kinematics.Place{Row: row, T: float64(row-1) / 10} }

// TestJump: one changed sign is two jumps, there and back, and the rotation
// has moved by the step all the same.
func TestJump(t *testing.T) {
	const step = 0.02
	series := roll(100, step)
	series[40] = series[40].Scale(-1)
	c := fold(series)
	assert.Equal(t, int64(100), c.Rows)
	assert.Equal(t, int64(2), c.JumpCount)
	for i, row := range []int64{41, 42} {
		j := c.Jumps[i]
		assert.Equal(t, place(row), j.Place)
		within(t, 8*ulp, math.Abs(j.Moved-step), "moved")
		within(t, 8*ulp, math.Abs(j.Apparent-(math.Pi-step/2)), "apparent")
		within(t, 8*ulp, math.Abs(j.Apparent-math.Acos(series[row-1].Dot(series[row-2]))), "the angle of the 4-vectors")
	}
	assert.Zero(t, c.Jumps[2])
	assert.Zero(t, c.Wide.Count)
	within(t, 8*ulp, math.Abs(c.Largest.Angle-step), "largest step")
	within(t, 8*ulp, math.Abs(c.JumpScalar-math.Cos(39*step/2)), "scalar at the jumps")
	assert.False(t, c.ForcedScalar())
}

// TestNoJump: what must stay silent.
func TestNoJump(t *testing.T) {
	for name, series := range map[string][]rotor.Rotor{
		"nothing":                         nil,
		"one row":                         {rotor.One},
		"at rest":                         {rotor.One, rotor.One, rotor.One},
		"a full turn that ends at -R":     roll(400, 2*math.Pi/399),
		"many turns":                      roll(5000, 0.1),
		"steps just short of a half turn": roll(50, 3.1),
		"kept at minus one":               {rotor.One.Neg(), rotor.One.Neg()},
		"half a turn exactly":             {rotor.One, {E12: 1}, rotor.One.Neg()},
		"norms far from one":              {{S: 1e-200}, {S: 1e200, E12: 1e199}, {S: 3}},
		"gaps only":                       {{}, {S: math.NaN()}, {}},
	} {
		c := fold(series)
		assert.Zero(t, c.JumpCount, name)
		assert.Zero(t, c.Wide.Count, name)
		assert.False(t, c.ForcedScalar(), name)
	}
}

// TestWide: from 90 degrees on nobody can tell a changed sign from a turn the
// long way round.
func TestWide(t *testing.T) {
	c := fold(roll(3, math.Pi/2-1e-9))
	assert.Zero(t, c.JumpCount)
	for _, step := range []struct {
		angle       float64
		jumps, wide int64
	}{{math.Pi/2 - 1e-9, 1, 0}, {math.Pi/2 + 1e-9, 0, 1}, {3, 0, 1}} {
		c := fold([]rotor.Rotor{rotor.One, rotor.FromRotationVector(rotor.Vec{Y: step.angle}).Neg()})
		assert.Equal(t, step.jumps, c.JumpCount, "%v", step.angle)
		assert.Equal(t, step.wide, c.Wide.Count, "%v", step.angle)
		if step.wide > 0 {
			assert.Equal(t, place(2), c.Wide.First)
		}
		within(t, 8*ulp, math.Abs(c.Largest.Angle-step.angle), "largest")
	}
}

// TestForcedScalar: a recorder that keeps the scalar from being negative jumps
// wherever the path passes through a half turn, with a small scalar.
func TestForcedScalar(t *testing.T) {
	const step = 0.03
	series := roll(1000, step)
	for i, r := range series {
		if r.S < 0 {
			series[i] = r.Neg()
		}
	}
	c := fold(series)
	assert.True(t, c.ForcedScalar())
	assert.Equal(t, int64(5), c.JumpCount, "30 rad pass a half turn five times")
	assert.Less(t, c.JumpScalar, 2*math.Sin(step/4))
	assert.Equal(t, kinematics.Tally{}, c.NegativeScalar)

	// One flipped row elsewhere, and it is something else.
	series[10] = series[10].Neg()
	c = fold(series)
	assert.False(t, c.ForcedScalar())
	assert.Equal(t, kinematics.Tally{Count: 1, First: place(11)}, c.NegativeScalar)
}

// TestLargest: the widest step, the first of equals, whatever the signs.
func TestLargest(t *testing.T) {
	at := func(angles ...float64) (series []rotor.Rotor) {
		for _, a := range angles {
			series = append(series, rotor.FromRotationVector(rotor.Vec{Y: a}))
		}
		return series
	}
	series := at(0, 0.25, 0.5, 1.5, 2, 2.9, 2.9)
	series[1], series[5] = series[1].Neg(), series[5].Neg()
	c := fold(series)
	assert.Equal(t, place(4), c.Largest.Place)
	within(t, 8*ulp, math.Abs(c.Largest.Angle-1), "largest")
	assert.Equal(t, int64(4), c.JumpCount)

	c = fold(at(0, 2.5, 0, 2.5))
	assert.Equal(t, place(2), c.Largest.Place, "not the way back, which is as long")
	within(t, 8*ulp, math.Abs(c.Largest.Angle-2.5), "largest")
	assert.Zero(t, fold(at(1, 1, 1)).Largest, "nothing moves")
	assert.Zero(t, fold(nil).Largest)
}

// TestManyJumps: all are counted, the first are kept.
func TestManyJumps(t *testing.T) {
	series := roll(100, 0.01)
	for i := range series {
		if i%2 == 1 {
			series[i] = series[i].Neg()
		}
	}
	c := fold(series)
	assert.Equal(t, int64(99), c.JumpCount)
	for i, j := range c.Jumps {
		assert.Equal(t, place(int64(i+2)), j.Place)
	}
}

// TestNorms: the least, the greatest and the worst, with the first row of each;
// zero and not finite rows apart.
func TestNorms(t *testing.T) {
	c := fold([]rotor.Rotor{
		{}, {S: math.NaN()}, {S: 1.01}, {E12: 0.98}, {E12: -0.98}, {}, {S: 1, E31: math.Inf(1)}, {E23: 1.01},
	})
	assert.Equal(t, int64(8), c.Rows)
	assert.Equal(t, kinematics.Tally{Count: 2, First: place(1)}, c.Zero)
	assert.Equal(t, kinematics.Tally{Count: 2, First: place(2)}, c.NonFinite)
	assert.Equal(t, kinematics.Extreme{Value: 0.98, Place: place(4)}, c.MinNorm)
	assert.Equal(t, kinematics.Extreme{Value: 1.01, Place: place(3)}, c.MaxNorm)
	worst, ok := c.WorstNorm()
	assert.True(t, ok)
	assert.Equal(t, c.MinNorm, worst)

	c = fold([]rotor.Rotor{{S: 1.25}, {S: .75}})
	worst, ok = c.WorstNorm()
	assert.True(t, ok)
	assert.Equal(t, c.MaxNorm, worst, "the earlier of two equally bad")
	c = fold([]rotor.Rotor{{S: .75}, {S: 1.25}})
	worst, _ = c.WorstNorm()
	assert.Equal(t, c.MinNorm, worst, "the earlier of two equally bad")
	c = fold([]rotor.Rotor{{}})
	_, ok = c.WorstNorm()
	assert.False(t, ok)
}

// TestGap: the rows on either side of unusable ones are neighbours.
func TestGap(t *testing.T) {
	c := fold([]rotor.Rotor{rotor.One, {}, {S: math.NaN()}, {S: -1, E12: 0.01}})
	assert.Equal(t, int64(1), c.JumpCount)
	assert.Equal(t, place(4), c.Jumps[0].Place)
}

// rows draws a series with everything in it that a log may hold.
func rows() *rapid.Generator[[]rotor.Rotor] {
	return rapid.SliceOfN(rapid.Custom(func(t *rapid.T) rotor.Rotor {
		switch rapid.IntRange(0, 9).Draw(t, "kind") {
		case 0:
			return rotor.Rotor{}
		case 1:
			return rotor.Rotor{S: math.NaN(), E12: 1}
		case 2:
			return rotor.Rotor{S: 1} // exact repeats, equal norms
		}
		r := rotor.FromRotationVector(rotor.Vec{X: rapid.Float64Range(-7, 7).Draw(t, "x"), Z: rapid.Float64Range(-7, 7).Draw(t, "z")})
		return r.Scale(rapid.SampledFrom([]float64{1, -1, 0.5, -1.01}).Draw(t, "scale"))
	}), 0, 60)
}

// bytes is every bit of the state, unexported fields included.
func bytes(c kinematics.Continuity) string { return fmt.Sprintf("%#v", c) }

// TestMerge: any parts, merged in any order of bracketing, are the whole.
func TestMerge(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		series := rows().Draw(t, "series")
		whole := fold(series)
		var parts []kinematics.Continuity
		for from := 0; from < len(series); {
			to := rapid.IntRange(from, len(series)).Draw(t, "to")
			var part kinematics.Continuity
			for i := from; i < to; i++ {
				part.Push(int64(i+1), float64(i)/10, series[i])
			}
			parts, from = append(parts, part), to
		}
		parts = append(parts, kinematics.Continuity{})
		for len(parts) > 1 { // merge two neighbours, wherever they are
			i := rapid.IntRange(0, len(parts)-2).Draw(t, "pair")
			parts[i].Merge(parts[i+1])
			parts = append(parts[:i+1], parts[i+2:]...)
		}
		if got, want := bytes(parts[0]), bytes(whole); got != want {
			t.Fatalf("merged\n%s\nat once\n%s", got, want)
		}
	})
}

// TestMergeSeesTheSeam guards the property above: a jump between two parts is
// counted, and belongs before those that follow.
func TestMergeSeesTheSeam(t *testing.T) {
	series := roll(4, 0.01)
	series[2] = series[2].Neg()
	left := fold(series[:2])
	var right kinematics.Continuity
	for i := 2; i < 4; i++ {
		right.Push(int64(i+1), float64(i)/10, series[i])
	}
	assert.Equal(t, int64(0), left.JumpCount)
	assert.Equal(t, int64(1), right.JumpCount)
	left.Merge(right)
	assert.Equal(t, int64(2), left.JumpCount)
	assert.Equal(t, int64(3), left.Jumps[0].Row)
	assert.Equal(t, int64(4), left.Jumps[1].Row)
}

func TestPushDoesNotAllocate(t *testing.T) {
	series := roll(1000, 0.01)
	var c kinematics.Continuity
	assert.Zero(t, testing.AllocsPerRun(10, func() {
		for i, r := range series {
			c.Push(int64(i), 0, r)
		}
		c.Merge(c)
	}))
}

func BenchmarkPush(b *testing.B) {
	series := roll(1024, 0.01)
	var c kinematics.Continuity
	b.ReportAllocs()
	for i := 0; i < b.N; i++ {
		c.Push(int64(i), 0, series[i%1024])
	}
}
