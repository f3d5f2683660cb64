package columns

import (
	"fmt"
	"strings"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/rules"
)

// angleWord is a name for one of three angles.
type angleWord struct {
	role angle.Role
	id   string
	by   rules.Source
}

var angleWords = map[string]angleWord{
	"roll": {angle.RoleRoll, "roll", rules.Label}, "pitch": {angle.RolePitch, "pitch", rules.Label}, "yaw": {angle.RoleYaw, "yaw", rules.Label},
	"bank": {angle.RoleRoll, "bank", rules.Name}, "heading": {angle.RoleYaw, "heading", rules.Name}, "hdg": {angle.RoleYaw, "hdg", rules.Name},
	"phi": {angle.RoleRoll, "phi", rules.Name}, "theta": {angle.RolePitch, "theta", rules.Name}, "psi": {angle.RoleYaw, "psi", rules.Name},
}

// triples are the names that go together, the most telling first.
var triples = [][3][]string{
	{{"roll", "bank"}, {"pitch"}, {"yaw", "heading", "hdg"}},
	{{"phi"}, {"theta"}, {"psi"}},
	{{"x"}, {"y"}, {"z"}},
	{{"0"}, {"1"}, {"2"}},
}

// angleComponent looks for roll, pitch, yaw and the like anywhere in the name,
// and for x, y, z or 0, 1, 2 behind a word for three angles.
func angleComponent(n name) (component, bool) {
	for i := len(n.words) - 1; i >= 0; i-- {
		w := n.words[i]
		if a, ok := angleWords[w.text]; ok {
			return n.component(angles, a.id, a.by, i, i, w.from, w.to), true
		}
	}
	for i := len(n.words) - 1; i >= 0; i-- {
		w := n.words[i]
		for _, marker := range []string{"euler", "eul", "rpy", "ypr"} {
			if id, ok := strings.CutPrefix(w.text, marker); ok && isAngleID(id) {
				return n.component(angles, id, rules.Label, i, i, w.from+len(marker), w.to), true
			}
		}
		if isAngleID(w.text) && n.has(tripleWords) {
			return n.component(angles, w.text, rules.Label, i, i, w.from, w.to), true
		}
	}
	return component{}, false
}

var tripleWords = set("euler eul rpy ypr")

func isAngleID(s string) bool { return len(s) == 1 && strings.Contains("xyz012", s) }

// angles reads a group as three angles.
func (g *group) angles(columns []Column) []Channel {
	for _, triple := range triples {
		var parts []component
		var missing []string
		unique := true
		for _, alternatives := range triple {
			part, ok, once := g.first(alternatives)
			unique = unique && once
			if !ok {
				missing = append(missing, alternatives[0])
				continue
			}
			parts = append(parts, part)
		}
		switch {
		case len(missing) == 1 && triple[0][0] != "x" && triple[0][0] != "0":
			c := g.channel(columns, parts)
			c.Value.Why = missing[0] + " is missing: two angles alone are no orientation"
			return []Channel{c}
		case len(missing) == 0:
			return []Channel{g.threeAngles(columns, parts, unique)}
		}
	}
	return nil
}

// first is the first of several names for an angle that the group has.
func (g *group) first(alternatives []string) (part component, ok, unique bool) {
	for _, id := range alternatives {
		if found, _, once := g.pick(id); len(found) > 0 {
			return found[0], true, once
		}
	}
	return component{}, false, true
}

func (g *group) threeAngles(columns []Column, parts []component, unique bool) Channel {
	parts = inColumnOrder(parts)
	c := g.channel(columns, parts)
	v := &c.Value
	v.Form = convention.Angles
	by := rules.Label
	for i, p := range parts {
		v.Roles[i] = g.role(p)
		by = min(by, p.by)
	}
	first := columns[parts[0].column]
	texts := make([]string, len(parts))
	for i, p := range parts {
		texts[i] = columns[p.column].Text
	}
	first.Text = strings.Join(texts, ", ")
	first.Place = v.Place
	v.Claims = rules.Claims{said(convention.Angles, by, first)}
	if label, err := angle.Customary(v.Roles); err == nil {
		v.Claims = append(v.Claims, said(label, rules.Name, first))
	}
	units := g.units(parts)
	switch {
	case !unique:
		v.Why = twice
	case len(units) > 1:
		v.Why = fmt.Sprintf("the three angles have different units: %s", strings.Join(quoted(units), ", "))
	case units[0] == "deg":
		v.Claims = append(v.Claims, g.saidUnit(convention.Degree, columns, parts[0]))
	case units[0] == "rad":
		v.Claims = append(v.Claims, g.saidUnit(convention.Radian, columns, parts[0]))
	case !unitless(units[0]):
		v.Why = fmt.Sprintf("unit %q is neither degree nor radian", units[0])
	}
	return c
}

// saidUnit is the claim of a unit in a column's name, or in the row of units.
func (g *group) saidUnit(u convention.Unit, columns []Column, p component) rules.Claim {
	c := columns[p.column]
	if c.Unit != "" {
		c.Text += " " + c.Unit
	}
	return said(u, rules.Label, c)
}

// role is what an angle is called. Numbers count the angles of rpy and ypr, and
// the turns of others.
func (g *group) role(p component) angle.Role {
	if a, ok := angleWords[p.id]; ok {
		return a.role
	}
	if at := strings.Index("xyz", p.id); at >= 0 {
		return angle.RoleX + angle.Role(at)
	}
	at := angle.Role(p.id[0] - '0')
	switch {
	case strings.Contains(p.key, "rpy"):
		return angle.RoleRoll + at
	case strings.Contains(p.key, "ypr"):
		return angle.RoleYaw - at
	}
	return angle.RoleFirst + at
}

func inColumnOrder(parts []component) []component {
	for i := range parts {
		for j := i; j > 0 && parts[j].column < parts[j-1].column; j-- {
			parts[j], parts[j-1] = parts[j-1], parts[j]
		}
	}
	return parts
}

func quoted(texts []string) []string {
	out := make([]string, len(texts))
	for i, t := range texts {
		out[i] = fmt.Sprintf("%q", t)
	}
	return out
}
