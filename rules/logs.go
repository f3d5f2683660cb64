package rules

import (
	"fmt"
	"math"
	"strings"

	"dextral/core/convention"
	"dextral/core/identify"
	"dextral/core/kinematics"
	"dextral/core/tolerance"
)

// CheckSeries judges one orientation channel of a log by the fold of its rows.
func CheckSeries(s *Series) []*Finding {
	found := conflicts(&s.Value)
	if !s.Value.Decided() {
		return found
	}
	switch s.Value.Form {
	case convention.Quaternion:
		found = add(found, normLoss(s))
		found = add(found, signJumps(s))
		found = add(found, rowsNotFinite(s, s.Continuity.NonFinite, s.Continuity.Rows))
		found = append(found, leapsOf(s)...)
		found = add(found, checkRates(s))
	case convention.Rotation, convention.Transform:
		found = add(found, matrixRows(s))
		found = add(found, rowsNotFinite(s, s.Matrices.NonFinite, s.Matrices.NonFinite.Count+s.Matrices.Zero.Count+s.Matrices.Count))
	case convention.Angles:
		found = append(found, checkAngles(s)...)
	}
	return found
}

// placeOf is where a sample of rates stands; its time is in seconds.
func (s *Series) placeOf(x *identify.Sample) kinematics.Place {
	per := map[string]float64{"ms": 1e3, "us": 1e6, "ns": 1e9}[s.Unit]
	return kinematics.Place{Row: x.Row, T: x.T * max(per, 1)}
}

// at is the place of a row, with row number and time stamp.
func (s *Series) at(p kinematics.Place) Place {
	place := s.Value.Place
	if s.RowPlace != nil {
		place = s.RowPlace(p.Row)
	}
	place.Row = p.Row
	if s.Stamp != nil {
		place.Time = strings.TrimSpace(s.Stamp(p.T) + " " + s.Unit)
	}
	return place
}

func (s *Series) row(p kinematics.Place) string {
	if s.Stamp == nil {
		return fmt.Sprintf("row %d", p.Row)
	}
	return fmt.Sprintf("row %d (%s)", p.Row, s.at(p).Time)
}

func hazard(rule string, s *Series, at kinematics.Place, message string, args ...any) *Finding {
	return &Finding{Rule: rule, Level: Warning, Place: s.at(at), Key: s.Value.Key, Claim: "rotation at every row",
		Message: fmt.Sprintf(message, args...)}
}

// normLoss reports the row whose norm is farthest from one, if the digits of
// the log do not explain it.
func normLoss(s *Series) *Finding {
	c := &s.Continuity
	worst, ok := c.WorstNorm()
	if !ok {
		return nil
	}
	allowed := tolerance.Precision{Half: s.Half, Double: s.Value.Double}.Norm(4, 1)
	if math.Abs(worst.Value-1) <= allowed {
		return nil
	}
	f := hazard(NormLoss, s, worst.Place, "%s does not keep its unit norm: %s at row %d; put as it stands into the usual matrix formula it is off by up to %s",
		s.Value.name(), digits(worst.Value), worst.Row, degrees(worstMatrixFormulaExcess(worst.Value)))
	f.Evidence = []Evidence{
		{What: "norm farthest from one, " + s.row(worst.Place), Stated: Plain(1), Computed: Plain(worst.Value), Residual: Plain(worst.Value - 1)},
		{What: "least norm, " + s.row(c.MinNorm.Place), Stated: Plain(1), Computed: Plain(c.MinNorm.Value), Residual: Plain(c.MinNorm.Value - 1)},
		{What: "greatest norm, " + s.row(c.MaxNorm.Place), Stated: Plain(1), Computed: Plain(c.MaxNorm.Value), Residual: Plain(c.MaxNorm.Value - 1)},
		{What: "deviation that the digits written allow", Computed: Plain(allowed)},
	}
	f.Remedy = "normalise where the quaternion is integrated or filtered, not where it is used"
	return f
}

// listedRows bounds the rows listed under a finding on a log.
const listedRows = 8

// signJumps reports the jumps from R to -R of a channel.
func signJumps(s *Series) *Finding {
	c := &s.Continuity
	if c.JumpCount == 0 {
		return nil
	}
	first := c.Jumps[0]
	times := "once"
	if c.JumpCount > 1 {
		times = fmt.Sprintf("%d times", c.JumpCount)
	}
	f := hazard(SignJump, s, first.Place,
		"%s jumps from R to -R %s, first at row %d, where the rotation moves by %s; whoever interpolates or subtracts the numbers there sees a turn of %s",
		s.Value.name(), times, first.Row, degrees(first.Moved), degrees(2*math.Pi-first.Moved))
	for _, j := range c.Jumps[:min(c.JumpCount, listedRows)] {
		f.Evidence = append(f.Evidence, Evidence{What: s.row(j.Place), Stated: Degrees(j.Moved), Computed: Degrees(2 * j.Apparent), Residual: Degrees(2*j.Apparent - j.Moved)})
	}
	if rest := c.JumpCount - listedRows; rest > 0 {
		f.Evidence = append(f.Evidence, Evidence{What: fmt.Sprintf("and %d more rows", rest)})
	}
	f.Remedy = "R and -R are one rotation: choose the sign of each sample so that its scalar product with the sample before is not negative"
	if c.ForcedScalar() && s.Value.Claims.Scalar() != convention.ScalarUnstated { // else S is not known to be the scalar
		f.Evidence = append(f.Evidence, Evidence{What: "rows with a negative scalar", Computed: Plain(0)})
		f.Remedy += "; the scalar is nowhere negative, so the recorder seems to force its sign"
	}
	return f
}

// matrixRows judges the matrices of a channel: mirrors first, then the row
// that is farthest from orthonormal.
func matrixRows(s *Series) *Finding {
	m := &s.Matrices
	claim, claimed := s.Value.FormClaim()
	if m.Count == 0 || !claimed {
		return nil
	}
	precision := tolerance.Precision{Half: s.Half, Double: s.Value.Double}
	switch {
	case m.Mirrors.Count > 0:
		f := finding(MirroredRotation, &s.Value, claim, "%s claims a %s, but in %d of %d rows, first row %d, its determinant is negative (%.4g at the least): it mirrors; %s",
			s.Value.name(), s.Value.Form, m.Mirrors.Count, m.Count, m.Mirrors.First.Row, m.Det.Min.Value, mirrorEffect)
		f.Place = s.at(m.Mirrors.First)
		f.Evidence = []Evidence{
			{What: "least determinant, " + s.row(m.Det.Min.Place), Stated: Plain(1), Computed: Plain(m.Det.Min.Value), Residual: Plain(m.Det.Min.Value - 1)},
			{What: "greatest determinant, " + s.row(m.Det.Max.Place), Stated: Plain(1), Computed: Plain(m.Det.Max.Value), Residual: Plain(m.Det.Max.Value - 1)},
		}
		return f
	case m.Defect.Value > precision.Defect():
		// |M^T M - 1| = d bounds the angle between a column and that of the nearest
		// rotation by d/2 to first order (M = R (1+S), S symmetric, d = 2|S|).
		f := hazard(MatrixNotOrthonormal, s, m.Defect.Place, "%s does not stay orthonormal: |M^T M - 1| is %s at row %d, so that an axis can be off by %s",
			s.Value.name(), digits(m.Defect.Value), m.Defect.Row, degrees(m.Defect.Value/2))
		f.Evidence = []Evidence{
			{What: "greatest defect |M^T M - 1|, " + s.row(m.Defect.Place), Stated: Plain(0), Computed: Plain(m.Defect.Value)},
			{What: "defect that the digits written allow", Computed: Plain(precision.Defect())},
		}
		f.Remedy = "make it orthonormal where it is integrated or filtered, not where it is used"
		return f
	}
	return nil
}

// CheckClock judges the time stamps of a log that holds orientations.
func CheckClock(s *Series) []*Finding {
	c := s.Clock
	if c == nil || c.NonIncreasing() == 0 {
		return nil
	}
	first := c.Repeated.First
	if c.Repeated.Count == 0 || c.Reversed.Count > 0 && c.Reversed.First.Row < first.Row {
		first = c.Reversed.First
	}
	f := hazard(StampsNotIncreasing, s, first, "of %d time stamps %d repeat the one before and %d run backwards, first at row %d; a rate taken from neighbouring rows there is infinite or has the wrong sign",
		c.Count, c.Repeated.Count, c.Reversed.Count, first.Row)
	f.Key = c.Column
	f.Claim = "time stamps increase"
	for _, kind := range []struct {
		word  string
		tally kinematics.Tally
		at    [MaxStamps]kinematics.Place
	}{{"repeated", c.Repeated, c.RepeatedAt}, {"reversed", c.Reversed, c.ReversedAt}} {
		for _, p := range kind.at[:min(kind.tally.Count, 3)] {
			f.Evidence = append(f.Evidence, Evidence{What: kind.word, Computed: Words(s.row(p))})
		}
	}
	f.Remedy = "drop repeated rows and sort by time before taking differences; look for two recorders writing one file"
	return []*Finding{f}
}
