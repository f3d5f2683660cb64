package sourcedoc

import (
	"strings"

	"dextral/analyzers/config/tree"
)

// pythonBlocks are words that begin a block of Python.
var pythonBlocks = words("def class if elif else for while with try except finally async match case")

// scanPython goes through the statements of Python.
func (s *scanner) scanPython() {
	for s.peek(0).kind != end && !s.tooDeep() {
		indent := 0
		for s.peek(0).kind == newline {
			indent = s.peek(0).indent
			s.i++
		}
		for len(s.scopes) > 1 && s.scopes[len(s.scopes)-1].indent >= indent && s.peek(0).kind != end {
			s.scopes = s.scopes[:len(s.scopes)-1]
		}
		s.start = s.i
		s.statementPython(indent)
	}
}

// statementPython reads one line of statements.
func (s *scanner) statementPython(indent int) {
	if t := s.peek(0); t.kind == name && pythonBlocks[t.text] {
		key := t.text
		if (key == "def" || key == "class") && s.peek(1).kind == name {
			key = s.peek(1).text
		}
		s.scopes = append(s.scopes, scope{node: s.child(key), indent: indent})
		s.skipHeader()
		s.start = s.i
	}
	for depth := 0; s.peek(0).kind != newline && s.peek(0).kind != end; s.i++ {
		switch t := s.peek(0); {
		case t.is("="), t.is(":") && s.i == s.start+1:
			if depth == 0 {
				s.assignPython()
			}
		case t.is(";") && depth == 0:
			s.start = s.i + 1
		case t.is("("), t.is("["), t.is("{"):
			depth++
		case t.is(")"), t.is("]"), t.is("}"):
			depth--
		case t.kind == name:
			s.dropNormalized()
		}
	}
}

// skipHeader passes over the head of a block, up to the colon outside brackets.
func (s *scanner) skipHeader() {
	for depth := 0; s.peek(0).kind != newline && s.peek(0).kind != end; s.i++ {
		switch t := s.peek(0); {
		case t.is(":") && depth == 0:
			s.i++
			return
		case t.is("("), t.is("["), t.is("{"):
			depth++
		case t.is(")"), t.is("]"), t.is("}"):
			depth--
		}
	}
}

// assignPython reads name = value, name: type = value and self.name = value. The
// scanner stays where it is, so that what a value is made of is looked at too.
func (s *scanner) assignPython() {
	left := s.tokens[s.start:s.i]
	if len(left) == 3 && left[0].text == "self" && left[1].is(".") {
		left = left[2:]
	}
	if len(left) != 1 || left[0].kind != name {
		return
	}
	key, from := left[0], s.i
	defer func() { s.i = from }()
	if s.peek(0).is(":") {
		for !s.peek(0).is("=") {
			if s.i++; s.peek(0).kind == newline || s.peek(0).kind == end {
				return
			}
		}
	}
	s.i++
	n := s.value(0)
	if n == nil || s.peek(0).kind != newline && !s.peek(0).is(";") {
		return
	}
	upper := key.text == strings.ToUpper(key.text)
	if group(n) || single(n) && upper && constant(key.text, n) {
		s.add(key, n, "")
	}
}

// matlabBlocks are words that begin a block that end closes, and branches those
// that part one.
var (
	matlabBlocks   = words("if for while switch try parfor classdef properties methods events enumeration")
	matlabBranches = words("else elseif case otherwise catch")
)

// scanMatlab goes through the statements of MATLAB and Octave.
func (s *scanner) scanMatlab() {
	for s.peek(0).kind != end && !s.tooDeep() {
		s.start = s.i
		t := s.peek(0)
		switch {
		case t.kind == name && t.text == "function":
			s.scopes = s.scopes[:1]
			s.scopes = append(s.scopes, scope{node: s.child(s.functionName())})
		case t.kind == name && matlabBlocks[t.text]:
			s.scopes = append(s.scopes, scope{node: s.child(t.text)})
		case t.kind == name && matlabBranches[t.text] && len(s.scopes) > 1:
			s.scopes = s.scopes[:len(s.scopes)-1]
			s.scopes = append(s.scopes, scope{node: s.child(t.text)})
		case t.kind == name && t.text == "end" && len(s.scopes) > 1:
			s.scopes = s.scopes[:len(s.scopes)-1]
		}
		s.statementMatlab()
		s.i++
	}
}

// functionName is the name before the arguments of a function.
func (s *scanner) functionName() string {
	found := "function"
	for i := 1; s.peek(i).kind == name || s.peek(i).kind == mark && !s.peek(i).is("("); i++ {
		if s.peek(i).kind == name {
			found = s.peek(i).text
		}
	}
	return found
}

// statementMatlab reads up to the end of a statement.
func (s *scanner) statementMatlab() {
	depth := 0
	for ; s.peek(0).kind != end; s.i++ {
		switch t := s.peek(0); {
		case depth == 0 && (t.kind == newline || t.is(";") || t.is(",")):
			return
		case t.is("=") && depth == 0:
			s.assignMatlab()
		case t.is("("), t.is("["), t.is("{"):
			depth++
		case t.is(")"), t.is("]"), t.is("}"):
			depth = max(0, depth-1)
		case t.kind == name:
			s.dropNormalized()
		}
	}
}

// assignMatlab reads name = [...] and name.field = [...]; single numbers only
// where they are fields.
func (s *scanner) assignMatlab() {
	left := s.tokens[s.start:s.i]
	if len(left)%2 == 0 {
		return
	}
	key := token{kind: name}
	for i, t := range left {
		if i%2 == 1 && !t.is(".") || i%2 == 0 && t.kind != name {
			return
		}
		key.text += t.text
	}
	key.at = left[0].at.Cover(left[len(left)-1].at)
	from := s.i
	defer func() { s.i = from }()
	s.i++
	n := s.value(0)
	if n == nil || !s.peek(0).is(";") && !s.peek(0).is(",") && s.peek(0).kind != newline {
		return
	}
	if group(n) || single(n) && len(left) > 1 && constant(key.text, n) {
		s.add(key, n, "")
	}
}

// matrix reads [1 0 0; 0 1 0], rows parted by semicolons or line ends, numbers by
// commas or white space. A transposed vector is the same numbers.
func (s *scanner) matrix() *tree.Node {
	open := s.peek(0)
	var rows []*tree.Node
	row := &tree.Node{Kind: tree.List}
	for s.i++; ; {
		t := s.peek(0)
		switch {
		case t.kind == number, (t.is("-") || t.is("+")) && s.peek(1).kind == number && s.peek(1).glued:
			if len(row.Items) > 0 && t.glued && !s.peek(-1).is(",") || len(row.Items) == maxNumbers {
				return nil
			}
			from := s.i
			item := s.number()
			if !s.parted() {
				s.i = from
				item = s.element()
			}
			if item == nil {
				return nil
			}
			row.Items = append(row.Items, item)
			continue
		case t.kind == name, t.is("("), t.is("-") && s.peek(1).glued:
			item := s.element()
			if item == nil || len(row.Items) == maxNumbers {
				return nil
			}
			row.Items = append(row.Items, item)
			continue
		case t.is(","):
		case t.is(";"), t.kind == newline, t.is("]"):
			if len(row.Items) > 0 {
				row.Span = row.Items[0].Span.Cover(row.Items[len(row.Items)-1].Span)
				rows = append(rows, row)
				row = &tree.Node{Kind: tree.List}
			}
		default:
			return nil
		}
		if s.i++; t.is("]") {
			break
		}
		if len(rows) > maxNumbers {
			return nil
		}
	}
	transposed := s.peek(0).is("'") && s.peek(0).glued
	if len(rows) == 0 || transposed && len(rows) > 1 {
		return nil
	}
	span := open.at.Cover(s.peek(-1).at)
	if transposed {
		s.i++
	}
	if len(rows) == 1 {
		rows[0].Span = span
		return rows[0]
	}
	return &tree.Node{Kind: tree.List, Span: span, Items: rows}
}

// parted reports whether an item of a matrix ends here.
func (s *scanner) parted() bool {
	t := s.peek(0)
	return !t.glued || t.kind == newline || t.is(",") || t.is(";") || t.is("]")
}

// element reads an item of a matrix that is computed, such as -pi/2 or deg2rad(30):
// white space ends it, as it does in MATLAB, unless inside brackets.
func (s *scanner) element() *tree.Node {
	first, depth := s.i, 0
	for ; s.peek(0).kind != newline && s.peek(0).kind != end; s.i++ {
		if t := s.peek(0); depth == 0 && s.i > first && s.parted() {
			break
		} else if t.is("(") {
			depth++
		} else if t.is(")") {
			depth--
		}
	}
	return s.computed(s.tokens[first].at.Cover(s.peek(-1).at))
}
