package policy

import (
	"fmt"
	"slices"
	"strconv"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/rules"
)

// claim is what a [[claim]] says about the values it matches.
type claim struct {
	files       []glob
	keys        []keyPattern // none: every value of the files
	said        rules.Claims
	direction   *rules.Claim    // with names that the key patterns capture; nil if there are none
	form        convention.Form // NoForm: not declared
	uncertainty float64         // radians; 0: not declared
	offset      float64         // of the translation, in the unit of the file; 0: not declared
	double      bool
	saysDouble  bool
}

// matches reports whether the claim is about a value, with the names that the key
// pattern captures.
func (c claim) matches(rel, key string) (names map[string]string, ok bool) {
	if !anyMatches(c.files, rel) {
		return nil, false
	}
	for _, k := range c.keys {
		if names, ok := k.match(key); ok {
			return names, true
		}
	}
	return nil, len(c.keys) == 0
}

// Declare adds to a value what the policy says about it. It belongs after all
// other claims of the value are known and before the value is judged.
//
// Of several [[claim]]s that match, the last one that speaks of a subject is
// heard, so that an exception stands below its rule. [defaults] are heard where
// neither a [[claim]] nor the value's own file says anything; customs of
// naming do not count as saying. Claims that have no meaning for the form of
// the value, such as a unit for a matrix, are left out.
//
// A declared form changes how the value is read, unless its file format fixes
// the form. A form that does not fit the count of numbers leaves the value
// undecided, with that as the reason.
func (p *Policy) Declare(v *rules.Value) {
	rel, ok := p.rel(v.Place.Path)
	if !ok {
		return
	}
	declared := map[convention.Subject]rules.Claim{}
	for _, c := range p.claims {
		names, ok := c.matches(rel, v.Key)
		if !ok {
			continue
		}
		for _, s := range c.said {
			declared[s.Says.Subject()] = s
		}
		if c.direction != nil {
			s := *c.direction
			if d, ok := convention.ParseDirection(fill(s.Text, names)); ok {
				s.Says, s.Text = d, "direction = "+strconv.Quote(fill(s.Text, names))
				declared[convention.OfDirection] = s
			}
		}
		if c.uncertainty > 0 {
			v.Uncertainty = c.uncertainty
		}
		if c.offset > 0 {
			v.Offset = c.offset
		}
		if c.saysDouble {
			v.Double = c.double
		}
	}
	if c, ok := declared[convention.OfForm]; ok {
		reform(v, c)
	}
	for _, d := range p.defaults {
		s := d.Says.Subject()
		if _, ok := declared[s]; !ok && v.Form != convention.NoForm && !saysItself(v.Claims, s) {
			declared[s] = d
		}
	}
	for _, s := range convention.Subjects() {
		if c, ok := declared[s]; ok && concerns(s, v.Form) {
			c.Says = named(c.Says, v.Roles)
			v.Claims = append(v.Claims, c)
		}
	}
	p.declareHand(v)
}

// declareHand says of a value between two frames whose axes are declared whether it
// keeps handedness: a map from a right-handed frame to a left-handed one must mirror,
// any other must not.
//
// A triad of a declared frame has the handedness of the declared axes.
func (p *Policy) declareHand(v *rules.Value) {
	if f, ok := p.frames[v.FrameName()]; ok && v.Form == convention.Triad {
		v.Claims = append(v.Claims, rules.Claim{Says: f.Triad.Handedness(), Source: rules.Declaration, Place: f.Place,
			Text: fmt.Sprintf("%s: %s", v.FrameName(), f.Triad)})
		return
	}
	d := v.Claims.Direction()
	to, okTo := p.frames[d.To]
	from, okFrom := p.frames[d.From]
	if !okTo || !okFrom || !isMatrix(v.Form) || v.Form == convention.Matrix {
		return
	}
	hand := convention.RightHanded
	if to.Triad.Handedness() != from.Triad.Handedness() {
		hand = convention.LeftHanded
	}
	v.Claims = append(v.Claims, rules.Claim{Says: hand, Source: rules.Declaration, Place: to.Place,
		Text: fmt.Sprintf("%s: %s, %s: %s", d.To, to.Triad, d.From, from.Triad)})
}

// named reads a declared sequence again with the names of a value's numbers,
// which say what order they are written in. Names that do not go together
// leave it as it is.
func named(says convention.Term, roles [3]angle.Role) convention.Term {
	if l, ok := says.(angle.Label); ok {
		if read, err := angle.ParseLabel(l.Text, roles); err == nil {
			return read
		}
	}
	return says
}

// saysItself reports whether the file of a value speaks of a subject. For the
// storage order the shape of the numbers speaks too: rows written one by one
// are no flat list, and a default for flat lists must not transpose them.
func saysItself(cs rules.Claims, s convention.Subject) bool {
	c, ok := cs.On(s)
	return ok && (c.Source >= rules.Sibling || s == convention.OfStorage)
}

// concerns reports whether a subject has a meaning for a form.
func concerns(s convention.Subject, f convention.Form) bool {
	switch s {
	case convention.OfScalar, convention.OfProduct:
		return f == convention.Quaternion || f == convention.NoForm
	case convention.OfStorage:
		return isMatrix(f) || f == convention.NoForm
	case convention.OfUnit:
		return f == convention.Angles || f == convention.RotationVector || f == convention.AxisAngle || f == convention.NoForm
	case convention.OfSequence, convention.OfRange:
		return f == convention.Angles || f == convention.NoForm
	}
	return true
}

func isMatrix(f convention.Form) bool {
	return f == convention.Rotation || f == convention.Transform || f == convention.AxisMap || f == convention.Matrix
}

// reform reads a value as the declared form.
func reform(v *rules.Value, c rules.Claim) {
	form := c.Says.(convention.Form)
	if was, ok := v.FormClaim(); ok && was.Source == rules.Format {
		return
	}
	n := len(v.Numbers)
	if form == convention.Matrix && !isMatrix(v.Form) && n != 9 && n != 12 && n != 16 {
		// rotation = false on four numbers: nothing to read them as.
		v.Form, v.Why = convention.NoForm, fmt.Sprintf("declared to claim no rotation (%s)", c.Place)
		return
	}
	if want := counts[form]; !slices.Contains(want, n) {
		v.Why = fmt.Sprintf("declared to be %s (%s), which does not fit its %d numbers", article(form), c.Place, n)
		return
	}
	v.Form, v.Why = form, ""
	if v.Rows*v.Cols != n {
		v.Rows, v.Cols = shape(form, n)
	}
}

// counts are the numbers of numbers that each form may have.
var counts = map[convention.Form][]int{
	convention.Quaternion: {4}, convention.AxisAngle: {4},
	convention.Angles: {3}, convention.RotationVector: {3}, convention.Axis: {3},
	convention.Rotation: {9}, convention.Triad: {9}, convention.AxisMap: {9},
	convention.Transform: {12, 16}, convention.Matrix: {9, 12, 16},
}

// shape is how a count of numbers fills a matrix; zero for other forms.
func shape(f convention.Form, n int) (rows, cols int) {
	if !isMatrix(f) {
		return 0, 0
	}
	switch n {
	case 9:
		return 3, 3
	case 12:
		return 3, 4
	}
	return 4, 4
}

// article puts the indefinite article before a form that needs one.
func article(f convention.Form) string {
	switch f {
	case convention.Angles, convention.AxisAngle:
		return f.String()
	case convention.Axis, convention.AxisMap:
		return "an " + f.String()
	}
	return "a " + f.String()
}
