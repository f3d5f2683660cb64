package gosource

import (
	"cmp"
	"context"
	"errors"
	"fmt"
	"go/ast"
	"path/filepath"
	"slices"
	"strings"

	"golang.org/x/tools/go/analysis"
	"golang.org/x/tools/go/analysis/checker"
	"golang.org/x/tools/go/packages"

	"dextral/analyzers/gosource/found"
	"dextral/analyzers/gosource/measure"
	"dextral/core/convention"
	"dextral/core/operation"
	"dextral/rules"
	"dextral/rules/report"
)

// Sheet measures what the orientation types and functions of packages mean. Packages are
// named by patterns of the go command, relative to dir; those that have nothing to do with
// orientations are left out; of those that do not compile nothing is known.
func Sheet(ctx context.Context, dir string, patterns []string) (*report.Sheet, error) {
	pkgs, err := graph(ctx, dir, patterns)
	if err != nil {
		return nil, oneLine(err)
	}
	s := &report.Sheet{}
	var sound []*packages.Package
	for _, p := range pkgs {
		if len(p.Errors) == 0 {
			sound = append(sound, p)
			continue
		}
		s.Packages = append(s.Packages, report.SheetPackage{Path: p.PkgPath, Left: []report.SheetEntry{{
			Name: "all functions", Lines: []report.SheetLine{{What: "not read", Says: "it does not compile: " + firstError(p)}},
		}}})
	}
	g, err := checker.Analyze(append([]*analysis.Analyzer{measure.Analyzer}, Passes...), sound, nil)
	if err != nil {
		return nil, err
	}
	parts := map[*packages.Package]*sheetPart{}
	for _, a := range g.Roots {
		if a.Err != nil {
			return nil, fmt.Errorf("%s: %w", a.Package.PkgPath, a.Err)
		}
		part := parts[a.Package]
		if part == nil {
			part = &sheetPart{pkg: a.Package, dir: dir, wrong: map[string][]*rules.Finding{}}
			parts[a.Package] = part
		}
		switch r := a.Result.(type) {
		case *measure.Result:
			part.measured = r
		case *found.Result:
			for _, f := range r.Findings {
				part.wrong[f.Key] = append(part.wrong[f.Key], f)
			}
		}
	}
	for _, p := range sound {
		if part := parts[p].entries(); len(part.Types)+len(part.Funcs)+len(part.Left) > 0 {
			s.Packages = append(s.Packages, part)
		}
	}
	slices.SortFunc(s.Packages, func(a, b report.SheetPackage) int { return strings.Compare(a.Path, b.Path) })
	return s, nil
}

// firstError is the first error of a package with its place, rather from the type
// checker than from the compiler.
func firstError(p *packages.Package) string {
	e := p.Errors[0]
	for _, x := range p.Errors {
		if x.Kind == packages.TypeError {
			e = x
			break
		}
	}
	return filepath.Base(e.Pos) + ": " + oneLine(errors.New(e.Msg)).Error()
}

// sheetPart is one package of a sheet in the making.
type sheetPart struct {
	pkg      *packages.Package
	dir      string
	measured *measure.Result
	wrong    map[string][]*rules.Finding
}

func (p *sheetPart) entries() report.SheetPackage {
	out := report.SheetPackage{Path: p.pkg.PkgPath}
	for _, t := range p.measured.Types {
		if t.Object.Pkg() == p.pkg.Types && p.orients(t) {
			out.Types = append(out.Types, p.typeEntry(t))
		}
	}
	var undecided []string
	for _, f := range p.measured.Funcs {
		if f.Decl == nil || !p.concerns(f) {
			continue
		}
		if !slices.ContainsFunc(f.Cases, func(c *measure.Case) bool { return c.Identity.Known() }) && len(p.problems(f.Key())) == 0 {
			undecided = append(undecided, f.Key())
			continue
		}
		out.Funcs = append(out.Funcs, p.funcEntry(f))
	}
	if len(out.Types)+len(out.Funcs) > 0 {
		out.Left = p.left(undecided)
	}
	return out
}

// left lists the functions of which nothing can be said, with the reason.
func (p *sheetPart) left(undecided []string) []report.SheetEntry {
	var lines []report.SheetLine
	if len(undecided) > 0 {
		lines = append(lines, report.SheetLine{What: "unknown", Says: "cannot be decided, because it is no operation that is known here: " + strings.Join(undecided, ", ")})
	}
	byReason := map[string][]string{}
	for _, f := range p.measured.Unread {
		reason := cmp.Or(f.Reason, "takes or gives what is no number")
		byReason[reason] = append(byReason[reason], f.Object.Name())
	}
	for _, reason := range sortedKeys(byReason) {
		lines = append(lines, report.SheetLine{What: "not read", Says: reason + ": " + strings.Join(byReason[reason], ", ")})
	}
	if len(lines) == 0 {
		return nil
	}
	return []report.SheetEntry{{Name: "other functions", Lines: lines}}
}

// orients reports whether a type holds orientations, as measured.
func (p *sheetPart) orients(t *measure.Type) bool {
	return len(t.Rotational) > 0 && (t.Kind != operation.Quaternion || len(t.Orders) < len(operation.Orders))
}

// concerns reports whether a function has to do with orientations: it computes an
// operation on them, or a type that holds them goes in or comes out.
func (p *sheetPart) concerns(f *measure.Function) bool {
	for _, c := range f.Cases {
		for _, r := range identified(c) {
			if r.Rotational() || r.Op == operation.LinearMap && r.Map != nil {
				return true
			}
		}
		for _, o := range slices.Concat(c.In, c.Out) {
			if t := p.measured.Type(o.Type); t != nil && t.Kind == operation.Quaternion && p.orients(t) {
				return true
			}
		}
	}
	return false
}

func identified(c *measure.Case) []operation.Reading {
	if !c.Identity.Known() {
		return nil
	}
	return c.Identity.Readings
}

// funcEntry says what a function computes, in each of its settings that is known.
func (p *sheetPart) funcEntry(f *measure.Function) report.SheetEntry {
	e := report.SheetEntry{Name: f.Key() + arguments(f), At: p.at(f.Decl.Name)}
	for _, c := range f.Cases {
		text, decided := p.measured.Meaning(c)
		switch {
		case !c.Identity.Known() && len(f.Cases) > 1:
			continue
		case !decided:
			text = "cannot be decided: " + text
		case c.Identity.OnUnit:
			text += " (of unit quaternions)"
		}
		e.Lines = append(e.Lines, report.SheetLine{What: "computes", Says: strings.TrimPrefix(c.Label+": "+text, ": ")})
	}
	e.Lines = append(e.Lines, p.problems(f.Key())...)
	return e
}

// problems are the findings on a function or type.
func (p *sheetPart) problems(key string) []report.SheetLine {
	var lines []report.SheetLine
	for _, f := range p.wrong[key] {
		if f.Level > rules.Note {
			lines = append(lines, report.SheetLine{What: "but", Says: f.Rule + ": " + f.Message, Wrong: true})
		}
	}
	return lines
}

// arguments lists the operands by the author's names.
func arguments(f *measure.Function) string {
	var in, out []string
	for _, o := range f.In {
		if !o.Receiver {
			in = append(in, o.Name)
		}
	}
	for _, o := range f.Out {
		if o.Name != "" && o.Name != "result" && !o.Written {
			out = append(out, o.Name)
		}
	}
	text := "(" + strings.Join(in, ", ") + ")"
	if len(out) > 0 {
		text += " (" + strings.Join(out, ", ") + ")"
	}
	return text
}

// typeEntry says how a type is stored and how its functions treat it.
func (p *sheetPart) typeEntry(t *measure.Type) report.SheetEntry {
	e := report.SheetEntry{Name: t.Object.Name(), At: p.placeOf(t)}
	say := func(what, format string, args ...any) {
		e.Lines = append(e.Lines, report.SheetLine{What: what, Says: fmt.Sprintf(format, args...)})
	}
	switch {
	case t.Kind != operation.Quaternion:
		say("holds", "rotations as a %s", t.Kind)
		if t.Storage == convention.StorageUnstated {
			say("stored", "cannot be decided: no function multiplies it by a vector, or by another one")
		} else {
			say("stored", "%s, as its products have it", t.Storage)
		}
	case len(t.Orders) == 1:
		say("holds", "rotations as a quaternion")
		say("stored", "%s", t.Orders[0])
	default:
		say("holds", "rotations as a quaternion")
		var all []string
		for _, o := range t.Orders {
			all = append(all, o.String())
		}
		say("stored", "cannot be decided between %s", strings.Join(all, ", "))
	}
	p.composition(t, say)
	for _, f := range t.Outliers {
		e.Lines = append(e.Lines, report.SheetLine{What: "but", Says: f.Key() + " takes it for stored otherwise", Wrong: true})
	}
	e.Lines = append(e.Lines, p.problems(t.Object.Name())...)
	return e
}

// composition says in which order products turn, which takes a product and a function
// that turns vectors.
func (p *sheetPart) composition(t *measure.Type, say func(what, format string, args ...any)) {
	if t.Kind != operation.Quaternion {
		return
	}
	var product, turn *operation.Reading
	var by, turning string
	for _, f := range t.Rotational {
		c := f.Cases[0]
		for _, r := range identified(c) {
			switch {
			case r.Op == operation.Product && r.Reversed == [2]bool{} && product == nil:
				product, by = &r, f.Key()
			case r.Op == operation.RotateVector && len(r.Orders) == 1 && r.Axis == "" && turn == nil:
				turn, turning = &r, f.Key()
			}
		}
	}
	if product != nil {
		say("product", "%s is %s", by, map[bool]string{false: "Hamilton's (ij = k)", true: "Shuster's (ij = -k), or Hamilton's in reverse order"}[product.Swapped])
	}
	if turn != nil {
		say("turns", "%s: +90 deg about z sends x to %s", turning, map[bool]string{false: "+y", true: "-y"}[turn.Reversed[0]])
	}
	if product != nil && turn != nil {
		order := "p q: q turns first"
		if product.Swapped != turn.Reversed[0] {
			order = "q p: p turns first"
		}
		say("composition", "%s of p and q acts on vectors as %s", by, order)
	}
}

func (p *sheetPart) placeOf(t *measure.Type) string {
	return p.position(p.pkg.Fset.Position(t.Object.Pos()).Filename, p.pkg.Fset.Position(t.Object.Pos()).Line)
}

func (p *sheetPart) at(n ast.Node) string {
	at := p.pkg.Fset.Position(n.Pos())
	return p.position(at.Filename, at.Line)
}

func (p *sheetPart) position(name string, line int) string {
	if abs, err := filepath.Abs(p.dir); err == nil {
		if rel, err := filepath.Rel(abs, name); err == nil && !strings.HasPrefix(rel, "..") {
			name = rel
		}
	}
	return fmt.Sprintf("%s:%d", filepath.ToSlash(name), line)
}
