package rules

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"dextral/core/rotor"
)

// degrees prints an angle given in radians as degrees, with three significant
// digits down to a thousandth of a degree and one below. Angles under a
// millionth print as one: what is left of two equal rotations is rounding,
// which differs between processors.
func degrees(rad float64) string {
	deg := rad * 180 / math.Pi
	if a := math.Abs(deg); a > 0 && a < 1e-3 {
		deg = math.Copysign(max(a, 1e-6), deg)
		places := -int(math.Floor(math.Log10(math.Abs(deg))))
		return strconv.FormatFloat(deg, 'f', places, 64) + " deg"
	}
	return significant(deg) + " deg"
}

// digits prints a number for people: near one with as many digits as show the
// deviation from one, elsewhere with three significant ones.
func digits(x float64) string {
	if d := math.Abs(math.Abs(x) - 1); d > 0 && d < 0.5 {
		places := min(2-int(math.Floor(math.Log10(d))), 12)
		return trimZeros(strconv.FormatFloat(x, 'f', places, 64))
	}
	return significant(x)
}

// significant prints three significant digits, and those before the point.
func significant(x float64) string {
	switch a := math.Abs(x); {
	case a == 0 || a >= 1e7 || a < 1e-5:
		return strconv.FormatFloat(x, 'g', 3, 64)
	case a >= 100:
		return trimZeros(strconv.FormatFloat(x, 'f', 1, 64))
	default:
		places := 2 - int(math.Floor(math.Log10(a)))
		return trimZeros(strconv.FormatFloat(x, 'f', places, 64))
	}
}

func trimZeros(s string) string {
	if !strings.Contains(s, ".") {
		return s
	}
	return strings.TrimSuffix(strings.TrimRight(s, "0"), ".")
}

// vector prints three components with three decimals.
func vector(v rotor.Vec) string {
	clean := func(x float64) float64 {
		x = math.Round(x*1000) / 1000
		return x + 0 // -0 becomes 0
	}
	return fmt.Sprintf("(%g, %g, %g)", clean(v.X), clean(v.Y), clean(v.Z))
}
