// Package longway looks at functions that tell R from -R.
//
// A quaternion and its negative are one rotation. An interpolation that takes both ends
// as they come goes the long way round where their signs differ: between two
// orientations 10 degrees apart it passes through 350. A distance that does not ignore
// the sign calls equal rotations a full turn apart.
//
// # Analyzer longway
//
// longway: find functions of two rotations whose result depends on the signs of the
// quaternions
//
// The analyzer reports spherical and normalised linear interpolations between
// quaternions, and angles between them, that are not the same for R and -R. It is
// silent where a flag of the function switches to the shorter way, and where the
// author says that the longer one may be taken.
package longway
