package claims

import (
	"strings"

	"dextral/core/angle"
	"dextral/core/convention"
)

// phrases are runs of lower-case words, the same in names and in comments, with
// what they say.
type phrases[T comparable] map[string]T

var (
	scalarPhrases = phrases[convention.ScalarPlace]{
		"wxyz": convention.ScalarFirst, "w x y z": convention.ScalarFirst, "qw qx qy qz": convention.ScalarFirst,
		"q w q x q y q z": convention.ScalarFirst, "scalar first": convention.ScalarFirst, "real first": convention.ScalarFirst, "w first": convention.ScalarFirst,
		"xyzw": convention.ScalarLast, "x y z w": convention.ScalarLast, "qx qy qz qw": convention.ScalarLast,
		"q x q y q z q w": convention.ScalarLast, "scalar last": convention.ScalarLast, "real last": convention.ScalarLast, "w last": convention.ScalarLast,
	}
	storagePhrases = phrases[convention.Storage]{
		"rowmajor": convention.RowMajor, "row major": convention.RowMajor, "row wise": convention.RowMajor,
		"row by row": convention.RowMajor, "by rows": convention.RowMajor,
		"colmajor": convention.ColumnMajor, "columnmajor": convention.ColumnMajor, "col major": convention.ColumnMajor, "column major": convention.ColumnMajor,
		"column wise": convention.ColumnMajor, "column by column": convention.ColumnMajor, "by columns": convention.ColumnMajor,
	}
	productPhrases = phrases[convention.Product]{
		"hamilton": convention.Hamilton, "hamiltonian": convention.Hamilton, "jpl": convention.Shuster, "shuster": convention.Shuster,
	}
	handPhrases = phrases[convention.Hand]{
		"right handed": convention.RightHanded, "righthanded": convention.RightHanded, "right hand": convention.RightHanded,
		"left handed": convention.LeftHanded, "lefthanded": convention.LeftHanded, "left hand": convention.LeftHanded,
	}
)

// one returns what the words say, or the zero value if they say nothing, or two
// different things.
func one[T comparable](words []string, known phrases[T]) T {
	var found, zero T
	text := " " + strings.Join(words, " ") + " "
	for phrase, says := range known {
		if strings.Contains(text, " "+phrase+" ") {
			if found != zero && found != says {
				return zero
			}
			found = says
		}
	}
	return found
}

var roleOf = map[string]angle.Role{
	"roll": angle.RoleRoll, "pitch": angle.RolePitch, "yaw": angle.RoleYaw, "heading": angle.RoleYaw,
}

// rolesIn finds the names of three angles: the words rpy and the like, or three
// words in a row. It reports how many words were used.
func rolesIn(words []string) ([3]angle.Role, int) {
	for i, w := range words {
		switch w {
		case "rpy", "rph":
			return [3]angle.Role{angle.RoleRoll, angle.RolePitch, angle.RoleYaw}, 1
		case "ypr", "hpr":
			return [3]angle.Role{angle.RoleYaw, angle.RolePitch, angle.RoleRoll}, 1
		}
		if i+2 >= len(words) {
			continue
		}
		roles := [3]angle.Role{roleOf[w], roleOf[words[i+1]], roleOf[words[i+2]]}
		if roles[0]*roles[1]*roles[2] != 0 && roles[0] != roles[1] && roles[1] != roles[2] && roles[0] != roles[2] {
			return roles, 3
		}
	}
	return [3]angle.Role{}, 0
}
