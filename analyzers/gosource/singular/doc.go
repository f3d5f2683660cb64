// Package singular looks at rotations where formulas fail.
//
// A conversion may be right everywhere and still give NaN at a pitch of exactly 90
// degrees, where rounding makes a sine of 1.0000000000000002, or a result that is
// no rotation for a half turn. Functions whose operation is known are evaluated at
// such points, and their results held against the operation, which is defined
// there: angles at gimbal lock must still make the same rotation, whichever of the
// many triples they are.
//
// # Analyzer singular
//
// singular: find functions on rotations that fail at singular points
//
// The analyzer evaluates the functions whose operation is known at the identity, at
// half turns, at gimbal lock of every sequence, for equal and opposite operands, and
// reports results that are no numbers or are wrong there. Inputs are valid: a
// function may do what it likes with a zero quaternion.
package singular
