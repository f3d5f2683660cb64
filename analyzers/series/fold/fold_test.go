package fold

import (
	"fmt"
	"math"
	"math/rand/v2"
	"strconv"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"dextral/core/convention"
	"dextral/core/rotor"
)

// cell is a cell as a text reader would make it.
func cell(text string) Cell {
	var c Cell
	switch end := c.Scan([]byte(text), 0, '.'); {
	case text == "nan":
		c.binary(math.NaN())
	case text == "":
	case end == len(text):
		c.State = Written
	default:
		panic("not a number: " + text)
	}
	return c
}

// binary sets a value without digits.
func (c *Cell) binary(v float64) { c.Number.Value, c.State = v, Binary }

func cells(texts ...string) []Cell {
	out := make([]Cell, len(texts))
	for i, t := range texts {
		out[i] = cell(t)
	}
	return out
}

// layout is that of a log t, q (4), angles (3), matrix (9).
func layout() *Layout {
	at := func(from, n int) []int {
		var c []int
		for i := range n {
			c = append(c, from+i)
		}
		return c
	}
	return &Layout{
		Channels: []Channel{
			{convention.Quaternion, at(1, 4), at(1, 4)},
			{convention.Angles, at(5, 3), at(5, 3)},
			{convention.Rotation, at(8, 9), at(8, 9)},
		},
		Time: 0, Fine: -1, Start: Stamp{known: true, Exact: true},
		Pairs: [][2]int{{0, 1}, {0, 2}},
		Rates: []Rates{{0, [3]int{5, 6, 7}, 1}},
	}
}

// anyRows draws rows with everything that logs contain: few different numbers,
// so that extremes tie, gaps, NaN, zeros, repeated and reversed stamps.
func anyRows(t *rapid.T) [][]Cell {
	text := rapid.OneOf(
		rapid.SampledFrom([]string{"0", "1", "-1", "0.5", "-0.5", "0.5", "0.70710678", "", "nan", "0.25"}),
		rapid.Map(rapid.IntRange(-3, 3), strconv.Itoa),
	)
	row := rapid.Custom(func(t *rapid.T) []Cell {
		c := make([]Cell, 17)
		for i := range c {
			c[i] = cell(text.Draw(t, "cell"))
		}
		if rapid.IntRange(0, 3).Draw(t, "gap") == 0 {
			clear(c[1:5])
		}
		return c
	})
	return rapid.SliceOfN(row, 0, 12).Draw(t, "rows")
}

func TestAnySplitGivesTheSame(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		l := layout()
		rows := anyRows(t)
		rows = append(rows, rows...)
		whole := New(l)
		for i, c := range rows {
			whole.Row(int64(i+1), c)
		}
		parts := []*Fold{New(l)}
		for i, c := range rows {
			if rapid.IntRange(0, 2).Draw(t, "cut") == 0 {
				parts = append(parts, New(l))
			}
			parts[len(parts)-1].Row(int64(i+1), c)
		}
		for len(parts) > 1 { // in any order of neighbours: merging is associative
			k := rapid.IntRange(0, len(parts)-2).Draw(t, "pair")
			parts[k].Merge(parts[k+1])
			parts = append(parts[:k+1], parts[k+2:]...)
		}
		same(t, whole, parts[0])
		parts[0].Reset()
		same(t, New(l), parts[0])
	})
}

// same compares two folds and shows where they differ first.
func same(t require.TestingT, want, got *Fold) {
	a, b := print(want), print(got)
	i := 0
	for i < min(len(a), len(b)) && a[i] == b[i] {
		i++
	}
	require.True(t, a == b, "from byte %d: want %.200s\ngot %.200s", i, a[max(0, i-100):], b[max(0, i-100):])
}

// print shows all of a fold but its layout; unlike ==, NaN is equal to NaN. What a
// sample holds beyond its count is left over from before.
func print(f *Fold) string {
	s := fmt.Sprintf("%d %+v %+v %+v", f.Rows, f.Clock, f.Channels, f.Rates)
	for i := range f.Pairs {
		p := &f.Pairs[i]
		s += fmt.Sprintf(" level %d %v %v", p.level, p.Rows[:p.Count], p.Numbers[:p.Count])
	}
	return s
}

// Long series, so that samples are thinned and lists are full.
func TestAnySplitOfALongSeries(t *testing.T) {
	l := layout()
	rng := rand.New(rand.NewPCG(1, 2))
	rows := make([][]Cell, 3000)
	for i := range rows {
		c := make([]Cell, 17)
		for j := range c {
			c[j] = cell(strconv.FormatFloat(rng.NormFloat64(), 'f', 1+rng.IntN(9), 64))
		}
		c[0] = cell(strconv.Itoa(i / 3 * (1 - 2*(i/1000%2))))
		rows[i] = c
	}
	whole := New(l)
	for i, c := range rows {
		whole.Row(int64(i+1), c)
	}
	for range 20 {
		merged := New(l)
		for i := 0; i < len(rows); {
			part := New(l)
			for n := rng.IntN(500); n >= 0 && i < len(rows); n-- {
				part.Row(int64(i+1), rows[i])
				i++
			}
			merged.Merge(part)
		}
		same(t, whole, merged)
	}
	require.Greater(t, whole.Channels[0].Continuity.JumpCount, int64(100))
	require.Greater(t, whole.Clock.Repeated.Count, int64(1000))
	require.Greater(t, whole.Clock.Reversed.Count, int64(100))
}

func TestRowDoesNotAllocate(t *testing.T) {
	f := New(layout())
	q := rotor.FromRotationVector(rotor.Vec{X: 0.3, Y: 0.2, Z: 0.1})
	c := make([]Cell, 17)
	row := int64(0)
	w, x, y, z := q.Quaternion()
	for i, v := range []float64{0, w, x, y, z, 10, 20, 30, 1, 0, 0, 0, 1, 0, 0, 0, 1} {
		c[i] = cell(strconv.FormatFloat(v, 'f', 9, 64))
	}
	assert.Zero(t, testing.AllocsPerRun(1000, func() { row++; f.Row(row, c) }))
	other := New(layout())
	other.Row(5000, c)
	assert.Zero(t, testing.AllocsPerRun(100, func() { f.Merge(other) }))
	assert.Zero(t, testing.AllocsPerRun(100, func() { other.Reset() }))
}

// A row of gaps is no row of the channel; a row with one gap is not finite.
func TestGaps(t *testing.T) {
	f := New(layout())
	f.Row(1, make([]Cell, 17))
	c := make([]Cell, 17)
	c[2] = cell("1")
	f.Row(2, c)
	q := f.Channels[0]
	assert.EqualValues(t, 1, q.Gaps.Count)
	assert.EqualValues(t, 1, q.Gaps.First.Row)
	assert.EqualValues(t, 1, q.Continuity.Rows)
	assert.EqualValues(t, 1, q.Continuity.NonFinite.Count)
	assert.EqualValues(t, 2, q.Continuity.NonFinite.First.Row)
	assert.EqualValues(t, 2, f.Channels[1].Gaps.Count)
	assert.EqualValues(t, 2, f.Clock.Missing.Count)
}

func TestMatrices(t *testing.T) {
	f := New(layout())
	for i, m := range [][]string{
		{"1", "0", "0", "0", "1", "0", "0", "0", "1"},
		{"0", "1", "0", "1", "0", "0", "0", "0", "1"}, // a mirror
		{"0", "0", "0", "0", "0", "0", "0", "0", "0"},
		{"2", "0", "0", "0", "2", "0", "0", "0", "2"}, // det 8, defect |3 1| = 3 sqrt 3
		{"nan", "0", "0", "0", "2", "0", "0", "0", "2"},
	} {
		f.Row(int64(i+1), append(make([]Cell, 8), cells(m...)...))
	}
	m := f.Channels[2].Matrices.Rules()
	assert.EqualValues(t, 3, m.Count)
	assert.EqualValues(t, 1, m.Mirrors.Count)
	assert.EqualValues(t, 2, m.Mirrors.First.Row)
	assert.EqualValues(t, 3, m.Zero.First.Row)
	assert.EqualValues(t, 5, m.NonFinite.First.Row)
	assert.Equal(t, -1.0, m.Det.Min.Value)
	assert.Equal(t, 8.0, m.Det.Max.Value)
	assert.InDelta(t, 3*math.Sqrt(3), m.Defect.Value, 1e-14) // a few roundings of numbers near 5
	assert.EqualValues(t, 4, m.Defect.Row)
	// From the mirror to twice the identity: four entries differ by 2, 1, 1, 2, one by 1.
	assert.InDelta(t, math.Sqrt(4+1+1+4+1), m.Largest.Value, 1e-14)
}

func TestSampleIsSpreadAndInStepWithNothing(t *testing.T) {
	l := layout()
	c := make([]Cell, 17)
	for i := range c {
		c[i] = cell("0.5")
	}
	for _, period := range []int64{1, 2, 3, 7, 10, 64, 1024} {
		f := New(l)
		const rows = 5000
		for i := int64(1); i <= rows; i++ {
			f.Row(i*period+1, c)
		}
		s := &f.Pairs[0]
		assert.LessOrEqual(t, s.Count, Size)
		assert.GreaterOrEqual(t, s.Count, 16, "period %d", period) // 32 are expected, give or take 6
		for quarter := range int64(4) {
			n := 0
			for _, r := range s.Rows[:s.Count] {
				if r > quarter*rows*period/4 && r <= (quarter+1)*rows*period/4+1 {
					n++
				}
			}
			assert.NotZero(t, n, "period %d, quarter %d", period, quarter)
		}
	}
	f := New(l)
	for i := int64(1); i <= Size; i++ {
		f.Row(i, c)
	}
	assert.Equal(t, Size, f.Pairs[0].Count, "a short log is kept whole")
	a, b := f.Pairs[1].Split(3, &l.Channels[0], &l.Channels[2])
	assert.Len(t, a, 4)
	assert.Len(t, b, 9)
}

func BenchmarkRow(b *testing.B) {
	l := layout()
	l.Channels, l.Pairs = l.Channels[:1], nil
	f := New(l)
	rng := rand.New(rand.NewPCG(3, 4))
	rows := make([][]Cell, 1024)
	for i := range rows {
		q := rotor.FromRotationVector(rotor.Vec{X: 0.3 + float64(i)*0.002, Y: rng.NormFloat64() * 0.001, Z: 0.1})
		w, x, y, z := q.Quaternion()
		rows[i] = make([]Cell, 5)
		for j, v := range []float64{float64(i) * 0.005, w, x, y, z} {
			rows[i][j] = cell(strconv.FormatFloat(v, 'f', 6, 64))
		}
	}
	b.ReportAllocs()
	i := 0
	for b.Loop() {
		f.Row(int64(i+1), rows[i%len(rows)])
		i++
	}
}
