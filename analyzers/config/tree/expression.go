package tree

import (
	"go/ast"
	"go/parser"
	"go/token"
	"math"
	"regexp"
	"strconv"
	"strings"
)

// Expression evaluates a constant expression: numbers, + - * / and brackets, pi by
// its usual names, radians of degrees and the reverse, square roots, and names that
// are given. What C, Python, MATLAB and xacro have in common here is also Go's
// syntax, whose parser is used. It is false for everything else; a division of whole
// numbers, which languages disagree on, is among that.
func Expression(text string, names map[string]float64) (float64, bool) {
	const longest = 200
	if len(text) > longest {
		return 0, false
	}
	e, err := parser.ParseExpr(suffix.ReplaceAllString(text, "$1"))
	if err != nil {
		return 0, false
	}
	x, ok := evaluate(e, names)
	return x, ok && !math.IsNaN(x) && !math.IsInf(x, 0)
}

// suffix is what C puts behind a number for its type.
var suffix = regexp.MustCompile(`(\d\.?)[fFlL]\b`)

// pi goes by these names; a qualifier such as math., np. or std::numbers:: stands
// before some of them.
var constants = map[string]float64{"pi": math.Pi, "PI": math.Pi, "M_PI": math.Pi, "M_PI_2": math.Pi / 2, "M_PI_4": math.Pi / 4,
	"DEG2RAD": math.Pi / 180, "DEG_TO_RAD": math.Pi / 180, "M_SQRT1_2": math.Sqrt2 / 2}

var functions = map[string]func(float64) float64{
	"radians": func(x float64) float64 { return x * (math.Pi / 180) }, "deg2rad": func(x float64) float64 { return x * (math.Pi / 180) },
	"degrees": func(x float64) float64 { return x * (180 / math.Pi) }, "rad2deg": func(x float64) float64 { return x * (180 / math.Pi) },
	"sqrt": math.Sqrt, "sqrtf": math.Sqrt,
}

func evaluate(e ast.Expr, names map[string]float64) (float64, bool) {
	switch e := e.(type) {
	case *ast.BasicLit:
		if e.Kind != token.INT && e.Kind != token.FLOAT || strings.ContainsAny(e.Value, "xXbBoO_pP") {
			return 0, false
		}
		x, err := strconv.ParseFloat(e.Value, 64)
		return x, err == nil
	case *ast.ParenExpr:
		return evaluate(e.X, names)
	case *ast.UnaryExpr:
		x, ok := evaluate(e.X, names)
		if e.Op == token.SUB {
			x = -x
		}
		return x, ok && (e.Op == token.SUB || e.Op == token.ADD)
	case *ast.BinaryExpr:
		return operate(e, names)
	case *ast.Ident:
		if x, ok := names[e.Name]; ok {
			return x, true
		}
		x, ok := constants[e.Name]
		return x, ok
	case *ast.SelectorExpr:
		x, ok := constants[e.Sel.Name]
		return x, ok
	case *ast.CallExpr:
		return call(e, names)
	}
	return 0, false
}

func operate(e *ast.BinaryExpr, names map[string]float64) (float64, bool) {
	x, okX := evaluate(e.X, names)
	y, okY := evaluate(e.Y, names)
	if !okX || !okY {
		return 0, false
	}
	switch e.Op {
	case token.ADD:
		return x + y, true
	case token.SUB:
		return x - y, true
	case token.MUL:
		return x * y, true
	case token.QUO:
		return x / y, !(whole(e.X) && whole(e.Y))
	}
	return 0, false
}

// whole reports whether an expression is made of whole numbers alone.
func whole(e ast.Expr) bool {
	all := true
	ast.Inspect(e, func(n ast.Node) bool {
		switch n := n.(type) {
		case *ast.BasicLit:
			all = all && n.Kind == token.INT
		case *ast.Ident, *ast.CallExpr:
			all = false
		}
		return all
	})
	return all
}

func call(e *ast.CallExpr, names map[string]float64) (float64, bool) {
	name := ""
	switch f := e.Fun.(type) {
	case *ast.Ident:
		name = f.Name
	case *ast.SelectorExpr:
		name = f.Sel.Name
	}
	of, known := functions[name]
	if !known || len(e.Args) != 1 {
		return 0, false
	}
	x, ok := evaluate(e.Args[0], names)
	return of(x), ok
}
