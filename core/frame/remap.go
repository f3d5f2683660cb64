package frame

import (
	"dextral/core/matrix"
	"dextral/core/rotor"
)

// Remap is the rotor r of a rotation in a frame, written in the frame that
// the orthogonal map P leads to, v_new = P v: the rotation P R P^T.
//
// P acts on planes by its cofactors, det(P) P, which always has determinant +1: a
// mirror turns the sense of a plane over once more than it turns an
// axis. P and -P do the same.
func Remap(p matrix.Mat3, r rotor.Rotor) rotor.Rotor {
	axis := p.Apply(r.Bivector().Axis()).Scale(mirrored(p))
	return rotor.Rotor{S: r.S, E23: axis.X, E31: axis.Y, E12: axis.Z}
}

// Convert is the orientation r, v_world = r v_body r~, for other axes of the world and of
// the body: v_world' = P v_world, v_body' = Q v_body. The result is P R Q^T, a rotation if
// both maps keep or both change the hand; false otherwise.
func Convert(world, body matrix.Mat3, r rotor.Rotor) (rotor.Rotor, bool) {
	if mirrored(world) != mirrored(body) {
		return rotor.Rotor{}, false
	}
	return world.Mul(matrix.FromRotor(r)).Mul(body.Transpose()).Rotor(), true
}
