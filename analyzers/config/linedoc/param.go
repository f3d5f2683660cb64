package linedoc

import (
	"strings"

	"dextral/analyzers/config/tree"
	"dextral/analyzers/source"
)

// Parameters reads parameter files of autopilots: a name and a number, with a
// comma, white space or an equals sign between them; or five columns of which the
// third and fourth are name and number.
func Parameters(f *source.File) (*tree.Document, error) {
	r, err := newReader(f)
	if err != nil {
		return nil, err
	}
	r.doc.UniqueKeys = true
	r.each(func(s source.Span) {
		s = r.comment(s, "#", "//")
		words := r.words(s, " \t,=")
		if len(words) == 5 && isNumber(r.file.Slice(words[0])) && isNumber(r.file.Slice(words[1])) {
			words = words[2:4]
		}
		if len(words) == 2 && !isNumber(r.file.Slice(words[0])) && isNumber(r.file.Slice(words[1])) {
			r.entry(r.root, words[0], r.scalar(words[1]))
		}
	})
	return r.doc, nil
}

func isNumber(text string) bool {
	_, ok := tree.Float(text)
	return ok
}

// words splits a span at runs of separators.
func (r *reader) words(s source.Span, separators string) []source.Span {
	var words []source.Span
	for at := s.From; at < s.To; {
		if strings.IndexByte(separators, r.file.Text[at]) >= 0 {
			at++
			continue
		}
		from := at
		for at < s.To && strings.IndexByte(separators, r.file.Text[at]) < 0 {
			at++
		}
		words = append(words, source.Span{From: from, To: at})
	}
	return words
}

// Colon reads calibration text of the kind that KITTI made common: a key, a
// colon, and numbers in a row.
func Colon(f *source.File) (*tree.Document, error) {
	r, err := newReader(f)
	if err != nil {
		return nil, err
	}
	r.doc.UniqueKeys = true
	r.each(func(s source.Span) {
		s = r.comment(s, "#")
		if key, value, ok := r.cut(s, ":"); ok && !key.Empty() && !value.Empty() {
			r.entry(r.root, key, r.scalar(value))
		}
	})
	return r.doc, nil
}

// IsColon reports whether a text is made of such lines, with nine or twelve
// numbers on one of them at least. The last line may be cut off.
func IsColon(head []byte) bool {
	matrix := false
	lines := strings.Split(strings.TrimPrefix(string(head), source.ByteOrderMark), "\n")
	for i, line := range lines {
		line = strings.TrimSpace(line)
		if line == "" || line[0] == '#' {
			continue
		}
		key, value, ok := strings.Cut(line, ":")
		if !ok && i == len(lines)-1 && matrix {
			break
		}
		if !ok || len(strings.Fields(key)) != 1 {
			return false
		}
		numbers := 0
		for _, word := range strings.Fields(value) {
			if isNumber(word) {
				numbers++
			}
		}
		matrix = matrix || (numbers == 9 || numbers == 12) && numbers == len(strings.Fields(value))
	}
	return matrix
}
