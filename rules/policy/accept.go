package policy

import (
	"errors"
	"fmt"
	"io/fs"
	"path"
	"slices"
	"strings"

	"dextral/rules"
)

// accept reads the [[waiver]] tables of a sheet or of a file of waivers.
func (p *Policy) accept(t *table) {
	for _, w := range t.many("waiver") {
		w := w.waiver()
		w.InFile = t.r.lines.path != p.Path
		p.accepted = append(p.accepted, w)
		p.Waivers = append(p.Waivers, w.Waiver)
	}
}

// waiver reads a [[waiver]].
func (t *table) waiver() waiver {
	w := waiver{Waiver: &rules.Waiver{At: t.at()}}
	t.accepts(w.Waiver)
	if s, ok := t.text("place"); ok {
		w.Place = s
		if err := w.parsePlace(); err != nil {
			t.r.fail(t.valueAt("place"), "place%s: %q %v", t.within(), s, err)
		}
	}
	t.close("rule", "place", "until", "because", "owner")
	return w
}

// accepts reads what waivers have in common wherever they stand.
func (t *table) accepts(w *rules.Waiver) {
	w.Rule, _ = t.text("rule")
	if w.Rule != "" {
		t.checkRule(w.Rule)
	}
	w.Until, _ = t.day("until")
	w.Because, _ = t.text("because")
	w.Owner, _ = t.text("owner")
}

// OnWaivers are the rules about waivers, which no waiver silences.
var OnWaivers = []string{rules.WaiverExpired, rules.WaiverUnused, rules.WaiverTooBroad}

func (t *table) checkRule(name string) {
	if problem := RuleProblem(name, t.r.known); problem != "" {
		t.r.fail(t.valueAt("rule"), "%s", problem)
	}
}

// RuleProblem says why a waiver cannot name a rule; "" if it can.
func RuleProblem(name string, known []string) string {
	switch near := nearest(name, known); {
	case slices.Contains(OnWaivers, name):
		return name + " is not waived by another waiver; renew the waiver it speaks of, or delete it"
	case slices.Contains(known, name):
		return ""
	case near != "":
		return fmt.Sprintf("no rule is named %q; did you mean %q?", name, near)
	}
	return fmt.Sprintf("no rule is named %q (known: %s)", name, strings.Join(known, ", "))
}

// waiverFiles reads the names of files that hold more waivers.
func (t *table) waiverFiles() []located {
	all := t.texts("waiver_files")
	for _, f := range all {
		g, err := parseGlob(f.text)
		switch {
		case err != nil:
			t.r.fail(f.at, "waiver_files: %q %v", f.text, err)
		case g.base() != string(g):
			t.r.fail(f.at, "waiver_files: %q is a glob; name each file", f.text)
		}
	}
	return all
}

// WaiverFiles are the paths of the files of waivers that the sheet names.
func (p *Policy) WaiverFiles() []string {
	var all []string
	for _, f := range p.files {
		all = append(all, path.Join(path.Dir(p.Path), f.text))
	}
	return all
}

// ReadWaivers reads the files of waivers that the sheet names. They are part of
// it: places in them are relative to the directory of the sheet. Errors about
// their texts are of type Errors.
func (p *Policy) ReadWaivers(known []string, read func(file string) ([]byte, error)) error {
	for i, file := range p.WaiverFiles() {
		text, err := read(file)
		if err != nil {
			var pathErr *fs.PathError
			if errors.As(err, &pathErr) {
				err = pathErr.Err // the message names the path already
			}
			return Errors{{p.files[i].at, fmt.Sprintf("waiver_files: %s cannot be read: %v", file, err)}}
		}
		if len(text) > maxSize {
			return Errors{{rules.Place{Path: file}, fmt.Sprintf("is larger than %d bytes; it is not read", maxSize)}}
		}
		err = parseText(file, text, known, func(t *table) {
			p.accept(t)
			t.close()
		})
		if err != nil {
			return err
		}
	}
	return nil
}
