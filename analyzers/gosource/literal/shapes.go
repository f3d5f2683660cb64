package literal

import (
	"go/ast"
	"go/token"
	"go/types"
	"slices"
	"strconv"
	"strings"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/rules"
)

// literal reads a composite literal that a site names, and what is inside it.
func (w *walker) literal(s site, lit *ast.CompositeLit) {
	if len(lit.Elts) == 0 {
		return // a zero value states nothing
	}
	if !s.denied && len(s.labels) > 0 {
		name := w.nameOf(s.labels[0].text)
		s.denied = name.Not != "" && name.Deep
	}
	if s.denied {
		return
	}
	s.labels = append(slices.Clip(s.labels), typeLabels(w.pass.TypesInfo.TypeOf(lit))...)
	switch t := w.typeOf(lit).(type) {
	case *types.Struct:
		w.structure(s, lit, t)
	case *types.Array, *types.Slice:
		w.list(s, lit)
	case *types.Map:
		w.table(s, lit)
	default:
		s.labels = append(s.labels, writtenType(lit)...)
		w.unknown(s, lit)
	}
}

// unknown reads a literal whose type could not be resolved, by the names that
// it writes.
func (w *walker) unknown(s site, lit *ast.CompositeLit) {
	members := writtenFields(lit)
	names := make([]string, len(members))
	for i, m := range members {
		names[i] = m.name
	}
	if set, ok := fourFields(names); ok {
		w.four(s, lit, byName(members, set[:]...), convention.ScalarFirst)
		return
	}
	w.members(s, lit, members)
}

// structure reads a struct literal: a quaternion, a vector, or a record whose
// fields name values.
func (w *walker) structure(s site, lit *ast.CompositeLit, t *types.Struct) {
	members := fieldsOf(t, lit)
	switch {
	case isQuaternionShape(t):
		entries, order := arranged(fieldNames(t), members, lit)
		w.four(s, lit, entries, order)
	case isVector(t):
		w.three(s, lit, []angle.Role{angle.RoleX, angle.RoleY, angle.RoleZ})
	case w.parts(s, lit, t, members):
	default:
		w.members(s, lit, members)
	}
}

// parts reads a struct of a scalar and a vector part.
func (w *walker) parts(s site, lit *ast.CompositeLit, t *types.Struct, members []member) bool {
	if len(members) != 2 || !isFloat(t.Field(0).Type()) && !isFloat(t.Field(1).Type()) {
		return false
	}
	find := func(names []string) ast.Expr {
		for _, e := range byName(members, names...) {
			if e != nil {
				return e
			}
		}
		return nil
	}
	names := fieldNames(t)
	if !slices.ContainsFunc(scalars, func(n string) bool { return hasAll(names, []string{n}) }) ||
		!slices.ContainsFunc(vectors, func(n string) bool { return hasAll(names, []string{n}) }) {
		return false
	}
	entries := []ast.Expr{find(scalars), nil, nil, nil}
	if v, ok := find(vectors).(*ast.CompositeLit); ok {
		list, ok := w.entries(v)
		if !ok || len(list) != 3 {
			return false
		}
		copy(entries[1:], list)
	} else if find(vectors) != nil {
		return true // a vector that is computed: no constants, nothing inside
	}
	w.four(s, lit, entries, convention.ScalarFirst)
	return true
}

// members reads the fields of a record: each is named by its field, and some
// belong together.
func (w *walker) members(s site, lit *ast.CompositeLit, members []member) {
	group := w.groupOf(lit)
	written := 0
	for i := range members {
		if members[i].value != nil {
			written++
			members[i].comments = w.beside(members[i].value)
		}
	}
	paired := w.scattered(site{key: s.key, group: group, labels: s.labels, onType: w.withType(site{}, lit).onType}, members)
	for _, m := range members {
		if m.value == nil || paired[m.name] {
			continue
		}
		inner := site{key: join(s.key, m.name), group: group, comments: append(m.comments, w.onField(lit, m.name)...)}
		inner.labels = append([]label{m.label()}, outer(s.labels, len(members) == 1)...)
		w.value(inner, m.value)
	}
}

// outer are the labels that a value takes over from what it stands in: a
// wrapper of one field says what its field is.
func outer(labels []label, wrapper bool) []label {
	if !wrapper {
		return nil
	}
	return labels
}

// list reads an array or slice literal: numbers, or elements that the list's
// name names.
func (w *walker) list(s site, lit *ast.CompositeLit) {
	entries, ok := w.elements(lit, -1)
	if array, isArray := w.typeOf(lit).(*types.Array); ok && isArray {
		entries, ok = w.elements(lit, int(min(array.Len(), 17)))
	}
	if !ok {
		w.children(s, lit)
		return
	}
	if numbers := w.typeOf(lit); isNumbers(numbers) && len(entries) == 4 {
		w.four(s, lit, entries, convention.ScalarUnstated)
		return
	} else if isNumbers(numbers) && len(entries) == 3 {
		w.three(s, lit, nil)
		return
	}
	if !w.matrix(s, lit) && !isNumbers(w.typeOf(lit)) {
		w.children(s, lit)
	}
}

// isNumbers reports a list whose elements are floats.
func isNumbers(t types.Type) bool {
	switch t := t.(type) {
	case *types.Array:
		return isFloat(t.Elem())
	case *types.Slice:
		return isFloat(t.Elem())
	}
	return false
}

// children reads the elements of a list, each under the list's name.
func (w *walker) children(s site, lit *ast.CompositeLit) {
	for i, e := range lit.Elts {
		index := strconv.Itoa(i)
		if kv, ok := e.(*ast.KeyValueExpr); ok {
			index, e = types.ExprString(kv.Key), kv.Value
		}
		w.value(w.element(s, "["+index+"]", e), e)
	}
}

// element is the site of an element of a list or table.
func (w *walker) element(s site, index string, e ast.Expr) site {
	inner := site{key: s.key + index, group: alone, comments: append(w.beside(e), s.comments...), onType: s.onType, loose: s.loose}
	for _, l := range s.labels {
		if l.kind == ofValue {
			l.kind = ofOuter
		}
		if l.kind == ofOuter {
			inner.labels = append(inner.labels, l)
		}
	}
	return inner
}

// table reads a map literal: a key names its value.
func (w *walker) table(s site, lit *ast.CompositeLit) {
	for _, e := range lit.Elts {
		kv, ok := e.(*ast.KeyValueExpr)
		if !ok {
			continue
		}
		name := w.keyText(kv.Key)
		inner := w.element(s, "["+name+"]", kv.Value)
		inner.labels = append([]label{{text: name, at: span{kv.Key.Pos(), kv.Key.End()}}}, inner.labels...)
		inner.loose = false
		w.value(inner, kv.Value)
	}
}

// keyText is a map key as words: a string's text, else the expression.
func (w *walker) keyText(e ast.Expr) string {
	if lit, ok := e.(*ast.BasicLit); ok {
		if text, err := strconv.Unquote(lit.Value); err == nil {
			return text
		}
	}
	return types.ExprString(e)
}

// arranged are the entries of a literal of four named fields, and where the
// scalar stands among them: with keys, scalar first; without, as they are written.
func arranged(names []string, members []member, lit *ast.CompositeLit) ([]ast.Expr, convention.ScalarPlace) {
	set, _ := fourFields(names)
	entries := byName(members, set[:]...)
	last := append(slices.Clone(set[1:]), set[0])
	if isKeyed(lit) || !slices.EqualFunc(names, last, strings.EqualFold) {
		return entries, convention.ScalarFirst
	}
	return append(entries[1:4:4], entries[0]), convention.ScalarLast
}

func isKeyed(lit *ast.CompositeLit) bool {
	_, ok := lit.Elts[0].(*ast.KeyValueExpr)
	return ok
}

// four reads four numbers; order is the place of the scalar where they are
// named. What comments say about the order of a type's fields is then of no
// concern, and neither is what they say of keyed ones.
func (w *walker) four(s site, lit *ast.CompositeLit, entries []ast.Expr, order convention.ScalarPlace) {
	named := order != convention.ScalarUnstated
	said := w.speech(w.withType(s, lit))
	v := said.ofFour(named)
	if v.form == convention.NoForm || !named && said.plural() {
		return
	}
	numbers, ok := w.numbers(lit, entries)
	if !ok || s.loose {
		w.skip(lit, s, ok)
		return
	}
	if v.weak && looksAlgebraic(numbers, order) {
		v.why = "the name leaves room for something else, and these numbers do not look like a rotation"
		if v.at.from == token.NoPos {
			v.why = "only its type speaks of a quaternion, and its numbers do not look like a rotation"
		}
	}
	value := &rules.Value{Form: v.form, Numbers: numbers}
	if named {
		value.Claims = append(value.Claims, named4(order, w.place(lit.Lbrace, lit.End())))
		said.ordered = order == convention.ScalarFirst && isKeyed(lit)
	}
	w.keep(s, said, lit, v, value)
}

// looksAlgebraic reports whole numbers, or a zero scalar, off the unit sphere:
// an integer quaternion or a vector in quaternion's clothes.
func looksAlgebraic(numbers []rules.Number, order convention.ScalarPlace) bool {
	norm, whole := 0.0, true
	for _, n := range numbers {
		norm += n.Value * n.Value
		whole = whole && n.Value == float64(int64(n.Value))
	}
	vector := order == convention.ScalarFirst && numbers[0].Value == 0 || order == convention.ScalarLast && numbers[3].Value == 0
	return norm != 0 && (whole && norm != 1 || vector && (norm < 0.99 || norm > 1.01))
}

// numbers reads entries that are all constant.
func (w *walker) numbers(lit *ast.CompositeLit, entries []ast.Expr) ([]rules.Number, bool) {
	list := make([]rules.Number, len(entries))
	for i, e := range entries {
		if e == nil {
			list[i] = w.zero(lit)
			continue
		}
		n, ok := w.number(e)
		if !ok {
			return nil, false
		}
		list[i] = n
	}
	return list, true
}

// three reads three numbers of a list or x-y-z struct.
func (w *walker) three(s site, lit *ast.CompositeLit, roles []angle.Role) {
	said := w.speech(w.withType(s, lit))
	v := said.ofThree()
	if v.form == convention.NoForm && v.why == "" {
		return
	}
	block, ok := w.read(lit)
	if !ok || s.loose {
		w.skip(lit, s, ok)
		return
	}
	value := &rules.Value{Form: v.form, Numbers: block.numbers}
	if v.form == convention.Angles {
		copy(value.Roles[:], roles)
	}
	w.keep(s, said, lit, v, value)
}
