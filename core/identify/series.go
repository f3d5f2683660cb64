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
	Row int64
	T   float64    // s
	Q   [4]float64 // a quaternion
	W   rotor.Vec  // an angular rate, in the unit as written
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

	axes    int // of its first reading by the rotor, scalar first
	unit    convention.Unit
	cube    Cube
	negated bool
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

	// Of the best class, if it is decided and the motion shows them:

	Delay Estimate    // s by which the rates are late
	Bias  [3]Estimate // rad/s, constant offset of each rate
}

// Estimate is a number with its standard deviation; Known if it is more than
// three of these from zero and the motion can show it.
type Estimate struct {
	Value, Deviation float64
	Known            bool
}

// Certain are the changes that every class makes that the rates do not exclude.
func (r SeriesResult) Certain() []Change {
	if len(r.Best.Readings) == 0 {
		return nil
	}
	common := r.Best.Readings[0].changes
	for _, t := range r.Ties {
		common &= t.Readings[0].changes
	}
	return common.list()
}

// Tied reports whether another class is as cheap as Best and not excluded.
func (r SeriesResult) Tied() bool { return len(r.Ties) > 0 && r.Ties[0].Cost == r.Best.Cost }

// Motion is what there was to see.
type Motion struct {
	Windows int     // steps used: of long series a part
	Turn    float64 // rad: sum of their turns
	Rate    float64 // rad/s: RMS
	Second  float64 // RMS rate about the second axis, as a part of that about the first
	Third   float64 // and about the third, of body or space axes whichever is less
	Wander  float64 // rad: RMS turn away from the first orientation
	Swings  int     // times that a component of the rate swings over its mean
}

// maxTurn is the largest turn, in rad, of a step. Beyond a right angle the
// mean rate is not the rate of the shorter turn; what turns faster cannot be
// judged from these samples.
const maxTurn = math.Pi / 2

// Series tells in which conventions the rates of a series are those of its
// orientations. Rows with numbers that are not finite are left out.
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

// Result compares what has been taken in with the claim.
func (s *SeriesFold) Result(claim SeriesClaim) SeriesResult {
	all := view(s.Windows())
	all.trim()
	r := all.result(claim)
	if r.Decided {
		all.refine(&r)
	}
	return r
}

func (s *spans) result(claim SeriesClaim) SeriesResult {
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

func (x *Sample) rotor() rotor.Rotor { return rotor.FromQuaternion(x.Q[0], x.Q[1], x.Q[2], x.Q[3]) }

// trim leaves out windows in which the size of the rate and that of the turn do
// not go together, as where a filter was reset. Both sizes are the same for every
// reading but the unit, so this favours none. A window is left out if the two
// differ by more than half of the larger and by ten times what is usual, and no more
// than a tenth are: more are no outliers but a contradiction.
func (s *spans) trim() {
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

func (s *spans) keep(kept []bool) {
	for a := range s.predicted {
		s.predicted[a] = filter(s.predicted[a], kept)
	}
	s.rate, s.dt, s.window = filter(s.rate, kept), filter(s.dt, kept), filter(s.window, kept)
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
