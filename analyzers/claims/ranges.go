package claims

import (
	"math"
	"regexp"
	"strings"

	"dextral/core/convention"
)

// limit is a limit of angles as people write it: 180, 180.0, pi, 2*pi, pi/2.
const limit = `([-+]?(?:(?:2\s*\*?\s*)?(?:pi|π)(?:/2)?|\d+(?:\.0+)?))\s*(?:°|deg(?:rees?)?|rad(?:ians?)?)?`

var (
	limits    = regexp.MustCompile(`(?i)(?:^|[\s\[(])` + limit + `\s*(?:,|;|\.\.+|…|–|to)\s*` + limit)
	plusMinus = regexp.MustCompile(`(?i)(?:±|\+/?-)\s*` + limit)
)

// limitValues are the limits that ranges of angles have.
var limitValues = map[string]float64{
	"0": 0, "90": math.Pi / 2, "180": math.Pi, "360": 2 * math.Pi,
	"pi": math.Pi, "2pi": 2 * math.Pi, "pi/2": math.Pi / 2,
}

func limitOf(text string) (float64, bool) {
	text = strings.ToLower(strings.NewReplacer(" ", "", "*", "", "π", "pi", "Π", "pi", "+", "").Replace(text))
	text, negative := strings.CutPrefix(text, "-")
	if whole, zeros, ok := strings.Cut(text, "."); ok && strings.Trim(zeros, "0") == "" {
		text = whole
	}
	x, ok := limitValues[text]
	if negative {
		x = -x
	}
	return x, ok
}

// rangeIn finds the range that a comment states for all of its angles: a full turn,
// from 0 or about 0. A text with two ranges, or one that speaks of one or two angles by
// name, gives no range to all three; and a half turn, -90 to 90, is that of one of them.
func rangeIn(text string, words []string) convention.Range {
	if !strings.Contains(text, "0") && !strings.ContainsAny(text, "iIπ") {
		return convention.Range{} // no limit is written without one of these
	}
	if named := rolesAmong(words); named != 0 && named != 3 {
		return convention.Range{}
	}
	var found []convention.Range
	for _, m := range limits.FindAllStringSubmatch(text, -1) {
		low, okLow := limitOf(m[1])
		high, okHigh := limitOf(m[2])
		if okLow && okHigh && low < high {
			found = append(found, convention.Range{Low: low, High: high})
		}
	}
	for _, m := range plusMinus.FindAllStringSubmatch(text, -1) {
		if x, ok := limitOf(m[1]); ok && x > 0 {
			found = append(found, convention.Range{Low: -x, High: x})
		}
	}
	if len(found) != 1 || found[0].High-found[0].Low != 2*math.Pi || found[0].Low == -2*math.Pi {
		return convention.Range{}
	}
	return found[0]
}

// rolesAmong counts the words that name an angle.
func rolesAmong(words []string) int {
	n := 0
	for _, w := range words {
		switch w {
		case "roll", "pitch", "yaw", "heading", "bank", "elevation", "azimuth", "attitude", "tilt", "pan", "course", "latitude", "longitude", "lat", "lon":
			n++
		}
	}
	return n
}
