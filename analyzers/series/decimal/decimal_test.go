package decimal

import (
	"fmt"
	"math"
	"math/big"
	"strconv"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"
)

// same compares with strconv, bit by bit.
func same(t require.TestingT, text string) {
	want, err := strconv.ParseFloat(text, 64)
	if err != nil {
		require.ErrorIs(t, err, strconv.ErrRange, text)
	}
	var n Number
	end := n.Scan([]byte(text), 0, '.')
	require.Equal(t, len(text), end, text)
	require.Equal(t, math.Float64bits(want), math.Float64bits(n.Value), "%s: got %v, strconv %v", text, n.Value, want)
}

// decimals draws numbers in the styles of recorders.
func decimals() *rapid.Generator[string] {
	sign := rapid.SampledFrom([]string{"", "-", "+"})
	digits := func(most int) *rapid.Generator[string] {
		return rapid.StringOfN(rapid.RuneFrom([]rune("0123456789")), 1, most, -1)
	}
	exponent := rapid.Custom(func(t *rapid.T) string {
		return rapid.SampledFrom([]string{"e", "E"}).Draw(t, "mark") + sign.Draw(t, "sign") + digits(3).Draw(t, "exponent")
	})
	return rapid.OneOf(
		rapid.Custom(func(t *rapid.T) string {
			s := sign.Draw(t, "sign") + digits(25).Draw(t, "whole")
			if rapid.Bool().Draw(t, "fraction") {
				s += "." + digits(25).Draw(t, "fraction")
			}
			if rapid.Bool().Draw(t, "exponent") {
				s += exponent.Draw(t, "exponent")
			}
			return s
		}),
		rapid.Map(rapid.Float64(), func(x float64) string { return strconv.FormatFloat(x, 'g', -1, 64) }),
		rapid.Map(rapid.Float32(), func(x float32) string { return strconv.FormatFloat(float64(x), 'g', -1, 32) }),
		rapid.Map(rapid.Float64Range(-1, 1), func(x float64) string { return strconv.FormatFloat(x, 'f', 6, 64) }),
		rapid.Map(rapid.Float64Range(-1, 1), func(x float64) string { return strconv.FormatFloat(x, 'e', 18, 64) }),
		rapid.Map(rapid.Int64(), func(x int64) string { return strconv.FormatInt(x, 10) }),
	)
}

func TestValueIsThatOfStrconv(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) { same(t, decimals().Draw(t, "text")) })
}

// Texts that are, in 25 digits and more, exactly halfway between two neighbours
// or a hair beside it are where rounding goes wrong first.
func TestHalfwayPoints(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		x := math.Abs(rapid.Float64Range(1e-12, 1e12).Draw(t, "x"))
		up := math.Nextafter(x, math.Inf(1))
		middle := new(big.Float).SetPrec(200).Add(big.NewFloat(x), big.NewFloat(up))
		middle.Quo(middle, big.NewFloat(2))
		text := middle.Text('f', 120)
		same(t, text)
		same(t, strings.TrimRight(text, "0")+"0000000001")
		for digits := 15; digits < 22; digits++ {
			same(t, middle.Text('e', digits))
		}
	})
}

func TestSingularTexts(t *testing.T) {
	for _, text := range []string{
		"0", "-0", "0.0", "-0.000", "00000000000000000000000000001", "0.00000000000000000000000000000000001234567890123456789",
		"1.", ".5", "-.5", "1e0", "1e-0", "9007199254740992", "9007199254740993", "9007199254740993.0000000000000000000001",
		"1e22", "1e23", "1e-22", "1e-23", "1e308", "1.7976931348623157e308", "1.7976931348623159e308", "1e309", "1e400", "-1e99999999",
		"2.2250738585072011e-308", "4.9e-324", "2.4703282292062327208e-324", "2.4703282292062328e-324", "1e-400",
		"18446744073709551615", "18446744073709551616", "1" + strings.Repeat("0", 1200), "0." + strings.Repeat("0", 1200) + "1",
		"1." + strings.Repeat("0", 900) + "1", "9007199254740993." + strings.Repeat("0", 900) + "1",
		strings.Repeat("1234567890", 120) + ".5e-1190", "6.151000000000000217e-02", "1403715524907143168", "1.403715529112143517e+09",
	} {
		same(t, text)
	}
}

func TestScanStops(t *testing.T) {
	for _, c := range []struct {
		text  string
		point byte
		end   int
		value float64
	}{
		{"1.5,2", '.', 3, 1.5},
		{"1,5;2", ',', 3, 1.5},
		{"1, 5", ',', 1, 1}, // a comma that separates
		{"1.5.2", '.', 3, 1.5},
		{"1e", '.', 1, 1},
		{"1e+", '.', 1, 1},
		{"1e+x", '.', 1, 1},
		{"1.5d-3 ", '.', 6, 1.5e-3},
		{"1.5D3", '.', 5, 1.5e3},
		{"2026-01-02", '.', 4, 2026},
		{"12 deg", '.', 2, 12},
		{"0x10", '.', 1, 0},
		{"1_000", '.', 1, 1},
		{"12345678,9", '.', 8, 12345678},
		{"0.12345678;", '.', 10, 0.12345678},
		{"0.1234567x", '.', 9, 0.1234567},
		{"0,123456789", ',', 11, 0.123456789},
		{"0,1e400", ',', 7, math.Inf(1)},
	} {
		var n Number
		assert.Equal(t, c.end, n.Scan([]byte(c.text), 0, c.point), c.text)
		assert.Equal(t, c.value, n.Value, c.text)
	}
	for _, text := range []string{"", "-", "+", ".", "-.", "e5", "nan", "inf", " 1", "--1", ",5", "x"} {
		var n Number
		assert.Equal(t, 0, n.Scan([]byte(text), 0, '.'), text)
	}
}

// A decimal comma and a Fortran mark change nothing about the value.
func TestOtherSpellings(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		text := decimals().Draw(t, "text")
		want, _ := strconv.ParseFloat(text, 64)
		for _, mark := range []string{"e", "d", "D"} {
			other := strings.NewReplacer(".", ",", "e", mark, "E", mark).Replace(text)
			var n Number
			require.Equal(t, len(other), n.Scan([]byte(other), 0, ','), other)
			require.Equal(t, math.Float64bits(want), math.Float64bits(n.Value), other)
		}
	})
}

// Mantissa and exponent are the number itself, digit by digit.
func TestMantissaIsExact(t *testing.T) {
	exact := 0
	rapid.Check(t, func(t *rapid.T) {
		text := decimals().Draw(t, "text")
		var n Number
		n.Scan([]byte(text), 0, '.')
		if !n.Exact || n.Exponent > 400 || n.Exponent < -400 {
			return
		}
		exact++
		want, ok := new(big.Rat).SetString(strings.TrimLeft(text, "+-"))
		require.True(t, ok)
		got, ok := new(big.Rat).SetString(fmt.Sprintf("%de%d", n.Mantissa, n.Exponent))
		require.True(t, ok)
		require.Zero(t, want.Cmp(got), text)
		require.Equal(t, text[0] == '-', n.Negative)
		require.Equal(t, len(strings.TrimLeft(strconv.FormatUint(n.Mantissa, 10), "0")), n.Magnitude())
	})
	require.Positive(t, exact)
}

// The table against powers computed another way: a big.Float of many more bits.
func TestPowers(t *testing.T) {
	for e := leastPower; e <= greatestPower; e++ {
		f := new(big.Float).SetPrec(600)
		f.SetString(fmt.Sprintf("1e%d", e))
		mantissa := new(big.Float)
		f.MantExp(mantissa) // 1/2 <= mantissa < 1
		whole, _ := mantissa.SetMantExp(mantissa, 128).Int(nil)
		p := power{new(big.Int).Rsh(whole, 64).Uint64(), new(big.Int).And(whole, new(big.Int).SetUint64(math.MaxUint64)).Uint64()}
		assert.Equal(t, p, powerOf10(e), "1e%d", e)
		assert.Equal(t, math.Ilogb(math.Pow10(e)), (217706*e)>>16, "1e%d", e)
	}
	for e := -400; e < 400; e++ {
		assert.Equal(t, math.Pow10(e), Power10(e))
	}
}

func TestScanDoesNotAllocate(t *testing.T) {
	for _, text := range []string{"0.161996", "0.12345678901234567", "1.7976931348623157e300", strings.Repeat("7", 900), "1,5"} {
		line := []byte(text)
		var n Number
		assert.Zero(t, testing.AllocsPerRun(100, func() { n.Scan(line, 0, '.') }), text)
	}
}

func FuzzScan(f *testing.F) {
	for _, text := range []string{"1.5", "-0", "1e400", "1,5", "0x1p-2", "nan", "123456789.123456789e-5", ""} {
		f.Add(text)
	}
	f.Fuzz(func(t *testing.T, text string) {
		var n Number
		end := n.Scan([]byte(text), 0, '.')
		if end == 0 {
			return
		}
		read := strings.NewReplacer("d", "e", "D", "e").Replace(text[:end])
		want, err := strconv.ParseFloat(read, 64)
		if err != nil {
			require.ErrorIs(t, err, strconv.ErrRange, read)
		}
		require.Equal(t, math.Float64bits(want), math.Float64bits(n.Value), read)
	})
}

func BenchmarkScan(b *testing.B) {
	for _, text := range []string{"0.161996", "-0.123456789", "0.12345678901234567", "6.151000000000000217e-02", "1403715524907143168"} {
		line := []byte(text)
		b.Run(text+"/scan", func(b *testing.B) {
			b.SetBytes(int64(len(line)))
			var n Number
			for b.Loop() {
				n.Scan(line, 0, '.')
			}
		})
		b.Run(text+"/strconv", func(b *testing.B) {
			b.SetBytes(int64(len(line)))
			for b.Loop() {
				strconv.ParseFloat(text, 64)
			}
		})
	}
}
