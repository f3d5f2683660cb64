package sourcedoc

import (
	"slices"
	"strings"

	"dextral/analyzers/config/tree"
)

// scanC goes through statements of C and its family.
func (s *scanner) scanC() {
	for s.peek(0).kind != end && !s.tooDeep() {
		t := s.peek(0)
		switch {
		case t.kind == directive:
			s.directive(t)
			continue
		case t.is(";"):
			s.declared()
			s.start = s.i + 1
		case t.is("="):
			if s.assignC() {
				continue
			}
		case t.is("("), t.is("{"):
			if s.constructed() {
				continue
			}
			if t.is("{") {
				s.scopes = append(s.scopes, scope{node: s.child(s.header())})
				s.start = s.i + 1
			}
		case t.is("}"):
			s.closeBrace()
			s.start = s.i + 1
		case t.is("<<") && s.i == s.start+1 && s.peek(-1).kind == name:
			if s.fill() {
				continue
			}
		case t.kind == name:
			s.dropNormalized()
		}
		s.i++
	}
}

// directive opens and closes branches, and reads #define.
func (s *scanner) directive(t token) {
	s.i++
	word, rest, _ := strings.Cut(t.text, " ")
	switch word {
	case "value":
		s.define(token{kind: name, at: t.at, text: strings.TrimPrefix(t.text, valueOf)})
	case "if", "ifdef", "ifndef":
		if word == "ifndef" && s.guards(rest) {
			s.scopes = append(s.scopes, scope{node: s.innermost(), condition: 1, before: slices.Clone(s.scopes)})
			break
		}
		s.branch("#"+t.text, slices.Clone(s.scopes))
	case "else", "elif":
		if i := s.conditional(); i >= 0 {
			before := s.scopes[i].before
			s.scopes = slices.Clone(before)
			s.branch("#"+t.text, before)
		}
	case "endif":
		if i := s.conditional(); i >= 0 {
			s.scopes = slices.Delete(s.scopes, i, i+1)
		}
	}
	s.start = s.i
}

func (s *scanner) branch(key string, before []scope) {
	s.scopes = append(s.scopes, scope{node: s.child(key), condition: 1, before: before})
}

// conditional is the index of the innermost branch of a conditional, -1 for none.
func (s *scanner) conditional() int {
	for i, sc := range slices.Backward(s.scopes) {
		if sc.condition != 0 {
			return i
		}
	}
	return -1
}

// guards reports whether #ifndef NAME is followed by #define NAME: it keeps a
// header from being read twice, or gives a default.
func (s *scanner) guards(name string) bool {
	t := s.peek(0)
	return t.kind == directive && (t.text == "define "+name || t.text == valueOf+name)
}

// define reads the value of #define NAME value.
func (s *scanner) define(key token) {
	from := s.i
	n := s.value(0)
	if n != nil && s.peek(0).kind == newline && !strings.Contains(key.text, "(") && (group(n) || single(n) && constant(key.text, n)) {
		s.add(key, n, "")
	}
	for s.i = from; s.peek(0).kind != newline && s.peek(0).kind != end; s.i++ {
	}
}

// closeBrace closes the innermost scope of braces. A branch of a conditional
// around the brace stays open.
func (s *scanner) closeBrace() {
	for i := len(s.scopes) - 1; i > 0; i-- {
		if s.scopes[i].condition == 0 {
			s.scopes = slices.Delete(s.scopes, i, i+1)
			return
		}
	}
}

// notTypes are words that no declaration begins with.
var notTypes = words("return new delete else case throw goto using namespace class struct enum union typedef operator if for while switch do sizeof template typename extern")

// qualifiers are words of a declaration that are no type.
var qualifiers = words("const static constexpr inline volatile extern mutable register thread_local unsigned signed final public private protected")

// counters are types of whole numbers.
var counters = words("int short long char bool size_t int8_t int16_t int32_t int64_t uint8_t uint16_t uint32_t uint64_t uint8 uint16 uint32 unsigned enum")

func words(text string) map[string]bool {
	set := map[string]bool{}
	for _, w := range strings.Fields(text) {
		set[w] = true
	}
	return set
}

// header names the scope that a brace opens: by the function, or by what is
// declared, or by the keyword of the block.
func (s *scanner) header() string {
	tokens := s.tokens[s.start:s.i]
	last := "block"
	for i, t := range tokens {
		if t.is("(") && i > 0 && tokens[i-1].kind == name {
			return tokens[i-1].text
		}
		if t.is(":") && i > 0 {
			break // of a class: what it derives from
		}
		if t.kind == name {
			last = t.text
		}
	}
	return last
}

// target is the left side of an assignment.
type target struct {
	key      token
	typed    string // the type, without template arguments
	declared bool   // there is a type
	element  bool   // brackets stand behind the name
	constant bool   // const of a floating type
}

// target reads the tokens up to i as the left side of an assignment.
func (s *scanner) target(i int) (t target, ok bool) {
	left := s.tokens[s.start:i]
	if first := slices.IndexFunc(left, func(t token) bool { return t.is("=") }); first > 0 && left[len(left)-1].kind == name || first > 0 && left[len(left)-1].is("]") {
		left = slices.Concat(declarator(left[:first]), left[lastComma(left)+1:])
	}
	for len(left) > 0 && left[len(left)-1].is("]") {
		open := len(left) - 1
		for open > 0 && !left[open].is("[") {
			open--
		}
		left, t.element = left[:open], true
	}
	if len(left) == 0 || left[len(left)-1].kind != name {
		return t, false
	}
	t.key = left[len(left)-1]
	left = left[:len(left)-1]
	for len(left) > 1 && (left[len(left)-1].is(".") || left[len(left)-1].is("->")) && left[len(left)-2].kind == name {
		owner := left[len(left)-2]
		if owner.text != "this" {
			t.key.text = owner.text + "." + t.key.text
		}
		left = left[:len(left)-2]
	}
	isFloat, whole, isConst := false, false, false
	for i, l := range left {
		switch {
		case l.kind != name:
		case l.text == "const" || l.text == "constexpr":
			isConst = true
		case counters[l.text]:
			whole, t.declared, t.typed = true, true, l.text
		case !qualifiers[l.text] && !notTypes[l.text]:
			t.declared = true
			isFloat = isFloat || floating(l.text)
			if i > 1 && left[i-1].is("::") {
				t.typed += "::" + l.text
			} else if !inTemplate(left, i) {
				t.typed = l.text
			}
		}
	}
	t.constant = isConst && isFloat && !whole
	return t, true
}

// floating reports whether a word is a type of floating numbers.
func floating(word string) bool {
	return word == "double" || strings.HasPrefix(word, "float") || strings.Contains(strings.ToLower(word), "real")
}

// declarator drops the name and the brackets at the end of a declaration.
func declarator(left []token) []token {
	for len(left) > 0 && left[len(left)-1].is("]") {
		for len(left) > 0 && !left[len(left)-1].is("[") {
			left = left[:len(left)-1]
		}
		left = left[:max(0, len(left)-1)]
	}
	return left[:max(0, len(left)-1)]
}

// lastComma is the index of the last comma, or that of the last token.
func lastComma(left []token) int {
	for i, t := range slices.Backward(left) {
		if t.is(",") {
			return i
		}
	}
	return len(left) - 1
}

// inTemplate reports whether token i stands behind an open <.
func inTemplate(left []token, i int) bool {
	depth := 0
	for _, t := range left[:i] {
		if t.is("<") {
			depth++
		} else if t.is(">") {
			depth--
		}
	}
	return depth > 0
}

// assignC reads name = value. It reports whether it took anything; the scanner
// then stands behind the value.
func (s *scanner) assignC() bool {
	from := s.i
	t, ok := s.target(s.i)
	if !ok || t.element && !t.declared {
		return false
	}
	s.i++
	n := s.value(0)
	if n == nil || !s.ended() || !group(n) && !(t.constant && single(n) && constant(t.key.text, n)) {
		// Nothing between here and there is looked at again, so that the braces of an
		// initialiser that was not understood are not taken for a scope.
		if s.i = from; s.peek(1).is("{") {
			s.i += 2
			s.skipItem("}")
			for s.peek(0).is(",") {
				s.i++
				s.skipItem("}")
			}
			s.i++
			return true
		}
		return false
	}
	s.add(t.key, n, t.typed)
	return true
}

// constructed reads Type name(1, 0, 0, 0) and Type name{1, 0, 0, 0}.
func (s *scanner) constructed() bool {
	from := s.i
	if s.i < s.start+2 || s.peek(-1).kind != name || s.tokens[s.start].kind != name || notTypes[s.tokens[s.start].text] {
		return false
	}
	for _, t := range s.tokens[s.start : s.i-1] {
		if t.kind == mark && !strings.Contains(":: < > , & *", t.text) || t.kind == quoted || t.kind == directive {
			return false
		}
	}
	t, ok := s.target(s.i)
	if !ok || !t.declared || counters[t.typed] {
		return false
	}
	a, ok := s.bracketed(0)
	n := a.node()
	if !ok || a.opaque || n == nil || n.Kind != tree.List || len(n.Items) < 3 && numbersIn(n.Items) > 0 || !s.peek(0).is(";") && !s.peek(0).is(",") {
		s.i = from
		return false
	}
	if len(n.Items) == 1 {
		if n = n.Items[0]; !group(n) || n.Tag != "" {
			s.i = from
			return false
		}
	}
	s.add(t.key, n, t.typed)
	return true
}

// declared notes the type of a name that is declared without a value, for the
// commas that may follow.
func (s *scanner) declared() {
	stop := s.i
	if s.peek(-1).is(")") && s.i-s.start > 4 { // Mat R(3, 3);
		for stop > s.start && !s.tokens[stop].is("(") {
			stop--
		}
	}
	if t, ok := s.target(stop); ok && t.declared && stop-s.start < 20 {
		s.types[t.key.text] = t.typed
	}
}

// fill reads name << 1, 0, 0;
func (s *scanner) fill() bool {
	from, key := s.i, s.peek(-1)
	typed, known := s.types[key.text]
	if known {
		if n := s.commas(";"); n != nil && len(n.Items) > 2 {
			s.add(key, n, typed)
			return true
		}
	}
	s.i = from
	return false
}
