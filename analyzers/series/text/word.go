package text

import (
	"math"
	"time"

	"dextral/analyzers/series/fold"
)

// readWord reads the words that programs write for numbers that they do not
// have, and for those that have no digits.
func readWord(field []byte, c *fold.Cell) bool {
	if len(field) > 12 {
		return false
	}
	var lower [12]byte
	for i, b := range field {
		if b >= 'A' && b <= 'Z' {
			b += 'a' - 'A'
		}
		lower[i] = b
	}
	word := lower[:len(field)]
	sign := 1
	if word[0] == '-' || word[0] == '+' {
		if word[0] == '-' {
			sign = -1
		}
		word = word[1:]
	}
	value := 0.0
	switch string(word) {
	case "nan", "nan(ind)", "nan(snan)", "1.#qnan", "1.#ind", "1.#qnan0", "1.#ind00":
		value = math.NaN()
	case "inf", "infinity", "1.#inf", "1.#inf00":
		value = math.Inf(sign)
	case "", "null", "none", "nil", "na", "n/a", "-", "--":
		*c = fold.Cell{} // a lone sign is a dash: no number
		return true
	default:
		return false
	}
	*c = fold.Cell{State: fold.Binary}
	c.Number.Value = value
	return true
}

// readTime reads date and time of ISO 8601, such as 2026-03-01T08:30:00.25Z, as
// nanoseconds since 1970, to be understood as seconds with nine decimals. A
// space may stand for the T; without an offset it is taken as UTC.
func readTime(field []byte, c *fold.Cell) bool {
	const shape = "0000-00-00T00:00:00"
	if len(field) < len(shape) {
		return false
	}
	for i, want := range []byte(shape) {
		got := field[i]
		if want == '0' && (got < '0' || got > '9') || want != '0' && got != want && (want != 'T' || got != ' ' && got != 't') {
			return false
		}
	}
	number := func(from, to int) int {
		n := 0
		for _, b := range field[from:to] {
			n = n*10 + int(b-'0')
		}
		return n
	}
	year, month, day := number(0, 4), number(5, 7), number(8, 10)
	hour, minute, second := number(11, 13), number(14, 16), number(17, 19)
	nanos, rest := fraction(field[len(shape):])
	offset, ok := zone(rest)
	if !ok || year < 1678 || year > 2261 || month < 1 || month > 12 || day < 1 || day > 31 || hour > 24 || minute > 59 || second > 60 {
		return false
	}
	at := time.Date(year, time.Month(month), day, hour, minute, second, nanos, time.UTC).UnixNano() - int64(offset)*1e9
	*c = fold.Cell{State: fold.Written}
	n := &c.Number
	n.Exact, n.Exponent, n.Negative = true, -9, at < 0
	n.Mantissa = uint64(max(at, -at))
	n.Value = float64(at) / 1e9
	return true
}

// fraction reads decimals of a second; those beyond nanoseconds are dropped.
func fraction(text []byte) (nanos int, rest []byte) {
	if len(text) == 0 || text[0] != '.' && text[0] != ',' {
		return 0, text
	}
	i := 1
	for unit := 100000000; i < len(text) && text[i] >= '0' && text[i] <= '9'; i++ {
		nanos += int(text[i]-'0') * unit
		unit /= 10
	}
	return nanos, text[i:]
}

// zone reads Z, +01:00, -0530 or nothing, in seconds.
func zone(text []byte) (seconds int, ok bool) {
	switch {
	case len(text) == 0, len(text) == 1 && (text[0] == 'Z' || text[0] == 'z'):
		return 0, true
	case text[0] != '+' && text[0] != '-':
		return 0, false
	}
	digits, n := 0, 0
	for _, b := range text[1:] {
		switch {
		case b >= '0' && b <= '9':
			digits = digits*10 + int(b-'0')
			n++
		case b != ':':
			return 0, false
		}
	}
	if n == 2 {
		digits *= 100
	}
	seconds = digits/100*3600 + digits%100*60
	if text[0] == '-' {
		seconds = -seconds
	}
	return seconds, n == 2 || n == 4
}
