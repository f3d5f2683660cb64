package columns

import (
	"strings"

	"dextral/core/convention"
	"dextral/rules"
)

// matrixWords say that indices are those of a rotation matrix or a rigid
// transform.
var matrixWords = map[string]rules.Source{
	"dcm": rules.Label, "rotmat": rules.Label, "rotation": rules.Label, "rot": rules.Label,
	"r": rules.Name, "t": rules.Name, "tf": rules.Name, "pose": rules.Name,
}

// matrixComponent reads r00, dcm_01, R[0][2], rot_xz and the flat dcm[7].
func matrixComponent(n name) (component, bool) {
	for i := range n.words {
		w := n.words[i]
		for marker, by := range matrixWords {
			if id, ok := strings.CutPrefix(w.text, marker); ok && isPair(id) {
				return n.component(matrix, index(id), by, i, i, w.from+len(marker), w.to), true
			}
		}
		by, marked := matrixWords[w.text]
		if !marked {
			continue
		}
		rest := n.words[i+1:]
		if len(rest) > 0 && rest[0].text == "matrix" {
			by, i, rest = rules.Label, i+1, rest[1:]
		}
		switch {
		case len(rest) >= 2 && isPair(rest[0].text+rest[1].text):
			return n.component(matrix, index(rest[0].text+rest[1].text), by, i+1, i+2, rest[0].from, rest[1].to), true
		case len(rest) >= 1 && isPair(rest[0].text):
			return n.component(matrix, index(rest[0].text), by, i+1, i+1, rest[0].from, rest[0].to), true
		case len(rest) >= 1 && len(rest[0].text) == 1 && strings.Contains("0123456789", rest[0].text):
			return n.component(matrix, rest[0].text, by, i+1, i+1, rest[0].from, rest[0].to), true
		}
	}
	return component{}, false
}

func isPair(s string) bool {
	return len(s) == 2 && (strings.Trim(s, "01234") == "" || strings.Trim(s, "xyz") == "")
}

// index writes a pair of axes as indices from 0.
func index(pair string) string {
	return strings.NewReplacer("x", "0", "y", "1", "z", "2").Replace(pair)
}

// matrices reads a group as a 3x3, 3x4 or 4x4, indices from 0 or from 1, or as
// nine numbers in a row.
func (g *group) matrices(columns []Column) []Channel {
	for _, base := range []byte{'0', '1'} {
		for _, size := range [][2]int{{4, 4}, {3, 4}, {3, 3}} {
			var ids []string
			for i := range size[0] {
				for j := range size[1] {
					ids = append(ids, string([]byte{base + byte(i), base + byte(j)}))
				}
			}
			if parts, missing, unique := g.pick(ids...); len(missing) == 0 {
				return []Channel{g.matrix(columns, parts, size, unique)}
			}
		}
	}
	for _, digits := range []string{"012345678", "123456789"} {
		parts, missing, unique := g.pick(strings.Split(digits, "")...)
		if len(missing) == 0 && !g.has(strings.Trim("0123456789", digits)) {
			c := g.matrix(columns, parts, [2]int{3, 3}, unique)
			c.Doubtful = true // row by row is custom, and R0..R8 may be anything
			return []Channel{c}
		}
	}
	return nil
}

func (g *group) matrix(columns []Column, parts []component, size [2]int, unique bool) Channel {
	c := g.channel(columns, parts)
	v := &c.Value
	v.Form, v.Rows, v.Cols = convention.Rotation, size[0], size[1]
	if size[1] == 4 {
		v.Form = convention.Transform
	}
	by := parts[0].by
	c.Doubtful = by < rules.Label
	v.Claims = rules.Claims{said(v.Form, by, columns[parts[0].column])}
	for _, u := range g.units(parts) {
		if !unitless(u) && v.Form == convention.Rotation {
			v.Why = "its columns have the unit " + quoted([]string{u})[0] + "; the entries of a rotation have none"
		}
	}
	if !unique {
		v.Why = twice
	}
	return c
}
