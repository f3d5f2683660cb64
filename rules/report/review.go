package report

import (
	"fmt"
	"io"
	"math"
	"strings"

	"dextral/rules"
)

// Review compares two versions of a repository.
type Review struct {
	Base, Head string // commits, shortened; Head "" is the working tree
	Files      int    // that differ
	Changes    []rules.Change
	Functions  []FunctionChange
	Downstream []Downstream
	New        []*rules.Finding // not in the base
	Fixed      []*rules.Finding // not any longer, at their old places
	Same       []*rules.Finding
	LeftOut    []Skipped // files that differ and were not compared
	Audit      Report    // of the new version of what was read
}

// FunctionChange is a function whose text differs, with what it computes, as
// measured; "" where that is not known.
type FunctionChange struct {
	Name, At string
	Was, Is  string
}

// String says what became of the function.
func (c FunctionChange) String() string {
	switch {
	case c.Was == c.Is:
		return "still computes the " + c.Is
	case c.Was == "":
		return "computes now the " + c.Is + "; what it computed is not known"
	case c.Is == "":
		return "computed the " + c.Was + "; what it computes now is not known"
	}
	return "computed the " + c.Was + " and computes now the " + c.Is
}

// Downstream is what moves in one graph of frames.
type Downstream struct {
	Title string
	Moves []rules.Move
	Loops []rules.LoopChange
}

// Compare sorts the findings of the new version, and those of the old one, into
// new, fixed and same. Old findings are carried over to the new path of a renamed
// file and to the new key of a value that was renamed; the rest is the
// fingerprint's.
func (r *Review) Compare(before []*rules.Finding, renamed map[string]string) {
	type place struct{ path, key string }
	moved := map[place]place{}
	for _, c := range r.Changes {
		if c.Before != nil && c.After != nil {
			moved[place{c.Before.Place.Path, c.Before.Key}] = place{c.After.Place.Path, c.After.Key}
		}
	}
	old := map[string][]*rules.Finding{}
	for _, f := range before {
		g := *f
		if to, ok := moved[place{f.Place.Path, f.Key}]; ok {
			g.Place.Path, g.Key = to.path, to.key
		} else if to, ok := renamed[f.Place.Path]; ok {
			g.Place.Path = to
		}
		print := g.Fingerprint()
		old[print] = append(old[print], f)
	}
	for _, f := range r.Audit.Findings {
		if list := old[f.Fingerprint()]; len(list) > 0 {
			old[f.Fingerprint()] = list[1:]
			r.Same = append(r.Same, f)
		} else {
			r.New = append(r.New, f)
		}
	}
	left := map[*rules.Finding]bool{}
	for _, list := range old {
		for _, f := range list {
			left[f] = true
		}
	}
	for _, f := range before { // in their order
		if left[f] {
			r.Fixed = append(r.Fixed, f)
		}
	}
}

// Failing counts the new findings that fail the review: at or above the gate, and
// not waived.
func (r *Review) Failing() int {
	fresh := Report{Findings: r.New, Gate: r.Audit.Gate}
	return fresh.Failing()
}

// Title names the two versions.
func (r *Review) Title() string {
	head := r.Head
	if head == "" {
		head = "the working tree"
	}
	return fmt.Sprintf("from %s to %s, which differ in %s", r.Base, head, plural(r.Files, "file"))
}

// counts is "1 turned, 2 same orientation", the gravest first.
func (r *Review) counts() string {
	n := map[rules.Effect]int{}
	for _, c := range r.Changes {
		n[c.Effect]++
	}
	var parts []string
	for e := rules.Mirrored; ; e-- {
		if n[e] > 0 {
			parts = append(parts, fmt.Sprintf("%s %s", grouped(n[e]), e))
		}
		if e == 0 {
			break
		}
	}
	if len(parts) == 0 {
		return "no orientation changed"
	}
	return strings.Join(parts, ", ")
}

// functionCounts is "1 computes something else, 2 still compute the same".
func (r *Review) functionCounts() string {
	other := 0
	for _, c := range r.Functions {
		if c.Was != c.Is {
			other++
		}
	}
	return fmt.Sprintf("%s changed: %d computing something else, %d the same", plural(len(r.Functions), "function"), other, len(r.Functions)-other)
}

// ReviewText writes a review for people.
func ReviewText(w io.Writer, r *Review, o Options) error {
	p := newPrinter(w, o)
	p.line(p.styled(bold, "review") + " " + r.Title())
	p.line("")
	for i := range r.Changes {
		p.change(&r.Changes[i])
	}
	for _, c := range r.Functions {
		style := faint
		if c.Was != c.Is {
			style = yellow
		}
		p.line(p.styled(bold, clean(c.At)+":") + " " + p.styled(style, "function") + ": " + clean(c.Name))
		p.labelled("  ", faint, "what", clean(c.String()), len("what")+2)
		p.line("")
	}
	for _, d := range r.Downstream {
		p.downstream(d)
	}
	for _, f := range r.New {
		p.line(p.styled(red, "new finding"))
		p.finding(f)
		p.line("")
	}
	for _, f := range r.Fixed {
		p.line(p.styled(blue, "fixed") + "  " + clean(f.Place.String()) + ": " + f.Rule + ": " + clean(f.Message))
	}
	if len(r.Fixed) > 0 {
		p.line("")
	}
	p.reviewSummary(r)
	return p.Flush()
}

func (p *printer) change(c *rules.Change) {
	v := c.Value()
	style := faint
	if c.Real() {
		style = yellow
	}
	p.line(p.styled(bold, clean(v.Place.String())+":") + " " + p.styled(style, c.Effect.String()) + ": " + clean(v.Key))
	const size = len("what") + 2
	p.labelled("  ", faint, "what", clean(c.Text), size)
	if c.Before != nil {
		p.labelled("  ", faint, "was", wasText(c), size)
	}
	if c.After != nil {
		p.labelled("  ", faint, "is", clean(numbersText(c.After)), size)
	}
	p.line("")
}

// wasText is the old value, with its place where that is another one.
func wasText(c *rules.Change) string {
	text := clean(numbersText(c.Before))
	if c.After != nil && c.Moved {
		text += "  at " + clean(c.Before.Place.String()) + " " + clean(c.Before.Key)
	}
	return text
}

// numbersText is a value as written; of long ones the beginning.
func numbersText(v *rules.Value) string {
	const most = 16
	var list []string
	for i, n := range v.Numbers {
		if i == most {
			list = append(list, "...")
			break
		}
		list = append(list, n.Text)
	}
	if len(list) == 0 {
		return v.Reading()
	}
	return strings.Join(list, " ") + "  (" + v.Reading() + ")"
}

// lever is the arm at which the effect of a turn is stated.
const lever = 10.0

func (p *printer) downstream(d Downstream) {
	p.line(p.styled(bold, "moves") + " in the frames of " + clean(d.Title))
	for _, m := range bounded(d.Moves) {
		p.line("  " + moveText(m))
	}
	p.more(len(d.Moves))
	for _, l := range bounded(d.Loops) {
		p.line("  " + loopText(l))
	}
	p.more(len(d.Loops))
	p.line("")
}

// maxMoves bounds the frames and loops listed.
const maxMoves = 12

func bounded[T any](list []T) []T { return list[:min(len(list), maxMoves)] }

func (p *printer) more(n int) {
	if n > maxMoves {
		p.line(fmt.Sprintf("  and %s more", grouped(n-maxMoves)))
	}
}

func moveText(m rules.Move) string {
	var through []string
	for _, v := range m.Through {
		through = append(through, v.Key)
	}
	upTo := ""
	if m.UpTo {
		upTo = "up to "
	}
	return fmt.Sprintf("%s in %s: turned by %s%s, which is %.3g m at a lever of %g m; through %s", clean(m.Frame), clean(m.Root),
		upTo, turnText(m.Angle), m.Lever(lever), lever, clean(strings.Join(through, ", ")))
}

func loopText(l rules.LoopChange) string {
	verb := "closed and does not any longer"
	if l.Closes {
		verb = "did not close and does now"
	}
	return fmt.Sprintf("loop %s %s: was open by %s, is by %s", clean(strings.Join(append(l.Frames, l.Frames[0]), " -> ")), verb, turnText(l.Was), turnText(l.Is))
}

func (p *printer) reviewSummary(r *Review) {
	p.section("changes", r.counts())
	if len(r.Functions) > 0 {
		p.section("functions", r.functionCounts())
	}
	fresh := Report{Findings: r.New}
	p.section("new", levelCounts(fresh.Tally())+waivedText(fresh.Tally()))
	fixed := Report{Findings: r.Fixed}
	p.section("fixed", levelCounts(fixed.Tally()))
	if n := len(r.Same); n > 0 {
		p.section("as before", plural(n, "finding")+" in what was compared")
	}
	p.section("gate", reviewGate(r))
	if n := len(r.Audit.Failed); n > 0 {
		p.section("failed", plural(n, "input")+" could not be audited")
		for _, f := range r.Audit.Failed {
			p.section("", clean(f.Place.String())+": "+clean(f.Message))
		}
	}
	if len(r.LeftOut) > 0 {
		p.section("left out", plural(len(r.LeftOut), "file"))
		p.reasons(byReason(r.LeftOut, func(s Skipped) (why, where string) { return s.Why, s.Path }))
	}
	p.section("caution", caution)
}

func waivedText(t Tally) string {
	if t.Waived == 0 {
		return ""
	}
	return "; waived: " + grouped(t.Waived)
}

func reviewGate(r *Review) string {
	if n := r.Failing(); n > 0 {
		return fmt.Sprintf("%s: failed by %s", r.Audit.Gate, plural(n, "new finding"))
	}
	return r.Audit.Gate.String() + ": passed"
}

func turnText(rad float64) string { return loopNumber(rad * 180 / math.Pi) }
