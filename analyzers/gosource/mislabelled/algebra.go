package mislabelled

import (
	"fmt"
	"go/ast"
	"go/token"
	"regexp"

	"golang.org/x/tools/go/analysis"

	"dextral/analyzers/claims"
	"dextral/analyzers/gosource/measure"
	"dextral/core/convention"
	"dextral/core/operation"
	"dextral/rules"
)

// algebra holds a product to the algebra that the comment states.
func (f *function) algebra() *contradiction {
	r, ok := f.one()
	if !ok || r.Op != operation.Product || r.Reversed != [2]bool{} || f.comment == nil || f.comment.Product == convention.ProductUnstated {
		return nil
	}
	is := convention.Hamilton
	if r.Swapped {
		is = convention.Shuster
	}
	if is == f.comment.Product {
		return nil
	}
	return &contradiction{subject: "product", stated: f.comment.Product.String(), by: rules.Comment, measured: "the product of " + is.String(), effect: "with the other algebra the operands change places"}
}

var (
	active  = regexp.MustCompile(`(?i)\bactive(ly)?\b`)
	passive = regexp.MustCompile(`(?i)\bpassive(ly)?\b`)
)

// direction holds a rotated vector to the words active and passive.
func (f *function) direction() *contradiction {
	r, ok := f.one()
	if !ok || f.comment == nil || r.Op != operation.RotateVector || len(r.Orders) != 1 || r.Axis != "" {
		return nil
	}
	a, p := active.MatchString(f.comment.Text), passive.MatchString(f.comment.Text)
	if a == p || r.Reversed[0] == p {
		return nil
	}
	stated, is := "active", "a passive rotation: +90 deg about z sends x to -y"
	if p {
		stated, is = "passive", "an active rotation: +90 deg about z sends x to +y"
	}
	return &contradiction{subject: "direction", stated: stated, by: rules.Comment, measured: is}
}

// placed is a finding on the declaration of a type.
type placed struct {
	finding *rules.Finding
	at      ast.Node
}

// scalarPlaces holds the declarations of quaternion types to the place of the scalar
// that their comments state.
func scalarPlaces(pass *analysis.Pass, measured *measure.Result) []placed {
	var all []placed
	for _, file := range pass.Files {
		for _, decl := range file.Decls {
			d, ok := decl.(*ast.GenDecl)
			if !ok || d.Tok != token.TYPE {
				continue
			}
			for _, spec := range d.Specs {
				t := spec.(*ast.TypeSpec)
				doc := t.Doc
				if doc == nil && len(d.Specs) == 1 {
					doc = d.Doc
				}
				if f := scalarPlace(pass, measured, t, doc); f != nil {
					all = append(all, placed{f, t.Name})
				}
			}
		}
	}
	return all
}

func scalarPlace(pass *analysis.Pass, measured *measure.Result, t *ast.TypeSpec, doc *ast.CommentGroup) *rules.Finding {
	if doc == nil {
		return nil
	}
	typ := measured.Type(pass.Pkg.Path() + "." + t.Name.Name)
	if typ == nil || typ.Kind != operation.Quaternion || len(typ.Orders) != 1 || len(typ.Rotational) == 0 {
		return nil
	}
	stated := claims.ReadComment(doc.Text()).Scalar
	want := map[convention.ScalarPlace]operation.Order{convention.ScalarFirst: operation.ScalarFirst, convention.ScalarLast: operation.ScalarLast}[stated]
	if !want.Known() || (typ.Orders[0][0] == 0) == (want[0] == 0) {
		return nil
	}
	return &rules.Finding{
		Rule: rules.FunctionMislabelled, Level: rules.Error, Key: t.Name.Name,
		Message:  fmt.Sprintf("%s is stored as %s, as its functions compute (%s); its comment says %s", t.Name.Name, typ.Orders[0], typ.Rotational[0].Key(), stated),
		Claim:    stated.String() + ", by comment",
		Remedy:   "make the comment and the functions agree",
		Evidence: []rules.Evidence{{What: "scalar place", Stated: rules.Words(stated.String()), Computed: rules.Words(typ.Orders[0].String())}},
	}
}
