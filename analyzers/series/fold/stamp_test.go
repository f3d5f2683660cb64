package fold

import (
	"math"
	"strconv"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"
)

func stamp(text string) Stamp { c := cell(text); return StampOf(&c) }

// Stamps 1 ns apart in 2026 are one float64, and two stamps.
func TestStampsAreExact(t *testing.T) {
	a, b := stamp("1772323200000000001"), stamp("1772323200000000002")
	require.Equal(t, a.Value, b.Value)
	assert.Equal(t, 1.0, b.Since(a))
	a, b = stamp("1772323200.000000001"), stamp("1772323200.00000001") // other exponents
	assert.Equal(t, 9e-9, b.Since(a))
	assert.Equal(t, -9e-9, a.Since(b))
	assert.Equal(t, 1e300-1, stamp("1e300").Since(stamp("1")), "beyond int64: as float64")
	assert.Equal(t, float64(math.MaxInt64)*2, stamp("9223372036854775807").Since(stamp("-9223372036854775807")))
	for _, text := range []string{"", "nan"} {
		assert.False(t, stamp(text).Known(), text)
	}
	c := cell("1e999")
	assert.False(t, StampOf(&c).Known())
}

func TestStampText(t *testing.T) {
	for text, want := range map[string]string{
		"1772323200000000001": "1772323200000000001", "1772323200.000000001": "1772323200.000000001", "0.50": "0.5", "-0.05": "-0.05",
		"12": "12", "12.000": "12", "1.5e3": "1500", "1.403715529112143517e+09": "1403715529.112143517", "1e-30": "0.000000000000000000000000000001", "0": "0", "": "",
	} {
		assert.Equal(t, want, stamp(text).String(), text)
	}
}

// After undoes Since: a row's stamp can be printed again from the time that a fold keeps.
func TestAfterUndoesSince(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		decimals := rapid.IntRange(0, 9).Draw(t, "decimals")
		draw := func(name string) string {
			s := strconv.FormatInt(rapid.Int64Range(0, 2e9).Draw(t, name), 10)
			if decimals > 0 {
				s += "." + rapid.StringOfN(rapid.RuneFrom([]rune("0123456789")), decimals, decimals, -1).Draw(t, name)
			}
			return s
		}
		start := stamp(draw("start"))
		offset := rapid.Int64Range(-1e6, 1e6).Draw(t, "steps") // of the last digit
		later := Stamp{Mantissa: start.Mantissa + offset, Exponent: start.Exponent, Exact: true, known: true}
		require.Equal(t, later.String(), start.After(later.Since(start)).String())
	})
	assert.Equal(t, "1403715524912143104", stamp("1403715524907143168").After(4999936).String())
	assert.Equal(t, "12.625", stamp("12.5").After(0.125).String(), "a first stamp with zeros dropped")
	assert.Equal(t, "", stamp("12").After(math.NaN()).String())
}

func TestStampInTwoColumns(t *testing.T) {
	l := &Layout{Time: 0, Fine: 1, Per: 1e9}
	a, b := l.stamp(cells("1772323200", "999999999")), l.stamp(cells("1772323201", "1"))
	assert.Equal(t, 2e-9, b.Since(a))
	assert.Equal(t, "1772323201.000000001", b.String())
	assert.False(t, l.stamp(cells("", "1")).Known())
	assert.False(t, l.stamp(cells("1", "")).Known())
	assert.Equal(t, 12.5, l.stamp(cells("12.0", "500000000")).Value)
}

func TestClock(t *testing.T) {
	l := layout()
	f := New(l)
	for i, text := range []string{"10", "", "10.5", "10.5", "10.25", "12", "nan"} {
		c := make([]Cell, 17)
		c[0] = cell(text)
		f.Row(int64(i+1), c)
	}
	k := f.Clock
	assert.EqualValues(t, 5, k.Count)
	assert.EqualValues(t, 2, k.Missing.Count)
	assert.EqualValues(t, 2, k.Missing.First.Row)
	assert.EqualValues(t, 1, k.Repeated.Count)
	assert.EqualValues(t, 4, k.Repeated.At[0].Row)
	assert.EqualValues(t, 1, k.Reversed.Count)
	assert.EqualValues(t, 5, k.Reversed.At[0].Row)
	assert.Equal(t, 0.5, k.Steps.Min.Value)
	assert.Equal(t, 1.75, k.Steps.Max.Value)
	assert.EqualValues(t, 6, k.Steps.Max.Row)
	assert.Equal(t, "10", k.First.String())
	assert.Equal(t, "12", k.Last.String())
}
