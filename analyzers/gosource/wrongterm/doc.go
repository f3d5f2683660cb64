// Package wrongterm reports functions that nearly compute what they are called.
//
// A product in which one term has the wrong sign is not a product, and no other known
// operation either. Where a name or comment says what a function is to compute,
// its operands fit, and what it computes differs in a few terms, in single
// components or in one branch, the difference is reported in the author's names.
//
// # Silence
//
// Nothing is said of a function that nobody calls an operation, of types of four
// numbers that no other function or name shows to be rotations, of functions that
// call one that is reported, and of those that differ everywhere from what they are
// called: these compute something else, whatever it is.
//
// # Analyzer wrongterm
//
// wrongterm: report operations on orientations with a wrong term, component or branch
//
// The analyzer compares what a function computes with the operation that its name or
// comment claims, and reports the term, component or branch in which they
// differ.
package wrongterm
