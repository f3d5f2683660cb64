package report

import (
	"cmp"
	"fmt"
	"io"
	"maps"
	"slices"
	"strings"

	"dextral/rules/policy"
)

// Summary writes the closing summary alone, for use beside a machine format.
func Summary(w io.Writer, r *Report, o Options) error {
	p := newPrinter(w, o)
	p.summary(r)
	return p.Flush()
}

// summary says what was audited, what was found, and what dextral cannot vouch
// for: the undecided, the unreadable and the failed.
func (p *printer) summary(r *Report) {
	p.section("audited", auditedText(r.Audited))
	t := r.Tally()
	found := levelCounts(t)
	if t.Waived > 0 {
		found += "; waived: " + grouped(t.Waived)
	}
	p.section("found", found)
	for _, text := range backlogText(r) {
		p.section("waived", text)
	}
	p.section("gate", gateText(r))
	if n := len(r.Undecided); n > 0 {
		p.section("undecided", plural(n, "value")+"; dextral readings lists them all")
		groups := byReason(r.Undecided, func(u Undecided) (why, where string) {
			return u.Why, strings.TrimSpace(u.Place.String() + " " + u.Key)
		})
		p.reasons(groups)
	}
	if n := len(r.Unreadable); n > 0 {
		p.section("unread", plural(n, "file")+" of a kind that is recognised but cannot be read yet")
		p.reasons(byReason(r.Unreadable, func(s Skipped) (why, where string) { return s.Why, s.Path }))
	}
	if n := len(r.Failed); n > 0 {
		p.section("failed", plural(n, "input")+" could not be audited")
		for _, f := range r.Failed {
			p.section("", clean(f.Place.String())+": "+clean(f.Message))
		}
	}
	if n := len(r.Limited); n > 0 {
		p.section("partly", plural(n, "input")+" audited only as far as could be read")
		groups := byReason(r.Limited, func(f Failure) (why, where string) { return clean(f.Message), clean(f.Place.String()) })
		p.reasons(groups)
	}
	if text := leftOutText(r.LeftOut); text != "" {
		p.section("left out", text)
	}
	p.section("caution", caution)
}

const caution = "dextral finds contradictions; silence is not proof, and the responsible engineer's judgement stands"

// sectionWidth holds the words in the margin of the summary and two spaces.
const sectionWidth = len("undecided") + 2

func (p *printer) section(word, text string) { p.labelled("", bold, word, text, sectionWidth) }

func auditedText(c Counts) string {
	if c == (Counts{}) {
		return "nothing: no file here is of a kind that dextral reads"
	}
	var parts []string
	if c.GoPackages > 0 || c.GoFiles > 0 {
		parts = append(parts, fmt.Sprintf("%s (%s)", plural(c.GoPackages, "Go package"), plural(c.GoFiles, "file")))
	}
	if c.Files > 0 {
		parts = append(parts, plural(c.Files, "other file"))
	}
	if len(parts) == 1 && c.Files > 0 {
		parts[0] = plural(c.Files, "file")
	}
	holding := plural(c.Values, "orientation value")
	if c.LogRows > 0 {
		holding += ", " + plural(c.LogRows, "log row")
	}
	return strings.Join(parts, " and ") + " with " + holding
}

// backlogText counts what each file of waivers accepts, by rule.
func backlogText(r *Report) []string {
	var texts []string
	type backlog struct {
		n     int
		first string // the day on which the first waiver ends
	}
	files := map[string]*backlog{}
	byRule := map[string]map[string]int{}
	for _, f := range r.Findings {
		w := f.Waiver
		if w == nil || !w.InFile {
			continue
		}
		b := files[w.At.Path]
		if b == nil {
			b = &backlog{first: w.Until}
			files[w.At.Path], byRule[w.At.Path] = b, map[string]int{}
		}
		b.n++
		b.first = min(b.first, w.Until)
		byRule[w.At.Path][f.Rule]++
	}
	for _, file := range slices.Sorted(maps.Keys(files)) {
		counts := byRule[file]
		names := slices.SortedFunc(maps.Keys(counts), func(a, b string) int {
			return cmp.Or(cmp.Compare(counts[b], counts[a]), strings.Compare(a, b))
		})
		var parts []string
		for _, name := range names {
			parts = append(parts, fmt.Sprintf("%s %s", grouped(counts[name]), name))
		}
		texts = append(texts, fmt.Sprintf("%s by %s, the first until %s: %s", grouped(files[file].n), clean(file), files[file].first, strings.Join(parts, ", ")))
	}
	return texts
}

func gateText(r *Report) string {
	n := r.Failing()
	switch {
	case r.Gate == policy.GateNever:
		return "never: findings do not fail this audit"
	case n == 0:
		return r.Gate.String() + ": passed"
	}
	return fmt.Sprintf("%s: failed by %s", r.Gate, plural(n, "finding"))
}

func leftOutText(l LeftOut) string {
	var parts []string
	for _, c := range []struct {
		n   int
		why string
	}{
		{l.Ignored, "ignored by version control"}, {l.Excluded, "excluded by dextral.toml"}, {l.Links, "symbolic links"},
		{l.NotText, "not text"}, {l.Other, "of no format that holds orientations"},
	} {
		switch {
		case c.n == 1:
			parts = append(parts, "1 "+strings.Replace(c.why, "links", "link", 1))
		case c.n > 1:
			parts = append(parts, grouped(c.n)+" "+c.why)
		}
	}
	return strings.Join(parts, ", ")
}

// reason is a group of entries that share one.
type reason struct {
	why    string
	places []string
}

// byReason groups entries by their reason: the largest group first, of equal
// ones in the order of their words.
func byReason[T any](all []T, split func(T) (why, where string)) []reason {
	var groups []reason
	for _, e := range all {
		why, where := split(e)
		i := slices.IndexFunc(groups, func(g reason) bool { return g.why == why })
		if i < 0 {
			i = len(groups)
			groups = append(groups, reason{why: why})
		}
		groups[i].places = append(groups[i].places, where)
	}
	slices.SortStableFunc(groups, func(a, b reason) int {
		return cmp.Or(cmp.Compare(len(b.places), len(a.places)), strings.Compare(a.why, b.why))
	})
	return groups
}

// Bounds of the summary; the full lists are elsewhere.
const (
	maxReasons = 6
	maxPlaces  = 2
)

// reasons lists groups with their first places.
func (p *printer) reasons(groups []reason) {
	for _, g := range groups[:min(len(groups), maxReasons)] {
		shown := g.places[:min(len(g.places), maxPlaces)]
		text := fmt.Sprintf("%s: %s", clean(g.why), clean(strings.Join(shown, ", ")))
		if rest := len(g.places) - len(shown); rest > 0 {
			text += fmt.Sprintf(" and %s more", grouped(rest))
		}
		p.section("", text)
	}
	if rest := len(groups) - maxReasons; rest > 0 {
		p.section("", "and "+plural(rest, "other reason"))
	}
}
