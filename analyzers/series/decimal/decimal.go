// Package decimal reads decimal numbers from bytes, fast and exactly.
//
// A log is mostly digits, so this is where an audit of a log spends its time.
// Scan walks the digits once and remembers them as a whole number and a power
// of ten, from which three things follow without a second look: the nearest
// float64, the unit of the last digit shown, and an exact comparison of time
// stamps that a float64 cannot tell apart.
//
// The value is always the float64 that strconv.ParseFloat gives for the same
// text. Three ways lead to it: one multiplication or division when whole
// number and power of ten are exact (W. D. Clinger, "How to read floating point
// numbers accurately", PLDI 1990), a 128-bit product when they are not (see
// eisel.go), and strconv itself for the rest. Nothing here allocates.
package decimal

import (
	"encoding/binary"
	"math"
	"math/bits"
	"strconv"
	"unsafe"
)

// Number is a decimal number as it is written: sign, whole number, power of ten.
type Number struct {
	Value    float64 // nearest float64; infinite if it is too large for one
	Mantissa uint64  // the digits without point; not to be used unless Exact
	Exponent int32   // power of ten that goes with the last digit
	Negative bool    // a minus sign stands before it, also before zero
	Exact    bool    // the digits fit into Mantissa
}

// MaxExponent bounds the exponents that are taken at their word; larger ones
// in the text stand for it, and mean zero or infinity all the same.
const MaxExponent = 9999

// Scan reads the longest number that begins at text[at] and returns the offset
// behind it, or at itself if no number begins there.
//
// A number has a sign or not, digits with or without a decimal point (the byte
// point) among, before or behind them, and with or without an exponent marked
// by e, E, d or D. A decimal comma needs a digit behind it, since otherwise it
// separates. Words such as NaN are no numbers here.
func (n *Number) Scan(text []byte, at int, point byte) int {
	i := at
	n.Negative = false
	if i < len(text) && (text[i] == '-' || text[i] == '+') {
		n.Negative = text[i] == '-'
		i++
	}
	first := i
	var mantissa uint64
	for i < len(text) && text[i]-'0' <= 9 {
		mantissa = mantissa*10 + uint64(text[i]-'0')
		i++
	}
	digits := i - first
	exponent := 0
	if i < len(text) && text[i] == point && (point != ',' || i+1 < len(text) && text[i+1]-'0' <= 9) {
		i++
		from := i
		for i+8 <= len(text) {
			eight := binary.LittleEndian.Uint64(text[i:])
			if !allDigits(eight) {
				break
			}
			mantissa = mantissa*100000000 + eightDigits(eight)
			i += 8
		}
		for i < len(text) && text[i]-'0' <= 9 {
			mantissa = mantissa*10 + uint64(text[i]-'0')
			i++
		}
		exponent = from - i
		digits += i - from
	}
	if digits == 0 {
		return at
	}
	end := i
	if i < len(text) && (text[i]|0x20 == 'e' || text[i]|0x20 == 'd') {
		var e int
		end, e = scanExponent(text, i)
		exponent += e
	}
	n.Mantissa, n.Exponent, n.Exact = mantissa, int32(exponent), true
	if mantissa < exactMantissa && digits <= 19 && uint(-exponent) <= exactPower {
		n.Value = float64(mantissa) / powers[-exponent]
		if n.Negative {
			n.Value = -n.Value
		}
		return end
	}
	if digits > 19 && !fitsBehindZeros(text[first:i], point) {
		n.Exact = false
	}
	if !n.Exact || !n.convert() {
		n.Value = slow(text[at:i], point, exponent, end > i)
	}
	return end
}

// Magnitude is the number of digits from the first that is not zero to the
// last shown; 0 for zero. Only of Exact numbers.
func (n *Number) Magnitude() int { return decimalLength(n.Mantissa) }

// scanExponent reads an exponent whose mark stands at text[at]. It returns at
// if no digits follow.
func scanExponent(text []byte, at int) (end, exponent int) {
	i := at + 1
	negative := false
	if i < len(text) && (text[i] == '-' || text[i] == '+') {
		negative = text[i] == '-'
		i++
	}
	first := i
	for i < len(text) && text[i]-'0' <= 9 {
		exponent = min(exponent*10+int(text[i]-'0'), MaxExponent)
		i++
	}
	if i == first {
		return at, 0
	}
	if negative {
		exponent = -exponent
	}
	return i, exponent
}

// allDigits reports whether eight bytes are digits: each has 3 in its upper
// half, also after adding 6.
func allDigits(eight uint64) bool {
	return eight&0xf0f0f0f0f0f0f0f0 == 0x3030303030303030 &&
		(eight+0x0606060606060606)&0xf0f0f0f0f0f0f0f0 == 0x3030303030303030
}

// eightDigits is the number that eight digits write, the first in the lowest
// byte: neighbours are joined to pairs, pairs to fours, fours to eight.
func eightDigits(eight uint64) uint64 {
	eight -= 0x3030303030303030
	eight = eight*10 + eight>>8
	const mask = 0x000000ff000000ff
	const high = 100 + 1000000<<32
	const low = 1 + 10000<<32
	return ((eight&mask)*high + (eight>>16&mask)*low) >> 32
}

// fitsBehindZeros reports whether a text of more than 19 digits has at most 19
// from the first on that is not zero, and so has not overflown.
func fitsBehindZeros(text []byte, point byte) bool {
	i := 0
	for i < len(text) && (text[i] == '0' || text[i] == point) {
		i++
	}
	digits := 0
	for _, b := range text[i:] {
		if b != point {
			digits++
		}
	}
	return digits <= 19
}

// Powers of ten that are exact in float64, and whole numbers that are.
const (
	exactPower    = 22
	exactMantissa = 1 << 53
)

var powers = [exactPower + 1]float64{
	1e0, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11,
	1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18, 1e19, 1e20, 1e21, 1e22,
}

// convert works out Value from the other fields. It reports false when that
// takes strconv.
func (n *Number) convert() bool {
	m, e := n.Mantissa, int(n.Exponent)
	for m >= exactMantissa && m%10 == 0 { // 1700000000.250000000
		m /= 10
		e++
	}
	var v float64
	switch {
	case m < exactMantissa && e <= 0 && e >= -exactPower:
		v = float64(m) / powers[-e]
	case m < exactMantissa && e > 0 && e <= exactPower:
		v = float64(m) * powers[e]
	default:
		var ok bool
		if v, ok = eiselLemire(m, e); !ok {
			return false
		}
	}
	if n.Negative {
		v = -v
	}
	n.Value = v
	return true
}

// maxDigits is more than the 767 significant digits that decide how a decimal
// number rounds to float64: halfway between two neighbours there is no longer
// one. maxPlain digits make no number that is too large.
const (
	maxDigits = 800
	maxPlain  = 300
)

// slow asks strconv, in words that it knows, and with no more digits than can
// matter.
func slow(digits []byte, point byte, exponent int, marked bool) float64 {
	if point == '.' && !marked && len(digits) <= maxPlain {
		return parse(digits)
	}
	var buffer [maxDigits + 32]byte
	text, kept := rewrite(buffer[:0], digits, point)
	exponent += kept.dropped
	// The value is 0.d1d2d3... * 10^size with d1 not zero.
	switch size := kept.digits + exponent; {
	case kept.digits == 0:
		exponent = 0
	case size > 309 && digits[0] == '-':
		return math.Inf(-1)
	case size > 309:
		return math.Inf(1)
	case size < -400:
		exponent = -2000
	}
	return parse(strconv.AppendInt(append(text, 'e'), int64(exponent), 10))
}

// kept counts the significant digits that were written and those that were not.
type kept struct{ digits, dropped int }

// rewrite writes sign and significant digits without point, no more than
// maxDigits of them and the last one odd if nonzero ones were dropped, so that
// a number above a halfway point stays above it.
func rewrite(out, digits []byte, point byte) ([]byte, kept) {
	var k kept
	sticky := false
	for _, b := range digits {
		switch {
		case b == '-':
			out = append(out, b)
		case b == '+', b == point, b == '0' && k.digits == 0:
		case k.digits < maxDigits:
			out = append(out, b)
			k.digits++
		default:
			k.dropped++
			sticky = sticky || b != '0'
		}
	}
	if k.digits == 0 {
		return append(out, '0'), k
	}
	if sticky {
		out[len(out)-1] |= 1
	}
	return out, k
}

// parse is strconv.ParseFloat on bytes that it neither keeps nor changes. Out
// of range, which it reports as an error, comes as the infinity it returns.
func parse(text []byte) float64 {
	v, _ := strconv.ParseFloat(unsafe.String(unsafe.SliceData(text), len(text)), 64)
	return v
}

// decimalLength is the number of decimal digits of m, 0 for 0. 1233/4096 is
// log10(2), low enough.
func decimalLength(m uint64) int {
	guess := (bits.Len64(m) * 1233) >> 12
	if m >= whole[guess] {
		guess++
	}
	if m == 0 {
		return 0
	}
	return guess
}

var whole = [20]uint64{
	1e0, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11,
	1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18, 1e19,
}

// Power10 is 10^e as a float64, exact for e of 0..22.
func Power10(e int) float64 {
	if e >= 0 && e <= exactPower {
		return powers[e]
	}
	return math.Pow10(e)
}
