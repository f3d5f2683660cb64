package gosource

import (
	"context"
	"errors"
	"os"
	"path/filepath"
	"slices"
	"strings"

	"golang.org/x/tools/go/packages"

	"dextral/rules"
)

// batch is how many patterns one go command is given, so that its command line
// stays well below what any system allows.
const batch = 200

// module audits the folders of one module, or all folders outside any module.
func (l *loader) module(ctx context.Context, folders []*folder) {
	root := folders[0].root
	lib := newLibrary(root, l.modules)
	var units []*unit
	if root == "" {
		units = alone(folders, lib)
	} else {
		listed, err := list(ctx, root, moduleEnvironment(), patterns(root, folders),
			packages.NeedName|packages.NeedFiles|packages.NeedImports|packages.NeedModule)
		if err != nil {
			l.unlisted(folders[0], err)
		}
		var rest []*folder
		units, rest = l.together(listed, folders, lib)
		units = append(units, alone(rest, lib)...)
	}
	l.compile(ctx, root, lib, units)
	if root != "" {
		l.judgeTogether(ctx, root, units)
	}
	l.each(ctx, len(units), func(i int) { l.audit(units[i]) })
}

// unlisted says that the go command cannot list a module, whose folders are
// then audited each by itself.
func (l *loader) unlisted(f *folder, err error) {
	if errors.Is(err, context.Canceled) || errors.Is(err, context.DeadlineExceeded) {
		return
	}
	if noGo(err) {
		l.note("the go command was not found: types of imported packages are unknown, and values of such types may be missed")
		return
	}
	l.fail(rules.Place{Path: l.printFrom(f, filepath.Join(f.root, "go.mod"))}, oneLine(err), true)
}

// compile lets the go command produce export data of whatever the units
// import. What cannot be had is missing from the library.
func (l *loader) compile(ctx context.Context, root string, lib *library, units []*unit) {
	var listed, unlisted []string
	for _, u := range units {
		for _, id := range u.imports {
			listed = append(listed, id)
		}
		unlisted = append(unlisted, u.standard()...)
	}
	lib.compile(ctx, root, moduleEnvironment(), listed)
	// The standard library does not depend on the module, which may be broken.
	lib.compile(ctx, os.TempDir(), standardEnvironment(), unlisted)
}

func (b *library) compile(ctx context.Context, dir string, env, ids []string) {
	slices.Sort(ids)
	ids = slices.DeleteFunc(slices.Compact(ids), func(id string) bool { return id == "unsafe" || id == "C" })
	if len(ids) == 0 {
		return
	}
	compiled, err := list(ctx, dir, env, ids, packages.NeedName|packages.NeedExportFile)
	if err != nil {
		return // every import is then unknown, which each package reports
	}
	for _, p := range compiled {
		b.exports[p.ID] = p.ExportFile
	}
}

// patterns are the folders relative to the module's root, as the go command
// wants them.
func patterns(root string, folders []*folder) []string {
	var list []string
	for _, f := range folders {
		if rel, err := filepath.Rel(root, f.dir); err == nil {
			list = append(list, "./"+filepath.ToSlash(rel))
		}
	}
	return list
}

// list asks the go command about packages.
func list(ctx context.Context, dir string, env, patterns []string, mode packages.LoadMode) ([]*packages.Package, error) {
	cfg := &packages.Config{Mode: mode, Context: ctx, Dir: dir, Env: append(env, "PWD="+dir), BuildFlags: []string{"-buildvcs=false"}}
	var all []*packages.Package
	for part := range slices.Chunk(patterns, batch) {
		pkgs, err := packages.Load(cfg, part...)
		if err != nil {
			return nil, err
		}
		all = append(all, pkgs...)
	}
	return all, nil
}

// moduleEnvironment keeps the go command from downloading and from writing to
// the user's tree: no proxy, no version control, no other toolchain, no change
// of go.mod or go.sum. A go.work file is not used, since the go command may
// write a go.work.sum beside it; the library knows the tree's other modules.
func moduleEnvironment() []string {
	return append(os.Environ(),
		"GOPROXY=off", "GONOPROXY=none", "GOVCS=*:off", "GOTOOLCHAIN=local",
		"GO111MODULE=on", "GOWORK=off", "GOPACKAGESDRIVER=off",
		"GOFLAGS="+readOnly(os.Getenv("GOFLAGS")))
}

// standardEnvironment is that of a go command outside any module.
func standardEnvironment() []string {
	return append(moduleEnvironment(), "GO111MODULE=off", "GOFLAGS=")
}

// readOnly drops from GOFLAGS what would let the go command write go.mod, or
// read another one.
func readOnly(flags string) string {
	kept := slices.DeleteFunc(strings.Fields(flags), func(f string) bool {
		f = strings.TrimPrefix(strings.TrimPrefix(f, "-"), "-")
		return f == "mod=mod" || f == "modcacherw" || strings.HasPrefix(f, "modfile=")
	})
	return strings.Join(kept, " ")
}

// whole is the place of a file as a whole.
func (l *loader) whole(name string) rules.Place { return rules.Place{Path: l.print(name)} }
