package config

import (
	"fmt"
	"strconv"
	"strings"

	"dextral/analyzers/claims"
	"dextral/analyzers/config/tree"
	"dextral/core/convention"
	"dextral/rules"
)

// maxNumbers is the most numbers that one value has: a 4x4.
const maxNumbers = 16

// sizeOf is the shape, and the rows and columns, of so many numbers in a list.
func sizeOf(count int) (shape claims.Shape, rows, cols int, ok bool) {
	switch count {
	case 3:
		return claims.Three, 0, 0, true
	case 4:
		return claims.Four, 0, 0, true
	case 9:
		return claims.Nine, 3, 3, true
	case 12:
		return claims.Rigid, 3, 4, true
	case 16:
		return claims.Rigid, 4, 4, true
	}
	return 0, 0, 0, false
}

// numbers reads a list of numbers, or a text of several. It reports whether the
// node is one, be it an orientation or not.
func (w *walker) numbers(s *spot) bool {
	if s.node.Kind == tree.Scalar && !strings.ContainsAny(s.node.Text, " \t\n,;]") {
		return false
	}
	numbers := w.doc.Numbers(s.node, maxNumbers)
	if numbers == nil || s.node.Kind == tree.Scalar && len(numbers) == 1 {
		return false
	}
	shape, rows, cols, ok := sizeOf(len(numbers))
	if !ok {
		return true
	}
	m := w.meaning(s, shape)
	if m.Form == convention.Matrix && !w.nameOf(s).SpeaksOfMatrix() {
		return true // a list of biases has no rows and columns
	}
	if m.Form != convention.NoForm || m.Why != "" {
		v := &rules.Value{Numbers: numbers}
		if shape == claims.Nine || shape == claims.Rigid {
			v.Rows, v.Cols = rows, cols
		}
		w.describe(s, m, v)
		w.warnCommas(s)
	}
	return true
}

// warnCommas warns of a list whose numbers stand between brackets without
// commas: the format reads it as a list of one text.
func (w *walker) warnCommas(s *spot) {
	if s.node.Kind == tree.List && len(s.node.Items) == 1 {
		w.warnings = append(w.warnings, Warning{w.doc.File.Place(s.node.Span),
			fmt.Sprintf("%s has no commas between its numbers: programs read one text, not a list of numbers", s.path())})
	}
}

// rows reads a list of rows of numbers: 3x3, 3x4, 4x4, or one row or column of
// three or four.
func (w *walker) rows(s *spot) bool {
	numbers := make([]rules.Number, 0, 16)
	cols := 0
	if len(s.node.Items) == 0 || len(s.node.Items) > 4 {
		return false
	}
	for i, item := range s.node.Items {
		row := w.doc.Numbers(item, 4)
		if item.Kind != tree.List || row == nil || i > 0 && len(row) != cols {
			return false
		}
		cols = len(row)
		numbers = append(numbers, row...)
	}
	return w.matrix(s, numbers, len(s.node.Items), cols)
}

// matrix keeps numbers that stand in rows and columns. It reports whether they
// are taken; a list of quaternions is none.
func (w *walker) matrix(s *spot, numbers []rules.Number, rows, cols int) bool {
	shape, flat := shapeOf(rows, cols)
	if shape < 0 {
		return false
	}
	m := w.meaning(s, claims.Shape(shape))
	if m.Form == convention.NoForm && m.Why == "" {
		return false
	}
	v := &rules.Value{Numbers: numbers}
	if !flat {
		v.Rows, v.Cols, v.Nested = rows, cols, true
	}
	w.describe(s, m, v)
	return true
}

// shapeOf is the shape of rows and columns, -1 for one that no orientation has.
// A single row or column is flat.
func shapeOf(rows, cols int) (shape int, flat bool) {
	switch {
	case rows == 3 && cols == 3:
		return int(claims.Nine), false
	case (rows == 3 || rows == 4) && cols == 4:
		return int(claims.Rigid), false
	case (rows == 1 || cols == 1) && rows*cols == 3:
		return int(claims.Three), true
	case (rows == 1 || cols == 1) && rows*cols == 4:
		return int(claims.Four), true
	}
	return -1, false
}

// block reads {rows, cols, data}. It reports whether the map is one.
func (w *walker) block(s *spot) bool {
	data := s.node.Get("data")
	rows, okRows := w.count(s.node.Get("rows"))
	cols, okCols := w.count(s.node.Get("cols"))
	if data == nil || !okRows || !okCols {
		return false
	}
	shape, _ := shapeOf(rows, cols)
	if shape < 0 {
		return true
	}
	numbers := w.doc.Numbers(data, maxNumbers)
	if len(numbers) != rows*cols {
		if m := w.nameOf(s).Form(claims.Shape(shape)); m.Form != convention.NoForm && m.Why == "" && !w.otherwise(s) {
			w.warnings = append(w.warnings, Warning{w.doc.File.Place(data.Span),
				fmt.Sprintf("%s states %d rows and %d columns, but its data are not %d numbers; it is not read", s.path(), rows, cols, rows*cols)})
		}
		return true
	}
	taken := len(w.members)
	w.matrix(s, numbers, rows, cols)
	if len(w.members) == taken && !w.otherwise(s) && shape >= int(claims.Nine) {
		// The format says that this is a matrix, and nothing says of what kind.
		w.describe(s, open(convention.Matrix, rules.Shape, "nothing says that this matrix is a rotation"),
			&rules.Value{Numbers: numbers, Rows: rows, Cols: cols})
	}
	for _, m := range w.members[taken:] {
		m.value.Place = w.doc.File.Place(data.Span)
	}
	return true
}

// count reads a small whole number.
func (w *walker) count(n *tree.Node) (int, bool) {
	if n == nil || n.Kind != tree.Scalar {
		return 0, false
	}
	k, err := strconv.Atoi(strings.TrimSpace(n.Text))
	return k, err == nil && k > 0
}
