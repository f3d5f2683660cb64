package config

import (
	"regexp"

	"dextral/analyzers/config/tree"
	"dextral/core/convention"
	"dextral/rules"
)

// mountingNumber are parameters of autopilots whose number is an entry in a
// table of the firmware.
var mountingNumber = regexp.MustCompile(`(^|_)(ORIENT|ORIENTATION|ROT)[0-9]*$`)

// parameters reads parameter files. Their names are those of a firmware, in
// which ROLL and YAW are channels, gains and limits far more often than angles,
// so that nothing is read by custom. A mounting number is listed, undecided.
func parameters(w *walker, s *spot) {
	if s.node.Kind != tree.Scalar || !mountingNumber.MatchString(s.key) {
		return
	}
	if n, ok := w.doc.Number(s.node); ok {
		w.keep(s, fixed{why: "a mounting number: what it means stands in a table of the firmware", by: rules.Name}, &rules.Value{Numbers: []rules.Number{n}})
	}
}

// poseGraph reads the vertices and edges of three-dimensional pose graphs (g2o;
// its README, from memory): x y z qx qy qz qw. Edges are measurements and agree
// with each other only within their noise, so that no directions are claimed
// which loops could be closed over. The older TORO lines, with three angles, are
// listed, undecided: programs differ on their sequence.
func poseGraph(w *walker, s *spot) {
	if s.node.Kind != tree.Scalar || s.index < 0 {
		return
	}
	count := map[string]int{"VERTEX_SE3:QUAT": 7, "EDGE_SE3:QUAT": 7, "VERTEX3": 6, "EDGE3": 6}[s.keyName()]
	words := w.doc.Words(s.node)
	if count == 0 || len(words) < count {
		return
	}
	var x []rules.Number
	for _, word := range words[3:count] {
		n, ok := w.doc.NumberIn(word)
		if !ok {
			return
		}
		x = append(x, n)
	}
	v := &rules.Value{Numbers: x, Place: around(x)}
	if count == 6 {
		w.keep(s, fixed{title: "TORO: x y z roll pitch yaw", form: convention.Angles, why: "programs differ on the sequence of these angles",
			terms: []convention.Term{convention.Radian}}, v)
		return
	}
	w.keep(s, fixed{title: "g2o: x y z qx qy qz qw", form: convention.Quaternion, terms: []convention.Term{convention.ScalarLast}}, v)
}
