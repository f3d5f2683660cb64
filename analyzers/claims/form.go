package claims

import (
	"strings"

	"dextral/core/convention"
	"dextral/rules"
)

// Shape is the arrangement of the numbers under a name.
type Shape uint8

// The shapes.
const (
	Three Shape = iota // three numbers
	Four               // four numbers
	Nine               // 3x3, or nine numbers
	Rigid              // 3x4 or 4x4, or twelve or sixteen numbers
)

// Meaning is what numbers claim to be.
type Meaning struct {
	Form   convention.Form
	Source rules.Source // who claims it
	Why    string       // why it stays undecided; "" if it does not
}

func labelled(f convention.Form) Meaning  { return Meaning{Form: f, Source: rules.Label} }
func customary(f convention.Form) Meaning { return Meaning{Form: f, Source: rules.Name} }

// Form says what numbers of a shape claim to be under the name. NoForm without
// a reason means that the name says nothing of orientations.
func (n *Name) Form(s Shape) Meaning {
	if n.Not != "" {
		if s == Nine || s == Rigid {
			return Meaning{Form: convention.Matrix, Source: rules.Name, Why: "the name says " + n.Not + ", which is no rotation"}
		}
		return Meaning{}
	}
	switch s {
	case Three:
		return n.three()
	case Four:
		return n.four()
	case Nine:
		return n.nine()
	}
	return n.rigid()
}

// has reports whether all the tags are there.
func (n *Name) has(tags tag) bool { return n.tags&tags == tags }

// any reports whether one of the tags is there.
func (n *Name) any(tags tag) bool { return n.tags&tags != 0 }

func (n *Name) three() Meaning {
	switch {
	case n.any(quaternion | dcm | matrixWord | mapping):
		return Meaning{}
	case n.any(rotvec), n.has(rotation | vector), n.has(axis | angleWord):
		return labelled(convention.RotationVector)
	case n.any(euler), n.Roles[0] != 0, n.Sequence != "", n.has(rotation | angleWord), n.has(orientation | angleWord), n.has(mounting | angleWord):
		return labelled(convention.Angles)
	case n.has(axis | unit):
		return labelled(convention.Axis)
	case n.has(axis | physical), n.has(axis | rotation):
		return customary(convention.Axis)
	case n.any(axis) && len(n.words) == 1:
		return Meaning{Form: convention.Axis, Source: rules.Name, Why: "nothing says that the axis has unit length"}
	case n.any(angleWord) && !n.any(physical|axis|axes|frameWord):
		return Meaning{Source: rules.Label, Why: "nothing says of which sequence these angles are"}
	case n.any(orientation) && !n.any(axes), n.any(rotation) && !n.any(axis|axes):
		return Meaning{Source: rules.Name, Why: "three numbers under this name may be angles or a rotation vector"}
	}
	return Meaning{}
}

func (n *Name) four() Meaning {
	switch {
	case n.any(matrixWord | dcm | mapping | euler):
		return Meaning{}
	case n.any(quaternion):
		return labelled(convention.Quaternion)
	case n.has(axis | angleWord):
		if n.order("angle", "axis") {
			return Meaning{Form: convention.AxisAngle, Source: rules.Label, Why: "whether the angle stands first or last is not said"}
		}
		return labelled(convention.AxisAngle)
	case n.any(angleWord | axis | axes | rotvec | vector):
		return Meaning{}
	case n.any(scalarOrder), n.any(rotation | orientation), n.sym == 'q' && !n.any(physical):
		return customary(convention.Quaternion)
	}
	return Meaning{}
}

// order reports whether a word stands before another.
func (n *Name) order(first, second string) bool {
	seen := false
	for _, w := range n.words {
		if w.text == first {
			seen = true
		}
		if w.text == second {
			return seen
		}
	}
	return false
}

func (n *Name) nine() Meaning {
	switch {
	case n.any(quaternion | rotvec | mapping):
		return Meaning{}
	case n.any(dcm | rotation), n.any(orientation):
		return labelled(convention.Rotation)
	case n.any(euler): // three angles were meant, and nine numbers came: a rotation all the same
		return customary(convention.Rotation)
	case n.sym == 'R', n.has(mounting | matrixWord), n.any(rigid):
		return customary(convention.Rotation)
	case n.any(matrixWord) && !n.any(transform):
		return n.bare()
	}
	return Meaning{}
}

func (n *Name) rigid() Meaning {
	switch {
	case n.any(quaternion | rotvec | mapping | euler):
		return Meaning{}
	case n.any(rigid):
		return labelled(convention.Transform)
	case n.any(transform | rotation | orientation | dcm), n.sym == 'T', n.sym == 'R', n.Direction.Stated():
		return customary(convention.Transform)
	case n.any(matrixWord):
		return n.bare()
	}
	return Meaning{}
}

// bare is a matrix that nobody calls a rotation.
func (n *Name) bare() Meaning {
	return Meaning{Form: convention.Matrix, Source: rules.Name, Why: "nothing says that this matrix is a rotation"}
}

// SpeaksOfMatrix reports whether the name, or the custom behind it, says that the
// numbers have rows and columns.
func (n *Name) SpeaksOfMatrix() bool {
	return n.any(matrixWord|dcm) || n.sym != 0 || notSymbols[strings.TrimRight(n.Text, "0123456789")] != ""
}
