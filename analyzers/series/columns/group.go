package columns

import (
	"slices"
	"strings"

	"dextral/rules"
)

// kind is what a component is a component of.
type kind uint8

const (
	noKind     kind = iota
	quaternion      // components with letters
	angles
	matrix
	numbered // components of a quaternion with numbers
)

// component is what the name of one column says.
type component struct {
	kind   kind
	id     string       // w, x, 0, roll, 00
	by     rules.Source // strength of the word that says the kind; Shape if no word does
	column int
	key    string // the words with the component replaced: equal within a group
	stem   string
	label  string // the name as written without the component
}

// group is the components of one kind with equal keys, in column order.
type group struct {
	kind  kind
	parts []component
	names []name
}

// newGroups sorts the columns into groups, in the order of their first columns.
func newGroups(names []name) []*group {
	type id struct {
		kind kind
		key  string
	}
	index := map[id]*group{}
	var groups []*group
	for i, n := range names {
		for _, c := range components(n) {
			c.column = i
			g := index[id{c.kind, c.key}]
			if g == nil {
				g = &group{kind: c.kind, names: names}
				index[id{c.kind, c.key}] = g
				groups = append(groups, g)
			}
			g.parts = append(g.parts, c)
		}
	}
	return groups
}

// components says what a name may be a component of. Kinds do not exclude each
// other here: euler_x is an angle, rot_x could belong to a quaternion.
func components(n name) []component {
	if n.has(aside) || strings.Contains(n.unit, "/") || strings.Contains(n.unit, "^") {
		return nil
	}
	var found []component
	for _, of := range []func(name) (component, bool){quaternionComponent, angleComponent, matrixComponent, numberedComponent} {
		if c, ok := of(n); ok {
			found = append(found, c)
		}
	}
	return found
}

// component makes a component of the bytes from..to of the name, which lie in
// the words first..last.
func (n name) component(k kind, id string, by rules.Source, first, last, from, to int) component {
	var key, stem []string
	for i, w := range n.words {
		switch {
		case i > first && i <= last:
		case i == first:
			key = append(key, n.text[w.from:from]+"*")
		default:
			key = append(key, w.text)
			if !kindWords[w.text] {
				stem = append(stem, w.text)
			}
		}
	}
	label := strings.Trim(n.text[:from], "_-./:[( ") + n.text[to:]
	return component{
		kind: k, id: id, by: by,
		key:   strings.ToLower(strings.Join(key, " ")),
		stem:  strings.Join(stem, " "),
		label: strings.Trim(label, "_-./:[](){} "),
	}
}

// kindWords say what kind of thing a channel is, and not of which body.
var kindWords = set("q quat quats quaternion quaternions orientation ori attitude att rot rotation euler eul rpy ypr angle angles dcm rotmat matrix r t tf pose")

// channels are the channels that a group makes, mostly one, or none.
func (g *group) channels(columns []Column) []Channel {
	switch g.kind {
	case quaternion:
		return g.quaternions(columns)
	case angles:
		return g.angles(columns)
	case matrix:
		return g.matrices(columns)
	default:
		return g.numbered(columns)
	}
}

// pick returns the components with the given ids, and those ids that are
// missing. The second result is false if one of them is there twice.
func (g *group) pick(ids ...string) (found []component, missing []string, unique bool) {
	unique = true
	for _, id := range ids {
		n := 0
		for _, p := range g.parts {
			if p.id == id {
				if n == 0 {
					found = append(found, p)
				}
				n++
			}
		}
		if n == 0 {
			missing = append(missing, id)
		}
		unique = unique && n <= 1
	}
	return found, missing, unique
}

func (g *group) has(id string) bool {
	return slices.ContainsFunc(g.parts, func(p component) bool { return p.id == id })
}

// units are the different units of components.
func (g *group) units(parts []component) []string {
	var units []string
	for _, p := range parts {
		if u := g.names[p.column].unit; !slices.Contains(units, u) {
			units = append(units, u)
		}
	}
	return units
}

// channel makes a channel of components in the order of their numbers.
func (g *group) channel(columns []Column, parts []component) Channel {
	c := Channel{Stem: parts[0].stem}
	first, last := parts[0].column, parts[0].column
	for _, p := range parts {
		c.Columns = append(c.Columns, p.column)
		first, last = min(first, p.column), max(last, p.column)
	}
	c.Value.Key = parts[0].label
	if c.Value.Key == "" || g.kind == angles {
		texts := make([]string, len(parts))
		for i, p := range parts {
			texts[i] = g.names[p.column].text
		}
		c.Value.Key = strings.Join(texts, ",")
	}
	c.Value.Place = columns[first].Place.To(columns[last].Place)
	c.Value.KeyAt = c.Value.Place
	return c
}
