package revision

import (
	"context"
	"go/parser"
	"go/token"
	"path"
	"regexp"
	"slices"
	"strconv"
	"strings"
)

// support writes what the Go packages in some directories of a commit are compiled
// against: their other files, the packages of the repository that they import,
// one after the other, and the files that the go command wants. Imports from
// outside the repository come from the module cache, as always.
func (s *scanned) support(ctx context.Context, v *version, dirs []string) error {
	if len(dirs) == 0 {
		return nil
	}
	byDir := map[string][]entry{}
	for p, e := range v.files {
		byDir[path.Dir(p)] = append(byDir[path.Dir(p)], e)
	}
	modules, err := s.modules(ctx, v)
	if err != nil {
		return err
	}
	done := map[string]bool{}
	for len(dirs) > 0 {
		var next []string
		var write []blob
		for _, dir := range dirs {
			if done[dir] {
				continue
			}
			done[dir] = true
			for _, root := range modules.above(dir) {
				for _, name := range []string{"go.mod", "go.sum", "vendor/modules.txt"} {
					if e, ok := v.files[path.Join(root, name)]; ok && !done[e.path] {
						done[e.path] = true
						write = append(write, blob{e.id, v.name(e.path)})
					}
				}
			}
			for _, e := range byDir[dir] {
				if e.mode != symlink && e.mode != submodule && e.id != "" && path.Base(e.path) != "go.mod" {
					write = append(write, blob{e.id, v.name(e.path)})
				}
			}
			next = append(next, dir)
		}
		if err := s.repo.write(ctx, write); err != nil {
			return err
		}
		dirs = nil
		for _, dir := range next {
			for _, e := range byDir[dir] {
				if path.Ext(e.path) == ".go" && !strings.HasSuffix(e.path, "_test.go") {
					dirs = append(dirs, modules.imported(v.name(e.path), dir, byDir)...)
				}
			}
		}
	}
	return nil
}

// modules are the Go modules of a version, directory by module path.
type modules map[string]string

var moduleLine = regexp.MustCompile(`(?m)^module[ \t]+"?([^"\s]+)`)

func (s *scanned) modules(ctx context.Context, v *version) (modules, error) {
	m := modules{}
	for p, e := range v.files {
		if path.Base(p) != "go.mod" || strings.Contains("/"+p, "/vendor/") || strings.Contains("/"+p, "/testdata/") {
			continue
		}
		text, err := s.text(ctx, e)
		if err != nil {
			return nil, err
		}
		if found := moduleLine.FindSubmatch(text); found != nil {
			m[string(found[1])] = path.Dir(p)
		}
	}
	return m, nil
}

// above are the directories of modules that hold a directory.
func (m modules) above(dir string) []string {
	var list []string
	for _, root := range m {
		if root == "." || dir == root || strings.HasPrefix(dir, root+"/") {
			list = append(list, root)
		}
	}
	slices.Sort(list)
	return list
}

// imported are the directories of the repository that a Go file imports.
func (m modules) imported(name, dir string, byDir map[string][]entry) []string {
	file, err := parser.ParseFile(token.NewFileSet(), name, nil, parser.ImportsOnly)
	if err != nil {
		return nil // what cannot be parsed is reported by the audit
	}
	var list []string
	for _, spec := range file.Imports {
		p, err := strconv.Unquote(spec.Path.Value)
		if err != nil {
			continue
		}
		for _, root := range m.above(dir) {
			if vendored := path.Join(root, "vendor", p); byDir[vendored] != nil {
				list = append(list, vendored)
			}
		}
		for module, root := range m {
			if p == module || strings.HasPrefix(p, module+"/") {
				list = append(list, path.Join(root, strings.TrimPrefix(p, module)))
			}
		}
	}
	return list
}
