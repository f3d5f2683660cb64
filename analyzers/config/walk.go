package config

import (
	"fmt"
	"slices"
	"strconv"

	"dextral/analyzers/claims"
	"dextral/analyzers/config/sourcedoc"
	"dextral/analyzers/config/tree"
	"dextral/analyzers/source"
	"dextral/core/convention"
	"dextral/rules"
)

// walker goes through one document.
type walker struct {
	doc      *tree.Document
	spec     specification
	names    map[[2]string]*claims.Name
	comments map[source.Span]*claims.Comment
	told     map[*tree.Node][]teller
	twice    map[*tree.Node]map[source.Span]source.Span
	members  []member
	warnings []Warning
	code     bool // of a program, see code.go
}

// member is a value found, with what twins are told by.
type member struct {
	value *rules.Value
	in    string // path of the map that holds its key
	stem  string
}

func newWalker(doc *tree.Document, spec specification) *walker {
	return &walker{
		doc: doc, spec: spec,
		names: map[[2]string]*claims.Name{}, comments: map[source.Span]*claims.Comment{}, told: map[*tree.Node][]teller{},
		twice: map[*tree.Node]map[source.Span]source.Span{},
	}
}

// spot is a node with what stands around it. Most spots of a file are left
// without a look at their names, so names and paths are worked out when asked for.
type spot struct {
	node  *tree.Node
	in    *spot         // what holds it; nil for a root
	key   string        // of an entry
	index int           // of an item or a root; -1 for an entry
	keyAt source.Span   // where the key stands, of a list for its items; empty if there is none
	parts []source.Span // of a value written name by name: where its numbers stand with their names
	name  *claims.Name  // see nameOf
	where string        // see path
}

func (w *walker) walk() {
	for i, root := range w.doc.Roots {
		w.visit(&spot{node: root, index: i})
	}
}

// nameOf is the name that the numbers of a spot go by: that of its key or, in a
// list, of the list.
func (w *walker) nameOf(s *spot) *claims.Name {
	switch {
	case s.name != nil:
	case s.in == nil:
		s.name = w.name("", "")
	case s.node.Tag == sourcedoc.Scope && w.code:
		s.name = w.nameOfScope(s.key)
	case s.index >= 0 || s.owner() != s:
		s.name = w.nameOf(s.in)
	default:
		s.name = w.name(w.nameOf(s.in).Text, s.key)
	}
	return s.name
}

// path is where a spot stands in the structure of the file.
func (s *spot) path() string {
	switch {
	case s.where != "":
	case s.in == nil && s.index == 0:
	case s.in == nil:
		s.where = fmt.Sprintf("document %d", s.index+1)
	case s.index >= 0:
		s.where = fmt.Sprintf("%s[%s]", s.in.path(), s.itemName())
	default:
		s.where = join(s.in.path(), s.key)
	}
	return s.where
}

// itemName is what the item of a list goes by.
func (s *spot) itemName() string {
	if keys := s.in.node.ItemKeys; keys != nil && keys[s.index].Name != "" {
		return keys[s.index].Name
	}
	return strconv.Itoa(s.index)
}

// otherwise reports whether something around a spot says that nothing below it
// is an orientation: gains, noise.
func (w *walker) otherwise(s *spot) bool {
	for p := s.in; p != nil; p = p.in {
		if w.nameOf(p).Deep {
			return true
		}
	}
	return false
}

// result puts the values in file order and tells the twins.
func (w *walker) result() Result {
	slices.SortStableFunc(w.members, func(a, b member) int { return a.value.Place.Compare(b.value.Place) })
	twins(w.members)
	r := Result{Warnings: w.warnings}
	for _, m := range w.members {
		r.Values = append(r.Values, m.value)
	}
	return r
}

// name reads a name once per file.
func (w *walker) name(outer, name string) *claims.Name {
	key := [2]string{outer, name}
	n := w.names[key]
	if n == nil {
		n = claims.ReadIn(outer, name)
		w.names[key] = n
	}
	return n
}

// comment reads a comment once per file.
func (w *walker) comment(span source.Span, text string) *claims.Comment {
	c := w.comments[span]
	if c == nil {
		c = claims.ReadComment(text)
		w.comments[span] = c
	}
	return c
}

// entry is the spot of a map's entry.
func (s *spot) entry(e *tree.Entry) *spot {
	child := &spot{node: e.Value, in: s, key: e.Key, index: -1, keyAt: e.KeyAt}
	if e.Key == "" { // the text of an element goes by the element
		child.keyAt = s.keyAt
	}
	return child
}

// item is the spot of a list's item.
func (s *spot) item(i int) *spot {
	child := &spot{node: s.node.Items[i], in: s, index: i, keyAt: s.keyAt}
	if s.node.ItemKeys != nil {
		child.keyAt = s.node.ItemKeys[i].At
	}
	return child
}

func join(path, key string) string {
	if path == "" {
		return key
	}
	if key == "" { // the text of an element
		return path
	}
	return path + "." + key
}

// owner is the element whose text a spot is, or the spot itself.
func (s *spot) owner() *spot {
	if s.in != nil && s.index < 0 && s.key == "" {
		return s.in
	}
	return s
}

// holder is the nearest map around a spot, nil for none.
func (s *spot) holder() *spot {
	for p := s.owner().in; p != nil; p = p.in {
		if p.node.Kind == tree.Map {
			return p
		}
	}
	return nil
}

func (w *walker) visit(s *spot) {
	if w.spec != nil {
		w.specified(s)
		return
	}
	switch s.node.Kind {
	case tree.Scalar:
		_ = w.numbers(s) || w.words(s)
	case tree.List:
		if w.numbers(s) || w.rows(s) || w.words(s) {
			return
		}
		for i := range s.node.Items {
			w.visit(s.item(i))
		}
	case tree.Map:
		if w.block(s) {
			return
		}
		done := w.named(s)
		for i := range s.node.Entries {
			if !done[i] {
				w.visit(s.entry(&s.node.Entries[i]))
			}
		}
	}
}

// specified walks a tree whose format fixes everything.
func (w *walker) specified(s *spot) {
	w.spec(w, s)
	for i := range s.node.Items {
		w.visit(s.item(i))
	}
	for i := range s.node.Entries {
		w.visit(s.entry(&s.node.Entries[i]))
	}
}

// add keeps a value found at a spot. Meaning says what it is; numbers, rows and
// columns are set by the caller.
func (w *walker) add(s *spot, m reading, v *rules.Value) {
	v.Form, v.Why = m.Form, m.Why
	if v.Key == "" {
		v.Key = s.path()
	}
	if !s.keyAt.Empty() && v.KeyAt == (rules.Place{}) {
		v.KeyAt = w.doc.File.Place(s.keyAt)
	}
	if v.Place == (rules.Place{}) {
		v.Place = w.doc.File.Place(s.node.Span)
	}
	if v.Why == "" {
		v.Why = doubt(v, w.nameOf(s))
	}
	if w.code && v.Why == "" {
		v.Why = w.doubtCode(s, v)
	}
	if w.code && initial(v) {
		return
	}
	in := ""
	if h := s.holder(); h != nil {
		in = h.path()
		w.warnTwice(h, s)
	}
	if w.apart(s) {
		in += "/" + v.Place.String()
	}
	w.members = append(w.members, member{v, in, w.nameOf(s).Stem})
}

// warnTwice warns of a key that stands twice in a map, of which programs keep
// one or the other.
func (w *walker) warnTwice(holder, s *spot) {
	if !w.doc.UniqueKeys || s.keyAt.Empty() {
		return
	}
	twice, done := w.twice[holder.node]
	if !done {
		twice = repeated(holder.node)
		w.twice[holder.node] = twice
	}
	if before, ok := twice[s.keyAt]; ok {
		w.warnings = append(w.warnings, Warning{w.doc.File.Place(s.keyAt),
			fmt.Sprintf("the key %s stands on line %d already; programs keep one of the two, and not all the same one", w.doc.File.Slice(s.keyAt), w.doc.File.Line(before.From))})
	}
}

// repeated finds the keys of a map that stood there before, with where.
func repeated(m *tree.Node) map[source.Span]source.Span {
	var found map[source.Span]source.Span
	first := make(map[string]source.Span, len(m.Entries))
	for _, e := range m.Entries {
		before, again := first[e.Key]
		switch {
		case e.KeyAt.Empty():
		case !again:
			first[e.Key] = e.KeyAt
		case found == nil:
			found = map[source.Span]source.Span{e.KeyAt: before}
		default:
			found[e.KeyAt] = before
		}
	}
	return found
}

// claim makes a claim by the key of a spot.
func (w *walker) claim(s *spot, says convention.Term, source rules.Source) rules.Claim {
	c := rules.Claim{Says: says, Source: source, Text: w.nameOf(s).Text}
	if !s.keyAt.Empty() {
		c.Place = w.doc.File.Place(s.keyAt)
	}
	return c
}
