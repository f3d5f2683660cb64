package literal

import (
	"fmt"
	"go/ast"
	"go/token"
	"go/types"
	"strings"

	"dextral/analyzers/source"
	"dextral/core/convention"
	"dextral/rules"
)

// keep records a value that a literal states.
func (w *walker) keep(s site, lit *ast.CompositeLit, v verdict, value *rules.Value) {
	value.Place = w.place(lit.Lbrace, lit.End())
	if object := w.typeName(lit); object != nil {
		s.remarks = append(s.remarks, w.declared[object]...)
	}
	w.finish(s, v, value)
}

// finish gives a value its key and claims and puts it on the list, or on that
// of skipped ones.
func (w *walker) finish(s site, v verdict, value *rules.Value) {
	switch {
	case w.inTest:
		w.skipped(value.Place, InTest)
		return
	case w.altered[s.object]:
		w.skipped(value.Place, Altered)
		return
	}
	value.Key, value.Why = w.unique(s.key), v.why
	if len(s.labels) > 0 && s.labels[0].kind == ofValue && s.labels[0].from.IsValid() {
		value.KeyAt = w.place(s.labels[0].from, s.labels[0].to)
	}
	if v.form != convention.NoForm {
		value.Claims = append(value.Claims, rules.Claim{Says: v.form, Source: v.from, Text: v.by.text, Place: w.labelPlace(*v.by, value)})
	}
	w.terms(s, value)
	w.values = append(w.values, value)
	if s.group != alone && value.Why == "" {
		w.stems[value] = twin{group: s.group, stem: stem(s.name())}
	}
}

// labelPlace is where a label stands; names of types count where the value is.
func (w *walker) labelPlace(l label, value *rules.Value) rules.Place {
	if !l.from.IsValid() {
		return value.Place
	}
	return w.place(l.from, l.to)
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

// fieldRemarks are the comments on the declaration of a field.
func (w *walker) fieldRemarks(lit *ast.CompositeLit, name string) []*ast.CommentGroup {
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
	return w.source(file).Place(w.span(file, from, to))
}

func (w *walker) span(file *token.File, from, to token.Pos) source.Span {
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
