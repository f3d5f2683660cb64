package identify

import (
	"encoding/csv"
	"fmt"
	"math"
	"math/rand/v2"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"testing"

	"dextral/core/convention"
	"dextral/core/rotor"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// fly makes a series of orientations, body to space, with body rates in rad/s
// about all axes, scalar first.
func fly(n int, dt float64) []Sample {
	samples := make([]Sample, n)
	r := rotor.One
	rate := func(t float64) rotor.Vec {
		return rotor.Vec{X: 0.4 * math.Sin(0.7*t), Y: 0.3 * math.Cos(1.1*t+1), Z: 0.5 * math.Sin(0.3*t+2)}
	}
	const fine = 20
	for i := range samples {
		t := float64(i) * dt
		w, x, y, z := r.Quaternion()
		samples[i] = Sample{T: t, Q: [4]float64{w, x, y, z}, W: rate(t)}
		for k := range fine {
			h := dt / fine
			r = r.Mul(rotor.FromRotationVector(rate(t + (float64(k)+.5)*h).Scale(h)))
		}
	}
	return samples
}

var flown = SeriesClaim{Scalar: convention.ScalarFirst, Sense: BodyToSpace, Axes: convention.BodyRates, Unit: convention.Radian}

func (x *Sample) unitRotor() rotor.Rotor {
	r, _ := x.rotor().Unit()
	return r
}

// seriesSlips plant one change in every sample.
var seriesSlips = map[Change]func(*Sample){
	ScalarOrder: func(x *Sample) { x.Q = [4]float64{x.Q[1], x.Q[2], x.Q[3], x.Q[0]} },
	Inverse:     func(x *Sample) { x.Q[1], x.Q[2], x.Q[3] = -x.Q[1], -x.Q[2], -x.Q[3] },
	UnitSlip:    func(x *Sample) { x.W = x.W.Scale(180 / math.Pi) },
	RateAxes:    func(x *Sample) { x.W = x.unitRotor().Rotate(x.W) },
	RateSign:    func(x *Sample) { x.W = x.W.Neg() },
	Remap:       func(x *Sample) { x.W = rotor.Vec{X: x.W.Y, Y: x.W.X, Z: -x.W.Z} },
}

func TestSeriesAsClaimed(t *testing.T) {
	r := Series(fly(2000, 0.01), flown)
	assert.Equal(t, Agree, r.Verdict, r.Reason)
	assert.True(t, r.Decided)
	assert.Less(t, r.Best.Residual, 1e-2)
	assert.Greater(t, r.Margin, 50.0)
}

func TestSeriesSlips(t *testing.T) {
	for slip, plant := range seriesSlips {
		samples := fly(3000, 0.01)
		for i := range samples {
			plant(&samples[i])
		}
		r := Series(samples, flown)
		require.Equal(t, Contradicted, r.Verdict, "%s: %s", slip, r.Reason)
		assert.True(t, r.Decided, slip.String())
		assert.Equal(t, []Change{slip}, r.Best.Changes(), r.Best.String())
		bare := Series(samples, SeriesClaim{}) // claims the axes alone: the sign is free with the direction
		assert.Equal(t, slip == Remap, bare.Verdict == Contradicted, slip.String())
	}
}

// With free signs of the rates the reverse of a rotor in the other axes says
// the same: no series can tell these apart, and they are one class.
func TestSeriesAliases(t *testing.T) {
	r := Series(fly(2000, 0.01), SeriesClaim{})
	require.True(t, r.Decided)
	require.Len(t, r.Best.Readings, 4)
	one, other := r.Best.Readings[0], r.Best.Readings[1]
	assert.Equal(t, BodyToSpace, one.Sense)
	assert.Equal(t, convention.BodyRates, one.Axes)
	assert.Equal(t, SpaceToBody, other.Sense)
	assert.Equal(t, convention.SpaceRates, other.Axes)
	assert.True(t, other.Negated)
}

func TestSeriesThatCannotDecide(t *testing.T) {
	still := fly(500, 0.01)
	for i := range still {
		still[i].Q = [4]float64{1, 0, 0, 0}
	}
	assert.Equal(t, Undecided, Series(still, flown).Verdict)
	assert.Contains(t, Series(still, flown).Reason, "too little motion")
	assert.Equal(t, Undecided, Series(nil, flown).Verdict)

	zero := fly(500, 0.01)
	for i := range zero {
		zero[i].W = rotor.Vec{}
	}
	assert.Equal(t, Undecided, Series(zero, flown).Verdict)
	assert.Contains(t, Series(zero, flown).Reason, "zero throughout")

	spin := make([]Sample, 500) // about one axis: body and space rates are the same
	for i := range spin {
		at := 0.01 * float64(i)
		spin[i] = Sample{T: at, Q: [4]float64{math.Cos(at / 4), 0, 0, math.Sin(at / 4)}, W: rotor.Vec{Z: 0.5}}
	}
	r := Series(spin, flown)
	assert.Equal(t, Agree, r.Verdict)
	assert.False(t, r.Decided)
	for i := range spin {
		spin[i].W.Z = -0.5
	}
	r = Series(spin, flown)
	assert.Equal(t, Contradicted, r.Verdict)
	assert.False(t, r.Decided, "the sign or the direction: %s", r.Best)
	assert.Equal(t, 1, r.Ties[0].Cost)

	g := rand.New(rand.NewPCG(1, 1))
	noise := fly(2000, 0.01)
	for i := range noise {
		noise[i].W = rotor.Vec{X: g.NormFloat64(), Y: g.NormFloat64(), Z: g.NormFloat64()}
	}
	r = Series(noise, flown)
	assert.Equal(t, Undecided, r.Verdict)
	assert.Contains(t, r.Reason, "no reading explains the rates")
}

func TestSeriesWithBias(t *testing.T) {
	samples := fly(3000, 0.01)
	for i := range samples {
		samples[i].W = samples[i].W.Add(rotor.Vec{X: 0.2, Y: -0.3, Z: 0.1})
	}
	r := Series(samples, flown)
	assert.Equal(t, Agree, r.Verdict)
	assert.True(t, r.Biased)
	assert.True(t, r.Decided)
}

func TestSeriesSurvivesBadRows(t *testing.T) {
	samples := fly(3000, 0.01)
	for i := range samples {
		switch {
		case i%10 == 3:
			samples[i].T = samples[i-1].T // repeated stamp
		case i%50 == 7:
			samples[i].W.X = math.NaN()
		case i%50 == 9:
			samples[i].Q = [4]float64{}
		case i%500 == 11:
			samples[i].Q = [4]float64{0, 1, 0, 0} // a jump
		case i%2 == 0:
			for k := range samples[i].Q { // -q is the same rotation
				samples[i].Q[k] *= -1
			}
		}
	}
	r := Series(samples, flown)
	assert.Equal(t, Agree, r.Verdict, r.Reason)
	assert.True(t, r.Decided)
}

// A filter that is reset throws the orientation to another place now and then.
func TestSeriesSurvivesResets(t *testing.T) {
	samples := fly(3000, 0.01)
	reset := rotor.One
	for i := range samples {
		if i%700 == 350 {
			reset = reset.Mul(rotor.FromRotationVector(rotor.Vec{X: 0.8, Y: -0.5, Z: 0.3}))
		}
		w, x, y, z := reset.Mul(samples[i].unitRotor()).Quaternion()
		samples[i].Q = [4]float64{w, x, y, z}
	}
	r := Series(samples, flown)
	assert.Equal(t, Agree, r.Verdict, r.Reason)
	assert.True(t, r.Decided)
	assert.Less(t, r.Best.Residual, 0.05)
}

// TestSeriesConfusion measures the rows about series in the package
// documentation: random starts, slips and amounts of noise of the rates; in a
// third of the cases rates that have nothing to do with the orientations.
func TestSeriesConfusion(t *testing.T) {
	flight := fly(400, 0.05)
	for _, noise := range []float64{0.01, 0.1, 0.3, 1} {
		g := rand.New(rand.NewPCG(2, 3))
		inside, right, wrong := 0, 0, 0
		for range *cases {
			unrelated := g.IntN(3) == 0
			samples, slip := slipped(g, flight, noise, unrelated)
			r := Series(samples, flown)
			changes := r.Best.Changes()
			switch so := len(changes) == 1 && changes[0] == slip; {
			case unrelated && r.Decided, !unrelated && r.Decided && !so:
				wrong++
				t.Logf("wrong: %s, unrelated %v: %v %v %g", slip, unrelated, r.Verdict, r.Best, r.Best.Residual)
			case r.Decided:
				right++
			}
			if !unrelated {
				inside++
			}
		}
		title := fmt.Sprintf("series, noise %g %% of the rates", 100*noise)
		t.Logf("%-36s %6.2f %8d", title, percent(right, inside), wrong)
		documented(t, title, 0, right, inside)
		assert.LessOrEqual(t, float64(wrong), most(*cases))
	}
}

// slipped is the flight from another start with one slip planted and noise, or
// with rates from a flight of its own.
func slipped(g *rand.Rand, flight []Sample, noise float64, unrelated bool) ([]Sample, Change) {
	const size = 0.4 // RMS rate of the flight, about, rad/s
	slip := []Change{ScalarOrder, Inverse, UnitSlip, RateAxes, RateSign, Remap}[g.IntN(6)]
	start, mount, phase := haar(g), haar(g), 10*g.Float64()
	samples := slices.Clone(flight)
	for k := range samples {
		x := &samples[k]
		w, a, b, c := start.Mul(x.unitRotor()).Quaternion()
		x.Q = [4]float64{w, a, b, c}
		if unrelated {
			x.W = mount.Rotate(rotor.Vec{X: math.Sin(x.T + phase), Y: math.Cos(.6*x.T + phase), Z: math.Sin(.4 * x.T)}.Scale(size))
		}
		x.W = x.W.Add(rotor.Vec{X: g.NormFloat64(), Y: g.NormFloat64(), Z: g.NormFloat64()}.Scale(noise * size / math.Sqrt(3)))
		if !unrelated {
			seriesSlips[slip](x)
		}
	}
	return samples, slip
}

// A long series takes no more memory than a short one, and is judged alike.
func TestLongSeries(t *testing.T) {
	flight := fly(4000, 0.05)
	var f SeriesFold
	for lap := range 20 {
		for _, x := range flight {
			x.T += float64(lap) * 200
			f.Add(x)
		}
	}
	assert.LessOrEqual(t, len(f.windows), maxWindows)
	assert.Greater(t, len(f.windows), maxWindows/4)
	r := f.Result(flown)
	assert.Equal(t, Agree, r.Verdict)
	assert.True(t, r.Decided)
	row := flight[0]
	n := testing.AllocsPerRun(1000, func() { row.T += 0.001; f.Add(row) })
	assert.Zero(t, n)
}

// corpus opens a public log that is not part of the project; DEXTRAL_CORPUS
// names the directory that holds it.
func corpus(t *testing.T, name string) []map[string]float64 {
	t.Helper()
	dir := os.Getenv("DEXTRAL_CORPUS")
	if dir == "" {
		t.Skipf("DEXTRAL_CORPUS is not set: %s is not read", name)
	}
	file, err := os.Open(filepath.Join(dir, "logs", name))
	if err != nil {
		t.Skipf("%s is absent: %v", name, err)
	}
	defer file.Close()
	rows, err := csv.NewReader(file).ReadAll()
	require.NoError(t, err)
	var out []map[string]float64
	for _, row := range rows[1:] {
		m := map[string]float64{}
		for i, cell := range row {
			if x, err := strconv.ParseFloat(strings.TrimSpace(cell), 64); err == nil {
				m[rows[0][i]] = x
			}
		}
		out = append(out, m)
	}
	return out
}

func columns(rows []map[string]float64, stamp string, scale float64, names [7]string) []Sample {
	samples := make([]Sample, len(rows))
	for i, m := range rows {
		samples[i] = Sample{
			T: m[stamp] * scale,
			Q: [4]float64{m[names[0]], m[names[1]], m[names[2]], m[names[3]]},
			W: rotor.Vec{X: m[names[4]], Y: m[names[5]], Z: m[names[6]]},
		}
	}
	return samples
}

// A public quadruped log: its message type is documented as scalar last, world
// from sensor, rad/s.
func TestQuadrupedLog(t *testing.T) {
	rows := corpus(t, "ros_quadruped_imu.csv")
	const o, w = "field.orientation.", "field.angular_velocity."
	r := Series(columns(rows, "%time", 1e-9, [7]string{o + "x", o + "y", o + "z", o + "w", w + "x", w + "y", w + "z"}), SeriesClaim{})
	t.Logf("%v %.4f; next %v %.4f; %s", r.Best, r.Best.Residual, r.Next, r.Next.Residual, r.Motion)
	t.Logf("%+v %s", r.Motion, r.Reason)
	require.Equal(t, Agree, r.Verdict, r.Reason)
	require.False(t, r.Tied())
	for _, tie := range r.Ties { // the robot falls over once, sideways: some maps of axes remain
		assert.Equal(t, []Change{Remap}, tie.Changes())
	}
	best := r.Best.Readings[0]
	assert.Equal(t, SeriesReading{Scalar: convention.ScalarLast, Sense: BodyToSpace, Axes: convention.BodyRates, Unit: convention.Radian}, best)
}

// A public telemetry excerpt of a space station at a nearly constant rate
// about one axis: scalar first, rad/s. Scalar last and reversed is a near alias.
func TestStationLog(t *testing.T) {
	rows := corpus(t, "iss_openloop_sc_ck.csv")
	const q, w = "hps.bad_quat_iss_eci_", "hps.bad_rate_iss_"
	r := Series(columns(rows, "hps.corrected_tms", 1, [7]string{q + "s", q + "i", q + "j", q + "k", w + "x", w + "y", w + "z"}), SeriesClaim{})
	t.Logf("%v %.5f; next %v %.5f; %s", r.Best, r.Best.Residual, r.Next, r.Next.Residual, r.Motion)
	t.Logf("%+v %s", r.Motion, r.Reason)
	assert.Equal(t, convention.ScalarFirst, r.Best.Readings[0].Scalar)
	assert.Equal(t, convention.BodyRates, r.Best.Readings[0].Axes)
}

func BenchmarkSeries10000(b *testing.B) {
	samples := fly(10000, 0.01)
	b.ReportAllocs()
	for b.Loop() {
		Series(samples, flown)
	}
}
