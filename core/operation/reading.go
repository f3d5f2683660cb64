package operation

import (
	"fmt"
	"slices"
	"strings"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/core/matrix"
)

// Op is an operation; its text is how reports call it.
type Op string

// The operations. Those of quaternions first, then conversions, vectors,
// matrices, interpolation and motion.
const (
	Copy          Op = "identity"
	Negative      Op = "negative"
	Conjugate     Op = "conjugate"
	NegConjugate  Op = "negative of the conjugate"
	Inverse       Op = "inverse"
	Normalise     Op = "unit quaternion"
	Square        Op = "square"
	Exponential   Op = "exponential"
	Logarithm     Op = "logarithm"
	Product       Op = "product"
	Quotient      Op = "quotient"
	Sum           Op = "sum"
	Difference    Op = "difference"
	Scaled        Op = "multiple"
	Dot           Op = "dot product"
	Norm          Op = "norm"
	NormSquared   Op = "square of the norm"
	TurnAngle     Op = "angle of rotation"
	AngleBetween  Op = "angle between rotations"
	ScalarPart    Op = "scalar part"
	AxisMapped    Op = "quaternion in other axes"
	RotateVector  Op = "rotated vector"
	ToMatrix      Op = "matrix of a quaternion"
	FromMatrix    Op = "quaternion of a matrix"
	AnglesOf      Op = "angles of a rotation"
	FromAngles    Op = "rotation of angles"
	AxisTurn      Op = "rotation about a coordinate axis"
	FromAxisAngle Op = "rotation of axis and angle"
	AxisAngleOf   Op = "axis and angle of a rotation"
	RotvecOf      Op = "rotation vector"
	FromRotvec    Op = "rotation of a rotation vector"
	Gibbs         Op = "Gibbs vector"
	FromGibbs     Op = "rotation of a Gibbs vector"
	MRP           Op = "modified Rodrigues parameters"
	FromMRP       Op = "rotation of modified Rodrigues parameters"
	VectorPart    Op = "vector part"
	PureOf        Op = "pure quaternion of a vector"
	TwoVectors    Op = "rotation from one vector to another"
	Slerp         Op = "spherical interpolation"
	Nlerp         Op = "normalised linear interpolation"
	Lerp          Op = "linear interpolation"
	Derivative    Op = "quaternion derivative"
	Step          Op = "integration step"
	MatrixProduct Op = "matrix product"
	Transpose     Op = "transpose"
	MatrixInverse Op = "matrix inverse"
	RigidInverse  Op = "inverse of a rigid transform"
	Determinant   Op = "determinant"
	Trace         Op = "trace"
	Cross         Op = "cross product"
	Skew          Op = "skew matrix"
	UnitVector    Op = "unit vector"
	Length        Op = "length"
	LinearMap     Op = "linear map"
)

// Formula says what an operation does with a quaternion that is not of norm one,
// or with a vector that ought to be of unit length.
type Formula uint8

// The formulas. Of a rotated vector: the sandwich divided by the square of the norm,
// the sandwich itself, and what remains when the norm is put to one beforehand.
const (
	AnyNorm Formula = iota // it makes no difference, or no known formula fits
	Normalising
	Homogeneous
	UnitOnly
)

func (f Formula) String() string {
	return [...]string{"", "for any norm", "scaling by the square of the norm", "for unit norm only"}[f]
}

// Way says which of the two ways between R and R' an interpolation takes.
type Way uint8

// The ways.
const (
	NoWay   Way = iota
	Shorter     // negates one of two whose scalar product is negative
	AsGiven     // may take the long way round
	Longer      // negates one of two whose scalar product is positive
)

func (w Way) String() string {
	return [...]string{"", "the shorter way", "the way as given", "the longer way"}[w]
}

// Reading is one operation with its conventions. Fields that say nothing of the
// operation are zero.
type Reading struct {
	Op       Op
	Orders   []Order // of the quaternions among inputs and results, in order
	Swapped  bool    // product b a, which is Shuster's a b
	Reversed [2]bool // the first, the second input is reversed; of conversions the first: the rotation is passive
	Formula  Formula
	Angles   *angle.Reading  // of angles: sequence and order of the numbers
	Negated  [3]bool         // these angles have the wrong sign
	Axis     string          // of a rotation about a coordinate axis: x, y or z
	Unit     convention.Unit // of angles
	Scale    float64         // the turn is so many times what it should be; 0 or 1: right
	Way      Way             // of interpolations
	Rates    convention.RateAxes
	Map      *matrix.Mat3 // of linear maps of vectors, and of quaternions in other axes
	Detail   string       // what else distinguishes it
}

// Rotational reports whether only rotations are treated so: a type that has such a
// function holds rotations, and no colours or planes. A conjugate is no sign of it: points
// in homogeneous coordinates are negated in the same way.
func (r Reading) Rotational() bool {
	switch r.Op {
	case Product, Quotient, RotateVector, ToMatrix, FromMatrix, AnglesOf, FromAngles, AxisTurn,
		FromAxisAngle, AxisAngleOf, FromRotvec, TwoVectors, Derivative, Step, TurnAngle, AngleBetween, RotvecOf:
		return true
	}
	return false
}

// Directed reports whether an operation with a matrix changes its direction, or the order of
// its operands, with the storage of the matrix.
func (op Op) Directed() bool {
	switch op {
	case RotateVector, ToMatrix, FromMatrix, FromAngles, AnglesOf, AxisTurn, FromAxisAngle, AxisAngleOf, FromRotvec,
		RotvecOf, TwoVectors, MatrixProduct, Skew:
		return true
	}
	return false
}

// String words the reading, without storage orders.
func (r Reading) String() string {
	text := string(r.Op)
	var parts []string
	say := func(s string) { parts = append(parts, s) }
	if r.Angles != nil {
		say(r.Angles.Listed().String())
	}
	if r.Axis != "" {
		say("about " + r.Axis)
	}
	for i, n := range r.Negated {
		if n {
			say(fmt.Sprintf("angle %d negated", i+1))
		}
	}
	if r.Scale != 0 && r.Scale != 1 {
		say(fmt.Sprintf("by %g times the angle", r.Scale))
	}
	if r.Unit != convention.UnitUnstated {
		say("in " + r.Unit.String() + "s")
	}
	switch {
	case r.Swapped && (r.Op == Product || r.Op == Quotient):
		say("of the operands in reverse order (Shuster's product)")
	case r.Swapped:
		say("of the operands in reverse order")
	}
	switch {
	case r.Op == RotateVector || r.Op == ToMatrix || r.Op == FromMatrix || r.Op == FromAngles || r.Op == AxisTurn ||
		r.Op == FromAxisAngle || r.Op == FromRotvec || r.Op == AnglesOf || r.Op == AxisAngleOf || r.Op == RotvecOf:
		if r.Reversed[0] {
			say("passive")
		} else {
			say("active")
		}
	default:
		for i, reversed := range r.Reversed {
			if reversed {
				say(fmt.Sprintf("with operand %d reversed", i+1))
			}
		}
	}
	if r.Formula != AnyNorm {
		say(r.Formula.String())
	}
	if r.Way != NoWay {
		say(r.Way.String())
	}
	if r.Rates != convention.RateAxesUnstated {
		say(r.Rates.String())
	}
	if r.Detail != "" {
		say(r.Detail)
	}
	if len(parts) == 0 {
		return text
	}
	return text + ", " + strings.Join(parts, ", ")
}

// sameOrders reports whether two readings differ in nothing but storage.
func sameButOrders(a, b Reading) bool {
	return a.String() == b.String() && (a.Map == nil) == (b.Map == nil) && (a.Map == nil || *a.Map == *b.Map)
}

// clone copies what a reading points to.
func (r Reading) clone() Reading {
	r.Orders = slices.Clone(r.Orders)
	return r
}
