package gosource

import (
	"context"
	"os"
	"path"
	"path/filepath"
	"regexp"
	"slices"
	"strings"
)

// largest is the size of a file beyond which it is not read: nobody writes
// such a Go file by hand, and its syntax tree takes some twenty times as much.
const largest = 16 << 20

// folder is a directory with Go files to audit.
type folder struct {
	dir   string          // absolute
	root  string          // directory of the module it belongs to; "" for none
	files map[string]bool // absolute names of the files of interest
}

// survey groups files by directory, leaves out tests and vendored code, and
// keeps the directories in which a file speaks of orientations.
func (l *loader) survey(ctx context.Context, files []File) []*folder {
	byDir := map[string]*folder{}
	for _, f := range files {
		name, err := filepath.Abs(f.Name)
		if err != nil {
			name = filepath.Clean(f.Name) // no working directory: keep what there is
		}
		l.printed[name] = f.Path
		l.dirs[filepath.Dir(name)] = path.Dir(f.Path)
		switch {
		case isTest(f.Path):
			l.result.Tests++
		case hasElement(f.Path, "vendor"):
			l.result.Vendored++
		default:
			dir := filepath.Dir(name)
			if byDir[dir] == nil {
				byDir[dir] = &folder{dir: dir, files: map[string]bool{}}
			}
			byDir[dir].files[name] = true
		}
	}
	folders := make([]*folder, 0, len(byDir))
	for _, f := range byDir {
		folders = append(folders, f)
	}
	slices.SortFunc(folders, func(a, b *folder) int { return strings.Compare(a.dir, b.dir) })
	speaks := make([]bool, len(folders))
	l.each(ctx, len(folders), func(i int) { speaks[i] = l.speaks(folders[i]) })
	roots := map[string]string{}
	kept := folders[:0]
	for i, f := range folders {
		f.root = moduleRoot(f.dir, roots)
		if !speaks[i] {
			l.result.Silent += len(f.files)
			continue
		}
		kept = append(kept, f)
	}
	l.nameModules(roots)
	return kept
}

// nameModules finds the paths of the modules above all folders.
func (l *loader) nameModules(roots map[string]string) {
	var list []string
	for _, root := range roots {
		if root != "" {
			list = append(list, root)
		}
	}
	slices.Sort(list)
	for _, root := range slices.Compact(list) {
		if path := modulePath(root); path != "" {
			l.modules[path] = append(l.modules[path], root)
		}
	}
}

// isTest reports a file of tests, of their data, or of stand-ins whose numbers
// somebody made up.
func isTest(printed string) bool {
	if strings.HasSuffix(printed, "_test.go") {
		return true
	}
	return slices.ContainsFunc(strings.Split(printed, "/"), standIn.MatchString)
}

var standIn = regexp.MustCompile(`^(testdata|testutils?|mocks?|fakes?|stubs?)$|^(mock|fake)_\w+\.go$|_(mocks?|fake)\.go$`)

// hasElement reports whether a path with slashes has a directory of that name.
func hasElement(printed, name string) bool {
	return slices.Contains(strings.Split(printed, "/"), name)
}

// speaks reports whether the folder may state orientations. A file that cannot
// be read is a failure and left out.
func (l *loader) speaks(f *folder) bool {
	hit := false
	for name := range f.files {
		info, err := os.Stat(name)
		if err == nil && info.Size() > largest {
			l.note("Go files larger than 16 MiB are not read")
			delete(f.files, name)
			continue
		}
		src, err := os.ReadFile(name)
		if err != nil {
			l.fail(l.whole(name), reason(err), false)
			delete(f.files, name)
			continue
		}
		hit = hit || mentions(src)
	}
	return hit && promising(sortedKeys(f.files))
}

// moduleRoot is the nearest directory at or above dir that holds a go.mod; ""
// if there is none. It remembers what it found in roots.
func moduleRoot(dir string, roots map[string]string) string {
	if root, ok := roots[dir]; ok {
		return root
	}
	root := ""
	if info, err := os.Stat(filepath.Join(dir, "go.mod")); err == nil && info.Mode().IsRegular() {
		root = dir
	} else if up := filepath.Dir(dir); up != dir {
		root = moduleRoot(up, roots)
	}
	roots[dir] = root
	return root
}

// group puts the folders of one module together, in order of module and folder.
func group(folders []*folder) [][]*folder {
	byRoot := map[string][]*folder{}
	for _, f := range folders {
		byRoot[f.root] = append(byRoot[f.root], f)
	}
	modules := make([][]*folder, 0, len(byRoot))
	for _, m := range byRoot {
		modules = append(modules, m)
	}
	slices.SortFunc(modules, func(a, b []*folder) int { return strings.Compare(a[0].root, b[0].root) })
	return modules
}
