package claims

import (
	"strings"

	"dextral/core/frame"
)

// SpeaksOfAxes reports whether the directions of axes may stand under the name
// in words: axes, frame_convention.
func (n *Name) SpeaksOfAxes() bool {
	return n.Not == "" && !n.any(mapping) && (n.any(axes) || n.any(frameWord) || n.has(axis) && !n.any(physical|unit|rotation)) || n.Stem == "convention"
}

// SpeaksOfAxisMap reports whether a map between axes may stand under the name:
// axis_map and the like, or, if signed, axes and orientation. Three letters
// without a sign under these are more often a list of names.
func (n *Name) SpeaksOfAxisMap(signed bool) bool {
	return n.Not == "" && (n.any(mapping) || signed && n.any(orientation|mounting|axis|axes))
}

// AxisWords reads directions of three axes in words, such as FLU, NED, "forward,
// left, up" and "x forward, y left, z up". Single words that are also ordinary
// words of configuration are left to SpeaksOfAxes.
func AxisWords(text string) (frame.Triad, bool) {
	t, err := frame.ParseTriad(text)
	return t, err == nil && t.Valid()
}

// AxisMap reads three signed axes, such as +y, +x, -z: row i of the matrix has
// the axis of word i. Every axis must come once. It also reports whether there is
// a sign among them.
func AxisMap(words []string) (m [3][3]float64, signed, ok bool) {
	if len(words) != 3 {
		return m, false, false
	}
	var seen [3]bool
	for row, w := range words {
		w = strings.ToLower(strings.TrimSpace(w))
		sign := 1.0
		if rest, minus := strings.CutPrefix(w, "-"); minus {
			sign, signed, w = -1, true, rest
		} else if rest, plus := strings.CutPrefix(w, "+"); plus {
			signed, w = true, rest
		}
		column := strings.Index("xyz", w)
		if len(w) != 1 || column < 0 || seen[column] {
			return m, false, false
		}
		seen[column] = true
		m[row][column] = sign
	}
	return m, signed, true
}
