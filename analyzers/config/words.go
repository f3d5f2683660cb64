package config

import (
	"strings"

	"dextral/analyzers/claims"
	"dextral/analyzers/config/tree"
	"dextral/core/convention"
	"dextral/core/frame"
	"dextral/rules"
)

// words reads axes in words (forward, left, up) and maps between axes (+y, +x,
// -z). Each number of the value stands where the word is that it comes from. It
// reports whether the node is one of these.
func (w *walker) words(s *spot) bool {
	if !mayBeWords(s.node) {
		return false
	}
	name := w.nameOf(s)
	if !name.SpeaksOfAxes() && !name.SpeaksOfAxisMap(true) || w.otherwise(s) {
		return false
	}
	words := w.texts(s.node)
	if len(words) == 0 || len(words) > 12 {
		return false
	}
	if m, signed, ok := claims.AxisMap(spelled(words)); ok && name.SpeaksOfAxisMap(signed) {
		v := &rules.Value{Rows: 3, Cols: 3}
		for row, word := range words {
			v.Numbers = append(v.Numbers, w.inWord(word, m[row])...)
		}
		w.describe(s, read(convention.AxisMap, rules.Name), v)
		return true
	}
	triad, ok := w.triadIn(s.node, words)
	if !ok || !name.SpeaksOfAxes() {
		return false
	}
	m := triad.Matrix()
	v := &rules.Value{Rows: 3, Cols: 3}
	for axis := range 3 {
		word := tree.Word{Text: w.doc.File.Slice(s.node.Raw), Span: s.node.Raw}
		if s.node.Kind == tree.List {
			word = words[axis]
		}
		v.Numbers = append(v.Numbers, w.inWord(word, [3]float64{m[0][axis], m[1][axis], m[2][axis]})...)
	}
	if triad.Hand != convention.HandUnstated {
		v.Claims = append(v.Claims, rules.Claim{Says: triad.Hand, Source: rules.Label, Text: s.node.Text, Place: w.doc.File.Place(s.node.Span)})
	}
	w.describe(s, read(convention.Triad, rules.Label), v)
	return true
}

// mayBeWords reports whether a node may be axes in words, without a look at them.
func mayBeWords(n *tree.Node) bool {
	if n.Kind == tree.List {
		return len(n.Items) == 3
	}
	const longest = 120 // "x to the right wing, y ..." is half as long
	if n.Kind != tree.Scalar || len(n.Text) < len("FLU") || len(n.Text) > longest {
		return false
	}
	first := strings.TrimLeft(n.Text[:2], "+- ")
	return first != "" && (first[0]|0x20 >= 'a' && first[0]|0x20 <= 'z')
}

// texts are the words of a scalar or of a list of scalars, without brackets
// that are part of a text.
func (w *walker) texts(n *tree.Node) []tree.Word {
	if n.Kind == tree.Scalar {
		return w.doc.Words(n)
	}
	var words []tree.Word
	for _, item := range n.Items {
		if item.Kind != tree.Scalar || item.Raw.Empty() {
			return nil
		}
		words = append(words, tree.Word{Text: item.Text, Span: item.Raw})
	}
	return words
}

// triadIn reads directions of axes: of a text as it stands, of a list item by
// item.
func (w *walker) triadIn(n *tree.Node, words []tree.Word) (frame.Triad, bool) {
	if n.Kind == tree.Scalar {
		return claims.AxisWords(n.Text)
	}
	if len(words) != 3 {
		return frame.Triad{}, false
	}
	return claims.AxisWords("x " + words[0].Text + ", y " + words[1].Text + ", z " + words[2].Text)
}

func spelled(words []tree.Word) []string {
	texts := make([]string, len(words))
	for i, word := range words {
		texts[i] = word.Text
	}
	return texts
}

// inWord makes three numbers that stand where a word is.
func (w *walker) inWord(word tree.Word, x [3]float64) []rules.Number {
	place := w.doc.File.Place(word.Span)
	numbers := make([]rules.Number, 3)
	for i := range numbers {
		numbers[i] = rules.Number{Text: w.doc.File.Slice(word.Span), Value: x[i], Place: place}
	}
	return numbers
}
