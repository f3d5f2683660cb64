package measure

import "strings"

// components are customary names of the numbers of a quaternion, w x y z.
var components = map[string]int{
	"w": 0, "qw": 0, "real": 0, "s": 0, "scalar": 0, "a": 0, "re": 0, "e0": 0, "q0": 0, "r": 0,
	"x": 1, "qx": 1, "imag": 1, "i": 1, "q1": 1, "e1": 1,
	"y": 2, "qy": 2, "jmag": 2, "j": 2, "q2": 2, "e2": 2,
	"z": 3, "qz": 3, "kmag": 3, "k": 3, "q3": 3, "e3": 3,
}

// component says which number of a quaternion a field is by its name: "q.W" is
// the scalar, "q.V[0]" and "q.V.X" are the first of the vector part.
func component(name string) (int, bool) {
	if i := index(name); i >= 0 {
		// An element of a vector part; of a plain array it says nothing.
		outer := strings.ToLower(name[:strings.LastIndexByte(name, '[')])
		if dot := strings.LastIndexByte(outer, '.'); dot >= 0 && i < 3 {
			switch outer[dot+1:] {
			case "v", "vec", "vector", "imag", "im", "xyz", "axis", "n":
				return i + 1, true
			}
		}
		return 0, false
	}
	k, ok := components[strings.ToLower(baseName(name))]
	return k, ok
}
