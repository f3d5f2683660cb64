package rules

import (
	"fmt"
	"math"
	"strings"

	"dextral/core/convention"
)

// bottomRow judges the last row of a 4x4 that claims to be a rigid transform: 0 0
// 0 1. Numbers that have it in the last column instead are matrices for row vectors,
// or are stored the other way, and claim nothing wrong; see storedByRows.
func bottomRow(v *Value) *Finding {
	claim, claimed := v.FormClaim()
	if !claimed || v.Rows != 4 || v.Cols != 4 || len(v.Numbers) != 16 {
		return nil
	}
	var row, column [4]float64
	var texts []string
	slack := 0.0
	for i := range 4 {
		n := v.Numbers[v.entry(3, i)]
		row[i], column[i] = n.Value, v.Numbers[v.entry(i, 3)].Value
		texts = append(texts, n.Text)
		slack = math.Max(slack, precisionOf([]Number{n}).Half)
	}
	slack += 8 * 0x1p-24 // what float32 makes of a one, see package tolerance
	if isLast(row, slack) || isLast(column, slack) {
		return nil
	}
	f := finding(BottomRowWrong, v, claim, "%s claims a rigid transform, but its last row is %s instead of 0 0 0 1", v.name(), strings.Join(texts, " "))
	f.Evidence = []Evidence{{What: "last row", Stated: Words("0 0 0 1"), Computed: Words(strings.Join(texts, " "))}}
	switch w := row[3]; {
	case row[0] == 0 && row[1] == 0 && row[2] == 0 && w != 0:
		f.Message += fmt.Sprintf(": every point is divided by %s", digits(w))
		f.Remedy = "divide all sixteen numbers by the last one, if it is a projective matrix; else correct it to 1"
	case w == 0:
		f.Message += ": its translation is lost, and it has no inverse"
		f.Remedy = "write 1 as the last number, if the rest is right"
	default:
		f.Message += ": points are scaled by where they are, as a projection does"
		f.Remedy = "look for numbers that slipped by one place, or by one row"
	}
	return f
}

func isLast(row [4]float64, slack float64) bool {
	return math.Abs(row[0]) <= slack && math.Abs(row[1]) <= slack && math.Abs(row[2]) <= slack && math.Abs(row[3]-1) <= slack
}

// quantum is the scale of a quaternion that is written in whole numbers, as
// recorders and firmware do to save room: 32767 for 16 bits with sign, and so on; 0 for
// any other. Its numbers stand for q/scale, each rounded to a whole one, which moves
// the norm by at most one.
func (v *Value) quantum() float64 {
	if v.Form != convention.Quaternion || len(v.Numbers) != 4 {
		return 0
	}
	for _, n := range v.Numbers {
		if n.Value != math.Trunc(n.Value) || strings.ContainsAny(n.Text, ".eE") {
			return 0
		}
	}
	length := norm(v.Floats())
	for _, scale := range scales {
		if math.Abs(length-scale) <= 1 {
			return scale
		}
	}
	return 0
}

// scales are those in use: the largest numbers of 8, 16 and 32 bits with sign and
// powers of two below, and powers of ten; common practice, no source.
var scales = []float64{127, 128, 1000, 10000, 16384, 32767, 32768, 100000, 1e6, 1e7, 1e8, 1e9, 1 << 30, 1<<31 - 1, 1 << 31}
