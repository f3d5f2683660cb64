package rules

import (
	"fmt"
	"math"

	"dextral/core/kinematics"
)

const (
	// leastLeap is the least turn that is worth a warning as a jump: below two degrees
	// filters correct themselves at every fix.
	leastLeap = 2 * math.Pi / 180
	// staleRows is how many rows must repeat before the rest is called stale.
	staleRows = 8
)

// leapsOf judges the steps that stand out: rows that stood still and caught up, and
// jumps of the rotation. A jump where the log changes its convention is told there.
func leapsOf(s *Series) []*Finding {
	var jumps, stale []kinematics.Leap
	for _, l := range s.Continuity.StandingOut() {
		if l.Angle >= leastLeap && l.Same < staleRows && !changesAt(s, l.Row) {
			jumps = append(jumps, l)
		}
	}
	for _, l := range s.Continuity.Stale(staleRows) {
		if l.Angle >= leastLeap {
			stale = append(stale, l)
		}
	}
	var found []*Finding
	if len(jumps) > 0 {
		f := hazard(OrientationJump, s, jumps[0].Place, "%s jumps by %s at row %d, at least eight times as fast as it turns anywhere else%s",
			s.Value.name(), degrees(jumps[0].Angle), jumps[0].Row, more(len(jumps)))
		for _, l := range jumps {
			f.Evidence = append(f.Evidence, Evidence{What: "jump, " + s.row(l.Place), Computed: Degrees(l.Angle)})
		}
		f.Remedy = "look for a reset of the filter, rows that were lost, or two recordings in one file"
		found = append(found, f)
	}
	if len(stale) > 0 {
		first := stale[0]
		f := hazard(StaleRows, s, first.Before, "%s stands still for %d rows from row %d on and then catches up by %s in one step, at row %d%s",
			s.Value.name(), first.Same+1, first.Before.Row, degrees(first.Angle), first.Row, more(len(stale)))
		for _, l := range stale {
			f.Evidence = append(f.Evidence, Evidence{What: fmt.Sprintf("%d equal rows until %s", l.Same+1, s.row(l.Place)), Computed: Degrees(l.Angle)})
		}
		f.Remedy = "mark rows without a new orientation as empty instead of repeating the last one"
		found = append(found, f)
	}
	return found
}

func more(n int) string {
	switch n {
	case 1:
		return ""
	case 2:
		return "; and once more"
	}
	return fmt.Sprintf("; and %d times more", n-1)
}

// changesAt reports whether a row lies where the log changes its convention.
func changesAt(s *Series, row int64) bool {
	if s.Rates == nil {
		return false
	}
	stretches := s.Rates.Stretches
	for i := 1; i < len(stretches); i++ {
		if row > stretches[i-1].To.Row && row <= stretches[i].From.Row {
			return true
		}
	}
	return false
}

// rowsNotFinite reports rows in which an orientation cannot be computed,
// if there are others. Where the log begins with them they may say unset.
func rowsNotFinite(s *Series, t kinematics.Tally, rows int64) *Finding {
	if t.Count == 0 || t.Count == rows {
		return nil
	}
	f := hazard(NotFinite, s, t.First, "%s is not finite in %d of %d rows, first row %d: no orientation can be computed there, and filters that read it stay broken",
		s.Value.name(), t.Count, rows, t.First.Row)
	if t.First.Row == 1 {
		f.Level = Note
	}
	f.Evidence = []Evidence{{What: "first, " + s.row(t.First), Stated: Words("finite"), Computed: Words("NaN or infinite")}}
	f.Remedy = "leave the cells empty where the orientation is unknown"
	return f
}
