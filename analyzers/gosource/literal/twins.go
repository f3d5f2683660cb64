package literal

import (
	"strings"

	"dextral/core/convention"
	"dextral/rules"
)

// alone is the group of what has no twin.
const alone = "\x00"

// twin is what two values must share to state one orientation: the struct
// literal or scope they belong to, and what is left of their names without
// the words that name a representation. mountQuat and mountRPYDeg share
// "mount"; Rotation and Axis of one struct literal share "".
type twin struct{ group, stem string }

// representationWords name a representation, and its conventions and units,
// rather than what is oriented.
var representationWords = set("quat quats quaternion rotor versor q r c matrix mat mat3 dcm rotmat rotm rotation rot " +
	"euler eulers rpy ypr angles angle eul rotvec rvec vector axis attitude orientation orient roll pitch yaw heading bank " +
	"phi theta psi deg degs degree degrees rad rads radian radians wxyz xyzw xyz zyx zxy xzy yxz yzx intrinsic extrinsic " +
	"first last scalar qw qx qy qz w x y z as in of")

// stem is what is left of a name.
func stem(name string) string {
	var rest []string
	for _, word := range split(name) {
		if !representationWords[word] {
			rest = append(rest, word)
		}
	}
	return strings.Join(rest, " ")
}

// pair marks the values of a file that state one orientation. It is careful:
// without other words only fields of one struct literal are twins, and a name
// that occurs twice in a group, as in two branches, may mean two orientations.
func (w *walker) pair() {
	type form struct {
		twin
		form convention.Form
	}
	count := map[form]int{}
	groups := map[twin][]*rules.Value{}
	for _, v := range w.values {
		at, ok := w.stems[v]
		if !ok || at.stem == "" && !strings.HasPrefix(at.group, "{") {
			continue
		}
		groups[at] = append(groups[at], v)
		count[form{at, v.Form}]++
	}
	for at, group := range groups {
		single := len(group) > 1
		for _, v := range group {
			single = single && count[form{at, v.Form}] == 1
		}
		if !single {
			continue
		}
		for _, v := range group {
			v.Of = at.group + " " + at.stem
		}
	}
}
