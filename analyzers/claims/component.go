package claims

import (
	"strings"

	"dextral/core/angle"
)

// Set is a family of names for the numbers of one value.
type Set uint8

// The sets.
const (
	NoSet    Set = iota
	QLetters     // qw qx qy qz, qr qi qj qk
	QDigits      // q0 q1 q2 q3, scalar first
	Letters      // w x y z; only with words of orientation around them
	RLetters     // rx ry rz; angles only with words of angles around them
	Turns        // roll pitch yaw
	AxisSet      // x_axis y_axis z_axis
)

// Component is the place of a number in a value that is written name by name.
type Component struct {
	Set   Set
	Index int        // w, x, y, z; or the order of roll, pitch, yaw; or of the axes
	Role  angle.Role // of Turns
	Group string     // what the components of one value have in common: the words before, and the unit
	Lead  string     // the words before, as written
}

var components = map[string]Component{
	"qw": {Set: QLetters, Index: 0}, "qx": {Set: QLetters, Index: 1}, "qy": {Set: QLetters, Index: 2}, "qz": {Set: QLetters, Index: 3},
	"qr": {Set: QLetters, Index: 0}, "qi": {Set: QLetters, Index: 1}, "qj": {Set: QLetters, Index: 2}, "qk": {Set: QLetters, Index: 3},
	"q0": {Set: QDigits, Index: 0}, "q1": {Set: QDigits, Index: 1}, "q2": {Set: QDigits, Index: 2}, "q3": {Set: QDigits, Index: 3},
	"rx": {Set: RLetters, Index: 1}, "ry": {Set: RLetters, Index: 2}, "rz": {Set: RLetters, Index: 3},
	"w": {Set: Letters, Index: 0}, "x": {Set: Letters, Index: 1}, "y": {Set: Letters, Index: 2}, "z": {Set: Letters, Index: 3},
	"roll": {Set: Turns, Index: 0, Role: angle.RoleRoll}, "pitch": {Set: Turns, Index: 1, Role: angle.RolePitch},
	"yaw": {Set: Turns, Index: 2, Role: angle.RoleYaw}, "heading": {Set: Turns, Index: 2, Role: angle.RoleYaw},
}

// Component reports whether the name is that of one number, or axis, of a value.
// The word must stand last, but for a unit and the word angle: roll_channel is
// no angle.
func (n *Name) Component() (Component, bool) {
	if n.Not != "" {
		return Component{}, false
	}
	words := n.words
	for len(words) > 1 && lexicon[words[len(words)-1].text]&(degree|radian|otherUnit|angleWord) != 0 {
		words = words[:len(words)-1]
	}
	if len(words) == 0 {
		return Component{}, false
	}
	last := words[len(words)-1]
	c, ok := components[last.text]
	lead := words[:len(words)-1]
	if !ok && last.text == "axis" && len(lead) > 0 { // x_axis
		letter := components[lead[len(lead)-1].text]
		if letter.Set != Letters || letter.Index == 0 {
			return Component{}, false
		}
		c, ok = Component{Set: AxisSet, Index: letter.Index - 1}, true
		lead = lead[:len(lead)-1]
	}
	if !ok || n.tags&(axis|axes|mapping) != 0 && c.Set != AxisSet {
		return Component{}, false
	}
	var parts []string
	for _, w := range lead {
		parts = append(parts, w.raw)
	}
	c.Lead = strings.Join(parts, "_")
	c.Group = c.Lead + "\x00" + n.Unit.String() + n.BadUnit
	return c, true
}

// Orients reports whether the name speaks of an orientation, so that w, x, y, z
// under it are a quaternion.
func (n *Name) Orients() bool {
	return n.Not == "" && (n.any(quaternion|rotation|orientation) || n.sym == 'q')
}

// Turning reports whether x, y, z under the name are angles about these axes.
func (n *Name) Turning() bool { return n.Not == "" && n.any(euler) }

// Directional reports whether x, y, z under the name are the axes of a frame.
func (n *Name) Directional() bool { return n.Not == "" && n.any(axes|frameWord) }

// AxisAndAngle reports whether x, y, z and an angle under the name are axis and
// angle.
func (n *Name) AxisAndAngle() bool { return n.Not == "" && n.has(axis|angleWord) }

// Part is what one of a pair of keys is: the axis of a turn, or its angle.
type Part uint8

// The parts.
const (
	NoPart Part = iota
	AxisPart
	AnglePart
)

// AxisAnglePart reports whether the name is that of an axis or of an angle, and
// the words before, which a pair has in common.
func (n *Name) AxisAnglePart() (Part, string) {
	if n.Not != "" || len(n.words) == 0 {
		return NoPart, ""
	}
	part, lead := NoPart, ""
	for _, w := range n.words {
		switch {
		case part == NoPart && w.text == "axis":
			part = AxisPart
		case part == NoPart && (w.text == "angle" || w.text == "theta"):
			part = AnglePart
		case part == AnglePart && lexicon[w.text]&(degree|radian|otherUnit) != 0:
		case part != NoPart:
			return NoPart, ""
		default:
			lead += w.raw + "_"
		}
	}
	return part, lead
}
