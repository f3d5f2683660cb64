package report

import (
	"cmp"
	"fmt"
	"io"
	"strings"

	"dextral/rules"
)

// Text writes the report for people: every finding, then a summary. Of findings
// with one cause the first is shown with its evidence, the others with their first
// lines below it. What a file of waivers accepts is counted in the summary; other
// formats list it.
func Text(w io.Writer, r *Report, o Options) error {
	p := newPrinter(w, o)
	for _, g := range groups(r.Findings) {
		if g.first.Waiver != nil && g.first.Waiver.InFile {
			continue
		}
		p.finding(g.first)
		for _, f := range g.alike {
			p.firstLine(f)
		}
		if len(g.alike) > 0 {
			p.labelled("  ", faint, "alike", fmt.Sprintf("these %s are alike and may have one cause; the other formats give the evidence of each", grouped(len(g.alike)+1)), labelWidth)
		}
		p.line("")
	}
	p.summary(r)
	return p.Flush()
}

// labelWidth holds the words in the margin of a finding and two spaces.
const labelWidth = len("warning") + 2

// firstLine is the line that editors follow. On a terminal it is wrapped.
func (p *printer) firstLine(f *rules.Finding) {
	at, rule := clean(f.Place.String())+":", f.Rule+":"
	for i, l := range wrap(at+" "+rule+" "+clean(f.Message), p.o.Width-4, p.o.Width > 0) {
		switch rest, whole := strings.CutPrefix(l, at+" "+rule); {
		case i > 0:
			l = "    " + l
		case whole:
			l = p.styled(bold, at) + " " + p.styled(bold, f.Rule) + ":" + rest
		default: // the path alone fills the line
			l = p.styled(bold, l)
		}
		p.line(l)
	}
}

func (p *printer) finding(f *rules.Finding) {
	p.firstLine(f)
	label := func(style, word, text string) { p.labelled("  ", style, word, text, labelWidth) }
	if f.Waiver != nil { // nothing is to be done: the rest would only hide what is not waived
		label(faint, "waived", waiverText(f))
		return
	}
	label(levelStyle(f.Level), f.Level.String(), levelText(f))
	if w := f.Lapsed; w != nil {
		label(faint, "lapsed", fmt.Sprintf("was accepted until %s by %s: %s (%s)", w.Until, clean(w.Owner), clean(w.Because), clean(w.At.String())))
	}
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
