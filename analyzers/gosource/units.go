package gosource

import (
	"fmt"
	"go/build"
	"go/parser"
	"go/token"
	"path/filepath"
	"slices"
	"strconv"
	"strings"

	"golang.org/x/tools/go/packages"
)

// unit is one package to check: some of its files are audited, the others are
// read to know types.
type unit struct {
	path    string            // import path, or the directory where there is none
	version string            // of the language, such as go1.26; "" if unknown
	files   []string          // absolute names
	audited map[string]bool   // those of files whose values are wanted
	imports map[string]string // ids of imported packages by path; nil if the go command did not say
	library *library
	judged  bool    // its functions have been judged
	expects trouble // errors that belong to the way the unit was put together
}

// trouble is a class of errors; each includes the one before.
type trouble uint8

const (
	nothing        trouble = iota
	unknownImports         // outside the go command's reach
	typeErrors             // files that never meet in one build
)

// together makes one unit of each listed package. Folders that the go command
// does not list as packages come back as the rest.
func (l *loader) together(listed []*packages.Package, folders []*folder, lib *library) (units []*unit, rest []*folder) {
	byDir := map[string]*packages.Package{}
	for _, p := range listed {
		if len(p.GoFiles) > 0 {
			byDir[filepath.Dir(p.GoFiles[0])] = p
		}
	}
	for _, f := range folders {
		p := byDir[f.dir]
		if p == nil {
			rest = append(rest, f)
			continue
		}
		u := &unit{path: p.PkgPath, files: p.GoFiles, imports: map[string]string{}, library: lib}
		if len(p.Errors) > 0 {
			u.files = l.ofOnePackage(p)
		}
		for path, imported := range p.Imports {
			u.imports[path] = imported.ID
		}
		if p.Module != nil && p.Module.GoVersion != "" {
			u.version = "go" + p.Module.GoVersion
		}
		left := u.take(f)
		if len(u.audited) > 0 {
			units = append(units, u)
		}
		units = append(units, u.excluded(left)...)
	}
	return units, rest
}

// ofOnePackage is the files of a listed directory without those that belong to
// another package, which is a failure.
func (l *loader) ofOnePackage(p *packages.Package) []string {
	var files []string
	for _, name := range p.GoFiles {
		if clause := packageName(name); clause != "" && clause != p.Name {
			l.fail(l.whole(name), fmt.Errorf("this is package %s among files of package %s; it was audited by itself", clause, p.Name), true)
			continue
		}
		files = append(files, name)
	}
	return files
}

// take marks those of the unit's files that are to be audited and returns the
// folder's other files of interest.
func (u *unit) take(f *folder) (left []string) {
	u.audited = map[string]bool{}
	for name := range f.files {
		if slices.Contains(u.files, name) {
			u.audited[name] = true
		} else {
			left = append(left, name)
		}
	}
	slices.Sort(left)
	return left
}

// excluded makes a unit of each file that build constraints exclude: the file
// and, for types, the package's files if it belongs to the same package.
// Declarations that both have are errors of the type checker, which hides
// nothing: it goes on with both.
func (u *unit) excluded(names []string) []*unit {
	var units []*unit
	for _, name := range names {
		files := []string{name}
		if len(u.files) > 0 && packageName(name) == packageName(u.files[0]) {
			files = append(files, u.files...)
		}
		units = append(units, &unit{path: u.path, version: u.version, files: files,
			audited: map[string]bool{name: true}, library: u.library, expects: typeErrors})
	}
	return units
}

// alone makes units of folders without the go command: the files that build
// constraints admit are one package for each package clause.
func alone(folders []*folder, lib *library) []*unit {
	var units []*unit
	for _, f := range folders {
		byName := map[string]*unit{}
		var left []string
		for _, name := range sortedKeys(f.files) {
			if ok, err := build.Default.MatchFile(f.dir, filepath.Base(name)); err == nil && !ok {
				left = append(left, name)
				continue
			}
			clause := packageName(name)
			if byName[clause] == nil {
				byName[clause] = &unit{path: f.dir, library: lib, expects: unknownImports, audited: map[string]bool{}}
			}
			u := byName[clause]
			u.files = append(u.files, name)
			u.audited[name] = true
		}
		for _, clause := range sortedKeys(byName) {
			units = append(units, byName[clause])
		}
		units = append(units, (&unit{path: f.dir, library: lib}).excluded(left)...)
	}
	return units
}

// packageName is the name in a file's package clause; "" if it has none.
func packageName(name string) string {
	file, err := parser.ParseFile(token.NewFileSet(), name, nil, parser.PackageClauseOnly)
	if err != nil || file.Name == nil {
		return ""
	}
	return file.Name.Name
}

// standard lists what a unit that the go command did not list seems to import
// from the standard library: paths whose first element has no dot.
func (u *unit) standard() []string {
	if u.imports != nil {
		return nil
	}
	var paths []string
	for _, name := range u.files {
		file, err := parser.ParseFile(token.NewFileSet(), name, nil, parser.ImportsOnly)
		if err != nil {
			continue
		}
		for _, spec := range file.Imports {
			path, err := strconv.Unquote(spec.Path.Value)
			first, _, _ := strings.Cut(path, "/")
			if _, own := u.library.directory(path); err == nil && path != "" && !own && !strings.Contains(first, ".") {
				paths = append(paths, path)
			}
		}
	}
	return paths
}
