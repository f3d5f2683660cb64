package config

import (
	"math"

	"dextral/analyzers/claims"
	"dextral/core/convention"
	"dextral/rules"
)

// doubt looks at the numbers of a value whose name only suggests what it is, and
// says why it may be something else. It is no rule: it keeps names that have a
// second customary meaning from claiming what nobody claimed.
func doubt(v *rules.Value, n *claims.Name) string {
	claim, ok := v.FormClaim()
	if !ok || claim.Source.Stated() {
		return ""
	}
	x := v.Floats()
	switch v.Form {
	case convention.Quaternion:
		return doubtQuaternion(x)
	case convention.Rotation:
		if symmetric(x) && !identity(x) && x[0]+x[4]+x[8] > 0 {
			return "it is symmetric as a covariance is; the only symmetric rotations are the identity and half turns, whose diagonal sums to -1"
		}
	case convention.Transform:
		if v.Rows == 4 && n.Stem == "" && !lastIsUnit(x) {
			return "neither its last row nor its last column is 0 0 0 1, and the name alone does not say that it is a rigid transform"
		}
	}
	return ""
}

// doubtQuaternion tells four numbers that may be axis and angle, or nothing of
// the kind, from a quaternion whose norm is off.
func doubtQuaternion(x []float64) string {
	norm := math.Hypot(math.Hypot(x[0], x[1]), math.Hypot(x[2], x[3]))
	unit := func(a, b, c float64) bool { return math.Abs(math.Hypot(math.Hypot(a, b), c)-1) < 0.01 }
	switch {
	case math.Abs(norm-1) < 0.01 || norm == 0:
	case unit(x[0], x[1], x[2]) || unit(x[1], x[2], x[3]):
		return "three of its numbers are a unit vector and all four are not: it may be axis and angle"
	case norm > 4 || norm < 0.25:
		return "the four numbers are far from unit length, and the name alone does not say that they are a quaternion"
	}
	return ""
}

func symmetric(x []float64) bool { return x[1] == x[3] && x[2] == x[6] && x[5] == x[7] }

func identity(x []float64) bool {
	return x[0] == 1 && x[4] == 1 && x[8] == 1 && x[1] == 0 && x[2] == 0 && x[5] == 0
}

// lastIsUnit reports whether the last row or column of a 4x4 is 0 0 0 1.
func lastIsUnit(x []float64) bool {
	row := x[12] == 0 && x[13] == 0 && x[14] == 0 && x[15] == 1
	column := x[3] == 0 && x[7] == 0 && x[11] == 0 && x[15] == 1
	return row || column
}
