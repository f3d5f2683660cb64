package literal

import (
	"go/ast"
	"go/types"
	"slices"
	"strings"

	"dextral/analyzers/claims"
	"dextral/core/convention"
	"dextral/rules"
)

// scattered finds orientations that are spread over several members: roll,
// pitch and yaw in three fields, qw, qx, qy and qz in four, an axis and its
// angle in two. It returns the names of the members that need no reading of
// their own.
func (w *walker) scattered(s site, members []member) map[string]bool {
	groups := map[string][]component{}
	var order []string
	for _, m := range members {
		c, ok := w.nameOf(m.name).Component()
		if !ok || !w.belongs(s, m, c) {
			continue
		}
		key := c.Group + "\x00" + string(rune('0'+c.Set))
		if groups[key] == nil {
			order = append(order, key)
		}
		groups[key] = append(groups[key], component{c, m})
	}
	for _, key := range order {
		if group := groups[key]; isLiteral(group[0].value) {
			w.triad(s, group)
		} else {
			w.components(s, group)
		}
	}
	return w.axisAngles(s, members)
}

// component is a member that plays a part in a value.
type component struct {
	claims.Component
	member
}

// belongs reports a name that is that of a component here: roll and qw speak
// for themselves; w and q0 need words of orientation before or around them, and
// x, y and z are axes in what is called a frame.
func (w *walker) belongs(s site, m member, c claims.Component) bool {
	switch c.Set {
	case claims.Turns, claims.QLetters:
		return true
	case claims.AxisSet:
		return isLiteral(m.value)
	case claims.Letters:
		return c.Lead != "" && w.nameOf(c.Lead).Orients() ||
			c.Index > 0 && isLiteral(m.value) && slices.ContainsFunc(s.labels, func(l label) bool { return w.nameOf(l.text).SpeaksOfAxes() })
	case claims.QDigits:
		return slices.ContainsFunc(s.labels, func(l label) bool { return w.nameOf(l.text).Orients() })
	}
	return false
}

func isLiteral(e ast.Expr) bool {
	_, ok := e.(*ast.CompositeLit)
	return ok
}

// components makes a value of the members of a group, if they are all there.
// Angles come in the order in which they are written, quaternions scalar first.
func (w *walker) components(s site, group []component) {
	size, form := 4, convention.Quaternion
	if group[0].Set == claims.Turns {
		size, form = 3, convention.Angles
	}
	byIndex := slices.SortedFunc(slices.Values(group), func(a, b component) int { return a.Index - b.Index })
	if len(group) != size {
		return
	}
	for i, c := range byIndex {
		if c.Index != i {
			return
		}
	}
	value := &rules.Value{Form: form}
	if form == convention.Quaternion {
		group = byIndex
	} else {
		slices.SortStableFunc(group, func(a, b component) int { return position(a.member) - position(b.member) })
		for i, c := range group {
			value.Roles[i] = c.Role
		}
	}
	w.assemble(s, group, value)
}

// position orders members as they are written; those left out come last.
func position(m member) int {
	if m.value == nil {
		return 1 << 40
	}
	return int(m.value.Pos())
}

// assemble makes one value of the members of a group.
func (w *walker) assemble(s site, group []component, value *rules.Value) {
	numbers, extent, st := w.collect(group)
	if st == absent {
		return
	}
	first := group[slices.IndexFunc(group, func(c component) bool { return c.value != nil })]
	inner := site{key: join(s.key, first.key()), group: s.group, labels: append([]label{first.label()}, s.labels...), onType: s.onType}
	for _, c := range group {
		inner.comments = append(inner.comments, c.comments...)
	}
	said := w.speech(inner)
	if said.denied() {
		return
	}
	if st == computed {
		w.skipped(extent, NotConstant)
		return
	}
	value.Numbers, value.Place = numbers, extent
	if value.Form == convention.Quaternion {
		value.Claims = append(value.Claims, named4(convention.ScalarFirst, extent))
		said.ordered = true
	}
	said.labels[0].name = w.nameOf(first.Lead) // the stem is that of all
	if unit := w.nameOf(first.name).Unit; unit != 0 {
		w.claim(value, unit, rules.Label, first.name, inner.labels[0].at)
	}
	w.finish(inner, said, inner.labels[0].stated(value.Form), value)
}

// key is the words that the members of a group share, or the first one's name.
func (c component) key() string {
	if c.Lead != "" {
		return c.Lead
	}
	return c.name
}

// named4 is what names of components say.
func named4(order convention.ScalarPlace, at rules.Place) rules.Claim {
	return rules.Claim{Says: order, Source: rules.Label, Text: "named components", Place: at}
}

// triad makes a value of three axes, each of three numbers.
func (w *walker) triad(s site, group []component) {
	slices.SortFunc(group, func(a, b component) int { return a.Index - b.Index })
	value := &rules.Value{Form: convention.Triad}
	for i, c := range group {
		x, ok := w.read(c.value)
		if len(group) != 3 || c.Index%3 != (group[0].Index+i)%3 || !isLiteral(c.value) || !ok || len(x.numbers) != 3 {
			return
		}
		value.Numbers = append(value.Numbers, x.numbers...)
		value.Place = cover(value.Place, w.place(c.value.Pos(), c.value.End()))
	}
	inner := site{key: join(s.key, group[0].key()), group: alone, labels: append([]label{group[0].label()}, s.labels...)}
	said := w.speech(inner)
	if !said.denied() {
		w.finish(inner, said, inner.labels[0].inferred(value.Form), value)
	}
}

// state says what can be read of a group's numbers.
type state uint8

const (
	absent   state = iota // none is written, or they are no numbers
	computed              // some are computed at run time
	known                 // all are constants
)

// collect reads the numbers of a group; those left out are zero. The extent
// reaches from the first to the last that is written.
func (w *walker) collect(group []component) (numbers []rules.Number, extent rules.Place, st state) {
	for _, c := range group {
		numbers = append(numbers, rules.Number{Text: "0"})
		if c.value == nil {
			continue
		}
		if !w.isNumber(c.value) {
			return nil, extent, absent
		}
		extent = cover(extent, w.place(c.value.Pos(), c.value.End()))
		n, ok := w.number(c.value)
		switch {
		case !ok:
			st = computed
		case st == absent:
			st = known
		}
		numbers[len(numbers)-1] = n
	}
	for i := range numbers {
		if numbers[i].Place.Path == "" {
			numbers[i].Place = extent
		}
	}
	return numbers, extent, st
}

// cover is the stretch that holds both places of one file.
func cover(a, b rules.Place) rules.Place {
	if a.Path == "" {
		return b
	}
	if a.Compare(b) > 0 {
		a, b = b, a
	}
	if b.EndLine < a.EndLine || b.EndLine == a.EndLine && b.EndColumn < a.EndColumn {
		return a
	}
	return a.To(b)
}

// isNumber reports an expression whose type is a number.
func (w *walker) isNumber(e ast.Expr) bool {
	t := w.pass.TypesInfo.TypeOf(e)
	if t == nil {
		return false
	}
	basic, ok := t.Underlying().(*types.Basic)
	return ok && basic.Info()&(types.IsInteger|types.IsFloat) != 0
}

// axisAngles finds an axis and its angle in two members whose names agree in
// their other words: Axis and AngleDeg, hingeAxis and hingeAngle. It returns the
// names of the axes.
func (w *walker) axisAngles(s site, members []member) map[string]bool {
	used := map[string]bool{}
	for _, axis := range members {
		lit, isLit := axis.value.(*ast.CompositeLit)
		lead, ok := cutFold(axis.name, "axis")
		if !isLit || !ok {
			continue
		}
		for _, turn := range members {
			if !isAngle(turn.name, lead) || turn.value == nil {
				continue
			}
			x, okAxis := w.read(lit)
			n, okAngle := w.number(turn.value)
			if okAxis && okAngle && len(x.numbers) == 3 {
				used[axis.name] = true
				w.axisAngle(s, lead, axis, turn, append(x.numbers, n))
			}
		}
	}
	return used
}

// isAngle reports the name of the angle that belongs to an axis: the same
// words, then angle, then perhaps a unit.
func isAngle(name, lead string) bool {
	if len(name) < len(lead) || !strings.EqualFold(name[:len(lead)], lead) {
		return false
	}
	switch strings.ToLower(name[len(lead):]) {
	case "angle", "angledeg", "anglerad", "angledegrees", "angleradians":
		return true
	}
	return false
}

func cutFold(name, suffix string) (string, bool) {
	at := len(name) - len(suffix)
	if at < 0 || !strings.EqualFold(name[at:], suffix) {
		return "", false
	}
	return name[:at], true
}

func (w *walker) axisAngle(s site, lead string, axis, turn member, numbers []rules.Number) {
	inner := site{key: join(s.key, axis.name), group: s.group, labels: []label{axis.label()}}
	inner.comments = append(slices.Clone(axis.comments), turn.comments...)
	said := w.speech(inner)
	if said.denied() {
		return
	}
	value := &rules.Value{Form: convention.AxisAngle, Numbers: numbers}
	value.Place = cover(w.place(axis.value.Pos(), axis.value.End()), numbers[3].Place)
	if unit := w.nameOf(turn.name).Unit; unit != 0 {
		w.claim(value, unit, rules.Label, turn.name, turn.label().at)
	}
	said.labels[0].name = w.nameOf(lead) // the stem is that of both
	v := axis.label().inferred(value.Form)
	if !isUnit(numbers[:3]) {
		v.why = lengthUnsaid
	}
	w.finish(inner, said, v, value)
}

// isUnit reports a length of one to within a per cent, far above any rounding
// and far below what somebody writes who leaves it to others to normalise.
func isUnit(numbers []rules.Number) bool {
	norm := 0.0
	for _, n := range numbers {
		norm += n.Value * n.Value
	}
	return norm > 0.98 && norm < 1.02
}
