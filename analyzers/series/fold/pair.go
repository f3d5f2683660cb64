package fold

import (
	"math"
	"math/bits"
)

// Size bounds the rows in a Sample.
const Size = 64

// Sample is a bounded choice of rows in which two channels are complete.
//
// Every row has a level, the zeros at the end of a scrambled row number, so
// that half of all rows reach level 1, a quarter level 2. Kept are the rows
// of at least the lowest level at which they are no more than Size. That depends
// on row numbers alone and not on where the log was cut, and no period of the log
// can be in step with it.
type Sample struct {
	Count   int
	Rows    [Size]int64
	Numbers [Size][Width]float64 // of the first channel, then of the second

	level int
}

// Width is room for the rotations of two channels: nine numbers each.
const Width = 18

// sampled are the cells that a sample keeps: all, of a rigid transform the rotation.
func (c *Channel) sampled() []int {
	if len(c.Cells) > 9 {
		return c.Rotation
	}
	return c.Cells
}

// Split are the numbers of row i for each of the two channels.
func (s *Sample) Split(i int, a, b *Channel) (first, second []float64) {
	k := len(a.sampled())
	return s.Numbers[i][:k:k], s.Numbers[i][k : k+len(b.sampled())]
}

// level scrambles a row number: the finaliser of splitmix64 (G. L. Steele,
// D. Lea, C. H. Flood, "Fast splittable pseudorandom number generators", OOPSLA 2014).
func level(row int64) int {
	z := uint64(row) + 0x9e3779b97f4a7c15
	z = (z ^ z>>30) * 0xbf58476d1ce4e5b9
	z = (z ^ z>>27) * 0x94d049bb133111eb
	return bits.TrailingZeros64(z ^ z>>31)
}

func (s *Sample) push(row int64, a, b *Channel, cells []Cell) {
	if level(row) < s.level {
		return
	}
	var n [Width]float64
	first := a.sampled()
	for i, c := range first {
		n[i] = cells[c].Value()
	}
	for i, c := range b.sampled() {
		n[len(first)+i] = cells[c].Value()
	}
	for _, x := range n {
		if math.IsNaN(x) || math.IsInf(x, 0) {
			return
		}
	}
	s.add(row, &n)
}

// add takes a row that reaches the level, or does after the level has risen.
func (s *Sample) add(row int64, n *[Width]float64) {
	for s.Count == Size {
		s.raise(s.level + 1)
		if level(row) < s.level {
			return
		}
	}
	s.Rows[s.Count], s.Numbers[s.Count] = row, *n
	s.Count++
}

// raise drops the rows below a level.
func (s *Sample) raise(to int) {
	s.level = to
	kept := 0
	for i := range s.Count {
		if level(s.Rows[i]) >= to {
			s.Rows[kept], s.Numbers[kept] = s.Rows[i], s.Numbers[i]
			kept++
		}
	}
	s.Count = kept
}

func (s *Sample) merge(next *Sample) {
	if next.level > s.level {
		s.raise(next.level)
	}
	for i := range next.Count {
		if level(next.Rows[i]) >= s.level {
			s.add(next.Rows[i], &next.Numbers[i])
		}
	}
}

func (s *Sample) reset() { s.Count, s.level = 0, 0 }
