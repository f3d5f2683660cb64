package rules

import (
	"cmp"
	"fmt"
)

// Place is a stretch of a text file.
//
// Path uses slashes and is relative to the directory in which the command was
// started. Lines and columns count from 1; a column counts Unicode code points;
// the end is exclusive. Line 0 means the whole file.
type Place struct {
	Path      string `json:"path"`
	Line      int    `json:"line,omitempty"`
	Column    int    `json:"column,omitempty"`
	EndLine   int    `json:"endLine,omitempty"`
	EndColumn int    `json:"endColumn,omitempty"`
	Row       int64  `json:"row,omitempty"`  // data row of a series, from 1; 0 elsewhere
	Time      string `json:"time,omitempty"` // time stamp of that row as written
}

// String prints path:line:col, or the path alone for a whole file.
func (p Place) String() string {
	if p.Line == 0 {
		return p.Path
	}
	return fmt.Sprintf("%s:%d:%d", p.Path, p.Line, p.Column)
}

// Compare orders places by path, line, column and end.
func (p Place) Compare(q Place) int {
	return cmp.Or(cmp.Compare(p.Path, q.Path), cmp.Compare(p.Line, q.Line), cmp.Compare(p.Column, q.Column),
		cmp.Compare(p.EndLine, q.EndLine), cmp.Compare(p.EndColumn, q.EndColumn), cmp.Compare(p.Row, q.Row))
}

// To extends the place up to the end of q, which stands in the same file.
func (p Place) To(q Place) Place {
	p.EndLine, p.EndColumn = q.EndLine, q.EndColumn
	return p
}
