package revision

import (
	"context"
	"errors"
	"fmt"
	"os"
	"path"
	"path/filepath"
	"slices"
	"strings"

	"dextral/analyzers/walk"
	"dextral/rules"
	"dextral/rules/policy"
	"dextral/rules/report"
)

// largest is the size beyond which a file is not compared: nobody reviews it.
const largest = 256 << 20

// version is one side of a comparison.
type version struct {
	files map[string]entry // all files by path from the top; an id of "" is the file of the working tree
	dir   string           // where blobs are written
	tree  walk.Tree        // what is audited
	known map[string]*policy.Policy
}

// scanned is what differs between two versions, ready to be audited.
type scanned struct {
	repo          *repository
	cwd           string
	base, head    string
	before, after version
	renamed       map[string]string // printed paths, old to new
	changed       int               // files that differ
	leftOut       []report.Skipped
}

func scan(ctx context.Context, repo *repository, base, head, cwd, temp string) (*scanned, error) {
	s := &scanned{repo: repo, cwd: cwd, base: base, head: head, renamed: map[string]string{}}
	all, err := repo.tree(ctx, base)
	if err != nil {
		return nil, err
	}
	diffs, err := repo.differences(ctx, base, head)
	if err != nil {
		return nil, err
	}
	s.changed = len(diffs)
	s.before = version{files: map[string]entry{}, dir: filepath.Join(temp, "before"), known: map[string]*policy.Policy{}}
	s.after = version{files: map[string]entry{}, dir: filepath.Join(temp, "after"), known: map[string]*policy.Policy{}}
	for _, e := range all {
		s.before.files[e.path], s.after.files[e.path] = e, e
	}
	old, now := s.patch(diffs)
	for _, side := range []struct {
		v     *version
		paths map[string]bool
	}{{&s.before, old}, {&s.after, now}} {
		if err := s.policies(ctx, side.v); err != nil {
			return nil, err
		}
		s.widen(side.v, old, now)
	}
	if err := s.fill(ctx, &s.before, old, now); err != nil {
		return nil, err
	}
	return s, s.fill(ctx, &s.after, now, old)
}

// patch makes the new version out of the old one, and returns the paths that
// differ on each side.
func (s *scanned) patch(diffs []difference) (old, now map[string]bool) {
	old, now = map[string]bool{}, map[string]bool{}
	for _, d := range diffs {
		if d.oldMode == submodule || d.newMode == submodule {
			s.leave(d.newPath, "a submodule: review it in its own repository")
			continue
		}
		if !d.added() {
			old[d.oldPath] = true
			delete(s.after.files, d.oldPath)
		}
		if d.newPath != d.oldPath {
			s.renamed[s.print(d.oldPath)] = s.print(d.newPath)
		}
	}
	for _, d := range diffs {
		if d.newMode == submodule || d.oldMode == submodule || d.deleted() {
			continue
		}
		now[d.newPath] = true
		e := entry{mode: d.newMode, path: d.newPath}
		if s.head != "" {
			e.id = d.newID
		}
		s.after.files[d.newPath] = e
	}
	return old, now
}

func (s *scanned) print(p string) string { return printed(s.repo.dir, s.cwd, p) }

func (s *scanned) leave(p, why string) {
	s.leftOut = append(s.leftOut, report.Skipped{Path: s.print(p), Why: why})
}

// text returns the contents of a small file of a version.
func (s *scanned) text(ctx context.Context, e entry) ([]byte, error) {
	if e.id == "" {
		return os.ReadFile(s.name(e.path))
	}
	return s.repo.git(ctx, nil, "cat-file", "blob", e.id)
}

// name is a file of the working tree.
func (s *scanned) name(p string) string { return filepath.Join(s.repo.dir, filepath.FromSlash(p)) }

// policies reads every dextral.toml of a version.
func (s *scanned) policies(ctx context.Context, v *version) error {
	names := rules.Names()
	for p, e := range v.files {
		if !slices.Contains(policy.Names, path.Base(p)) || e.mode == symlink {
			continue
		}
		text, err := s.text(ctx, e)
		if err != nil {
			return err
		}
		read, err := policy.Parse(s.print(p), text, names)
		if err == nil {
			err = read.ReadWaivers(names, func(file string) ([]byte, error) { return s.waivers(ctx, v, file) })
		}
		if err != nil {
			v.fail(s.print(p), err)
			read = policy.Default()
		}
		v.known[path.Dir(p)] = read
		v.tree.Policies = append(v.tree.Policies, read)
	}
	slices.SortFunc(v.tree.Policies, func(a, b *policy.Policy) int { return strings.Compare(a.Path, b.Path) })
	v.known[""] = policy.Default()
	return nil
}

// waivers reads a file of waivers, given by its printed path, of a version.
func (s *scanned) waivers(ctx context.Context, v *version, file string) ([]byte, error) {
	for p, e := range v.files {
		if s.print(p) == path.Clean(file) {
			return s.text(ctx, e)
		}
	}
	return nil, os.ErrNotExist
}

func (v *version) fail(p string, err error) {
	var errs policy.Errors
	if errors.As(err, &errs) {
		for _, e := range errs {
			v.tree.Failed = append(v.tree.Failed, walk.Failure{Place: e.Place, Err: errors.New(e.Message)})
		}
		return
	}
	v.tree.Failed = append(v.tree.Failed, walk.Failure{Place: rules.Place{Path: p}, Err: err})
}

// nearest is the policy at or above a file.
func (v *version) nearest(p string) *policy.Policy {
	for dir := path.Dir(p); ; dir = path.Dir(dir) {
		if found := v.known[dir]; found != nil {
			return found
		}
		if dir == "." || dir == "/" {
			return v.known[""]
		}
	}
}

// widen adds what is judged together with the files that differ: what lies below
// a dextral.toml that differs, the other files of a rig and of a Go package.
func (s *scanned) widen(v *version, old, now map[string]bool) {
	rigs := map[*policy.Policy]map[string]bool{}
	packages := map[string]bool{}
	var sheets []string
	for p := range union(old, now) {
		if slices.Contains(policy.Names, path.Base(p)) {
			sheets = append(sheets, path.Dir(p))
		}
		if path.Ext(p) == ".go" {
			packages[path.Dir(p)] = true
		}
		if sc := v.nearest(p); sc.RigOf(s.print(p)) != "" {
			if rigs[sc] == nil {
				rigs[sc] = map[string]bool{}
			}
			rigs[sc][sc.RigOf(s.print(p))] = true
		}
	}
	if len(sheets)+len(rigs)+len(packages) == 0 {
		return
	}
	for p := range v.files {
		sc := v.nearest(p)
		below := slices.ContainsFunc(sheets, func(dir string) bool { return dir == "." || strings.HasPrefix(p, dir+"/") })
		if below || path.Ext(p) == ".go" && packages[path.Dir(p)] || rigs[sc][sc.RigOf(s.print(p))] {
			old[p], now[p] = true, true
		}
	}
}

func union(a, b map[string]bool) map[string]bool {
	all := map[string]bool{}
	for p := range a {
		all[p] = true
	}
	for p := range b {
		all[p] = true
	}
	return all
}

// fill lists the files of a version that are audited, and writes those that are
// not in the working tree.
func (s *scanned) fill(ctx context.Context, v *version, paths, others map[string]bool) error {
	var blobs []entry
	for p := range union(paths, others) {
		e, ok := v.files[p]
		if !ok || e.mode == symlink || e.mode == submodule || v.excluded(s, p) {
			continue
		}
		if e.id != "" {
			blobs = append(blobs, e)
			continue
		}
		info, err := os.Lstat(s.name(p))
		switch {
		case err != nil:
			v.fail(s.print(p), err)
		case !info.Mode().IsRegular(): // a link that version control does not know yet
		case info.Size() > largest:
			s.leave(p, fmt.Sprintf("larger than %d MB", largest>>20))
		default:
			v.add(s.print(p), s.name(p), info.Size(), v.nearest(p))
		}
	}
	if err := s.blobs(ctx, v, blobs); err != nil {
		return err
	}
	slices.SortFunc(v.tree.Files, func(a, b walk.File) int { return strings.Compare(a.Path, b.Path) })
	v.tree.Roots = append(v.tree.Roots, v.nearest("."))
	return nil
}

func (v *version) add(path, name string, size int64, sc *policy.Policy) {
	v.tree.Files = append(v.tree.Files, walk.File{Path: path, Name: name, Size: size, Policy: sc})
}

// excluded reports whether dextral.toml excludes a file or a directory above it.
func (v *version) excluded(s *scanned, p string) bool {
	sc := v.nearest(p)
	for q := p; q != "." && q != "/"; q = path.Dir(q) {
		if sc.Excluded(s.print(q)) {
			return true
		}
	}
	return false
}

// blobs writes files of a commit and lists them for the audit; Go files with what
// they are compiled against.
func (s *scanned) blobs(ctx context.Context, v *version, list []entry) error {
	ids := make([]string, len(list))
	for i, e := range list {
		ids[i] = e.id
	}
	sizes, err := s.repo.sizes(ctx, ids)
	if err != nil {
		return err
	}
	var write []blob
	var goDirs []string
	for i, e := range list {
		name := v.name(e.path)
		switch {
		case sizes[i] < 0:
			v.fail(s.print(e.path), errors.New("its contents are not in this clone; fetch them first"))
			continue
		case sizes[i] > largest:
			s.leave(e.path, fmt.Sprintf("larger than %d MB", largest>>20))
			continue
		case path.Ext(e.path) == ".go":
			goDirs = append(goDirs, path.Dir(e.path))
		}
		write = append(write, blob{e.id, name})
		v.add(s.print(e.path), name, sizes[i], v.nearest(e.path))
	}
	if err := s.repo.write(ctx, write); err != nil {
		return err
	}
	return s.support(ctx, v, goDirs)
}

// name is where a file of a commit is written.
func (v *version) name(p string) string { return filepath.Join(v.dir, filepath.FromSlash(p)) }
