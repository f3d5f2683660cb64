package literal

import (
	"go/ast"
	"go/token"
	"go/types"
	"strings"
)

// altered collects the variables whose first value is not the one that counts:
// a part of them is assigned, they are assigned anew from themselves, their
// address is taken, or they are normalised somewhere.
//
//	q := Quat{1, 2, 3, 4}        m := Mat3{0: 1}
//	q = q.Normalize()            m[4] = cos
func altered(files []*ast.File, info *types.Info) map[types.Object]bool {
	set := map[types.Object]bool{}
	mark := func(e ast.Expr) {
		if id := root(e); id != nil {
			if object := info.ObjectOf(id); object != nil {
				set[object] = true
			}
		}
	}
	for _, f := range files {
		ast.Inspect(f, func(n ast.Node) bool {
			switch n := n.(type) {
			case *ast.AssignStmt:
				for i, left := range n.Lhs {
					if isPart(left) || n.Tok != token.DEFINE && (n.Tok != token.ASSIGN || i < len(n.Rhs) && uses(n.Rhs[i], left, info)) {
						mark(left)
					}
				}
			case *ast.IncDecStmt:
				mark(n.X)
			case *ast.UnaryExpr:
				if n.Op == token.AND {
					mark(n.X)
				}
			case *ast.CallExpr:
				if selector, ok := n.Fun.(*ast.SelectorExpr); ok && (normalises(n.Fun) || strings.HasPrefix(selector.Sel.Name, "Set")) {
					mark(selector.X)
				}
				if normalises(n.Fun) {
					for _, arg := range n.Args {
						mark(arg)
					}
				}
			}
			return true
		})
	}
	return set
}

// isPart reports an assignment to a part of a variable: q.W, q.V[0], m[4].
func isPart(e ast.Expr) bool {
	switch ast.Unparen(e).(type) {
	case *ast.SelectorExpr, *ast.IndexExpr:
		return true
	}
	return false
}

// root is the variable of which an expression is a part.
func root(e ast.Expr) *ast.Ident {
	switch e := ast.Unparen(e).(type) {
	case *ast.Ident:
		return e
	case *ast.SelectorExpr:
		return root(e.X)
	case *ast.IndexExpr:
		return root(e.X)
	case *ast.StarExpr:
		return root(e.X)
	}
	return nil
}

// uses reports whether an expression mentions the variable on the left.
func uses(e, left ast.Expr, info *types.Info) bool {
	id, ok := ast.Unparen(left).(*ast.Ident)
	if !ok {
		return false
	}
	object, found := info.ObjectOf(id), false
	ast.Inspect(e, func(n ast.Node) bool {
		if used, ok := n.(*ast.Ident); ok && object != nil && info.Uses[used] == object {
			found = true
		}
		return !found
	})
	return found
}

// normalises reports whether a function is called what makes its operand unit.
func normalises(fun ast.Expr) bool {
	name := ""
	switch f := ast.Unparen(fun).(type) {
	case *ast.Ident:
		name = f.Name
	case *ast.SelectorExpr:
		name = f.Sel.Name
	}
	name = strings.ToLower(name)
	return strings.Contains(name, "normal") || strings.HasPrefix(name, "unit") || strings.HasPrefix(name, "tounit") ||
		strings.Contains(name, "orthonorm") || name == "versor"
}
