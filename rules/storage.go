package rules

import (
	"strings"

	"dextral/core/convention"
	"dextral/core/matrix"
	"dextral/core/rotor"
)

// storedByRows judges a flat 4x4 rigid transform that is said to be stored
// column by column. Its last row, 0 0 0 1, tells the order by itself: filled the
// wrong way it stands in the last column, the translation stands in the last
// row, and the rotation comes out transposed, which no check of the 3x3 can see.
//
// The opposite case is left alone: numbers that are said to be stored row by row
// and have the translation last are how matrices for row vectors are written.
// Where the translation is zero the numbers cannot tell, and nothing is said.
func storedByRows(v *Value) *Finding {
	claim, ok := v.Claims.On(convention.OfStorage)
	if !ok || claim.Says != convention.ColumnMajor || v.Rows != 4 || v.Cols != 4 || len(v.Numbers) != 16 {
		return nil
	}
	var row, column [4]float64 // the last of each, as stated
	var texts []string
	for i := range 4 {
		row[i], column[i] = v.Numbers[v.entry(3, i)].Value, v.Numbers[v.entry(i, 3)].Value
		texts = append(texts, v.Numbers[v.entry(3, i)].Text)
	}
	last := [4]float64{0, 0, 0, 1}
	if row == last || column != last {
		return nil
	}
	f := finding(StorageTransposed, v, claim, "%s is stated to be stored column by column, but its last row is 0 0 0 1 only if it is stored row by row", v.name())
	f.Evidence = []Evidence{{What: "last row as stated", Stated: Words("0 0 0 1"), Computed: Words(strings.Join(texts, " "))}}
	f.Remedy = "state the other storage order, or write the numbers the other way"
	if m, ok := v.rotationPart(); ok {
		if near, _, ok := matrix.Nearest(m); ok {
			off := rotor.Angle(near.Rotor(), near.Transpose().Rotor())
			f.Message += "; read as stated its translation is lost and its rotation reversed, which is off by " + degrees(off)
			f.Evidence = append(f.Evidence, Evidence{What: "rotation as stated, against the one stored", Stated: Degrees(0), Computed: Degrees(off), Residual: Degrees(off)})
		}
	}
	return f
}
