package yamldoc

import (
	"bytes"
	"regexp"
	"strconv"
	"strings"

	"dextral/analyzers/source"
)

var lineInError = regexp.MustCompile(`^yaml: (?:line (\d+): )?(.*)$`)

// parserProblems are the messages that the library's parser gives, as opposed to
// its scanner. Of these it prints the line counted from 0.
var parserProblems = []string{
	"did not find expected <", "did not find expected node content", "did not find expected '-'",
	"did not find expected key", "did not find expected ','", "found duplicate %", "found undefined tag handle",
}

// parseError gives an error of the library a place. The library names a line at
// best; the column is that of the character which the message speaks of, or of
// the first one on the line.
func parseError(f *source.File, err error) error {
	line, problem := 1, err.Error()
	if m := lineInError.FindStringSubmatch(err.Error()); m != nil {
		problem = m[2]
		if m[1] != "" {
			line, _ = strconv.Atoi(m[1]) // a number too large is clamped below
			for _, p := range parserProblems {
				if strings.HasPrefix(problem, p) {
					line++
					break
				}
			}
		}
	}
	span := f.LineSpan(min(max(line, 1), f.Lines()))
	at, remedy := suspect(f, span, problem)
	e := f.ErrorAt(source.Span{From: at, To: max(at, span.To)}, "this is not YAML: "+problem, remedy)
	e.Err = err
	return e
}

// suspect finds the character that a message speaks of, and what to do about it.
func suspect(f *source.File, line source.Span, problem string) (at int, remedy string) {
	text := f.Text[line.From:line.To]
	first := line.To - len(bytes.TrimLeft(text, " "))
	find := func(chars string) int {
		if i := bytes.IndexAny(f.Text[first:line.To], chars); i >= 0 {
			return first + i
		}
		return first
	}
	switch {
	case strings.Contains(problem, "tab character"):
		return find("\t"), "indent with spaces"
	case strings.Contains(problem, "cannot start any token"):
		at := find("\t@`%")
		if at < line.To && f.Text[at] == '\t' {
			return at, "indent with spaces"
		}
		return at, "quote the text"
	case strings.Contains(problem, "mapping values are not allowed"):
		if i := bytes.LastIndex(text, []byte(":")); i >= 0 {
			return line.From + i, "quote the text before the colon, or mend the indentation"
		}
	case strings.Contains(problem, "control characters"):
		for i, b := range f.Text {
			if b < ' ' && b != '\t' && b != '\n' && b != '\r' || b == 0x7F {
				return i, "remove the control character"
			}
		}
	case strings.Contains(problem, "unknown anchor"):
		if _, name, ok := strings.Cut(problem, "'"); ok {
			name, _, _ = strings.Cut(name, "'")
			if i := bytes.Index(f.Text, []byte("*"+name)); i >= 0 {
				return i, "define &" + name + " before it is used"
			}
		}
	case strings.Contains(problem, "',' or"):
		return first, "close the bracket that is open here"
	}
	return first, "mend the file, or exclude it from the audit"
}
