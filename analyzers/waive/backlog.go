package waive

import (
	"cmp"
	"context"
	"errors"
	"fmt"
	"os"
	"path"
	"path/filepath"
	"slices"
	"strings"
	"time"

	"dextral/analyzers/audit"
	"dextral/analyzers/rewrite"
	"dextral/analyzers/walk"
	"dextral/rules"
	"dextral/rules/policy"
)

// Backlog says how to accept everything that is found today.
type Backlog struct {
	File    string   // to hold the waivers; relative to the working directory
	Paths   []string // to audit; none: the working directory
	Owner   string
	Because string // "": see reason
	Until   string // YYYY-MM-DD; "": half a year from today
	Today   time.Time
}

// halfAYear is how long a backlog is accepted unless somebody says otherwise: a
// choice, long enough to plan the work and short enough to remember it.
const halfAYear = 182

// Written is what became of a file of waivers.
type Written struct {
	Sheet     string
	Created   bool            // the sheet was made
	Named     bool            // the sheet was told of the file
	Waivers   []*rules.Waiver // all that the file holds now, by rule and place
	Added     int
	Dropped   int // matched nothing any longer
	Lapsed    int // findings whose waiver has expired; they are not accepted again
	Elsewhere int // findings below other sheets; they are left alone
	Failed    int // inputs that could not be audited
}

// All writes a waiver for every finding that has none, and drops those of the
// file that match nothing. The rest of the file stays in force as it is.
func All(ctx context.Context, b Backlog) (*Written, error) {
	if len(b.Paths) == 0 {
		b.Paths = []string{"."}
	}
	b.Until = cmp.Or(b.Until, b.Today.AddDate(0, 0, halfAYear).Format(time.DateOnly))
	b.Because = cmp.Or(b.Because, "found on "+b.Today.Format(time.DateOnly)+", when everything was accepted in one go; nobody has looked at it yet")
	if err := checkWords(b.Until, b.Because, b.Owner, b.Today); err != nil {
		return nil, err
	}
	tree, err := walk.List(ctx, b.Paths)
	if err != nil {
		return nil, err
	}
	sheet, err := oneSheet(tree)
	if err != nil {
		return nil, err
	}
	file, known, err := b.file(sheet)
	if err != nil {
		return nil, err
	}
	result, err := audit.Tree(ctx, tree, audit.Options{Paths: b.Paths, Today: b.Today})
	if err != nil {
		return nil, err
	}
	w := &Written{Sheet: cmp.Or(sheet.Path, policy.Names[0]), Created: sheet.Path == "", Named: !known}
	w.Failed = len(result.Report.Failed)
	w.collect(b, sheet, file, result.Report.Findings, governedBy(tree, sheet))
	return w, b.write(w, sheet, file, known)
}

// oneSheet is the sheet that all paths asked for are under.
func oneSheet(tree *walk.Tree) (*policy.Policy, error) {
	for _, f := range tree.Failed {
		if slices.Contains(policy.Names, path.Base(f.Place.Path)) || len(tree.Roots) == 0 {
			return nil, fmt.Errorf("%s: %w", f.Place, f.Err)
		}
	}
	for _, p := range tree.Roots {
		if p != tree.Roots[0] {
			return nil, fmt.Errorf("these paths are under %s and %s; name paths under one of them", cmp.Or(tree.Roots[0].Path, "no sheet"), cmp.Or(p.Path, "no sheet"))
		}
	}
	return tree.Roots[0], nil
}

// file is the name of the file as the sheet writes it, and whether the sheet
// names it already.
func (b Backlog) file(sheet *policy.Policy) (rel string, known bool, err error) {
	dir := "."
	if sheet.Path != "" {
		dir = path.Dir(sheet.Path)
	}
	rel, err = filepath.Rel(absolute(dir), absolute(filepath.ToSlash(b.File)))
	rel = filepath.ToSlash(rel)
	switch {
	case err != nil || rel == ".." || strings.HasPrefix(rel, "../"):
		return "", false, fmt.Errorf("%s does not lie below %s, where dextral.toml stands or would stand", b.File, dir)
	case slices.Contains(policy.Names, path.Base(rel)):
		return "", false, errors.New("the waivers go into a file of their own, which dextral.toml names")
	case path.Ext(rel) != ".toml":
		return "", false, fmt.Errorf("%s is to be a TOML file; call it %s.toml", b.File, strings.TrimSuffix(b.File, filepath.Ext(b.File)))
	case policy.PlaceOf(rel, "") != rel:
		return "", false, fmt.Errorf("the name %s holds a character of globs; choose a plain one", b.File)
	}
	known = slices.Contains(sheet.WaiverFiles(), path.Join(path.Dir(cmp.Or(sheet.Path, policy.Names[0])), rel))
	if _, err := os.Lstat(b.File); err == nil && !known {
		return "", false, fmt.Errorf("%s is there and %s does not name it as a file of waivers; choose another name", b.File, cmp.Or(sheet.Path, policy.Names[0]))
	}
	return rel, known, nil
}

// collect decides what the file is to hold.
func (w *Written) collect(b Backlog, sheet *policy.Policy, file string, findings []*rules.Finding, governed map[string]bool) {
	dir := path.Dir(cmp.Or(sheet.Path, policy.Names[0]))
	name := path.Join(dir, file)
	unused := map[rules.Place]bool{}
	for _, f := range findings {
		if f.Rule == rules.WaiverUnused {
			unused[f.Place] = true
		}
	}
	for _, k := range sheet.Waivers {
		switch {
		case k.At.Path != name:
		case unused[k.At]:
			w.Dropped++
		default:
			w.Waivers = append(w.Waivers, k)
		}
	}
	seen := map[string]bool{}
	for _, f := range findings {
		switch {
		case f.Waiver != nil || slices.Contains(policy.OnWaivers, f.Rule):
		case f.Lapsed != nil:
			w.Lapsed++
		case !governed[f.Place.Path]:
			w.Elsewhere++
		default:
			rel, err := filepath.Rel(absolute(dir), absolute(f.Place.Path))
			place := policy.PlaceOf(filepath.ToSlash(rel), f.Key)
			if err != nil || seen[f.Rule+"\x00"+place] {
				continue
			}
			seen[f.Rule+"\x00"+place] = true
			w.Added++
			w.Waivers = append(w.Waivers, &rules.Waiver{Rule: f.Rule, Place: place, Until: b.Until, Because: b.Because, Owner: b.Owner})
		}
	}
	slices.SortStableFunc(w.Waivers, func(x, y *rules.Waiver) int {
		return cmp.Or(strings.Compare(x.Rule, y.Rule), strings.Compare(x.Place, y.Place))
	})
}

// ByRule counts the waivers of the file.
func (w *Written) ByRule() (names []string, counts map[string]int) {
	counts = map[string]int{}
	for _, k := range w.Waivers {
		if counts[k.Rule] == 0 {
			names = append(names, k.Rule)
		}
		counts[k.Rule]++
	}
	return names, counts
}

// text is the file.
func (w *Written) text(file string) []byte {
	var t strings.Builder
	fmt.Fprintf(&t, "# Findings that were accepted in one go, to be worked off one by one.\n#\n"+
		"# dextral audit --waive-all-new %s\n# writes this file anew: it drops what matches nothing any longer, keeps the other waivers and adds\n"+
		"# what is new. Comments are not kept.\n", file)
	names, counts := w.ByRule()
	for i, k := range w.Waivers {
		if i == 0 || k.Rule != w.Waivers[i-1].Rule {
			fmt.Fprintf(&t, "\n# %s: %d of %d\n", k.Rule, counts[k.Rule], len(w.Waivers))
		}
		t.WriteString("\n" + policy.Entry(k))
	}
	if len(names) == 0 {
		t.WriteString("\n# Nothing is left.\n")
	}
	return []byte(t.String())
}

// write writes the file and, where it is not known there yet, its name into the
// sheet: in this order, so that the sheet never names what is not there.
func (b Backlog) write(w *Written, sheet *policy.Policy, file string, known bool) error {
	if !known && len(w.Waivers) == 0 {
		w.Created, w.Named = false, false
		return nil // nothing to accept, nothing to write
	}
	name := filepath.FromSlash(path.Join(path.Dir(w.Sheet), file))
	text := w.text(b.File)
	check, err := policy.Parse(w.Sheet, []byte(policy.NameFile("", file)), rules.Names())
	if err == nil {
		err = check.ReadWaivers(rules.Names(), func(string) ([]byte, error) { return text, nil })
	}
	if err != nil {
		return fmt.Errorf("the waivers cannot be written so that they are read again: %w", err)
	}
	if !known {
		if err := named(b.File, rewrite.Create(name, text)); err != nil {
			return err
		}
		return b.tell(w, sheet, file)
	}
	old, err := os.ReadFile(name)
	if err != nil {
		return err
	}
	return named(b.File, rewrite.Replace(name, rewrite.SumOf(old), text))
}

// tell writes the name of the file into the sheet.
func (b Backlog) tell(w *Written, sheet *policy.Policy, file string) error {
	name := filepath.FromSlash(w.Sheet)
	if sheet.Path == "" {
		return named(w.Sheet, rewrite.Create(name, []byte(policy.NameFile("", file))))
	}
	old, err := os.ReadFile(name)
	if err != nil {
		return err
	}
	now := []byte(policy.NameFile(string(old), file))
	if _, err := policy.Parse(w.Sheet, now, rules.Names()); err != nil {
		return fmt.Errorf("the line waiver_files = %q cannot be added to %s, add it by hand: %w", file, w.Sheet, err)
	}
	return named(w.Sheet, rewrite.Replace(name, rewrite.SumOf(old), now))
}
