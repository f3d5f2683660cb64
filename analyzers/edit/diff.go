package edit

import (
	"bytes"
	"fmt"
	"io"
)

// context is the number of lines shown around a change, as is customary.
const context = 3

// Diff writes the change as a unified diff, which patch -p1 and git apply take.
// Edits replace numbers within their lines, so that old and new lines go by
// pairs.
func (f *File) Diff(w io.Writer) error {
	old, now := bytes.SplitAfter(f.Old, []byte("\n")), bytes.SplitAfter(f.New, []byte("\n"))
	if len(old[len(old)-1]) == 0 {
		old, now = old[:len(old)-1], now[:len(now)-1]
	}
	var b bytes.Buffer
	fmt.Fprintf(&b, "--- a/%s\n+++ b/%s\n", f.Path, f.Path)
	for first := 0; first < len(old); {
		if bytes.Equal(old[first], now[first]) {
			first++
			continue
		}
		last := first // of a run of changes with no more than 2 * context lines between them
		for i := first; i < len(old) && i <= last+2*context+1; i++ {
			if !bytes.Equal(old[i], now[i]) {
				last = i
			}
		}
		hunk(&b, old, now, max(0, first-context), min(len(old), last+1+context))
		first = last + 1
	}
	_, err := w.Write(b.Bytes())
	return err
}

// hunk writes the lines from one up to another.
func hunk(b *bytes.Buffer, old, now [][]byte, from, to int) {
	fmt.Fprintf(b, "@@ -%d,%d +%d,%d @@\n", from+1, to-from, from+1, to-from)
	for i := from; i < to; {
		if bytes.Equal(old[i], now[i]) {
			line(b, ' ', old[i])
			i++
			continue
		}
		end := i
		for end < to && !bytes.Equal(old[end], now[end]) {
			end++
		}
		for _, l := range old[i:end] {
			line(b, '-', l)
		}
		for _, l := range now[i:end] {
			line(b, '+', l)
		}
		i = end
	}
}

func line(b *bytes.Buffer, mark byte, text []byte) {
	b.WriteByte(mark)
	b.Write(text)
	if !bytes.HasSuffix(text, []byte("\n")) {
		b.WriteString("\n\\ No newline at end of file\n")
	}
}
