package config

import (
	"dextral/core/convention"
	"dextral/rules"
)

// twins tells which values state the same orientation: those of one map whose
// keys have the same stem. It is kept narrow, since values so told are compared
// and their difference is reported: two values of one form are two orientations,
// and nobody can say which of them a third one repeats; values that state
// different directions are different too.
func twins(members []member) {
	groups := map[[2]string][]*rules.Value{}
	for _, m := range members {
		if m.value.Decided() && orients(m.value.Form) && !unset(m.value) {
			key := [2]string{m.in, m.stem}
			groups[key] = append(groups[key], m.value)
		}
	}
	for key, group := range groups {
		if len(group) < 2 || !distinct(group) {
			continue
		}
		for _, v := range group {
			v.Of = key[0] + "/" + key[1]
		}
	}
}

// orients reports whether a value of the form alone fixes an orientation.
func orients(f convention.Form) bool {
	switch f {
	case convention.Quaternion, convention.Rotation, convention.Transform, convention.Angles,
		convention.RotationVector, convention.AxisAngle:
		return true
	}
	return false
}

// unset reports whether all numbers are zero, which states no orientation; zero
// angles and a zero vector state the identity.
func unset(v *rules.Value) bool {
	for _, n := range v.Numbers {
		if n.Value != 0 {
			return false
		}
	}
	return v.Form != convention.Angles && v.Form != convention.RotationVector
}

// distinct reports whether the values have different forms and no two different
// directions.
func distinct(group []*rules.Value) bool {
	forms := map[convention.Form]bool{}
	var direction convention.Direction
	for _, v := range group {
		d := v.Claims.Direction()
		if forms[v.Form] || d.Stated() && direction.Stated() && d != direction {
			return false
		}
		forms[v.Form] = true
		if d.Stated() {
			direction = d
		}
	}
	return true
}
