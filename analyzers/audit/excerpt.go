package audit

import (
	"bufio"
	"bytes"
	"io"
	"os"
	"slices"
	"unicode/utf8"

	"dextral/rules"
	"dextral/rules/report"
)

// Bounds of an excerpt: what people look at, and what a hostile file may cost.
const (
	contextLines = 1       // before and after
	maxExcerpt   = 14      // lines
	maxLine      = 1 << 16 // bytes of a line; of a longer one nothing is shown
	maxScanned   = 64 << 20
)

// Excerpts reads the source lines around findings. Compressed and binary files have
// none, nor has what can no longer be read: an excerpt helps the eye and decides
// nothing.
func Excerpts(findings []*rules.Finding) map[rules.Place][]report.SourceLine {
	byPath := map[string][]rules.Place{}
	for _, f := range findings {
		if f.Place.Line > 0 && !slices.Contains(byPath[f.Place.Path], f.Place) {
			byPath[f.Place.Path] = append(byPath[f.Place.Path], f.Place)
		}
	}
	all := map[rules.Place][]report.SourceLine{}
	for path, places := range byPath {
		excerptFile(path, places, all)
	}
	return all
}

func excerptFile(path string, places []rules.Place, all map[rules.Place][]report.SourceLine) {
	if info, err := os.Stat(path); err != nil || !info.Mode().IsRegular() { // reading a pipe would wait
		return
	}
	f, err := os.Open(path)
	if err != nil {
		return
	}
	defer f.Close()
	wanted, last := map[int][]rules.Place{}, 0
	for _, p := range places {
		from, to := span(p)
		for n := from; n <= to; n++ {
			wanted[n] = append(wanted[n], p)
		}
		last = max(last, to)
	}
	lines := bufio.NewReaderSize(io.LimitReader(f, maxScanned), maxLine)
	for n := 1; n <= last; n++ {
		line, err := lines.ReadSlice('\n')
		whole := err != bufio.ErrBufferFull
		for err == bufio.ErrBufferFull {
			_, err = lines.ReadSlice('\n')
		}
		if err != nil && len(line) == 0 {
			return
		}
		line = bytes.TrimRight(line, "\r\n")
		if !whole || !utf8.Valid(line) || bytes.IndexByte(line, 0) >= 0 {
			continue
		}
		for _, p := range wanted[n] {
			all[p] = append(all[p], report.SourceLine{Number: n, Text: string(line)})
		}
		delete(wanted, n)
		if err != nil {
			return
		}
	}
}

// span is the lines of an excerpt, the first and the last.
func span(p rules.Place) (from, to int) {
	from = max(p.Line-contextLines, 1)
	return from, min(max(p.EndLine, p.Line)+contextLines, from+maxExcerpt-1)
}
