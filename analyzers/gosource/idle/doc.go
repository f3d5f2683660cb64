// Package idle looks at arguments that nothing depends on, and at receivers that
// change unasked.
//
// # Analyzer idle
//
// idle: find arguments of functions on rotations that have no influence, and methods
// that return a result and change their receiver as well
//
// An argument is reported if no number of it can influence a result, a branch, or
// anything that is written, in a function that is exported, is no method that an
// interface may want, and deals in rotations. A method is reported that returns a
// quaternion or a matrix by value, is named as if it only read, and writes its receiver.
package idle
