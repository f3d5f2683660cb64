package gosource

import (
	"context"
	"errors"
	"fmt"
	"path/filepath"
	"slices"

	"golang.org/x/tools/go/analysis"
	"golang.org/x/tools/go/analysis/checker"
	"golang.org/x/tools/go/packages"

	"dextral/analyzers/gosource/found"
)

// maxGraph is the number of packages beyond the standard library that are read
// together, to know what the functions compute that are called from one to the
// other. A larger module is judged package by package.
const maxGraph = 1000

// graph reads packages from source, together with all that they import from
// outside the standard library, whose types come from export data: functions are judged
// by all they call. It returns those asked for.
func graph(ctx context.Context, dir string, patterns []string) ([]*packages.Package, error) {
	listed, err := list(ctx, dir, moduleEnvironment(), patterns, packages.NeedName|packages.NeedImports|packages.NeedDeps|packages.NeedModule)
	if err != nil {
		return nil, err
	}
	var ids, roots []string
	for _, p := range listed {
		roots = append(roots, p.ID)
	}
	packages.Visit(listed, nil, func(p *packages.Package) {
		if p.Module != nil || slices.Contains(roots, p.ID) {
			ids = append(ids, p.ID)
		}
	})
	if len(ids) > maxGraph {
		return nil, fmt.Errorf("%d packages are too many to be read together", len(ids))
	}
	slices.Sort(ids)
	cfg := &packages.Config{
		Mode:    packages.LoadSyntax | packages.NeedModule,
		Context: ctx, Dir: dir, Env: append(moduleEnvironment(), "PWD="+dir), BuildFlags: []string{"-buildvcs=false"},
	}
	loaded, err := packages.Load(cfg, ids...)
	if err != nil {
		return nil, err
	}
	return slices.DeleteFunc(loaded, func(p *packages.Package) bool { return !slices.Contains(roots, p.ID) }), nil
}

// judgeTogether judges the functions of units that the go command listed, with the facts of
// what they import, and marks them as judged.
func (l *loader) judgeTogether(ctx context.Context, root string, units []*unit) {
	byName := map[string]*unit{}
	var paths []string
	for _, u := range units {
		if u.imports == nil || len(u.audited) == 0 {
			continue
		}
		paths = append(paths, u.path)
		for name := range u.audited {
			byName[name] = u
		}
	}
	if len(paths) == 0 {
		return
	}
	pkgs, err := graph(ctx, root, paths)
	if err != nil {
		return // each is judged by itself
	}
	defer func() {
		if p := recover(); p != nil {
			l.note("functions are judged package by package: types of what some import are incomplete")
		}
	}()
	sound := slices.DeleteFunc(pkgs, func(p *packages.Package) bool { return p.IllTyped || len(p.Errors) > 0 })
	results, err := l.run(sound, Passes)
	if err != nil {
		return
	}
	for _, p := range sound {
		for _, file := range p.CompiledGoFiles {
			if u := byName[filepath.Clean(file)]; u != nil {
				u.judged = true
			}
		}
	}
	for _, r := range results {
		for _, f := range r.Findings {
			if u := byName[filepath.Clean(f.Place.Path)]; u != nil {
				l.judged(u, &found.Result{Findings: r.Findings})
				break
			}
		}
	}
}

// run applies passes to packages of a graph.
func (l *loader) run(pkgs []*packages.Package, passes []*analysis.Analyzer) ([]*found.Result, error) {
	g, err := checker.Analyze(passes, pkgs, nil)
	if err != nil {
		return nil, err
	}
	var all []*found.Result
	for _, a := range g.Roots {
		if a.Err != nil {
			return nil, errors.New(a.Analyzer.Name + ": " + a.Err.Error())
		}
		all = append(all, a.Result.(*found.Result))
	}
	return all, nil
}
