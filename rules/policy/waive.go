package policy

import (
	"errors"
	"fmt"
	"path"
	"strings"
	"time"

	"dextral/rules"
)

// waiver is a waiver with its place ready for matching.
type waiver struct {
	*rules.Waiver
	files glob
	keys  keyPattern // used only with hasKey
	byKey bool
}

// parsePlace reads Place: a path glob, or a path glob, # and a key pattern.
func (w *waiver) parsePlace() error {
	files, key, byKey := strings.Cut(w.Place, "#")
	if byKey && files == "" {
		return errors.New("names no file; write path#key")
	}
	var err error
	if w.files, err = parseGlob(files); err != nil {
		return err
	}
	if w.byKey = byKey; byKey {
		w.keys, err = parseKeyPattern(key)
	}
	return err
}

func (w *waiver) matches(f *rules.Finding, rel string) bool {
	return f.Rule == w.Rule && w.files.matches(rel) && (!w.byKey || w.keys.matches(f.Key))
}

// Waive accepts the findings that a waiver matches and that has not expired:
// it sets their Waiver, of several the first in the file. A waiver holds up to
// and including its last day, in the time zone of today.
//
// It returns findings of its own, at the waivers' places: for every waiver that
// has expired, and for every other one that matched nothing although all it can
// match was audited. The caller says what was: covered reports whether this
// run audited, and could read, everything at or below a path (which need not
// exist). Without it, an audit of a part of the tree would call the other
// part's waivers unused.
func (p *Policy) Waive(findings []*rules.Finding, today time.Time, covered func(path string) bool) []*rules.Finding {
	used := make([]bool, len(p.accepted))
	day := today.Format(time.DateOnly)
	for _, f := range findings {
		rel, ok := p.rel(f.Place.Path)
		if !ok {
			continue
		}
		for i := range p.accepted {
			w := &p.accepted[i]
			if !w.matches(f, rel) {
				continue
			}
			used[i] = true
			if f.Waiver == nil && day <= w.Until {
				f.Waiver = w.Waiver
			}
		}
	}
	var own []*rules.Finding
	for i := range p.accepted {
		w := &p.accepted[i]
		switch {
		case day > w.Until:
			own = append(own, w.expired(today, used[i]))
		case !used[i] && covered(path.Join(path.Dir(p.Path), w.files.base())):
			own = append(own, w.unused())
		}
	}
	return own
}

// finding starts a finding on a waiver.
func (w *waiver) finding(rule, format string, args ...any) *rules.Finding {
	return &rules.Finding{
		Rule: rule, Level: rules.Warning, Place: w.At,
		Key:     "waiver." + w.Rule + "." + w.Place,
		Claim:   fmt.Sprintf("%s at %s is waived until %s", w.Rule, w.Place, w.Until),
		Message: fmt.Sprintf("the waiver of %s at %s ", w.Rule, w.Place) + fmt.Sprintf(format, args...),
	}
}

func (w *waiver) expired(today time.Time, used bool) *rules.Finding {
	f := w.finding(rules.WaiverExpired, "ended on %s", w.Until)
	day := today.Format(time.DateOnly)
	late := rules.Quantity{Value: daysBetween(w.Until, day), Unit: "days", Known: true}
	f.Evidence = []rules.Evidence{{What: "last day", Stated: rules.Words(w.Until), Computed: rules.Words(day), Residual: late}}
	if used {
		f.Remedy = fmt.Sprintf("mend what it accepted, or agree on a new day with %s, who gave as reason: %s", w.Owner, w.Because)
	} else {
		f.Message += ", and it matches no finding"
		f.Remedy = "delete it"
	}
	return f
}

func (w *waiver) unused() *rules.Finding {
	f := w.finding(rules.WaiverUnused, "matches no finding")
	f.Evidence = []rules.Evidence{{What: "findings that it matches", Stated: rules.Words("1 or more"), Computed: rules.Plain(0)}}
	f.Remedy = "delete it if the finding is mended; otherwise correct its place, which is relative to the directory of this file"
	return f
}

// daysBetween counts days from one YYYY-MM-DD to a later one.
func daysBetween(from, to string) float64 {
	a, _ := time.Parse(time.DateOnly, from)
	b, _ := time.Parse(time.DateOnly, to)
	return b.Sub(a).Hours() / 24
}
