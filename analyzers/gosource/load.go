package gosource

import (
	"cmp"
	"context"
	"path"
	"path/filepath"
	"runtime"
	"slices"
	"strings"
	"sync"

	"golang.org/x/tools/go/analysis"

	"dextral/analyzers/gosource/idle"
	"dextral/analyzers/gosource/literal"
	"dextral/analyzers/gosource/longway"
	"dextral/analyzers/gosource/mirror"
	"dextral/analyzers/gosource/mislabelled"
	"dextral/analyzers/gosource/mixed"
	"dextral/analyzers/gosource/norm"
	"dextral/analyzers/gosource/roundtrip"
	"dextral/analyzers/gosource/routes"
	"dextral/analyzers/gosource/singular"
	"dextral/analyzers/gosource/wrongterm"
	"dextral/rules"
)

// Passes are the analyzers that judge functions, beside literal, which finds the
// values that a package states. They can be used by any driver of go/analysis.
var Passes = []*analysis.Analyzer{longway.Analyzer, roundtrip.Analyzer, singular.Analyzer, wrongterm.Analyzer, mislabelled.Analyzer, mirror.Analyzer,
	routes.Analyzer, mixed.Analyzer, norm.Analyzer, idle.Analyzer}

// File is one Go source file to audit.
type File struct {
	Path string // as printed in places: with slashes
	Name string // as the operating system opens it
}

// Result is what the Go files of a tree state.
type Result struct {
	Values   []*rules.Value   // in order of place
	Findings []*rules.Finding // on functions, in order of place
	Skipped  []literal.Skip   // literals that look like orientations but are not judged, in order of place
	Packages int              // packages type-checked
	Files    int              // files of these packages that were read
	Tests    int              // test files, testdata, mocks and fakes: not read
	Vendored int              // files under a vendor directory: not read
	Silent   int              // files in whose directory nothing speaks of orientations: not read any further
	Failures []Failure        // in order of place
	Notes    []string         // how the audit was limited, each once, sorted
}

// Failure is a package or file that could not be read as it should.
type Failure struct {
	Place   rules.Place
	Err     error
	Partial bool // the rest of the package was audited nevertheless
}

// Load reads the given files, package by package, and returns what they state.
// Files that are not among the given ones may be read to know types, but
// values in them are not returned. Trouble with the input is part of the
// result; the error is that of the context alone.
func Load(ctx context.Context, files []File) (*Result, error) {
	l := &loader{printed: map[string]string{}, dirs: map[string]string{}, modules: map[string][]string{}, slots: make(chan struct{}, runtime.GOMAXPROCS(0))}
	folders := l.survey(ctx, files)
	modules := group(folders)
	l.each(ctx, len(modules), func(i int) { l.module(ctx, modules[i]) })
	if err := ctx.Err(); err != nil {
		return nil, err
	}
	return l.result.sorted(), nil
}

// loader carries one call of Load.
type loader struct {
	slots chan struct{} // one for each package in work

	// read-only after survey
	printed map[string]string   // printed path of each file, by absolute name
	dirs    map[string]string   // the same of the directories that hold them
	modules map[string][]string // directories of modules by path, sorted

	mu     sync.Mutex
	result Result
}

// each calls f for 0..n-1, a few at a time, and waits.
func (l *loader) each(ctx context.Context, n int, f func(i int)) {
	var wg sync.WaitGroup
	limit := make(chan struct{}, cap(l.slots))
	for i := range n {
		if ctx.Err() != nil {
			break
		}
		limit <- struct{}{}
		wg.Go(func() {
			defer func() { <-limit }()
			f(i)
		})
	}
	wg.Wait()
}

// add changes the result under the lock.
func (l *loader) add(change func(r *Result)) {
	l.mu.Lock()
	defer l.mu.Unlock()
	change(&l.result)
}

// fail records a failure.
func (l *loader) fail(at rules.Place, err error, partial bool) {
	l.add(func(r *Result) { r.Failures = append(r.Failures, Failure{at, err, partial}) })
}

// note records a limitation.
func (l *loader) note(text string) {
	l.add(func(r *Result) { r.Notes = append(r.Notes, text) })
}

// print is how places name a file: as given, or beside files that were given.
func (l *loader) print(name string) string {
	if p, ok := l.printed[name]; ok {
		return p
	}
	if dir, ok := l.dirs[filepath.Dir(name)]; ok {
		return path.Join(dir, filepath.Base(name))
	}
	return filepath.ToSlash(name)
}

// printFrom is print for a file of which only its way from a folder is known,
// such as the go.mod above it.
func (l *loader) printFrom(f *folder, name string) string {
	rel, err := filepath.Rel(f.dir, name)
	if err != nil {
		return filepath.ToSlash(name) // another volume
	}
	return path.Join(l.dirs[f.dir], filepath.ToSlash(rel))
}

// sorted puts everything into an order that does not depend on parallelism.
func (r *Result) sorted() *Result {
	slices.SortFunc(r.Values, func(a, b *rules.Value) int {
		return cmp.Or(a.Place.Compare(b.Place), strings.Compare(a.Key, b.Key))
	})
	slices.SortStableFunc(r.Findings, (*rules.Finding).Compare)
	slices.SortFunc(r.Skipped, func(a, b literal.Skip) int { return a.Place.Compare(b.Place) })
	slices.SortFunc(r.Failures, func(a, b Failure) int {
		return cmp.Or(a.Place.Compare(b.Place), strings.Compare(a.Err.Error(), b.Err.Error()))
	})
	slices.Sort(r.Notes)
	r.Notes = slices.Compact(r.Notes)
	return r
}
