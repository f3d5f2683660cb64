// Package roundtrip looks at pairs of conversions that ought to undo each other.
//
// A package that makes a rotation of angles and gives the angles of a rotation
// promises, by having both, that they fit. Each may be right by some convention, and
// both wrong together: one turns about moving axes and the other about fixed ones, one
// transposes and the other does not.
//
// # Analyzer roundtrip
//
// roundtrip: find pairs of conversions that do not undo each other
//
// The analyzer pairs functions of a package that convert between the same types there
// and back, evaluates one after the other, and reports a pair that does not come back
// to the same rotation, if no other function of the package is the missing inverse.
package roundtrip
