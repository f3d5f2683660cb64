package config

import (
	"regexp"

	"dextral/core/convention"
	"dextral/rules"
)

var (
	gltfRotation = regexp.MustCompile(`^nodes\[\d+\]\.rotation$`)
	gltfMatrix   = regexp.MustCompile(`^nodes\[\d+\]\.matrix$`)
)

// gltf is glTF 2.0: the node schema, and section 3.5.3 on transformations
// (wording from memory). A rotation is a unit quaternion x y z w; a matrix is
// written column by column and may carry scale.
func gltf(w *walker, s *spot) {
	switch {
	case s.key == "rotation" && gltfRotation.MatchString(s.path()):
		if x := w.doc.Numbers(s.node, 4); len(x) == 4 {
			w.keep(s, fixed{title: "glTF 2.0, node.rotation: a unit quaternion x y z w", form: convention.Quaternion,
				terms: []convention.Term{convention.ScalarLast}}, &rules.Value{Numbers: x})
		}
	case s.key == "matrix" && gltfMatrix.MatchString(s.path()):
		if x := w.doc.Numbers(s.node, 16); len(x) == 16 {
			w.keep(s, fixed{title: "glTF 2.0, node.matrix: column by column", form: convention.Matrix, why: "glTF allows scale in a node's matrix",
				terms: []convention.Term{convention.ColumnMajor}}, &rules.Value{Numbers: x, Rows: 4, Cols: 4})
		}
	}
}
