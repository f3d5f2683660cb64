package fold

import (
	"math"
	"math/rand/v2"
	"strconv"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/rotor"
)

// turning is a series of unit quaternions; what reads it prints it.
func turning(rows int, text func(float64) string) Digits {
	var d Digits
	rng := rand.New(rand.NewPCG(5, 6))
	part := []int{0, 1, 2, 3}
	for range rows {
		r, _ := rotor.Rotor{S: rng.NormFloat64(), E23: rng.NormFloat64(), E31: rng.NormFloat64(), E12: rng.NormFloat64()}.Unit()
		w, x, y, z := r.Quaternion()
		d.push(part, cells(text(w), text(x), text(y), text(z)))
	}
	return d
}

func fixed(decimals, bits int) func(float64) string {
	return func(x float64) string {
		if bits == 32 {
			x = float64(float32(x))
		}
		return strconv.FormatFloat(x, 'f', decimals, 64)
	}
}

// shortestOf prints x, rounded to so many decimals, as short as it will go.
func shortestOf(decimals, bits int) func(float64) string {
	return func(x float64) string {
		if decimals > 0 {
			x = math.Round(x*math.Pow10(decimals)) / math.Pow10(decimals)
		}
		return strconv.FormatFloat(x, 'g', -1, bits)
	}
}

func TestDigits(t *testing.T) {
	quantised := func(scale float64, format func(float64) string) func(float64) string {
		return func(x float64) string { return format(math.Round(x*scale) / scale) }
	}
	exact := func(bits int) func(float64) string { // all digits of a float64, as numpy.savetxt prints
		return func(x float64) string {
			x = math.Round(x*1e5) / 1e5
			if bits == 32 {
				x = float64(float32(x))
			}
			return strconv.FormatFloat(x, 'e', 18, 64)
		}
	}
	for _, c := range []struct {
		name   string
		text   func(float64) string
		half   float64
		single bool
		scale  float64
	}{
		{"six decimals", fixed(6, 64), 0.5e-6, false, 0},
		{"six decimals, zeros dropped", shortestOf(6, 64), 0.5e-6, false, 0},
		{"three decimals", fixed(3, 64), 0.5e-3, false, 0},
		{"one decimal", fixed(1, 64), 0.5e-1, false, 0},
		{"three digits behind the first", func(x float64) string { return strconv.FormatFloat(x, 'e', 3, 64) }, 0.5e-4, false, 0},
		{"four digits, zeros dropped", func(x float64) string { return strconv.FormatFloat(x, 'g', 4, 64) }, 0.5e-4, false, 0},
		{"fifteen digits of float32", func(x float64) string { return strconv.FormatFloat(float64(float32(x)), 'g', 15, 64) }, 0.5e-15, true, 0},
		{"nine decimals of float64", fixed(9, 64), 0.5e-9, false, 0},
		{"nine decimals of float32", fixed(9, 32), 0.5e-9, true, 0},
		{"seventeen digits of five decimals", exact(64), 0.5e-5, false, 0},
		{"seventeen digits of five decimals in float32", exact(32), 0.5e-5, true, 0},
		{"16-bit words", quantised(32767, shortestOf(0, 64)), 0.5 / 32767, false, 32767},
		{"16-bit words in float32", quantised(32767, shortestOf(0, 32)), 0.5 / 32767, true, 32767},
		{"16-bit words, seven decimals", quantised(32767, fixed(7, 64)), 0.5 / 32767, false, 32767},
		{"Q14", quantised(16384, shortestOf(0, 64)), 0.5 / 16384, true, 16384}, // dyadic: exact in float32
		{"bytes", quantised(127, fixed(6, 64)), 0.5 / 127, false, 127},
	} {
		d := turning(5000, c.text)
		assert.InEpsilon(t, c.half, d.Half(), 1e-12, c.name)
		assert.Equal(t, c.single, d.Single(), c.name)
		assert.Equal(t, c.scale, d.Scale(), c.name)
		assert.False(t, d.Integers(), c.name)
	}
}

// All digits of a binary number: half a unit is below what the binary format
// rounds, so only that it is small matters.
func TestFullPrecision(t *testing.T) {
	d := turning(5000, shortestOf(0, 64))
	assert.LessOrEqual(t, d.Half(), 0.5e-15)
	assert.False(t, d.Single())
	d = turning(5000, shortestOf(0, 32))
	assert.LessOrEqual(t, d.Half(), 0.5e-7)
	assert.True(t, d.Single())
}

// One part in fifty with fewer digits makes the log that coarse; even rows,
// which are exact, do not.
func TestCoarserRows(t *testing.T) {
	coarse := turning(100, fixed(3, 64))
	log := turning(4900, fixed(6, 64))
	log.merge(&coarse)
	assert.Equal(t, 0.5e-3, log.Half())

	log = turning(5000, fixed(6, 64))
	log.push([]int{0, 1, 2, 3}, cells("0.5", "0.5", "0.5", "0.5"))
	for range 1000 {
		log.push([]int{0, 1, 2, 3}, cells("1", "0", "0.0", "-0"))
	}
	assert.Equal(t, 0.5e-6, log.Half())
}

func TestWholeNumbers(t *testing.T) {
	var d Digits
	assert.Zero(t, d.Half(), "no numbers")
	for range 100 {
		d.push([]int{0, 1, 2}, cells("1", "0", "-1"))
	}
	assert.Zero(t, d.Half(), "exact")
	assert.False(t, d.Integers())
	d.push([]int{0, 1, 2}, cells("90", "0", "-1"))
	assert.Equal(t, 0.5, d.Half())
	assert.True(t, d.Integers())
	d.push([]int{0, 1, 2}, cells("nan", "", "1e300"))
	assert.Equal(t, 0.5, d.Half())
}

func TestBinary(t *testing.T) {
	for bits, single := range map[int]bool{32: true, 64: false} {
		var d Digits
		rng := rand.New(rand.NewPCG(7, 8))
		for range 1000 {
			c := make([]Cell, 4)
			for i := range c {
				v := rng.Float64()
				if bits == 32 {
					v = float64(float32(v))
				}
				c[i].binary(v)
			}
			d.push([]int{0, 1, 2, 3}, c)
		}
		assert.LessOrEqual(t, d.Half(), 0.5e-6)
		assert.Equal(t, single, d.Single())
	}
}
