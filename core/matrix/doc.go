// Package matrix holds 3x3 matrices and rigid transforms as far as orientations need them.
package matrix
