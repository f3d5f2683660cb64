package source

import (
	"bytes"
	"fmt"
	"unicode/utf8"

	"dextral/rules"
)

// Error is a fault of a file: where it is, what is wrong and what to do.
type Error struct {
	Place   rules.Place
	Problem string // what is wrong
	Remedy  string // what to do about it
	Err     error  // the parser's own error; may be nil
}

func (e *Error) Error() string {
	return fmt.Sprintf("%s: %s; %s", e.Place, e.Problem, e.Remedy)
}

// Unwrap is the parser's own error.
func (e *Error) Unwrap() error { return e.Err }

// ErrorAt makes an error about a span of the file.
func (f *File) ErrorAt(s Span, problem, remedy string) *Error {
	return &Error{Place: f.Place(s), Problem: problem, Remedy: remedy}
}

// MaxBytes is the size of the largest file that is read into memory whole. Data
// sets of that size are logs, which other readers stream.
const MaxBytes = 100 << 20

// CheckSize returns an error if a file is too large to be read whole.
func CheckSize(path string, bytes int64) error {
	if bytes <= MaxBytes {
		return nil
	}
	return &Error{
		Place:   rules.Place{Path: path},
		Problem: fmt.Sprintf("%d bytes are more than the %d MB that are read of one configuration file", bytes, MaxBytes>>20),
		Remedy:  "split it, or exclude it from the audit",
	}
}

// CheckText returns an error unless the text is UTF-8 without NUL bytes and no
// longer than MaxBytes. A byte order mark is allowed.
func (f *File) CheckText() error {
	if err := CheckSize(f.Path, int64(len(f.Text))); err != nil {
		return err
	}
	for _, mark := range []string{"\xff\xfe", "\xfe\xff"} {
		if bytes.HasPrefix(f.Text, []byte(mark)) {
			return f.ErrorAt(Span{0, 2}, "this is UTF-16", "save it as UTF-8")
		}
	}
	if i := bytes.IndexByte(f.Text, 0); i >= 0 {
		return f.ErrorAt(Span{i, i + 1}, "this is not text: it holds a NUL byte",
			"give a binary file another name, or exclude it from the audit")
	}
	if utf8.Valid(f.Text) {
		return nil
	}
	i := 0
	for {
		r, n := utf8.DecodeRune(f.Text[i:])
		if r == utf8.RuneError && n <= 1 {
			break
		}
		i += n
	}
	return f.ErrorAt(Span{i, i + 1}, fmt.Sprintf("byte 0x%02X is not UTF-8", f.Text[i]),
		"save the file as UTF-8, or exclude it from the audit if it is not text")
}
