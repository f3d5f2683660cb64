// Package norm looks at functions that are right for unit quaternions only, or that
// leave the unit quaternions, and do not say so.
//
// The conjugate is the inverse of a unit quaternion, and of no other. A step of
// integration to first order lengthens the quaternion, every time a little.
//
// # Analyzer norm
//
// norm: find inverses that are conjugates, and integration steps that lose unit norm
//
// The analyzer reports a function called inverse that computes the conjugate, in a
// package that itself makes or normalises quaternions of other norms, and integration
// steps to first order without a normalisation. It is silent where the comment of the
// function or of its type speaks of unit norm.
package norm
