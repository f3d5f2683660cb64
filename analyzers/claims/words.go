package claims

import (
	"regexp"
	"strings"
	"unicode"
)

// word is a word of a name.
type word struct {
	text string // lower case
	raw  string // as written
}

var (
	linked  = regexp.MustCompile(`^([A-Za-z]+[0-9]*)2([A-Za-z]+[0-9]*)$`)        // lidar2imu
	capsTo  = regexp.MustCompile(`^([A-Z][A-Z0-9]*)to([A-Z][A-Z0-9]*)$`)         // IMUtoGYRO, CtoI
	letters = regexp.MustCompile(`^([RTq])([bcilvwegnsmf])([bcilvwegnsmf]\d?)$`) // Tbc, Rwb0, qbn
)

// split cuts a name into words: at everything that is no letter or digit, where
// case changes, and between words of the lexicon that are written together.
func split(name string) []word {
	var words []word
	isBreak := func(r rune) bool { return !unicode.IsLetter(r) && !unicode.IsDigit(r) }
	for _, chunk := range strings.FieldsFunc(name, isBreak) {
		words = append(words, splitChunk(chunk)...)
	}
	return words
}

func splitChunk(chunk string) []word {
	lower := strings.ToLower(chunk)
	if lexicon[lower] != 0 {
		return []word{{lower, chunk}}
	}
	for i := 2; i+2 <= len(lower); i++ {
		if lexicon[lower[:i]]&compounds != 0 && lexicon[lower[i:]]&compounds != 0 {
			return []word{{lower[:i], chunk[:i]}, {lower[i:], chunk[i:]}}
		}
	}
	for _, pattern := range [...]struct {
		mark string
		*regexp.Regexp
	}{{"2", linked}, {"to", capsTo}} {
		if !strings.Contains(chunk, pattern.mark) {
			continue
		}
		if m := pattern.FindStringSubmatch(chunk); m != nil {
			return []word{{strings.ToLower(m[1]), m[1]}, {"to", "to"}, {strings.ToLower(m[2]), m[2]}}
		}
	}
	if m := findLetters(chunk); m != nil && m[2] != m[3] {
		return []word{{strings.ToLower(m[1]), m[1]}, {m[2], m[2]}, {m[3], m[3]}}
	}
	var words []word
	for _, part := range splitCase(chunk) {
		words = append(words, word{strings.ToLower(part), part})
	}
	return words
}

// findLetters matches letters, which few chunks are short enough for.
func findLetters(chunk string) []string {
	if len(chunk) > 4 {
		return nil
	}
	return letters.FindStringSubmatch(chunk)
}

// splitCase cuts where a capital follows a small letter or digit, and before the
// last of several capitals if a small letter follows: imuRPYWeight.
func splitCase(chunk string) []string {
	runes := []rune(chunk)
	var parts []string
	start := 0
	for i := 1; i < len(runes); i++ {
		up, before := unicode.IsUpper(runes[i]), unicode.IsUpper(runes[i-1])
		if up && (!before || i+1 < len(runes) && unicode.IsLower(runes[i+1])) {
			parts = append(parts, string(runes[start:i]))
			start = i
		}
	}
	return append(parts, string(runes[start:]))
}
