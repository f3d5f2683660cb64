package literal

import (
	"regexp"
	"slices"
	"strings"

	"dextral/analyzers/claims"
	"dextral/core/convention"
	"dextral/rules"
)

// verdict is what the words about a literal make of numbers of its shape.
type verdict struct {
	form convention.Form
	from rules.Source
	text string // the words that say so
	at   span   // where they stand; empty for names of types
	why  string // why it is undecided
	weak bool   // what says so leaves room: types of an algebra, and "rotation" over four numbers, mean other things too
}

// speech is what is said about a literal: names, the nearest first, and
// comments.
type speech struct {
	labels  []label
	remarks []remark
	ordered bool // keys give each number its place: words about the order of components say nothing
}

// speech reads the names and comments of a site.
func (w *walker) speech(s site) speech {
	said := speech{labels: slices.Clone(s.labels), remarks: w.remarks(s)}
	for i := range said.labels {
		said.labels[i].name = w.nameOf(said.labels[i].text)
	}
	return said
}

// nameOf reads a name, once for each file.
func (w *walker) nameOf(text string) *claims.Name {
	if w.names[text] == nil {
		read := text
		if exportedQ.MatchString(text) {
			read = "q" + text[1:]
		}
		n := *claims.Read(read)
		n.Text = text
		w.names[text] = &n
	}
	return w.names[text]
}

// exportedQ is the customary q and qBodyCam where Go wants a capital.
var exportedQ = regexp.MustCompile(`^Q($|[A-Z][a-z])`)

func (l label) stated(f convention.Form) verdict {
	return verdict{form: f, from: rules.Label, text: l.text, at: l.at}
}

func (l label) inferred(f convention.Form) verdict {
	return verdict{form: f, from: rules.Name, text: l.text, at: l.at}
}

func (l label) undecided(f convention.Form, why string) verdict {
	return verdict{form: f, from: rules.Name, text: l.text, at: l.at, why: why}
}

// by takes over what the lexicon makes of a name.
func (l label) by(m claims.Meaning) verdict {
	return verdict{form: m.Form, from: m.Source, text: l.text, at: l.at, why: m.Why}
}

// plural reports a name for several: the numbers of a flat list under it are
// one number for each, such as angles of four rotations.
func (s speech) plural() bool {
	return len(s.labels) > 0 && s.labels[0].kind == ofValue && severals.MatchString(s.labels[0].text)
}

var severals = regexp.MustCompile(`(?i)(rotations|rots|orientations|attitudes|quats|quaternions|versors|matrices|dcms|poses|transforms|extrinsics|mounts)_?(deg|degs|degrees|rad|rads|radians)?$`)

// denied reports that a name or a comment says that this is something else: a
// rate, a covariance, a colour, no rotation.
func (s speech) denied() bool {
	for _, l := range s.labels {
		if l.kind != ofPackage && l.name.Not != "" || l.kind < ofType && isOther(l.name) {
			return true
		}
	}
	for _, r := range s.remarks {
		if r.comment.Not {
			return true
		}
	}
	return false
}

// remarked returns the form that a comment states. A type that is declared as
// a quaternion says no more than its name does: that its values are numbers of
// an algebra.
func (s speech) remarked(forms ...convention.Form) (verdict, bool) {
	for _, r := range s.remarks {
		for _, f := range forms {
			if r.comment.Form == f && !(r.onType && f == convention.Quaternion) {
				return verdict{form: f, from: rules.Comment, text: r.text(), at: r.at}, true
			}
		}
	}
	return verdict{}, false
}

// saysRotation reports a full word for a rotation or an orientation.
func saysRotation(n *claims.Name) bool {
	m := n.Form(claims.Nine)
	return m.Form == convention.Rotation && m.Source == rules.Label
}

func saysQuaternion(n *claims.Name) bool {
	m := n.Form(claims.Four)
	return m.Form == convention.Quaternion && m.Source == rules.Label
}

// typeLabel returns the first name of the type that satisfies a test. Rotor is
// a word for quaternions among types, and for wheels elsewhere.
func (s speech) typeLabel(test func(n *claims.Name) bool) (label, bool) {
	for _, l := range s.labels {
		if l.kind >= ofType && test(l.name) {
			return l, true
		}
	}
	return label{}, false
}

func isQuaternionType(n *claims.Name) bool {
	return saysQuaternion(n) || strings.EqualFold(n.Text, "rotor")
}

// ofFour reads four numbers. Named says that they are the fields of a struct
// that are called like the components of a quaternion: a plane and a colour may
// have such fields, so that either a name or the type must speak of a rotation.
func (s speech) ofFour(named bool) verdict {
	if s.denied() {
		return verdict{}
	}
	quaternionType, isQuaternion := s.typeLabel(isQuaternionType)
	for _, l := range s.labels {
		if l.kind >= ofType {
			continue
		}
		m := l.name.Form(claims.Four)
		switch {
		case m.Form != convention.Quaternion && named, m.Form == convention.NoForm:
			continue
		case isQuaternion && saysRotation(l.name):
			return l.stated(convention.Quaternion)
		}
		if m.Source < rules.Label {
			if v, ok := s.remarked(convention.Quaternion); ok {
				return v
			}
		}
		v := l.by(m)
		v.weak = m.Source < rules.Label && !named
		return v
	}
	if v, ok := s.remarked(convention.Quaternion, convention.AxisAngle); ok && (!named || v.form == convention.Quaternion) {
		return v
	}
	rotationType, isRotation := s.typeLabel(saysRotation)
	switch {
	case isQuaternion && isRotation: // attitude.Quaternion
		return quaternionType.stated(convention.Quaternion)
	case isQuaternion && s.hasMount():
		return quaternionType.stated(convention.Quaternion)
	case isQuaternion:
		v := quaternionType.inferred(convention.Quaternion)
		v.weak = true
		return v
	case isRotation && named:
		return rotationType.stated(convention.Quaternion)
	}
	return s.declaredQuaternion()
}

// declaredQuaternion is the verdict on a type that is called something else and
// whose declaration says that it is a quaternion.
func (s speech) declaredQuaternion() verdict {
	for _, r := range s.remarks {
		if r.onType && r.comment.Form == convention.Quaternion {
			return verdict{form: convention.Quaternion, from: rules.Name, text: r.text(), at: r.at, weak: true}
		}
	}
	return verdict{}
}

// hasMount reports a name of the value that speaks of how something is mounted.
func (s speech) hasMount() bool {
	return slices.ContainsFunc(s.labels, func(l label) bool { return l.kind < ofType && saysMount(l.name) })
}

// saysMount reports a name that speaks of how something is mounted: the
// lexicon takes a matrix of that name for a rotation.
func saysMount(n *claims.Name) bool {
	return claims.Read(n.Text+"Matrix").Form(claims.Nine).Form == convention.Rotation
}

// ofMatrix reads three by three numbers, or more where a rigid transform has
// them. Programs are full of matrices that are neither; a bare matrix and a
// transform that may scale are left alone.
func (s speech) ofMatrix(rows, cols int, numbers []rules.Number) verdict {
	if s.denied() {
		return verdict{}
	}
	shape, form := claims.Nine, convention.Rotation
	if rows*cols > 9 {
		shape, form = claims.Rigid, convention.Transform
	}
	if v, ok := s.remarked(convention.Rotation); ok {
		v.form = form
		return v
	}
	for _, l := range s.labels {
		m := l.name.Form(shape)
		switch {
		case m.Form != form:
			continue
		case m.Source < rules.Label && len(l.text) == 1:
			return l.undecided(form, "one letter may as well name the noise or the model of a filter")
		case m.Source < rules.Label && shape == claims.Rigid && !isRigid(l):
			continue
		}
		return l.by(m)
	}
	for _, l := range s.labels {
		if l.kind < ofType && shape == claims.Nine && l.name.SpeaksOfAxisMap(true) && isSignedPermutation(numbers) {
			return l.inferred(convention.AxisMap)
		}
	}
	return verdict{}
}

// isSignedPermutation reports nine numbers of which each row and each column
// has one that is 1 or -1, and zeros.
func isSignedPermutation(numbers []rules.Number) bool {
	var rows, cols [3]float64
	for i, n := range numbers {
		if n.Value != 0 && n.Value*n.Value != 1 {
			return false
		}
		rows[i/3] += n.Value * n.Value
		cols[i%3] += n.Value * n.Value
	}
	ones := [3]float64{1, 1, 1}
	return rows == ones && cols == ones
}

// isRigid reports a 4x4 that is said to be rigid though no word is full: by
// the word for a rotation, or by the customary T_cam_imu. A transform of four
// by four may scale and project, and rgbToXYZ is no transform of frames.
func isRigid(l label) bool {
	_, _, subscripts := claims.SubscriptFrames(l.text)
	return subscripts || saysRotation(l.name)
}

// ofThree reads three numbers of a list or of an x-y-z struct.
func (s speech) ofThree() verdict {
	if s.denied() {
		return verdict{}
	}
	said, remarked := s.remarked(convention.Angles, convention.RotationVector)
	for _, l := range s.labels {
		m := l.name.Form(claims.Three)
		if m.Form == convention.NoForm && m.Why == "" || m.Why != "" && l.kind >= ofType {
			continue
		}
		if remarked && m.Source < rules.Label {
			break
		}
		if m.Form == convention.Axis && m.Source < rules.Label {
			return l.undecided(m.Form, lengthUnsaid)
		}
		return l.by(m)
	}
	return said
}

// lengthUnsaid is why an axis stays undecided: functions that take one often
// make it unit themselves.
const lengthUnsaid = "nothing says that the axis has unit length"

// others are words of programs that the lexicon of calibration files lacks: the
// numbers of such a variable have the shape of an orientation and are none, or
// one that need not be unit, or one that is meant to be wrong.
var others = map[string]bool{
	"dot": true, "deriv": true, "derivative": true, "dual": true, "sum": true, "total": true,
	"diff": true, "difference": true, "plane": true, "rect": true, "raw": true, "unnormalized": true,
	"unnormalised": true, "random": true, "noisy": true, "zero": true, "point": true, "position": true,
	"acc": true, "accum": true, "tmp": true, "temp": true,
	// said to be wrong or made up
	"invalid": true, "bad": true, "wrong": true, "broken": true, "bogus": true, "fake": true, "mock": true, "dummy": true,
}

func isOther(n *claims.Name) bool {
	if strings.Contains(n.Stem, "spin") && n.Form(claims.Three).Form != convention.Axis {
		return true // a spin is a rate; a spin axis is an axis
	}
	for word := range strings.SplitSeq(n.Stem, "_") {
		if others[word] {
			return true
		}
	}
	return false
}
