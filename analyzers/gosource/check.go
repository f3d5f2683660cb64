package gosource

import (
	"errors"
	"fmt"
	"go/ast"
	"go/parser"
	"go/scanner"
	"go/token"
	"go/types"
	"os"
	"runtime"
	"slices"
	"strings"

	"golang.org/x/tools/go/analysis"
	"golang.org/x/tools/go/analysis/checker"
	"golang.org/x/tools/go/packages"

	"dextral/analyzers/gosource/found"
	"dextral/analyzers/gosource/literal"
	"dextral/analyzers/source"
	"dextral/rules"
)

// audit parses, checks and analyses one package. A panic in the type checker
// on odd input costs the package, not the audit.
func (l *loader) audit(u *unit) {
	l.slots <- struct{}{}
	defer func() { <-l.slots }()
	defer func() {
		if p := recover(); p != nil {
			l.fail(l.whole(u.files[0]), fmt.Errorf("internal error while reading package %s: %v", u.path, p), false)
		}
	}()
	pkg, errs := u.check()
	l.report(u, pkg, errs)
	l.analyze(u, pkg, []*analysis.Analyzer{literal.Analyzer})
	if !pkg.IllTyped && !u.judged { // functions are judged by all they call, which is not known there
		l.functions(u, pkg)
	}
}

// functions judges the functions of a package. A type that is invalid in an imported
// package only, such as one that does not compile here, makes go/ssa panic; the
// values of the package are not lost by that.
func (l *loader) functions(u *unit, pkg *packages.Package) {
	defer func() {
		if p := recover(); p != nil {
			l.fail(l.whole(u.files[0]), errors.New("its functions are not judged: types of what it imports are incomplete"), true)
		}
	}()
	l.analyze(u, pkg, Passes)
}

func (l *loader) analyze(u *unit, pkg *packages.Package, list []*analysis.Analyzer) {
	graph, err := checker.Analyze(list, []*packages.Package{pkg}, &checker.Options{Sequential: true})
	if err != nil {
		l.fail(l.whole(u.files[0]), err, false)
		return
	}
	for _, action := range graph.Roots {
		switch result := action.Result.(type) {
		case *literal.Result:
			l.collect(u, result)
		case *found.Result:
			l.judged(u, result)
		default:
			l.fail(l.whole(u.files[0]), fmt.Errorf("%s: %w", action.Analyzer.Name, action.Err), true)
		}
	}
}

// collect adds what a pass found in the audited files.
func (l *loader) collect(u *unit, found *literal.Result) {
	l.add(func(r *Result) {
		r.Packages++
		r.Files += len(u.audited)
		for _, v := range found.Values {
			if u.audited[v.Place.Path] {
				l.rename(v)
				r.Values = append(r.Values, v)
			}
		}
		for _, s := range found.Skipped {
			if u.audited[s.Place.Path] {
				s.Place.Path = l.print(s.Place.Path)
				r.Skipped = append(r.Skipped, s)
			}
		}
	})
}

// judged adds what a pass over functions found in the audited files.
func (l *loader) judged(u *unit, result *found.Result) {
	l.add(func(r *Result) {
		for _, f := range result.Findings {
			if !u.audited[f.Place.Path] {
				continue
			}
			f.Place.Path = l.print(f.Place.Path)
			for i := range f.Related {
				f.Related[i].Place.Path = l.print(f.Related[i].Place.Path)
			}
			r.Findings = append(r.Findings, f)
		}
	})
}

// rename makes the paths of a value's places the printed ones.
func (l *loader) rename(v *rules.Value) {
	places := []*rules.Place{&v.Place, &v.KeyAt}
	for i := range v.Numbers {
		places = append(places, &v.Numbers[i].Place)
	}
	for i := range v.Claims {
		places = append(places, &v.Claims[i].Place)
	}
	for _, p := range places {
		if p.Path != "" {
			p.Path = l.print(p.Path)
		}
	}
}

// check parses and type-checks. It goes on after errors and returns them.
func (u *unit) check() (pkg *packages.Package, errs []error) {
	var files []*ast.File
	for _, name := range u.files {
		src, err := os.ReadFile(name)
		if err != nil {
			errs = append(errs, err)
			continue
		}
		file, err := parser.ParseFile(u.library.fset, name, src, parser.ParseComments|parser.SkipObjectResolution)
		if err != nil {
			errs = append(errs, err)
		}
		if file != nil {
			files = append(files, file)
		}
	}
	info := &types.Info{
		Types: map[ast.Expr]types.TypeAndValue{}, Defs: map[*ast.Ident]types.Object{}, Uses: map[*ast.Ident]types.Object{},
		Implicits: map[ast.Node]types.Object{}, Selections: map[*ast.SelectorExpr]*types.Selection{},
		Scopes: map[ast.Node]*types.Scope{}, Instances: map[*ast.Ident]types.Instance{}, FileVersions: map[*ast.File]string{},
	}
	sizes := types.SizesFor("gc", runtime.GOARCH)
	config := types.Config{
		Importer: u.library.importer(u.imports), FakeImportC: true, Sizes: sizes, GoVersion: u.version,
		Error: func(err error) { errs = append(errs, err) },
	}
	typed, _ := config.Check(u.path, u.library.fset, files, info) // the error is among errs
	var recorded []packages.Error
	for _, err := range errs {
		recorded = append(recorded, packages.Error{Msg: err.Error()})
	}
	return &packages.Package{
		ID: u.path, Name: typed.Name(), Errors: recorded, PkgPath: u.path, GoFiles: u.files, CompiledGoFiles: u.files,
		Fset: u.library.fset, Syntax: files, Types: typed, TypesInfo: info, TypesSizes: sizes, IllTyped: len(errs) > 0,
	}, errs
}

// report turns the errors of one package into at most one failure: the first
// error that hides something. Unused variables and imports hide nothing.
//
// Where types are unknown and that was to be expected, errors of the type
// checker say nothing: they may follow from it.
func (l *loader) report(u *unit, pkg *packages.Package, errs []error) {
	follow := slices.ContainsFunc(pkg.Syntax, importsC)
	switch u.expects {
	case typeErrors:
		follow = true
	case unknownImports:
		follow = follow || u.library.guesses() || slices.ContainsFunc(errs, isImport)
	}
	for _, err := range errs {
		if follow && isTypeError(err) {
			continue
		}
		at, message, ok := l.describe(u, err)
		if ok {
			l.fail(at, errors.New(message), true)
			return
		}
	}
}

func isTypeError(err error) bool {
	var typed types.Error
	return errors.As(err, &typed)
}

func isImport(err error) bool {
	var typed types.Error
	return errors.As(err, &typed) && strings.HasPrefix(typed.Msg, "could not import")
}

// describe gives place and text of an error; false if it need not be reported.
func (l *loader) describe(u *unit, err error) (rules.Place, string, bool) {
	var typed types.Error
	var parsed scanner.ErrorList
	switch {
	case errors.As(err, &parsed) && len(parsed) > 0:
		return l.at(parsed[0].Pos), parsed[0].Msg, true
	case errors.As(err, &typed):
		return l.at(typed.Fset.PositionFor(typed.Pos, false)), typed.Msg, !typed.Soft
	}
	return l.whole(u.files[0]), err.Error(), true
}

// at is the place of a position, whose column counts bytes.
func (l *loader) at(p token.Position) rules.Place {
	src, err := os.ReadFile(p.Filename)
	if err != nil || p.Offset > len(src) {
		return rules.Place{Path: l.print(p.Filename), Line: p.Line, Column: p.Column, EndLine: p.Line, EndColumn: p.Column}
	}
	return source.New(l.print(p.Filename), src).Place(source.Span{From: p.Offset, To: p.Offset})
}
