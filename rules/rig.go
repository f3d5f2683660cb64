package rules

import (
	"slices"

	"dextral/core/convention"
)

// CheckRig compares values across the files of one rig: those that state, in
// words, the orientation between the same two frames, either way round. Within
// one file the reader decides what belongs together, so groups that stand in
// one file are left to CheckValues.
func CheckRig(values []*Value) []*Finding {
	type frames struct{ a, b string }
	groups := map[frames][]*Value{}
	var order []frames
	for _, v := range values {
		c, ok := v.Claims.On(convention.OfDirection)
		if !ok || !c.Source.Stated() || !v.Decided() || !v.orients() || !finite(v) {
			continue
		}
		d := v.Claims.Direction()
		key := frames{min(d.To, d.From), max(d.To, d.From)}
		if groups[key] == nil {
			order = append(order, key)
		}
		groups[key] = append(groups[key], v)
	}
	var found []*Finding
	for _, key := range order {
		group := groups[key]
		slices.SortFunc(group, func(a, b *Value) int { return a.Place.Compare(b.Place) })
		if group[0].Place.Path != group[len(group)-1].Place.Path {
			found = append(found, checkGroup(group)...)
		}
	}
	return found
}
