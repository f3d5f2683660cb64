package rules

import (
	"fmt"
	"slices"

	"dextral/core/identify"
)

// minRows is the least number of rows of a log that must tell the same story
// before two of its channels are said to contradict each other. One row is
// enough for the numbers; three keep a single garbled row from speaking for
// the log.
const minRows = 3

// CheckPair compares two channels of one log that state one orientation, row by
// row on a sample. They contradict each other only if all rows that contradict
// tell the same story.
func CheckPair(p *SeriesPair) []*Finding {
	a, b := p.First.Value, p.Second.Value
	if !a.Decided() || !b.Decided() || !a.orients() || !b.orients() {
		return nil
	}
	var worst identify.Result
	var at int64
	rows, agree := 0, 0
	for _, sample := range p.Samples {
		sa, sb := a.statement(), b.statement()
		sa.Numbers, sb.Numbers = sample.First, sample.Second
		sa.Tolerance, sb.Tolerance = p.First.tolerance(), p.Second.tolerance()
		r := identify.Same(sa, sb)
		switch r.Verdict {
		case identify.Agree: // as turns about one axis do under many readings
			agree++
			continue
		case identify.Undecided:
			continue
		}
		if rows > 0 && (r.Verdict != worst.Verdict || !slices.Equal(r.Best.Changes, worst.Best.Changes)) {
			return nil // the rows tell different stories
		}
		rows++
		if rows == 1 || r.Stated.Residual > worst.Stated.Residual {
			worst, at = r, sample.Row
		}
	}
	if rows < minRows {
		return nil
	}
	f := disagreement(&a, &b, &b, worst)
	if f == nil {
		return nil
	}
	f.Evidence = append([]Evidence{
		{What: "rows compared", Computed: Plain(float64(len(p.Samples)))},
		{What: "rows that contradict the claims", Computed: Plain(float64(rows))},
		{What: "rows that agree with them", Computed: Plain(float64(agree))},
		{What: "row with the largest residual", Computed: Plain(float64(at))},
	}, f.Evidence...)
	f.Message = fmt.Sprintf("row %d and %d others: %s", at, rows-1, f.Message)
	f.Place = b.Place
	return []*Finding{f}
}

// tolerance is that of one row of the channel.
func (s *Series) tolerance() float64 {
	v := s.Value
	p := v.precision()
	p.Half = s.Half
	return v.toleranceOf(p)
}
