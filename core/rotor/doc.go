// Package rotor computes rotations as rotors, the even elements of Cl(3,0),
// the geometric algebra of space.
//
// # The idea
//
// Vectors multiply by the geometric product, which is associative and has
// a a = |a|^2. Of the orthonormal vectors e1, e2, e3 the products e23 = e2e3,
// e31 = e3e1 and e12 = e1e2 are unit planes, each with square -1 and a sense
// of turning: e12 turns e1 towards e2. The product I = e1e2e3 is the unit
// volume; I n is the plane perpendicular to the vector n, with the sense of a
// right-handed turn about it, so that I e3 = e12.
//
// The reflection of v in the plane perpendicular to the unit vector a is
// -a v a. Two reflections, first in a and then in b, are b a v a b = R v R~
// with R = b a: a turn in the plane of a and b by twice the angle from a to b.
// R~, the reverse, is the product in reverse order. So every rotation is
//
//	v' = R v R~    R = exp(-B theta/2) = cos(theta/2) - B sin(theta/2)
//
// with B the unit plane of the turn and theta its angle. The sandwich turns
// planes, volumes and general multivectors as it turns vectors, and rotations
// compose by the product: R2 R1 is R1 first, R2 second.
//
// # Signs
//
// R and -R are one rotation: -R gets there by the turn the other way round,
// which is 2 pi - theta. So a rotor knows more than a rotation, and a
// continuous full turn ends at -R. Functions of a rotation (Angle, TurnAngle,
// AxisAngle, RotationVector, MRP, Gibbs, Mean) give the same answer for R and
// -R; functions of a turn (Log, SlerpLong, Compose) heed the sign.
//
// # Quaternions
//
// The quaternion units are i = e3e2, j = e1e3 and k = e2e1, see
// [FromQuaternion]. Hamilton's product is then the geometric product.
//
// # Numbers
//
// Angles are radians. Turns are active: they move vectors within one basis.
// A rotor proper has norm one; where a function needs that, it says so, and
// where it does not, any norm will do.
//
// Nothing panics: NaN comes out as NaN, or as false where a function reports
// success, and infinity as either or as the limit. Errors are a few units in
// the last place of the greatest component, unless a function promises more.
// Where the processor fuses multiplication and addition, the last place may
// differ between platforms.
package rotor
