package audit

import (
	"strings"

	"dextral/analyzers/claims"
	"dextral/rules"
)

// chains are those of one file; the Go files of a tree, which come together,
// are taken apart again.
func chains(f *found) []*rules.Chain {
	var list []*rules.Chain
	for start := 0; start < len(f.values); {
		end := start + 1
		for end < len(f.values) && f.values[end].Place.Path == f.values[start].Place.Path {
			end++
		}
		for _, v := range f.values[start:end] {
			subscript(v)
		}
		if c := rules.NewChain(f.values[start:end]); c != nil {
			list = append(list, c)
		}
		start = end
	}
	return list
}

// subscript notes the two frames of a key such as T_cam_imu. The items of a list
// under such a key are as many pairs of frames: T_imu_cam[0] and T_imu_cam[1] are
// two cameras.
func subscript(v *rules.Value) {
	name := v.Key[strings.LastIndexByte(v.Key, '.')+1:]
	item := ""
	if at := strings.IndexByte(name, '['); at >= 0 {
		name, item = name[:at], name[at:]
	}
	if first, second, ok := claims.SubscriptFrames(name); ok {
		v.Subscript = [2]string{first + item, second + item}
	}
}
