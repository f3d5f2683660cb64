package sourcedoc

import (
	"bytes"
	"strings"

	"dextral/analyzers/config/tree"
	"dextral/analyzers/source"
)

// kind is the kind of a token.
type kind uint8

const (
	end       kind = iota // of the text
	name                  // an identifier
	number                // its span is that of the digits, without a suffix
	quoted                // a string or a character
	mark                  // an operator or bracket, or a number that is not read
	newline               // where a line ends a statement; indent is that of the next line
	directive             // of C: # and what follows on its line, of #define up to the name
)

// token is a token with its place.
type token struct {
	kind   kind
	at     source.Span
	text   string // of strings what stands between the quotes; of numbers ""
	indent int
	glued  bool // nothing stands between it and the token before
}

func (t token) is(m string) bool { return t.kind == mark && t.text == m }

// lexer cuts a text into tokens and collects its comments.
type lexer struct {
	text     []byte
	lang     language
	at       int
	inside   bool // a directive
	depth    int  // of brackets, inside of which a line of Python ends no statement
	tokens   []token
	comments []tree.Comment
}

// operators of more than one character, longer ones first.
var operators = []string{"<<=", ">>=", "**=", "//=", "==", "!=", "<=", ">=", "+=", "-=", "*=", "/=", "|=", "&=", "^=", "<<", ">>", "::", "->", "&&", "||", "~=", ":=", "++", "--"}

func (x *lexer) run() {
	if bytes.HasPrefix(x.text, []byte(source.ByteOrderMark)) {
		x.at = len(source.ByteOrderMark)
	}
	for x.at < len(x.text) {
		x.next()
	}
	last := source.Span{From: len(x.text), To: len(x.text)}
	x.add(token{kind: newline, at: last})
	x.add(token{kind: end, at: last})
}

func (x *lexer) add(t token) {
	if n := len(x.tokens); n > 0 {
		t.glued = x.tokens[n-1].at.To == t.at.From
	}
	x.tokens = append(x.tokens, t)
}

func (x *lexer) has(prefix string) bool { return bytes.HasPrefix(x.text[x.at:], []byte(prefix)) }

func (x *lexer) next() {
	c := x.text[x.at]
	switch {
	case c == '\n':
		x.lineEnd()
	case c == ' ' || c == '\t' || c == '\r' || c == '\f' || c == '\v':
		x.at++
	case x.comment():
	case c == '\\' && x.lang != matlab: // continues a line
		x.at = skipLineEnd(x.text, x.at+1)
	case x.lang == matlab && x.has("..."):
		x.at = skipLineEnd(x.text, lineEnd(x.text, x.at))
	case c == '#' && x.lang == cFamily && !x.inside:
		x.directive()
	case x.quotes():
	case isDigit(c) || c == '.' && x.at+1 < len(x.text) && isDigit(x.text[x.at+1]):
		x.number()
	case isLetter(c):
		from := x.at
		for x.at < len(x.text) && (isLetter(x.text[x.at]) || isDigit(x.text[x.at])) {
			x.at++
		}
		x.add(token{kind: name, at: source.Span{From: from, To: x.at}, text: string(x.text[from:x.at])})
	default:
		x.mark(c)
	}
}

func (x *lexer) mark(c byte) {
	switch c {
	case '(', '[', '{':
		x.depth++
	case ')', ']', '}':
		x.depth = max(0, x.depth-1)
	}
	length := 1
	for _, op := range operators {
		if x.has(op) {
			length = len(op)
			break
		}
	}
	span := source.Span{From: x.at, To: x.at + length}
	x.at = span.To
	x.add(token{kind: mark, at: span, text: string(x.text[span.From:span.To])})
}

// lineEnd ends a statement of Python or MATLAB; in a matrix of MATLAB, a row.
func (x *lexer) lineEnd() {
	at := x.at
	x.at++
	if x.lang == cFamily || x.lang == python && x.depth > 0 {
		return
	}
	indent := 0
	for _, c := range x.text[x.at:] {
		if c == '\t' {
			indent += 8 - indent%8
		} else if c == ' ' {
			indent++
		} else {
			break
		}
	}
	x.add(token{kind: newline, at: source.Span{From: at, To: at + 1}, indent: indent})
}

// comment takes a comment; it reports false if none begins here.
func (x *lexer) comment() bool {
	switch {
	case x.lang == cFamily && x.has("/*"):
		x.block("*/")
	case x.lang == matlab && x.blockHead():
		x.block("%}")
	case x.lang == cFamily && x.has("//"), x.lang == python && x.has("#"), x.lang == matlab && (x.has("%") || x.has("#")):
		to := lineEnd(x.text, x.at)
		x.keep(source.Span{From: x.at, To: to})
		x.at = to
	default:
		return false
	}
	return true
}

// blockHead reports whether %{ stands alone on the rest of its line.
func (x *lexer) blockHead() bool {
	return x.has("%{") && len(bytes.TrimSpace(x.text[x.at+2:lineEnd(x.text, x.at)])) == 0
}

// block takes a comment of several lines, each of which is a comment of its own.
func (x *lexer) block(close string) {
	to := len(x.text)
	if i := bytes.Index(x.text[x.at+2:], []byte(close)); i >= 0 {
		to = x.at + 2 + i + len(close)
	}
	for at := x.at; at < to; {
		stop := lineEnd(x.text[:to], at)
		first := at
		for first < stop && (x.text[first] == ' ' || x.text[first] == '\t') {
			first++
		}
		if first < stop {
			x.keep(source.Span{From: first, To: stop})
		}
		at = max(skipLineEnd(x.text, stop), at+1)
	}
	x.at = to
}

// keep notes one line of comment. Bytes that are no UTF-8, such as those of
// older encodings, are replaced.
func (x *lexer) keep(span source.Span) {
	if span.To > span.From && x.text[span.To-1] == '\r' {
		span.To--
	}
	words := strings.Trim(strings.ToValidUTF8(string(x.text[span.From:span.To]), "\ufffd"), "/*#%<! \t")
	x.comments = append(x.comments, tree.Comment{Span: span, Text: words})
}

// quotes takes a string or a character; it reports false if none begins here. A
// quote of MATLAB behind a value transposes it.
func (x *lexer) quotes() bool {
	c := x.text[x.at]
	if c == 'R' && x.lang == cFamily && x.has(`R"`) {
		return x.rawString()
	}
	if c != '"' && c != '\'' {
		return false
	}
	if c == '\'' && x.lang == matlab && x.transposes() {
		x.mark(c)
		return true
	}
	if triple := strings.Repeat(string(c), 3); x.lang == python && x.has(triple) {
		from := x.at
		for x.at += 3; x.at < len(x.text) && !x.has(triple); x.at++ {
			if x.text[x.at] == '\\' {
				x.at++
			}
		}
		x.at = min(x.at+3, len(x.text))
		x.add(token{kind: quoted, at: source.Span{From: from, To: x.at}})
		return true
	}
	from := x.at
	for x.at++; x.at < len(x.text) && x.text[x.at] != c && x.text[x.at] != '\n'; x.at++ {
		if x.text[x.at] == '\\' && x.lang != matlab {
			x.at++
		}
	}
	if x.at < len(x.text) && x.text[x.at] == c {
		x.at++
	}
	x.at = min(x.at, len(x.text))
	x.add(token{kind: quoted, at: source.Span{From: from, To: x.at}, text: strings.Trim(string(x.text[from:x.at]), string(c))})
	return true
}

func (x *lexer) transposes() bool {
	if len(x.tokens) == 0 {
		return false
	}
	last := x.tokens[len(x.tokens)-1]
	return last.at.To == x.at && (last.kind == name || last.kind == number || last.is(")") || last.is("]") || last.is("}") || last.is("'") || last.is("."))
}

// rawString takes R"mark(...)mark" of C++.
func (x *lexer) rawString() bool {
	head := bytes.IndexByte(x.text[x.at:min(len(x.text), x.at+20)], '(')
	if head < 0 {
		return false
	}
	close := []byte(")" + string(x.text[x.at+2:x.at+head]) + `"`)
	from := x.at
	x.at = len(x.text)
	if i := bytes.Index(x.text[from+head:], close); i >= 0 {
		x.at = from + head + i + len(close)
	}
	x.add(token{kind: quoted, at: source.Span{From: from, To: x.at}})
	return true
}

// suffixes are those of C that leave a decimal number what it is.
const suffixes = " f F l L d D f32 f64 "

// number takes a number. What is no decimal number (0x1F, 1'000, 3px) becomes a
// mark, which no value is made of.
func (x *lexer) number() {
	from := x.at
	x.digits()
	if x.at < len(x.text) && x.text[x.at] == '.' {
		x.at++
		x.digits()
	}
	if back := x.at; x.at < len(x.text) && x.text[x.at]|0x20 == 'e' {
		x.at++
		if x.at < len(x.text) && (x.text[x.at] == '+' || x.text[x.at] == '-') {
			x.at++
		}
		digits := x.at
		if x.digits(); x.at == digits {
			x.at = back
		}
	}
	to := x.at
	for x.at < len(x.text) && (isLetter(x.text[x.at]) || isDigit(x.text[x.at]) || x.lang == cFamily && x.text[x.at] == '\'') {
		x.at++
	}
	suffix := string(x.text[to:x.at])
	if suffix != "" && (x.lang != cFamily || !strings.Contains(suffixes, " "+suffix+" ")) {
		x.add(token{kind: mark, at: source.Span{From: from, To: x.at}, text: "?"})
		return
	}
	x.add(token{kind: number, at: source.Span{From: from, To: to}})
}

func (x *lexer) digits() {
	for x.at < len(x.text) && isDigit(x.text[x.at]) {
		x.at++
	}
}

// valueOf begins the text of a directive whose value follows as tokens.
const valueOf = "value of "

// directive takes a line that begins with #, with the lines that continue it. Of
// #define NAME the rest is cut into tokens.
func (x *lexer) directive() {
	from := x.at
	to := lineEnd(x.text, from)
	for to < len(x.text) && bytes.HasSuffix(bytes.TrimRight(x.text[from:to], "\r"), []byte(`\`)) {
		to = lineEnd(x.text, to+1)
	}
	line := string(x.text[from:to])
	if at := commentIn(line); at >= 0 {
		to, line = from+at, line[:at]
	}
	words := strings.Fields(strings.TrimPrefix(line, "#"))
	if len(words) < 3 || words[0] != "define" {
		x.at = to
		x.add(token{kind: directive, at: source.Span{From: from, To: to}, text: strings.Join(words, " ")})
		return
	}
	x.at = from + strings.Index(line, "define") + len("define")
	x.at += bytes.Index(x.text[x.at:to], []byte(words[1])) + len(words[1])
	x.add(token{kind: directive, at: source.Span{From: x.at - len(words[1]), To: x.at}, text: valueOf + words[1]})
	depth := x.depth
	for x.inside = true; x.at < to; {
		x.next()
	}
	x.depth, x.inside = depth, false
	x.add(token{kind: newline, at: source.Span{From: x.at, To: x.at}})
}

// commentIn is where a comment begins in a line, -1 for nowhere.
func commentIn(line string) int {
	a, b := strings.Index(line, "//"), strings.Index(line, "/*")
	if a < 0 || b >= 0 && b < a {
		return b
	}
	return a
}

func isDigit(c byte) bool { return c >= '0' && c <= '9' }

func isLetter(c byte) bool { return c|0x20 >= 'a' && c|0x20 <= 'z' || c == '_' || c >= 0x80 }

// lineEnd is the offset of the LF that ends a line, or of the end of the text.
func lineEnd(text []byte, at int) int {
	if at >= len(text) {
		return len(text)
	}
	if i := bytes.IndexByte(text[at:], '\n'); i >= 0 {
		return at + i
	}
	return len(text)
}

// skipLineEnd passes over CR and LF.
func skipLineEnd(text []byte, at int) int {
	if at < len(text) && text[at] == '\r' {
		at++
	}
	if at < len(text) && text[at] == '\n' {
		at++
	}
	return min(at, len(text))
}
