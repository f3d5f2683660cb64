// Package edit writes the edits that findings carry into their files.
//
// A plan holds, for each file, the text that was audited and the text to come.
// Numbers are replaced where they stand and nothing else is touched, so that
// comments, layout, line ends and the digits of other numbers stay. The plan is
// shown as a unified diff or written; a file that changed after it was audited is
// refused, since its findings are no longer about what it holds.
package edit

import (
	"cmp"
	"fmt"
	"os"
	"path/filepath"
	"slices"

	"dextral/analyzers/rewrite"
	"dextral/analyzers/source"
	"dextral/rules"
)

// File is a file to be changed.
type File struct {
	Path     string // as printed
	Old, New []byte
	Findings []*rules.Finding // whose edits New holds
}

// Refused is an edit, or a file of edits, that is not made.
type Refused struct {
	Place rules.Place
	Why   error
}

// Plan works out the edits of the findings that are not waived. Sums are those of
// the texts that were audited, by printed path. Files come in the order of their
// paths. Of two edits of one number the first is planned; the other one was made
// for numbers that are no longer there.
func Plan(findings []*rules.Finding, sums map[string]rewrite.Sum) (files []*File, refused []Refused) {
	byPath := map[string][]*rules.Finding{}
	var paths []string
	for _, f := range findings {
		if f.Edit == nil || f.Waiver != nil {
			continue
		}
		if byPath[f.Place.Path] == nil {
			paths = append(paths, f.Place.Path)
		}
		byPath[f.Place.Path] = append(byPath[f.Place.Path], f)
	}
	slices.Sort(paths)
	for _, p := range paths {
		text, err := os.ReadFile(filepath.FromSlash(p))
		if err == nil && rewrite.SumOf(text) != sums[p] {
			err = rewrite.ErrChanged
		}
		if err != nil {
			refused = append(refused, Refused{rules.Place{Path: p}, err})
			continue
		}
		f, not := plan(p, text, byPath[p])
		refused = append(refused, not...)
		if len(f.Findings) > 0 {
			files = append(files, f)
		}
	}
	return files, refused
}

// piece is a number in the text and what comes in its place.
type piece struct {
	span source.Span
	text string
}

func plan(path string, text []byte, findings []*rules.Finding) (*File, []Refused) {
	f := &File{Path: path, Old: text}
	indexed := source.New(path, text)
	var all []piece
	var refused []Refused
	for _, finding := range findings {
		pieces, err := locate(indexed, finding.Edit, all)
		if err != nil {
			refused = append(refused, Refused{finding.Place, err})
			continue
		}
		all = append(all, pieces...)
		f.Findings = append(f.Findings, finding)
	}
	slices.SortFunc(all, func(a, b piece) int { return cmp.Compare(a.span.From, b.span.From) })
	at := 0
	for _, p := range all {
		f.New = append(append(f.New, text[at:p.span.From]...), p.text...)
		at = p.span.To
	}
	f.New = append(f.New, text[at:]...)
	return f, refused
}

// locate finds the numbers of an edit in the text. All of them must stand there
// as the finding has them, and none may have been taken.
func locate(f *source.File, e *rules.Edit, taken []piece) ([]piece, error) {
	var pieces []piece
	for _, r := range e.Replacements {
		from, ok := f.Offset(r.Place.Line, r.Place.Column)
		span := source.Span{From: from, To: from + len(r.Old)}
		if !ok || span.To > len(f.Text) || f.Slice(span) != r.Old {
			return nil, fmt.Errorf("the number %s does not stand at %s; it is left as it is", r.Old, r.Place)
		}
		if slices.Contains(taken, piece{span, r.New}) {
			continue // two names of one value, as YAML's anchors make them
		}
		overlaps := func(p piece) bool { return p.span.From < span.To && span.From < p.span.To }
		if slices.ContainsFunc(taken, overlaps) || slices.ContainsFunc(pieces, overlaps) {
			return nil, fmt.Errorf("the number %s at %s is changed for another finding; run the command again for this one", r.Old, r.Place)
		}
		pieces = append(pieces, piece{span, r.New})
	}
	return pieces, nil
}

// Write writes the new text, unless the file no longer holds the old one.
func (f *File) Write() error {
	return rewrite.Replace(filepath.FromSlash(f.Path), rewrite.SumOf(f.Old), f.New)
}
