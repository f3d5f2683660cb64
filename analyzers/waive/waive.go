// Package waive writes waivers: one that somebody asks for, or one for every
// finding of an old repository.
//
// Both audit first and accept only what was found, so that no waiver stands for
// a mistake that is not there. The sheet is changed by adding to it; comments,
// layout and line ends stay, and the text is read again before it is written.
package waive

import (
	"context"
	"errors"
	"fmt"
	"os"
	"path"
	"path/filepath"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"time"

	"dextral/analyzers/audit"
	"dextral/analyzers/rewrite"
	"dextral/analyzers/walk"
	"dextral/rules"
	"dextral/rules/policy"

	"github.com/bmatcuk/doublestar/v4"
)

// Request says what to accept.
type Request struct {
	Rule    string
	Place   string // path or glob, with #key, or path:line or path:line:column as reports print it; relative to the working directory
	Until   string // YYYY-MM-DD
	Because string
	Owner   string
	Today   time.Time
}

// Result is what was written.
type Result struct {
	Waiver   *rules.Waiver
	Created  bool // the sheet was made
	Accepted []*rules.Finding
}

// One accepts the findings of one rule at one place.
func One(ctx context.Context, r Request) (*Result, error) {
	if problem := policy.RuleProblem(r.Rule, rules.Names()); problem != "" {
		return nil, errors.New(problem)
	}
	if err := checkWords(r.Until, r.Because, r.Owner, r.Today); err != nil {
		return nil, err
	}
	at, err := parsePlace(r.Place)
	if err != nil {
		return nil, err
	}
	matched, sheet, err := r.find(ctx, at)
	if err != nil {
		return nil, err
	}
	place, err := at.relative(sheet, matched)
	if err != nil {
		return nil, err
	}
	var open []*rules.Finding
	for _, f := range matched {
		if f.Waiver == nil {
			open = append(open, f)
		}
	}
	switch w := matched[0].Waiver; {
	case len(open) == 0:
		return nil, fmt.Errorf("%s at %s is accepted until %s already, by %s", r.Rule, r.Place, w.Until, w.At)
	case policy.TooBroad(place):
		return nil, fmt.Errorf("%s takes in whole directories, and with them what will be written there; name the files, or exclude the tree in dextral.toml", place)
	case distinct(open) > policy.MaxPlaces:
		return nil, fmt.Errorf("%s accepts findings at %d places; more than %d nobody has looked at one by one", place, distinct(open), policy.MaxPlaces)
	}
	w := &rules.Waiver{Rule: r.Rule, Place: place, Until: r.Until, Because: r.Because, Owner: r.Owner}
	created, err := add(sheet, w, open, r.Today)
	return &Result{Waiver: w, Created: created, Accepted: open}, err
}

// checkWords refuses a waiver that the sheet would refuse or that is over.
func checkWords(until, because, owner string, today time.Time) error {
	if until == "" {
		return errors.New("a waiver has a last day: --until")
	}
	if _, err := time.Parse(time.DateOnly, until); err != nil {
		return fmt.Errorf("the last day %q is no date such as 2031-03-31", until)
	}
	switch {
	case until < today.Format(time.DateOnly):
		return fmt.Errorf("the last day %s is over", until)
	case strings.TrimSpace(because) == "":
		return errors.New("a waiver gives a reason: --because")
	case strings.TrimSpace(owner) == "":
		return errors.New("a waiver names who answers for it: --owner")
	}
	return nil
}

// place is a place as somebody typed it.
type place struct {
	files string // path or glob
	key   string // pattern, with its #
	line  int    // 0: any
}

var lineSuffix = regexp.MustCompile(`^(.+?):([0-9]+)(:[0-9]+)?:?$`)

func parsePlace(typed string) (place, error) {
	files, key, byKey := strings.Cut(filepath.ToSlash(typed), "#")
	p := place{files: files}
	if byKey {
		p.key = "#" + key
	} else if m := lineSuffix.FindStringSubmatch(files); m != nil {
		p.files = m[1]
		p.line, _ = strconv.Atoi(m[2])
	}
	if p.files == "" {
		return place{}, errors.New("the place names no file; write path, path#key or path:line")
	}
	if info, err := os.Stat(filepath.FromSlash(p.files)); err == nil && info.IsDir() {
		return place{}, fmt.Errorf("%s is a directory; a waiver names files, such as %s", p.files, path.Join(p.files, "*.yaml"))
	}
	return p, nil
}

// base is the file or directory that holds all that the place can mean.
func (p place) base() string {
	if _, err := os.Stat(filepath.FromSlash(p.files)); err == nil || !strings.ContainsAny(p.files, "*?[{") {
		return p.files
	}
	dir, _ := doublestar.SplitPattern(p.files)
	return dir
}

// find audits the place and, since a contradiction may need files from elsewhere,
// the tree of its sheet if nothing is found there alone. It returns at least one
// finding; all stand under the policy that is returned.
func (r Request) find(ctx context.Context, at place) ([]*rules.Finding, *policy.Policy, error) {
	base := at.base()
	var sheet *policy.Policy
	var there []*rules.Finding
	for _, dir := range []string{base, ""} {
		if sheet != nil {
			dir = path.Dir(sheet.Path)
		}
		tree, err := walk.List(ctx, []string{dir})
		if err != nil {
			return nil, nil, err
		}
		if len(tree.Roots) == 0 {
			return nil, nil, fmt.Errorf("%s: %w", tree.Failed[0].Place, tree.Failed[0].Err)
		}
		sheet = tree.Roots[0]
		governed := governedBy(tree, sheet)
		result, err := audit.Tree(ctx, tree, audit.Options{Paths: []string{dir}, Today: r.Today})
		if err != nil {
			return nil, nil, err
		}
		for _, f := range result.Report.Failed {
			if slices.Contains(policy.Names, path.Base(f.Place.Path)) || f.Place.Path == base {
				return nil, nil, fmt.Errorf("%s: %s", f.Place, f.Message)
			}
		}
		var matched []*rules.Finding
		there = nil
		for _, f := range result.Report.Findings {
			ok, err := at.matches(f)
			if err != nil {
				return nil, nil, fmt.Errorf("the place %q %w", r.Place, err)
			}
			ok = ok && governed[f.Place.Path]
			if ok {
				there = append(there, f)
			}
			if ok && f.Rule == r.Rule {
				matched = append(matched, f)
			}
		}
		if len(matched) > 0 {
			return matched, sheet, nil
		}
	}
	return nil, nil, fmt.Errorf("no finding of %s at %s; %s", r.Rule, r.Place, foundInstead(there))
}

// governedBy are the files that a policy judges; those below another sheet are
// judged by that one.
func governedBy(tree *walk.Tree, p *policy.Policy) map[string]bool {
	set := map[string]bool{}
	for _, f := range tree.Files {
		if f.Policy == p {
			set[f.Path] = true
		}
	}
	return set
}

func foundInstead(there []*rules.Finding) string {
	if len(there) == 0 {
		return "nothing is found there"
	}
	var names []string
	for _, f := range there {
		if !slices.Contains(names, f.Rule) {
			names = append(names, f.Rule)
		}
	}
	return "found there: " + strings.Join(names, ", ")
}

// matches compares a finding with a place as typed.
func (p place) matches(f *rules.Finding) (bool, error) {
	if p.line > 0 {
		return path.Clean(p.files) == f.Place.Path && p.line >= f.Place.Line && p.line <= max(f.Place.Line, f.Place.EndLine), nil
	}
	pattern := path.Clean(p.files)
	if pattern == f.Place.Path { // also where the name holds characters of a glob
		pattern = policy.PlaceOf(f.Place.Path, "")
	}
	return here().Accepts(f.Rule, pattern+p.key, f)
}

// here is a policy of the working directory, to which typed paths are relative.
func here() *policy.Policy {
	p, err := policy.Parse("dextral.toml", nil, nil)
	if err != nil {
		return policy.Default()
	}
	return p
}

// relative is the place as the sheet writes it.
func (p place) relative(sheet *policy.Policy, matched []*rules.Finding) (string, error) {
	dir := "."
	if sheet.Path != "" {
		dir = path.Dir(sheet.Path)
	}
	files := p.files
	if files == matched[0].Place.Path || p.line > 0 {
		files = policy.PlaceOf(matched[0].Place.Path, "")
	}
	rel, err := filepath.Rel(absolute(dir), absolute(files))
	rel = filepath.ToSlash(rel)
	if err != nil || rel == ".." || strings.HasPrefix(rel, "../") {
		return "", fmt.Errorf("%s does not lie below %s, where its dextral.toml stands or would stand; run the command there", p.files, dir)
	}
	if p.line == 0 {
		return rel + p.key, nil
	}
	if distinct(matched) > 1 {
		return "", fmt.Errorf("line %d holds several places; name one by its key: %s", p.line, strings.Join(keys(matched), ", "))
	}
	if key := policy.PlaceOf("", matched[0].Key); matched[0].Key != "" {
		rel += key
	}
	return rel, nil
}

func absolute(slashed string) string {
	abs, err := filepath.Abs(filepath.FromSlash(slashed))
	if err != nil {
		return slashed
	}
	return abs
}

// distinct counts the places of findings.
func distinct(list []*rules.Finding) int {
	set := map[string]bool{}
	for _, f := range list {
		set[f.Place.Path+"#"+f.Key] = true
	}
	return len(set)
}

func keys(list []*rules.Finding) []string {
	var all []string
	for _, f := range list {
		if key := f.Place.Path + "#" + f.Key; !slices.Contains(all, key) {
			all = append(all, key)
		}
	}
	return all
}

// add writes a waiver into the sheet, or into a new one in the working directory,
// after it has seen that the new text accepts the findings.
func add(sheet *policy.Policy, w *rules.Waiver, accepted []*rules.Finding, today time.Time) (created bool, err error) {
	name, text := sheet.Path, []byte(nil)
	if created = name == ""; created {
		name = policy.Names[0]
	} else if text, err = os.ReadFile(filepath.FromSlash(name)); err != nil {
		return false, err
	}
	now := []byte(policy.Append(string(text), policy.Entry(w)))
	changed, err := policy.Parse(name, now, rules.Names())
	if err != nil {
		return false, fmt.Errorf("the waiver cannot be added to the end of %s, add it by hand: %w", name, err)
	}
	trial := make([]*rules.Finding, len(accepted))
	for i, f := range accepted {
		copied := *f
		trial[i] = &copied
	}
	changed.Waive(trial, policy.Scope{Today: today, Covered: func(string) bool { return false }})
	for _, f := range trial {
		if f.Waiver == nil {
			return false, fmt.Errorf("the waiver would not accept %s at %s; write its place by hand", f.Rule, f.Place)
		}
	}
	w.At = changed.Waivers[len(changed.Waivers)-1].At
	if created {
		return true, named(name, rewrite.Create(filepath.FromSlash(name), now))
	}
	return false, named(name, rewrite.Replace(filepath.FromSlash(name), rewrite.SumOf(text), now))
}

// named gives an error the path that it is about.
func named(name string, err error) error {
	if err == nil {
		return nil
	}
	return fmt.Errorf("%s %w", name, err)
}
