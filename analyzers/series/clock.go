package series

import (
	"math"
	"slices"
	"strings"

	"dextral/analyzers/series/columns"
	"dextral/analyzers/series/fold"
	"dextral/rules"
)

// setTime plans the column of time stamps and finds its unit: the name's, or that
// of a written date, or the one unit in which a stamp lies between the years 2000
// and 2100. Where the other columns are called field.something the time is that
// of a topic printed by a robot's tools, in nanoseconds (common practice, no
// source).
func (l *layout) setTime(t *columns.Time, h *head, header []columns.Column) {
	if t == nil {
		return
	}
	row := firstComplete(h.rows, []int{t.Column})
	if row < 0 { // no number and no date: a time of day in words, or empty
		return
	}
	l.time = t
	l.fold.Time = l.cell(t.Column)
	if t.Fine >= 0 {
		l.fold.Fine, l.fold.Per = l.cell(t.Fine), t.Per
	}
	l.clock = rules.Clock{Unit: t.Unit, Source: rules.Label}
	if header != nil {
		l.clock.Column, l.clock.Place = header[t.Column].Text, header[t.Column].Place
	} else {
		l.clock.Place = h.number(row, t.Column).Place
	}
	cell := h.rows[row][t.Column]
	l.fold.Start = fold.StampOf(&cell)
	if t.Fine >= 0 {
		fine := h.rows[row][t.Fine]
		l.fold.Start = fold.Joined(&cell, &fine, t.Per)
	}
	switch number := h.number(row, t.Column); {
	case t.Unit != "":
	case strings.Count(number.Text, "-") >= 2 && strings.Contains(number.Text, ":"): // a date
		l.clock.Unit = "s"
	case l.clock.Column == "time" && slices.ContainsFunc(header, func(c columns.Column) bool { return strings.HasPrefix(c.Text, "field.") }):
		l.clock.Unit, l.clock.Source = "ns", rules.Name
	default:
		l.clock.Unit, l.clock.Source = epochUnit(l.fold.Start.Value), rules.Shape
	}
}

// epochUnit is the unit in which a time since 1970 lies between 2000 and 2100.
func epochUnit(v float64) string {
	const from, to = 946684800, 4102444800 // seconds
	for i, unit := range []string{"s", "ms", "us", "ns"} {
		if s := v / math.Pow10(3*i); s >= from && s < to {
			return unit
		}
	}
	return ""
}

// clockOf is the result of the fold in the form that rules judge.
func (l *layout) clockOf(c *fold.Clock) *rules.Clock {
	if l.time == nil {
		return nil
	}
	out := l.clock
	out.Count, out.Missing = c.Count, c.Missing
	out.First, out.Last = c.First.String(), c.Last.String()
	if c.Count > 0 {
		out.Span = c.Last.Since(c.First)
	}
	out.Repeated, out.RepeatedAt = c.Repeated.Tally, c.Repeated.At
	out.Reversed, out.ReversedAt = c.Reversed.Tally, c.Reversed.At
	out.Shortest, out.Longest = c.Steps.Min, c.Steps.Max
	return &out
}
