package identify

import (
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/convention"
	"dextral/core/rotor"
)

// anyFlight is a flight of 40 s with random swings about all axes, or about one or
// two, or hardly any, at 20 to 200 Hz: rotor kinematics in steps of at most 1 ms.
// The gyro is late by up to 20 ms, has noise up to 20 % and an offset up to 5 % of the
// rates. What the rates are is drawn from the 24 x 2 x 2 x 2 readings; in one case of
// four they are outside of them.
func anyFlight(g *rand.Rand) (samples []Sample, truth SeriesReading, outside bool) {
	axes := 1 + min(g.IntN(6), 2)
	size := math.Exp(g.NormFloat64()*0.7 - 0.7)
	type swing struct {
		at         rotor.Vec
		rate, from float64
	}
	var swings []swing
	for axis := range axes {
		for range 3 {
			var v rotor.Vec
			a := size * (0.3 + g.Float64())
			switch axis {
			case 0:
				v.Z = a
			case 1:
				v.X = a
			case 2:
				v.Y = a
			}
			swings = append(swings, swing{v, 0.2 + 3*g.Float64(), 2 * math.Pi * g.Float64()})
		}
	}
	mount := haar(g)
	rate := func(t float64) (w rotor.Vec) {
		for _, s := range swings {
			w = w.Add(s.at.Scale(math.Sin(s.rate*t + s.from)))
		}
		if axes == 3 {
			return mount.Rotate(w)
		}
		return w
	}
	late, noise := 0.02*g.Float64(), 0.2*size*g.Float64()
	offset := rotor.Vec{X: g.NormFloat64(), Y: g.NormFloat64(), Z: g.NormFloat64()}.Scale(0.03 * size)
	truth = SeriesReading{
		Scalar: []convention.ScalarPlace{convention.ScalarFirst, convention.ScalarLast}[g.IntN(2)],
		Sense:  []Sense{BodyToSpace, SpaceToBody}[g.IntN(2)], Axes: []convention.RateAxes{convention.BodyRates, convention.SpaceRates}[g.IntN(2)],
		Unit: units[g.IntN(2)], Negated: g.IntN(4) == 0,
	}
	if g.IntN(2) == 0 {
		truth.Map = Cube(g.IntN(24))
	}
	outside = g.IntN(4) == 0
	what, other, scale := g.IntN(3), haar(g), []float64{0.3, 3, 20}[g.IntN(3)]
	step := 1 + g.IntN(50) // ms
	r := haar(g)
	for ms := range 40000 {
		t := float64(ms) / 1000
		if ms%max(step, 5) == 0 {
			w := rate(t - late).Add(offset).Add(rotor.Vec{X: g.NormFloat64(), Y: g.NormFloat64(), Z: g.NormFloat64()}.Scale(noise))
			if outside {
				switch what {
				case 0: // of another body
					w = rotor.Vec{X: math.Sin(1.3*t + scale), Y: math.Cos(0.9 * t), Z: math.Sin(0.5*t + scale)}.Scale(size)
				case 1: // mounted askew, no map of axes within 35 degrees
					for askew(other) < 35*math.Pi/180 {
						other = haar(g)
					}
					w = other.Rotate(w)
				case 2: // another unit; one within some percent of a degree or a radian would be one
					w = w.Scale(scale)
				}
			}
			samples = append(samples, written(truth, r, t, w, int64(len(samples)+1)))
		}
		r = r.Mul(rotor.FromRotationVector(rate(t + 0.0005).Scale(0.001)))
	}
	return samples, truth, outside
}

// askew is the angle to the nearest map of axes.
func askew(r rotor.Rotor) float64 {
	least := math.Pi
	for _, c := range cubes {
		least = math.Min(least, rotor.Angle(c, r))
	}
	return least
}

// written writes a rotor from body to space and body rates as a reading says.
func written(as SeriesReading, r rotor.Rotor, t float64, w rotor.Vec, row int64) Sample {
	if as.Axes == convention.SpaceRates {
		w = r.Rotate(w)
	}
	w = cubes[as.Map].Rotate(w).Scale(1 / as.Unit.InRadians())
	if as.Negated {
		w = w.Neg()
	}
	if as.Sense == SpaceToBody {
		r = r.Reverse()
	}
	s, x, y, z := r.Quaternion()
	q := [4]float64{s, x, y, z}
	if as.Scalar == convention.ScalarLast {
		q = [4]float64{x, y, z, s}
	}
	for i := range q {
		q[i] = math.Round(q[i]*1e6) / 1e6
	}
	return Sample{Row: row, T: t, Q: q, W: w}
}

// enough is the criterion of enough excitation: the rates about the second and the
// third axis are four tenths of those about the first, components swing ten times, the
// orientation is 60 degrees (RMS) from its start, and noise, delay and offset together are
// no more than 8 % of the rates. The sign of an axis about which nothing turns cannot
// be seen, nor whether axes are those of the body or of space while these stay the same.
func enough(r *SeriesResult) bool {
	m := &r.Motion
	return m.Third > 0.4 && m.Swings >= 10 && m.Wander > math.Pi/3 && r.Best.Residual < 0.08
}

// TestSeriesFlights measures how often random flights are decided rightly and
// wrongly. DEVELOPERS.md gives the numbers of
// -cases 40000.
func TestSeriesFlights(t *testing.T) {
	g := rand.New(rand.NewPCG(11, 12))
	n := *cases / 4 // an ordinary run is a matter of seconds
	var inside, excited, right, wrong, rightAll int
	for range n {
		samples, truth, outside := anyFlight(g)
		claim := SeriesClaim{Scalar: truth.Scalar}
		if g.IntN(2) == 0 {
			claim.Scalar = convention.ScalarFirst
		}
		var f SeriesFold
		for i := range samples {
			f.Add(samples[i])
		}
		r := f.Result(claim)
		so := slices.ContainsFunc(r.Best.Readings, func(x SeriesReading) bool {
			return x.Scalar == truth.Scalar && x.Sense == truth.Sense && x.Axes == truth.Axes && x.Unit == truth.Unit && x.Negated == truth.Negated && x.Map == truth.Map
		})
		if f.Stretches(claim) != nil {
			wrong++
			t.Logf("changes its convention: %v, outside %v", truth, outside)
		}
		switch {
		case r.Decided && (outside || !so):
			wrong++
			t.Logf("wrong: %v outside %v: %v, residual %.3f, %v", truth, outside, r.Best, r.Best.Residual, r.Motion)
		case r.Decided:
			rightAll++
		}
		if outside {
			continue
		}
		inside++
		if enough(&r) {
			excited++
			if r.Decided && so {
				right++
			} else {
				t.Logf("not decided: %v; residual %.3f margin %.2f, truth %v", r.Motion, r.Best.Residual, r.Margin, truth)
			}
		}
	}
	t.Logf("%d flights, %d of a reading in the set, %d of them with enough motion: right %.2f %%; decided of all in the set %.2f %%; wrong %d",
		n, inside, excited, percent(right, excited), percent(rightAll, inside), wrong)
	assert.GreaterOrEqual(t, float64(right), 0.98*float64(excited)-2)
	assert.LessOrEqual(t, float64(wrong), float64(n)/1000+2)
}
