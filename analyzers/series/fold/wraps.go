package fold

import (
	"math"

	"dextral/core/kinematics"
)

// Wraps counts the rows in which one of three angles steps by 2 pi, within 5 %.
type Wraps struct {
	kinematics.Tally

	any         bool
	first, last [3]float64
	begin       kinematics.Place // of first
}

func (w *Wraps) push(at kinematics.Place, v [3]float64) {
	if w.any {
		w.step(at, &v)
	} else {
		w.any, w.first, w.begin = true, v, at
	}
	w.last = v
}

func (w *Wraps) step(at kinematics.Place, v *[3]float64) {
	for i := range v {
		if d := math.Abs(v[i] - w.last[i]); d > 0.95*2*math.Pi && d < 1.05*2*math.Pi {
			count(&w.Tally, at)
			return
		}
	}
}

func (w *Wraps) merge(next *Wraps) {
	if !next.any {
		return
	}
	if !w.any {
		*w = *next
		return
	}
	w.step(next.begin, &next.first)
	join(&w.Tally, next.Tally)
	w.last = next.last
}
