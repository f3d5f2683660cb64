package literal

import (
	"go/ast"
	"go/token"
	"go/types"
)

// declared maps types and struct fields of the package to the comments on
// their declarations: what a field's author says holds for all its values.
func declared(files []*ast.File, info *types.Info) map[types.Object][]*ast.CommentGroup {
	all := map[types.Object][]*ast.CommentGroup{}
	add := func(name *ast.Ident, groups ...*ast.CommentGroup) {
		if object, list := info.Defs[name], present(groups...); object != nil && len(list) > 0 {
			all[object] = list
		}
	}
	for _, f := range files {
		for _, decl := range f.Decls {
			d, ok := decl.(*ast.GenDecl)
			if !ok || d.Tok != token.TYPE {
				continue
			}
			for _, spec := range d.Specs {
				t, ok := spec.(*ast.TypeSpec)
				if !ok {
					continue
				}
				doc := t.Doc
				if doc == nil && len(d.Specs) == 1 {
					doc = d.Doc
				}
				add(t.Name, doc, t.Comment)
				ast.Inspect(t.Type, func(n ast.Node) bool {
					if field, ok := n.(*ast.Field); ok {
						for _, name := range field.Names {
							add(name, field.Doc, field.Comment)
						}
					}
					return true
				})
			}
		}
	}
	return all
}
