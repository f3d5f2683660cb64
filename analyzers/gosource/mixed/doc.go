// Package mixed looks at types that not all functions of a package store alike.
//
// Where the scalar of a quaternion stands is read off every function that depends on
// it. One function that has it elsewhere than the others hands over another rotation.
//
// # Analyzer mixed
//
// mixed: find functions that store a quaternion otherwise than the rest of the package
package mixed
