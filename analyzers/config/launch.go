package config

import (
	"slices"
	"strings"

	"dextral/analyzers/config/tree"
	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/rules"
)

// launch reads the static transforms of launch files: the arguments of
// static_transform_publisher of tf and tf2_ros (their documentation, from
// memory).
//
//	x y z yaw pitch roll frame_id child_frame_id [period]
//	x y z qx qy qz qw frame_id child_frame_id [period]
//	--x 0 ... --yaw 0 --pitch 0 --roll 0 --frame-id map --child-frame-id odom
//	--qx 0 --qy 0 --qz 0 --qw 1 ...
//
// Angles are in radians: yaw about z, pitch about y, roll about x, which is
// about moving axes in this order. v_frame_id = R v_child_frame_id.
func launch(w *walker, s *spot) {
	e := s.element()
	if e == nil || s.key != "args" || e.keyName() != "node" {
		return
	}
	if attribute(e.node, "type") != "static_transform_publisher" && attribute(e.node, "exec") != "static_transform_publisher" {
		return
	}
	words := w.doc.Words(s.node)
	if len(words) > 0 && strings.HasPrefix(words[0].Text, "--") {
		w.flaggedTransform(s, words)
		return
	}
	var x []rules.Number
	for _, word := range words {
		n, ok := w.doc.NumberIn(word)
		if !ok {
			break
		}
		x = append(x, n)
	}
	var direction []convention.Term
	if len(words) >= len(x)+2 {
		direction = transformDirection(words[len(x)].Text, words[len(x)+1].Text)
	}
	switch len(x) {
	case 6:
		w.keepYPR(s, x[3:], [3]angle.Role{angle.RoleYaw, angle.RolePitch, angle.RoleRoll}, direction)
	case 7:
		w.keepQXYZW(s, x[3:], direction)
	}
}

// transformDirection is the direction of a transform between frames that are
// named by words, not by arguments.
func transformDirection(parent, child string) []convention.Term {
	if parent == "" || child == "" || strings.Contains(parent+child, "$") {
		return nil
	}
	return []convention.Term{convention.Direction{To: parent, From: child}}
}

const publisher = "static_transform_publisher: "

func (w *walker) keepYPR(s *spot, x []rules.Number, roles [3]angle.Role, direction []convention.Term) {
	v := &rules.Value{Numbers: x, Roles: roles, Place: around(x)}
	w.keep(s, fixed{title: publisher + "yaw pitch roll in radians", form: convention.Angles,
		terms: append(direction, convention.Radian, label("z-y'-x''", roles))}, v)
}

func (w *walker) keepQXYZW(s *spot, x []rules.Number, direction []convention.Term) {
	v := &rules.Value{Numbers: x, Place: around(x)}
	w.keep(s, fixed{title: publisher + "qx qy qz qw", form: convention.Quaternion, terms: append(direction, convention.ScalarLast)}, v)
}

// around is the place from the first to the last of numbers that may stand in
// another order than they are listed in.
func around(x []rules.Number) rules.Place {
	compare := func(a, b rules.Number) int { return a.Place.Compare(b.Place) }
	return slices.MinFunc(x, compare).Place.To(slices.MaxFunc(x, compare).Place)
}

// flaggedTransform reads arguments that are named one by one.
func (w *walker) flaggedTransform(s *spot, words []tree.Word) {
	flags := map[string]tree.Word{}
	for i := 0; i+1 < len(words); i += 2 {
		flags[strings.TrimPrefix(words[i].Text, "--")] = words[i+1]
	}
	all := func(names ...string) []rules.Number {
		var x []rules.Number
		for _, name := range names {
			n, ok := w.doc.NumberIn(flags[name])
			if !ok {
				return nil
			}
			x = append(x, n)
		}
		return x
	}
	direction := transformDirection(flags["frame-id"].Text, flags["child-frame-id"].Text)
	if x := all("qx", "qy", "qz", "qw"); x != nil {
		w.keepQXYZW(s, x, direction)
	}
	if x := all("yaw", "pitch", "roll"); x != nil {
		w.keepYPR(s, x, [3]angle.Role{angle.RoleYaw, angle.RolePitch, angle.RoleRoll}, direction)
	}
}
