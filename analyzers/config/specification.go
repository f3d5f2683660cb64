package config

import (
	"regexp"

	"dextral/analyzers/claims"
	"dextral/core/convention"
	"dextral/rules"
)

// specification is what a format itself fixes. Under one, only what it names is
// an orientation: other keys of such a format are not read by custom.
type specification []rule

// rule says what stands at a path.
type rule struct {
	title string // chapter and verse, for claims
	path  *regexp.Regexp
	shape claims.Shape
	form  convention.Form
	why   string // why it is no orientation to be judged; "" if it is one
	terms []convention.Term
}

// gltf is glTF 2.0, section 3.5.3 (Transformations) and 5.25 (Node), from
// memory. A node's matrix is column by column and may carry scale; a rotation is
// a unit quaternion x y z w.
var gltf = specification{
	{"glTF 2.0, node.rotation: a unit quaternion x y z w", regexp.MustCompile(`^nodes\[\d+\]\.rotation$`), claims.Four,
		convention.Quaternion, "", []convention.Term{convention.ScalarLast}},
	{"glTF 2.0, node.matrix: column by column", regexp.MustCompile(`^nodes\[\d+\]\.matrix$`), claims.Rigid,
		convention.Matrix, "glTF allows scale in a node's matrix", []convention.Term{convention.ColumnMajor}},
}

// at is the rule for a spot.
func (spec specification) at(s *spot, shape claims.Shape) *rule {
	for i := range spec {
		if r := &spec[i]; r.shape == shape && r.path.MatchString(s.path()) {
			return r
		}
	}
	return nil
}

// meaning is the reading of numbers at a spot.
func (spec specification) meaning(s *spot, shape claims.Shape) reading {
	if r := spec.at(s, shape); r != nil {
		return reading{claims.Meaning{Form: r.form, Source: rules.Format, Why: r.why}, r.terms, r.title}
	}
	return reading{}
}
