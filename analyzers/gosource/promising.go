package gosource

import (
	"bytes"
	"go/ast"
	"go/parser"
	"go/token"
	"os"
	"slices"
)

// A package that mentions orientations somewhere may still state none: it is
// worth type-checking only if a declaration holds numbers and words of
// orientations together, or numbers and the name of a type whose declaration
// has such words; or if a function computes and has to do with one of either. The
// test errs on the side of admitting.

// text is a parsed file with its source.
type text struct {
	src  []byte
	file *token.File
	tree *ast.File
}

// promising reports whether a package with these files may state orientations.
func promising(names []string) bool {
	var files []text
	fset := token.NewFileSet()
	for _, name := range names {
		src, err := os.ReadFile(name)
		if err != nil {
			continue
		}
		tree, err := parser.ParseFile(fset, name, src, parser.ParseComments|parser.SkipObjectResolution)
		if err != nil {
			return true // part of it may be hidden, and the error is worth reporting
		}
		files = append(files, text{src, fset.File(tree.FileStart), tree})
	}
	types := cuedTypes(files)
	for _, f := range files {
		for _, decl := range f.tree.Decls {
			if (holdsNumbers(decl) || calculates(decl)) && f.speaks(decl, types) {
				return true
			}
		}
	}
	return false
}

// speaks reports a word of orientations, or one of the names, in a node's text:
// with the comment above it and the rest of its last line.
func (f text) speaks(n ast.Node, names map[string]bool) bool {
	from, to := f.file.Offset(n.Pos()), min(f.file.Offset(n.End()), len(f.src))
	if doc := docOf(n); doc != nil {
		from = f.file.Offset(doc.Pos())
	}
	if line := bytes.IndexByte(f.src[to:], '\n'); line >= 0 {
		to += line
	}
	if from > to {
		return true
	}
	if mentions(f.src[from:to]) {
		return true
	}
	found := false
	ast.Inspect(n, func(n ast.Node) bool {
		if id, ok := n.(*ast.Ident); ok && names[id.Name] {
			found = true
		}
		return !found
	})
	return found
}

func docOf(n ast.Node) *ast.CommentGroup {
	switch n := n.(type) {
	case *ast.GenDecl:
		return n.Doc
	case *ast.FuncDecl:
		return n.Doc
	}
	return nil
}

// cuedTypes are the names of types whose declaration speaks of orientations, or
// names such a type: a record of records of quaternions.
func cuedTypes(files []text) map[string]bool {
	names := map[string]bool{}
	for before := -1; before < len(names); {
		before = len(names)
		for _, f := range files {
			for _, decl := range f.tree.Decls {
				if d, ok := decl.(*ast.GenDecl); ok && d.Tok == token.TYPE {
					f.addCued(d, names)
				}
			}
		}
	}
	return names
}

func (f text) addCued(d *ast.GenDecl, names map[string]bool) {
	for _, spec := range d.Specs {
		t, ok := spec.(*ast.TypeSpec)
		if !ok || names[t.Name.Name] {
			continue
		}
		if f.speaks(t, names) || d.Doc != nil && mentions([]byte(d.Doc.Text())) || t.Doc != nil && mentions([]byte(t.Doc.Text())) {
			names[t.Name.Name] = true
		}
	}
}

// holdsNumbers reports a declaration with a composite literal that has a
// number in it, or one of variables or constants with numbers.
func holdsNumbers(decl ast.Decl) bool {
	found := false
	ast.Inspect(decl, func(n ast.Node) bool {
		switch n := n.(type) {
		case *ast.CompositeLit:
			found = found || hasNumber(n)
		case *ast.GenDecl:
			if n.Tok == token.TYPE || n.Tok == token.IMPORT {
				return false
			}
			found = found || hasNumber(n)
		}
		return !found
	})
	return found
}

// calculates reports a function that multiplies, changes a sign or puts numbers
// that it was given into another order.
func calculates(decl ast.Decl) bool {
	f, ok := decl.(*ast.FuncDecl)
	if !ok || f.Body == nil {
		return false
	}
	found := false
	ast.Inspect(f.Body, func(n ast.Node) bool {
		switch n := n.(type) {
		case *ast.BinaryExpr:
			found = found || n.Op == token.MUL
		case *ast.UnaryExpr:
			found = found || n.Op == token.SUB
		case *ast.AssignStmt:
			found = found || n.Tok == token.MUL_ASSIGN
		case *ast.CompositeLit:
			found = found || len(n.Elts) > 2 && !slices.ContainsFunc(n.Elts, isNoElement)
		}
		return !found
	})
	return found
}

// isNoElement reports an expression that is neither a field nor an element of
// something.
func isNoElement(e ast.Expr) bool {
	if kv, ok := e.(*ast.KeyValueExpr); ok {
		e = kv.Value
	}
	switch e.(type) {
	case *ast.SelectorExpr, *ast.IndexExpr:
		return false
	}
	return true
}

func hasNumber(n ast.Node) bool {
	found := false
	ast.Inspect(n, func(n ast.Node) bool {
		if lit, ok := n.(*ast.BasicLit); ok && (lit.Kind == token.INT || lit.Kind == token.FLOAT) {
			found = true
		}
		return !found
	})
	return found
}
