package tolerance

import (
	"math"
	"math/big"
	"strconv"
	"strings"
)

// A Number is one entry of a group as its author wrote it.
type Number struct {
	Value       float64
	Half        float64 // half a unit of the last digit shown, in the entry's own unit
	Significant int     // digits shown from the first non-zero one; 0 for a zero
	Lead        int     // decimal exponent of the first significant digit
	Padded      bool    // ends in a zero that only a writer of a fixed number of digits keeps: 0.50, 1.000
}

// Integer reports whether the value is a whole number, however it is written:
// "1", "1.", "1.0" and "1e0" are the same to a writer that drops zeros.
func (n Number) Integer() bool { return n.Value == math.Trunc(n.Value) }

// binary64 is how many significant digits a float64 has at best: 17 tell any two of
// them apart. The eighteenth and later ones of a number are those of the binary
// fraction that its writer held, and say nothing of how well that was known.
const binary64 = 17

// Digits is the precision of one printed number: half a unit of its last
// digit, and whether the value is a whole number, which says nothing about
// rounding. It is false for text that is no finite number.
//
//	"0.7071" 0.00005   "-1e-3" 0.0005   "2.6862511e+002" 0.000005
//	"90" 0.5, whole    "1." 0.5, whole  "0x1.8p-3" 1/128
func Digits(text string) (half float64, integer bool, ok bool) {
	n, ok := Read(text)
	return n.Half, n.Integer(), ok
}

// Read takes a printed number apart. It accepts what Go, YAML, TOML, JSON and
// Fortran print: a sign, underscores between digits, exponents with e or d,
// hexadecimal floats and whole numbers with a base prefix. It is false for
// anything else, for infinities and for NaN.
func Read(text string) (Number, bool) {
	t := strings.ToLower(strings.ReplaceAll(strings.TrimSpace(text), "_", ""))
	body := strings.TrimLeft(t, "+-")
	if len(t)-len(body) > 1 || body == "" {
		return Number{}, false
	}
	if len(body) > 1 && body[0] == '0' && strings.ContainsRune("xbo", rune(body[1])) {
		return readPrefixed(t, body)
	}
	mantissa, exponent, ok := cutExponent(body)
	if !ok {
		return Number{}, false
	}
	whole, fraction, _ := strings.Cut(mantissa, ".")
	if whole+fraction == "" || strings.Trim(whole+fraction, "0123456789") != "" {
		return Number{}, false
	}
	value, err := strconv.ParseFloat(strings.ReplaceAll(t, "d", "e"), 64)
	if err != nil {
		return Number{}, false
	}
	n := Number{
		Value:  value,
		Half:   halfUnit(exponent - len(fraction)),
		Padded: len(fraction) > 1 && strings.HasSuffix(fraction, "0"),
	}
	if digits := strings.TrimLeft(whole+fraction, "0"); digits != "" {
		n.Significant = min(len(digits), binary64)
		n.Lead = exponent - len(fraction) + len(digits) - 1
		if len(digits) > binary64 {
			n.Half = math.Max(n.Half, math.Abs(value)*unit64)
		}
	}
	return n, true
}

// cutExponent splits "2.6e+002" into "2.6" and 2.
func cutExponent(body string) (mantissa string, exponent int, ok bool) {
	at := strings.IndexAny(body, "ed")
	if at < 0 {
		return body, 0, true
	}
	exponent, err := strconv.Atoi(body[at+1:])
	return body[:at], exponent, err == nil && exponent > -400 && exponent < 400
}

// halfUnit is 10^e / 2, within the range of a float64.
func halfUnit(e int) float64 { return math.Min(math.Pow10(e)/2, math.MaxFloat64) }

// readPrefixed reads 0x1.8p-3, 0x1f, 0b101, 0o17. A hexadecimal digit carries
// log10(16) decimal ones; the count is rounded down, which is the coarser side.
func readPrefixed(t, body string) (Number, bool) {
	mantissa, power, float := strings.Cut(body, "p")
	if !float {
		whole, ok := new(big.Int).SetString(body, 0)
		if !ok {
			return Number{}, false
		}
		value, _ := new(big.Float).SetInt(whole).Float64()
		if math.IsInf(value, 0) {
			return Number{}, false
		}
		return decimalView(Number{Value: math.Copysign(value, sign(t)), Half: 0.5}), true
	}
	value, err := strconv.ParseFloat(t, 64)
	exponent, errPower := strconv.Atoi(power)
	if err != nil || errPower != nil {
		return Number{}, false
	}
	_, fraction, _ := strings.Cut(mantissa, ".")
	half := math.Ldexp(0.5, exponent-4*len(fraction))
	if math.IsInf(half, 0) { // a zero with an exponent beyond all numbers
		return Number{}, false
	}
	return decimalView(Number{Value: value, Half: half}), true
}

func sign(t string) float64 {
	if strings.HasPrefix(t, "-") {
		return -1
	}
	return 1
}

// decimalView fills in the decimal digits that a value and its half unit amount to.
func decimalView(n Number) Number {
	if n.Value == 0 {
		return n
	}
	n.Lead = int(math.Floor(math.Log10(math.Abs(n.Value))))
	n.Significant = max(1, n.Lead-int(math.Ceil(math.Log10(2*n.Half)))+1)
	return n
}
