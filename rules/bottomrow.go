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
	if isLast(row, slack) {
		return nil
	}
	if isLast(column, slack) {
		return forRowVectors(v, row, texts)
	}
	f := finding(BottomRowWrong, v, claim, "%s claims a rigid transform, but its last row is %s instead of 0 0 0 1", v.name(), strings.Join(texts, " "))
	f.Evidence = []Evidence{{What: "last row", Stated: Words("0 0 0 1"), Computed: Words(strings.Join(texts, " "))}}
	switch w := row[3]; {
	case row[0] == 0 && row[1] == 0 && row[2] == 0 && w != 0:
		f.Message += fmt.Sprintf(": every point is divided by %s", digits(w))
		f.Remedy = "divide all sixteen numbers by the last one, if it is a projective matrix; else correct it to 1"
	case row == [4]float64{}:
		f.Message += ": its translation is lost, and it has no inverse"
		f.Remedy = "write 1 as the last number, if the rest is right"
	default:
		f.Message += ": points are scaled by where they are, as a projection does"
		f.Remedy = "look for numbers that slipped by one place, or by one row"
	}
	return f
}

// forRowVectors notes a rigid transform whose translation stands in the last row. A
// flat list without a stated storage may as well be filled column by column, and
// claims nothing.
func forRowVectors(v *Value, row [4]float64, texts []string) *Finding {
	if c, stated := v.Claims.On(convention.OfStorage); stated && c.Says == convention.ColumnMajor {
		return nil // see storedByRows
	} else if !stated && !v.Nested {
		return nil
	}
	return &Finding{
		Rule: BottomRowWrong, Level: Note, Place: v.Place, Key: v.Key,
		Message: fmt.Sprintf("%s has its translation in the last row: it is the transpose of a rigid transform (R, t) over 0 0 0 1, as matrices for row vectors are written; taken for one of column vectors, its rotation is reversed and its translation lost", v.name()),
		Evidence: []Evidence{{What: "last row", Stated: Words("0 0 0 1"), Computed: Words(strings.Join(texts, " "))},
			{What: "last column", Stated: Words("t over 1"), Computed: Words("0 0 0 1")}},
		Remedy: "transpose it, or say beside it that it multiplies row vectors",
	}
}

func isLast(row [4]float64, slack float64) bool {
	return math.Abs(row[0]) <= slack && math.Abs(row[1]) <= slack && math.Abs(row[2]) <= slack && math.Abs(row[3]-1) <= slack
}
