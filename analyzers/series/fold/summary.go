package fold

import (
	"dextral/core/convention"
	"dextral/core/kinematics"
	"dextral/core/matrix"
	"dextral/core/rotor"
	"dextral/rules"
)

// Range is the least and the greatest of some numbers, and where they are.
type Range struct {
	rules.Range
	any bool
}

func (r *Range) add(x float64, at kinematics.Place) {
	if !r.any {
		e := kinematics.Extreme{Value: x, Place: at}
		r.Min, r.Max, r.any = e, e, true
		return
	}
	if x < r.Min.Value {
		r.Min = kinematics.Extreme{Value: x, Place: at}
	}
	if x > r.Max.Value {
		r.Max = kinematics.Extreme{Value: x, Place: at}
	}
}

func (r *Range) merge(next *Range) {
	if next.any {
		if !r.any {
			*r = *next
			return
		}
		r.add(next.Min.Value, next.Min.Place)
		r.add(next.Max.Value, next.Max.Place)
	}
}

func count(t *kinematics.Tally, at kinematics.Place) {
	if t.Count == 0 {
		t.First = at
	}
	t.Count++
}

func join(t *kinematics.Tally, next kinematics.Tally) {
	if t.Count == 0 {
		t.First = next.First
	}
	t.Count += next.Count
}

// Summary is the fold over one channel.
type Summary struct {
	Gaps       kinematics.Tally
	Ranges     []Range // of each number
	Digits     Digits
	Continuity kinematics.Continuity // quaternions
	Matrices   Matrices              // rotation matrices and rigid transforms
	Wraps      Wraps                 // angles
}

// push adds the channel's numbers in a row. A row without any number is a gap;
// where only some are missing they count as NaN.
func (s *Summary) push(c *Channel, at kinematics.Place, cells []Cell) {
	gaps := 0
	for i, cell := range c.Cells {
		if cells[cell].State == Gap {
			gaps++
			continue
		}
		if v := cells[cell].Number.Value; v-v == 0 { // neither NaN nor infinite
			s.Ranges[i].add(v, at)
		}
	}
	if gaps == len(c.Cells) {
		count(&s.Gaps, at)
		return
	}
	if looked(at.Row) {
		s.Digits.push(c.Rotation, cells)
	}
	switch c.Form {
	case convention.Quaternion:
		p := (*[4]int)(c.Rotation)
		s.Continuity.Push(at.Row, at.T, rotor.FromQuaternion(cells[p[0]].Value(), cells[p[1]].Value(), cells[p[2]].Value(), cells[p[3]].Value()))
	case convention.Rotation, convention.Transform:
		var m matrix.Mat3
		for k, cell := range c.Rotation {
			m[k/3][k%3] = cells[cell].Value()
		}
		s.Matrices.push(at, m)
	case convention.Angles:
		s.Wraps.push(at, [3]float64{cells[c.Rotation[0]].Value(), cells[c.Rotation[1]].Value(), cells[c.Rotation[2]].Value()})
	}
}

// looked reports whether the digits of a row are looked at: of the first rows all,
// then of one in eight, chosen by number.
func looked(row int64) bool { return row <= 4096 || level(row) >= 3 }

func (s *Summary) merge(next *Summary) {
	join(&s.Gaps, next.Gaps)
	for i := range s.Ranges {
		s.Ranges[i].merge(&next.Ranges[i])
	}
	s.Digits.merge(&next.Digits)
	s.Continuity.Merge(next.Continuity)
	s.Matrices.merge(&next.Matrices)
	s.Wraps.merge(&next.Wraps)
}

// Matrices is the fold over rotation matrices.
type Matrices struct {
	rules.Matrices

	det         Range
	first, last placedMatrix
}

type placedMatrix struct {
	m  matrix.Mat3
	at kinematics.Place
}

func (s *Matrices) push(at kinematics.Place, m matrix.Mat3) {
	switch {
	case !m.Finite():
		count(&s.NonFinite, at)
		return
	case m == (matrix.Mat3{}):
		count(&s.Zero, at)
		return
	}
	det := m.Det()
	s.det.add(det, at)
	if det < 0 {
		count(&s.Mirrors, at)
	}
	here := placedMatrix{m, at}
	if d := matrix.Defect(m); s.Count == 0 || d > s.Defect.Value {
		s.Defect = kinematics.Extreme{Value: d, Place: at}
	}
	if s.Count == 0 {
		s.first = here
	} else {
		s.step(here)
	}
	s.Count++
	s.last = here
}

// step accounts for the step from the last matrix.
func (s *Matrices) step(next placedMatrix) {
	if d := next.m.Sub(s.last.m).Norm(); d > s.Largest.Value {
		s.Largest = kinematics.Extreme{Value: d, Place: next.at}
	}
}

func (s *Matrices) merge(next *Matrices) {
	join(&s.NonFinite, next.NonFinite)
	join(&s.Zero, next.Zero)
	if next.Count == 0 {
		return
	}
	if s.Count == 0 {
		next.NonFinite, next.Zero = s.NonFinite, s.Zero
		*s = *next
		return
	}
	s.step(next.first)
	if next.Largest.Value > s.Largest.Value {
		s.Largest = next.Largest
	}
	if next.Defect.Value > s.Defect.Value {
		s.Defect = next.Defect
	}
	join(&s.Mirrors, next.Mirrors)
	s.det.merge(&next.det)
	s.Count += next.Count
	s.last = next.last
}

// Rules are the results in the form that rules judge.
func (s *Matrices) Rules() rules.Matrices {
	m := s.Matrices
	m.Det = s.det.Range
	return m
}
