package config

import (
	"slices"
	"strings"

	"dextral/analyzers/claims"
	"dextral/analyzers/config/tree"
	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/rules"
)

// componentText begins the text of the claim that named components settle the
// order of a quaternion.
const componentText = rules.ComponentText

// part is one entry of a map that is a number, or an axis, of a value.
type part struct {
	claims.Component
	entry  int
	name   *claims.Name
	number rules.Number   // of a scalar
	vector []rules.Number // of an axis
}

// named reads the values of a map that are written name by name: qw, qx, qy,
// qz; roll, pitch, yaw; x_axis, y_axis, z_axis; axis and angle. It reports which
// entries were taken whole.
func (w *walker) named(s *spot) map[int]bool {
	done := map[int]bool{}
	w.axisAngles(s, done)
	groups := map[string][]part{}
	var order []string
	for i, e := range s.node.Entries {
		p, ok := w.part(s, i, e)
		if !ok {
			continue
		}
		key := string(rune('0'+p.Set)) + p.Group
		if groups[key] == nil {
			order = append(order, key)
		}
		groups[key] = append(groups[key], p)
	}
	if len(groups) == 0 || w.barren(s) {
		return done
	}
	for _, key := range order {
		parts := groups[key]
		switch parts[0].Set {
		case claims.QLetters, claims.QDigits, claims.Letters:
			w.quaternion(s, parts)
		case claims.RLetters:
			if w.nameOf(s).Turning() && len(parts) == 3 {
				w.turnsAboutXYZ(s, parts)
			}
		case claims.Turns:
			w.turns(s, parts)
		case claims.AxisSet:
			w.triad(s, parts, done)
		}
	}
	return done
}

// barren reports whether nothing in a map is an orientation, by its own name or
// by one around it.
func (w *walker) barren(s *spot) bool { return w.nameOf(s).Deep || w.otherwise(s) }

// part reads an entry as a component.
func (w *walker) part(s *spot, i int, e tree.Entry) (part, bool) {
	if !mayBePart(e.Value) {
		return part{}, false
	}
	name := w.name("", e.Key)
	c, ok := name.Component()
	if !ok {
		return part{}, false
	}
	p := part{Component: c, entry: i, name: name}
	if c.Set == claims.Letters && w.nameOf(s).Directional() && c.Lead == "" && e.Value.Kind == tree.List {
		p.Set, p.Index = claims.AxisSet, c.Index-1
	}
	if p.Set == claims.AxisSet {
		p.vector = w.vector(e.Value)
		return p, p.vector != nil
	}
	p.number, ok = w.doc.Number(e.Value)
	return p, ok
}

// mayBePart reports whether a node may be a number or a vector of three. It looks
// at no word, which most entries of a file are thus spared.
func mayBePart(n *tree.Node) bool {
	if n.Kind == tree.Scalar {
		return n.Text != "" && strings.IndexByte("0123456789+-.NnIi", n.Text[0]) >= 0
	}
	return n.Kind == tree.List && len(n.Items) <= 3
}

// quaternion reads four components, or the x, y, z of something else.
func (w *walker) quaternion(s *spot, parts []part) {
	lead := w.name("", parts[0].Lead)
	if parts[0].Set == claims.Letters && !w.nameOf(s).Orients() && !lead.Orients() && w.typeBeside(s) != convention.Quaternion {
		if w.nameOf(s).Turning() && len(parts) == 3 {
			w.turnsAboutXYZ(s, parts)
		}
		return
	}
	if parts[0].Set == claims.QDigits && s.node.Get(strings.Replace(s.node.Entries[parts[0].entry].Key, "0", "4", 1)) != nil {
		return // q0 to q4 and on: joints
	}
	sorted := inOrder(parts, 4)
	if sorted == nil {
		if parts[0].Set == claims.Letters && len(parts) == 3 {
			w.undecidedXYZ(s, parts)
		}
		return
	}
	at := w.together(s, sorted)
	v := &rules.Value{Numbers: numbersOf(sorted)}
	text, place := w.keys(s, sorted)
	v.Claims = rules.Claims{{Says: convention.ScalarFirst, Source: rules.Label, Text: componentText + text, Place: place}}
	w.place(s, at, sorted, v)
	w.describe(at, read(convention.Quaternion, rules.Label), v)
}

// typeBeside is the form that a neighbouring key gives: type: quaternion.
func (w *walker) typeBeside(s *spot) convention.Form {
	form := convention.NoForm
	if w.code && w.typeName(s.node.Tag).Orients() {
		form = convention.Quaternion
	}
	w.eachNeighbour(s, func(n claims.Neighbour, _ rules.Claim) {
		if n.Form != convention.NoForm {
			form = n.Form
		}
	})
	return form
}

// undecidedXYZ keeps x, y, z under a name of orientation, perhaps with an angle
// beside them.
func (w *walker) undecidedXYZ(s *spot, parts []part) {
	m := open(convention.NoForm, rules.Name, "x, y, z under this name may be angles or a rotation vector")
	for _, e := range s.node.Entries {
		if e.Key == "th" || e.Key == "theta" || e.Key == "angle" {
			m = open(convention.NoForm, rules.Name, "x, y, z with an angle may be axis and angle, or a pointing direction with a turn about it")
		}
	}
	at := w.together(s, parts)
	v := &rules.Value{Numbers: numbersOf(parts)}
	w.place(s, at, parts, v)
	w.describe(at, m, v)
}

// turnsAboutXYZ reads euler: {x, y, z}.
func (w *walker) turnsAboutXYZ(s *spot, parts []part) {
	for i := range parts {
		parts[i].Role = angle.RoleX + angle.Role(parts[i].Index) - 1
	}
	w.turns(s, parts)
}

// turns reads roll, pitch and yaw, in the order in which they stand.
func (w *walker) turns(s *spot, parts []part) {
	var roles [3]angle.Role
	for i, p := range parts {
		if i == 3 || slices.Contains(roles[:i], p.Role) {
			return
		}
		roles[i] = p.Role
	}
	m := read(convention.Angles, rules.Label)
	switch {
	case len(parts) == 1:
		return // one angle is no orientation
	case len(parts) == 2:
		m.Why = "only " + roles[0].String() + " and " + roles[1].String() + " are given"
	case parts[0].name.BadUnit != "":
		m.Why = "angles in " + parts[0].name.BadUnit + " are not read"
	}
	at := w.together(s, parts)
	v := &rules.Value{Numbers: numbersOf(parts), Roles: roles}
	w.place(s, at, parts, v)
	if u := parts[0].name.Unit; u != convention.UnitUnstated {
		text, place := w.keys(s, parts)
		v.Claims = append(v.Claims, rules.Claim{Says: u, Source: rules.Label, Text: text, Place: place})
	}
	w.describe(at, m, v)
}

// triad reads three axes.
func (w *walker) triad(s *spot, parts []part, done map[int]bool) {
	sorted := inOrder(parts, 3)
	if sorted == nil {
		return
	}
	v := &rules.Value{Rows: 3, Cols: 3}
	for _, p := range sorted {
		v.Numbers = append(v.Numbers, p.vector...)
		done[p.entry] = true
	}
	at := w.together(s, sorted)
	w.place(s, at, sorted, v)
	w.describe(at, read(convention.Triad, rules.Label), v)
}

// axisAngles reads pairs of keys such as axis and angle_deg.
func (w *walker) axisAngles(s *spot, done map[int]bool) {
	for i, e := range s.node.Entries {
		axis := w.vector(e.Value)
		if axis == nil {
			continue
		}
		kind, lead := w.name("", e.Key).AxisAnglePart()
		if kind != claims.AxisPart || w.barren(s) {
			continue
		}
		for j, f := range s.node.Entries {
			name := w.name("", f.Key)
			other, otherLead := name.AxisAnglePart()
			turn, ok := w.doc.Number(f.Value)
			if other != claims.AnglePart || otherLead != lead || !ok {
				continue
			}
			parts := []part{{Component: claims.Component{Lead: strings.TrimSuffix(lead, "_")}, entry: i}, {entry: j, number: turn}}
			at := w.together(s, parts)
			v := &rules.Value{Numbers: append(slices.Clone(axis), turn)}
			w.place(s, at, parts, v)
			if name.Unit != convention.UnitUnstated {
				v.Claims = append(v.Claims, rules.Claim{Says: name.Unit, Source: rules.Label, Text: f.Key, Place: w.doc.File.Place(f.KeyAt)})
			}
			done[i] = true
			w.describe(at, read(convention.AxisAngle, rules.Label), v)
			break
		}
	}
}

// vector reads three numbers; nil for anything else.
func (w *walker) vector(n *tree.Node) []rules.Number {
	if n.Kind == tree.Scalar && len(n.Text) < len("0 0 1") {
		return nil
	}
	if x := w.doc.Numbers(n, 3); len(x) == 3 {
		return x
	}
	return nil
}

// inOrder sorts parts by their index; nil if they are not so many different ones.
func inOrder(parts []part, count int) []part {
	if len(parts) != count {
		return nil
	}
	sorted := slices.Clone(parts)
	slices.SortFunc(sorted, func(a, b part) int { return a.Index - b.Index })
	for i, p := range sorted {
		if p.Index != i {
			return nil
		}
	}
	return sorted
}

func numbersOf(parts []part) []rules.Number {
	var numbers []rules.Number
	for _, p := range parts {
		numbers = append(numbers, p.number)
	}
	return numbers
}

// together is the spot of a value whose parts stand in the map s: the map itself
// if it holds nothing else, so that its key names the value; else a spot inside
// it, named by the words that the parts have in common.
func (w *walker) together(s *spot, parts []part) *spot {
	at := *s
	for _, p := range parts {
		e := s.node.Entries[p.entry]
		at.parts = append(at.parts, e.KeyAt, e.Value.Span)
	}
	if parts[0].Lead == "" && !s.keyAt.Empty() && w.onlyParts(s, parts) {
		return &at
	}
	first := slices.MinFunc(parts, func(a, b part) int { return a.entry - b.entry })
	at.keyAt = s.node.Entries[first.entry].KeyAt
	at.in = s
	keys, _ := w.keys(s, parts)
	name := *w.name("", parts[0].Lead)
	if parts[0].Lead != "" {
		at.where = join(s.path(), parts[0].Lead)
	} else if w.nameOf(s).Text != "" {
		stem := name.Stem
		name = *w.nameOf(s) // what holds the parts may say more: lidar_to_imu: {x, y, z, qw, qx, qy, qz}
		name.Stem, keys = stem, name.Text+": "+keys
		at.where = s.path()
	} else {
		at.where = join(s.path(), keys)
	}
	name.Text = keys
	at.name = &name
	return &at
}

// onlyParts reports whether a map holds nothing but the parts and keys that tell
// about them.
func (w *walker) onlyParts(s *spot, parts []part) bool {
	for i, e := range s.node.Entries {
		if slices.ContainsFunc(parts, func(p part) bool { return p.entry == i }) {
			continue
		}
		if !slices.ContainsFunc(w.tellers(s.node), func(t teller) bool { return t.key == e.KeyAt }) {
			return false
		}
	}
	return true
}

// keys are the keys of parts, in file order, and the place of the first.
func (w *walker) keys(s *spot, parts []part) (string, rules.Place) {
	sorted := slices.Clone(parts)
	slices.SortFunc(sorted, func(a, b part) int { return a.entry - b.entry })
	var keys []string
	for _, p := range sorted {
		keys = append(keys, s.node.Entries[p.entry].Key)
	}
	return strings.Join(keys, ", "), w.doc.File.Place(s.node.Entries[sorted[0].entry].KeyAt)
}

// place sets the place of a value from its first part to its last.
func (w *walker) place(s, at *spot, parts []part, v *rules.Value) {
	span := s.node.Entries[parts[0].entry].Value.Span
	for _, p := range parts {
		span = span.Cover(s.node.Entries[p.entry].Value.Span)
	}
	v.Place, v.Key = w.doc.File.Place(span), at.path()
}
