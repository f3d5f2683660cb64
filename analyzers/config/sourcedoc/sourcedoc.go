// Package sourcedoc reads the constants of C, C++, Python and MATLAB-style
// sources into a tree.
//
// Flight software keeps its alignments in its sources: a named array, a
// constructor call, a designated initialiser, a group of #define lines. This
// package is no compiler. It knows comments, strings, brackets, numbers, names
// and assignments, and takes an initialiser only if it is written out as
// literal numbers; whatever is computed is left out, and so is everything that
// it does not understand. It never fails on a text.
//
// # The tree
//
// A file is a map; so is every scope in it (namespace, class, function, block,
// branch of a conditional), tagged Scope. An initialiser is an entry under its
// name. Brackets of values are lists; designators (.w = 0.5f), keywords of a
// call (w=0.5) and keys of a dict make maps. A value made by a call, or declared
// with a type, has the name of that call or type as its tag, so that somebody
// who knows the library can say what its arguments mean.
//
// A number keeps its digits. The suffix that gives it a type in C (0.5f, 1.0L)
// stands behind it and is no part of it.
//
// # What is not taken
//
// Single numbers, unless they are constants and no counters: #define, const of a
// floating type, names in capitals. Assignments to elements and compound
// assignments; values that are normalised further down; lists longer than any
// orientation; files of tests, which are often wrong on purpose.
package sourcedoc

import (
	"bytes"
	"path"
	"regexp"
	"strings"

	"dextral/analyzers/config/tree"
	"dextral/analyzers/source"
)

// Scope is the tag of a map that is a scope and no value.
const Scope = "scope"

// MaxBytes is the size beyond which a source is not worth reading: a table that a
// program wrote.
const MaxBytes = 16 << 20

// language is a family of notations.
type language uint8

const (
	cFamily language = iota
	python
	matlab
)

// Read reads a source file. Its tree is empty for files of tests. There is no
// error.
func Read(f *source.File) (*tree.Document, error) {
	root := &tree.Node{Kind: tree.Map, Tag: Scope, Span: source.Span{To: len(f.Text)}}
	doc := &tree.Document{File: f, Roots: []*tree.Node{root}}
	if IsTest(f.Path) {
		return doc, nil
	}
	x := lexer{text: f.Text, lang: languageOf(f)}
	x.run()
	doc.Comments = x.comments
	s := &scanner{text: f.Text, lang: x.lang, tokens: x.tokens, doc: doc, types: map[string]string{}, keys: map[*tree.Node]map[string]int{}}
	s.scopes = []scope{{node: root}}
	s.scan()
	prune(root)
	return doc, nil
}

var testDirectory = regexp.MustCompile(`(?i)^(tests?|testing|unit_?tests?|testdata|test_data|test_suite|googletest|gtest|mocks?)$`)

// IsTest reports whether a path is that of a test.
func IsTest(name string) bool {
	name = strings.ReplaceAll(name, `\`, "/")
	for _, dir := range strings.Split(path.Dir(name), "/") {
		if testDirectory.MatchString(dir) {
			return true
		}
	}
	stem := strings.TrimSuffix(path.Base(name), path.Ext(name))
	lower := strings.ToLower(stem)
	switch lower {
	case "test", "tests", "conftest":
		return true
	}
	return strings.HasPrefix(lower, "test_") || strings.HasSuffix(lower, "_test") || strings.HasSuffix(lower, "_tests") ||
		strings.HasSuffix(lower, "_unittest") || strings.HasSuffix(stem, "Test") || strings.HasSuffix(stem, "Tests")
}

// languageOf tells the notation by the file's name, and Objective-C and others
// that share an ending with MATLAB by their marks.
func languageOf(f *source.File) language {
	switch strings.ToLower(path.Ext(f.Path)) {
	case ".py":
		return python
	case ".m":
		for _, mark := range []string{"#import", "#include", "@interface", "@implementation", "(*"} {
			if bytes.Contains(f.Text, []byte(mark)) {
				return cFamily
			}
		}
		return matlab
	}
	return cFamily
}

// prune removes scopes that hold nothing. It reports whether anything is left.
func prune(n *tree.Node) bool {
	if n.Tag != Scope {
		return true
	}
	kept := n.Entries[:0]
	for _, e := range n.Entries {
		if prune(e.Value) {
			kept = append(kept, e)
		}
	}
	n.Entries = kept
	return len(kept) > 0
}
