package config

import (
	"slices"
	"strings"

	"dextral/analyzers/claims"
	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/rules"
)

// describe adds the claims on a value found at a spot, and the value.
func (w *walker) describe(s *spot, m reading, v *rules.Value) {
	r := w.remarks(s)
	if m.Form != convention.NoForm && m.Form != convention.Matrix {
		w.claimForm(s, m, v, r)
	}
	for _, term := range m.terms {
		c := w.claim(s, term, rules.Format)
		c.Text = m.title
		v.Claims = append(v.Claims, c)
	}
	w.nameTerms(s, m.Form, v)
	w.remarkTerms(m.Form, v, r)
	w.neighbourTerms(s, m.Form, v)
	if m.Form == convention.Angles {
		w.sequences(s, v, r)
	}
	w.add(s, m, v)
}

// claimForm claims what the value is: by whoever decides it, and by a comment
// that says the same.
func (w *walker) claimForm(s *spot, m reading, v *rules.Value, r []remark) {
	said := func(c remark) bool { return c.Form == m.Form }
	i := slices.IndexFunc(r, said)
	if m.Source != rules.Comment || i < 0 {
		c := w.claim(s, m.Form, m.Source)
		if m.title != "" {
			c.Text = m.title
		}
		v.Claims = append(v.Claims, c)
	}
	if i >= 0 && v.Form != convention.Matrix {
		v.Claims = append(v.Claims, r[i].claim(m.Form, rules.Comment))
	}
}

// wants reports whether a subject means anything for a form.
func wants(f convention.Form, s convention.Subject) bool {
	switch f {
	case convention.Quaternion:
		return s == convention.OfScalar || s == convention.OfProduct || s == convention.OfDirection
	case convention.Rotation, convention.Transform:
		return s == convention.OfStorage || s == convention.OfDirection
	case convention.Angles:
		return s == convention.OfUnit || s == convention.OfDirection || s == convention.OfRange
	case convention.RotationVector, convention.AxisAngle:
		return s == convention.OfUnit || s == convention.OfDirection
	case convention.Triad, convention.AxisMap:
		return s == convention.OfHand
	case convention.NoForm: // three numbers that may be angles or a vector
		return s == convention.OfUnit
	}
	return false
}

// stated reports whether a term says anything.
func stated(t convention.Term) bool {
	switch t := t.(type) {
	case convention.ScalarPlace:
		return t != convention.ScalarUnstated
	case convention.Unit:
		return t != convention.UnitUnstated
	case convention.Storage:
		return t != convention.StorageUnstated
	case convention.Product:
		return t != convention.ProductUnstated
	case convention.Hand:
		return t != convention.HandUnstated
	case convention.Range:
		return t.Stated()
	case convention.Direction:
		return t.Stated()
	}
	return false
}

// nameTerms adds what the key says. Components of a quaternion are in order
// whatever the key says of order.
func (w *walker) nameTerms(s *spot, f convention.Form, v *rules.Value) {
	n := w.nameOf(s)
	for _, t := range []convention.Term{n.Scalar, n.Unit, n.Storage, n.Product, n.Hand} {
		w.addTerm(f, v, w.claim(s, t, rules.Label))
	}
	w.addTerm(f, v, w.claim(s, n.Direction, rules.Name))
	if v.Roles == ([3]angle.Role{}) && f == convention.Angles {
		v.Roles = n.Roles
	}
}

// addTerm adds a claim if it says something that the form has, and if it does not
// repeat one.
func (w *walker) addTerm(f convention.Form, v *rules.Value, c rules.Claim) {
	if !stated(c.Says) || !wants(f, c.Says.Subject()) {
		return
	}
	if c.Says.Subject() == convention.OfScalar && named(v) {
		return
	}
	if best, ok := v.Claims.On(c.Says.Subject()); ok && best.Source == rules.Format && !c.Source.Stated() {
		return // what is only inferred adds nothing to what the format fixes
	}
	for _, other := range v.Claims {
		if other.Says.Subject() == c.Says.Subject() && other.Source == c.Source && other.Says.String() == c.Says.String() {
			return
		}
	}
	v.Claims = append(v.Claims, c)
}

// named reports whether the components of a quaternion are named one by one, so
// that their order is settled.
func named(v *rules.Value) bool {
	c, ok := v.Claims.On(convention.OfScalar)
	return ok && strings.HasPrefix(c.Text, componentText)
}

// remarkTerms adds what the comments say.
func (w *walker) remarkTerms(f convention.Form, v *rules.Value, r []remark) {
	for _, c := range r {
		for _, t := range []convention.Term{c.Scalar, c.Storage, c.Product, c.Hand} {
			w.addTerm(f, v, c.claim(t, rules.Comment))
		}
		if c.beside || c.Angular || f == convention.RotationVector || f == convention.AxisAngle {
			w.addTerm(f, v, c.claim(c.Unit, rules.Comment))
			w.addTerm(f, v, c.claim(c.Range, rules.Comment))
		}
		source := rules.Name // "a to b" leaves room
		if c.Equation {
			source = rules.Comment
		}
		w.addTerm(f, v, c.claim(c.Direction, source))
		if f == convention.Angles && v.Roles == ([3]angle.Role{}) {
			v.Roles = c.Roles
		}
	}
}

// sequences adds the labels of an angle sequence: of the key, of the comments,
// of a neighbouring key; or, where nobody states one, what custom makes of roll,
// pitch and yaw. Labels that can both be meant are one claim, the fuller one.
func (w *walker) sequences(s *spot, v *rules.Value, r []remark) {
	if w.hasSequence(v) {
		return // the format fixes it
	}
	var found []rules.Claim
	keep := func(c rules.Claim) {
		label := c.Says.(angle.Label)
		for i, other := range found {
			if known := other.Says.(angle.Label); claims.Compatible(label, known) {
				if label.Full && !known.Full {
					found[i] = c
				}
				return
			}
		}
		found = append(found, c)
	}
	if label, err := angle.ParseLabel(w.nameOf(s).Sequence, v.Roles); err == nil {
		keep(w.claim(s, label, rules.Label))
	}
	for _, c := range r {
		if label, ok := claims.SequenceIn(c.Text, v.Roles); ok {
			keep(c.claim(label, rules.Comment))
		}
	}
	w.eachNeighbour(s, func(n claims.Neighbour, c rules.Claim) {
		text := n.Sequence
		if kind := w.axisKind(s); kind != "" && text != "" {
			text = kind + " " + text
		}
		if label, ok := claims.SequenceIn(text, v.Roles); ok {
			if n.Explicit && label.Full { // sequence: z-y'-x'' can be about nothing else
				c.Source = rules.Label
			}
			c.Says = label
			keep(c)
		}
	})
	if len(found) == 0 {
		if label, err := angle.Customary(v.Roles); err == nil {
			found = append(found, w.claim(s, label, rules.Name))
		}
	}
	v.Claims = append(v.Claims, found...)
}

func (w *walker) hasSequence(v *rules.Value) bool {
	_, ok := v.Claims.On(convention.OfSequence)
	return ok
}
