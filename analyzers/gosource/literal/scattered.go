package literal

import (
	"go/ast"
	"go/types"
	"slices"
	"strings"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/rules"
)

// roleOf names what a member is called after: one of three angles.
var roleOf = map[string]angle.Role{
	"roll": angle.RoleRoll, "pitch": angle.RolePitch, "yaw": angle.RoleYaw, "heading": angle.RoleYaw, "bank": angle.RoleRoll,
	"phi": angle.RoleNone, "theta": angle.RoleNone, "psi": angle.RoleNone,
}

// unitOf are units as the last words of names.
var unitOf = map[string]convention.Unit{
	"deg": convention.Degree, "degs": convention.Degree, "degree": convention.Degree, "degrees": convention.Degree,
	"rad": convention.Radian, "rads": convention.Radian, "radian": convention.Radian, "radians": convention.Radian,
}

// slot is a member's part in a group: its key within the group, and what is
// left of its name.
type slot struct {
	part string // roll, w, axis
	stem string // the other words, which the members of a group share
	unit string // the unit word, if the name ends with one
}

// slotOf reads a member's name as [stem] part [unit]; false if no word is a part.
func slotOf(name string, isPart func(stem []string, word string) bool) (slot, bool) {
	words := split(name)
	unit := ""
	if n := len(words); n > 1 && unitOf[words[n-1]] != convention.UnitUnstated {
		unit, words = words[n-1], words[:n-1]
	}
	if len(words) == 0 {
		return slot{}, false
	}
	stem, last := words[:len(words)-1], words[len(words)-1]
	if !isPart(stem, last) || hasAny(stem, otherWords) {
		return slot{}, false
	}
	return slot{part: last, stem: strings.Join(stem, " "), unit: unit}, true
}

// scattered finds orientations spread over several members: roll, pitch and
// yaw in three fields, qw, qx, qy and qz in four, an axis and its angle in two.
// It returns the names of the members that need no reading of their own.
func (w *walker) scattered(s site, members []member) map[string]bool {
	used := map[string]bool{}
	w.triples(s, members)
	w.quadruples(s, members)
	w.axisAngles(s, members, used)
	return used
}

// gather groups members whose names differ in one part alone.
func gather(members []member, isPart func(stem []string, word string) bool) (groups map[slot][]member, order []slot) {
	groups = map[slot][]member{}
	for _, m := range members {
		at, ok := slotOf(m.name, isPart)
		if !ok {
			continue
		}
		at.part = ""
		if groups[at] == nil {
			order = append(order, at)
		}
		groups[at] = append(groups[at], m)
	}
	return groups, order
}

// partOf is the part that a member plays.
func partOf(m member) string {
	words := split(m.name)
	if n := len(words); n > 1 && unitOf[words[n-1]] != convention.UnitUnstated {
		return words[n-2]
	}
	return words[len(words)-1]
}

// triples finds three angles. Their order is that in which they are written.
func (w *walker) triples(s site, members []member) {
	groups, order := gather(members, func(_ []string, word string) bool { _, ok := roleOf[word]; return ok })
	for _, at := range order {
		group := groups[at]
		parts := make([]string, len(group))
		for i, m := range group {
			parts[i] = partOf(m)
		}
		slices.Sort(parts)
		switch strings.Join(parts, " ") {
		case "pitch roll yaw", "heading pitch roll", "bank heading pitch", "phi psi theta":
		default:
			continue
		}
		slices.SortStableFunc(group, func(a, b member) int { return position(a) - position(b) })
		value := &rules.Value{Form: convention.Angles}
		for i, m := range group {
			value.Roles[i] = roleOf[partOf(m)]
		}
		w.group(s, at, group, value)
	}
}

// position orders members as they are written; those left out come last.
func position(m member) int {
	if m.value == nil {
		return 1 << 40
	}
	return int(m.value.Pos())
}

// quadruples finds the four components of a quaternion among other members:
// qw, or w after a word that says so.
func (w *walker) quadruples(s site, members []member) {
	groups, order := gather(members, func(stem []string, word string) bool {
		if len(word) == 2 && word[0] == 'q' {
			return strings.Contains("wxyz", word[1:])
		}
		return len(word) == 1 && strings.Contains("wxyz", word) && (hasAny(stem, quaternionWords) || hasAny(stem, rotationWords) || len(stem) == 1 && stem[0] == "q")
	})
	for _, at := range order {
		group := groups[at]
		if len(group) != 4 {
			continue
		}
		slices.SortFunc(group, func(a, b member) int { return strings.Compare(letterOf(a), letterOf(b)) })
		if letterOf(group[0]) != "0" || letterOf(group[1]) != "x" || letterOf(group[2]) != "y" || letterOf(group[3]) != "z" {
			continue
		}
		w.group(s, at, group, &rules.Value{Form: convention.Quaternion})
	}
}

// letterOf is a component's letter, with the scalar before the others.
func letterOf(m member) string {
	part := partOf(m)
	letter := part[len(part)-1:]
	if letter == "w" {
		return "0"
	}
	return letter
}

// group makes one value of the members of a group.
func (w *walker) group(s site, at slot, group []member, value *rules.Value) {
	numbers, extent, state := w.collect(group)
	if state == absent {
		return
	}
	first := group[slices.IndexFunc(group, func(m member) bool { return m.value != nil })]
	if state == computed || s.loose && s.group == "" {
		w.skipped(extent, NotConstant)
		return
	}
	s.key = join(s.key, at.name(first))
	s.labels = append([]label{first.label()}, s.labels...)
	s.object = nil
	s.remarks = nil
	for _, m := range group {
		s.remarks = append(s.remarks, m.remarks...)
	}
	value.Numbers, value.Place = numbers, extent
	if value.Form == convention.Quaternion {
		value.Claims = append(value.Claims, scalarFirst(extent))
	}
	if unit := unitOf[at.unit]; unit != convention.UnitUnstated {
		value.Claims = append(value.Claims, rules.Claim{Says: unit, Source: rules.Label, Text: first.name, Place: w.labelPlace(s.labels[0], value)})
	}
	by := s.labels[0]
	w.finish(s, stated(value.Form, &by), value)
}

// scalarFirst is what names of components say.
func scalarFirst(at rules.Place) rules.Claim {
	return rules.Claim{Says: convention.ScalarFirst, Source: rules.Label, Text: "named components", Place: at}
}

// name is the key of a group: the words its members share, or the first name.
func (at slot) name(first member) string {
	if at.stem != "" {
		return strings.ReplaceAll(at.stem, " ", "_")
	}
	return first.name
}

func (m member) label() label {
	l := label{text: m.name, kind: ofValue}
	if m.ident != nil {
		l.from, l.to = m.ident.Pos(), m.ident.End()
	}
	return l
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
func (w *walker) collect(group []member) (numbers []rules.Number, extent rules.Place, st state) {
	st = absent
	for i, m := range group {
		numbers = append(numbers, rules.Number{Text: "0"})
		if m.value == nil {
			continue
		}
		if !w.isNumber(m.value) {
			return nil, extent, absent
		}
		at := w.place(m.value.Pos(), m.value.End())
		switch n, ok := w.number(m.value); {
		case !ok:
			st = computed
		case st == absent:
			st = known
			fallthrough
		default:
			numbers[i] = n
		}
		extent = cover(extent, at)
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
// their other words: Axis and AngleDeg, hingeAxis and hingeAngle.
func (w *walker) axisAngles(s site, members []member, used map[string]bool) {
	for _, axis := range members {
		a, ok := slotOf(axis.name, func(_ []string, word string) bool { return word == "axis" })
		lit, isLit := axis.value.(*ast.CompositeLit)
		if !ok || !isLit {
			continue
		}
		for _, angle := range members {
			b, ok := slotOf(angle.name, func(_ []string, word string) bool { return word == "angle" })
			if !ok || b.stem != a.stem || angle.value == nil {
				continue
			}
			x, okAxis := w.read(lit)
			n, okAngle := w.number(angle.value)
			if !okAxis || !okAngle || len(x.numbers) != 3 {
				continue
			}
			used[axis.name] = true
			w.axisAngle(s, b, axis, angle, append(x.numbers, n))
		}
	}
}

func (w *walker) axisAngle(s site, at slot, axis, angle member, numbers []rules.Number) {
	s.key = join(s.key, axis.name)
	s.labels = []label{axis.label()}
	s.object = nil
	s.remarks = append(slices.Clip(axis.remarks), angle.remarks...)
	extent := cover(w.place(axis.value.Pos(), axis.value.End()), numbers[3].Place)
	value := &rules.Value{Form: convention.AxisAngle, Numbers: numbers, Place: extent}
	if unit := unitOf[at.unit]; unit != convention.UnitUnstated {
		by := angle.label()
		value.Claims = append(value.Claims, rules.Claim{Says: unit, Source: rules.Label, Text: angle.name, Place: w.labelPlace(by, value)})
	}
	w.finish(s, inferred(value.Form, &s.labels[0]), value)
}
