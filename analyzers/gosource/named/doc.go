// Package named reads what the name and the doc comment of a function claim
// that it computes.
//
// A name claims by its words: Mul, Conj, RotateVec, ToMatrix. Which operation
// a word means depends on the operands: Mul of two quaternions is their product, of
// two matrices theirs. The first sentence of the doc comment speaks where the name
// does not, and adds to it where it says more: "the Hamilton product".
package named
