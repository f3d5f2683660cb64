package config

import (
	"dextral/analyzers/config/tree"
	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/rules"
)

// specification reads a format that fixes its own conventions. It is asked about
// every node of a tree and keeps the values that the format's text names; under
// it, nothing is read by custom.
type specification func(w *walker, s *spot)

// fixed is what a specification says about one value.
type fixed struct {
	title string // chapter and verse
	form  convention.Form
	by    rules.Source // of the claim to be of that form; Format unless the text only recommends it
	why   string       // why it stays undecided; "" if it does not
	terms []convention.Term
}

// keep keeps a value at a spot with what the specification says of it. What keys
// and comments say is added as usual: where they contradict the format, that is
// to be seen.
func (w *walker) keep(s *spot, f fixed, v *rules.Value) {
	if f.by == 0 {
		f.by = rules.Format
	}
	r := open(f.form, f.by, f.why)
	r.terms, r.title = f.terms, f.title
	w.describe(s, r, v)
}

// keyName is the key of a spot; of an item that of its list, of the text of an
// element that of the element.
func (s *spot) keyName() string {
	if s.in != nil && (s.index >= 0 || s.owner() != s) {
		return s.in.keyName()
	}
	return s.key
}

// rollPitchYaw are the names of three angles in the order in which most formats list them.
var rollPitchYaw = [3]angle.Role{angle.RoleRoll, angle.RolePitch, angle.RoleYaw}

// label is a full label of an angle sequence that a specification states.
func label(text string, roles [3]angle.Role) angle.Label {
	l, err := angle.ParseLabel(text, roles)
	if err != nil || !l.Full {
		panic("not a full label: " + text)
	}
	return l
}

// element is the nearest map around a spot, which in XML is the element that an
// attribute, or a child, belongs to.
func (s *spot) element() *spot { return s.holder() }

// attribute is the text of an attribute, or of a child that holds nothing else.
func attribute(n *tree.Node, key string) string {
	if v := n.Get(key); v != nil && v.Kind == tree.Scalar {
		return v.Text
	}
	return ""
}
