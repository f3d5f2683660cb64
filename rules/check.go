package rules

import (
	"cmp"
	"fmt"
	"slices"

	"dextral/core/convention"
)

// CheckValues judges every value of one file (or of one rig, or of one Go
// package) by itself and against its twins: the values with the same Of.
// The findings come in no particular order.
func CheckValues(values []*Value) []*Finding {
	var found []*Finding
	for _, v := range values {
		found = append(found, checkOne(v)...)
	}
	return append(append(found, twoHands(values, false)...), checkTwins(values)...)
}

// checkOne judges a value by itself.
func checkOne(v *Value) []*Finding {
	found := conflicts(v)
	if !v.Decided() {
		return found
	}
	if !finite(v) {
		return add(found, notFinite(v)) // nothing else can be computed
	}
	switch v.Form {
	case convention.Quaternion:
		found = add(found, rotorUnit(v))
	case convention.Axis:
		found = add(found, axisUnit(v, v.Floats()))
	case convention.AxisAngle:
		found = add(found, axisUnit(v, v.Floats()[:3]))
	case convention.Rotation:
		found = add(found, properRotation(v))
	case convention.Transform:
		found = add(add(add(found, properRotation(v)), storedByRows(v)), bottomRow(v))
	case convention.Angles:
		found = add(add(add(found, largeAngle(v)), outOfRange(v)), locked(v))
	case convention.Triad:
		found = add(found, triadHand(v))
	case convention.AxisMap:
		found = add(found, axisMapHand(v))
	}
	return found
}

func add(list []*Finding, f *Finding) []*Finding {
	if f == nil {
		return list
	}
	return append(list, f)
}

// finding starts a finding on a value. Its level follows the claim that is
// contradicted: stated claims make errors, inferred ones warnings.
func finding(rule string, v *Value, against Claim, message string, args ...any) *Finding {
	level := Warning
	if against.Source.Stated() {
		level = Error
	}
	return &Finding{
		Rule: rule, Level: level, Place: v.Place, Key: v.Key,
		Message: fmt.Sprintf(message, args...),
		Claim:   against.words(),
	}
}

// words names a claim for evidence: what it says and who says so.
func (c Claim) words() string {
	if c.Says == nil {
		return ""
	}
	if c.Text == "" {
		return fmt.Sprintf("%s, by %s", c.Says, c.Source)
	}
	return fmt.Sprintf("%s, by %s %q", c.Says, c.Source, c.Text)
}

// name is how messages call a value.
func (v *Value) name() string { return cmp.Or(v.Key, v.Form.String()) }

// conflicts reports stated claims about one value that contradict each other, and notes
// those that a neighbouring key contradicts.
func conflicts(v *Value) []*Finding {
	var found []*Finding
	for _, s := range convention.Subjects() {
		others := v.Claims.Conflicts(s)
		if len(others) == 0 {
			continue
		}
		best, _ := v.Claims.On(s)
		f := finding(ClaimsConflict, v, best, "%s: the %s is stated twice: %s; %s",
			v.name(), s, best.words(), others[0].words())
		if !slices.ContainsFunc(others, func(c Claim) bool { return c.Source.Stated() }) {
			f.Level = Note
		}
		f.Remedy = "make the statements agree; the stronger one, by " + best.Source.String() + ", decided how the value was read"
		f.Related = append(f.Related, Related{best.Place, "states " + best.Says.String()})
		for _, o := range others {
			f.Related = append(f.Related, Related{o.Place, "states " + o.Says.String()})
			f.Evidence = append(f.Evidence, Evidence{What: s.String(), Stated: Words(o.Says.String()), Computed: Words("read as " + best.Says.String())})
		}
		found = append(found, f)
	}
	return found
}

// twins returns the groups of decided values that state one orientation, each
// group and the list of groups in a stable order.
func twins(values []*Value) [][]*Value {
	byOrientation := map[string][]*Value{}
	for _, v := range values {
		if v.Of != "" && v.Decided() && v.orients() && finite(v) {
			key := v.Place.Path + "\x00" + v.Of
			byOrientation[key] = append(byOrientation[key], v)
		}
	}
	var groups [][]*Value
	for _, g := range byOrientation {
		if len(g) > 1 {
			slices.SortFunc(g, func(a, b *Value) int { return a.Place.Compare(b.Place) })
			groups = append(groups, g)
		}
	}
	slices.SortFunc(groups, func(a, b []*Value) int { return a[0].Place.Compare(b[0].Place) })
	return groups
}

// orients reports whether the value alone fixes an orientation.
func (v *Value) orients() bool {
	switch v.Form {
	case convention.Quaternion, convention.Rotation, convention.Transform, convention.Angles,
		convention.RotationVector, convention.AxisAngle:
		return true
	}
	return false
}
