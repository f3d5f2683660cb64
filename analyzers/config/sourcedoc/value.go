package sourcedoc

import (
	"regexp"
	"strconv"
	"strings"

	"dextral/analyzers/config/tree"
	"dextral/analyzers/source"
)

// Bounds on what is taken for a value.
const (
	maxNesting = 20   // brackets in brackets
	maxItems   = 4096 // of a list; of more, the first
	maxNumbers = 16   // of a list of numbers: a 4x4
)

// peek is the token at an offset from the next one.
func (s *scanner) peek(ahead int) token {
	return s.tokens[min(max(s.i+ahead, 0), len(s.tokens)-1)]
}

// value reads a value that is written out: a number, a bracket of values, a call
// of which the arguments are. It is nil for anything else; what was read of it
// then is of no meaning, and the caller goes on from where it likes.
func (s *scanner) value(depth int) *tree.Node {
	if depth > maxNesting {
		return nil
	}
	switch t := s.peek(0); {
	case t.kind == number, (t.is("-") || t.is("+")) && s.peek(1).kind == number && s.peek(1).glued:
		return s.number()
	case t.kind == quoted:
		s.i++
		return &tree.Node{Span: t.at, Text: t.text} // has no Raw: a string is never read as numbers
	case t.is("[") && s.lang == matlab:
		return s.matrix()
	case t.is("{") && s.lang != matlab, t.is("[") && s.lang == python:
		return s.bracket(depth)
	case t.is("("):
		return s.parenthesis(depth)
	case t.kind == name:
		return s.call(depth)
	}
	return nil
}

// number reads a number with its sign.
func (s *scanner) number() *tree.Node {
	span := s.peek(0).at
	if s.peek(0).kind == mark {
		s.i++
		span = span.Cover(s.peek(0).at)
	}
	s.i++
	return &tree.Node{Span: span, Raw: span, Text: string(s.text[span.From:span.To])}
}

// expression reads an item that computes a number from others and pi, such as
// -M_PI/2 or np.deg2rad(30); nil for anything else. Other arithmetic is left out: it
// mostly is with names whose values are elsewhere.
func (s *scanner) expression(first int, close string) *tree.Node {
	s.i = first
	s.skipItem(close)
	if s.i == first {
		return nil
	}
	return s.computed(s.tokens[first].at.Cover(s.peek(-1).at))
}

// computed is the expression at a span.
func (s *scanner) computed(span source.Span) *tree.Node {
	const longest = 100
	if span.To-span.From > longest {
		return nil
	}
	text := string(s.text[span.From:span.To])
	if !angular.MatchString(text) {
		return nil
	}
	if _, ok := tree.Expression(text, nil); !ok {
		return nil
	}
	return &tree.Node{Span: span, Raw: span, Text: text, Expression: true}
}

// angular is what makes an expression worth reading.
var angular = regexp.MustCompile(`(?i)\bpi\b|\bm_pi|deg2rad|deg_to_rad|radians|sqrt`)

// ended reports whether a value ends here, and is no operand of something.
func (s *scanner) ended() bool {
	t := s.peek(0)
	return t.kind == newline || t.kind == end || t.kind == directive ||
		t.kind == mark && len(t.text) == 1 && strings.Contains(",;)]}", t.text)
}

// arguments are what stands between brackets.
type arguments struct {
	items   []*tree.Node // without key
	entries []tree.Entry // with key
	span    source.Span
	opaque  bool // an item is no literal
}

// bracketed reads what stands between the bracket here and its partner. It is
// false if there is no partner.
func (s *scanner) bracketed(depth int) (a arguments, ok bool) {
	open := s.peek(0)
	close := map[string]string{"(": ")", "[": "]", "{": "}"}[open.text]
	for s.i++; ; {
		s.skipBreaks()
		if s.peek(0).is(close) {
			break
		}
		if k := s.peek(0).kind; k == end || k == directive || s.spend() {
			return a, false // of #if and #else both would be taken
		}
		key, keyAt := s.key()
		s.position(len(a.items))
		first := s.i
		n := s.value(depth + 1)
		if n == nil || !s.atComma(close) {
			n = s.expression(first, close)
		}
		if n == nil {
			n = &tree.Node{Span: s.peek(0).at}
			a.opaque = a.opaque || key == ""
		}
		switch {
		case len(a.items)+len(a.entries) >= maxItems:
		case key != "":
			a.entries = append(a.entries, tree.Entry{Key: key, KeyAt: keyAt, Value: n})
		default:
			a.items = append(a.items, n)
		}
		if s.peek(0).is(",") {
			s.i++
		}
	}
	a.span = open.at.Cover(s.peek(0).at)
	s.i++
	return a, true
}

// spend counts what is read, and reports whether it is too much: a text whose
// brackets never close would else be read over and over.
func (s *scanner) spend() bool {
	const often = 40
	s.spent++
	return s.spent > often*len(s.tokens)
}

// skipBreaks passes over line ends inside brackets.
func (s *scanner) skipBreaks() {
	for s.peek(0).kind == newline {
		s.i++
	}
}

func (s *scanner) atComma(close string) bool {
	s.skipBreaks()
	return s.peek(0).is(",") || s.peek(0).is(close)
}

// skipItem passes over an item that is no value, up to its comma or the closing
// bracket.
func (s *scanner) skipItem(close string) {
	depth := 0
	for ; s.peek(0).kind != end && !s.spend(); s.i++ {
		t := s.peek(0)
		if t.kind != mark {
			continue
		}
		switch {
		case depth == 0 && (t.text == "," || t.text == close):
			return
		case strings.Contains("([{", t.text):
			depth++
		case strings.Contains(")]}", t.text):
			if depth--; depth < 0 {
				return // the brackets do not match
			}
		}
	}
}

// key reads the key of an item, if it has one: .w =, w=, "w":.
func (s *scanner) key() (string, source.Span) {
	t := s.peek(0)
	switch {
	case s.lang == cFamily && t.is(".") && s.peek(1).kind == name && s.peek(2).is("="):
		s.i += 3
		return s.peek(-2).text, s.peek(-2).at
	case s.lang == python && t.kind == name && s.peek(1).is("="):
		s.i += 2
		return t.text, t.at
	case s.lang == python && t.kind == quoted && s.peek(1).is(":"):
		s.i += 2
		if !nameLike.MatchString(t.text) {
			return "item", t.at // words that explain, or code
		}
		return t.text, source.Span{From: min(t.at.From+1, t.at.To), To: max(t.at.From, t.at.To-1)}
	}
	return "", source.Span{}
}

// nameLike is how a key of a dict looks that names its value.
var nameLike = regexp.MustCompile(`^[\pL\pN_. -]{1,60}$`)

// position passes over the designator of an array's item, [2] =, if the item stands
// where the designator says.
func (s *scanner) position(index int) {
	at := s.peek(1)
	if s.lang == cFamily && s.peek(0).is("[") && at.kind == number && s.peek(2).is("]") && s.peek(3).is("=") &&
		string(s.text[at.at.From:at.at.To]) == strconv.Itoa(index) {
		s.i += 4
	}
}

// node makes a list or a map of arguments; nil if they are neither, or hold
// nothing that is written out.
func (a arguments) node() *tree.Node {
	switch {
	case len(a.entries) > 0 && len(a.items) == 0:
		return &tree.Node{Kind: tree.Map, Span: a.span, Entries: a.entries}
	case len(a.entries) > 0 || len(a.items) == 0:
		return nil
	case numbersIn(a.items) > maxNumbers, a.opaque && numbersIn(a.items) > 0:
		return nil
	}
	return &tree.Node{Kind: tree.List, Span: a.span, Items: a.items}
}

// numbersIn counts the items that are numbers.
func numbersIn(items []*tree.Node) int {
	n := 0
	for _, item := range items {
		if item.Kind == tree.Scalar && !item.Raw.Empty() {
			n++
		}
	}
	return n
}

// bracket reads {...} or [...].
func (s *scanner) bracket(depth int) *tree.Node {
	a, ok := s.bracketed(depth)
	if !ok {
		return nil
	}
	return s.attached(a.node())
}

// parenthesis reads (value), a tuple, a compound literal (type){...}, and a
// matrix filled by commas: (Matrix() << 1, 0, 0).
func (s *scanner) parenthesis(depth int) *tree.Node {
	if n := s.filled(); n != nil {
		return n
	}
	if s.lang == cFamily {
		if s.peek(1).kind == name && floating(s.peek(1).text) && s.peek(2).is(")") { // a cast
			if s.i += 3; s.peek(0).kind == number || s.peek(0).is("-") && s.peek(1).kind == number {
				return s.number()
			}
			return nil
		}
		if n, ok := s.compound(depth); ok {
			return n
		}
	}
	a, ok := s.bracketed(depth)
	if !ok {
		return nil
	}
	if len(a.items) == 1 && len(a.entries) == 0 && !a.opaque && !s.peek(-2).is(",") {
		return a.items[0]
	}
	if s.lang != python {
		return nil
	}
	return s.attached(a.node())
}

// compound reads a compound literal; ok reports that a type stands here, whatever
// follows it.
func (s *scanner) compound(depth int) (n *tree.Node, ok bool) {
	from := s.i
	typed := ""
	for s.i++; ; s.i++ {
		t := s.peek(0)
		switch {
		case t.kind == name && t.text != "const" && t.text != "struct":
			typed = t.text
			continue
		case t.kind == name, t.kind == number, t.is("["), t.is("]"), t.is("::"):
			continue
		}
		break
	}
	if typed == "" || !s.peek(0).is(")") || !s.peek(1).is("{") {
		s.i = from
		return nil, false
	}
	s.i++
	if n = s.bracket(depth); n != nil && n.Tag == "" {
		n.Tag = typed
	}
	return n, true
}

// filled reads (Matrix3d() << 1, 0, ...).finished() and (Mat_<double>(3, 3) << 1,
// 0, ...).
func (s *scanner) filled() *tree.Node {
	from := s.i
	s.i++
	callee, ok := s.callee()
	if !ok || !s.peek(0).is("(") {
		s.i = from
		return nil
	}
	for s.i++; s.peek(0).kind == number || s.peek(0).is(","); s.i++ { // the size
	}
	if !s.peek(0).is(")") || !s.peek(1).is("<<") {
		s.i = from
		return nil
	}
	s.i++
	n := s.commas(")")
	if n == nil {
		s.i = from
		return nil
	}
	n.Tag = callee
	s.i++
	return s.attached(n)
}

// commas reads << 1, 0, 0 up to a closing mark.
func (s *scanner) commas(close string) *tree.Node {
	n := &tree.Node{Kind: tree.List}
	for s.i++; ; s.i++ {
		item := s.value(maxNesting)
		s.skipBreaks()
		if item == nil || item.Raw.Empty() || len(n.Items) == maxNumbers || !s.atComma(close) {
			return nil
		}
		if n.Items = append(n.Items, item); s.peek(0).is(close) {
			n.Span = n.Items[0].Span.Cover(item.Span)
			return n
		}
	}
}
