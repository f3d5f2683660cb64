package rules

import (
	"cmp"
	"slices"
)

// Changes matches the values of two versions of some files and explains every
// difference, in the order of the new places, removed values last. renamed gives
// the new path of a file that was renamed, by the old one.
//
// A value is the same one under the same key of the same file. What is left over
// is matched, as long as there is one candidate only, by its numbers and the last
// part of its key; by the last part of its key within the file; by its numbers
// within the file; as the only ones left under a parent; and by the whole key in
// any file.
func Changes(before, after []*Value, renamed map[string]string) []Change {
	m := matcher{before: slices.Clone(before), after: slices.Clone(after), path: map[*Value]string{}}
	for _, v := range before {
		m.path[v] = cmp.Or(renamed[v.Place.Path], v.Place.Path)
	}
	for _, v := range after {
		m.path[v] = v.Place.Path
	}
	m.sameKey()
	m.by(func(v *Value) any { return [2]string{leaf(v.Key), numbersText(v)} })
	m.by(func(v *Value) any { return [3]string{m.path[v], leaf(v.Key), v.Form.String()} })
	m.by(func(v *Value) any { return [3]string{m.path[v], numbersText(v), v.Form.String()} })
	m.by(func(v *Value) any { return [2]string{m.path[v], parent(v.Key)} })
	m.by(func(v *Value) any { return v.Key })
	slices.SortFunc(m.pairs, func(a, b [2]*Value) int { return a[1].Place.Compare(b[1].Place) })
	var list []Change
	for _, p := range m.pairs {
		c := Explain(p[0], p[1])
		c.Moved = m.path[p[0]] != p[1].Place.Path || p[0].Key != p[1].Key
		if c.Text != "" && (c.Moved || c.Text != "moved, nothing else") {
			list = append(list, c)
		}
	}
	for _, v := range m.after {
		list = append(list, Change{After: v, Effect: Added, Text: "new: " + v.Reading()})
	}
	slices.SortStableFunc(list, func(a, b Change) int { return a.After.Place.Compare(b.After.Place) })
	for _, v := range m.before {
		list = append(list, Change{Before: v, Effect: Removed, Text: "removed: " + v.Reading()})
	}
	return list
}

type matcher struct {
	before, after []*Value // not matched yet
	pairs         [][2]*Value
	path          map[*Value]string // where it stands in the new tree
}

// sameKey matches values under one key; of several, in order.
func (m *matcher) sameKey() {
	type place struct{ path, key string }
	waiting := map[place][]*Value{}
	for _, v := range m.before {
		p := place{m.path[v], v.Key}
		waiting[p] = append(waiting[p], v)
	}
	var left []*Value
	matched := map[*Value]bool{}
	for _, v := range m.after {
		p := place{v.Place.Path, v.Key}
		if list := waiting[p]; len(list) > 0 {
			m.pairs = append(m.pairs, [2]*Value{list[0], v})
			matched[list[0]] = true
			waiting[p] = list[1:]
		} else {
			left = append(left, v)
		}
	}
	m.after = left
	m.before = slices.DeleteFunc(m.before, func(v *Value) bool { return matched[v] })
}

// by matches values with equal keys where there is one on each side.
func (m *matcher) by(key func(*Value) any) {
	old, now := groups(m.before, key), groups(m.after, key)
	matched := map[*Value]bool{}
	for _, v := range m.before {
		k := key(v)
		if len(old[k]) == 1 && len(now[k]) == 1 {
			m.pairs = append(m.pairs, [2]*Value{v, now[k][0]})
			matched[v], matched[now[k][0]] = true, true
		}
	}
	m.before = slices.DeleteFunc(m.before, func(v *Value) bool { return matched[v] })
	m.after = slices.DeleteFunc(m.after, func(v *Value) bool { return matched[v] })
}

func groups(values []*Value, key func(*Value) any) map[any][]*Value {
	g := map[any][]*Value{}
	for _, v := range values {
		g[key(v)] = append(g[key(v)], v)
	}
	return g
}

func numbersText(v *Value) string {
	text := ""
	for _, n := range v.Numbers {
		text += n.Text + " "
	}
	return text
}
