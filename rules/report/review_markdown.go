package report

import (
	"fmt"
	"io"
	"strings"

	"dextral/rules"
)

// ReviewMarkdown writes a review as a comment: what matters in a few lines, the
// details folded. It is GitHub-flavoured Markdown with the HTML that it allows.
func ReviewMarkdown(w io.Writer, r *Review) error {
	p := newPrinter(w, Options{})
	p.line("### Orientation review " + code(r.Title()))
	p.line("")
	p.line(verdictLine(r))
	p.line("")
	real := 0
	for i := range r.Changes {
		if r.Changes[i].Real() {
			real++
		}
	}
	if real > 0 {
		p.line("| what | effect | change |")
		p.line("|---|---|---|")
		for i := range r.Changes {
			if c := &r.Changes[i]; c.Real() {
				p.line(fmt.Sprintf("| %s<br>%s | %s | %s |", code(c.Value().Key), code(c.Value().Place.String()), c.Effect, markdown(c.Text)))
			}
		}
		p.line("")
	}
	for _, c := range r.Functions {
		p.line(fmt.Sprintf("- %s %s %s", code(c.At), code(c.Name), markdown(c.String())))
	}
	if len(r.Functions) > 0 {
		p.line("")
	}
	p.findingLines(r.New)
	p.movesMarkdown(r)
	p.folded(len(r.Changes)-real, "change", " that left its orientation as it was, or was added or removed", func() {
		for i := range r.Changes {
			if c := &r.Changes[i]; !c.Real() {
				p.line(fmt.Sprintf("- %s %s: %s", code(c.Value().Place.String()), code(c.Value().Key), markdown(c.Text)))
			}
		}
	})
	p.folded(len(r.Fixed), "finding", " fixed", func() {
		for _, f := range r.Fixed {
			p.line(fmt.Sprintf("- %s **%s** %s", code(f.Place.String()), f.Rule, markdown(f.Message)))
		}
	})
	p.line("_" + caution + "_")
	return p.Flush()
}

func verdictLine(r *Review) string {
	text := fmt.Sprintf("**%s.** New findings: %s; fixed: %s. Gate %s.", r.counts(), tally(r.New), tally(r.Fixed), reviewGate(r))
	if n := len(r.Audit.Failed); n > 0 {
		text += fmt.Sprintf(" **%s could not be compared.**", plural(n, "input"))
	}
	return text
}

func tally(list []*rules.Finding) string {
	t := (&Report{Findings: list}).Tally()
	return levelCounts(t) + waivedText(t)
}

// findingLines shows new findings with their evidence folded.
func (p *printer) findingLines(list []*rules.Finding) {
	for _, f := range list {
		if f.Waiver != nil {
			continue
		}
		p.line(fmt.Sprintf("- **%s** %s %s: %s", f.Level, code(f.Place.String()), f.Rule, markdown(f.Message)))
		if len(f.Evidence) > 0 {
			p.line("  <details><summary>evidence</summary>")
			p.line("")
			p.line("  ```")
			for _, l := range evidence(f.Evidence, 0) {
				p.line("  " + strings.ReplaceAll(l, "```", "'''"))
			}
			p.line("  ```")
			if f.Remedy != "" {
				p.line("")
				p.line("  Remedy: " + markdown(f.Remedy))
			}
			p.line("")
			p.line("  </details>")
		}
	}
	if len(list) > 0 {
		p.line("")
	}
}

func (p *printer) movesMarkdown(r *Review) {
	n := 0
	for _, d := range r.Downstream {
		n += len(d.Moves) + len(d.Loops)
	}
	p.folded(n, "frame or loop", " moved by it", func() {
		for _, d := range r.Downstream {
			p.line("In " + code(d.Title) + ":")
			p.line("")
			for _, m := range bounded(d.Moves) {
				p.line("- " + markdown(moveText(m)))
			}
			for _, l := range bounded(d.Loops) {
				p.line("- " + markdown(loopText(l)))
			}
			p.more(max(len(d.Moves), len(d.Loops)))
		}
	})
}

// folded writes a section that opens on demand, if it holds anything.
func (p *printer) folded(n int, one, rest string, body func()) {
	if n == 0 {
		return
	}
	noun := plural(n, one)
	if one == "frame or loop" && n > 1 {
		noun = grouped(n) + " frames or loops"
	}
	p.line("<details><summary>" + noun + rest + "</summary>")
	p.line("")
	body()
	p.line("")
	p.line("</details>")
	p.line("")
}

// markdown escapes what would be markup in a sentence or end the cell of a table.
func markdown(s string) string {
	return strings.NewReplacer(`\`, `\\`, "|", `\|`, "<", "&lt;", ">", "&gt;", "*", `\*`, "_", `\_`, "`", "\\`", "[", `\[`, "]", `\]`).Replace(clean(s))
}

// code quotes a name; a bar would end the cell of a table even there.
func code(s string) string {
	return "`" + strings.NewReplacer("`", "'", "|", `\|`).Replace(clean(s)) + "`"
}
