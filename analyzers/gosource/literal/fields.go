package literal

import (
	"go/ast"
	"go/types"
	"slices"
	"strings"
)

// member is a named expression: a field of a struct literal, a variable of a
// declaration block.
type member struct {
	name     string
	ident    ast.Node // where the name stands; nil if it is not written
	value    ast.Expr // nil if it is left out, which makes it zero
	comments []*ast.CommentGroup
}

func (m member) label() label {
	l := label{text: m.name}
	if m.ident != nil {
		l.at = span{m.ident.Pos(), m.ident.End()}
	}
	return l
}

// typeOf is the underlying type of a literal, through a pointer.
func (w *walker) typeOf(lit *ast.CompositeLit) types.Type {
	t := w.pass.TypesInfo.TypeOf(lit)
	if t == nil {
		return nil
	}
	if p, ok := t.Underlying().(*types.Pointer); ok {
		t = p.Elem()
	}
	return t.Underlying()
}

// fieldsOf pairs the fields of a struct type with the literal's expressions.
func fieldsOf(t *types.Struct, lit *ast.CompositeLit) []member {
	members := make([]member, t.NumFields())
	for i := range members {
		members[i].name = t.Field(i).Name()
	}
	for i, e := range lit.Elts {
		kv, ok := e.(*ast.KeyValueExpr)
		if !ok {
			if i < len(members) {
				members[i].value = e
			}
			continue
		}
		key, ok := kv.Key.(*ast.Ident)
		if !ok {
			continue
		}
		at := slices.IndexFunc(members, func(m member) bool { return m.name == key.Name })
		if at >= 0 {
			members[at].ident, members[at].value = key, kv.Value
		}
	}
	return members
}

// writtenFields are the members of a literal whose type is not known: an import
// that could not be resolved. Only keyed elements say what they are.
func writtenFields(lit *ast.CompositeLit) []member {
	var members []member
	for _, e := range lit.Elts {
		kv, ok := e.(*ast.KeyValueExpr)
		if !ok {
			return nil
		}
		key, ok := kv.Key.(*ast.Ident)
		if !ok {
			return nil
		}
		members = append(members, member{name: key.Name, ident: key, value: kv.Value})
	}
	return members
}

// byName picks members by name, whatever the case, in the order of the names.
func byName(members []member, names ...string) []ast.Expr {
	list := make([]ast.Expr, len(names))
	for i, name := range names {
		at := slices.IndexFunc(members, func(m member) bool { return strings.EqualFold(m.name, name) })
		if at >= 0 {
			list[i] = members[at].value
		}
	}
	return list
}

// components are the names of a quaternion's fields, scalar first.
var components = [][4]string{
	{"w", "x", "y", "z"},
	{"real", "imag", "jmag", "kmag"},
	{"real", "i", "j", "k"},
	{"s", "i", "j", "k"},
	{"w", "i", "j", "k"},
	{"s", "x", "y", "z"},
	{"r", "i", "j", "k"},
	{"a", "b", "c", "d"},
	{"q0", "q1", "q2", "q3"},
	{"qw", "qx", "qy", "qz"},
}

// scalars and vectors are the names of the two parts of a quaternion that
// keeps its vector part together.
var (
	scalars = []string{"w", "s", "real", "scalar", "re"}
	vectors = []string{"v", "vec", "vector", "imag", "xyz", "im", "vec3"}
)

// fourFields returns the names of the four fields, scalar first, of a struct
// that has just these.
func fourFields(names []string) ([4]string, bool) {
	if len(names) != 4 {
		return [4]string{}, false
	}
	for _, set := range components {
		if hasAll(names, set[:]) {
			return set, true
		}
	}
	return [4]string{}, false
}

func hasAll(names, wanted []string) bool {
	for _, want := range wanted {
		if !slices.ContainsFunc(names, func(n string) bool { return strings.EqualFold(n, want) }) {
			return false
		}
	}
	return true
}

// isVector reports a struct of three floats x, y and z.
func isVector(t *types.Struct) bool {
	return t.NumFields() == 3 && allFloats(t) && hasAll(fieldNames(t), []string{"x", "y", "z"})
}

// isQuaternionShape reports a struct of four floats that are named like the
// components of a quaternion. It may be a plane or a colour.
func isQuaternionShape(t *types.Struct) bool {
	_, ok := fourFields(fieldNames(t))
	return ok && allFloats(t)
}

func allFloats(t *types.Struct) bool {
	for f := range t.Fields() {
		if !isFloat(f.Type()) {
			return false
		}
	}
	return true
}

func fieldNames(t *types.Struct) []string {
	names := make([]string, 0, t.NumFields())
	for f := range t.Fields() {
		names = append(names, f.Name())
	}
	return names
}
