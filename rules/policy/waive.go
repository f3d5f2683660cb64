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
	keys  keyPattern // used only with byKey
	byKey bool

	literal bool // the path holds no wildcard; with thousands of waivers this counts
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
	w.literal = !strings.ContainsAny(string(w.files), `*?[{`)
	if w.byKey = byKey; byKey {
		w.keys, err = parseKeyPattern(key)
	}
	return err
}

func (w *waiver) matches(f *rules.Finding, rel string) bool {
	if f.Rule != w.Rule || w.literal && string(w.files) != rel {
		return false
	}
	return (w.literal || w.files.matches(rel)) && (!w.byKey || w.keys.matches(f.Key))
}

// Scope is what waivers are held against.
type Scope struct {
	Today  time.Time
	Beside []*Beside // waivers that stand in the audited files

	// Covered reports whether the audit read everything at or below a path
	// (which need not exist). Without it, an audit of a part of the tree would
	// call the other part's waivers unused.
	Covered func(path string) bool

	// Lines are the first and the last line of what a finding judges, its key
	// included. Nil: those of its place.
	Lines func(*rules.Finding) (first, last int)
}

// Waive accepts the findings that a waiver matches and that has not expired: it
// sets their Waiver, of several the one beside the value, then the first of
// dextral.toml, then of its waiver files. A waiver holds up to and including its
// last day, in the time zone of Scope.Today.
//
// It returns findings of its own, at the waivers' places: for every waiver that
// has expired, for every one that matched nothing although all it can match was
// audited, and for every one that accepts more than a person can have looked at.
func (p *Policy) Waive(findings []*rules.Finding, s Scope) []*rules.Finding {
	day := s.Today.Format(time.DateOnly)
	uses := make([]use, len(s.Beside)+len(p.accepted))
	beside, sheet := uses[:len(s.Beside)], uses[len(s.Beside):]
	for _, f := range findings {
		for i, b := range s.Beside {
			if b.matches(f, s.Lines) {
				beside[i].accept(f, b.Waiver, day)
			}
		}
		rel, ok := p.rel(f.Place.Path)
		for i := range p.accepted {
			if w := &p.accepted[i]; ok && w.matches(f, rel) {
				sheet[i].accept(f, w.Waiver, day)
			}
		}
	}
	var own []*rules.Finding
	for i, b := range s.Beside {
		own = append(own, judge(b.Waiver, &beside[i], s.Today, p.coversRigs(s, b.At.Path))...)
	}
	for i := range p.accepted {
		w := &p.accepted[i]
		base := path.Join(path.Dir(p.Path), w.files.base())
		own = append(own, judge(w.Waiver, &sheet[i], s.Today, p.coversRigs(s, base))...)
		if day <= w.Until {
			own = append(own, w.tooBroad(&sheet[i])...)
		}
	}
	return own
}

// coversRigs reports whether everything at a path was audited. Where there are
// rigs, a finding may need files from anywhere below the sheet.
func (p *Policy) coversRigs(s Scope, base string) bool {
	return s.Covered(base) && (len(p.rigs) == 0 || s.Covered(path.Dir(p.Path)))
}

// use is what one waiver matched.
type use struct{ places map[string]bool }

func (u *use) accept(f *rules.Finding, w *rules.Waiver, day string) {
	if u.places == nil {
		u.places = map[string]bool{}
	}
	u.places[f.Place.Path+"#"+f.Key] = true
	switch {
	case day > w.Until && f.Lapsed == nil:
		f.Lapsed = w
	case day <= w.Until && f.Waiver == nil:
		f.Waiver = w
	}
}

// judge reports a waiver that has expired or that is not used.
func judge(w *rules.Waiver, u *use, today time.Time, covered bool) []*rules.Finding {
	switch {
	case today.Format(time.DateOnly) > w.Until:
		return []*rules.Finding{expired(w, today, len(u.places) > 0)}
	case len(u.places) == 0 && covered:
		return []*rules.Finding{unused(w)}
	}
	return nil
}

// onWaiver starts a finding on a waiver.
func onWaiver(rule string, w *rules.Waiver, format string, args ...any) *rules.Finding {
	what, of, key := w.Rule+" at "+w.Place, w.Rule+" at "+w.Place, "waiver."+w.Rule+"."+w.Place
	if w.Inline() {
		what, of, key = w.Rule, w.Rule+" in this comment", "waiver."+w.Rule
	}
	return &rules.Finding{
		Rule: rule, Level: rules.Warning, Place: w.At, Key: key,
		Claim:   fmt.Sprintf("%s is waived until %s", what, w.Until),
		Message: "the waiver of " + of + " " + fmt.Sprintf(format, args...),
	}
}

func expired(w *rules.Waiver, today time.Time, used bool) *rules.Finding {
	f := onWaiver(rules.WaiverExpired, w, "ended on %s", w.Until)
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

func unused(w *rules.Waiver) *rules.Finding {
	f := onWaiver(rules.WaiverUnused, w, "matches no finding")
	f.Evidence = []rules.Evidence{{What: "findings that it matches", Stated: rules.Words("1 or more"), Computed: rules.Plain(0)}}
	switch {
	case w.Inline():
		f.Remedy = "delete it if the finding is mended; otherwise move it: it speaks of the value on its own line or, where it has its line to itself, on the next one"
	case w.InFile:
		f.Remedy = fmt.Sprintf("delete it; dextral audit --waive-all-new %s drops all that match nothing", path.Base(w.At.Path))
	default:
		f.Remedy = "delete it if the finding is mended; otherwise correct its place, which is relative to the directory of this file"
	}
	return f
}

// MaxPlaces is the most places that one waiver may accept. It is a choice: so
// many a person can have looked at one by one.
const MaxPlaces = 25

// tooBroad reports a waiver whose place takes in whole trees, so that it accepts
// what nobody has seen yet, and one that accepts findings at very many places.
func (w *waiver) tooBroad(u *use) []*rules.Finding {
	n := len(u.places)
	var f *rules.Finding
	switch {
	case w.files.wholeTree():
		f = onWaiver(rules.WaiverTooBroad, w.Waiver, "takes in whole directories, and with them whatever is written there in future")
	case n > MaxPlaces:
		f = onWaiver(rules.WaiverTooBroad, w.Waiver, "accepts findings at %d places, more than the %d that somebody can have looked at one by one", n, MaxPlaces)
	default:
		return nil
	}
	f.Evidence = []rules.Evidence{{What: "places that it accepts now", Stated: rules.Words(fmt.Sprintf("%d or fewer", MaxPlaces)), Computed: rules.Plain(float64(n))}}
	f.Remedy = "write a waiver for each file or key; or, if the tree is not yours, exclude it; or, if a convention is meant, declare it in a [[claim]]"
	return []*rules.Finding{f}
}

// TooBroad reports whether a place takes in whole directories, as
// waiver-too-broad has it.
func TooBroad(place string) bool {
	w := waiver{Waiver: &rules.Waiver{Place: place}}
	return w.parsePlace() == nil && w.files.wholeTree()
}

// Accepts reports whether a waiver of a rule and place would match a finding, and
// an error if the place cannot be understood.
func (p *Policy) Accepts(rule, place string, f *rules.Finding) (bool, error) {
	w := waiver{Waiver: &rules.Waiver{Rule: rule, Place: place}}
	if err := w.parsePlace(); err != nil {
		return false, err
	}
	rel, ok := p.rel(f.Place.Path)
	return ok && w.matches(f, rel), nil
}

// daysBetween counts days from one YYYY-MM-DD to a later one.
func daysBetween(from, to string) float64 {
	a, _ := time.Parse(time.DateOnly, from)
	b, _ := time.Parse(time.DateOnly, to)
	return b.Sub(a).Hours() / 24
}
