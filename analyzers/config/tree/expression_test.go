package tree

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
)

func TestExpression(t *testing.T) {
	names := map[string]float64{"tilt": 0.25}
	for text, want := range map[string]float64{
		"1": 1, "-2.5": -2.5, "M_PI/2": math.Pi / 2, "-math.pi / 4": -math.Pi / 4, "np.pi": math.Pi, "np.deg2rad(30)": math.Pi / 6,
		"radians(-90.0)": -math.Pi / 2, "30.0f*M_PI/180.0f": math.Pi / 6, "2*(1.5 - 0.5)": 2, "1.0/4": 0.25, "sqrt(0.5)": math.Sqrt(0.5),
		"math.sqrt(2)/2": math.Sqrt2 / 2, "tilt + pi": 0.25 + math.Pi, "10 * DEG2RAD": math.Pi / 18, "1.f": 1, "pi/180*30": math.Pi / 6,
	} {
		got, ok := Expression(text, names)
		assert.True(t, ok, text)
		assert.InDelta(t, want, got, 4e-16, text)
	}
	for _, text := range []string{"", "x", "1/2", "1 +", "f(1)", "sin(1)", "1 << 2", "0x10", "1.0/0", "sqrt(-1.0)", "a.b", "\"1\"", "pi(2)", "1, 2", "radians(1, 2)", "[1]"} {
		_, ok := Expression(text, names)
		assert.False(t, ok, text)
	}
}
