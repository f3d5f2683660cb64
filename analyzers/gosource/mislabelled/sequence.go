package mislabelled

import (
	"fmt"
	"regexp"
	"slices"
	"strings"

	"dextral/analyzers/claims"
	"dextral/analyzers/gosource/measure"
	"dextral/analyzers/gosource/named"
	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/core/operation"
	"dextral/core/rotor"
	"dextral/rules"
)

// turns is the reading of a conversion of angles.
func (f *function) turns() (operation.Reading, bool) {
	r, ok := f.one()
	return r, ok && r.Angles != nil && (r.Op == operation.FromAngles || r.Op == operation.AnglesOf)
}

// angles is the operand of three angles.
func (f *function) angles() measure.Operand {
	if f.c.Identity.Is(operation.AnglesOf) {
		return f.c.Out[0]
	}
	return f.c.In[0]
}

// computed is what the function does as one reading: the turns, and whether the
// rotation or its reverse is given.
func computed(r operation.Reading) angle.Reading {
	way := *r.Angles
	way.Inverse = r.Reversed[0]
	return way
}

// label is what somebody writes about a sequence.
type label struct {
	angle.Label
	by rules.Source
}

// labels reads what is said about the sequence, the comment first.
func (f *function) labels() []label {
	var all []label
	roles := rolesOf(f.angles().Names)
	if f.comment != nil {
		if l, ok := claims.SequenceIn(strings.Join(strings.Fields(f.comment.Text), " "), roles); ok {
			all = append(all, label{l, rules.Comment})
		}
	}
	texts := []string{claims.Read(f.Object.Name()).Sequence}
	for part := range strings.SplitSeq(f.c.Label, ", ") {
		if _, value, ok := strings.Cut(part, " == "); ok {
			texts = append(texts, strings.Join(named.Words(value), " "), value)
		}
	}
	for _, text := range texts {
		if l, err := angle.ParseLabel(text, roles); text != "" && err == nil {
			all = append(all, label{l, rules.Label})
		}
	}
	return all
}

// sequence holds the labels against what is computed.
func (f *function) sequence() *contradiction {
	r, ok := f.turns()
	if !ok {
		return nil
	}
	is := computed(r)
	for _, l := range f.labels() {
		if r.Negated == [3]bool{} && allowed(l.Label, is) {
			continue
		}
		if !l.Full && f.anyRoles(l, r) {
			continue
		}
		x := &contradiction{subject: "angle sequence", stated: l.String(), by: l.by, measured: words(r)}
		if l.Text != "" && l.Text != l.String() {
			x.stated = fmt.Sprintf("%q (%s)", l.Text, l.String())
		}
		if angle := effect(l.Label, r); angle > 0 {
			x.effect = fmt.Sprintf("for angles of 40, 25 and 60 deg the two are at least %.3g deg apart", angle*180/3.141592653589793)
		}
		return x
	}
	return nil
}

// allowed reports whether a label may mean what is computed. A full one states no
// direction.
func allowed(l angle.Label, is angle.Reading) bool {
	if l.Means(is) {
		return true
	}
	is.Inverse = !is.Inverse
	return l.Full && l.Means(is)
}

// anyRoles tries a bare label without names for the numbers, and with those of
// computer graphics, where yaw is about y, pitch about x and roll about z.
func (f *function) anyRoles(l label, r operation.Reading) bool {
	if r.Negated != [3]bool{} {
		return false
	}
	for _, roles := range [][3]angle.Role{{}, graphics(rolesOf(f.angles().Names))} {
		if again, err := angle.ParseLabel(l.Text, roles); err == nil && allowed(again, computed(r)) {
			return true
		}
	}
	return false
}

// words words what is computed.
func words(r operation.Reading) string {
	text := r.Angles.Listed().String()
	if r.Reversed[0] {
		text = "the reverse of " + text
	}
	for i, n := range r.Negated {
		if n {
			text += fmt.Sprintf(", number %d with its sign changed", i+1)
		}
	}
	return text
}

// effect is the least angle, over all readings of a label, between what it means
// and what is computed, for angles of 40, 25 and 60 degrees.
func effect(l angle.Label, r operation.Reading) float64 {
	const deg = 0.017453292519943295
	n := [3]float64{40 * deg, 25 * deg, 60 * deg}
	signed := n
	for i := range signed {
		if r.Negated[i] {
			signed[i] = -signed[i]
		}
	}
	is := computed(r).Rotor(signed)
	least := 4.0
	for _, reading := range l.Readings {
		a := rotor.Angle(reading.Rotor(n), is)
		if l.Full {
			a = min(a, rotor.Angle(reading.Rotor(n), is.Reverse()))
		}
		least = min(least, a)
	}
	return least
}

// axes are what an angle's name says it is about, in the custom of vehicles.
var axes = map[string]angle.Role{
	"roll": angle.RoleRoll, "bank": angle.RoleRoll, "pitch": angle.RolePitch, "elevation": angle.RolePitch,
	"yaw": angle.RoleYaw, "heading": angle.RoleYaw, "azimuth": angle.RoleYaw, "x": angle.RoleX, "y": angle.RoleY, "z": angle.RoleZ,
}

// rolesOf reads the names of three numbers; none if they do not name three.
func rolesOf(names []string) (roles [3]angle.Role) {
	var seen [10]bool
	for i, name := range names {
		if i > 2 {
			return [3]angle.Role{}
		}
		for _, w := range named.Words(name[strings.LastIndexByte(name, '.')+1:]) {
			if role, ok := axes[w]; ok {
				roles[i] = role
			}
		}
		if roles[i] == 0 || seen[roles[i]] || i > 0 && (roles[i] < angle.RoleX) != (roles[0] < angle.RoleX) {
			return [3]angle.Role{}
		}
		seen[roles[i]] = true
	}
	return roles
}

// graphics names the axes of roll, pitch and yaw where y is up.
func graphics(roles [3]angle.Role) [3]angle.Role {
	for i, r := range roles {
		switch r {
		case angle.RoleRoll:
			roles[i] = angle.RoleZ
		case angle.RolePitch:
			roles[i] = angle.RoleX
		case angle.RoleYaw:
			roles[i] = angle.RoleY
		}
	}
	return roles
}

// roles holds angles called roll, pitch and yaw to an axis each.
func (f *function) roles() *contradiction {
	r, ok := f.turns()
	roles := rolesOf(f.angles3())
	if !ok || roles == [3]angle.Role{} || roles[0] >= angle.RoleX || r.Angles.Seq.Proper() {
		return nil
	}
	for _, custom := range [][3]angle.Role{roles, graphics(roles)} {
		fits := true
		for turn, number := range r.Angles.Order {
			axis, _ := custom[number].Axis()
			fits = fits && axis == r.Angles.Seq.Axes[turn]
		}
		if fits {
			return nil
		}
	}
	var is []string
	for number := range 3 {
		turn := slices.Index(r.Angles.Order[:], number)
		is = append(is, fmt.Sprintf("%s about %s", f.angles().Names[number], r.Angles.Seq.Axes[turn]))
	}
	return &contradiction{subject: "axes of the angles", stated: fmt.Sprintf("%s, %s, %s", roles[0], roles[1], roles[2]), by: rules.Name, measured: "turns by " + strings.Join(is, ", ")}
}

func (f *function) angles3() []string {
	if _, ok := f.turns(); !ok {
		return nil
	}
	return f.angles().Names
}

// unit holds angles to the unit that their names or the comment state.
func (f *function) unit() *contradiction {
	r, ok := f.one()
	if !ok || r.Unit == convention.UnitUnstated || r.Scale != 0 && r.Scale != 1 {
		return nil
	}
	for _, o := range slices.Concat(f.c.In, f.c.Out) {
		if o.Kind != operation.Scalar && o.Kind != operation.Three {
			continue
		}
		for _, name := range append(slices.Clone(o.Names), o.Name) {
			if u := unitOf(name); u != convention.UnitUnstated && u != r.Unit {
				return &contradiction{subject: "unit", stated: u.String() + "s (" + name + ")", by: rules.Label, measured: "with angles in " + r.Unit.String() + "s"}
			}
		}
	}
	if f.comment != nil && inUnits.MatchString(f.comment.Text) && f.comment.Unit != convention.UnitUnstated && f.comment.Unit != r.Unit && !mentionsBoth(f.comment.Text) {
		return &contradiction{subject: "unit", stated: f.comment.Unit.String() + "s", by: rules.Comment, measured: "with angles in " + r.Unit.String() + "s"}
	}
	return nil
}

// inUnits finds a unit that is stated of something, as opposed to an example: "in
// degrees", "(rad)".
var inUnits = regexp.MustCompile(`(?i)(\bin |[(\[])\s*(deg|degs|degrees?|rad|rads|radians?)\b`)

// unitOf is the unit in the name of a number.
func unitOf(name string) convention.Unit {
	for _, w := range named.Words(name) {
		switch w {
		case "deg", "degs", "degree", "degrees":
			return convention.Degree
		case "rad", "rads", "radian", "radians":
			return convention.Radian
		}
	}
	return convention.UnitUnstated
}

// mentionsBoth reports whether a comment speaks of both units, whatever it says.
func mentionsBoth(text string) bool {
	text = strings.ToLower(text)
	return strings.Contains(text, "rad") && strings.Contains(text, "deg")
}
