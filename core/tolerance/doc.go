// Package tolerance says how far numbers may miss what they claim to be,
// because they were rounded.
//
// It is the one place where dextral decides what "equal" means. A bound here
// is derived, never tuned: it starts from the precision of the input and is
// carried to the quantity in question by an inequality that the method's
// comment names. Tests round random rotors and compare.
//
// # Precision of a group
//
// Numbers that describe one orientation are rounded together, so the group
// has one half unit h, the largest error that writing can have made in an
// entry:
//
//	printed         half a unit of the last digit shown, of the coarsest entry
//	stored          0; arithmetic alone
//	quantised       half a step: 1/65534 for q/32767
//
// Whole numbers show no precision: 90 may be a right angle or the rounded
// 90.3, and 0 and 1 are exact in most matrices. They do not make a group
// coarse, unless zeros are written out, as in 1.000. Nor does an entry such as
// 0.5 beside 0.8660254037844387: a writer of the shortest text has dropped its
// zeros (see Of).
//
// # Arithmetic
//
// Before a number is printed it is computed. Unless a file is declared to hold
// float64, dextral assumes float32, whose rounding unit is u = 2^-24, and
// allows eight roundings of that size, relative to the size of the group: as
// many as a quaternion has behind it that was normalised and made into a
// matrix. The sum h + 8u bounds the error of an entry. That floor is worth
// 0.0001 degrees for a quaternion and never hides a convention.
//
// # From entries to angles
//
// To first order in h, in radians:
//
//	norm of n numbers      sqrt(n) h
//	unit quaternion        4 h
//	rotation matrix        3/sqrt(2) h = 2.1 h
//	|M^T M - I|            6 h
//	det M - 1              3 sqrt(3) h = 5.2 h
//	three angles           sqrt(5) h = 2.2 h
//	rotation vector        sqrt(3) h = 1.7 h
//	unit axis              sqrt(3) h = 1.7 h
//	axis and angle         sqrt(13) h = 3.6 h
//
// Two descriptions of one orientation may differ by the sum of their bounds.
//
// A declared calibration uncertainty replaces every bound on an angle. It does
// not touch norm, defect and determinant: a calibration may be uncertain by a
// degree and is still a rotation.
package tolerance
