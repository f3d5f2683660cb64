package fold

import (
	"math"
	"strconv"
	"strings"

	"dextral/analyzers/series/decimal"
)

// Stamp is a time stamp, exact where its digits fit: nanoseconds since 1970 are
// farther apart than float64 can tell.
type Stamp struct {
	Value    float64 // NaN if there is none
	Mantissa int64   // Value is Mantissa * 10^Exponent, if Exact
	Exponent int32
	Exact    bool
	known    bool
}

// Known reports whether there is a stamp.
func (s Stamp) Known() bool { return s.known }

// StampOf is the stamp of a cell. Times that are not finite are none.
func StampOf(c *Cell) Stamp {
	v := c.Value()
	if math.IsNaN(v) || math.IsInf(v, 0) {
		return Stamp{}
	}
	s := Stamp{Value: v, known: true}
	if c.State != Binary && c.Exact && c.Mantissa <= math.MaxInt64 {
		s.Mantissa, s.Exponent, s.Exact = int64(c.Mantissa), c.Exponent, true
		if c.Negative {
			s.Mantissa = -s.Mantissa
		}
	}
	return s
}

// stamp is the stamp of a row, its two columns joined if there are two.
func (l *Layout) stamp(cells []Cell) Stamp {
	if l.Fine < 0 {
		return StampOf(&cells[l.Time])
	}
	return Joined(&cells[l.Time], &cells[l.Fine], l.Per)
}

// Joined is the stamp of whole units in one cell and a fraction, in 1/per of them, in
// another. per is a power of ten.
func Joined(whole, fraction *Cell, per int64) Stamp {
	s, fine := StampOf(whole), StampOf(fraction)
	decimals := int32(0)
	for p := per; p > 1; p /= 10 {
		decimals++
	}
	most := math.MaxInt64/per - 1
	switch {
	case !s.known || !fine.known:
		return Stamp{}
	case s.Exact && fine.Exact && s.Exponent == 0 && fine.Exponent == 0 && s.Mantissa < most && s.Mantissa > -most && fine.Mantissa < per && fine.Mantissa >= 0:
		s.Mantissa = s.Mantissa*per + fine.Mantissa
		s.Exponent = -decimals
	default:
		s.Exact = false
	}
	s.Value += fine.Value / float64(per)
	return s
}

// Since is the time from another stamp to s.
func (s Stamp) Since(from Stamp) float64 { return since(&s, &from) }

// since is Since for rows: mostly stamps have the same count of decimals.
func since(s, from *Stamp) float64 {
	if d := s.Mantissa - from.Mantissa; s.Exact && from.Exact && s.Exponent == from.Exponent && (d < s.Mantissa) == (from.Mantissa > 0) {
		return scaled(d, s.Exponent)
	}
	return sinceOther(s, from)
}

// sinceOther brings both to the finer exponent, as long as they fit.
func sinceOther(s, from *Stamp) float64 {
	fine := min(s.Exponent, from.Exponent)
	a, okA := raise(s.Mantissa, s.Exponent-fine)
	b, okB := raise(from.Mantissa, from.Exponent-fine)
	if d := a - b; s.Exact && from.Exact && okA && okB && (d < a) == (b > 0) {
		return scaled(d, fine)
	}
	return s.Value - from.Value
}

// raise is m * 10^by, if that is an int64.
func raise(m int64, by int32) (int64, bool) {
	for ; by > 0; by-- {
		if m > math.MaxInt64/10 || m < math.MinInt64/10 {
			return 0, m == 0
		}
		m *= 10
	}
	return m, true
}

// scaled is m * 10^e, rounded once for the exponents that stamps have.
func scaled(m int64, e int32) float64 {
	if e < 0 {
		return float64(m) / decimal.Power10(int(-e))
	}
	return float64(m) * decimal.Power10(int(e))
}

// String is the stamp as written, up to trailing zeros.
func (s Stamp) String() string {
	switch {
	case !s.known:
		return ""
	case !s.Exact || s.Exponent > 0 || s.Exponent < -18:
		return strconv.FormatFloat(s.Value, 'f', -1, 64)
	case s.Exponent == 0:
		return strconv.FormatInt(s.Mantissa, 10)
	}
	digits := strconv.FormatInt(s.Mantissa, 10)
	sign := ""
	if s.Mantissa < 0 {
		digits, sign = digits[1:], "-"
	}
	decimals := int(-s.Exponent)
	if missing := decimals + 1 - len(digits); missing > 0 {
		digits = strings.Repeat("0", missing) + digits
	}
	at := len(digits) - decimals
	return sign + strings.TrimRight(strings.TrimRight(digits[:at]+"."+digits[at:], "0"), ".")
}

// After is the stamp a time t after s. Since rounds to float64, so that stamps
// with more digits than that come back without the last ones.
func (s Stamp) After(t float64) Stamp {
	if math.IsNaN(t) {
		return Stamp{}
	}
	out := Stamp{Value: s.Value + t, known: true}
	if !s.Exact {
		return out
	}
	const finer = 3 // digits beyond those of s, for logs that drop trailing zeros
	for more := int32(0); more <= finer; more++ {
		exponent := s.Exponent - more
		start, ok := raise(s.Mantissa, more)
		steps := t * decimal.Power10(int(-exponent))
		if exponent > 0 {
			steps = t / decimal.Power10(int(exponent))
		}
		if !ok || math.Abs(steps) > 1<<53 {
			break
		}
		whole := math.Round(steps)
		out.Mantissa, out.Exponent, out.Exact = start+int64(whole), exponent, true
		if scaled(int64(whole), exponent) == t {
			break
		}
	}
	return out
}
