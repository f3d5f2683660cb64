package identify

import (
	"math"
	"math/bits"
	"slices"

	"dextral/core/rotor"
)

// SeriesFold is a fold over a series, row by row, in memory that does not grow
// with its length. The zero fold is ready.
//
// Time is cut into bins of [minWindow]; a window goes from the first row of one
// bin to the first row of the next, whatever part of the log was read first. The
// rates are summed up over a window in fixed point, where the order of additions
// does not matter. So the fold over parts, merged in order, equals the fold over the
// whole to the byte.
type SeriesFold struct {
	any         bool
	first, last Sample

	// Up to the first border in the part, and from the last one on.
	head, tail turned
	border     bool // there is one
	begin, end Sample
	broken     bool // what ends at begin is no window: time runs backwards there

	windows []Window
	level   int // of the runs kept
}

// Window is a stretch of a series over which the rates are summed up.
type Window struct {
	From, To Sample
	Turned   rotor.Vec // integral of the rates, in their unit times s
}

// minWindow is the least step, in s, over which rates are predicted: the
// difference of two orientations a few milliseconds apart is mostly their rounding.
const minWindow = 0.1

// maxWindows bounds the windows that are kept. Neighbours are kept together, in
// runs of runLength bins; of longer series half of the runs are kept, then a
// quarter, chosen by their scrambled number.
const (
	maxWindows = 1 << 13
	runLength  = 32
)

// turned is an integral of rates in steps of 2^-40.
type turned struct {
	sum [3]int64
	bad bool // a rate so large that it is none
}

func (t *turned) add(u turned) {
	for i := range t.sum {
		t.sum[i] += u.sum[i]
	}
	t.bad = t.bad || u.bad
}

const fixed = 1 << 40

// between integrates the rates from a to b by the trapezium.
func between(a, b *Sample) turned {
	var t turned
	half := (b.T - a.T) / 2
	for i, x := range [3]float64{(a.W.X + b.W.X) * half, (a.W.Y + b.W.Y) * half, (a.W.Z + b.W.Z) * half} {
		if !(math.Abs(x) < 1<<12) {
			return turned{bad: true}
		}
		t.sum[i] = int64(math.RoundToEven(x * fixed))
	}
	return t
}

func (t turned) vec() rotor.Vec {
	return rotor.Vec{X: float64(t.sum[0]) / fixed, Y: float64(t.sum[1]) / fixed, Z: float64(t.sum[2]) / fixed}
}

func bin(t float64) float64 { return math.Floor(t / minWindow * (1 + 1e-12)) }

// Add takes in the next row.
func (s *SeriesFold) Add(x Sample) {
	if !x.usable() {
		return
	}
	if !s.any {
		s.any, s.first, s.last = true, x, x
		return
	}
	s.step(&x)
	s.last = x
}

func (x *Sample) usable() bool {
	sum := x.T + x.W.X + x.W.Y + x.W.Z
	n := 0.0
	for _, c := range x.Q {
		sum, n = sum+c, n+c*c
	}
	return sum-sum == 0 && n > 0 && math.Abs(x.T) < 1e15
}

// step goes from the last row to x.
func (s *SeriesFold) step(x *Sample) {
	back := x.T < s.last.T
	if !back {
		s.grow(between(&s.last, x))
	}
	if back || bin(x.T) != bin(s.last.T) {
		s.close(x, back)
	}
}

// grow adds to the window that is open.
func (s *SeriesFold) grow(t turned) {
	if s.border {
		s.tail.add(t)
	} else {
		s.head.add(t)
	}
}

// close ends the window that is open at x and opens one there.
func (s *SeriesFold) close(x *Sample, broken bool) {
	switch {
	case !s.border:
		s.border, s.begin, s.broken = true, *x, broken
	case !broken && !s.tail.bad:
		s.keep(Window{s.end, *x, s.tail.vec()})
	}
	s.end, s.tail = *x, turned{}
}

// Merge adds the fold over the rows that follow those of s.
func (s *SeriesFold) Merge(next *SeriesFold) {
	if !next.any {
		return
	}
	if !s.any {
		windows := append(s.windows[:0], next.windows...)
		*s = *next
		s.windows = windows
		return
	}
	s.step(&next.first)
	s.grow(next.head)
	if next.border {
		s.close(&next.begin, next.broken)
		s.raise(next.level)
		for i := range next.windows {
			s.keep(next.windows[i])
		}
		s.end, s.tail = next.end, next.tail
	}
	s.last = next.last
}

// Reset makes s a fold over nothing again.
func (s *SeriesFold) Reset() { *s = SeriesFold{windows: s.windows[:0]} }

func (s *SeriesFold) keep(w Window) {
	for {
		if runLevel(&w) < s.level {
			return
		}
		if len(s.windows) < maxWindows {
			break
		}
		s.raise(s.level + 1)
	}
	s.windows = append(s.windows, w)
}

func (s *SeriesFold) raise(level int) {
	if level > s.level {
		s.level = level
		s.windows = slices.DeleteFunc(s.windows, func(w Window) bool { return runLevel(&w) < level })
	}
}

// runLevel scrambles the number of the run that a window belongs to: the finaliser of
// splitmix64 (G. L. Steele, D. Lea, C. H. Flood, "Fast splittable pseudorandom
// number generators", OOPSLA 2014). Half of all runs reach level 1, a quarter 2.
func runLevel(w *Window) int {
	z := uint64(int64(bin(w.From.T)/runLength)) + 0x9e3779b97f4a7c15
	z = (z ^ z>>30) * 0xbf58476d1ce4e5b9
	z = (z ^ z>>27) * 0x94d049bb133111eb
	return bits.TrailingZeros64(z ^ z>>31)
}

// Windows are the windows kept, in order of rows. A series that has no bin
// boundary within it is one window.
func (s *SeriesFold) Windows() []Window { return s.windows }

// Rows reports whether any row was complete.
func (s *SeriesFold) Rows() bool { return s.any }

// spans are windows with what they predict.
type spans struct {
	window    []Window
	predicted [2][]rotor.Vec // rad/s in body and in space axes, if the scalar is first and R maps body to space
	rate      []rotor.Vec
	dt        []float64
}

// view predicts the mean rate of each window. Windows that are much shorter than
// minWindow, as between stamps that jitter, and those that turn by more than maxTurn are left
// out, for every reading: all of them permute and negate components.
func view(windows []Window) *spans {
	s := &spans{}
	for _, w := range windows {
		x, okA := w.From.rotor().Unit()
		y, okB := w.To.rotor().Unit()
		dt := w.To.T - w.From.T
		if !okA || !okB || dt < minWindow/4 {
			continue
		}
		body := rotor.Relative(x, y).RotationVector()
		if body.Norm() > maxTurn {
			continue
		}
		s.window = append(s.window, w)
		s.predicted[0] = append(s.predicted[0], body.Scale(1/dt))
		s.predicted[1] = append(s.predicted[1], x.Rotate(body).Scale(1/dt))
		s.rate, s.dt = append(s.rate, w.Turned.Scale(1/dt)), append(s.dt, dt)
	}
	return s
}
