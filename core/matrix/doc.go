// Package matrix holds 3x3 matrices and rigid transforms of space, as far as
// orientations need them.
//
// # Convention
//
// A matrix acts on columns of coordinates, v' = M v, and M[i][j] is the element
// of row i and column j. Column j is the image of basis vector j. Numbers in a
// file become a matrix only together with a storage order; programs that
// multiply rows from the left, v' = v M, write the transpose.
//
// A lone matrix is neither active nor passive. [FromRotor] and [Mat3.Rotor] read
// it as active: M v is r v r~. The passive matrix of the same axis and angle,
// which gives the coordinates of a fixed vector in turned axes, is the
// transpose.
//
// # What is a rotation
//
// Nine numbers are a rotation when M^T M = 1 and det M = 1. [Defect] measures
// the first, [Mat3.Det] the second, and both are needed: a mirror has no
// defect. [Nearest] finds the rotation that the numbers are closest to, [Scale]
// does that up to a common factor, and [NearestOrthogonal] up to a mirror. For
// a small error E in every element, M = R + E, the defect is at most about
// twice the norm of E, and the distance to the nearest rotation at most the
// norm of E.
package matrix
