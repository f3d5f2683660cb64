package literal

import (
	"go/ast"
	"go/types"

	"dextral/core/convention"
	"dextral/rules"
)

// matrix reads nine, twelve or sixteen numbers, nested or flat.
func (w *walker) matrix(s site, lit *ast.CompositeLit) bool {
	b, ok := w.read(lit)
	if !ok {
		return false
	}
	rows, cols, ok := matrixShape(b.dims)
	if !ok || (len(b.dims) == 1 || rows > 3) && !w.isFloats(lit) {
		return false // whole numbers are a matrix only if they are written as one
	}
	said := w.speech(w.withType(s, lit))
	v := said.ofMatrix(rows, cols, b.numbers)
	flat := len(b.dims) == 1
	if v.form == convention.NoForm || flat && said.plural() {
		return true
	}
	if s.loose {
		w.skip(lit, s, true)
		return true
	}
	w.keep(s, said, lit, v, &rules.Value{Form: v.form, Numbers: b.numbers, Rows: rows, Cols: cols})
	return true
}

// isFloats reports a list of floats, or of lists of floats.
func (w *walker) isFloats(lit *ast.CompositeLit) bool {
	t := w.typeOf(lit)
	for {
		switch list := t.(type) {
		case *types.Array:
			t = list.Elem().Underlying()
		case *types.Slice:
			t = list.Elem().Underlying()
		default:
			return t != nil && (isFloat(t) || isVectorType(t))
		}
	}
}

func isVectorType(t types.Type) bool {
	s, ok := t.(*types.Struct)
	return ok && isVector(s)
}

// matrixShape accepts what holds a rotation: 3x3, 3x4, 4x4, and these flat.
func matrixShape(dims []int) (rows, cols int, ok bool) {
	switch {
	case len(dims) == 2 && (dims[0] == 3 && (dims[1] == 3 || dims[1] == 4) || dims[0] == 4 && dims[1] == 4):
		return dims[0], dims[1], true
	case len(dims) == 1 && dims[0] == 9:
		return 3, 3, true
	case len(dims) == 1 && dims[0] == 12:
		return 3, 4, true
	case len(dims) == 1 && dims[0] == 16:
		return 4, 4, true
	}
	return 0, 0, false
}
