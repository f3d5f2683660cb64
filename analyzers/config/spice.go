package config

import (
	"slices"
	"strings"

	"dextral/analyzers/config/tree"
	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/rules"
)

// spice reads the fixed-offset frames of SPICE text kernels (NAIF, Frames Required
// Reading, chapter TK Frames). M of the text takes coordinates of the frame that is
// defined to those of the relative one, v_relative = M v_frame. It is given as a
// matrix, column by column; as a unit quaternion, scalar first, whose active matrix it
// is (Rotation Required Reading, SPICE quaternions); or by angles, M = [a1] [a2] [a3],
// where the text's [a] turns the axes, so that it is the transpose of the active
// matrix. So the angles, turned one after the other about fixed axes, make the transpose
// of M: v_frame = R v_relative.
func spice(w *walker, s *spot) {
	if s.in != nil {
		return
	}
	for i := range s.node.Entries {
		e := &s.node.Entries[i]
		rest, ok := strings.CutPrefix(e.Key, "TKFRAME_")
		at := strings.LastIndexByte(rest, '_')
		if !ok || at < 0 {
			continue
		}
		k := tkFrame{w: w, root: s, at: s.entry(e), id: rest[:at]}
		switch rest[at+1:] {
		case "MATRIX":
			k.keep("MATRIX", 9, fixed{title: "SPICE, TK frame: matrix, column by column", form: convention.Rotation, terms: append(k.direction(), convention.ColumnMajor)})
		case "Q":
			k.keep("QUATERNION", 4, fixed{title: "SPICE, TK frame: unit quaternion, scalar first", form: convention.Quaternion, terms: append(k.direction(), convention.ScalarFirst)})
		case "ANGLES":
			k.keep("ANGLES", 3, k.angles())
		}
	}
}

// tkFrame is the definition of one frame.
type tkFrame struct {
	w        *walker
	root, at *spot
	id       string // the code or the name of the frame
}

// says is the text of a variable of the definition.
func (k tkFrame) says(prefix, name string) string {
	n := k.root.node.Get(prefix + k.id + name)
	if n == nil || n.Kind != tree.Scalar {
		return ""
	}
	return strings.TrimSpace(n.Text)
}

// direction is v_relative = R v_frame.
func (k tkFrame) direction() []convention.Term {
	d := convention.Direction{To: k.says("TKFRAME_", "_RELATIVE"), From: k.id}
	if name := k.says("FRAME_", "_NAME"); name != "" {
		d.From = name
	}
	if !d.Stated() {
		return nil
	}
	return []convention.Term{d}
}

// spiceUnits are the units of angles that are read; the toolkit knows some more.
var spiceUnits = map[string]convention.Unit{"DEGREES": convention.Degree, "RADIANS": convention.Radian}

func (k tkFrame) angles() fixed {
	f := fixed{title: "SPICE, TK frame: M = [a1] [a2] [a3], each of which turns the axes", form: convention.Angles}
	for _, t := range k.direction() {
		f.terms = append(f.terms, t.(convention.Direction).Reverse())
	}
	unit, known := spiceUnits[strings.ToUpper(k.says("TKFRAME_", "_UNITS"))]
	if !known {
		f.why = "angles in the unit " + k.says("TKFRAME_", "_UNITS") + " are not read"
	}
	axes := k.w.doc.Numbers(k.root.node.Get("TKFRAME_"+k.id+"_AXES"), 3)
	text := "extrinsic "
	for _, a := range axes {
		text += a.Text
	}
	l, err := angle.ParseLabel(text, [3]angle.Role{angle.RoleFirst, angle.RoleSecond, angle.RoleThird})
	if err != nil || len(axes) != 3 {
		f.why = "TKFRAME_" + k.id + "_AXES names no sequence of three axes, none twice in a row"
		return f
	}
	if f.terms = append(f.terms, l); known {
		f.terms = append(f.terms, unit)
	}
	return f
}

// keep keeps the numbers of a definition. The toolkit uses those that SPEC names and
// nothing else.
func (k tkFrame) keep(spec string, count int, f fixed) {
	x := k.w.doc.Numbers(k.at.node, count)
	if len(x) != count {
		return
	}
	if used := k.says("TKFRAME_", "_SPEC"); used != "" && !strings.EqualFold(used, spec) {
		f.why = "TKFRAME_" + k.id + "_SPEC is " + used + ", so that this is not used"
	}
	v := &rules.Value{Numbers: slices.Clone(x)}
	switch f.form {
	case convention.Rotation:
		v.Rows, v.Cols = 3, 3
	case convention.Angles:
		v.Roles = [3]angle.Role{angle.RoleFirst, angle.RoleSecond, angle.RoleThird}
	}
	k.w.keep(k.at, f, v)
}
