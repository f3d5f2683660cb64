package columns

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// name is the name of a column taken apart.
type name struct {
	text  string // without unit
	words []word
	unit  string // "" if none is given
}

// word is a word of a name in lower case, with the bytes of text that it is.
type word struct {
	text     string
	from, to int
}

// parseName splits a name at everything that is no letter or digit and where
// small letters turn to capitals; digits belong to the word before them.
//
//	q_RS_w        q rs w
//	DesRoll (deg) des roll, in deg
//	R[0][2]       r 0 2
//	IMUQuatX      imu quat x
func parseName(c Column) name {
	var n name
	n.text, n.unit = cutUnit(c.Text)
	if n.unit == "" {
		n.unit = normalUnit(c.Unit)
	}
	n.words = split(n.text)
	if n.unit == "" && len(n.words) > 1 {
		last := n.words[len(n.words)-1]
		if u := normalUnit(last.text); suffixUnits[u] {
			n.unit = u
			n.words = n.words[:len(n.words)-1]
			n.text = strings.TrimRight(n.text[:last.from], "_-./: ")
		}
	}
	return n
}

func split(text string) []word {
	var words []word
	start := -1
	end := func(at int) {
		if start >= 0 {
			words = append(words, word{strings.ToLower(text[start:at]), start, at})
		}
		start = -1
	}
	var before rune
	for at, r := range text {
		switch {
		case !unicode.IsLetter(r) && !unicode.IsDigit(r):
			end(at)
		case start < 0:
			start = at
		case unicode.IsUpper(r) && (!unicode.IsUpper(before) || smallFollows(text[at:])):
			end(at)
			start = at
		}
		before = r
	}
	end(len(text))
	return words
}

// smallFollows reports whether the second letter is small: a capital there
// begins a word even after capitals, as in IMUQuat.
func smallFollows(text string) bool {
	_, size := utf8.DecodeRuneInString(text)
	r, _ := utf8.DecodeRuneInString(text[size:])
	return unicode.IsLower(r)
}

// has reports whether one of the words is in the set.
func (n name) has(set map[string]bool) bool {
	for _, w := range n.words {
		if set[w.text] {
			return true
		}
	}
	return false
}

// cutUnit takes a unit in brackets from the end of a name: "yaw [deg]",
// "Roll(rad)", "q_RS_w []". An index such as q[0] is no unit.
func cutUnit(text string) (rest, unit string) {
	t := strings.TrimSpace(text)
	for _, pair := range []string{"[]", "()", "{}"} {
		body, ok := strings.CutSuffix(t, pair[1:])
		if !ok {
			continue
		}
		open := strings.LastIndexByte(body, pair[0])
		if open <= 0 {
			continue
		}
		inside := strings.TrimSpace(body[open+1:])
		if isIndex(inside) {
			continue
		}
		return strings.TrimSpace(body[:open]), normalUnit(inside)
	}
	return t, ""
}

// isIndex reports whether the text in brackets counts or names a component.
func isIndex(s string) bool {
	if s == "" {
		return false
	}
	return strings.Trim(s, "0123456789, ") == "" || len(s) == 1 && strings.Contains("wxyzijk", strings.ToLower(s))
}

// normalUnit writes units in one way each. A unit that says that there is none
// becomes "1"; a unit that is not known stays as it is.
func normalUnit(s string) string {
	u := strings.ToLower(strings.TrimSpace(s))
	if known, ok := unitNames[u]; ok {
		return known
	}
	return u
}

var unitNames = map[string]string{
	"deg": "deg", "degs": "deg", "degree": "deg", "degrees": "deg", "\u00b0": "deg", "\u00ba": "deg", "\xb0": "deg",
	"rad": "rad", "rads": "rad", "radian": "rad", "radians": "rad",
	"s": "s", "sec": "s", "secs": "s", "second": "s", "seconds": "s",
	"ms": "ms", "msec": "ms", "msecs": "ms", "millis": "ms", "millisecond": "ms", "milliseconds": "ms",
	"us": "us", "usec": "us", "usecs": "us", "micros": "us", "\u00b5s": "us", "\u03bcs": "us", "microsecond": "us", "microseconds": "us",
	"ns": "ns", "nsec": "ns", "nsecs": "ns", "nanos": "ns", "nanosec": "ns", "nanosecs": "ns", "nanosecond": "ns", "nanoseconds": "ns",
	"-": "1", "1": "1", "none": "1", "unitless": "1", "dimensionless": "1", "n/a": "1", "#": "1",
}

// suffixUnits are units that may end a name without brackets: roll_deg, time_us.
// A bare s does not, since the s of a quaternion is its scalar.
var suffixUnits = map[string]bool{"deg": true, "rad": true, "ms": true, "us": true, "ns": true}

// unitless reports whether a unit is absent or says that there is none.
func unitless(unit string) bool { return unit == "" || unit == "1" }

// aside are words that make a column one about an orientation instead of an
// orientation.
var aside = set("rate rates dot speed vel velocity acc accel acceleration angular cov covar covariance std stddev stdev sd sigma " +
	"var variance uncertainty accuracy bias biases noise gain torque moment gyro omega deriv derivative residual resid innov innovation " +
	"qdot quatdot err error limit trim offset stick rc servo pwm valid flag status count quality")

func set(words string) map[string]bool {
	m := map[string]bool{}
	for _, w := range strings.Fields(words) {
		m[w] = true
	}
	return m
}

// IsUnit reports whether a field of a header is a unit, or has the brackets of one.
func IsUnit(text string) bool {
	t := strings.TrimSpace(text)
	if len(t) >= 2 && (t[0] == '[' && t[len(t)-1] == ']' || t[0] == '(' && t[len(t)-1] == ')') {
		return true
	}
	if otherUnits[strings.ToLower(t)] {
		return true
	}
	_, known := unitNames[strings.ToLower(t)]
	return known
}

// otherUnits are units of quantities that stand beside orientations in logs.
var otherUnits = set("m mm cm km m/s m/s2 m/s^2 m/s/s rad/s rad/sec deg/s deg/sec deg/s2 rad/s2 g hz v a w n pa hpa mbar c k degc t ut mg gauss % kg nm kt kts ft ft/s")
