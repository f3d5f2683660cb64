package rules

import (
	"fmt"
	"math"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/core/kinematics"
)

// checkAngles judges a series of angles by what its numbers reach.
func checkAngles(s *Series) []*Finding {
	var found []*Finding
	unit, ok := s.Value.Claims.On(convention.OfUnit)
	if !ok || len(s.Ranges) != 3 {
		return nil
	}
	if f := unitByRange(s, unit); f != nil {
		return add(found, f)
	}
	return add(found, lockPassage(s, unit))
}

// reach is the greatest size of a number, and where.
func (r *Range) reach() kinematics.Extreme {
	if math.Abs(r.Min.Value) > r.Max.Value {
		return kinematics.Extreme{Value: math.Abs(r.Min.Value), Place: r.Min.Place}
	}
	return r.Max
}

// pitchOf is the index of the angle called pitch, or -1.
func pitchOf(v *Value) int {
	for i, role := range v.Roles {
		if role == angle.RolePitch {
			return i
		}
	}
	return -1
}

// slack is 1 % for angles that overshoot their range by rounding or calibration.
const slack = 1.01

// unitByRange reports angles that by their ranges are in another unit than stated.
//
// Pitch is the middle angle, which no writer lets beyond a right angle: stated in radians, and
// beyond that, but within 90, while no angle exceeds 360 and one exceeds a full turn, they are
// degrees. Stated in degrees, and one angle wraps at pi, again and again, while all
// stay below two pi, they are radians.
func unitByRange(s *Series, unit Claim) *Finding {
	pitch := pitchOf(&s.Value)
	most := s.Ranges[0].reach()
	for i := range s.Ranges[1:] {
		if r := s.Ranges[i+1].reach(); r.Value > most.Value {
			most = r
		}
	}
	switch {
	case unit.Says == convention.Radian && pitch >= 0:
		p := s.Ranges[pitch].reach()
		if p.Value <= math.Pi/2*slack || p.Value > 90*slack || most.Value <= 2*math.Pi*slack || most.Value > 360*slack {
			return nil
		}
		f := finding(AngleUnitWrong, &s.Value, unit, "%s are stated in radians, but reach %s, and pitch %s: within 360 and 90 they are degrees; read as radians pitch is off by many turns",
			s.Value.name(), digits(most.Value), digits(p.Value))
		f.Evidence = []Evidence{
			{What: "greatest pitch, " + s.row(p.Place), Stated: Plain(math.Pi / 2), Computed: Plain(p.Value)},
			{What: "greatest angle, " + s.row(most.Place), Stated: Plain(2 * math.Pi), Computed: Plain(most.Value)},
		}
		f.Remedy = "correct the unit in the header, or write radians"
		return f
	case unit.Says == convention.Degree:
		w := s.Wraps
		if w.Count < 2 || most.Value > 2*math.Pi*slack {
			return nil
		}
		f := finding(AngleUnitWrong, &s.Value, unit, "%s are stated in degrees, but wrap %d times by 2 pi, first at row %d, and nowhere exceed %s: they are radians",
			s.Value.name(), w.Count, w.First.Row, digits(most.Value))
		f.Evidence = []Evidence{
			{What: "greatest angle, " + s.row(most.Place), Stated: Plain(180), Computed: Plain(most.Value)},
			{What: "first step by 2 pi, " + s.row(w.First), Computed: Plain(2 * math.Pi)},
		}
		f.Remedy = "correct the unit in the header, or write degrees"
		return f
	}
	return nil
}

// lockBand is how near a right angle pitch is worth a warning: there, the other two angles take
// up more than ten times an error of the orientation (1/cos 85 deg = 11.5).
const lockBand = 5 * math.Pi / 180

// lockPassage reports the row where pitch comes nearest to a right angle.
func lockPassage(s *Series, unit Claim) *Finding {
	u, ok := unit.Says.(convention.Unit)
	pitch := pitchOf(&s.Value)
	if !ok || pitch < 0 {
		return nil
	}
	p := s.Ranges[pitch].reach()
	off := math.Abs(p.Value*u.InRadians() - math.Pi/2)
	if p.Value*u.InRadians() > math.Pi/2*slack || off > lockBand { // beyond, pitch is no middle angle or not wrapped
		return nil
	}
	times := "without bound"
	if off > 1e-6 {
		times = fmt.Sprintf("%s times", digits(1/math.Sin(off)))
	}
	f := hazard(GimbalLock, s, p.Place, "pitch of %s comes within %s of a right angle at row %d, where the other two angles take up an error of the orientation %s",
		s.Value.name(), degrees(off), p.Row, times)
	f.Evidence = []Evidence{{What: "pitch nearest to a right angle, " + s.row(p.Place), Stated: Degrees(math.Pi / 2), Computed: Degrees(p.Value * u.InRadians()), Residual: Degrees(off)}}
	f.Remedy = "log a quaternion beside the angles, and do not difference or filter roll and yaw there"
	return f
}
