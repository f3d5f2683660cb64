// Package tree is what all configuration formats have in common: maps, lists
// and scalars, with the stretch of the file that each stands on, and comments.
//
// A reader for one format turns text into a Document and knows nothing of
// orientations; what looks for orientations walks a Document and knows nothing
// of formats. An element of a markup language is a map whose attributes, child
// elements and text are entries; a KEY = VALUE line is an entry.
//
// # Verbatim text
//
// A number must be found again, digit for digit, at the place that a report
// names. So a scalar has, beside its decoded Text, the span Raw where the same
// words stand in the file. A reader sets it only after it compared the two; a
// scalar built from escapes has none, and is not read as numbers.
//
// # Bounds
//
// Readers refuse files beyond the bounds of this package, so that a walk is
// always short: what is deeper or larger is no calibration.
package tree

import (
	"bytes"
	"fmt"
	"strings"

	"dextral/analyzers/source"
)

// Bounds on one file.
const (
	MaxDepth   = 500       // levels of nesting
	MaxNodes   = 1_000_000 // nodes that stand in the file
	MaxAliased = 100_000   // nodes that references to other nodes add
)

// CheckCount refuses a text that may hold more than MaxNodes nodes, before a
// parser spends memory on them. Every node but the first must follow one of the
// marks.
func CheckCount(f *source.File, text []byte, marks ...string) error {
	nodes := 1
	for _, m := range marks {
		nodes += bytes.Count(text, []byte(m))
	}
	if nodes <= MaxNodes {
		return nil
	}
	return f.ErrorAt(source.Span{}, fmt.Sprintf("this file may hold %d items, more than the %d that are read", nodes, MaxNodes),
		"split it, or exclude it from the audit")
}

// Kind is the kind of a node.
type Kind uint8

// The kinds.
const (
	Scalar Kind = iota
	List
	Map
)

// Node is a value with the place where it stands.
type Node struct {
	Kind    Kind
	Span    source.Span // all of it, quotes and brackets included
	Tag     string      // what the format calls its type, such as !!opencv-matrix; "" mostly
	Text    string      // Scalar: decoded
	Raw     source.Span // Scalar: where the words of Text stand, without quotes; empty if nowhere
	Items   []*Node     // List
	Entries []Entry     // Map, in file order

	Expression bool // Scalar: the words at Raw are a constant expression, see there

	ItemKeys []ItemKey // List: of each item, where the format writes one; nil mostly
}

// ItemKey is the key of a list's item: where a format repeats the key for each,
// where that stands, and the name that the item goes by in paths, "" for its
// index.
type ItemKey struct {
	Name string
	At   source.Span
}

// Entry is a key with its value.
type Entry struct {
	Key   string
	KeyAt source.Span // without quotes
	Value *Node
}

// Comment is a comment, or one line of a longer one.
type Comment = source.Comment

// Document is a file as a tree.
type Document struct {
	File       *source.File
	Roots      []*Node   // most formats have one
	Comments   []Comment // in file order
	UniqueKeys bool      // the format wants every key of a map once

	Fortran bool // exponents may be written with a D

	// Names are what expressions of the form ${...} may use. It is nil if the
	// format has none.
	Names map[string]float64
}

// Get returns the value of the first entry with the key, or nil. It may be
// called on nil.
func (n *Node) Get(key string) *Node {
	if n == nil || n.Kind != Map {
		return nil
	}
	for _, e := range n.Entries {
		if e.Key == key {
			return e.Value
		}
	}
	return nil
}

// SetRaw makes span the place of a scalar's words if the same words stand there.
func (n *Node) SetRaw(f *source.File, span source.Span) {
	if span.Empty() {
		return
	}
	if raw := f.Text[span.From:span.To]; string(raw) == n.Text || sameWords(string(raw), n.Text) {
		n.Raw = span
	}
}

// sameWords reports whether two texts differ in white space only.
func sameWords(a, b string) bool {
	wordsA, wordsB := strings.Fields(a), strings.Fields(b)
	if len(wordsA) != len(wordsB) {
		return false
	}
	for i := range wordsA {
		if wordsA[i] != wordsB[i] {
			return false
		}
	}
	return true
}
