// Package rotor is the even subalgebra of the geometric algebra of space,
// Cl(3,0), as far as orientations need it.
package rotor
