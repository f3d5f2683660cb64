package tolerance_test

import (
	"fmt"
	"math"
	"strconv"
	"testing"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"

	"dextral/core/tolerance"
)

func TestDigits(t *testing.T) {
	for _, c := range []struct {
		text    string
		half    float64
		integer bool
	}{
		{"0.7071", 0.00005, false}, {"-0.7071", 0.00005, false}, {"+.7071", 0.00005, false}, {" 0.7071 ", 0.00005, false},
		{"0.70710", 0.000005, false}, {"12.5", 0.05, false}, {"1e-3", 0.0005, false}, {"1.25E-3", 0.000005, false},
		{"2.6862511e+002", 0.000005, false}, {"2.6862511D+02", 0.000005, false}, {"1_000.25", 0.005, false},
		{"90", 0.5, true}, {"-90", 0.5, true}, {"90.", 0.5, true}, {"1.0", 0.05, true}, {"0", 0.5, true}, {"0.000", 0.0005, true},
		{"1e3", 500, true}, {"1.5e1", 0.5, true}, {"12e-1", 0.05, false}, {"1e-300", 5e-301, false}, {"5e-324", 0, false},
		{"0x1.8p-3", 0x1p-8, false}, {"0x1p0", 0.5, true}, {"-0x10", 0.5, true}, {"0b101", 0.5, true}, {"0o17", 0.5, true}, {"0x1.8p1", 0x1p-4, true},
	} {
		half, integer, ok := tolerance.Digits(c.text)
		assert.True(t, ok, c.text)
		assert.InDelta(t, c.half, half, c.half*0x1p-51, c.text)
		assert.Equal(t, c.integer, integer, c.text)
	}
	for _, text := range []string{
		"", " ", "-", "+-1", "--1", ".", "e5", ".e5", "1e", "1e+", "1.2.3", "nan", "NaN", "inf", "-Inf", ".inf", "1e400", "1e99999999999", "1e-400", "0x", "0xg", "0x1.8", "0x1p", "0x1p9999", "0b2", "1,5", "90deg", "q",
	} {
		_, _, ok := tolerance.Digits(text)
		assert.False(t, ok, text)
	}
}

func TestRead(t *testing.T) {
	for text, want := range map[string]tolerance.Number{
		"0.7071":     {Value: 0.7071, Half: 0.00005, Significant: 4, Lead: -1},
		"-0.00250":   {Value: -0.0025, Half: 0.000005, Significant: 3, Lead: -3, Padded: true},
		"123.40":     {Value: 123.4, Half: 0.005, Significant: 5, Lead: 2, Padded: true},
		"2.50e-3":    {Value: 0.0025, Half: 0.000005, Significant: 3, Lead: -3, Padded: true},
		"0.000":      {Value: 0, Half: 0.0005, Padded: true},
		"1":          {Value: 1, Half: 0.5, Significant: 1},
		"0x1.8p-3":   {Value: 0.1875, Half: 0x1p-8, Significant: 2, Lead: -1},
		"0x0p0":      {Value: 0, Half: 0.5},
		"-0x1000":    {Value: -4096, Half: 0.5, Significant: 4, Lead: 3},
		"1234567890": {Value: 1234567890, Half: 0.5, Significant: 10, Lead: 9},
	} {
		got, ok := tolerance.Read(text)
		assert.True(t, ok)
		assert.Equal(t, want, got, text)
	}
}

// TestReadWhatIsPrinted: a value is within half a unit of what is read back of
// its printed form, for every way to print it.
func TestReadWhatIsPrinted(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		x := rapid.Float64Range(-1e6, 1e6).Draw(rt, "x")
		digits := rapid.IntRange(0, 12).Draw(rt, "digits")
		format := rapid.SampledFrom([]byte("feE")).Draw(rt, "format")
		text := strconv.FormatFloat(x, format, digits, 64)
		n, ok := tolerance.Read(text)
		assert.True(rt, ok, text)
		assert.LessOrEqual(rt, math.Abs(n.Value-x), n.Half*(1+1e-9)+math.Abs(x)*0x1p-52, text)
		if x != 0 && n.Value != 0 {
			assert.Equal(rt, int(math.Floor(math.Log10(math.Abs(n.Value))+1e-12)), n.Lead, text)
		}
		if format != 'f' && n.Value != 0 {
			assert.Equal(rt, digits+1, n.Significant, text)
		}
		hex := strconv.FormatFloat(x, 'x', digits, 64)
		n, ok = tolerance.Read(hex)
		assert.True(rt, ok, hex)
		assert.LessOrEqual(rt, math.Abs(n.Value-x), n.Half, hex)
	})
}

func FuzzRead(f *testing.F) {
	for _, text := range []string{"0.5", "1e5", "0x1p-3", "-0b1", "1_0", "1d2", "\xff", "0x.p1", "1e-400", "00", "0_x1", "0X0p2000"} {
		f.Add(text)
	}
	f.Fuzz(func(t *testing.T, text string) {
		n, ok := tolerance.Read(text)
		if !ok {
			assert.Equal(t, tolerance.Number{}, n)
			return
		}
		assert.False(t, math.IsNaN(n.Value) || math.IsInf(n.Value, 0), text)
		assert.True(t, n.Half >= 0 && n.Half <= math.MaxFloat64 && n.Significant >= 0, "%q %+v", text, n)
		assert.Equal(t, n.Value == 0, n.Significant == 0 || n.Value == 0, text)
	})
}

func TestOf(t *testing.T) {
	for _, c := range []struct {
		half  float64
		texts []string
		why   string
	}{
		{0.00005, []string{"0.7071", "0.0", "0", "0.7071"}, "zeros do not count"},
		{0.00005, []string{"0.7071068", "0.7071", "0.000001", "0"}, "the coarsest"},
		{0.05, []string{"12.5", "90", "0"}, "whole numbers are not coarse"},
		{0.00005, []string{"0.3661", "0.9280", "1"}, "nor when they stand alone"},
		{0.0005, []string{"1.000", "0.000", "-0.000", "0.000"}, "padded whole numbers are rounded like the others"},
		{0.005, []string{"0.8660254037844387", "-0.50"}, "padded: its zeros were not dropped"},
		{0.05, []string{"0.8660254037844387", "-0.50", "0.5"}, "nor were those of its sibling"},
		{5e-6, []string{"1", "0", "0", "0"}, "also alone: 1 may be 0.999998 printed with six"},
		{5e-5, []string{"90", "0", "-45"}, "90.0000"},
		{5e-6, []string{"1", "0.000123456", "-2.5e-05", "0.00031"}, "a general format with six digits"},
		{5e-17, []string{"0.8660254037844387", "-0.5", "0.0", "0.5"}, "dropped zeros"},
		{5e-9, []string{"0.70710677", "0.5"}, "dropped zeros of a float32"},
		{0.05, []string{"0.5", "0.86603"}, "five digits more may be chance"},
		{0.0005, []string{"-0.366", "0.928", "0.065"}, "one precision"},
		{0, []string{"0", "0.0", "0."}, "nothing is known"},
	} {
		p, ok := tolerance.OfTexts(c.texts...)
		assert.True(t, ok)
		assert.InDelta(t, c.half, p.Half, c.half*1e-9, "%v: %s", c.texts, c.why)
	}
	_, ok := tolerance.OfTexts("0.5", "nan")
	assert.False(t, ok)
	p, ok := tolerance.OfTexts()
	assert.True(t, ok)
	assert.Equal(t, tolerance.Precision{}, p)
}

// TestOfFormats prints unit quaternions with the usual formats and checks that
// the precision found covers the error that was made, and is no more than ten
// times the half unit that was used in a component of size one.
func TestOfFormats(t *testing.T) {
	rng := source()
	for _, format := range []string{"%.3f", "%.6f", "%.6g", "%g", "%.9g", "%.4e", "%.17g", "%v"} {
		for range 5000 {
			q := randomUnit(rng, 4)
			if rng.IntN(3) == 0 { // nearly the identity
				q = [4]float64{1, q[1] * 1e-3, q[2] * 1e-3, q[3] * 1e-3}
				n := norm(q[:])
				for k := range q {
					q[k] /= n
				}
			}
			texts := make([]string, 4)
			for k, x := range q {
				texts[k] = fmt.Sprintf(format, x)
			}
			p, ok := tolerance.OfTexts(texts...)
			assert.True(t, ok)
			for k, text := range texts {
				x, _ := strconv.ParseFloat(text, 64)
				assert.LessOrEqual(t, math.Abs(x-q[k]), p.Half*(1+1e-9)+0x1p-53, "%s %v", format, texts)
			}
		}
	}
}

// A float64 printed with 19 digits is known to 17 at best: its place in binary.
func TestMoreDigitsThanBinary(t *testing.T) {
	n, ok := tolerance.Read("7.071067811865475727e-01")
	assert.True(t, ok)
	assert.Equal(t, 17, n.Significant)
	assert.Equal(t, 0.7071067811865475727/(1<<53), n.Half)
	n, _ = tolerance.Read("0.70710678118654757")
	assert.Equal(t, 0.5e-17, n.Half) // 17 digits stand as they are
}
