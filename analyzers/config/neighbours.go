package config

import (
	"slices"
	"strings"

	"dextral/analyzers/claims"
	"dextral/analyzers/config/tree"
	"dextral/analyzers/source"
	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/rules"
)

// teller is an entry of a map that tells about values beside it.
type teller struct {
	claims.Neighbour
	claim rules.Claim // to be filled in with what it says
	key   source.Span
}

// tellers are the tellers of a map, found once.
func (w *walker) tellers(m *tree.Node) []teller {
	found, done := w.told[m]
	if done {
		return found
	}
	for _, e := range m.Entries {
		key, value := e.Key, e.Value
		if key == "header" && value.Kind == tree.Map { // the stamp of a ROS message
			key, value = "frame_id", value.Get("frame_id")
		}
		if value == nil || value.Kind != tree.Scalar || e.KeyAt.Empty() {
			continue
		}
		if n, ok := w.name("", key).Neighbour(value.Text); ok {
			found = append(found, teller{n, rules.Claim{Source: rules.Sibling, Text: key + ": " + value.Text,
				Place: w.doc.File.Place(e.KeyAt.Cover(value.Span))}, e.KeyAt})
		}
	}
	w.told[m] = found
	return found
}

// eachNeighbour calls see for every key beside a spot, and inside it, that tells
// about its value: with what it says, and a claim to be filled in.
func (w *walker) eachNeighbour(s *spot, see func(claims.Neighbour, rules.Claim)) {
	var maps []*tree.Node
	if own := s.owner().node; own.Kind == tree.Map {
		maps = append(maps, own)
	}
	if h := s.holder(); h != nil && !slices.Contains(maps, h.node) {
		maps = append(maps, h.node)
	}
	for _, m := range maps {
		for _, t := range w.tellers(m) {
			if t.key != s.keyAt && (t.Stem == "" || t.Stem == w.nameOf(s).Stem) {
				see(t.Neighbour, t.claim)
			}
		}
	}
}

// neighbourTerms adds what the neighbouring keys say.
func (w *walker) neighbourTerms(s *spot, f convention.Form, v *rules.Value) {
	w.eachNeighbour(s, func(n claims.Neighbour, c rules.Claim) {
		for _, t := range []convention.Term{n.Scalar, n.Unit, n.Storage, n.Product, n.Hand} {
			c.Says = t
			w.addTerm(f, v, c)
		}
		if f == convention.Angles && v.Roles == ([3]angle.Role{}) {
			v.Roles = n.Roles
		}
	})
	w.farUnit(s, f, v)
	w.frames(s, f, v)
}

// farUnit looks for the unit of all angles further out: angle_unit: deg at the
// head of a file.
func (w *walker) farUnit(s *spot, f convention.Form, v *rules.Value) {
	for h := s.holder(); h != nil; h = h.holder() {
		for _, t := range w.tellers(h.node) {
			if t.Angular && t.Stem == "" {
				t.claim.Says = t.Unit
				w.addTerm(f, v, t.claim)
			}
		}
	}
}

// frames looks for the two frames of a transform: beside the value, or around
// the map that holds it, as in {header: {frame_id}, child_frame_id, transform:
// {rotation}}.
func (w *walker) frames(s *spot, f convention.Form, v *rules.Value) {
	const levels = 2
	h := s.holder()
	for range levels {
		if h == nil {
			return
		}
		d, c := w.framesIn(h.node)
		if d.Stated() {
			c.Says = d
			w.addTerm(f, v, c)
			return
		}
		if d != (convention.Direction{}) {
			return // half of a statement is about this level
		}
		h = h.holder()
	}
}

// framesIn reads the two frames that a map names.
func (w *walker) framesIn(m *tree.Node) (convention.Direction, rules.Claim) {
	var d convention.Direction
	c := rules.Claim{Source: rules.Sibling}
	for _, t := range w.tellers(m) {
		if t.To+t.From == "" {
			continue
		}
		if t.To != "" {
			d.To = t.To
		} else {
			d.From = t.From
		}
		c.Text = strings.TrimPrefix(c.Text+", "+t.claim.Text, ", ")
		if c.Place.Line == 0 {
			c.Place = t.claim.Place
		} else {
			c.Place = c.Place.To(t.claim.Place)
		}
	}
	return d, c
}

// axisKind is the word for the kind of axes that a neighbouring key of its own
// gives: convention: intrinsic.
func (w *walker) axisKind(s *spot) string {
	kind := ""
	w.eachNeighbour(s, func(n claims.Neighbour, _ rules.Claim) {
		if n.AxisKind != "" {
			kind = n.AxisKind
		}
	})
	return kind
}
