package columns

import (
	"fmt"
	"strings"

	"dextral/core/convention"
	"dextral/rules"
)

// quaternionWords say that components belong to a quaternion.
var quaternionWords = map[string]rules.Source{
	"quaternion": rules.Label, "quaternions": rules.Label, "quat": rules.Label, "quats": rules.Label,
	"q": rules.Name, "orientation": rules.Name, "ori": rules.Name, "attitude": rules.Name, "att": rules.Name,
	"rotation": rules.Name, "rot": rules.Name,
}

// What components are called: s, r, scalar and real are the scalar beside x y z
// or i j k.
var (
	namedIDs    = set("w x y z s r i j k scalar real")
	numberedIDs = set("0 1 2 3 4 5 6 7 8 9")
)

// quaternionComponent looks for the component from the end of the name, where
// most names have it: as a word of its own (q_RS_w, orientation.x, q[0]) or
// behind the word for quaternion (qw, quat1).
func quaternionComponent(n name) (component, bool) { return n.quaternionPart(quaternion, namedIDs) }

// numberedComponent does the same for the components 0, 1, 2, 3.
func numberedComponent(n name) (component, bool) { return n.quaternionPart(numbered, numberedIDs) }

func (n name) quaternionPart(k kind, ids map[string]bool) (component, bool) {
	for i := len(n.words) - 1; i >= 0; i-- {
		w := n.words[i]
		for _, marker := range []string{"quaternion", "quat", "q"} {
			if id, ok := strings.CutPrefix(w.text, marker); ok && ids[id] {
				return n.component(k, id, quaternionWords[marker], i, i, w.from+len(marker), w.to), true
			}
		}
		if !ids[w.text] {
			continue
		}
		by := rules.Shape
		for j, other := range n.words {
			if strength := quaternionWords[other.text]; j != i && strength > by {
				by = strength
			}
		}
		return n.component(k, w.text, by, i, i, w.from, w.to), true
	}
	return component{}, false
}

// quaternions reads a group as a quaternion.
func (g *group) quaternions(columns []Column) []Channel {
	by := g.parts[0].by
	for _, vector := range [][]string{{"x", "y", "z"}, {"i", "j", "k"}} {
		axes, missing, unique := g.pick(vector...)
		if len(missing) > 0 {
			continue
		}
		for _, scalar := range []string{"w", "s", "scalar", "real", "r"} {
			if !g.has(scalar) {
				continue
			}
			first, _, once := g.pick(scalar)
			return g.named(columns, append(first, axes...), by, unique && once)
		}
		if by > rules.Shape && unitless(strings.Join(g.units(axes), "")) {
			c := g.channel(columns, axes)
			c.Value.Why = fmt.Sprintf("three components %s without a fourth: a quaternion whose scalar is not recorded, angles or a rotation vector; the names do not say", strings.Join(vector, ", "))
			return []Channel{c}
		}
		return nil
	}
	return nil
}

// named makes a quaternion of components whose names say which is the scalar.
func (g *group) named(columns []Column, parts []component, by rules.Source, unique bool) []Channel {
	for _, u := range g.units(parts) {
		if !unitless(u) {
			return nil // w, x, y, z of something that has a unit
		}
	}
	c := g.channel(columns, parts)
	c.Value.Form = convention.Quaternion
	c.Doubtful = by == rules.Shape
	text := columns[parts[0].column]
	c.Value.Claims = rules.Claims{said(convention.Quaternion, by, text), said(convention.ScalarFirst, rules.Label, text)}
	if !unique {
		c.Value.Why = twice
	}
	return []Channel{c}
}

// numbered makes a quaternion of components 0..3 or 1..4. By custom q0 is the
// scalar; of other words with numbers, which may be indices of an array in
// any order, custom says nothing. Longer rows of numbers are something else, such as
// the joints of an arm.
func (g *group) numbered(columns []Column) []Channel {
	by := g.parts[0].by
	if by == rules.Shape {
		return nil
	}
	ids := []string{"0", "1", "2", "3"}
	before, after := "", "4"
	if !g.has("0") {
		ids = []string{"1", "2", "3", "4"}
		before, after = "0", "5"
	}
	parts, missing, unique := g.pick(ids...)
	if len(missing) > 0 || g.has(before) || g.has(after) {
		return nil
	}
	for _, u := range g.units(parts) {
		if !unitless(u) {
			return nil
		}
	}
	c := g.channel(columns, parts)
	c.Value.Form = convention.Quaternion
	c.numbered, c.Doubtful = true, by < rules.Label
	first := columns[parts[0].column]
	c.Value.Claims = rules.Claims{said(convention.Quaternion, by, first)}
	if ids[0] == "0" && customaryScalar(parts[0].key) {
		c.Value.Claims = append(c.Value.Claims, said(convention.ScalarFirst, rules.Name, first))
	}
	if !unique {
		c.Value.Why = twice
	}
	return []Channel{c}
}

const twice = "a column of it stands in the header twice; which one is meant is not said"

// customaryScalar reports whether the word before the number is q: q0, q_0, q[0].
func customaryScalar(key string) bool {
	before, _, _ := strings.Cut(key, "*")
	words := strings.Fields(before)
	return len(words) > 0 && words[len(words)-1] == "q"
}
