package config

import (
	"slices"
	"strconv"
	"strings"

	"dextral/analyzers/claims"
	"dextral/analyzers/config/tree"
	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/rules"
)

// ccsds reads CCSDS Attitude Parameter Messages, in key-value notation and in
// XML: CCSDS 504.0-B-2 (2024), tables 3-3 and 7-3, annex F; and its first issue
// of 2008 as far as annex J of the second tells it.
//
// In both, the scalar is QC, angles are in degrees and turns are about moving
// axes. By annex F the quaternion, and the angles, "from A to B" turn the axes
// of A onto those of B: their active matrix has the axes of B as columns in A,
// v_A = R v_B. The first issue has a direction keyword, A2B or B2A, and leaves
// the meaning of the quaternion open, so that no direction is claimed for it.
func ccsds(w *walker, s *spot) {
	if s.node.Kind != tree.Map {
		return
	}
	if q := s.node.Get("QC"); q != nil {
		w.ccsdsQuaternion(s)
	}
	if q := s.node.Get("EULER_ROT_SEQ"); q != nil {
		w.ccsdsAngles(s, q)
	}
}

// ccsdsFrames are the frames from which and to which a block leads, and whether
// the second issue fixes what that means.
type ccsdsFrames struct {
	from, to string
	fixed    bool
}

func (f ccsdsFrames) terms() []convention.Term {
	if !f.fixed || f.from == "" || f.to == "" {
		return nil
	}
	return []convention.Term{convention.Direction{To: f.from, From: f.to}}
}

// ccsdsFrames reads the frames beside a block's numbers; in XML they stand one
// level further out.
func (w *walker) ccsdsFrames(s *spot, prefix string) ccsdsFrames {
	for p := s; p != nil; p = p.holder() {
		if a := attribute(p.node, "REF_FRAME_A"); a != "" {
			return ccsdsFrames{a, attribute(p.node, "REF_FRAME_B"), true}
		}
		if a := attribute(p.node, prefix+"FRAME_A"); a != "" {
			f := ccsdsFrames{from: a, to: attribute(p.node, prefix+"FRAME_B")}
			if attribute(p.node, prefix+"DIR") == "B2A" {
				f.from, f.to = f.to, f.from
			}
			return f
		}
	}
	return ccsdsFrames{}
}

// components reads entries of a map, in the given order.
func (w *walker) components(s *spot, keys ...string) ([]rules.Number, []part) {
	var x []rules.Number
	var parts []part
	for _, key := range keys {
		for i, e := range s.node.Entries {
			n, ok := w.doc.Number(ownText(e.Value))
			if e.Key == key && ok {
				x = append(x, n)
				parts = append(parts, part{entry: i, number: n})
				break
			}
		}
	}
	if len(x) != len(keys) {
		return nil, nil
	}
	return x, parts
}

// asWritten sorts three angles by where they stand.
func asWritten(x []rules.Number, parts []part, roles [3]angle.Role) ([]rules.Number, []part, [3]angle.Role) {
	order := []int{0, 1, 2}
	slices.SortFunc(order, func(i, j int) int { return parts[i].entry - parts[j].entry })
	var sorted [3]angle.Role
	var numbers []rules.Number
	var entries []part
	for k, i := range order {
		sorted[k] = roles[i]
		numbers, entries = append(numbers, x[i]), append(entries, parts[i])
	}
	return numbers, entries, sorted
}

// ownText is the text of an element with attributes, such as units, or the node
// itself.
func ownText(n *tree.Node) *tree.Node {
	if n.Kind == tree.Map {
		return n.Get("")
	}
	return n
}

func (w *walker) ccsdsQuaternion(s *spot) {
	x, parts := w.components(s, "QC", "Q1", "Q2", "Q3")
	if x == nil {
		return
	}
	frames := w.ccsdsFrames(s, "Q_")
	v := &rules.Value{Numbers: x}
	v.Claims = rules.Claims{{Says: convention.ScalarFirst, Source: rules.Format, Text: componentText + "Q1, Q2, Q3, QC", Place: x[0].Place}}
	w.keepBlock(s, parts, frames, fixed{title: "CCSDS 504.0-B, quaternion: unit, scalar QC", form: convention.Quaternion, terms: frames.terms()}, v)
}

func (w *walker) ccsdsAngles(s *spot, sequence *tree.Node) {
	order := []string{"ANGLE_1", "ANGLE_2", "ANGLE_3"}
	roles := [3]angle.Role{angle.RoleFirst, angle.RoleSecond, angle.RoleThird}
	x, parts := w.components(s, order...)
	if x == nil { // first issue: named by axis
		order = []string{"X_ANGLE", "Y_ANGLE", "Z_ANGLE"}
		roles = [3]angle.Role{angle.RoleX, angle.RoleY, angle.RoleZ}
		x, parts = w.components(s, order...)
	}
	if x == nil {
		return
	}
	x, parts, roles = asWritten(x, parts, roles)
	frames := w.ccsdsFrames(s, "EULER_")
	f := fixed{title: "CCSDS 504.0-B, Euler angles: moving axes, in degrees", form: convention.Angles, terms: append(frames.terms(), convention.Degree)}
	l, err := angle.ParseLabel("intrinsic "+strings.TrimSpace(sequence.Text), roles)
	if err != nil {
		f.why = "EULER_ROT_SEQ " + strconv.Quote(sequence.Text) + " names no sequence of these angles"
		w.warnings = append(w.warnings, Warning{w.doc.File.Place(sequence.Span), f.why + "; it must be three axes, none twice in a row"})
	} else {
		f.terms = append(f.terms, l)
	}
	v := &rules.Value{Numbers: x, Roles: roles}
	for _, p := range parts {
		e := s.node.Entries[p.entry]
		unit := e.Value.Tag + attribute(e.Value, "units")
		w.addTerm(convention.Angles, v, rules.Claim{Says: claims.UnitIn(unit), Source: rules.Label, Text: e.Key + " " + unit, Place: w.doc.File.Place(e.KeyAt)})
	}
	w.keepBlock(s, parts, frames, f, v)
}

// keepBlock keeps the value of a block. All blocks of a message hold at one
// epoch, so that those between the same frames state one orientation.
func (w *walker) keepBlock(s *spot, parts []part, frames ccsdsFrames, f fixed, v *rules.Value) {
	at := *s
	w.place(s, s, parts, v)
	if v.Key == "" {
		v.Key = map[convention.Form]string{convention.Quaternion: "Q1, Q2, Q3, QC", convention.Angles: "EULER_ROT_SEQ"}[f.form]
	}
	at.keyAt = s.node.Entries[parts[0].entry].KeyAt
	w.keep(&at, f, v)
	m := &w.members[len(w.members)-1]
	m.in, m.stem = "", frames.from+"_to_"+frames.to
	if frames == (ccsdsFrames{}) {
		m.in = v.Key
	}
}
