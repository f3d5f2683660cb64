package policy

import (
	"slices"
	"strings"
	"unicode/utf8"

	"dextral/rules"
)

// Error is one thing in the file that cannot be right.
type Error struct {
	Place   rules.Place
	Message string // what is wrong and what is allowed
}

// Error prints path:line:col: message.
func (e *Error) Error() string { return e.Place.String() + ": " + e.Message }

// Errors is everything wrong with one file, in the order of the text. Its
// elements are found by errors.As too.
type Errors []*Error

// Error prints one error a line.
func (es Errors) Error() string {
	lines := make([]string, len(es))
	for i, e := range es {
		lines[i] = e.Error()
	}
	return strings.Join(lines, "\n")
}

// Unwrap gives the single errors to package errors.
func (es Errors) Unwrap() []error {
	all := make([]error, len(es))
	for i, e := range es {
		all[i] = e
	}
	return all
}

func (es Errors) sort() {
	slices.SortStableFunc(es, func(a, b *Error) int { return a.Place.Compare(b.Place) })
}

// lines turns byte offsets of a text into lines and columns.
type lines struct {
	path   string
	text   string
	starts []int // offset of each line
}

func newLines(path, text string) *lines {
	l := &lines{path: path, text: text, starts: []int{0}}
	for i := range len(text) {
		if text[i] == '\n' {
			l.starts = append(l.starts, i+1)
		}
	}
	return l
}

// at is the place of a span; for the zero span the whole file.
func (l *lines) at(s span) rules.Place {
	p := rules.Place{Path: l.path}
	if s == (span{}) {
		return p
	}
	p.Line, p.Column = l.position(s.start)
	p.EndLine, p.EndColumn = l.position(s.end)
	return p
}

func (l *lines) position(offset int) (line, column int) {
	offset = max(0, min(offset, len(l.text)))
	i, found := slices.BinarySearch(l.starts, offset)
	if !found {
		i--
	}
	return i + 1, utf8.RuneCountInString(l.text[l.starts[i]:offset]) + 1
}

// source is the text of a span.
func (l *lines) source(s span) string { return l.text[s.start:s.end] }

// nearest returns the candidate that word was most likely meant to be, or "".
//
// A candidate is near if at most a third of the longer word's letters must be
// changed, dropped, added or exchanged with their neighbour, or if one is the
// start of the other. The third is a choice: it forgives one slip in "rule" and
// two in "because".
func nearest(word string, candidates []string) string {
	best, bestSlips := "", 0
	word = strings.ToLower(word)
	for _, c := range candidates {
		n := slips(word, c)
		if len(word) >= 3 && len(c) >= 3 && (strings.HasPrefix(c, word) || strings.HasPrefix(word, c)) {
			n = min(n, 1)
		}
		if n <= max(len(word), len(c))/3 && (best == "" || n < bestSlips) {
			best, bestSlips = c, n
		}
	}
	return best
}

// slips counts the letters to change, drop, add or exchange with their
// neighbour to turn a into b (optimal string alignment distance).
func slips(a, b string) int {
	var before, last []int
	row := make([]int, len(b)+1)
	for j := range row {
		row[j] = j
	}
	for i := 1; i <= len(a); i++ {
		before, last, row = last, row, make([]int, len(b)+1)
		row[0] = i
		for j := 1; j <= len(b); j++ {
			change := 1
			if a[i-1] == b[j-1] {
				change = 0
			}
			row[j] = min(last[j]+1, row[j-1]+1, last[j-1]+change)
			if i > 1 && j > 1 && a[i-1] == b[j-2] && a[i-2] == b[j-1] {
				row[j] = min(row[j], before[j-2]+1)
			}
		}
	}
	return row[len(b)]
}
