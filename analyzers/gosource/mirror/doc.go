// Package mirror reports functions that mirror where they are to rotate.
//
// A linear map of vectors between two right-handed frames has determinant +1.
// The vector part of a quaternion is an axis, which a change of axes P takes to det(P) P times
// itself: that, too, always has determinant +1, whatever P is. A map of the vector part
// with determinant -1 is wrong under any declaration, unless the conjugate is meant
// as well.
//
// # Analyzer mirror
//
// mirror: report maps of vectors and quaternions that mirror
//
// The analyzer reports maps of vectors between named right-handed frames, or called
// rotations, that have determinant -1, maps between named frames that are another map,
// and changes of a quaternion's axes that have determinant -1.
package mirror
