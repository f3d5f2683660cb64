package rules

import (
	"fmt"
	"slices"
	"strings"

	"dextral/core/convention"
)

// FrameName is the frame whose axes a triad states, by its key: body_axes and
// body.axes speak of body; "" if the key names none.
func (v *Value) FrameName() string {
	name := strings.ToLower(leaf(v.Key))
	for _, end := range []string{"axes", "frame", "convention", "triad"} {
		name = strings.TrimRight(strings.TrimSuffix(name, end), "_-")
	}
	if name == "" {
		return strings.ToLower(leaf(parent(v.Key)))
	}
	return name
}

// Hand is the handedness of a triad; unstated for other forms and for axes that lie
// in a plane.
func (v *Value) Hand() convention.Hand {
	m, ok := v.rotationPart()
	switch {
	case v.Form != convention.Triad || !ok || m.Det() == 0:
		return convention.HandUnstated
	case m.Det() > 0:
		return convention.RightHanded
	}
	return convention.LeftHanded
}

// CheckRigHands reports frames of a rig whose axes one file states right-handed and
// another left-handed.
func CheckRigHands(values []*Value) []*Finding {
	return slices.DeleteFunc(twoHands(values, true), func(f *Finding) bool { return f.Place.Path == f.Related[0].Place.Path })
}

// twoHands reports frames of one file, or of one rig, whose axes are stated twice with
// different handedness.
func twoHands(values []*Value, rig bool) []*Finding {
	first := map[string]*Value{}
	var found []*Finding
	sorted := slices.Clone(values)
	slices.SortFunc(sorted, func(a, b *Value) int { return a.Place.Compare(b.Place) })
	for _, v := range sorted {
		if v.Hand() == convention.HandUnstated || !v.Decided() || v.FrameName() == "" {
			continue
		}
		key := v.FrameName()
		if !rig {
			key = v.Place.Path + "\x00" + key
		}
		other := first[key]
		if other == nil {
			first[key] = v
			continue
		}
		if v.Hand() == other.Hand() {
			continue
		}
		m, _ := v.rotationPart()
		n, _ := other.rotationPart()
		claim, _ := v.FormClaim()
		f := finding(FrameOfTwoHands, v, claim, "%s and %s state the axes of one frame, %s; one triad is right-handed, the other left-handed, so that some direction is off by 180 deg", other.name(), v.name(), v.FrameName())
		f.Claim = "one frame with " + other.Key
		f.Related = []Related{{other.Place, fmt.Sprintf("%s: x . (y cross z) = %.3g", other.name(), n.Det())}}
		f.Evidence = []Evidence{{What: "x . (y cross z)", Stated: Plain(n.Det()), Computed: Plain(m.Det()), Residual: Plain(m.Det() - n.Det())}}
		f.Remedy = "reverse one axis of one of the two, or give the frames two names"
		found = append(found, f)
	}
	return found
}
