// Package routes looks at two ways to the same result.
//
// A vector can be turned by a quaternion, or by the matrix of that quaternion. Two
// rotations can be composed as quaternions or as matrices. A package that offers both
// ways promises that they agree; each may be right by some convention, and both
// together still wrong.
//
// # Analyzer routes
//
// routes: find two routes of a package that lead to different rotations
//
// The analyzer turns vectors by a quaternion and by its matrix, where a package can do
// both with its own types, and reports a matrix that turns the other way. It notes a
// product of quaternions whose matrix is the product of the matrices in the other
// order.
package routes
