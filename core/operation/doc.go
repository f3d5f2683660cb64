// Package operation tells which operation on orientations a numeric function
// computes, from its values on samples.
//
// A function is a list of operands that go in, a list that come out, and a way to
// evaluate it. What an operand's numbers mean is not known beforehand: four numbers may
// be a quaternion in any of 24 orders, three numbers a vector or angles in degrees.
// Identify compares the values with every operation of the set and keeps what agrees.
// What no sample can tell apart stays together as readings of one identity.
//
// # Families of samples
//
// On the unit manifold (Unit), with wide and with tiny angles (Wide, Tiny), off the
// manifold (General) and at singular points (Singular). An operation is identified by the first
// three; General samples then say what it does with a norm other than one, and Singular
// ones are for those who look for trouble there.
//
// # Nearly an operation
//
// Explain takes the operations that a function may be meant to compute, and finds the one that
// it comes nearest to and what stands between them: the factors of the terms, where results are
// sums of terms; a factor or divisor; one component that was wrong before normalising; one input
// read in place of another; the samples that differ, if not all do.
//
// # Conventions
//
// Quaternion numbers in this package are canonical, w x y z of Hamilton's algebra,
// whenever no Order says otherwise. An Order o stores the canonical number k at
// place o[k]. Matrices are row by row and act on columns.
package operation
