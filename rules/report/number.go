package report

import (
	"math"
	"strconv"
	"strings"

	"dextral/rules"
)

// The three columns of evidence print numbers differently: what is stated as it
// was stated, what is computed with the digits that show the difference, and the
// difference itself with three digits.

// statedText prints a stated number: six digits hold what people state.
func statedText(q rules.Quantity) string { return significant(q.Value, 6) }

// computedText prints a computed number so that three digits of its distance
// from the stated one are seen; without a stated one, from plus or minus one if
// it is a pure number near them; else as a residual.
func computedText(q, stated rules.Quantity) string {
	distance := math.Abs(math.Abs(q.Value) - 1)
	decimals := 0
	switch {
	case stated.Known && stated.Text == "" && stated.Unit == q.Unit:
		distance = math.Abs(q.Value - stated.Value)
		if q.Unit == "deg" {
			decimals = 1
		}
	case q.Unit != "" || distance >= 0.1:
		return residualText(q)
	}
	return showing(q.Value, distance, decimals)
}

// residualText prints a distance or any other number with three digits. Of
// angles in degrees nothing below a ten-thousandth matters to the eye but its
// order of magnitude.
func residualText(q rules.Quantity) string {
	x, a := q.Value, math.Abs(q.Value)
	switch {
	case q.Unit != "deg" || a == 0 || notFinite(x) || isWhole(x):
		return significant(x, 3)
	case a >= 100:
		return fixed(x, 1)
	case a >= 1e-3:
		return fixed(x, min(2-magnitude(a), 4))
	case a < 1e-6: // rounding noise, which differs from machine to machine
		return "0"
	default:
		return significant(x, 1)
	}
}

// showing prints x with three digits of a distance d to something near it, at
// least three of its own, and at least so many decimals.
func showing(x, d float64, decimals int) string {
	switch a := math.Abs(x); {
	case d == 0 || notFinite(x) || notFinite(d) || a >= 1e7:
		return significant(x, 10)
	case a <= d:
		return significant(x, 3)
	}
	return fixed(x, min(max(2-magnitude(d), decimals), 14)) // a double near one holds no more
}

// significant prints n significant digits without trailing zeros, whole numbers
// in full, and an exponent only where the point would be far away.
func significant(x float64, n int) string {
	a := math.Abs(x)
	switch {
	case math.IsNaN(x):
		return "NaN"
	case math.IsInf(x, 0):
		return strings.TrimPrefix(strings.ToLower(strconv.FormatFloat(x, 'g', -1, 64)), "+")
	case isWhole(x):
		return strconv.FormatFloat(x, 'f', 0, 64)
	case a >= 1e7 || a < 1e-6 || n > 1 && a < 1e-4:
		return exponent(strconv.FormatFloat(x, 'e', n-1, 64))
	}
	return fixed(x, n-1-magnitude(a))
}

// fixed prints a number of decimals without trailing zeros.
func fixed(x float64, places int) string {
	s := strconv.FormatFloat(x, 'f', max(places, 0), 64)
	if strings.Contains(s, ".") {
		s = strings.TrimSuffix(strings.TrimRight(s, "0"), ".")
	}
	if s == "-0" {
		return "0"
	}
	return s
}

// exponent drops what is not needed from 2.10e-05: 2.1e-5.
func exponent(s string) string {
	mantissa, exp, _ := strings.Cut(s, "e")
	if strings.Contains(mantissa, ".") {
		mantissa = strings.TrimSuffix(strings.TrimRight(mantissa, "0"), ".")
	}
	sign := strings.TrimPrefix(exp[:1], "+")
	return mantissa + "e" + sign + strings.TrimLeft(exp[1:], "0")
}

// magnitude is the exponent of the leading digit of a positive number.
func magnitude(a float64) int { return int(math.Floor(math.Log10(a))) }

func notFinite(x float64) bool { return math.IsNaN(x) || math.IsInf(x, 0) }

// isWhole reports whether x is an integer that prints in full.
func isWhole(x float64) bool { return x == math.Trunc(x) && math.Abs(x) < 1e15 }
