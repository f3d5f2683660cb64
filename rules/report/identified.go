package report

import (
	"fmt"
	"io"
	"math"
	"strings"

	"dextral/core/identify"
	"dextral/rules"
)

// Identified prints the comparison of two statements of one orientation: what
// was compared, the verdict, and the readings tried.
func Identified(w io.Writer, a, b *rules.Value, r identify.Result) error {
	p := newPrinter(w, Options{})
	for _, v := range []*rules.Value{a, b} {
		var texts []string
		for _, n := range v.Numbers {
			texts = append(texts, n.Text)
		}
		p.section("given", fmt.Sprintf("%s: %s (%s)", v.Key, strings.Join(texts, " "), v.Reading()))
	}
	p.section("verdict", verdictText(r))
	for i, c := range listed(r) {
		word := ""
		if i == 0 {
			word = "readings"
		}
		p.section(word, fmt.Sprintf("%-12s %-9s %s", degreesText(c.Residual), changesText(c), c))
	}
	if r.Reason != "" {
		p.section("because", r.Reason)
	}
	p.line("")
	return p.Flush()
}

// listed are the classes to print: the stated reading, then those worth listing.
func listed(r identify.Result) []identify.Class {
	var list []identify.Class
	seen := map[string]bool{}
	for _, c := range append([]identify.Class{r.Stated}, r.Classes...) {
		if len(c.Readings) > 0 && !seen[c.String()] {
			seen[c.String()] = true
			list = append(list, c)
		}
	}
	return list
}

func verdictText(r identify.Result) string {
	switch r.Verdict {
	case identify.Agree:
		return "one orientation, as stated"
	case identify.AgreeInverse:
		return "the reverse of each other; no stated direction excludes that"
	case identify.Contradicted:
		text := "not as stated; they agree " + r.Best.String()
		if r.Best.Tie {
			text += " (several readings fit alike; the numbers cannot tell which)"
		}
		return text
	case identify.Unexplained:
		return "not one orientation under any reading that could be held responsible"
	}
	return "cannot be decided"
}

func degreesText(rad float64) string { return loopNumber(rad * 180 / math.Pi) }

func changesText(c identify.Class) string {
	switch c.Cost {
	case 0:
		return "as stated"
	case 1:
		return "cost 1"
	}
	return fmt.Sprintf("cost %d", c.Cost)
}

// maxTies bounds the readings of a tie that are listed.
const maxTies = 4

// IdentifiedSeries prints which conventions the orientations and rates of a log
// obey.
func IdentifiedSeries(w io.Writer, s *rules.Series) error {
	p := newPrinter(w, Options{})
	r := &s.Rates.Result
	given := fmt.Sprintf("%s: %s rows; quaternion %s; rates %s", s.Value.Place.Path, grouped(int(s.Rows)), strings.Join(s.Columns, ", "), strings.Join(s.Rates.Columns, ", "))
	if s.Clock != nil {
		given += "; time " + s.Clock.Column
	}
	p.section("given", given)
	p.section("motion", r.Motion.String())
	if len(s.Rates.Stretches) > 1 {
		p.section("verdict", "the log changes its convention")
		word := "stretches"
		for _, t := range s.Rates.Stretches {
			p.section(word, fmt.Sprintf("rows %d to %d: %s; residual %.3g, by its neighbour's reading %.3g", t.From.Row, t.To.Row, t.Class.Readings[0], t.Residual, t.Other))
			word = ""
		}
		p.line(residualMeans)
		return p.Flush()
	}
	p.section("verdict", seriesVerdict(*r))
	word := "readings"
	print := func(c identify.SeriesClass, note string) {
		if len(c.Readings) > 0 {
			p.section(word, fmt.Sprintf("%-8.3g %-9s %s", c.Residual, note, c))
			word = ""
		}
	}
	print(r.Best, "best")
	for i, c := range r.Ties {
		if i == maxTies {
			p.section("", fmt.Sprintf("and %d more that fit alike", len(r.Ties)-maxTies))
			break
		}
		print(c, "tie")
	}
	print(r.Next, "next")
	if len(r.Stated.Readings) > 0 && r.Verdict == identify.Contradicted {
		print(r.Stated, "as stated")
	}
	if r.Delay.Known {
		p.section("delay", fmt.Sprintf("the rates are late by %.3g s, give or take %.1g s", r.Delay.Value, r.Delay.Deviation))
	}
	for i, b := range r.Bias {
		if b.Known {
			p.section("offset", fmt.Sprintf("%s: %.3g rad/s, give or take %.1g", s.Rates.Columns[i], b.Value, b.Deviation))
		}
	}
	if r.Biased {
		p.section("offset", "a constant offset of the rates was taken out")
	}
	if r.Reason != "" {
		p.section("because", r.Reason)
	}
	p.line(residualMeans)
	return p.Flush()
}

const residualMeans = "residual: RMS of rate minus prediction over RMS of the rates"

func seriesVerdict(r identify.SeriesResult) string {
	switch r.Verdict {
	case identify.Agree:
		text := "the rates are those of the orientations as stated"
		if !r.Decided {
			text += "; other readings cannot be excluded"
		}
		return text
	case identify.Contradicted:
		return "not as stated; the rates fit " + r.Best.String()
	case identify.Unexplained:
		return "under no reading are these the rates of these orientations"
	}
	return "cannot be decided"
}
