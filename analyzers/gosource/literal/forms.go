package literal

import (
	"go/ast"
	"go/types"
	"strings"

	"dextral/core/convention"
	"dextral/rules"
)

// verdict is what the words about a literal make of numbers of its shape.
type verdict struct {
	form convention.Form
	by   *label // the label that says so
	says string // the words of it that say so
	from rules.Source
	why  string // why it is undecided
}

// none is the verdict where nothing speaks of an orientation.
var none verdict

// speech is the words about a literal, label by label.
type speech struct {
	labels []label
	words  [][]string
}

func speechOf(labels []label) speech {
	s := speech{labels: labels, words: make([][]string, len(labels))}
	for i, l := range labels {
		s.words[i] = split(l.text)
	}
	return s
}

// find returns the first label of a kind that has one of the words.
func (s speech) find(kind labelKind, set map[string]bool) *label {
	for i := range s.labels {
		if s.labels[i].kind == kind && hasAny(s.words[i], set) {
			return &s.labels[i]
		}
	}
	return nil
}

// names returns the first label of the value or around it that has one of the words.
func (s speech) names(sets ...map[string]bool) *label {
	for _, kind := range []labelKind{ofValue, ofOuter} {
		for _, set := range sets {
			if l := s.find(kind, set); l != nil {
				return l
			}
		}
	}
	return nil
}

// custom returns the value's own label if it satisfies a test of words.
func (s speech) custom(test func(words []string) bool) *label {
	for i := range s.labels {
		if s.labels[i].kind != ofType && test(s.words[i]) {
			return &s.labels[i]
		}
	}
	return nil
}

// other reports that a name of the value speaks of something else than an
// orientation: a rate, a covariance, a colour.
func (s speech) other() bool {
	return s.find(ofValue, otherWords) != nil || s.find(ofOuter, otherWords) != nil
}

func stated(form convention.Form, by *label) verdict {
	return verdict{form: form, by: by, from: rules.Label}
}

func inferred(form convention.Form, by *label) verdict {
	return verdict{form: form, by: by, from: rules.Name}
}

func undecided(form convention.Form, by *label, why string) verdict {
	return verdict{form: form, by: by, from: rules.Name, why: why}
}

// ofFour reads four numbers. Named says that they are named like the
// components of a quaternion.
func (s speech) ofFour(named bool) verdict {
	if s.other() || s.find(ofType, otherWords) != nil {
		return none
	}
	if l := s.names(quaternionWords); l != nil {
		return stated(convention.Quaternion, l)
	}
	quaternionType := s.find(ofType, quaternionWords)
	rotationType := s.find(ofType, rotationWords)
	if l := s.names(rotationWords, transformWords); l != nil && (quaternionType != nil || named) {
		return stated(convention.Quaternion, l)
	} else if l != nil && s.names(rotationWords) != nil {
		return undecided(convention.Quaternion, l, "four numbers of a rotation may be a quaternion or an axis and an angle")
	}
	if rotationType != nil && (quaternionType != nil || named) {
		return stated(convention.Quaternion, rotationType)
	}
	if quaternionType != nil {
		return inferred(convention.Quaternion, quaternionType)
	}
	if s.find(ofType, shapeWords) != nil {
		return none
	}
	if l := s.custom(func(words []string) bool { return leads(words, "q") }); l != nil {
		return inferred(convention.Quaternion, l)
	}
	return none
}

// ofMatrix reads three by three numbers, or more where a rigid transform has them.
func (s speech) ofMatrix(rows, cols int) verdict {
	if s.other() || s.find(ofType, otherWords) != nil {
		return none
	}
	form := convention.Rotation
	if rows*cols > 9 {
		form = convention.Transform
	}
	if l := s.names(rotationWords); l != nil {
		return stated(form, l)
	}
	if l := s.find(ofType, rotationWords); l != nil {
		return stated(form, l)
	}
	if l := s.names(transformWords); l != nil && form == convention.Transform && !strings.EqualFold(l.text, "transform") {
		return inferred(form, l)
	}
	letters := "rc"
	if form == convention.Transform {
		letters = "t"
	}
	frames := func(words []string) bool {
		return leads(words, letters) && hasAny(words[1:], frameWords) || joinsFrames(words)
	}
	if l := s.custom(frames); l != nil {
		return inferred(form, l)
	}
	if l := s.custom(func(words []string) bool { return len(words) == 1 && words[0] == "r" }); l != nil && s.find(ofOuter, transformWords) != nil {
		return inferred(form, l)
	}
	return none
}

// ofThree reads three numbers of a list or of an x-y-z struct.
func (s speech) ofThree() verdict {
	if s.other() {
		return none
	}
	if l := s.names(vectorWords); l != nil {
		return stated(convention.RotationVector, l)
	}
	if l := s.custom(func(words []string) bool { return has(words, "rotation", "vector") || has(words, "rot", "vec") }); l != nil {
		return stated(convention.RotationVector, l)
	}
	if l := s.names(anglesWords); l != nil {
		return stated(convention.Angles, l)
	}
	if l := s.custom(func(words []string) bool { return has(words, "roll", "pitch", "yaw") }); l != nil {
		return stated(convention.Angles, l)
	}
	if l := s.find(ofType, anglesWords); l != nil {
		return stated(convention.Angles, l)
	}
	if l := s.custom(func(words []string) bool { return words[len(words)-1] == "axis" }); l != nil {
		return inferred(convention.Axis, l)
	}
	if l := s.names(rotationWords); l != nil {
		return undecided(convention.NoForm, l, "three numbers of a rotation may be angles or a rotation vector")
	}
	return none
}

// has reports whether all of these are among the words.
func has(words []string, wanted ...string) bool {
	for _, want := range wanted {
		if !hasAny(words, map[string]bool{want: true}) {
			return false
		}
	}
	return true
}

// typeLabels are the names of a type that speak about its values: its own, and
// that of its package (attitude.Quaternion).
func (w *walker) typeLabels(t types.Type) []label {
	if p, ok := types.Unalias(t).(*types.Pointer); ok {
		t = p.Elem()
	}
	var list []label
	for {
		alias, ok := t.(*types.Alias)
		if !ok {
			break
		}
		list = append(list, w.nameOf(alias.Obj())...)
		t = alias.Rhs()
	}
	if named, ok := t.(*types.Named); ok {
		list = append(list, w.nameOf(named.Obj())...)
	}
	return list
}

func (w *walker) nameOf(object *types.TypeName) []label {
	list := []label{{text: object.Name(), kind: ofType}}
	if pkg := object.Pkg(); pkg != nil {
		list = append(list, label{text: pkg.Name(), kind: ofType})
	}
	return list
}

// writtenType are the names of a literal's type as written, for types that
// could not be resolved.
func writtenType(lit *ast.CompositeLit) []label {
	switch t := lit.Type.(type) {
	case *ast.Ident:
		return []label{{text: t.Name, kind: ofType}}
	case *ast.SelectorExpr:
		return []label{{text: t.Sel.Name, kind: ofType}, {text: types.ExprString(t.X), kind: ofType}}
	}
	return nil
}
