package config

import (
	"strings"

	"dextral/analyzers/config/tree"
	"dextral/core/convention"
	"dextral/rules"
)

// urdf is the Unified Robot Description Format, its elements joint, link and
// origin (wording of the ROS page, second hand): rpy is in radians about fixed
// axes, roll about x first, then pitch about y, then yaw about z. An origin in a
// joint takes child coordinates to parent coordinates. That an axis is of unit
// length is advice.
//
// Expressions of xacro, ${pi/2}, are not read.
func urdf(w *walker, s *spot) {
	e := s.element()
	switch {
	case e == nil:
	case s.key == "rpy" && e.keyName() == "origin":
		w.keepRPY(s, "URDF, origin: rpy about fixed axes, in radians", convention.Radian, jointDirection(e))
	case s.key == "quat_xyzw" && e.keyName() == "origin":
		if x := w.doc.Numbers(s.node, 4); len(x) == 4 {
			w.keep(s, fixed{title: "URDF, origin: quat_xyzw", form: convention.Quaternion,
				terms: append(jointDirection(e), convention.ScalarLast)}, &rules.Value{Numbers: x})
		}
	case s.key == "xyz" && e.keyName() == "axis":
		w.keepAxis(s, "URDF, axis: the vector should be normalised")
	}
}

// keepRPY keeps the last three of three or six numbers as roll, pitch and yaw.
func (w *walker) keepRPY(s *spot, title string, unit convention.Unit, more []convention.Term) {
	x := w.doc.Numbers(s.node, 6)
	if len(x) != 3 && len(x) != 6 {
		return
	}
	w.keep(s, fixed{title: title, form: convention.Angles, terms: append(more, unit, label("x-y-z about fixed axes", rollPitchYaw))},
		&rules.Value{Numbers: x[len(x)-3:], Roles: rollPitchYaw})
}

// keepAxis keeps a vector that ought to be of unit length.
func (w *walker) keepAxis(s *spot, title string) {
	if x := w.doc.Numbers(s.node, 3); len(x) == 3 {
		w.keep(s, fixed{title: title, form: convention.Axis, by: rules.Name}, &rules.Value{Numbers: x})
	}
}

// jointDirection is the direction of an origin in a joint.
func jointDirection(origin *spot) []convention.Term {
	joint := origin.element()
	if joint == nil || joint.keyName() != "joint" {
		return nil
	}
	d := convention.Direction{To: attribute(joint.node.Get("parent"), "link"), From: attribute(joint.node.Get("child"), "link")}
	if !d.Stated() || strings.Contains(d.To+d.From, "$") {
		return nil
	}
	return []convention.Term{d}
}

// sdf is the Simulation Description Format, its element pose (sdf/1.10/pose.sdf
// of the specification): x y z, then roll pitch yaw as in URDF, in radians or
// degrees; or, with rotation_format, a quaternion x y z w. A pose takes
// coordinates of what holds it to those of what holds that, or of relative_to.
func sdf(w *walker, s *spot) {
	e := s.element()
	switch {
	case s.node.Kind != tree.Scalar || e == nil:
	case s.keyName() == "pose":
		own := s.owner().node
		w.sdfPose(s, attribute(own, "rotation_format"), attribute(own, "degrees"))
	case s.keyName() == "xyz" && strings.HasPrefix(e.keyName(), "axis"):
		w.keepAxis(s, "SDFormat, axis: xyz is a unit vector")
	}
}

func (w *walker) sdfPose(s *spot, format, degrees string) {
	unit := convention.Radian
	if degrees == "true" || degrees == "1" {
		unit = convention.Degree
	}
	switch format {
	case "", "euler_rpy":
		if len(w.doc.Numbers(s.node, 6)) == 6 {
			w.keepRPY(s, "SDFormat, pose: roll pitch yaw about fixed axes, in radians unless degrees is true", unit, nil)
		}
	case "quat_xyzw":
		if x := w.doc.Numbers(s.node, 7); len(x) == 7 {
			w.keep(s, fixed{title: "SDFormat, pose: rotation_format quat_xyzw", form: convention.Quaternion,
				terms: []convention.Term{convention.ScalarLast}}, &rules.Value{Numbers: x[3:]})
		}
	}
}

// mjcf is the format of MuJoCo models (XML reference, from memory): a quaternion
// is w x y z, and the compiler normalises it, so that its length says nothing.
// Angles are in the unit and sequence that the compiler element states, which may
// stand in another file.
func mjcf(w *walker, s *spot) {
	if s.key != "quat" {
		return
	}
	if x := w.doc.Numbers(s.node, 4); len(x) == 4 {
		w.keep(s, fixed{title: "MJCF, quat: w x y z", form: convention.Quaternion, why: "the compiler of MuJoCo normalises quaternions, so that their length says nothing",
			terms: []convention.Term{convention.ScalarFirst}}, &rules.Value{Numbers: x})
	}
}
