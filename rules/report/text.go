package report

import (
	"cmp"
	"fmt"
	"io"
	"strings"

	"dextral/rules"
)

// Text writes the report for people: every finding, then a summary.
func Text(w io.Writer, r *Report, o Options) error {
	p := newPrinter(w, o)
	for _, f := range r.Findings {
		p.finding(f)
		p.line("")
	}
	p.summary(r)
	return p.Flush()
}

// labelWidth holds the words in the margin of a finding and two spaces.
const labelWidth = len("warning") + 2

func (p *printer) finding(f *rules.Finding) {
	p.line(p.styled(bold, clean(f.Place.String())+":") + " " + p.styled(bold, f.Rule) + ": " + clean(f.Message))
	label := func(style, word, text string) { p.labelled("  ", style, word, text, labelWidth) }
	if f.Waiver != nil { // nothing is to be done: the rest would only hide what is not waived
		label(faint, "waived", waiverText(f))
		return
	}
	label(levelStyle(f.Level), f.Level.String(), levelText(f))
	if f.Place.Row > 0 {
		label(faint, "at", rowText(f.Place))
	}
	if len(f.Evidence) > 0 {
		table := evidence(f.Evidence, p.o.Width-2)
		p.line("  " + p.styled(faint, table[0]))
		for _, l := range table[1:] {
			p.line("  " + l)
		}
	}
	for _, r := range f.Related {
		label(faint, "see", clean(r.Place.String())+": "+clean(r.Message))
	}
	if f.Remedy != "" {
		label(faint, "remedy", clean(f.Remedy))
	}
	if f.Edit != nil {
		label(faint, "edit", clean(f.Edit.Words())+": "+clean(f.Edit.Why)+"; dextral audit --diff shows it, --apply writes it")
	}
	if f.Command != "" { // never wrapped: it is to be copied
		p.line("  " + p.styled(faint, "repeat") + strings.Repeat(" ", labelWidth-len("repeat")) + clean(f.Command))
	}
}

func levelStyle(l rules.Level) string {
	switch l {
	case rules.Error:
		return red
	case rules.Warning:
		return yellow
	}
	return blue
}

// levelText names the claim that is contradicted. A note contradicts none.
func levelText(f *rules.Finding) string {
	switch {
	case f.Claim == "":
		return ""
	case f.Level == rules.Note:
		return "on the claim: " + clean(f.Claim)
	}
	return "contradicts the claim: " + clean(f.Claim)
}

func waiverText(f *rules.Finding) string {
	w := f.Waiver
	return fmt.Sprintf("%s, until %s by %s: %s (%s)", f.Level, w.Until, clean(w.Owner), clean(w.Because), clean(w.At.String()))
}

func rowText(at rules.Place) string {
	s := "row " + grouped(at.Row)
	if at.Time != "" {
		s += ", time " + clean(at.Time)
	}
	return s
}

// levelCounts is "2 errors, 1 warning", of the levels that occur.
func levelCounts(t Tally) string {
	var parts []string
	for _, c := range []struct {
		n    int
		name string
	}{{t.Errors, "error"}, {t.Warnings, "warning"}, {t.Notes, "note"}} {
		if c.n > 0 {
			parts = append(parts, plural(c.n, c.name))
		}
	}
	return cmp.Or(strings.Join(parts, ", "), "nothing")
}
