// Package revision compares two versions of a repository: what changed in
// orientation, what moves with it, and which findings are new.
//
// # How versions are read
//
// Only what differs is read, and what is judged together with it: the files of a
// rig of which one changed, and the files below a dextral.toml that changed. The
// old version of a file is written into a temporary directory and audited there
// under its own path; the new one is audited where it stands, or, if it is a
// commit too, in another temporary directory. Nothing is checked out, and no file
// of the repository is written.
//
// # What is compared
//
// Both versions are audited by the same readers and rules as always. Their
// values are then matched by package rules, which says what became of each; and
// their findings by fingerprint, after renamed files and keys have been carried
// over.
package revision

import (
	"context"
	"errors"
	"fmt"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"time"

	"dextral/analyzers/audit"
	"dextral/rules"
	"dextral/rules/policy"
	"dextral/rules/report"
)

// Options say what to compare.
type Options struct {
	Base, Head string    // revisions; Head "" is the working tree
	Fork       bool      // compare with where the two parted instead of with Base itself
	Today      time.Time // the day on which waivers are held against
	Gate       policy.Gate
	GateSet    bool // Gate is used; else that of the new version
}

// Review compares two versions of the repository around the working directory.
// The error says why nothing can be compared; what only part of the comparison
// fails on is in the result.
func Review(ctx context.Context, o Options) (*report.Review, error) {
	cwd, err := os.Getwd()
	if err != nil {
		return nil, fmt.Errorf("the working directory is not known: %w", err)
	}
	repo, err := open(ctx, cwd)
	if err != nil {
		return nil, err
	}
	base, head, err := repo.ends(ctx, o)
	if err != nil {
		return nil, err
	}
	temp, err := os.MkdirTemp("", "dextral-review-")
	if err != nil {
		return nil, err
	}
	defer os.RemoveAll(temp)
	s, err := scan(ctx, repo, base, head, cwd, temp)
	if err != nil {
		return nil, err
	}
	return s.review(ctx, o)
}

// ends resolves both revisions; head stays "" for the working tree.
func (r *repository) ends(ctx context.Context, o Options) (base, head string, err error) {
	if base, err = r.commit(ctx, o.Base); err != nil {
		return "", "", err
	}
	other := "HEAD"
	if o.Head != "" {
		if head, err = r.commit(ctx, o.Head); err != nil {
			return "", "", err
		}
		other = head
	}
	if o.Fork {
		base, err = r.fork(ctx, base, other)
	}
	return base, head, err
}

// review audits both sides and compares.
func (s *scanned) review(ctx context.Context, o Options) (*report.Review, error) {
	before, errBefore := s.audit(ctx, &s.before, o)
	after, errAfter := s.audit(ctx, &s.after, o)
	if err := errors.Join(errBefore, errAfter); err != nil {
		return nil, err
	}
	r := &report.Review{
		Base: named(o.Base, s.base, o.Fork), Head: named(o.Head, s.head, false), Files: s.changed, LeftOut: s.leftOut,
		Audit: after.Report, Changes: rules.Changes(before.Values, after.Values, s.renamed),
	}
	r.Changes = append(r.Changes, seriesChanges(before.Series, after.Series, s.renamed)...)
	for _, pair := range chainPairs(before.Chains, after.Chains, s.renamed) {
		moves, loops := rules.Downstream(pair[0], pair[1])
		if len(moves)+len(loops) > 0 {
			r.Downstream = append(r.Downstream, report.Downstream{Title: report.ChainTitle(pair[1]), Moves: moves, Loops: loops})
		}
	}
	r.Functions = s.functions(ctx)
	r.Compare(before.Report.Findings, s.renamed)
	return r, nil
}

func (s *scanned) audit(ctx context.Context, v *version, o Options) (*audit.Result, error) {
	options := audit.Options{Today: o.Today, Gate: o.Gate, GateSet: o.GateSet}
	for _, f := range v.tree.Files {
		options.Paths = append(options.Paths, f.Path)
	}
	return audit.Tree(ctx, &v.tree, options)
}

// named is a commit as the user called it, with its id; where two branches parted
// has no name.
func named(name, id string, fork bool) string {
	id = id[:min(len(id), 12)]
	if fork || name == "" || strings.HasPrefix(id, name) || strings.HasPrefix(name, id) {
		return id
	}
	return name + " (" + id + ")"
}

// seriesChanges are the channels of logs whose claims differ; their numbers are
// recordings, which no review compares.
func seriesChanges(before, after []*rules.Series, renamed map[string]string) []rules.Change {
	claimsOnly := func(list []*rules.Series) []*rules.Value {
		var values []*rules.Value
		for _, s := range list {
			v := s.Value
			v.Numbers, v.Form, v.Rows, v.Cols = nil, s.Value.Form, 0, 0
			v.Why = "a recording: only what is said about it is compared"
			values = append(values, &v)
		}
		return values
	}
	return slices.DeleteFunc(rules.Changes(claimsOnly(before), claimsOnly(after), renamed), func(c rules.Change) bool {
		return c.Before != nil && c.After != nil && c.Effect == rules.Unturned && !c.Moved
	})
}

// chainPairs matches the frame graphs of two versions by the file of their first
// value, rigs apart.
func chainPairs(before, after []*rules.Chain, renamed map[string]string) [][2]*rules.Chain {
	type name struct {
		path string
		rig  bool
	}
	old := map[name]*rules.Chain{}
	for _, c := range before {
		path := c.Links[0].Value.Place.Path
		if to, ok := renamed[path]; ok {
			path = to
		}
		old[name{path, c.Rig}] = c
	}
	var pairs [][2]*rules.Chain
	for _, c := range after {
		if was := old[name{c.Links[0].Value.Place.Path, c.Rig}]; was != nil {
			pairs = append(pairs, [2]*rules.Chain{was, c})
		}
	}
	return pairs
}

// printed is the path of a file of the repository as messages show it.
func printed(top, cwd, path string) string {
	name := filepath.Join(top, filepath.FromSlash(path))
	if rel, err := filepath.Rel(cwd, name); err == nil {
		return filepath.ToSlash(rel)
	}
	return filepath.ToSlash(name)
}
