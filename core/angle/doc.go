// Package angle turns three angles into rotations and back, and reads the
// labels by which authors say what their three angles mean.
//
// # Sequences
//
// Three turns about coordinate axes, no two in a row about the same one, reach
// every orientation. There are twelve orders of axes: six with three different
// axes (Tait-Bryan) and six that return to the first (proper Euler). Each may be
// made about the axes of the turning body or about those of the space it turns in,
// which makes 24 sequences. With active matrices R_A of a turn about axis A,
//
//	moving axes ABC with (a, b, c)   R_A(a) R_B(b) R_C(c)   printed a-b'-c''
//	fixed axes  ABC with (a, b, c)   R_C(c) R_B(b) R_A(a)   printed a-b-c
//
// so that moving z-y-x with (a, b, c) is fixed x-y-z with (c, b, a), its Twin.
// Angles are in radians, and numbers stand in the order of the turns.
//
// The turns are active: they carry the axes of one frame onto those of another, and
// vectors with them. A text that writes a passive matrix for the same turns
// writes the transpose.
//
// # Singular points
//
// Where the first and third axis line up, only the sum or the difference of
// their angles is determined. This is no matter of taste: the distance of a
// rotation from the nearest singular one is exactly the distance of its
// middle angle from the singular value, so a rotation known to a precision p is
// singular, for all that is known, if that distance is at most p. Angles
// takes the rounding of float64 for p, AnglesWithin takes it from the caller (see
// package tolerance), and both say what is determined as a Band. Outside of the band
// a precision of p leaves the outer angles uncertain by p times Amplification.
//
// # Labels
//
// A Label is what an author says about the sequence, and a Reading one thing
// that it may mean: a sequence, which of the numbers as written belongs to which
// turn, and whether the rotation or its reverse is meant. A full label has
// one reading, a bare label every one that custom gives it.
package angle
