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
	"cmp"
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
	Asked  bool           // named by the user, not met on the way
}

// Tree is the result of a walk.
type Tree struct {
	Files    []File           // sorted by Path, each once
	Policies []*policy.Policy // every dextral.toml in force, as found
	Roots    []*policy.Policy // in force at each path that was asked for
	Ignored  int              // entries that version control ignores
	Excluded int              // entries excluded by dextral.toml
	Links    int              // symbolic links not followed
	Failed   []Failure
}

// Failure is a path that could not be listed or read.
type Failure struct {
	Place rules.Place
	Err   error
}

// List walks the given paths. They are resolved against the working directory
// and printed relative to it.
func List(ctx context.Context, paths []string) (*Tree, error) {
	dir, err := os.Getwd()
	if err != nil {
		return nil, fmt.Errorf("the working directory is not known: %w", err)
	}
	w := walker{dir: dir, known: rules.Names(), seen: map[string]bool{}, scopes: map[string]*policy.Policy{}}
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
	known  []string // names of rules
	seen   map[string]bool
	scopes map[string]*policy.Policy // by directory; nil where it has no dextral.toml; "" for the default
}

func (w *walker) fail(path string, err error) {
	at := rules.Place{Path: w.printed(path)}
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
	w.tree.Roots = append(w.tree.Roots, sc)
	if !info.IsDir() {
		w.file(name, info.Size(), sc)
		if n := len(w.tree.Files); n > 0 && w.tree.Files[n-1].Name == name {
			w.tree.Files[n-1].Asked = true
		}
		return ctx.Err()
	}
	return w.directory(ctx, name, ig, sc)
}

// nearest finds the dextral.toml at or above a directory, up to the root of
// the repository that holds it, or of the file system.
func (w *walker) nearest(dir string) *policy.Policy {
	for _, d := range slices.Backward(enclosingDirs(dir)) {
		if sc := w.scopeAt(d); sc != nil {
			return sc
		}
	}
	if w.scopes[""] == nil {
		w.scopes[""] = policy.Default()
	}
	return w.scopes[""]
}

// scopeAt loads the dextral.toml of exactly this directory. A faulty file is
// reported, and the defaults hold below it.
func (w *walker) scopeAt(dir string) *policy.Policy {
	if sc, known := w.scopes[dir]; known {
		return sc
	}
	w.scopes[dir] = nil
	name, err := policy.Find(w.printed(dir))
	if name == "" && err == nil {
		return nil
	}
	p := policy.Default()
	if err == nil {
		var loaded *policy.Policy
		if loaded, err = policy.Load(name, w.known); err == nil {
			p = loaded
		}
	}
	if err != nil {
		w.failPolicy(name, dir, err)
	}
	w.scopes[dir] = p
	w.tree.Policies = append(w.tree.Policies, p)
	return p
}

// failPolicy reports each error of a dextral.toml at its own place.
func (w *walker) failPolicy(name, dir string, err error) {
	var errs policy.Errors
	if errors.As(err, &errs) {
		for _, e := range errs {
			w.tree.Failed = append(w.tree.Failed, Failure{e.Place, errors.New(e.Message)})
		}
		return
	}
	w.fail(cmp.Or(filepath.FromSlash(name), dir), err)
}

func (w *walker) directory(ctx context.Context, dir string, ig ignores, sc *policy.Policy) error {
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
		case sc.Excluded(w.printed(name)):
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

func (w *walker) file(name string, size int64, sc *policy.Policy) {
	if w.seen[name] {
		return
	}
	w.seen[name] = true
	w.tree.Files = append(w.tree.Files, File{Path: w.printed(name), Name: name, Size: size, Policy: sc})
}

// printed is the path as messages show it.
func (w *walker) printed(name string) string {
	if rel, err := filepath.Rel(w.dir, name); err == nil {
		return filepath.ToSlash(rel)
	}
	return filepath.ToSlash(name)
}

func isRepositoryData(base string) bool { return base == ".git" || base == ".hg" || base == ".svn" }

// String says what was left out, for summaries.
func (t *Tree) String() string {
	return fmt.Sprintf("%d files; left out: %d ignored by version control, %d excluded by dextral.toml, %d links",
		len(t.Files), t.Ignored, t.Excluded, t.Links)
}
