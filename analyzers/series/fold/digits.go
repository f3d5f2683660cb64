package fold

import (
	"cmp"
	"math"

	"dextral/analyzers/series/decimal"
)

// Digits is the fold over what the digits of a channel say about its precision.
//
// Writers round to a fixed count of decimals or to a fixed count of significant
// digits, and may then drop zeros at the end. Which of the two it is, the rows
// vote: more numbers of a row have the same count of the one or of the other.
// With decimals, the unit of a row is that of its finest number: 0.5 for 0.500000
// hides zeros in one number of a row, hardly in all. With significant digits it is
// that of the greatest number, written with as many digits as any. Whole numbers
// show no precision.
//
// Of the rows it is the coarsest that decides, because a log may be made of
// parts with different precision, but rows that are one in a thousand or less
// do not count: a row whose every last digit happens to be zero is that rare,
// or one in which the numbers come out even.
type Digits struct {
	decimals    [maxDecimals + 1]int64 // rows by decimals of the unit, if it is the one
	significant [maxDecimals + 1]int64 // and if it is the other
	votes       int64                  // rows for decimals less rows for significant digits
	beyondUnit  bool                   // among whole numbers there is one other than -1, 0, 1

	single  trial              // that the numbers are float32
	scales  [len(scales)]trial // that they are multiples of 1/scale
	noScale int                // how many of these failed
}

// trial is a conjecture about all numbers of a channel.
type trial struct {
	failed bool
	passed int64 // numbers that could have disproved it and did not; 0 once failed
}

func (t *trial) add(ok bool) {
	switch {
	case t.failed:
	case ok:
		t.passed++
	default:
		*t = trial{failed: true}
	}
}

func (t *trial) merge(next trial) {
	t.passed += next.passed
	if t.failed || next.failed {
		*t = trial{failed: true}
	}
}

// holds reports whether the conjecture had the chance to fail often enough.
func (t *trial) holds() bool { return t.passed >= enough }

// maxDecimals is beyond what float64 can show of numbers near one.
const maxDecimals = 24

// scales are the denominators of quantised components in use: signed bytes and
// 16-bit words, by either reading of full scale, and Q14.
var scales = [...]float64{127, 128, 16384, 32767, 32768}

// enough is how many numbers must have had a chance to disprove single
// precision, or a scale. When the numbers are in fact free, each misses it with a
// probability below 0.9 (single precision, two units of the last digit to a step
// of float32: 0.5 for a digit of the exact value, 0.8 for the shortest decimal), so
// all do once in a thousand times.
const enough = 64

func (d *Digits) push(part []int, cells []Cell) {
	var decimals, significant most
	lead := math.MinInt
	for _, i := range part {
		c := &cells[i]
		v := math.Abs(c.Value())
		switch {
		case !(v <= math.MaxFloat64):
			continue
		case v < 1<<53 && v == float64(int64(v)):
			d.beyondUnit = d.beyondUnit || v > 1
			continue
		}
		e := int(c.Exponent)
		first := e - 1
		if c.State != Binary && c.Exact {
			first += c.Magnitude()
		} else {
			first = int(math.Floor(math.Log10(v)))
		}
		if c.Mantissa >= 1e15 || c.State == Binary || !c.Exact {
			e = meaningful(c, v)
		}
		decimals.add(-e)
		significant.add(first - e + 1)
		lead = max(lead, first)
		if !d.single.failed && (c.Mantissa >= 1e7 || c.State == Binary || !c.Exact) {
			d.trySingle(c, v)
		}
		if d.noScale < len(scales) {
			d.tryScales(e, v)
		}
	}
	if decimals.count == 0 {
		return
	}
	d.votes += int64(cmp.Compare(decimals.count, significant.count))
	d.decimals[min(max(decimals.value, 0), maxDecimals)]++
	d.significant[min(max(significant.value-lead-1, 0), maxDecimals)]++
}

// most is the greatest of some numbers, and how often it occurs.
type most struct{ value, count int }

func (m *most) add(n int) {
	switch {
	case m.count == 0 || n > m.value:
		*m = most{n, 1}
	case n == m.value:
		m.count++
	}
}

// meaningful is the power of ten of the last digit of v that means something.
//
// Numbers with more digits than a float64 or, for values that are one, a float32
// tells apart are copies of a binary number: 6.1510000000000002e-02 is the
// float64 that prints as 0.06151, and so somebody had rounded to that. If a short
// decimal names the same binary number, its digits count.
func meaningful(c *Cell, v float64) int {
	if short, ok := shortest(v, 15, false); ok {
		return short
	}
	if float64(float32(v)) == v {
		if short, ok := shortest(v, 6, true); ok {
			return short
		}
	}
	if c.State == Binary || !c.Exact {
		return -maxDecimals
	}
	return int(c.Exponent)
}

// shortest is the last power of ten of the decimal number with so many digits,
// trailing zeros not counted, that is nearest to v, if v is the binary number
// nearest to it.
func shortest(v float64, digits int, single bool) (int, bool) {
	_, e2 := math.Frexp(v)
	// 10^k brings v to at most so many digits: log10(2) = 0.30103.
	k := digits - int(math.Ceil(float64(e2)*0.30103))
	if k < 0 || k > 22 {
		return 0, false
	}
	ten := decimal.Power10(k)
	m := uint64(v*ten + 0.5)
	back := float64(m) / ten
	if single && float32(back) != float32(v) || !single && back != v {
		return 0, false
	}
	for m%10 == 0 && m > 0 {
		m /= 10
		k--
	}
	return -k, true
}

// trySingle tests whether a printed number could be a float32.
//
// A writer of float32 prints either the shortest decimal that names it, or so
// many digits of its exact value. In the first case no decimal with one digit
// less may name the same float32; in the second the float32 is within half a unit
// of the last digit. Numbers whose last digit is coarser than float32 say nothing.
func (d *Digits) trySingle(c *Cell, v float64) {
	near := float32(v)
	if c.State == Binary || !c.Exact {
		d.single.add(float64(near) == v)
		return
	}
	n := c.Magnitude() // eight or more
	unit := decimal.Power10(int(c.Exponent))
	step := float64(math.Nextafter32(near, math.MaxFloat32)) - float64(near)
	if 2*unit > step {
		return
	}
	d.single.add(math.Abs(float64(near)-v) <= unit/2+v*0x1p-53 || n <= 9 && c.Mantissa%10 != 0 && shortestSingle(c, near))
}

func shortestSingle(c *Cell, near float32) bool {
	below := c.Mantissa / 10
	e := int(c.Exponent) + 1
	if e > 0 || e < -22 {
		return false
	}
	ten := decimal.Power10(-e)
	return float32(float64(below)/ten) != near && float32(float64(below+1)/ten) != near
}

// tryScales tests whether v is a whole multiple of 1/scale up to its last digit and
// to single precision. Where these amount to more than a tenth of the step the
// number says nothing.
func (d *Digits) tryScales(e int, v float64) {
	for i := range d.scales {
		if d.scales[i].failed {
			continue
		}
		x := v * scales[i]
		allowed := (0.5*decimal.Power10(e) + v*0x1p-23) * scales[i]
		if allowed <= 0.1 {
			d.scales[i].add(math.Abs(x-math.Round(x)) <= allowed)
			d.countScales()
		}
	}
}

func (d *Digits) countScales() {
	d.noScale = 0
	for i := range d.scales {
		if d.scales[i].failed {
			d.noScale++
		}
	}
}

func (d *Digits) merge(next *Digits) {
	for i := range d.decimals {
		d.decimals[i] += next.decimals[i]
		d.significant[i] += next.significant[i]
	}
	d.votes += next.votes
	d.beyondUnit = d.beyondUnit || next.beyondUnit
	d.single.merge(next.single)
	for i := range d.scales {
		d.scales[i].merge(next.scales[i])
	}
	d.countScales()
}

// Half is half a unit of the last digit, or half a step of Scale; 0 if there is no digit to tell.
// A channel of whole numbers is rounded to whole numbers, unless they are no
// others than -1, 0 and 1.
func (d *Digits) Half() float64 {
	if s := d.Scale(); s > 0 {
		return 0.5 / s
	}
	rows := &d.decimals
	if d.votes < 0 {
		rows = &d.significant
	}
	total, coarser := int64(0), int64(0)
	for _, n := range rows {
		total += n
	}
	if total == 0 {
		if d.beyondUnit {
			return 0.5
		}
		return 0
	}
	for decimals, n := range rows {
		if coarser += n; coarser*1000 > total {
			if decimals == maxDecimals {
				return 0
			}
			return 0.5 / decimal.Power10(decimals)
		}
	}
	return 0
}

// Single reports whether the digits are those of float32.
func (d *Digits) Single() bool { return d.single.holds() }

// Scale is the least scale of which all numbers are whole multiples; 0 if there is none.
func (d *Digits) Scale() float64 {
	for i, s := range scales {
		if d.scales[i].holds() {
			return s
		}
	}
	return 0
}

// Integers reports whether the channel has whole numbers only, with others
// than -1, 0 and 1 among them.
func (d *Digits) Integers() bool { return d.Half() == 0.5 && d.beyondUnit }
