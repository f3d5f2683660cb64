package revision

import (
	"context"
	"fmt"
	"go/ast"
	"go/parser"
	"go/printer"
	"go/token"
	"path"
	"path/filepath"
	"slices"
	"strings"

	"dextral/analyzers/gosource"
	"dextral/rules/report"
)

// functions says what became of the functions of the Go packages that differ: those
// that compute something else than before, and those whose text differs while they
// compute the same.
func (s *scanned) functions(ctx context.Context) []report.FunctionChange {
	dirs := map[string]bool{}
	for _, f := range s.after.tree.Files {
		if path.Ext(f.Path) == ".go" {
			dirs[path.Dir(f.Path)] = true
		}
	}
	if len(dirs) == 0 {
		return nil
	}
	before, after := s.measured(ctx, &s.before), s.measured(ctx, &s.after)
	var list []report.FunctionChange
	for name, now := range after {
		was, known := before[name]
		if !known || was.text == now.text {
			continue
		}
		c := report.FunctionChange{Name: now.name, At: now.at, Was: was.computes, Is: now.computes}
		if c.Was != c.Is || c.Was != "" {
			list = append(list, c)
		}
	}
	slices.SortFunc(list, func(a, b report.FunctionChange) int { return strings.Compare(a.At+a.Name, b.At+b.Name) })
	return list
}

// function is one function of a version.
type function struct {
	name, at string
	text     string // of its declaration, without comments
	computes string // "" if it is not known
}

// measured are the functions of the Go files of a version, by printed directory and
// name, with what they compute.
func (s *scanned) measured(ctx context.Context, v *version) map[string]function {
	all := map[string]function{}
	byDir := map[string]string{} // as the operating system has it, by printed directory
	for _, f := range v.tree.Files {
		if path.Ext(f.Path) != ".go" || strings.HasSuffix(f.Path, "_test.go") {
			continue
		}
		byDir[path.Dir(f.Path)] = filepath.Dir(f.Name)
		declared(f.Name, f.Path, all)
	}
	for printed, dir := range byDir {
		sheet, err := gosource.Sheet(ctx, dir, []string{"."})
		if err != nil {
			continue // what cannot be loaded is reported by the audit
		}
		for _, pkg := range sheet.Packages {
			for _, e := range pkg.Funcs {
				name, _, _ := strings.Cut(e.Name, "(")
				f, ok := all[printed+" "+name]
				if !ok {
					continue
				}
				var says []string
				for _, l := range e.Lines {
					if l.What == "computes" {
						says = append(says, l.Says)
					}
				}
				f.computes = strings.Join(says, "; ")
				all[printed+" "+name] = f
			}
		}
	}
	return all
}

// declared adds the functions of one file.
func declared(name, printed string, all map[string]function) {
	fset := token.NewFileSet()
	file, err := parser.ParseFile(fset, name, nil, parser.SkipObjectResolution)
	if err != nil {
		return
	}
	for _, d := range file.Decls {
		f, ok := d.(*ast.FuncDecl)
		if !ok {
			continue
		}
		key := f.Name.Name
		if f.Recv != nil && len(f.Recv.List) == 1 {
			key = receiver(f.Recv.List[0].Type) + "." + key
		}
		var text strings.Builder
		if printer.Fprint(&text, token.NewFileSet(), f) != nil {
			continue
		}
		at := fset.Position(f.Name.Pos())
		all[path.Dir(printed)+" "+key] = function{name: key, at: fmt.Sprintf("%s:%d:%d", printed, at.Line, at.Column), text: strings.Join(strings.Fields(text.String()), " ")}
	}
}

func receiver(t ast.Expr) string {
	switch t := t.(type) {
	case *ast.StarExpr:
		return receiver(t.X)
	case *ast.IndexExpr:
		return receiver(t.X)
	case *ast.IndexListExpr:
		return receiver(t.X)
	case *ast.Ident:
		return t.Name
	}
	return ""
}
