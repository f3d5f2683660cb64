package policy

import (
	"strings"

	"github.com/BurntSushi/toml"
)

// span is a stretch of the text in bytes; the end is exclusive.
type span struct{ start, end int }

// node says where one value of the decoded document stands. Its shape is that
// of the value: table for tables, list for arrays, neither for scalars.
type node struct {
	key   span // the key, or the name in a header; zero for elements of inline arrays
	value span // the value; the whole header for tables that have one
	table map[string]*node
	list  []*node
}

// child returns the node of a key; for a nil node or an unknown key a node that
// stands nowhere, so that callers need no check.
func (n *node) child(key string) *node {
	if n == nil || n.table[key] == nil {
		return &node{}
	}
	return n.table[key]
}

// element returns the node of an array's element.
func (n *node) element(i int) *node {
	if n == nil || i >= len(n.list) {
		return &node{}
	}
	return n.list[i]
}

// locate finds the places of all keys and values of a TOML text that the TOML
// library has accepted. On any other text the result is unspecified, but it
// returns.
func locate(text string) *node {
	s := &scanner{text: text}
	root := &node{table: map[string]*node{}}
	here := root
	for s.blank(); s.pos < len(s.text); s.blank() {
		if s.text[s.pos] == '[' {
			here = s.header(root)
		} else {
			s.pair(here)
		}
	}
	return root
}

// scanner walks a valid TOML text.
type scanner struct {
	text string
	pos  int
}

// blank skips white space, line ends and comments.
func (s *scanner) blank() {
	for s.pos < len(s.text) {
		switch s.text[s.pos] {
		case ' ', '\t', '\r', '\n':
			s.pos++
		case '#':
			s.pos += lengthTo(s.text[s.pos:], "\n")
		default:
			return
		}
	}
}

// lengthTo is the number of bytes before the first of the given characters.
func lengthTo(text, chars string) int {
	if i := strings.IndexAny(text, chars); i >= 0 {
		return i
	}
	return len(text)
}

// take steps over c, if it is there.
func (s *scanner) take(c byte) bool {
	if s.pos < len(s.text) && s.text[s.pos] == c {
		s.pos++
		return true
	}
	return false
}

// header reads [a.b] or [[a.b]] and returns the table that it opens.
func (s *scanner) header(root *node) *node {
	start := s.pos
	s.pos++
	many := s.take('[')
	names, at := s.keys()
	s.blank()
	s.take(']')
	if many {
		s.take(']')
	}
	whole := span{start, s.pos}
	parents, last := names[:len(names)-1], names[len(names)-1]
	if many {
		n := root.open(parents, at)
		if n.table[last] == nil {
			n.table[last] = &node{key: at, value: whole}
		}
		e := &node{key: at, value: whole, table: map[string]*node{}}
		n.table[last].list = append(n.table[last].list, e)
		return e
	}
	t := root.open(names, at)
	t.key, t.value = at, whole
	return t
}

// open follows names through tables and into the last element of arrays of
// tables. It creates tables that are missing; they stand where they are first
// mentioned.
func (n *node) open(names []string, mention span) *node {
	for _, name := range names {
		next := n.table[name]
		if next == nil {
			next = &node{key: mention, value: mention}
			n.table[name] = next
		}
		if len(next.list) > 0 {
			next = next.list[len(next.list)-1]
		}
		if next.table == nil {
			next.table = map[string]*node{}
		}
		n = next
	}
	return n
}

// pair reads key = value into a table.
func (s *scanner) pair(here *node) {
	names, at := s.keys()
	s.blank()
	if !s.take('=') { // cannot happen in a valid text; do not stand still
		s.pos++
		return
	}
	s.blank()
	v := s.value()
	v.key = at
	last := len(names) - 1
	here.open(names[:last], at).table[names[last]] = v
}

// keys reads a dotted key and returns its parts and its whole span.
func (s *scanner) keys() ([]string, span) {
	var names []string
	s.blank()
	at := span{s.pos, s.pos}
	for {
		names = append(names, s.name())
		at.end = s.pos
		s.spaces()
		if !s.take('.') {
			return names, at
		}
		s.spaces()
	}
}

func (s *scanner) spaces() {
	for s.take(' ') || s.take('\t') {
	}
}

// name reads one part of a key.
func (s *scanner) name() string {
	start := s.pos
	if c := s.peek(); c != '"' && c != '\'' {
		s.pos += lengthTo(s.text[s.pos:], " \t\r\n.=]#")
		return s.text[start:s.pos]
	}
	s.quoted()
	var decoded struct{ K string }
	quoted := s.text[start:s.pos]
	if _, err := toml.Decode("K = "+quoted, &decoded); err != nil {
		return quoted
	}
	return decoded.K
}

func (s *scanner) peek() byte {
	if s.pos < len(s.text) {
		return s.text[s.pos]
	}
	return 0
}

// value reads any value.
func (s *scanner) value() *node {
	n := &node{value: span{start: s.pos}}
	switch s.peek() {
	case '"', '\'':
		s.quoted()
	case '[':
		s.pos++
		for s.blank(); s.pos < len(s.text) && !s.take(']'); s.blank() {
			before := s.pos
			n.list = append(n.list, s.value())
			s.blank()
			if !s.take(',') && s.pos == before {
				s.pos++ // cannot happen in a valid text; do not stand still
			}
		}
	case '{':
		s.pos++
		n.table = map[string]*node{}
		for s.blank(); s.pos < len(s.text) && !s.take('}'); s.blank() {
			s.pair(n)
			s.blank()
			s.take(',')
		}
	default:
		s.pos += len(strings.TrimRight(s.text[s.pos:s.pos+lengthTo(s.text[s.pos:], ",]}#\r\n")], " \t"))
	}
	n.value.end = s.pos
	return n
}

// quoted steps over a string of any of the four kinds.
func (s *scanner) quoted() {
	quote := s.text[s.pos : s.pos+1]
	escapes := quote == `"`
	if long := strings.Repeat(quote, 3); strings.HasPrefix(s.text[s.pos:], long) {
		s.pos += 3
		s.skipTo(long, escapes)
		for range 2 { // a long string may end in one or two quotes of its own
			s.take(quote[0])
		}
		return
	}
	s.pos++
	s.skipTo(quote, escapes)
}

// skipTo steps over the next closing quotes.
func (s *scanner) skipTo(closing string, escapes bool) {
	for s.pos < len(s.text) {
		switch {
		case escapes && s.text[s.pos] == '\\':
			s.pos = min(s.pos+2, len(s.text))
		case strings.HasPrefix(s.text[s.pos:], closing):
			s.pos += len(closing)
			return
		default:
			s.pos++
		}
	}
}
