package rules

import (
	"fmt"
	"math"

	"dextral/core/convention"
	"dextral/core/kinematics"
	"dextral/core/tolerance"
)

// CheckSeries judges one orientation channel of a log by the fold of its rows.
func CheckSeries(s *Series) []*Finding {
	found := conflicts(&s.Value)
	if !s.Value.Decided() || s.Value.Form != convention.Quaternion {
		return found
	}
	found = add(found, normLoss(s))
	return add(found, signJumps(s))
}

// at is the place of a row, with row number and time stamp.
func (s *Series) at(p kinematics.Place) Place {
	place := s.Value.Place
	if s.RowPlace != nil {
		place = s.RowPlace(p.Row)
	}
	place.Row = p.Row
	if s.Unit != "" {
		place.Time = fmt.Sprintf("%g %s", p.T, s.Unit)
	}
	return place
}

func (s *Series) row(p kinematics.Place) string {
	if s.Unit == "" {
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
	for _, j := range c.Jumps[:min(c.JumpCount, kinematics.MaxJumps)] {
		f.Evidence = append(f.Evidence, Evidence{What: s.row(j.Place), Stated: Degrees(j.Moved), Computed: Degrees(2 * j.Apparent), Residual: Degrees(2*j.Apparent - j.Moved)})
	}
	if rest := c.JumpCount - kinematics.MaxJumps; rest > 0 {
		f.Evidence = append(f.Evidence, Evidence{What: fmt.Sprintf("and %d more rows", rest)})
	}
	f.Remedy = "R and -R are one rotation: choose the sign of each sample so that its scalar product with the one before is not negative"
	if c.ForcedScalar() {
		f.Evidence = append(f.Evidence, Evidence{What: "rows with a negative scalar", Computed: Plain(0)})
		f.Remedy += "; the scalar is nowhere negative, so the recorder seems to force its sign"
	}
	return f
}
