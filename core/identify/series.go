package identify

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"dextral/core/convention"
	"dextral/core/rotor"
)

// Sample is one row of a series: four numbers of an orientation as written and
// the angular rate beside them.
type Sample struct {
	T float64    // s
	Q [4]float64 // a quaternion
	W rotor.Vec  // an angular rate, in the unit as written
}

// Sense is the direction of the orientations of a series.
type Sense uint8

// The senses: v_space = R v_body and its reverse.
const (
	SenseUnstated Sense = iota
	BodyToSpace
	SpaceToBody
)

func (s Sense) String() string {
	return [...]string{"direction unstated", "v_space = R v_body", "v_body = R v_space"}[s]
}

// SeriesClaim is what is said about a series; zero fields are unstated.
type SeriesClaim struct {
	Scalar convention.ScalarPlace
	Sense  Sense
	Axes   convention.RateAxes
	Unit   convention.Unit // of the rates, per second
}

// SeriesReading is one way to read orientations and rates.
type SeriesReading struct {
	Scalar  convention.ScalarPlace
	Sense   Sense
	Axes    convention.RateAxes
	Unit    convention.Unit
	Negated bool // the rates have the wrong sign
	Map     Cube // the axes of the rates, seen from those of the orientations
	changes changeSet
	cost    int
}

// Changes lists what the reading changes about the claims.
func (r SeriesReading) Changes() []Change { return r.changes.list() }

// Cost is the sum of the costs of the changes.
func (r SeriesReading) Cost() int { return r.cost }

// String says how the series is read.
func (r SeriesReading) String() string {
	text := fmt.Sprintf("%s, %s, %s in %ss", r.Scalar, r.Sense, r.Axes, r.Unit)
	if r.Negated {
		text += ", negated"
	}
	if r.Map != 0 {
		text += fmt.Sprintf(", axes mapped %s", r.Map)
	}
	return text
}

// SeriesClass is a class of readings that predict the same rates from any
// series. The body rates of the reverse are minus the space rates of the rotor.
// And four numbers read with the scalar at the wrong end are the reverse of
// the rotor between two maps of axes, of which rates see one: with free maps
// of axes no rates tell where the scalar stands. Fewest changes do.
type SeriesClass struct {
	Readings []SeriesReading // cheapest first
	Cost     int
	Residual float64 // RMS of rate minus prediction, as a part of the RMS of the rates
}

// String says how the cheapest readings read the series.
func (c SeriesClass) String() string {
	var texts []string
	for _, r := range c.Readings {
		if r.cost == c.Cost {
			texts = append(texts, r.String())
		}
	}
	return strings.Join(texts, "; or ")
}

// Changes lists the changes of the cheapest reading.
func (c SeriesClass) Changes() []Change {
	if len(c.Readings) == 0 {
		return nil
	}
	return c.Readings[0].Changes()
}

// SeriesResult compares the orientations of a series with its rates.
type SeriesResult struct {
	Verdict Verdict // Agree, Contradicted, Unexplained or Undecided
	Stated  SeriesClass
	Best    SeriesClass   // the cheapest class of those that the rates do not exclude
	Next    SeriesClass   // the nearest class that they exclude
	Ties    []SeriesClass // other classes that they do not exclude, by cost
	Decided bool          // Best is the only class that they do not exclude
	Margin  float64       // residual of Next over that of the nearest class
	Biased  bool          // a constant offset of the rates has been taken out
	Motion  Motion
	Reason  string
}

// Tied reports whether another class is as cheap as Best and not excluded.
func (r SeriesResult) Tied() bool { return len(r.Ties) > 0 && r.Ties[0].Cost == r.Best.Cost }

// Motion is what there was to see.
type Motion struct {
	Windows int     // steps used: of long series a part
	Turn    float64 // rad: sum of their turns
	Rate    float64 // rad/s: RMS
	Second  float64 // RMS rate about the second axis, as a part of that about the first
	Swings  int     // times that a component of the rate swings over its mean
}

// SeriesFold takes in a series row by row, in memory that does not grow with
// its length. The zero fold is ready.
type SeriesFold struct {
	predicted [2][]rotor.Vec // rad/s in body and in space axes, if the scalar is first and R maps body to space
	rate      []rotor.Vec
	dt        []float64

	first, last Sample // of the window that is open
	open        bool
	turned      rotor.Vec // integral of the rate over it
	stride      int       // one window of so many is kept
	passed      int       // windows since the last one kept
}

// maxWindows bounds the windows that are kept: when there are more, every other
// one is dropped, and from then on every other new one.
const maxWindows = 1 << 14

// minWindow is the least step, in s, over which rates are predicted: the
// difference of two orientations a few milliseconds apart is mostly their rounding.
const minWindow = 0.1

// maxTurn is the largest turn, in rad, of a step. Beyond a right angle the
// mean rate is not the rate of the shorter turn; what turns faster cannot be
// judged from these samples.
const maxTurn = math.Pi / 2

// Series tells in which conventions the rates of a series are those of its
// orientations. Rows must be in order of time; rows with a repeated stamp or
// with numbers that are not finite are left out.
//
// Rates and predictions meet over windows of 0.1 s or one step. For each of two
// kinds of axes the sums of rate times prediction are a 3x3 matrix, from which
// the residual of every map of axes, sign and unit follows without another look at the
// samples.
func Series(samples []Sample, claim SeriesClaim) SeriesResult {
	var f SeriesFold
	for i := range samples {
		f.Add(samples[i])
	}
	return f.Result(claim)
}

// Result compares what has been taken in with the claim. It ends the fold:
// outliers are left out of it.
func (s *SeriesFold) Result(claim SeriesClaim) SeriesResult {
	s.trim()
	r := SeriesResult{Motion: s.motion()}
	if r.Motion.Windows < 3 || r.Motion.Turn == 0 {
		r.Reason = "there is too little motion: " + r.Motion.String()
		return r
	}
	sums := s.sums()
	if sums.rate == 0 {
		r.Reason = "the rates are zero throughout, although the orientation turns"
		return r
	}
	r.judge(sums, claim)
	if centred := sums.centred(); !r.Decided && centred.excited(sums) {
		second := SeriesResult{Motion: r.Motion, Biased: true}
		if second.judge(centred, claim); second.Decided {
			return second
		}
	}
	return r
}

func (m Motion) String() string {
	return fmt.Sprintf("a turn of %s in %d windows, %.2g about a second axis", degrees(m.Turn), m.Windows, m.Second)
}

// Add takes in one row.
func (s *SeriesFold) Add(x Sample) {
	if !x.usable() || s.open && x.T <= s.last.T {
		return
	}
	if !s.open {
		s.first, s.last, s.open = x, x, true
		return
	}
	s.turned = s.turned.Add(x.W.Add(s.last.W).Scale((x.T - s.last.T) / 2))
	s.last = x
	if dt := x.T - s.first.T; dt >= minWindow*(1-1e-9) {
		s.close(&x, dt)
		s.first, s.turned = x, rotor.Vec{}
	}
}

func (x *Sample) usable() bool {
	sum := x.T + x.W.X + x.W.Y + x.W.Z
	n := 0.0
	for _, c := range x.Q {
		sum, n = sum+c, n+c*c
	}
	return sum-sum == 0 && n > 0
}

// close predicts the mean rate of the window that ends with b.
func (s *SeriesFold) close(b *Sample, dt float64) {
	if s.passed++; s.passed < s.stride {
		return
	}
	x, okA := s.first.rotor().Unit()
	y, okB := b.rotor().Unit()
	if !okA || !okB {
		return
	}
	body := rotor.Relative(x, y).RotationVector()
	if body.Norm() > maxTurn {
		return // for every reading: all of them permute and negate components
	}
	s.passed = 0
	s.predicted[0] = append(s.predicted[0], body.Scale(1/dt))
	s.predicted[1] = append(s.predicted[1], x.Rotate(body).Scale(1/dt))
	s.rate, s.dt = append(s.rate, s.turned.Scale(1/dt)), append(s.dt, dt)
	if len(s.rate) == maxWindows {
		s.stride = max(2, 2*s.stride)
		half := make([]bool, maxWindows)
		for i := range half {
			half[i] = i%2 == 1
		}
		s.keep(half)
	}
}

func (x *Sample) rotor() rotor.Rotor { return rotor.FromQuaternion(x.Q[0], x.Q[1], x.Q[2], x.Q[3]) }

// trim leaves out windows in which the size of the rate and that of the turn do
// not go together, as where a filter was reset. Both sizes are the same for every
// reading but the unit, so this favours none. A window is left out if the two
// differ by more than half of the larger and by ten times what is usual, and no more
// than a tenth are: more are no outliers but a contradiction.
func (s *SeriesFold) trim() {
	n := len(s.rate)
	if n < 10 {
		return
	}
	best := math.Inf(1)
	var kept []bool
	for _, unit := range units {
		miss := make([]float64, n)
		for i := range miss {
			miss[i] = math.Abs(s.rate[i].Norm()*unit.InRadians() - s.predicted[0][i].Norm())
		}
		sorted := slices.Clone(miss)
		slices.Sort(sorted)
		if median := sorted[n/2]; median < best {
			best = median
			limit := max(outlier*median, sorted[n*9/10])
			kept = make([]bool, n)
			for i, m := range miss {
				size := max(s.rate[i].Norm()*unit.InRadians(), s.predicted[0][i].Norm())
				kept[i] = m <= limit || m <= size/2
			}
		}
	}
	s.keep(kept)
}

// outlier is how many times the median miss a window must miss to be left out.
const outlier = 10

var units = [2]convention.Unit{convention.Radian, convention.Degree}

func (s *SeriesFold) keep(kept []bool) {
	for a := range s.predicted {
		s.predicted[a] = filter(s.predicted[a], kept)
	}
	s.rate, s.dt = filter(s.rate, kept), filter(s.dt, kept)
}

// filter keeps some elements, in place.
func filter[T any](v []T, kept []bool) []T {
	out := v[:0]
	for i, x := range v {
		if kept[i] {
			out = append(out, x)
		}
	}
	return out
}
