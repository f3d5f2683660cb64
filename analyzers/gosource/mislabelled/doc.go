// Package mislabelled compares the conventions that a function computes with those
// that its name, its comment and its parameters state.
//
// A bare label such as XYZ or rpy is contradicted only if no customary reading fits:
// about moving or fixed axes, numbers in the order of the letters or of the axes, the
// rotation or its reverse. A full one ("intrinsic zyx", "fixed axes x-y-z") is held to
// its word, but not to a direction, which it does not state. Three angles that are
// called roll, pitch and yaw are held to one axis each, in the customs of aircraft or of
// computer graphics.
//
// # Analyzer mislabelled
//
// mislabelled: report functions whose conventions contradict what is written beside them
//
// The analyzer reports angle sequences, units of angles, quaternion algebras,
// directions and places of the scalar that are computed otherwise than a name or comment
// says.
package mislabelled
