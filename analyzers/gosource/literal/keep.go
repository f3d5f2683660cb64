package literal

import (
	"fmt"
	"go/ast"
	"go/token"
	"go/types"
	"math"
	"slices"
	"strings"

	"dextral/analyzers/source"
	"dextral/core/convention"
	"dextral/rules"
)

// keep records a value that a literal states.
func (w *walker) keep(s site, said speech, lit *ast.CompositeLit, v verdict, value *rules.Value) {
	value.Place = w.place(lit.Lbrace, lit.End())
	w.finish(s, said, v, value)
}

// finish gives a value its key and claims and puts it on the list, or on that
// of skipped ones.
func (w *walker) finish(s site, said speech, v verdict, value *rules.Value) {
	switch {
	case w.inTest:
		w.skipped(value.Place, InTest)
		return
	case w.altered[s.object]:
		w.skipped(value.Place, Altered)
		return
	}
	value.Key, value.Why = w.unique(s.key), v.why
	if value.Why == "" && isMarker(value) {
		value.Why = "its numbers are all the same, as those of a marker for an unset value are"
	}
	if len(s.labels) > 0 && s.labels[0].kind == ofValue && s.labels[0].at.from.IsValid() {
		value.KeyAt = w.place(s.labels[0].at.from, s.labels[0].at.to)
	}
	if v.form != convention.NoForm {
		w.claim(value, v.form, v.from, v.text, v.at)
	}
	w.terms(said, value)
	w.values = append(w.values, value)
	if s.group != alone && value.Why == "" && len(said.labels) > 0 {
		w.stems[value] = twin{group: s.group, stem: said.labels[0].name.Stem}
	}
}

// isMarker reports numbers that programs use to say that nothing is known: a
// quaternion of four equal components off the unit sphere, angles that are all
// -1 or all far outside the circle. Zeros are for the rules to name.
func isMarker(v *rules.Value) bool {
	x := v.Floats()
	for _, y := range x {
		if y != x[0] || y == 0 {
			return false
		}
	}
	switch v.Form {
	case convention.Quaternion:
		return math.Abs(x[0]) != 0.5
	case convention.Angles, convention.RotationVector:
		return x[0] == -1 || math.Abs(x[0]) > 720
	}
	return false
}

// withType adds to a site what the declaration of the literal's type says.
func (w *walker) withType(s site, lit *ast.CompositeLit) site {
	if object := w.typeName(lit); object != nil {
		s.onType = append(slices.Clip(s.onType), w.declared[object]...)
	}
	return s
}

// unique numbers keys that occur again in a file: q, q#2.
func (w *walker) unique(key string) string {
	w.keys[key]++
	if n := w.keys[key]; n > 1 {
		return fmt.Sprintf("%s#%d", key, n)
	}
	return key
}

// skip records a literal that is not judged. Constant says that its numbers
// are constants, so that it is its surroundings that keep it from being read.
func (w *walker) skip(lit *ast.CompositeLit, s site, constant bool) {
	why := NotConstant
	switch {
	case !constant && s.loose:
		return // a computed operand: most of a library is made of them
	case w.inTest:
		why = InTest
	case constant && s.normal:
		why = Normalised
	case constant:
		why = Operand
	}
	w.skipped(w.place(lit.Lbrace, lit.End()), why)
}

func (w *walker) skipped(at rules.Place, why Reason) {
	w.result.Skipped = append(w.result.Skipped, Skip{at, why})
}

// typeName is the declaration of a literal's type; nil for types without name.
func (w *walker) typeName(lit *ast.CompositeLit) types.Object {
	switch t := types.Unalias(w.pass.TypesInfo.TypeOf(lit)).(type) {
	case *types.Named:
		return t.Obj()
	case *types.Pointer:
		if named, ok := types.Unalias(t.Elem()).(*types.Named); ok {
			return named.Obj()
		}
	}
	return nil
}

// onField are the comments on the declaration of a field.
func (w *walker) onField(lit *ast.CompositeLit, name string) []*ast.CommentGroup {
	t, ok := w.typeOf(lit).(*types.Struct)
	if !ok {
		return nil
	}
	for f := range t.Fields() {
		if f.Name() == name {
			return w.declared[f.Origin()]
		}
	}
	return nil
}

// source is the text of a file of the package, indexed.
func (w *walker) source(file *token.File) *source.File {
	if known := w.sources[file]; known != nil {
		return known
	}
	text, err := w.pass.ReadFile(file.Name())
	if err != nil || len(text) < file.Size() {
		text = []byte(strings.Repeat(" ", file.Size())) // gone since it was parsed
	}
	f := source.New(file.Name(), text)
	w.sources[file] = f
	return f
}

// place is a stretch of the program's text. Line comments that claim another
// file are not followed: the audit names files that it was given.
func (w *walker) place(from, to token.Pos) rules.Place {
	file := w.pass.Fset.File(from)
	if file == nil {
		return rules.Place{Path: w.base.Name()}
	}
	return w.source(file).Place(offsets(file, from, to))
}

func offsets(file *token.File, from, to token.Pos) source.Span {
	size := file.Size()
	start := min(max(file.Offset(from), 0), size)
	end := min(max(int(to)-file.Base(), start), size)
	return source.Span{From: start, To: end}
}

// startsLine reports whether only white space stands before a position on its line.
func (w *walker) startsLine(pos token.Pos) bool {
	f := w.source(w.base)
	offset := w.base.Offset(pos)
	line := f.LineSpan(f.Line(offset))
	return strings.TrimSpace(f.Slice(source.Span{From: line.From, To: offset})) == ""
}

// groupOf names a struct literal, whose fields may describe each other.
func (w *walker) groupOf(lit *ast.CompositeLit) string {
	return fmt.Sprintf("{%d}", w.base.Offset(lit.Pos()))
}

// typeLabels are the names of a type that speak about its values: its own, and
// that of its package (attitude.Quaternion).
func typeLabels(t types.Type) []label {
	if p, ok := types.Unalias(t).(*types.Pointer); ok {
		t = p.Elem()
	}
	var list []label
	for {
		alias, ok := t.(*types.Alias)
		if !ok {
			break
		}
		list = append(list, namesOf(alias.Obj())...)
		t = alias.Rhs()
	}
	if named, ok := t.(*types.Named); ok {
		list = append(list, namesOf(named.Obj())...)
	}
	return list
}

func namesOf(object *types.TypeName) []label {
	list := []label{{text: object.Name(), kind: ofType}}
	if pkg := object.Pkg(); pkg != nil {
		list = append(list, label{text: pkg.Name(), kind: ofPackage})
	}
	return list
}

// writtenType are the names of a literal's type as written, for types that
// could not be resolved.
func writtenType(lit *ast.CompositeLit) []label {
	switch t := lit.Type.(type) {
	case *ast.Ident:
		return []label{{text: t.Name, kind: ofType}}
	case *ast.SelectorExpr:
		return []label{{text: t.Sel.Name, kind: ofType}, {text: types.ExprString(t.X), kind: ofPackage}}
	}
	return nil
}
