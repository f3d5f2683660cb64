// Package doc serves one text both to go doc and to the help of an analyzer.
package doc

import "strings"

// Section returns the comment above the package clause of a doc.go from its
// "# Analyzer" heading on: a summary line "name: text", then the rest. One
// text so serves both go doc and the analyzer's help.
func Section(source string) string {
	comment, _, _ := strings.Cut(source, "\npackage ")
	var lines []string
	for line := range strings.Lines(comment) {
		lines = append(lines, strings.TrimPrefix(strings.TrimPrefix(strings.TrimRight(line, "\n"), "//"), " "))
	}
	text := strings.Join(lines, "\n")
	if _, section, ok := strings.Cut(text, "# Analyzer "); ok {
		_, text, _ = strings.Cut(section, "\n")
	}
	return strings.TrimSpace(text)
}
