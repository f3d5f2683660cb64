package jsondoc

import (
	"bytes"
	"fmt"
	"strings"

	"dextral/analyzers/config/tree"
	"dextral/analyzers/source"
)

// scanned is what one pass over the text finds.
type scanned struct {
	comments  []tree.Comment
	nonFinite []source.Span // NaN, Infinity, -Infinity
}

// scan walks over strings and comments, checks the bounds of package tree and
// collects what the parser does not give. It accepts anything; the parser has
// the last word.
func scan(f *source.File, base int) (scanned, error) {
	var s scanned
	depth, nodes := 0, 1
	for at := base; at < len(f.Text); {
		switch f.Text[at] {
		case '"':
			at = stringEnd(f.Text, at)
			continue
		case '/':
			at = s.comment(f, at)
			continue
		case 'N', 'I', '-':
			at = s.word(f.Text, at)
			continue
		case '[', '{':
			depth++
			nodes++
		case ']', '}':
			depth--
		case ',':
			nodes++
		}
		if depth > tree.MaxDepth {
			return s, f.ErrorAt(source.Span{From: at, To: at + 1}, fmt.Sprintf("nested deeper than %d levels", tree.MaxDepth),
				"flatten the file, or exclude it from the audit")
		}
		if nodes > tree.MaxNodes {
			return s, f.ErrorAt(source.Span{From: at, To: at + 1}, fmt.Sprintf("more than %d items in one file", tree.MaxNodes),
				"split it, or exclude it from the audit")
		}
		at++
	}
	return s, nil
}

// stringEnd is the offset behind a string.
func stringEnd(text []byte, at int) int {
	for at++; at < len(text); at++ {
		switch text[at] {
		case '\\':
			at++
		case '"':
			return at + 1
		}
	}
	return len(text)
}

// comment notes a comment, line by line, and returns the offset behind it.
func (s *scanned) comment(f *source.File, at int) int {
	rest := f.Text[at:]
	end := at + 1
	switch {
	case bytes.HasPrefix(rest, []byte("//")):
		end = len(f.Text)
		if i := bytes.IndexByte(rest, '\n'); i >= 0 {
			end = at + i
		}
	case bytes.HasPrefix(rest, []byte("/*")):
		end = len(f.Text)
		if i := bytes.Index(rest[2:], []byte("*/")); i >= 0 {
			end = at + 2 + i + 2
		}
	default:
		return end
	}
	for line := at; line < end; {
		next := end
		if i := bytes.IndexByte(f.Text[line:end], '\n'); i >= 0 {
			next = line + i + 1
		}
		text := bytes.TrimRight(f.Text[line:next], "\r\n")
		span := source.Span{From: line, To: line + len(text)}
		s.comments = append(s.comments, tree.Comment{Span: span, Text: strings.Trim(string(text), "/* \t")})
		line = next
	}
	return end
}

// word notes a word for a number that is not finite, and returns the offset
// behind the word or the character.
func (s *scanned) word(text []byte, at int) int {
	for _, w := range []string{"NaN", "Infinity", "-Infinity"} {
		if bytes.HasPrefix(text[at:], []byte(w)) {
			s.nonFinite = append(s.nonFinite, source.Span{From: at, To: at + len(w)})
			return at + len(w)
		}
	}
	return at + 1
}
