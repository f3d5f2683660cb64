package rules

import (
	"math"
	"regexp"
	"strings"

	"dextral/core/convention"
	"dextral/core/matrix"
	"dextral/core/rotor"
	"dextral/core/tolerance"
)

// precision is what the digits of the value, or a declaration, say about its
// rounding.
func (v *Value) precision() tolerance.Precision {
	p := precisionOf(v.rotationNumbers())
	if scale := v.quantum(); scale > 0 {
		p = tolerance.Quantised(scale)
	}
	p.Double, p.Declared = v.Double, v.Uncertainty
	return p
}

// precisionOf is what the digits of a group of numbers say.
func precisionOf(group []Number) tolerance.Precision {
	numbers := make([]tolerance.Number, 0, len(group))
	for _, n := range group {
		if read, ok := tolerance.Read(n.Text); ok {
			numbers = append(numbers, read)
		} else if half := halfOfExpression(n); half > 0 {
			numbers = append(numbers, tolerance.Number{Value: n.Value, Half: half, Padded: true})
		}
	}
	return tolerance.Of(numbers...)
}

// decimals are the numbers with digits behind the point in an expression.
var decimals = regexp.MustCompile(`\d*\.\d+(?:[eE][+-]?\d+)?`)

// halfOfExpression is how far the digits of the decimals in an expression, such as
// 30.5*M_PI/180, leave its value open: each in proportion, as in a product, and by
// itself, where it may be a term of a sum.
func halfOfExpression(n Number) float64 {
	half := 0.0
	sum := strings.ContainsAny(strings.TrimLeft(n.Text, "+-${ ("), "+-")
	for _, text := range decimals.FindAllString(n.Text, -1) {
		read, ok := tolerance.Read(text)
		if !ok || read.Integer() || read.Value == 0.5 || read.Value == 0.25 { // a half is one
			continue
		}
		half = max(half, math.Abs(n.Value*read.Half/read.Value))
		if sum {
			half = max(half, read.Half)
		}
	}
	return half
}

// tolerance is how far, in radians, the orientation may be from the one that
// was meant.
func (v *Value) tolerance() float64 { return v.toleranceOf(v.precision()) }

func (v *Value) toleranceOf(p tolerance.Precision) float64 {
	switch v.Form {
	case convention.Quaternion:
		return p.Quaternion()
	case convention.Angles:
		return p.Angles(v.Claims.Unit())
	case convention.RotationVector:
		return p.RotationVector(v.Claims.Unit())
	case convention.AxisAngle:
		return p.AxisAngle(v.Claims.Unit())
	default:
		return p.Matrix()
	}
}

// rotationNumbers are the numbers of the rotation alone: of a rigid transform
// the 3x3, since translations have digits of their own.
func (v *Value) rotationNumbers() []Number {
	if v.Form != convention.Transform {
		return v.Numbers
	}
	part := make([]Number, 0, 9)
	for i := range 3 {
		for j := range 3 {
			if at := v.entry(i, j); at < len(v.Numbers) {
				part = append(part, v.Numbers[at])
			}
		}
	}
	return part
}

// entry is the index in Numbers of row i, column j of a matrix.
func (v *Value) entry(i, j int) int {
	if v.Claims.Storage() == convention.ColumnMajor {
		return j*v.Rows + i
	}
	return i*v.Cols + j
}

// rotationPart is the 3x3 of a matrix, rigid transform, triad (axes as columns)
// or axis map. It is false for other forms and for incomplete ones.
func (v *Value) rotationPart() (matrix.Mat3, bool) {
	x := v.Floats()
	switch v.Form {
	case convention.Triad:
		if len(x) != 9 {
			return matrix.Mat3{}, false
		}
		return matrix.FromColumns(rotor.Vec{X: x[0], Y: x[1], Z: x[2]}, rotor.Vec{X: x[3], Y: x[4], Z: x[5]}, rotor.Vec{X: x[6], Y: x[7], Z: x[8]}), true
	case convention.Rotation, convention.AxisMap, convention.Transform:
		if v.Rows < 3 || v.Cols < 3 || len(x) != v.Rows*v.Cols {
			return matrix.Mat3{}, false
		}
		var m matrix.Mat3
		for i := range 3 {
			for j := range 3 {
				m[i][j] = x[v.entry(i, j)]
			}
		}
		return m, true
	}
	return matrix.Mat3{}, false
}
