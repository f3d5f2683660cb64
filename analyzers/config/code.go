package config

import (
	"bytes"
	"math"
	"slices"
	"strings"

	"dextral/analyzers/claims"
	"dextral/analyzers/config/sourcedoc"
	"dextral/analyzers/config/tree"
	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/rules"
)

// Sources hold numbers of every kind, so that they are read more strictly than
// configuration. Names of scopes say nothing about what stands in them; numbers
// under a customary short name must look like what the name suggests; and where
// whole numbers do not fit, they are taken for an example. Zeros initialise.

// made is what a library, by its documentation, does with numbers that are
// handed to it.
type made struct {
	form   convention.Form // NoForm: whatever the name says
	shape  claims.Shape
	terms  []convention.Term
	roles  [3]angle.Role
	title  string
	scales bool // it normalises
}

// constructors are libraries' calls, by the last part of their names and, where
// that part is used by several, the part before. The orders of Eigen, tf2,
// Bullet, assimp and KDL were measured with these libraries, see
// fixtures/reference; the others are from memory of their documentation.
var constructors = map[string]made{
	"Quaterniond":          quaternionOf("Eigen and Gazebo: Quaternion(w, x, y, z)", convention.ScalarFirst),
	"Quaternionf":          quaternionOf("Eigen and Gazebo: Quaternion(w, x, y, z)", convention.ScalarFirst),
	"Eigen::Quaternion":    quaternionOf("Eigen: Quaternion(w, x, y, z)", convention.ScalarFirst),
	"tf2::Quaternion":      quaternionOf("tf2: Quaternion(x, y, z, w)", convention.ScalarLast),
	"tf::Quaternion":       quaternionOf("tf: Quaternion(x, y, z, w)", convention.ScalarLast),
	"btQuaternion":         quaternionOf("Bullet: btQuaternion(x, y, z, w)", convention.ScalarLast),
	"aiQuaternion":         quaternionOf("assimp: aiQuaternion(w, x, y, z)", convention.ScalarFirst),
	"aiQuaterniont":        quaternionOf("assimp: aiQuaterniont(w, x, y, z)", convention.ScalarFirst),
	"Rotation::Quaternion": quaternionOf("KDL: Rotation::Quaternion(x, y, z, w)", convention.ScalarLast),
	"Rot3::Quaternion":     quaternionOf("GTSAM: Rot3::Quaternion(w, x, y, z)", convention.ScalarFirst),
	"matrix::Quatf":        quaternionOf("PX4: Quatf(w, x, y, z)", convention.ScalarFirst),
	"cv::Quatd":            quaternionOf("OpenCV: Quatd(w, x, y, z)", convention.ScalarFirst),
	"cv::Quatf":            quaternionOf("OpenCV: Quatf(w, x, y, z)", convention.ScalarFirst),
	"np.quaternion":        quaternionOf("numpy-quaternion: quaternion(w, x, y, z)", convention.ScalarFirst),
	"Rotation::RPY": {form: convention.Angles, shape: claims.Three, roles: rollPitchYaw, title: "KDL: Rotation::RPY(roll, pitch, yaw)",
		terms: []convention.Term{convention.Radian, label("fixed x-y-z", rollPitchYaw)}},

	"Matrix3d": storedBy(convention.RowMajor, "Eigen: commas fill row by row"), "Matrix3f": storedBy(convention.RowMajor, "Eigen: commas fill row by row"),
	"Matrix4d": storedBy(convention.RowMajor, "Eigen: commas fill row by row"), "Matrix4f": storedBy(convention.RowMajor, "Eigen: commas fill row by row"),
	"Mat_": storedBy(convention.RowMajor, "OpenCV: Mat_ is row by row"), "Matx33d": storedBy(convention.RowMajor, "OpenCV: Matx is row by row"),
	"Matx33f": storedBy(convention.RowMajor, "OpenCV: Matx is row by row"), "Matx44d": storedBy(convention.RowMajor, "OpenCV: Matx is row by row"),
	"tf2::Matrix3x3": storedBy(convention.RowMajor, "tf2: Matrix3x3(xx, xy, xz, ...)"), "btMatrix3x3": storedBy(convention.RowMajor, "Bullet: btMatrix3x3(xx, xy, xz, ...)"),
	"deg2rad": {title: "deg2rad takes degrees", terms: []convention.Term{convention.Degree}}, "radians": {title: "radians takes degrees", terms: []convention.Term{convention.Degree}},
	"glm::mat3": storedBy(convention.ColumnMajor, "GLM: mat3 is column by column"), "glm::mat4": storedBy(convention.ColumnMajor, "GLM: mat4 is column by column"),
}

func quaternionOf(title string, place convention.ScalarPlace) made {
	return made{form: convention.Quaternion, shape: claims.Four, title: title, terms: []convention.Term{place}}
}

func storedBy(order convention.Storage, title string) made {
	return made{title: title, terms: []convention.Term{order}}
}

// maker is what is known of the call or type that made the numbers of a spot.
func (w *walker) maker(s *spot) (made, bool) {
	words := strings.Fields(s.node.Tag)
	if !w.code || len(words) == 0 {
		return made{}, false
	}
	parts := strings.FieldsFunc(words[0], func(r rune) bool { return r == ':' || r == '.' })
	last := parts[len(parts)-1]
	if len(parts) > 1 {
		for _, between := range []string{"::", "."} {
			if m, ok := constructors[parts[len(parts)-2]+between+last]; ok {
				return m, true
			}
		}
	}
	if m, ok := constructors[last]; ok {
		return m, true
	}
	if last == "quaternion" && strings.HasSuffix(strings.ToLower(w.doc.File.Path), ".m") {
		return quaternionOf("MATLAB: quaternion(w, x, y, z)", convention.ScalarFirst), true
	}
	if strings.HasPrefix(last, "from_") && bytes.Contains(w.doc.File.Text, []byte("scipy")) {
		return scipy(last, words[1:])
	}
	return made{}, false
}

// scipy is what SciPy's Rotation does: scalar last, capital letters for moving
// axes, radians unless degrees=True.
func scipy(call string, words []string) (made, bool) {
	says := func(w string) bool { return slices.Contains(words, w) }
	unit := convention.Radian
	if says("degrees=True") {
		unit = convention.Degree
	}
	for _, w := range words {
		if flag, value, ok := strings.Cut(w, "="); ok && value != "True" && value != "False" {
			return made{title: flag}, false // computed
		}
	}
	switch call {
	case "from_quat":
		m := quaternionOf("SciPy: from_quat([x, y, z, w])", convention.ScalarLast)
		if says("scalar_first=True") {
			m = quaternionOf("SciPy: from_quat(..., scalar_first=True)", convention.ScalarFirst)
		}
		m.scales = true
		return m, true
	case "from_matrix", "from_dcm":
		return made{form: convention.Rotation, shape: claims.Nine, title: "SciPy: " + call, scales: true}, true
	case "from_rotvec":
		return made{form: convention.RotationVector, shape: claims.Three, title: "SciPy: from_rotvec", terms: []convention.Term{unit}}, true
	case "from_euler":
		m := made{form: convention.Angles, shape: claims.Three, title: "SciPy: from_euler, capitals for moving axes", terms: []convention.Term{unit}}
		m.roles = [3]angle.Role{angle.RoleFirst, angle.RoleSecond, angle.RoleThird}
		if len(words) == 0 {
			return made{}, false
		}
		kind := "extrinsic "
		if words[0] == strings.ToUpper(words[0]) {
			kind = "intrinsic "
		}
		l, err := angle.ParseLabel(kind+words[0], m.roles)
		m.terms = append(m.terms, l)
		return m, err == nil
	}
	return made{}, false
}

// madeOf reads numbers by the call or type that made them.
func (w *walker) madeOf(s *spot, shape claims.Shape) (reading, bool) {
	if m, ok := w.maker(s); ok && m.form != convention.NoForm && m.shape == shape {
		r := reading{Meaning: claims.Meaning{Form: m.form, Source: rules.Format}, terms: m.terms, title: m.title}
		return r, true
	}
	return reading{}, false
}

// typed adds to the reading of a name what the type says: how it is stored; or,
// where the name says nothing, the word for a form in it.
func (w *walker) typed(s *spot, shape claims.Shape, m reading) reading {
	if !w.code || s.node.Tag == "" {
		return m
	}
	flat := s.node.Kind == tree.List && s.node.Items[0].Kind == tree.Scalar
	if known, ok := w.maker(s); ok && known.form == convention.NoForm && flat && (m.Form == convention.Rotation || m.Form == convention.Transform) {
		m.terms, m.title = known.terms, known.title
	} else if ok && known.form == convention.NoForm && m.Form == convention.Angles && wants(m.Form, known.terms[0].Subject()) {
		m.terms, m.title = known.terms, known.title
	}
	if m.Form == convention.NoForm {
		if by := w.typeName(s.node.Tag).Form(shape); by.Why == "" && by.Source == rules.Label {
			m.Meaning = by
		}
	}
	return m
}

// typeName is the last part of the name of a call or type.
func (w *walker) typeName(tag string) *claims.Name {
	callee, _, _ := strings.Cut(tag, " ")
	return w.name("", callee[strings.LastIndexAny(callee, ".:")+1:])
}

// initial reports whether a value of a source is not worth keeping: zeros, and
// numbers of which nothing is claimed.
func initial(v *rules.Value) bool {
	for _, n := range v.Numbers {
		if n.Value != 0 {
			return v.Form == convention.NoForm || v.Form == convention.Matrix
		}
	}
	return true
}

// doubtCode says why numbers in a source may be something else than their name,
// or the library that they are given to, suggests.
func (w *walker) doubtCode(s *spot, v *rules.Value) string {
	if m, ok := w.maker(s); ok && m.scales && !fits(v, 0.01) {
		return m.title + " normalises what it is given"
	}
	if fits(v, 0.01) {
		return ""
	}
	claim, _ := v.FormClaim()
	switch {
	case whole(v):
		return "they are whole numbers that do not fit: an example, or a pattern"
	case claim.Source.Stated():
	case v.Form == convention.Transform && v.Rows == 4 && !lastIsUnit(v.Floats()):
		return "neither its last row nor its last column is 0 0 0 1, and the name alone does not say that it is a rigid transform"
	case v.Form == convention.Axis:
		return "an axis in a program may be scaled further down"
	case !fits(v, 0.5):
		return "the numbers are far from what the name suggests, which alone does not say it"
	}
	return ""
}

// whole reports whether all numbers are whole.
func whole(v *rules.Value) bool {
	return !slices.ContainsFunc(v.Numbers, func(n rules.Number) bool { return n.Value != math.Trunc(n.Value) })
}

// fits reports whether lengths that ought to be one are, within a margin: of a
// quaternion, of an axis, of the rows of a rotation, which must also be square to
// each other.
func fits(v *rules.Value, margin float64) bool {
	x := v.Floats()
	near := func(x ...float64) bool {
		n := 0.0
		for _, a := range x {
			n = math.Hypot(n, a)
		}
		return math.Abs(n-1) <= margin
	}
	switch v.Form {
	case convention.Quaternion, convention.Axis:
		return near(x...)
	case convention.AxisAngle:
		return near(x[:3]...)
	case convention.Rotation, convention.Transform:
		stride := v.Cols
		if stride < 3 || v.Rows < 3 {
			return true
		}
		a, b, c := x[:3], x[stride:stride+3], x[2*stride:2*stride+3]
		dot := func(a, b []float64) float64 { return math.Abs(a[0]*b[0] + a[1]*b[1] + a[2]*b[2]) }
		return near(a...) && near(b...) && near(c...) && dot(a, b) <= margin && dot(b, c) <= margin && dot(a, c) <= margin
	}
	return true
}

// apart reports whether a value of a source may state another orientation than
// its neighbours although their names have the same stem: nothing of a name is left
// but the symbol, as of R and q in one function.
func (w *walker) apart(s *spot) bool {
	h := s.holder()
	return w.code && h != nil && h.node.Tag == sourcedoc.Scope && w.nameOf(s).Stem == ""
}

// nameOfScope is what the name of a scope says: that nothing in it is an
// orientation, or nothing.
func (w *walker) nameOfScope(key string) *claims.Name {
	n := w.name("", key)
	return &claims.Name{Deep: n.Deep}
}
