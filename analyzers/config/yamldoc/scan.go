package yamldoc

import (
	"bytes"
	"strings"
	"unicode/utf8"

	"go.yaml.in/yaml/v3"

	"dextral/analyzers/config/tree"
	"dextral/analyzers/source"
)

// yamlLines finds the lines as YAML counts them: CR, NEL, LS and PS end a line
// too.
func yamlLines(text []byte, base int) []int {
	lines := []int{base}
	for i := base; i < len(text); i++ {
		switch text[i] {
		case '\n':
			lines = append(lines, i+1)
		case '\r':
			if i+1 == len(text) || text[i+1] != '\n' {
				lines = append(lines, i+1)
			}
		case 0xC2, 0xE2:
			switch r, n := utf8.DecodeRune(text[i:]); r {
			case '\u0085', '\u2028', '\u2029':
				lines = append(lines, i+n)
			}
		}
	}
	return lines
}

// offset is where a node begins, with its anchor and tag.
func (r *reader) offset(y *yaml.Node) int {
	text := r.doc.File.Text
	if y.Line < 1 || y.Line > len(r.lines) {
		return len(text)
	}
	at := r.lines[y.Line-1]
	for column := 1; column < y.Column && at < len(text); column++ {
		if text[at] < utf8.RuneSelf {
			at++
			continue
		}
		_, n := utf8.DecodeRune(text[at:])
		at += n
	}
	return at
}

// skipBlank skips white space and comments.
func skipBlank(text []byte, at int) int {
	for at < len(text) {
		switch text[at] {
		case ' ', '\t', '\r', '\n':
			at++
		case '#':
			at = lineEnd(text, at)
		default:
			return at
		}
	}
	return at
}

// lineEnd is the offset of the LF that ends a line, or of the end of the text.
func lineEnd(text []byte, at int) int {
	if i := bytes.IndexByte(text[at:], '\n'); i >= 0 {
		return at + i
	}
	return len(text)
}

// skipProperties skips the anchors and tags in front of a node.
func (r *reader) skipProperties(at int) int {
	text := r.doc.File.Text
	for at < len(text) && (text[at] == '&' || text[at] == '!') {
		for at < len(text) && !strings.ContainsRune(" \t\r\n,", rune(text[at])) {
			at++
		}
		at = skipBlank(text, at)
	}
	return at
}

// scalar reads a scalar and notes where its text stands.
func (r *reader) scalar(y *yaml.Node, at int) *tree.Node {
	f := r.doc.File
	n := &tree.Node{Kind: tree.Scalar, Tag: typeTag(y), Text: y.Value, Span: source.Span{From: at, To: at}}
	if y.Tag == "!!null" && y.Value == "" {
		return n // an empty value stands nowhere
	}
	at = r.skipProperties(at)
	raw := source.Span{From: at, To: at}
	switch y.Style &^ yaml.TaggedStyle {
	case yaml.DoubleQuotedStyle, yaml.SingleQuotedStyle:
		end := quoteEnd(f.Text, at)
		n.Span = source.Span{From: at, To: end}
		raw = source.Span{From: min(at+1, end), To: max(at, end-1)}
	case yaml.LiteralStyle, yaml.FoldedStyle:
		raw = words(f.Text, lineEnd(f.Text, at), y.Value)
		n.Span = source.Span{From: at, To: max(at, raw.To)}
	default:
		raw = words(f.Text, at, y.Value)
		n.Span = raw
	}
	n.SetRaw(f, raw)
	if r.inAlias == 0 {
		r.texts = append(r.texts, n.Span)
	}
	return n
}

// quoteEnd is the offset behind the closing quote of the scalar that opens at
// an offset.
func quoteEnd(text []byte, at int) int {
	if at >= len(text) {
		return at
	}
	quote := text[at]
	for at++; at < len(text); at++ {
		switch {
		case text[at] == '\\' && quote == '"':
			at++
		case text[at] == quote && quote == '\'' && at+1 < len(text) && text[at+1] == quote:
			at++
		case text[at] == quote:
			return at + 1
		}
	}
	return len(text)
}

// words finds the words of value in the text from an offset on, with nothing but
// white space between them, and returns the span from the first to the last. If
// they are not there, which no YAML file has shown yet, the span is empty.
func words(text []byte, at int, value string) source.Span {
	span := source.Span{From: at, To: at}
	for i, word := range strings.Fields(value) {
		for at < len(text) && strings.ContainsRune(" \t\r\n", rune(text[at])) {
			at++
		}
		if !bytes.HasPrefix(text[at:], []byte(word)) {
			return source.Span{From: span.From, To: span.From}
		}
		if i == 0 {
			span.From = at
		}
		at += len(word)
		span.To = at
	}
	return span
}
