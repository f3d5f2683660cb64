package named

import (
	"strings"
	"unicode"
)

// Words cuts a name into words in lower case: where case changes, between
// letters and digits, and at underscores.
func Words(name string) []string {
	var words []string
	start := -1
	runes := []rune(name)
	flush := func(end int) {
		if start >= 0 && end > start {
			words = append(words, strings.ToLower(string(runes[start:end])))
		}
		start = -1
	}
	for i, r := range runes {
		switch {
		case !unicode.IsLetter(r) && !unicode.IsDigit(r):
			flush(i)
			continue
		case start >= 0 && cut(runes, i):
			flush(i)
		}
		if start < 0 {
			start = i
		}
	}
	flush(len(runes))
	return words
}

// cut reports whether a word begins at i within letters and digits.
func cut(r []rune, i int) bool {
	before, here := r[i-1], r[i]
	switch {
	case unicode.IsUpper(here) && !unicode.IsUpper(before):
		return true
	case unicode.IsUpper(here) && i+1 < len(r) && unicode.IsLower(r[i+1]):
		return true
	}
	return unicode.IsLetter(here) && unicode.IsDigit(before) && unicode.IsUpper(here)
}

// firstSentence is the beginning of a comment up to the first full stop.
func firstSentence(comment string) string {
	text := strings.Join(strings.Fields(comment), " ")
	if i := strings.Index(text, ". "); i >= 0 {
		return text[:i]
	}
	return text
}
