package literal

import (
	"go/ast"
	"go/constant"
	"go/token"
	"go/types"
	"math"
	"slices"
	"strconv"

	"dextral/core/tolerance"
	"dextral/rules"
)

// number is the value of a constant expression. Beyond what go/types folds,
// calls such as math.Sqrt(0.5) and math.Cos(math.Pi / 8) with constant
// arguments are constant too: their results are the same on every run.
func (w *walker) number(e ast.Expr) (rules.Number, bool) {
	x, ok := w.fold(e)
	if !ok {
		return rules.Number{}, false
	}
	return rules.Number{Text: w.text(e, x), Value: x, Place: w.place(e.Pos(), e.End())}, true
}

// fold evaluates a constant expression.
func (w *walker) fold(e ast.Expr) (float64, bool) {
	if tv, ok := w.pass.TypesInfo.Types[e]; ok && tv.Value != nil {
		if kind := tv.Value.Kind(); kind != constant.Int && kind != constant.Float {
			return 0, false
		}
		x, _ := constant.Float64Val(tv.Value)
		return x, true
	}
	switch e := e.(type) {
	case *ast.ParenExpr:
		return w.fold(e.X)
	case *ast.UnaryExpr:
		x, ok := w.fold(e.X)
		if e.Op == token.SUB {
			x = -x
		}
		return x, ok && (e.Op == token.SUB || e.Op == token.ADD)
	case *ast.BinaryExpr:
		x, okX := w.fold(e.X)
		y, okY := w.fold(e.Y)
		z, ok := operate(e.Op, x, y)
		return z, okX && okY && ok
	case *ast.CallExpr:
		return w.foldCall(e)
	}
	return 0, false
}

func operate(op token.Token, x, y float64) (float64, bool) {
	switch op {
	case token.ADD:
		return x + y, true
	case token.SUB:
		return x - y, true
	case token.MUL:
		return x * y, true
	case token.QUO:
		return x / y, true
	}
	return 0, false
}

// elementary are the functions of package math that fold evaluates.
var elementary = map[string]func(float64) float64{
	"Sqrt": math.Sqrt, "Sin": math.Sin, "Cos": math.Cos, "Tan": math.Tan,
	"Asin": math.Asin, "Acos": math.Acos, "Atan": math.Atan,
}

// foldCall evaluates a conversion to a number type or a call of an elementary
// function.
func (w *walker) foldCall(e *ast.CallExpr) (float64, bool) {
	if len(e.Args) != 1 {
		return 0, false
	}
	x, ok := w.fold(e.Args[0])
	if !ok {
		return 0, false
	}
	if tv := w.pass.TypesInfo.Types[e.Fun]; tv.IsType() {
		return x, isFloat(tv.Type)
	}
	selector, ok := e.Fun.(*ast.SelectorExpr)
	if !ok {
		return 0, false
	}
	f, ok := w.pass.TypesInfo.Uses[selector.Sel].(*types.Func)
	if !ok || f.Pkg() == nil || f.Pkg().Path() != "math" {
		return 0, false
	}
	compute := elementary[f.Name()]
	if compute == nil {
		return 0, false
	}
	return compute(x), true
}

func isFloat(t types.Type) bool {
	basic, ok := t.Underlying().(*types.Basic)
	return ok && basic.Info()&types.IsFloat != 0
}

// text is a number as it is written, where it is a number that is written:
// parentheses and conversions around it are dropped. The digits of an expression
// are those of the coarsest number in it, so that 2*0.35355 counts as known to
// five digits and math.Sqrt2/2 as exact.
func (w *walker) text(e ast.Expr, x float64) string {
	if sign, lit := w.written(e); lit != nil {
		return sign + lit.Value
	}
	shortest := strconv.FormatFloat(x, 'g', -1, 64)
	if digits := coarsest(e); digits > 0 {
		if coarse := strconv.FormatFloat(x, 'g', digits, 64); len(coarse) < len(shortest) {
			return coarse
		}
	}
	return shortest
}

// coarsest is the number of digits of the coarsest number in an expression; 0
// if all are exact. Factors such as 0.5 and 0.25 are, and so are arguments of
// functions: nobody rounds before taking a root or a cosine.
func coarsest(e ast.Expr) int {
	const fewest = 3
	digits := 0
	ast.Inspect(e, func(n ast.Node) bool {
		switch n := n.(type) {
		case *ast.CallExpr:
			return false
		case *ast.BasicLit:
			read, ok := tolerance.Read(n.Value)
			if ok && !read.Integer() && read.Significant >= fewest && (digits == 0 || read.Significant < digits) {
				digits = read.Significant
			}
		}
		return true
	})
	return digits
}

// written finds the literal under signs, parentheses and conversions.
func (w *walker) written(e ast.Expr) (sign string, lit *ast.BasicLit) {
	switch e := e.(type) {
	case *ast.BasicLit:
		return "", e
	case *ast.ParenExpr:
		return w.written(e.X)
	case *ast.UnaryExpr:
		sign, lit = w.written(e.X)
		if e.Op == token.SUB && sign == "" {
			return "-", lit
		}
		return "", lit
	case *ast.CallExpr:
		if len(e.Args) == 1 && w.pass.TypesInfo.Types[e.Fun].IsType() {
			return w.written(e.Args[0])
		}
	}
	return "", nil
}

// block is a nest of numbers: a scalar (no dims), a list, a list of lists.
type block struct {
	dims    []int
	numbers []rules.Number
}

// read flattens an expression made of numbers and of lists of equal shape:
// arrays, slices, and structs whose fields are x, y and z.
func (w *walker) read(e ast.Expr) (block, bool) {
	lit, ok := ast.Unparen(e).(*ast.CompositeLit)
	if !ok {
		n, ok := w.number(e)
		return block{numbers: []rules.Number{n}}, ok
	}
	entries, ok := w.entries(lit)
	if !ok || len(entries) == 0 || len(entries) > 16 {
		return block{}, false
	}
	parts := make([]block, len(entries))
	var shape *block
	for i, entry := range entries {
		if entry == nil {
			continue
		}
		if parts[i], ok = w.read(entry); !ok || shape != nil && !slices.Equal(shape.dims, parts[i].dims) {
			return block{}, false
		}
		shape = &parts[i]
	}
	if shape == nil || len(shape.dims) > 1 {
		return block{}, false
	}
	all := block{dims: append([]int{len(entries)}, shape.dims...)}
	for i, entry := range entries {
		if entry == nil { // left out: zeros
			parts[i].numbers = slices.Repeat([]rules.Number{w.zero(lit)}, len(shape.numbers))
		}
		all.numbers = append(all.numbers, parts[i].numbers...)
	}
	return all, true
}

// zero is an entry that the literal leaves out: Go makes it 0.
func (w *walker) zero(lit *ast.CompositeLit) rules.Number {
	return rules.Number{Text: "0", Place: w.place(lit.Pos(), lit.End())}
}

// entries lists the elements of an array, slice or x-y-z struct literal in
// order; nil stands for an element that is left out.
func (w *walker) entries(lit *ast.CompositeLit) ([]ast.Expr, bool) {
	switch t := w.typeOf(lit).(type) {
	case *types.Array:
		return w.elements(lit, int(min(t.Len(), 17)))
	case *types.Slice:
		return w.elements(lit, -1)
	case *types.Struct:
		if !isVector(t) {
			return nil, false
		}
		return byName(fieldsOf(t, lit), "x", "y", "z"), true
	}
	return nil, false
}

// elements puts indexed elements in their places. A length below 0 is that of
// the literal. It is false where an index is not a constant or is far out.
func (w *walker) elements(lit *ast.CompositeLit, length int) ([]ast.Expr, bool) {
	var list []ast.Expr
	next := 0
	for _, e := range lit.Elts {
		if kv, ok := e.(*ast.KeyValueExpr); ok {
			x, ok := w.fold(kv.Key)
			if !ok || x < 0 || x > 16 {
				return nil, false
			}
			next, e = int(x), kv.Value
		}
		for len(list) <= next && len(list) <= 16 {
			list = append(list, nil)
		}
		if next >= len(list) {
			return nil, false
		}
		list[next] = e
		next++
	}
	for len(list) < length {
		list = append(list, nil)
	}
	return list, true
}
