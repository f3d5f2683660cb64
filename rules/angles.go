package rules

import (
	"fmt"
	"math"
	"strconv"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/core/rotor"
)

// largeAngle judges three angles of a fixed orientation that are stated in radians:
// more than a full turn, in steps of five. Nobody mounts anything at 90 radians;
// somebody wrote degrees. An angle that a program has let run on is not a multiple of
// five, and degrees may run on as they like.
func largeAngle(v *Value) *Finding {
	claim, stated := v.Claims.On(convention.OfUnit)
	if !stated || v.Claims.Unit() != convention.Radian || v.Form != convention.Angles || len(v.Numbers) != 3 {
		return nil
	}
	worst := 0
	for i, n := range v.Numbers {
		if math.Abs(n.Value) > math.Abs(v.Numbers[worst].Value) {
			worst = i
		}
		if math.Mod(n.Value, 5) != 0 {
			return nil
		}
	}
	x := v.Numbers[worst]
	if math.Abs(x.Value) <= 2*math.Pi || math.Abs(x.Value) > 360 {
		return nil
	}
	wrapped, meant := angle.Wrap(x.Value), x.Value*math.Pi/180
	f := finding(AngleBeyondTurn, v, claim, "%s states an angle of %s radians, which is %s full turns and leaves %s; as degrees it is the round number that the others are too",
		v.name(), x.Text, significant(math.Abs(x.Value)/(2*math.Pi)), degrees(wrapped))
	f.Level = Warning // the numbers can be meant
	f.Evidence = []Evidence{{What: ordinal(worst) + " angle, wrapped", Stated: Degrees(meant), Computed: Degrees(wrapped), Residual: Degrees(angle.Wrap(wrapped - meant))}}
	f.Remedy = "if degrees are meant, convert them: " + x.Text + " deg is " + strconv.FormatFloat(meant, 'f', 7, 64) + " rad"
	return f
}

// outOfRange judges angles whose range somebody states. Without such a statement angles
// may run on as they like.
func outOfRange(v *Value) *Finding {
	claim, claimed := v.Claims.On(convention.OfRange)
	unit, limits := v.Claims.Unit(), v.Claims.Range()
	if !claimed || unit == convention.UnitUnstated || v.Form != convention.Angles {
		return nil
	}
	worst, beyond := -1, v.precision().Angle(unit)
	for i, n := range v.Numbers {
		x := n.Value * unit.InRadians()
		if by := math.Max(limits.Low-x, x-limits.High); by > beyond {
			worst, beyond = i, by
		}
	}
	if worst < 0 {
		return nil
	}
	x := v.Numbers[worst].Value * unit.InRadians()
	f := finding(AngleOutOfRange, v, claim, "%s states angles from %s, but the %s one is %s, which is %s outside; clamped to the range it turns by that much less",
		v.name(), limits, ordinal(worst), degrees(x), degrees(beyond))
	f.Evidence = []Evidence{{What: ordinal(worst) + " angle, at the end of the range", Stated: Degrees(math.Min(math.Max(x, limits.Low), limits.High)), Computed: Degrees(x), Residual: Degrees(math.Max(x-limits.High, limits.Low-x))}}
	f.Remedy = "correct the angle, or the range that is stated"
	if turned := x - 2*math.Pi*math.Ceil((x-limits.High)/(2*math.Pi)); x > limits.High && turned >= limits.Low {
		f.Remedy = "within the range the same turn is " + degrees(turned)
	} else if turned := x + 2*math.Pi*math.Ceil((limits.Low-x)/(2*math.Pi)); x < limits.Low && turned <= limits.High {
		f.Remedy = "within the range the same turn is " + degrees(turned)
	}
	return f
}

// locked notes three angles at gimbal lock: only the sum or the difference of the
// outer two is determined, so that whoever computes angles from the rotation gets
// others. It speaks only where both outer angles say something.
func locked(v *Value) *Finding {
	if v.Form != convention.Angles || len(v.Numbers) != 3 || v.Claims.Unit() == convention.UnitUnstated {
		return nil
	}
	label := v.statement().Claim.Label
	if label == nil {
		return nil
	}
	u := v.Claims.Unit().InRadians()
	var n [3]float64
	for i, x := range v.Numbers {
		n[i] = x.Value * u
	}
	middle := -1
	for _, r := range label.Readings {
		if middle >= 0 && r.Order[1] != middle {
			return nil // which one is in the middle is open
		}
		middle = r.Order[1]
		if r.Seq.Proper() || math.Abs(math.Abs(angle.Wrap(n[middle]))-math.Pi/2) > v.precision().Angle(v.Claims.Unit()) {
			return nil
		}
	}
	a, b := (middle+1)%3, (middle+2)%3
	if middle < 0 || n[a] == 0 || n[b] == 0 {
		return nil
	}
	seq := label.Readings[0]
	same := seq.Numbers(seq.Rotor(n)) // what the rotation gives back
	return &Finding{
		Rule: GimbalLocked, Level: Note, Place: v.Place, Key: v.Key,
		Message: fmt.Sprintf("%s is at gimbal lock: its %s angle is %s, where the two others turn about one axis, so that only %s is determined",
			v.name(), ordinal(middle), degrees(n[middle]), kept(label.Readings, n, min(a, b), max(a, b))),
		Evidence: []Evidence{{What: "angles that the rotation gives back", Stated: Words(triple(n)), Computed: Words(triple(same.Numbers()))}},
		Remedy:   "state the orientation as a quaternion or a matrix, or set one of the two others to zero",
	}
}

// kept says what of the numbers a and b is determined at gimbal lock: the sum, if
// moving both by opposite amounts changes no rotation, else the difference. Readings
// about moving and about fixed axes may part here.
func kept(readings []angle.Reading, n [3]float64, a, b int) string {
	sums := 0
	for _, r := range readings {
		moved := n
		moved[a]++
		moved[b]--
		if rotor.Angle(r.Rotor(n), r.Rotor(moved)) < 1 { // 2 where the difference is kept
			sums++
		}
	}
	switch sums {
	case len(readings):
		return "their sum, " + degrees(angle.Wrap(n[a]+n[b])) + ","
	case 0:
		return "their difference, " + degrees(angle.Wrap(n[a]-n[b])) + ","
	}
	return "their sum or difference"
}

func triple(n [3]float64) string { return degrees(n[0]) + ", " + degrees(n[1]) + ", " + degrees(n[2]) }
