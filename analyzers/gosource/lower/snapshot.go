package lower

import (
	"go/types"

	"dextral/core/tape"
)

// snapshot copies a package variable, and what its pointers and slices lead
// to, out of the memory of the interpreted initialiser. The words of the
// variable come first; an address is the index of a word plus one, as in the
// data of a tape. Two variables that share an object get a copy each: nobody
// writes them.
type snapshot struct {
	m     *tape.Machine
	ls    *layouts
	words []tape.Const
}

// maxData bounds the words of one variable with all it leads to.
const maxData = 1 << 14

// addWords appends words of type t: those given, or those at an address.
func (s *snapshot) addWords(t types.Type, get func(i int) (uint64, bool)) {
	first := len(s.words)
	l := s.ls.of(t)
	for i, f := range l.fields {
		w, ok := get(i)
		c := tape.Const{Kind: f.Kind, Bits: w}
		if !ok || f.Kind == tape.Opaque {
			c = tape.Const{}
		}
		s.words = append(s.words, c)
	}
	s.follow(t, first)
}

// follow replaces the addresses among the words of a value of type t, which
// begin at index at, by copies of what they lead to.
func (s *snapshot) follow(t types.Type, at int) int {
	switch u := t.Underlying().(type) {
	case *types.Pointer:
		s.object(at, u.Elem(), 1)
		return at + 1
	case *types.Slice:
		n := int64(0)
		if s.words[at+1].Kind == tape.I64 {
			n = int64(s.words[at+1].Bits)
		}
		s.words[at+2].Bits = s.words[at+1].Bits // nobody appends in place
		s.object(at, u.Elem(), n)
		return at + 3
	case *types.Struct:
		for i := range u.NumFields() {
			at = s.follow(u.Field(i).Type(), at)
		}
		return at
	case *types.Array:
		for range u.Len() {
			at = s.follow(u.Elem(), at)
		}
		return at
	}
	return at + int(s.ls.of(t).words())
}

// object copies n elements of type t at the address in word at.
func (s *snapshot) object(at int, t types.Type, n int64) {
	address := s.words[at]
	if address.Kind != tape.Addr || address.Bits == 0 {
		return
	}
	l := s.ls.of(t)
	if l == nil || n < 0 || int64(len(s.words))+n*int64(len(l.fields)) > maxData || n > 0 && len(l.fields) == 0 {
		s.words[at] = tape.Const{}
		return
	}
	if n == 0 {
		s.words[at].Bits = uint64(at + 1) // not nil, and nothing is read there
		return
	}
	first := len(s.words)
	s.words[at].Bits = uint64(first + 1)
	for i := range n * int64(len(l.fields)) {
		f := l.fields[i%int64(len(l.fields))]
		w, ok := s.m.Peek(0, address.Bits+uint64(i))
		c := tape.Const{Kind: f.Kind, Bits: w}
		if !ok || f.Kind == tape.Opaque {
			c = tape.Const{}
		}
		s.words = append(s.words, c)
	}
	for range n {
		first = s.follow(t, first)
	}
}
