package gosource

import (
	"bufio"
	"errors"
	"fmt"
	"go/ast"
	"go/build"
	"go/parser"
	"go/token"
	"go/types"
	"os"
	pathpkg "path"
	"path/filepath"
	"slices"
	"strings"
	"sync"

	"golang.org/x/tools/go/gcexportdata"
)

// library gives types of imported packages. It is shared by the packages of
// one module, and looks in this order:
//
//	the compiler's export data, where the go command could produce it
//	the source of the tree's own modules, for packages that do not compile or could
//	not be listed, such as those of a workspace
//	package math in short, without the go command
//
// What it does not find, the type checker replaces by an empty package.
type library struct {
	fset    *token.FileSet
	root    string              // directory of the module it serves; "" for none
	modules map[string][]string // directories of the tree's modules by path; read-only

	mu      sync.Mutex
	exports map[string]string         // export data by package id
	read    map[string]*types.Package // from export data
	source  map[string]*types.Package // from the tree's source; nil while being read
	guessed bool                      // types of some package are known in part alone
}

var errUnknown = errors.New("its types are not known on this machine: it is not downloaded, or does not compile")

func newLibrary(root string, modules map[string][]string) *library {
	return &library{
		fset: token.NewFileSet(), root: root, modules: modules,
		exports: map[string]string{}, read: map[string]*types.Package{}, source: map[string]*types.Package{},
	}
}

// importer is the library for one package, whose import paths resolve to ids.
// Without ids, as for files outside any listed package, paths are ids.
func (b *library) importer(ids map[string]string) types.Importer {
	return importerFunc(func(path string) (*types.Package, error) {
		b.mu.Lock()
		defer b.mu.Unlock()
		if id, ok := ids[path]; ok {
			return b.load(id)
		}
		return b.load(path)
	})
}

// guesses reports whether types of some package are known in part alone.
func (b *library) guesses() bool {
	b.mu.Lock()
	defer b.mu.Unlock()
	return b.guessed
}

type importerFunc func(path string) (*types.Package, error)

func (f importerFunc) Import(path string) (*types.Package, error) { return f(path) }

// load finds a package. The lock is held.
func (b *library) load(id string) (*types.Package, error) {
	if id == "unsafe" {
		return types.Unsafe, nil
	}
	if name := b.exports[id]; name != "" {
		if pkg, err := b.export(id, name); err == nil {
			return pkg, nil
		}
	}
	if dir, ok := b.directory(id); ok {
		return b.fromSource(id, dir)
	}
	if id == "math" {
		b.guessed = true
		return shortMath(), nil
	}
	return nil, errUnknown
}

// export reads the export data of a package, once.
func (b *library) export(id, name string) (*types.Package, error) {
	if known := b.read[id]; known != nil && known.Complete() {
		return known, nil
	}
	file, err := os.Open(name)
	if err != nil {
		return nil, err
	}
	defer file.Close()
	data, err := gcexportdata.NewReader(bufio.NewReader(file))
	if err != nil {
		return nil, err
	}
	return gcexportdata.Read(data, b.fset, b.read, id)
}

// directory is where the tree keeps a package of its own: in the module whose
// path is the longest head of the package's. Of several modules of one path, as
// copies have, the nearest counts.
func (b *library) directory(id string) (string, bool) {
	for path := id; path != "." && path != "/"; path = pathpkg.Dir(path) {
		roots := b.modules[path]
		if len(roots) == 0 {
			continue
		}
		nearest := slices.MaxFunc(roots, func(x, y string) int { return b.nearness(x) - b.nearness(y) })
		dir := filepath.Join(nearest, filepath.FromSlash(strings.TrimPrefix(id, path)))
		info, err := os.Stat(dir)
		return dir, err == nil && info.IsDir()
	}
	return "", false
}

// nearness is how many directories a module's has in common with the
// library's, and one more for the library's own.
func (b *library) nearness(dir string) int {
	if dir == b.root {
		return 1 << 20
	}
	x, y := strings.Split(dir, string(filepath.Separator)), strings.Split(b.root, string(filepath.Separator))
	n := 0
	for n < min(len(x), len(y)) && x[n] == y[n] {
		n++
	}
	return n
}

// fromSource checks the declarations of a package of the tree, as far as
// they type-check. The lock is held: imports are read one at a time.
func (b *library) fromSource(id, dir string) (*types.Package, error) {
	if pkg, begun := b.source[id]; begun {
		if pkg == nil {
			return nil, fmt.Errorf("import cycle through %s", id)
		}
		return pkg, nil
	}
	b.source[id] = nil
	files := parseDirectory(b.fset, dir)
	if len(files) == 0 {
		return nil, errUnknown
	}
	b.guessed = b.guessed || slices.ContainsFunc(files, importsC)
	config := types.Config{
		Importer: importerFunc(b.load), IgnoreFuncBodies: true, FakeImportC: true,
		Error: func(error) {}, // the package's own audit reports them
	}
	pkg, _ := config.Check(id, b.fset, files, nil)
	b.source[id] = pkg
	return pkg, nil
}

// importsC reports cgo: what C declares is not known.
func importsC(f *ast.File) bool {
	return slices.ContainsFunc(f.Imports, func(spec *ast.ImportSpec) bool { return spec.Path.Value == `"C"` })
}

// parseDirectory parses the files of a directory that make a package on this
// machine.
func parseDirectory(fset *token.FileSet, dir string) []*ast.File {
	entries, err := os.ReadDir(dir)
	if err != nil {
		return nil
	}
	var files []*ast.File
	for _, e := range entries {
		name := e.Name()
		if !strings.HasSuffix(name, ".go") || strings.HasSuffix(name, "_test.go") {
			continue
		}
		if info, err := e.Info(); err != nil || info.Size() > largest {
			continue
		}
		if ok, err := build.Default.MatchFile(dir, name); err != nil || !ok {
			continue
		}
		f, _ := parser.ParseFile(fset, filepath.Join(dir, name), nil, parser.SkipObjectResolution)
		if f != nil && (len(files) == 0 || f.Name.Name == files[0].Name.Name) {
			files = append(files, f)
		}
	}
	return files
}

// modulePath is the path that a go.mod declares; "" if it declares none.
func modulePath(root string) string {
	text, err := os.ReadFile(filepath.Join(root, "go.mod"))
	if err != nil {
		return ""
	}
	for line := range strings.Lines(string(text)) {
		line, _, _ = strings.Cut(line, "//")
		if path, ok := strings.CutPrefix(strings.TrimSpace(line), "module "); ok {
			return strings.Trim(strings.TrimSpace(path), "\"`")
		}
	}
	return ""
}
