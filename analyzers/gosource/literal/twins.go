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
