// Package walk lists the files of a tree that an audit should look at.
//
// What version control ignores is not the user's work and is left out: the
// .gitignore files of the tree and of the directories above it up to the
// repository's root, and .git/info/exclude, are obeyed (gitignore(5)). A path
// named by the user is always listed, ignored or not. Symbolic links to
// directories are not followed, so that no loop can catch the walk; links to
// files are left out as well, since their target is listed where it stands.
// Everything left out is counted.
package walk

import (
	"context"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strings"

	"dextral/rules"
	"dextral/rules/policy"
)

// File is one regular file of the tree.
type File struct {
	Path   string // as printed: slashes, relative to the start directory where possible
	Name   string // as the operating system opens it
	Size   int64
	Policy *policy.Policy // of the nearest dextral.toml at or above it
	Rel    string         // path relative to that dextral.toml's directory, slashes
}

// Tree is the result of a walk.
type Tree struct {
	Files    []File // sorted by Path, each once
	Policies []*policy.Policy
	Ignored  int // entries that version control ignores
	Excluded int // entries excluded by dextral.toml
	Links    int // symbolic links not followed
	Failed   []Failure
}

// Failure is a path that could not be listed or read.
type Failure struct {
	Place rules.Place
	Err   error
}

// List walks the given paths; dir is the directory against which they are
// resolved and printed.
func List(ctx context.Context, dir string, paths []string) (*Tree, error) {
	w := walker{dir: dir, seen: map[string]bool{}, scopes: map[string]*scope{}}
	for _, p := range paths {
		if err := w.root(ctx, p); err != nil {
			return nil, err
		}
	}
	slices.SortFunc(w.tree.Files, func(a, b File) int { return strings.Compare(a.Path, b.Path) })
	return &w.tree, nil
}

type walker struct {
	dir    string
	tree   Tree
	seen   map[string]bool
	scopes map[string]*scope // by directory of the dextral.toml; "" for none
}

// scope is the reach of one dextral.toml.
type scope struct {
	dir    string // "" where there is no dextral.toml
	policy *policy.Policy
}

func (w *walker) fail(path string, err error) {
	var at rules.Place
	var placed interface{ Where() rules.Place }
	if errors.As(err, &placed) {
		at = placed.Where()
	} else {
		at = rules.Place{Path: w.printed(path)}
	}
	var pathErr *fs.PathError
	if errors.As(err, &pathErr) {
		err = pathErr.Err // the place already names the path
	}
	w.tree.Failed = append(w.tree.Failed, Failure{at, err})
}

// root starts at a path that the user named.
func (w *walker) root(ctx context.Context, arg string) error {
	name := arg
	if !filepath.IsAbs(name) {
		name = filepath.Join(w.dir, arg)
	}
	name = filepath.Clean(name)
	info, err := os.Stat(name)
	if err != nil {
		w.fail(name, err)
		return ctx.Err()
	}
	enclosing := name
	if !info.IsDir() {
		enclosing = filepath.Dir(name)
	}
	above := enclosingDirs(enclosing)
	var ig ignores
	for _, d := range above {
		ig = ig.enter(d)
	}
	sc := w.nearest(enclosing)
	if !info.IsDir() {
		w.file(name, info.Size(), sc)
		return ctx.Err()
	}
	return w.directory(ctx, name, ig, sc)
}

// nearest finds the dextral.toml at or above a directory, up to the root of
// the repository that holds it, or of the file system.
func (w *walker) nearest(dir string) *scope {
	for _, d := range slices.Backward(enclosingDirs(dir)) {
		if sc := w.scopeAt(d); sc != nil {
			return sc
		}
	}
	if w.scopes[""] == nil {
		w.scopes[""] = &scope{policy: policy.Default()}
		w.tree.Policies = append(w.tree.Policies, w.scopes[""].policy)
	}
	return w.scopes[""]
}

// scopeAt loads the dextral.toml of exactly this directory. A faulty file is
// reported, and the defaults hold below it.
func (w *walker) scopeAt(dir string) *scope {
	if sc, known := w.scopes[dir]; known {
		return sc
	}
	w.scopes[dir] = nil
	for _, base := range []string{"dextral.toml", ".dextral.toml"} {
		name := filepath.Join(dir, base)
		if info, err := os.Stat(name); err != nil || info.IsDir() {
			continue
		}
		text, err := os.ReadFile(name)
		p := policy.Default()
		if err == nil {
			var parsed *policy.Policy
			if parsed, err = policy.Parse(w.printed(name), text); err == nil {
				p = parsed
			}
		}
		if err != nil {
			w.fail(name, err)
		}
		w.scopes[dir] = &scope{dir: dir, policy: p}
		w.tree.Policies = append(w.tree.Policies, p)
		break
	}
	return w.scopes[dir]
}

func (w *walker) directory(ctx context.Context, dir string, ig ignores, sc *scope) error {
	if err := ctx.Err(); err != nil {
		return err
	}
	if own := w.scopeAt(dir); own != nil {
		sc = own
	}
	entries, err := os.ReadDir(dir)
	if err != nil {
		w.fail(dir, err)
		return nil
	}
	ig = ig.enter(dir)
	for _, e := range entries {
		name := filepath.Join(dir, e.Name())
		switch {
		case e.Type()&fs.ModeSymlink != 0:
			w.tree.Links++
		case e.IsDir() && isRepositoryData(e.Name()):
		case ig.match(name, e.IsDir()):
			w.tree.Ignored++
		case sc.policy.Excluded(sc.rel(name)):
			w.tree.Excluded++
		case e.IsDir():
			if err := w.directory(ctx, name, ig, sc); err != nil {
				return err
			}
		case e.Type().IsRegular():
			info, err := e.Info()
			if err != nil {
				w.fail(name, err)
				continue
			}
			w.file(name, info.Size(), sc)
		}
	}
	return nil
}

func (w *walker) file(name string, size int64, sc *scope) {
	if w.seen[name] {
		return
	}
	w.seen[name] = true
	w.tree.Files = append(w.tree.Files, File{Path: w.printed(name), Name: name, Size: size, Policy: sc.policy, Rel: sc.rel(name)})
}

// printed is the path as messages show it.
func (w *walker) printed(name string) string {
	if rel, err := filepath.Rel(w.dir, name); err == nil {
		return filepath.ToSlash(rel)
	}
	return filepath.ToSlash(name)
}

func (s *scope) rel(name string) string {
	if s.dir == "" {
		return filepath.ToSlash(strings.TrimPrefix(name, filepath.VolumeName(name)+string(filepath.Separator)))
	}
	rel, err := filepath.Rel(s.dir, name)
	if err != nil {
		return filepath.ToSlash(name)
	}
	return filepath.ToSlash(rel)
}

func isRepositoryData(base string) bool { return base == ".git" || base == ".hg" || base == ".svn" }

// String says what was left out, for summaries.
func (t *Tree) String() string {
	return fmt.Sprintf("%d files; left out: %d ignored by version control, %d excluded by dextral.toml, %d links",
		len(t.Files), t.Ignored, t.Excluded, t.Links)
}
