package rules

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"dextral/core/convention"
	"dextral/core/identify"
	"dextral/core/matrix"
	"dextral/core/rotor"
)

// Change is what became of one orientation value between two versions of a
// tree.
type Change struct {
	Before, After *Value // one of them nil: added, removed
	Effect        Effect
	Text          string  // what changed, with its numbers
	Angle         float64 // rad: between the two orientations, in the reading where it is largest; 0 unless Effect is Turned or Open
	Shift         float64 // of rigid transforms: how far the translation moved, in its unit
	Moved         bool    // it stands under another path or key
}

// Effect is what a change does to the orientation that is stated.
type Effect uint8

// The effects, the harmless first.
const (
	Unturned Effect = iota // the same orientation: rewritten, renamed, moved
	Added
	Removed
	Open     // whether it is the same hangs on what nobody states
	Restated // of no rotation: numbers or claims are others
	Turned
	Mirrored // it became a mirror, or is none any longer
)

// String names the effect.
func (e Effect) String() string {
	return [...]string{"same orientation", "added", "removed", "cannot be decided", "restated", "turned", "mirrored"}[e]
}

// Real reports whether the orientation that is stated changed, or may have.
func (c *Change) Real() bool { return c.Effect >= Open }

// Value is the value that there is now, or was.
func (c *Change) Value() *Value {
	if c.After != nil {
		return c.After
	}
	return c.Before
}

// Explain says what became of a value. It tells by the numbers how they were
// rewritten, by the claims how their reading changed, and by the rotor core
// whether both together state the same rotation as before.
func Explain(before, after *Value) Change {
	c := Change{Before: before, After: after, Moved: before.Place.Path != after.Place.Path || before.Key != after.Key}
	parts := formDiff(before, after)
	pattern := rewritten(before, after)
	if pattern != "" {
		parts = append(parts, pattern)
	}
	parts = append(parts, claimDiff(before, after)...)
	explained := len(parts) > 0
	switch {
	case mirrorDiff(before, after) != "":
		c.Effect = Mirrored
		parts = append(parts, mirrorDiff(before, after))
	case sameText(before, after) && len(parts) == 0:
	case before.comparable() && after.comparable():
		parts = append(parts, c.turn(pattern != "", explained))
	case before.Form == convention.Axis && after.Form == convention.Axis && finite(before) && finite(after):
		parts = append(parts, c.axis())
	default:
		c.Effect = Restated
		if !explained {
			parts = append(parts, numberDiff(before, after))
		}
		if why := after.Why; why != "" {
			parts = append(parts, "what it states cannot be decided: "+why)
		}
	}
	if shift := translationDiff(before, after); shift > 0 {
		c.Shift = shift
		parts = append(parts, fmt.Sprintf("the translation moves by %s", significant(shift)))
		c.Effect = max(c.Effect, Restated)
	}
	if len(parts) == 0 && c.Moved {
		parts = []string{"moved, nothing else"}
	}
	c.Text = strings.Join(parts, "; ")
	return c
}

// comparable reports whether the value states an orientation that can be turned
// into rotors.
func (v *Value) comparable() bool {
	return v.Decided() && v.orients() && finite(v) && !v.zero() && len(v.stances()) > 0
}

// noticeable is what is worth printing of an angle that the digits leave open:
// 0.0001 degrees, the worth of float32.
const noticeable = 1e-4 * math.Pi / 180

// turn compares the two orientations in every reading that the claims leave
// open. pattern: the numbers were rewritten in a way that has a name; explained:
// so were they, or what is claimed.
func (c *Change) turn(pattern, explained bool) string {
	least, most := math.Inf(1), 0.0
	var turned pairOfRotors
	pairs := stancePairs(c.Before, c.After, pattern)
	for _, p := range pairs {
		if c.reversed() {
			p.after = p.after.Reverse()
		}
		angle := rotor.Angle(p.before, p.after)
		least = min(least, angle)
		if angle >= most {
			most, turned = angle, p
		}
	}
	open := c.Before.tolerance() + c.After.tolerance()
	if c.Before.Form == c.After.Form && !explained {
		open = noticeable // somebody edited the digits, so that they are meant
	}
	switch {
	case most <= min(open, noticeable):
		return "the same rotation"
	case most <= open:
		return "the same rotation, to " + degrees(most)
	case least <= open && sameText(c.Before, c.After) && narrowed(c.Before, c.After):
		return "the numbers stay, and so does the rotation if they were read so before"
	case least <= open:
		c.Effect, c.Angle = Open, most
		return fmt.Sprintf("nothing states how the numbers are read: the same rotation if their reader changed with them, else a turn of %s", degrees(most))
	}
	c.Effect, c.Angle = Turned, most
	by := degrees(most)
	if most-least > open {
		by = fmt.Sprintf("%s to %s, depending on the reading", degrees(least), degrees(most))
	}
	if explained {
		return "a turn of " + by
	}
	return c.cause(turned, by, open)
}

// reversed reports whether the two values state opposite directions between the
// same frames.
func (c *Change) reversed() bool {
	was, is := c.Before.Claims.Direction(), c.After.Claims.Direction()
	return was.Stated() && is.Stated() && was.To != was.From && is == was.Reverse()
}

// cause explains a turn that is no plain rewriting of the numbers.
func (c *Change) cause(p pairOfRotors, by string, open float64) string {
	if words := remapWords(p, open); words != "" {
		return words + ", a turn of " + by
	}
	switch r := Compare(c.Before, c.After); {
	case r.Verdict == identify.AgreeInverse:
		return "the direction is reversed, a turn of " + by
	case r.Verdict == identify.Contradicted && r.Decided:
		return fmt.Sprintf("old and new agree only %s; as stated, a turn of %s", r.Best, by)
	}
	return turnWords(p, by, c.After.Claims.Direction())
}

func (c *Change) axis() string {
	a, b := c.Before.Floats(), c.After.Floats()
	angle := rotor.Vec{X: a[0], Y: a[1], Z: a[2]}.Angle(rotor.Vec{X: b[0], Y: b[1], Z: b[2]})
	if angle <= c.Before.precision().Axis()+c.After.precision().Axis() {
		return "the same axis"
	}
	c.Effect, c.Angle = Turned, angle
	return "the axis turns by " + degrees(angle)
}

func formDiff(a, b *Value) []string {
	if a.Form == b.Form {
		return nil
	}
	return []string{fmt.Sprintf("%s became %s", a.Form, b.Form)}
}

// claimDiff lists the subjects on which something else is claimed than before.
func claimDiff(a, b *Value) []string {
	var parts []string
	for _, s := range convention.Subjects() {
		if s == convention.OfForm {
			continue
		}
		was, had := a.Claims.On(s)
		is, has := b.Claims.On(s)
		switch {
		case had && has && was.Says.String() != is.Says.String():
			parts = append(parts, fmt.Sprintf("the %s was %s and is %s", s, was.Says, is.Says))
		case had && !has && a.Form == b.Form:
			parts = append(parts, fmt.Sprintf("the %s was %s and is not stated now", s, was.Says))
		case !had && has && a.Form == b.Form:
			parts = append(parts, fmt.Sprintf("the %s is now stated: %s", s, is.Says))
		}
	}
	return parts
}

// mirrorDiff says if a matrix became a mirror or stopped being one.
func mirrorDiff(a, b *Value) string {
	m, okA := a.rotationPart()
	n, okB := b.rotationPart()
	if !okA || !okB || !finite(a) || !finite(b) || m.Det() == 0 || n.Det() == 0 || m.Det() > 0 == (n.Det() > 0) {
		return ""
	}
	if n.Det() < 0 {
		return fmt.Sprintf("it mirrors now: the determinant was %.4g and is %.4g", m.Det(), n.Det())
	}
	return fmt.Sprintf("it no longer mirrors: the determinant was %.4g and is %.4g", m.Det(), n.Det())
}

func translationDiff(a, b *Value) float64 {
	t, slackA, okA := a.translation()
	u, slackB, okB := b.translation()
	if !okA || !okB || !finite(a) || !finite(b) {
		return 0
	}
	if d := u.Sub(t).Norm(); d > slackA+slackB {
		return d
	}
	return 0
}

// numberDiff counts the numbers that are others.
func numberDiff(a, b *Value) string {
	if len(a.Numbers) != len(b.Numbers) {
		return fmt.Sprintf("%d numbers became %d", len(a.Numbers), len(b.Numbers))
	}
	n := 0
	for i := range a.Numbers {
		if !same(a.Numbers[i].Value, b.Numbers[i].Value) {
			n++
		}
	}
	return fmt.Sprintf("%d of %d numbers are others", n, len(a.Numbers))
}

func same(a, b float64) bool { return a == b || math.IsNaN(a) && math.IsNaN(b) }

// sameText reports whether the numbers are the same, to the digit.
func sameText(a, b *Value) bool {
	return slices.EqualFunc(a.Numbers, b.Numbers, func(x, y Number) bool { return x.Text == y.Text || same(x.Value, y.Value) })
}

// stance is one way to take a value as a rotation, named by what the claims leave
// open.
type stance struct {
	scalar  convention.ScalarPlace
	unit    convention.Unit
	reading string
	rotor.Rotor
}

type pairOfRotors struct{ before, after rotor.Rotor }

// stancePairs matches the readings of two values. What nobody states is read one
// way before and after, unless the numbers were rewritten as a change of that
// convention would: their reader may have changed with them.
func stancePairs(a, b *Value, rewritten bool) []pairOfRotors {
	before, after := a.stances(), b.stances()
	labels := slices.EqualFunc(before, after, func(x, y stance) bool { return x.reading == y.reading })
	var pairs []pairOfRotors
	for _, x := range before {
		for _, y := range after {
			free := rewritten && a.Form == b.Form && a.Form != convention.Angles
			scalar := free || x.scalar == 0 || y.scalar == 0 || x.scalar == y.scalar
			unit := x.unit == 0 || y.unit == 0 || x.unit == y.unit || rewritten
			reading := !labels || x.reading == y.reading
			if scalar && unit && reading {
				pairs = append(pairs, pairOfRotors{x.Rotor, y.Rotor})
			}
		}
	}
	return pairs
}

// narrowed reports whether one value has every reading of the other.
func narrowed(a, b *Value) bool {
	within := func(x, y []stance) bool {
		return !slices.ContainsFunc(x, func(s stance) bool {
			return !slices.ContainsFunc(y, func(t stance) bool { return rotor.Angle(s.Rotor, t.Rotor) < noticeable })
		})
	}
	x, y := a.stances(), b.stances()
	return within(x, y) || within(y, x)
}

// stances are the rotations that a value may state, by its claims. Angles of
// which nobody states a sequence have none.
func (v *Value) stances() []stance {
	x := v.Floats()
	var list []stance
	add := func(s stance, r rotor.Rotor) {
		if u, ok := r.Unit(); ok {
			s.Rotor = u
			list = append(list, s)
		}
	}
	switch v.Form {
	case convention.Quaternion:
		first, last := rotor.FromQuaternion(x[0], x[1], x[2], x[3]), rotor.FromQuaternion(x[3], x[0], x[1], x[2])
		switch v.Claims.Scalar() {
		case convention.ScalarFirst:
			add(stance{}, first)
		case convention.ScalarLast:
			add(stance{}, last)
		default:
			add(stance{scalar: convention.ScalarFirst}, first)
			add(stance{scalar: convention.ScalarLast}, last)
		}
	case convention.Rotation, convention.Transform:
		if m, ok := v.rotationPart(); ok && m.Det() > 0 {
			if near, _, ok := matrix.Nearest(m); ok {
				add(stance{}, near.Rotor())
			}
		}
	case convention.RotationVector, convention.AxisAngle, convention.Angles:
		if u := v.Claims.Unit(); u != convention.UnitUnstated {
			v.threeNumbers(x, stance{}, u, add)
			break
		}
		for _, u := range []convention.Unit{convention.Radian, convention.Degree} {
			v.threeNumbers(x, stance{unit: u}, u, add)
		}
	}
	return list
}

func (v *Value) threeNumbers(x []float64, s stance, u convention.Unit, add func(stance, rotor.Rotor)) {
	f := u.InRadians()
	vec := rotor.Vec{X: x[0], Y: x[1], Z: x[2]}
	switch v.Form {
	case convention.RotationVector:
		add(s, rotor.FromRotationVector(vec.Scale(f)))
	case convention.AxisAngle:
		if r, ok := rotor.FromAxisAngle(vec, x[3]*f); ok {
			add(s, r)
		}
	default:
		label := v.statement().Claim.Label
		if label == nil {
			return
		}
		for _, r := range label.Readings {
			s.reading = r.String()
			add(s, r.Rotor([3]float64{x[0] * f, x[1] * f, x[2] * f}))
		}
	}
}
