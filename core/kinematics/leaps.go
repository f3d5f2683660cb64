package kinematics

import (
	"math"
	"slices"

	"dextral/core/rotor"
)

// MaxLeaps is the number of fastest steps that a [Continuity] keeps.
const MaxLeaps = 24

// Leap is a step of the rotation and what stood still before it.
type Leap struct {
	Place          // of the later row
	Angle  float64 // 0..pi
	Before Place   // the first of the rows that are equal to the earlier row
	Same   int64   // how many of them follow that first one

	speed float64 // squared chord over squared time, or per row where there is no time
}

// leaps is the fold over steps: the fastest ones, and runs of equal rows. The first
// step that moves is kept apart, because rows of an earlier part may be equal to
// those before it.
type leaps struct {
	top    [MaxLeaps]Leap // fastest first
	count  int            // of them
	moves  int64          // steps that move
	head   Leap           // if moves > 0
	begin  Place          // of the run of equal rows at the end, or of all rows if nothing moves
	stands int64          // steps of that run
}

// step accounts for the step from a to b, whose squared chord is given.
func (l *leaps) step(a, b *sample, square float64) {
	if l.moves == 0 && l.stands == 0 {
		l.begin = a.place
	}
	if square == 0 {
		l.stands++
		return
	}
	dt := b.place.T - a.place.T
	if math.IsNaN(dt) {
		dt = 1
	}
	m := Leap{Place: b.place, Before: l.begin, Same: l.stands}
	if dt > 0 { // else there is no speed to speak of
		m.speed = square / (dt * dt)
		if l.moves == 0 || l.count < MaxLeaps || m.speed >= l.top[l.count-1].speed {
			m.Angle = rotor.Angle(a.r, b.r)
		}
	}
	l.move(m)
	l.begin, l.stands = b.place, 0
}

func (l *leaps) move(m Leap) {
	if l.moves == 0 {
		l.head = m
	} else {
		l.insert(m)
	}
	l.moves++
}

func (l *leaps) insert(m Leap) {
	at, _ := slices.BinarySearchFunc(l.top[:l.count], m, func(x, y Leap) int {
		if x.speed > y.speed || x.speed == y.speed && x.Row < y.Row {
			return -1
		}
		return 1
	})
	if at == MaxLeaps || m.speed == 0 {
		return
	}
	l.count = min(l.count+1, MaxLeaps)
	copy(l.top[at+1:l.count], l.top[at:l.count-1])
	l.top[at] = m
}

// merge adds what follows the seam, which itself has been accounted for.
func (l *leaps) merge(next *leaps) {
	if next.moves == 0 {
		l.stands += next.stands
		return
	}
	m := next.head
	m.Before, m.Same = l.begin, l.stands+next.head.Same
	l.move(m)
	for _, m := range next.top[:next.count] {
		l.insert(m)
	}
	l.moves += next.moves - 1
	l.begin, l.stands = next.begin, next.stands
}

const (
	standsOut = 8 // times as fast as any other step
	maxOut    = 8 // steps that may stand out
)

// StandingOut are the steps, no more than eight, each of which is at least eight times as fast as
// any other of the series, in order of rows. A turn that is real takes several
// rows, of which the fastest are alike.
func (c *Continuity) StandingOut() []Leap {
	l := c.fastest()
	for n := min(maxOut, len(l)-1); n > 0; n-- {
		if l[n-1].speed >= standsOut*standsOut*l[n].speed {
			return inOrder(l[:n])
		}
	}
	return nil
}

// Stale are the steps, no more than eight, after rows that stood still, at least so many, that
// are twice as fast as any step after fewer: what is at rest begins to move no
// faster than it moves then.
func (c *Continuity) Stale(rows int64) []Leap {
	l := c.fastest()
	n := 0
	for n < len(l) && l[n].Same >= rows {
		n++
	}
	if n > maxOut {
		return nil
	}
	for n > 0 && l[n-1].speed < 4*l[n].speed {
		n--
	}
	return inOrder(l[:n])
}

// fastest are the fastest steps, fastest first, if there are enough to compare.
func (c *Continuity) fastest() []Leap {
	l := c.leaps
	if l.moves > 0 {
		l.insert(l.head)
	}
	if l.count < MaxLeaps {
		return nil
	}
	return l.top[:]
}

func inOrder(l []Leap) []Leap {
	out := slices.Clone(l)
	slices.SortFunc(out, func(a, b Leap) int { return int(a.Row - b.Row) })
	return out
}
