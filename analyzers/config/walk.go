package config

import (
	"fmt"
	"slices"

	"dextral/analyzers/claims"
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
	members  []member
	warnings []Warning
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
	}
}

// spot is a node with what stands around it.
type spot struct {
	node  *tree.Node
	name  *claims.Name // of its key, or, in a list, of the list's key
	keyAt source.Span  // where that key stands; empty if there is none
	path  string
	parts []source.Span // of a value written name by name: where its numbers stand with their names
	in    *spot         // what holds it; nil for a root
	not   string        // why nothing here is an orientation; "" if something may be
}

func (w *walker) walk() {
	for i, root := range w.doc.Roots {
		path := ""
		if i > 0 {
			path = fmt.Sprintf("document %d", i+1)
		}
		w.visit(&spot{node: root, name: w.name("", ""), path: path})
	}
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
func (w *walker) entry(s *spot, e tree.Entry) *spot {
	child := &spot{node: e.Value, name: w.name(s.name.Text, e.Key), keyAt: e.KeyAt, path: join(s.path, e.Key), in: s, not: s.not}
	if s.name.Deep && child.not == "" {
		child.not = s.name.Not
	}
	return child
}

// item is the spot of a list's item: it goes by the name of the list.
func (w *walker) item(s *spot, i int) *spot {
	return &spot{node: s.node.Items[i], name: s.name, keyAt: s.keyAt, path: fmt.Sprintf("%s[%d]", s.path, i), in: s, not: s.not}
}

func join(path, key string) string {
	if path == "" {
		return key
	}
	return path + "." + key
}

// holder is the nearest map around a spot, nil for none.
func (s *spot) holder() *spot {
	for p := s.in; p != nil; p = p.in {
		if p.node.Kind == tree.Map {
			return p
		}
	}
	return nil
}

func (w *walker) visit(s *spot) {
	switch s.node.Kind {
	case tree.Scalar:
		w.numbers(s)
		w.words(s)
	case tree.List:
		if w.numbers(s) || w.rows(s) || w.words(s) {
			return
		}
		for i := range s.node.Items {
			w.visit(w.item(s, i))
		}
	case tree.Map:
		if w.block(s) {
			return
		}
		done := w.named(s)
		for i, e := range s.node.Entries {
			if !done[i] {
				w.visit(w.entry(s, e))
			}
		}
	}
}

// add keeps a value found at a spot. Meaning says what it is; numbers, rows and
// columns are set by the caller.
func (w *walker) add(s *spot, m reading, v *rules.Value) {
	v.Form, v.Why = m.Form, m.Why
	if v.Key == "" {
		v.Key = s.path
	}
	if !s.keyAt.Empty() && v.KeyAt == (rules.Place{}) {
		v.KeyAt = w.doc.File.Place(s.keyAt)
	}
	if v.Place == (rules.Place{}) {
		v.Place = w.doc.File.Place(s.node.Span)
	}
	if v.Why == "" {
		v.Why = doubt(v, s.name)
	}
	in := ""
	if h := s.holder(); h != nil {
		in = h.path
		w.warnTwice(h, s)
	}
	w.members = append(w.members, member{v, in, s.name.Stem})
}

// warnTwice warns of a key that stands twice in a map, of which programs keep
// one or the other.
func (w *walker) warnTwice(holder, s *spot) {
	if !w.doc.UniqueKeys || s.keyAt.Empty() {
		return
	}
	first := map[string]tree.Entry{}
	for _, e := range holder.node.Entries {
		before, twice := first[e.Key]
		if !twice {
			first[e.Key] = e
		} else if e.KeyAt == s.keyAt && !before.KeyAt.Empty() {
			w.warnings = append(w.warnings, Warning{w.doc.File.Place(s.keyAt),
				fmt.Sprintf("the key %s stands on line %d already; programs keep one of the two, and not all the same one", e.Key, w.doc.File.Line(before.KeyAt.From))})
		}
	}
}

// claim makes a claim by the key of a spot.
func (w *walker) claim(s *spot, says convention.Term, source rules.Source) rules.Claim {
	c := rules.Claim{Says: says, Source: source, Text: s.name.Text}
	if !s.keyAt.Empty() {
		c.Place = w.doc.File.Place(s.keyAt)
	}
	return c
}
