package rules

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
)

// Half a unit of the last digit, carried through a product; 0 for what is exact.
func TestHalfOfExpression(t *testing.T) {
	for _, c := range []struct {
		text        string
		value, want float64
	}{
		{"M_PI/2", math.Pi / 2, 0}, {"30.0*M_PI/180.0", math.Pi / 6, 0}, {"sqrt(0.5)", math.Sqrt2 / 2, 0}, {"-1.57/2", -0.785, 0.0025},
		{"np.deg2rad(30.5)", 30.5 * math.Pi / 180, 0.05 * math.Pi / 180}, {"${pi - 0.25}", math.Pi - 0.25, 0},
		{"10.5 + 0.01", 10.51, 10.51 * 0.005 / 0.01},
	} {
		assert.InDelta(t, c.want, halfOfExpression(Number{Text: c.text, Value: c.value}), 1e-12, c.text)
	}
	exact := precisionOf([]Number{{Text: "M_PI/2", Value: math.Pi / 2}})
	coarse := precisionOf([]Number{{Text: "1.5/2", Value: 0.75}})
	assert.Zero(t, exact.Half)
	assert.InDelta(t, 0.025, coarse.Half, 1e-12)
}
