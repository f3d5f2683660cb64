package config

import (
	"strings"

	"dextral/analyzers/claims"
	"dextral/analyzers/config/tree"
	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/rules"
)

// eachNeighbour calls see for every key beside a spot, and inside it, that tells
// about values: with what it says, and a claim to be filled in.
func (w *walker) eachNeighbour(s *spot, see func(claims.Neighbour, rules.Claim)) {
	holder := s.holder()
	if s.node.Kind == tree.Map {
		w.tellers(s.node, s, see)
	}
	if holder != nil && holder.node != s.node {
		w.tellers(holder.node, s, see)
	}
}

// tellers are the entries of a map that tell about a value.
func (w *walker) tellers(m *tree.Node, s *spot, see func(claims.Neighbour, rules.Claim)) {
	for _, e := range m.Entries {
		if e.Value.Kind != tree.Scalar || e.KeyAt == s.keyAt || e.KeyAt.Empty() {
			continue
		}
		n, ok := claims.ReadNeighbour(e.Key, e.Value.Text)
		if !ok || n.Stem != "" && n.Stem != s.name.Stem {
			continue
		}
		see(n, rules.Claim{Source: rules.Sibling, Text: e.Key + ": " + e.Value.Text, Place: w.doc.File.Place(e.KeyAt.Cover(e.Value.Span))})
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
		for _, e := range h.node.Entries {
			n, ok := claims.ReadNeighbour(e.Key, scalarText(e.Value))
			if ok && n.Angular && n.Stem == "" {
				w.addTerm(f, v, rules.Claim{Says: n.Unit, Source: rules.Sibling, Text: e.Key + ": " + e.Value.Text,
					Place: w.doc.File.Place(e.KeyAt.Cover(e.Value.Span))})
			}
		}
		if h.in == nil {
			return
		}
	}
}

func scalarText(n *tree.Node) string {
	if n.Kind == tree.Scalar {
		return n.Text
	}
	return ""
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

func (w *walker) framesIn(m *tree.Node) (convention.Direction, rules.Claim) {
	var d convention.Direction
	c := rules.Claim{Source: rules.Sibling}
	for _, e := range m.Entries {
		key, value := e.Key, scalarText(e.Value)
		if e.Key == "header" {
			key, value = "frame_id", scalarText(orEmpty(e.Value.Get("frame_id")))
		}
		n, ok := claims.ReadNeighbour(key, value)
		if !ok || n.To+n.From == "" {
			continue
		}
		if n.To != "" {
			d.To = n.To
		} else {
			d.From = n.From
		}
		c.Text = strings.TrimPrefix(c.Text+", "+key+": "+value, ", ")
		place := w.doc.File.Place(e.KeyAt.Cover(e.Value.Span))
		if c.Place.Line == 0 {
			c.Place = place
		} else {
			c.Place = c.Place.To(place)
		}
	}
	return d, c
}

func orEmpty(n *tree.Node) *tree.Node {
	if n == nil {
		return &tree.Node{}
	}
	return n
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
