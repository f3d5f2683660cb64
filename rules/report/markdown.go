package report

import (
	"fmt"
	"io"
	"strings"

	"dextral/rules"
)

// Markdown writes the report for a page or a comment: what was found in a few
// lines and a table, each finding with its evidence folded, then what is waived
// and what nobody can vouch for. It is GitHub-flavoured Markdown with the HTML that it
// allows.
func Markdown(w io.Writer, r *Report) error {
	p := newPrinter(w, Options{})
	p.line("### Orientation audit")
	p.line("")
	t := r.Tally()
	p.line(fmt.Sprintf("**Found: %s%s.** Gate %s. Audited: %s.", levelCounts(t), waivedText(t), gateText(r), auditedText(r.Audited)))
	p.line("")
	p.ruleTable(r)
	p.findingLines(r.Findings)
	p.waivedLines(r.Findings)
	p.folded(len(r.Failed), "input", " could not be audited", func() { p.failureLines(r.Failed) })
	p.folded(len(r.Limited), "input", " audited only as far as could be read", func() { p.failureLines(r.Limited) })
	p.folded(len(r.Undecided), "value", " that nothing says how to read", func() {
		for _, u := range r.Undecided {
			where := code(u.Place.String())
			if u.Key != "" {
				where += " " + code(u.Key)
			}
			p.line("- " + where + ": " + markdown(u.Why))
		}
	})
	p.folded(len(r.Unreadable), "file", " of a kind that is recognised but cannot be read yet", func() {
		for _, s := range r.Unreadable {
			p.line(fmt.Sprintf("- %s: %s", code(s.Path), markdown(s.Why)))
		}
	})
	if text := leftOutText(r.LeftOut); text != "" {
		p.line("Left out: " + markdown(text) + ".")
		p.line("")
	}
	p.line("_" + caution + "_")
	return p.Flush()
}

// ruleTable counts what is not waived by rule, in the order of the catalogue.
func (p *printer) ruleTable(r *Report) {
	counts := map[string]int{}
	for _, f := range r.Findings {
		if f.Waiver == nil {
			counts[f.Rule]++
		}
	}
	if len(counts) == 0 {
		return
	}
	p.line("| rule | findings | meaning |")
	p.line("|---|---:|---|")
	for _, rule := range rules.Catalogue() {
		if n := counts[rule.Name]; n > 0 {
			p.line(fmt.Sprintf("| %s | %d | %s |", rule.Name, n, markdown(rule.Summary)))
		}
	}
	p.line("")
}

func (p *printer) waivedLines(list []*rules.Finding) {
	n := 0
	for _, f := range list {
		if f.Waiver != nil {
			n++
		}
	}
	p.folded(n, "finding", " waived", func() {
		for _, f := range list {
			if f.Waiver != nil {
				p.line(fmt.Sprintf("- %s %s: %s  ", code(f.Place.String()), f.Rule, markdown(f.Message)))
				p.line("  " + markdown(waiverText(f)))
			}
		}
	})
}

func (p *printer) failureLines(list []Failure) {
	for _, f := range list {
		p.line(fmt.Sprintf("- %s: %s", code(f.Place.String()), markdown(strings.TrimSpace(f.Message))))
	}
}
