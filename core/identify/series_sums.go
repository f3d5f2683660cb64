package identify

import (
	"fmt"
	"math"
	"slices"

	"dextral/core/convention"
	"dextral/core/rotor"
)

// sums are all that the residuals of a series depend on.
type sums struct {
	n     float64
	rate  float64          // sum of |rate|^2
	turn  [2]float64       // sum of |prediction|^2, by axes
	cross [2][3][3]float64 // sum of rate_i prediction_j, by axes
	mean  rotor.Vec        // sum of the rates
	means [2]rotor.Vec     // sums of the predictions
	power [2][3][3]float64 // sum of prediction_i prediction_j, by axes
}

func (s *spans) sums() *sums {
	t := &sums{n: float64(len(s.rate))}
	for i, w := range s.rate {
		t.rate += w.Dot(w)
		t.mean = t.mean.Add(w)
		for a := range s.predicted {
			v := s.predicted[a][i]
			addOuter(&t.cross[a], w, v)
			t.means[a] = t.means[a].Add(v)
			t.turn[a] += v.Dot(v)
			addOuter(&t.power[a], v, v)
		}
	}
	return t
}

func addOuter(m *[3][3]float64, v, w rotor.Vec) {
	a, b := [3]float64{v.X, v.Y, v.Z}, [3]float64{w.X, w.Y, w.Z}
	for i := range 3 {
		for j := range 3 {
			m[i][j] += a[i] * b[j]
		}
	}
}

// centred takes a constant offset out of the rates.
func (t *sums) centred() *sums {
	c := *t
	c.rate -= t.mean.Dot(t.mean) / t.n
	for a := range c.cross {
		addOuter(&c.cross[a], t.mean.Scale(-1/t.n), t.means[a])
		c.turn[a] -= t.means[a].Dot(t.means[a]) / t.n
	}
	return &c
}

// excited reports whether enough motion is left to fit an offset: a quarter of the
// power. On a nearly constant rate an offset makes every reading fit.
func (t *sums) excited(raw *sums) bool {
	return min(t.turn[0], t.turn[1]) >= raw.turn[0]/4 && t.rate >= raw.rate/4
}

// residual is the RMS of unit*rate - map*prediction, as a part of the RMS of
// unit*rate; the map is a cube, or its negative.
func (t *sums) residual(axes int, unit float64, c Cube, negated bool) float64 {
	trace := 0.0
	for j, to := range axisMaps[c] { // prediction j counts for rate to.axis
		x := t.cross[axes][to.axis][j]
		if to.negated != negated {
			x = -x
		}
		trace += x
	}
	rate := unit * unit * t.rate
	square := rate - 2*unit*trace + t.turn[axes]
	return math.Sqrt(math.Max(square, 0) / rate)
}

// motion sums up what the predictions show.
func (s *spans) motion() Motion {
	m := Motion{Windows: len(s.rate)}
	if m.Windows == 0 {
		return m
	}
	t := s.sums()
	for i, v := range s.predicted[0] {
		m.Turn += v.Norm() * s.dt[i]
	}
	m.Rate = math.Sqrt(t.turn[0] / t.n)
	first, _ := s.window[0].From.rotor().Unit()
	for i := range s.window {
		r, _ := s.window[i].To.rotor().Unit()
		m.Wander += sq(rotor.Angle(first, r))
	}
	m.Wander = math.Sqrt(m.Wander / t.n)
	e := eigenvalues(t.power[0])
	if e[2] > 0 {
		m.Second = math.Sqrt(math.Max(e[1], 0) / e[2])
		space := eigenvalues(t.power[1])
		m.Third = math.Sqrt(math.Max(min(e[0]/e[2], space[0]/space[2]), 0))
	}
	for _, axis := range [3]rotor.Vec{{X: 1}, {Y: 1}, {Z: 1}} {
		m.Swings += s.swings(axis, m.Rate)
	}
	return m
}

// swings counts how often a component of the prediction goes from a quarter of its RMS
// above its mean to as much below, or back. Components of less than a tenth of the
// rate do not count.
func (s *spans) swings(axis rotor.Vec, rate float64) int {
	var sum, square float64
	for _, v := range s.predicted[0] {
		x := v.Dot(axis)
		sum, square = sum+x, square+x*x
	}
	n := float64(len(s.rate))
	mean := sum / n
	rms := math.Sqrt(math.Max(square/n-mean*mean, 0))
	if rms < rate/10 {
		return 0
	}
	count, side := 0, 0.0
	for _, v := range s.predicted[0] {
		if x := v.Dot(axis) - mean; math.Abs(x) > rms/4 && x*side <= 0 {
			if side != 0 {
				count++
			}
			side = math.Copysign(1, x)
		}
	}
	return count
}

// eigenvalues of a symmetric 3x3, ascending, by the cosine formula (O. K.
// Smith, "Eigenvalues of a symmetric 3x3 matrix", Comm. ACM 4 (1961) 168).
func eigenvalues(m [3][3]float64) [3]float64 {
	mean := (m[0][0] + m[1][1] + m[2][2]) / 3
	off := m[0][1]*m[0][1] + m[0][2]*m[0][2] + m[1][2]*m[1][2]
	p := math.Sqrt((sq(m[0][0]-mean) + sq(m[1][1]-mean) + sq(m[2][2]-mean) + 2*off) / 6)
	if p == 0 {
		return [3]float64{mean, mean, mean}
	}
	b := m
	for i := range 3 {
		b[i][i] -= mean
	}
	det := b[0][0]*(b[1][1]*b[2][2]-b[1][2]*b[2][1]) - b[0][1]*(b[1][0]*b[2][2]-b[1][2]*b[2][0]) + b[0][2]*(b[1][0]*b[2][1]-b[1][1]*b[2][0])
	phi := math.Acos(math.Max(-1, math.Min(1, det/(2*p*p*p)))) / 3
	e := [3]float64{mean + 2*p*math.Cos(phi+2*math.Pi/3), 0, mean + 2*p*math.Cos(phi)}
	e[1] = 3*mean - e[0] - e[2]
	return e
}

func sq(x float64) float64 { return x * x }

// seriesClasses is the number of readings that rates can tell apart: kinds of
// axes, units, maps and signs.
const seriesClasses = 2 * 2 * 24 * 2

// allClasses are the classes under a claim, without residuals.
func allClasses(claim SeriesClaim) []SeriesClass {
	all := make([]SeriesClass, 0, seriesClasses)
	for axes := range 2 {
		for _, unit := range units {
			for c := range Cube(24) {
				for _, negated := range [2]bool{false, true} {
					class := SeriesClass{axes: axes, unit: unit, cube: c, negated: negated}
					class.name(claim)
					all = append(all, class)
				}
			}
		}
	}
	return all
}

// of is the residual of a class.
func (t *sums) of(c *SeriesClass) float64 {
	return t.residual(c.axes, c.unit.InRadians(), c.cube, c.negated)
}

// judge forms the classes and weighs them against the claim.
func (r *SeriesResult) judge(t *sums, claim SeriesClaim) {
	classes := allClasses(claim)
	for i := range classes {
		classes[i].Residual = t.of(&classes[i])
	}
	slices.SortStableFunc(classes, func(x, y SeriesClass) int {
		switch {
		case x.Residual < y.Residual:
			return -1
		case x.Residual > y.Residual:
			return 1
		}
		return x.Cost - y.Cost
	})
	limit := math.Max(margin*classes[0].Residual, 1e-9)
	open := 1
	for open < len(classes) && classes[open].Residual <= limit {
		open++
	}
	r.Margin = math.Inf(1)
	if open < len(classes) {
		r.Next = classes[open]
		r.Margin = r.Next.Residual / math.Max(classes[0].Residual, 1e-12)
	}
	stated := slices.IndexFunc(classes, func(c SeriesClass) bool { return c.Cost == 0 })
	r.Stated = classes[stated]
	left := slices.Clone(classes[:open])
	slices.SortStableFunc(left, func(x, y SeriesClass) int { return x.Cost - y.Cost })
	r.Best, r.Ties = left[0], left[1:]
	r.decide(classes[0].Residual, stated < open)
}

// unmatched is the residual above which a class explains nothing: it leaves
// more than a quarter of the power of the rates.
const unmatched = 0.5

// numbers counts what independent numbers a motion carries at least. A constant
// rate is one direction and one size however long it lasts; each swing of a
// component is one number more, which rates that have nothing to do with the
// motion would have to meet by accident.
func (m Motion) numbers() int { return 3 + m.Swings }

func (r *SeriesResult) decide(nearest float64, stated bool) {
	chance := seriesClasses * math.Pow(nearest, float64(r.Motion.numbers()))
	switch {
	case nearest > unmatched:
		r.Verdict, r.Reason = Undecided, fmt.Sprintf("no reading explains the rates: the nearest leaves %.0f %% of them", 100*nearest)
	case stated:
		r.Verdict = Agree
		r.Decided = len(r.Ties) == 0 && chance <= accidents
	case chance > accidents:
		r.Verdict, r.Reason = Undecided, fmt.Sprintf("a residual of %.2g could be an accident with %s", nearest, r.Motion)
	default:
		r.Verdict = Contradicted
		r.Decided = len(r.Ties) == 0
	}
	if r.Reason == "" && r.Tied() {
		r.Reason = "several readings fit alike: " + r.Motion.String()
	}
}

// name words the class in its four ways: by the rotor or its reverse, with the
// scalar first or last.
func (c *SeriesClass) name(claim SeriesClaim) {
	one := SeriesReading{
		Scalar: convention.ScalarFirst, Sense: BodyToSpace,
		Axes: convention.BodyRates + convention.RateAxes(c.axes), Unit: c.unit, Negated: c.negated, Map: c.cube,
	}
	last := one.lastPlace()
	c.Readings = []SeriesReading{one, one.reverse(), last, last.reverse()}
	for i := range c.Readings {
		c.Readings[i].price(claim)
	}
	slices.SortStableFunc(c.Readings, func(x, y SeriesReading) int { return x.cost - y.cost })
	c.Cost = c.Readings[0].cost
}

// reverse is the same reading by the reverse of the rotor, whose rates are of
// the opposite sign and of the other axes.
func (r SeriesReading) reverse() SeriesReading {
	r.Sense = BodyToSpace + SpaceToBody - r.Sense
	r.Axes = convention.BodyRates + convention.SpaceRates - r.Axes
	r.Negated = !r.Negated
	return r
}

// The rotor of four numbers read with the scalar last is
// -cubes[lastLeft] r~ cubes[lastRight], r being read with the scalar first.
var lastLeft, lastRight = func() (Cube, Cube) {
	last := frame{last: true}
	for l := range Cube(24) {
		for r := range Cube(24) {
			if last.between(l, r) {
				return l, r
			}
		}
	}
	panic("a cyclic exchange of components is no map of axes")
}()

// between reports whether the frame is, up to sign, the reverse between two
// maps of axes.
func (f frame) between(l, r Cube) bool {
	sum := 0.0
	for _, e := range [4]rotor.Rotor{{S: 1}, {E23: 1}, {E31: 1}, {E12: 1}} {
		sum += cubes[l].Mul(e.Reverse()).Mul(cubes[r]).Dot(f.apply(e))
	}
	return math.Abs(sum) > 3.9
}

// lastPlace is the same reading with the scalar last. With the left and right
// cubes l and r, the body rates of l q~ r are minus r~ of the space rates of
// q, and its space rates minus l of the body rates of q.
func (r SeriesReading) lastPlace() SeriesReading {
	undo := cubes[lastRight]
	if r.Axes == convention.BodyRates { // of q, that is in space axes of the other
		undo = cubes[lastLeft].Reverse()
	}
	r.Scalar = convention.ScalarLast
	r.Map = nearestCube(cubes[r.Map].Mul(undo))
	r.Axes = convention.BodyRates + convention.SpaceRates - r.Axes
	r.Negated = !r.Negated
	return r
}

// price counts the changes from the claim.
func (r *SeriesReading) price(claim SeriesClaim) {
	if claim.Scalar != convention.ScalarUnstated && claim.Scalar != r.Scalar {
		r.changes |= set(ScalarOrder)
	}
	if claim.Sense != SenseUnstated && claim.Sense != r.Sense {
		r.changes |= set(Inverse)
	}
	if claim.Axes != convention.RateAxesUnstated && claim.Axes != r.Axes {
		r.changes |= set(RateAxes)
	}
	if claim.Unit != convention.UnitUnstated && claim.Unit != r.Unit {
		r.changes |= set(UnitSlip)
	}
	if r.Negated {
		r.changes |= set(RateSign)
	}
	if r.Map != 0 {
		r.changes |= set(Remap)
	}
	for _, c := range r.changes.list() {
		r.cost += c.Cost()
	}
}
