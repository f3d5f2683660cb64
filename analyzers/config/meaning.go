package config

import (
	"dextral/analyzers/claims"
	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/rules"
)

// reading is what numbers claim to be, and what the format fixes about them.
type reading struct {
	claims.Meaning
	terms []convention.Term
	title string // chapter and verse of the specification that fixes the terms
}

// read makes a reading that is decided.
func read(f convention.Form, by rules.Source) reading {
	return reading{Meaning: claims.Meaning{Form: f, Source: by}}
}

// open makes a reading that stays undecided.
func open(f convention.Form, by rules.Source, why string) reading {
	return reading{Meaning: claims.Meaning{Form: f, Source: by, Why: why}}
}

// meaning says what numbers of a shape claim to be at a spot. The key
// says it first. Where it leaves two readings, or says nothing, a neighbouring
// key or a comment may say it.
func (w *walker) meaning(s *spot, shape claims.Shape) reading {
	if w.otherwise(s) {
		return reading{}
	}
	m := reading{Meaning: w.nameOf(s).Form(shape)}
	if w.nameOf(s).Not != "" {
		return m
	}
	if by, ok := w.madeOf(s, shape); ok {
		return by
	}
	m = w.typed(s, shape, m)
	r := w.remarks(s)
	for _, c := range r {
		if c.Not && shape >= claims.Nine {
			return open(convention.Matrix, rules.Comment, "a comment says that it is no rotation")
		} else if c.Not {
			return reading{}
		}
	}
	if w.nameOf(s).BadUnit != "" && (m.Form == convention.Angles || m.Form == convention.RotationVector) {
		m.Why = "angles in " + w.nameOf(s).BadUnit + " are not read"
	}
	if m.Form == convention.NoForm || m.Form == convention.Matrix {
		return w.toldBy(s, shape, m, r)
	}
	return m
}

// toldBy looks for somebody who says what the key does not.
func (w *walker) toldBy(s *spot, shape claims.Shape, m reading, r []remark) reading {
	says := reading{}
	w.eachNeighbour(s, func(n claims.Neighbour, _ rules.Claim) {
		if form := fitting(n.Form, shape); form != convention.NoForm && says.Form == convention.NoForm {
			says = read(form, rules.Sibling)
		} else if m.Why != "" && n.Sequence != "" && shape == claims.Three {
			if _, ok := claims.SequenceIn(n.Sequence, [3]angle.Role{}); ok {
				says = read(convention.Angles, max(rules.Sibling, m.Source)) // the name says angles, the neighbour which
			}
		}
	})
	for _, c := range r {
		form := fitting(c.Form, shape)
		if form == convention.NoForm && shape == claims.Three && c.Roles[0] != angle.RoleNone {
			form = convention.Angles
		}
		// A text above may speak of more than the value below it. It must be
		// about the numbers: name their order, or be beside them.
		precise := c.beside || c.Scalar != convention.ScalarUnstated || c.Roles[0] != angle.RoleNone || form == convention.Rotation
		if form != convention.NoForm && precise {
			says = read(form, rules.Comment)
		}
	}
	if says.Form != convention.NoForm {
		return says
	}
	return m
}

// fitting is a form if numbers of the shape can have it.
func fitting(f convention.Form, shape claims.Shape) convention.Form {
	shapes := map[convention.Form]claims.Shape{
		convention.Quaternion: claims.Four, convention.AxisAngle: claims.Four, convention.Rotation: claims.Nine,
		convention.Angles: claims.Three, convention.RotationVector: claims.Three,
	}
	if want, ok := shapes[f]; ok && want == shape {
		return f
	}
	return convention.NoForm
}
