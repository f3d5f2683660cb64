package gosource

import (
	"go/constant"
	"go/token"
	"go/types"
)

// mathConstants are the constants of package math that orientations use,
// digits from the package's own source.
var mathConstants = map[string]string{
	"Pi":    "3.14159265358979323846264338327950288419716939937510582097494459",
	"E":     "2.71828182845904523536028747135266249775724709369995957496696763",
	"Sqrt2": "1.41421356237309504880168872420969807856967187537694807317667974",
}

// mathFunctions are its functions of one number.
var mathFunctions = []string{"Sqrt", "Sin", "Cos", "Tan", "Asin", "Acos", "Atan"}

// shortMath is package math as far as a literal may use it. Numbers such as
// math.Pi / 2 so stay readable without the go command.
func shortMath() *types.Package {
	pkg := types.NewPackage("math", "math")
	for name, digits := range mathConstants {
		value := constant.MakeFromLiteral(digits, token.FLOAT, 0)
		pkg.Scope().Insert(types.NewConst(token.NoPos, pkg, name, types.Typ[types.UntypedFloat], value))
	}
	for _, name := range mathFunctions {
		x := types.NewTuple(types.NewParam(token.NoPos, pkg, "x", types.Typ[types.Float64]))
		y := types.NewTuple(types.NewParam(token.NoPos, pkg, "", types.Typ[types.Float64]))
		pkg.Scope().Insert(types.NewFunc(token.NoPos, pkg, name, types.NewSignatureType(nil, nil, nil, x, y, false)))
	}
	pkg.MarkComplete()
	return pkg
}
