package identify

import (
	"math"
	"slices"
)

// Stretch is a run of rows in which orientations and rates obey one class of
// conventions.
type Stretch struct {
	From, To Sample // first and last row of the windows that obey it
	Class    SeriesClass
	Residual float64  // of its own class
	Other    float64  // of the class of the stretch before; of the one after for the first
	Changes  []Change // from the stretch before
	Windows  int
}

// A change of the class costs as much as this many windows of average motion that
// nothing explains; single bad windows are cheaper to leave unexplained.
const switchCost = 6

// explained is the residual, as a part of the rates, below which a stretch
// is explained by its class. Its neighbour's class must leave apart times as much.
const (
	explained = 0.35
	apart     = 3
)

// Stretches finds where a series goes over from one class of conventions to
// another: the sequence of classes with the least sum of misses and switches, by dynamic
// programming over the windows kept. It returns nil unless there are at least two,
// each of which is explained by its class, not by that of its neighbours, and not by
// accident.
func (s *SeriesFold) Stretches(claim SeriesClaim) []Stretch {
	v := view(s.Windows())
	if len(v.rate) < 8 {
		return nil
	}
	classes := allClasses(claim)
	path := v.path(classes)
	var found []Stretch
	var parts []*sums
	var at []int
	for from := 0; from < len(path); {
		to := from
		for to < len(path) && path[to] == path[from] {
			to++
		}
		class := &classes[path[from]]
		part := v.cut(from, to)
		part.sheer(class)
		part.trim()
		n := len(part.rate)
		if n == 0 {
			return nil
		}
		sums := part.sums()
		own := sums.of(class)
		if m := part.motion(); own > explained || seriesClasses*math.Pow(own, float64(m.numbers())) > accidents {
			return nil
		}
		f := Stretch{From: part.window[0].To, To: part.window[n-1].From, Windows: n, Residual: own}
		if from == 0 {
			f.From = part.window[0].From
		}
		if to == len(path) {
			f.To = part.window[n-1].To
		}
		found = append(found, f)
		parts, at = append(parts, sums), append(at, path[from])
		from = to
	}
	if len(found) < 2 {
		return nil
	}
	for i := range found {
		other := max(i-1, 0)
		if i == 0 {
			other = 1
		}
		f := &found[i]
		f.Other = parts[i].of(&classes[at[other]])
		if f.Other < apart*f.Residual || f.Other < explained {
			return nil
		}
		f.Class = classes[at[i]]
		if i > 0 {
			f.Class, f.Changes = from(f.Class, found[i-1].Class)
		}
		f.Class.Residual = f.Residual
	}
	return found
}

// from names a class by the fewest changes from the cheapest reading of the
// stretch before: what a change of firmware or recorder changed.
func from(p, before SeriesClass) (SeriesClass, []Change) {
	was := before.Readings[0]
	p.name(SeriesClaim{Scalar: was.Scalar, Sense: was.Sense, Axes: was.Axes, Unit: was.Unit})
	best, changes := -1, []Change(nil)
	for i, r := range p.Readings {
		diff := r.changes
		if r.Map == was.Map {
			diff &^= set(Remap)
		} else {
			diff |= set(Remap)
		}
		if r.Negated == was.Negated {
			diff &^= set(RateSign)
		} else {
			diff |= set(RateSign)
		}
		cost := 0
		for _, c := range diff.list() {
			cost += c.Cost()
		}
		if best < 0 || cost < p.Cost {
			best, changes, p.Cost = i, diff.list(), cost
		}
	}
	p.Readings[0], p.Readings[best] = p.Readings[best], p.Readings[0]
	p.Readings[0].cost = p.Cost
	return p, changes
}

// cut are the windows from..to.
func (s *spans) cut(from, to int) *spans {
	out := &spans{window: slices.Clone(s.window[from:to]), rate: slices.Clone(s.rate[from:to]), dt: slices.Clone(s.dt[from:to])}
	for a := range s.predicted {
		out.predicted[a] = slices.Clone(s.predicted[a][from:to])
	}
	return out
}

// sheer leaves out windows at both ends that the class does not explain: what
// lies across a change of the convention turns by some angle that is none.
func (s *spans) sheer(c *SeriesClass) {
	kept := slices.Repeat([]bool{true}, len(s.rate))
	drop := func(i int) bool {
		u := c.unit.InRadians()
		miss := s.rate[i].Scale(u).Sub(c.predict(s.predicted[c.axes][i])).Norm()
		kept[i] = miss <= 0.5*math.Hypot(u*s.rate[i].Norm(), s.predicted[0][i].Norm())
		return !kept[i]
	}
	for i := 0; i < len(kept) && drop(i); i++ {
	}
	for i := len(kept) - 1; i >= 0 && drop(i); i-- {
	}
	s.keep(kept)
}

// path is for each window the class on the cheapest sequence of classes.
func (s *spans) path(classes []SeriesClass) []int {
	n, k := len(s.rate), len(classes)
	mean := 0.0
	for _, p := range s.predicted[0] {
		mean += p.Dot(p)
	}
	mean /= float64(n)
	if mean == 0 {
		return make([]int, n)
	}
	total := make([]float64, k)
	came := make([]bool, n*k) // from the cheapest of all, and not from the same class
	cheapest := make([]int, n)
	for i := range n {
		low := 0
		for c := 1; c < k; c++ {
			if total[c] < total[low] {
				low = c
			}
		}
		cheapest[i] = low
		base := total[low]
		for c := range classes {
			if i > 0 && base+switchCost < total[c] {
				total[c], came[i*k+c] = base+switchCost, true
			}
		}
		s.misses(i, classes, mean, total)
	}
	last := 0
	for c := 1; c < k; c++ {
		if total[c] < total[last] {
			last = c
		}
	}
	path := make([]int, n)
	for i := n - 1; i >= 0; i-- {
		path[i] = last
		if came[i*k+last] {
			last = cheapest[i]
		}
	}
	return path
}

// misses adds to each class what a window leaves unexplained: its share of motion
// times the squared miss as a part of the squares of rate and prediction, at most one.
func (s *spans) misses(i int, classes []SeriesClass, mean float64, total []float64) {
	w := [3]float64{s.rate[i].X, s.rate[i].Y, s.rate[i].Z}
	turn := s.predicted[0][i].Dot(s.predicted[0][i])
	weight := math.Min(turn/mean, 4)
	if weight == 0 {
		return
	}
	rate := s.rate[i].Dot(s.rate[i])
	for c := range classes {
		p := &classes[c]
		v := s.predicted[p.axes][i]
		x := [3]float64{v.X, v.Y, v.Z}
		dot := 0.0
		for j, to := range axisMaps[p.cube] {
			if to.negated != p.negated {
				dot -= w[to.axis] * x[j]
			} else {
				dot += w[to.axis] * x[j]
			}
		}
		u := p.unit.InRadians()
		size := u*u*rate + turn
		total[c] += weight * math.Min(1, (size-2*u*dot)/size)
	}
}
