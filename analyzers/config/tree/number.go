package tree

import (
	"bytes"
	"errors"
	"math"
	"strconv"
	"strings"

	"dextral/analyzers/source"
	"dextral/rules"
)

// Float reads one decimal number in any spelling of the formats that are read:
// Go's and C's, a leading + or a bare dot, and the words for infinity and not a
// number of YAML, JSON dialects and C. Numbers beyond float64 are infinite, as
// they are to the programs that read them.
func Float(text string) (float64, bool) {
	unsigned := strings.TrimLeft(text, "+-")
	if len(text)-len(unsigned) > 1 || unsigned == "" {
		return 0, false
	}
	switch strings.ToLower(unsigned) {
	case ".inf", "inf", "infinity":
		if text[0] == '-' {
			return math.Inf(-1), true
		}
		return math.Inf(1), true
	case ".nan", "nan":
		return math.NaN(), true
	}
	// ParseFloat also takes hexadecimal and underscores, which mean other things
	// in most of the formats.
	if strings.Trim(unsigned, "0123456789.eE+-") != "" {
		return 0, false
	}
	x, err := strconv.ParseFloat(text, 64)
	return x, err == nil || errors.Is(err, strconv.ErrRange)
}

// Word is a word of a scalar with its place.
type Word struct {
	Text       string
	Span       source.Span
	Expression bool // see Node
}

// isSeparator reports whether a character parts the words of a scalar that
// holds several: white space, commas, semicolons and brackets, as where a format
// without lists holds "[[1, 0, 0], [0, 1, 0], [0, 0, 1]]".
func isSeparator(c byte) bool { return strings.IndexByte(" \t\n\r,;[]()", c) >= 0 }

// Words splits a scalar at white space, commas, semicolons and brackets. It returns nil
// for what is no scalar or stands nowhere verbatim.
func (d *Document) Words(n *Node) []Word { return d.appendWords(nil, n) }

func (d *Document) appendWords(words []Word, n *Node) []Word {
	if n == nil || n.Kind != Scalar || n.Raw.Empty() {
		return words
	}
	if n.Expression {
		return append(words, Word{d.File.Slice(n.Raw), n.Raw, true})
	}
	text := d.File.Text
	for at := n.Raw.From; at < n.Raw.To; {
		if isSeparator(text[at]) {
			at++
			continue
		}
		from := at
		if d.Names != nil && bytes.HasPrefix(text[at:n.Raw.To], []byte("${")) {
			if end := bytes.IndexByte(text[at:n.Raw.To], '}'); end > 0 {
				at += end
			}
		}
		for at < n.Raw.To && !isSeparator(text[at]) {
			at++
		}
		span := source.Span{From: from, To: at}
		words = append(words, Word{Text: d.File.Slice(span), Span: span})
	}
	return words
}

// fortran is how exponents of double precision are written elsewhere.
var fortran = strings.NewReplacer("D", "e", "d", "e")

// NumberIn reads a word that is a number, or an expression that has one as value.
func (d *Document) NumberIn(w Word) (rules.Number, bool) {
	x, ok := Float(w.Text)
	if !ok && d.Fortran {
		x, ok = Float(fortran.Replace(w.Text))
	}
	if !ok && (w.Expression || strings.HasPrefix(w.Text, "${") && d.Names != nil) {
		x, ok = Expression(strings.TrimSuffix(strings.TrimPrefix(w.Text, "${"), "}"), d.Names)
	}
	if !ok {
		return rules.Number{}, false
	}
	return rules.Number{Text: w.Text, Value: x, Place: d.File.Place(w.Span)}, true
}

// Number reads a scalar that is one number.
func (d *Document) Number(n *Node) (rules.Number, bool) {
	if words := d.Words(n); len(words) == 1 {
		return d.NumberIn(words[0])
	}
	return rules.Number{}, false
}

// Numbers reads a scalar of numbers, or a list whose items are such scalars,
// one after the other. It returns nil if anything else is among them, or if
// there are more than limit.
func (d *Document) Numbers(n *Node, limit int) []rules.Number {
	if n == nil {
		return nil
	}
	scalars := []*Node{n}
	if n.Kind == List {
		scalars = n.Items
	}
	if len(scalars) > limit {
		return nil
	}
	words := make([]Word, 0, max(len(scalars), 4))
	for _, s := range scalars {
		before := len(words)
		words = d.appendWords(words, s)
		if len(words) == before || len(words) > limit {
			return nil
		}
	}
	// Only now places are worked out: most lists of a file are no numbers.
	numbers := make([]rules.Number, len(words))
	for i, w := range words {
		ok := false
		if numbers[i], ok = d.NumberIn(w); !ok {
			return nil
		}
	}
	return numbers
}
