package identify

import (
	"fmt"
	"math"
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"dextral/core/convention"
	"dextral/core/rotor"
)

// Any split of a series gives the same fold to the bit, gaps, repeated and
// reversed stamps included.
func TestSeriesFoldAnySplit(t *testing.T) {
	flight := fly(1500, 0.02)
	rapid.Check(t, func(t *rapid.T) {
		rows := append([]Sample(nil), flight[:rapid.IntRange(0, 60).Draw(t, "rows")]...)
		for i := range rows {
			switch rapid.IntRange(0, 12).Draw(t, "what") {
			case 0:
				rows[i].W.X = math.NaN()
			case 1:
				rows[i].T = float64(rapid.IntRange(0, 12).Draw(t, "t")) * 0.1
			case 2:
				rows[i].W.Z = 1e9
			}
		}
		var whole SeriesFold
		parts := []*SeriesFold{{}}
		for _, x := range rows {
			whole.Add(x)
			if rapid.IntRange(0, 3).Draw(t, "cut") == 0 {
				parts = append(parts, &SeriesFold{})
			}
			parts[len(parts)-1].Add(x)
		}
		for len(parts) > 1 {
			k := rapid.IntRange(0, len(parts)-2).Draw(t, "pair")
			parts[k].Merge(parts[k+1])
			parts = append(parts[:k+1], parts[k+2:]...)
		}
		require.Equal(t, fmt.Sprintf("%+v", whole), fmt.Sprintf("%+v", *parts[0]))
	})
}

// Past maxWindows the choice of runs does not depend on the split either.
func TestSeriesFoldAnySplitOfALongSeries(t *testing.T) {
	flight := fly(3*maxWindows, 0.1)
	var whole, merged SeriesFold
	for from := 0; from < len(flight); from += 777 {
		var part SeriesFold
		for _, x := range flight[from:min(from+777, len(flight))] {
			whole.Add(x)
			part.Add(x)
		}
		merged.Merge(&part)
	}
	assert.Equal(t, fmt.Sprintf("%+v", whole), fmt.Sprintf("%+v", merged))
}

// The rates of a flight that are late by a part of a sample, with an offset.
func TestSeriesDelayAndBias(t *testing.T) {
	for _, late := range []float64{-0.013, 0, 0.004, 0.02} {
		fine := fly(30000, 0.001)
		offset := rotor.Vec{X: 0.02, Y: -0.01}
		var rows []Sample
		for i := 100; i+100 < len(fine); i += 10 {
			x := fine[i]
			x.W = fine[i-int(late*1000)].W.Add(offset)
			rows = append(rows, x)
		}
		r := Series(rows, flown)
		require.True(t, r.Decided, r.Reason)
		assert.Equal(t, late != 0, r.Delay.Known, "%v", r.Delay)
		assert.InDelta(t, late, r.Delay.Value, 0.0005)
		assert.InDelta(t, offset.X, r.Bias[0].Value, 0.002)
		assert.InDelta(t, offset.Y, r.Bias[1].Value, 0.002)
		assert.True(t, r.Bias[0].Known && r.Bias[1].Known)
	}
	spin := fly(2000, 0.01)
	for i := range spin { // an offset of a constant rate is none
		at := 0.01 * float64(i)
		spin[i].Q, spin[i].W = [4]float64{math.Cos(at / 4), 0, 0, math.Sin(at / 4)}, rotor.Vec{Z: 0.6}
	}
	assert.False(t, Series(spin, flown).Bias[2].Known)
}

// A slip planted in the middle of a flight is found, with its rows; the clean
// flight is one stretch.
func TestSeriesStretches(t *testing.T) {
	g := rand.New(rand.NewPCG(5, 8))
	for slip, plant := range seriesSlips {
		samples := fly(6000, 0.01)
		for i := range samples {
			samples[i].Row = int64(i + 1)
			samples[i].W = samples[i].W.Add(rotor.Vec{X: g.NormFloat64(), Y: g.NormFloat64(), Z: g.NormFloat64()}.Scale(0.05))
		}
		var clean, mixed SeriesFold
		from, to := 1500+g.IntN(1500), 4000+g.IntN(1000)
		for i := range samples {
			clean.Add(samples[i])
			if i+1 >= from && i+1 < to {
				plant(&samples[i])
			}
			mixed.Add(samples[i])
		}
		assert.Nil(t, clean.Stretches(flown))
		found := mixed.Stretches(flown)
		require.Len(t, found, 3, slip.String())
		assert.Equal(t, []Change{slip}, found[1].Changes)
		assert.Equal(t, []Change{slip}, found[2].Changes, "and back")
		for k, row := range []int{from, to} {
			assert.Less(t, found[k].To.Row, int64(row), "%s at %d", slip, row)
			assert.GreaterOrEqual(t, found[k+1].From.Row, int64(row), "%s at %d", slip, row)
			assert.Less(t, found[k+1].From.Row-found[k].To.Row, int64(80), slip.String())
		}
		assert.Equal(t, convention.ScalarFirst, found[0].Class.Readings[0].Scalar)
	}
}
