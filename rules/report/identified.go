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
