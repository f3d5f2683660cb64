package rules

import (
	"fmt"
	"math"
	"strings"

	"dextral/core/convention"
)

// scales of whole numbers that stand for parts of one are those in use: the largest
// numbers of 8, 16 and 32 bits with sign and powers of two below, and powers of ten;
// common practice, no source.
var scales = []float64{127, 128, 1000, 10000, 16384, 32767, 32768, 100000, 1e6, 1e7, 1e8, 1e9, 1 << 30, 1<<31 - 1, 1 << 31}

// quantum is the scale of a quaternion that is written in whole numbers, as
// recorders and firmware do to save room: 32767 for 16 bits with sign, and so on; 0 for
// any other. Its numbers stand for q/scale, each rounded to a whole one, which moves
// the norm by at most one.
func (v *Value) quantum() float64 {
	if scale, off := v.nearestScale(); off <= 1 {
		return scale
	}
	return 0
}

// nearestScale is the scale nearest to the norm of a quaternion in whole numbers, and
// how far the norm is from it; none, at infinity, for any other value.
func (v *Value) nearestScale() (scale, off float64) {
	off = math.Inf(1)
	if v.Form != convention.Quaternion || len(v.Numbers) != 4 {
		return 0, off
	}
	for _, n := range v.Numbers {
		if n.Value != math.Trunc(n.Value) || strings.ContainsAny(n.Text, ".eE") {
			return 0, off
		}
	}
	length := norm(v.Floats())
	for _, s := range scales {
		if d := math.Abs(length - s); d < off {
			scale, off = s, d
		}
	}
	return scale, off
}

// quantisedNorm reports a quaternion in whole numbers whose norm misses a scale by
// less than a fiftieth of it: more than rounding does, less than another meaning of
// the numbers would. It is nil for any other.
func quantisedNorm(v *Value, claim Claim) *Finding {
	scale, off := v.nearestScale()
	if off > scale/50 {
		return nil
	}
	n := norm(v.Floats()) / scale
	f := finding(RotorNotUnit, v, claim, "%s is a quaternion in whole numbers; as parts of %.0f its norm is %s, and rounding to whole numbers explains %s at most", v.name(), scale, digits(n), significant(1/scale))
	f.Evidence = []Evidence{
		{What: fmt.Sprintf("norm, as parts of %.0f", scale), Stated: Plain(1), Computed: Plain(n), Residual: Plain(n - 1)},
		{What: "deviation that rounding to whole numbers allows", Computed: Plain(1 / scale)},
	}
	f.Remedy = "look for a number with a slip of the pen, or for another scale; then divide by the scale and normalise"
	return f
}
