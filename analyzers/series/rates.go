package series

import (
	"strings"

	"dextral/analyzers/series/columns"
	"dextral/analyzers/series/fold"
	"dextral/core/convention"
	"dextral/core/identify"
	"dextral/rules"
)

// timeColumn is the column of that name, or the one found.
func timeColumn(found *columns.Time, header []columns.Column, name string) *columns.Time {
	if name == "" {
		return found
	}
	for i, c := range header {
		if strings.TrimLeft(c.Text, "#%") == strings.TrimLeft(name, "#%") {
			t := columns.Time{Column: i, Fine: -1}
			if found != nil && found.Column == i {
				t = *found
			}
			return &t
		}
	}
	return nil
}

// setRates finds angular rates for the quaternions of a log with time stamps.
// Whether they belong together the numbers say: rates that no reading explains
// prove nothing.
func (l *layout) setRates(header []columns.Column) {
	rates, ok := columns.FindRates(header)
	if !ok {
		return
	}
	for i, c := range l.channels {
		if c.Value.Form != convention.Quaternion {
			continue
		}
		if l.time == nil {
			l.timeless = true
			return
		}
		f := fold.Rates{Channel: i, PerSecond: perSecond[l.clock.Unit]}
		for k, column := range rates.Columns {
			f.Cells[k] = l.cell(column)
		}
		l.fold.Rates = append(l.fold.Rates, f)
	}
	l.rates = rates
	for _, c := range rates.Columns {
		l.rateNames = append(l.rateNames, header[c].Text)
	}
}

// perSecond are the units of time. Seconds are meant where nothing says so;
// rates in another unit then fit no reading.
var perSecond = map[string]float64{"": 1, "s": 1, "ms": 1e3, "us": 1e6, "ns": 1e9}

// ratesOf compares the rates with the channel that they stand beside.
func (l *layout) ratesOf(s *rules.Series, f *identify.SeriesFold) *rules.Rates {
	r := &rules.Rates{Columns: l.rateNames, Unit: l.rates.Unit, Place: l.rates.Unit.Place}
	r.Claim.Scalar = s.Value.Claims.Scalar()
	if u, ok := l.rates.Unit.Says.(convention.Unit); ok {
		r.Claim.Unit = u
	}
	r.Result = f.Result(r.Claim)
	r.Stretches = f.Stretches(r.Claim)
	return r
}
