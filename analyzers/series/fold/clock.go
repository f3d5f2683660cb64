package fold

import (
	"dextral/core/kinematics"
	"dextral/rules"
)

// Clock is the fold over the time stamps.
type Clock struct {
	Count       int64
	Missing     kinematics.Tally
	First, Last Stamp
	Repeated    Rows
	Reversed    Rows
	Steps       Range // forward steps

	first kinematics.Place // of First
}

// Rows counts rows and keeps the first of them.
type Rows struct {
	kinematics.Tally
	At [rules.MaxStamps]kinematics.Place
}

func (r *Rows) add(at kinematics.Place) {
	if r.Count < rules.MaxStamps {
		r.At[r.Count] = at
	}
	count(&r.Tally, at)
}

func (r *Rows) merge(next *Rows) {
	if r.Count < rules.MaxStamps {
		copy(r.At[r.Count:], next.At[:min(next.Count, rules.MaxStamps)])
	}
	join(&r.Tally, next.Tally)
}

func (c *Clock) push(at kinematics.Place, s *Stamp) {
	if !s.known {
		count(&c.Missing, at)
		return
	}
	if c.Count == 0 {
		c.First, c.first = *s, at
	} else {
		c.step(s, at)
	}
	c.Count++
	c.Last = *s
}

// step accounts for the step from the last stamp to s.
func (c *Clock) step(s *Stamp, at kinematics.Place) {
	d := since(s, &c.Last)
	switch {
	case d > 0:
		c.Steps.add(d, at)
	case d == 0:
		c.Repeated.add(at)
	default:
		c.Reversed.add(at)
	}
}

func (c *Clock) merge(next *Clock) {
	join(&c.Missing, next.Missing)
	if next.Count == 0 {
		return
	}
	if c.Count == 0 {
		next.Missing = c.Missing
		*c = *next
		return
	}
	c.step(&next.First, next.first)
	c.Count += next.Count
	c.Last = next.Last
	c.Repeated.merge(&next.Repeated)
	c.Reversed.merge(&next.Reversed)
	c.Steps.merge(&next.Steps)
}
