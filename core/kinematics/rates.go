// Package kinematics relates orientations to rates and times.
package kinematics

import "dextral/core/rotor"

// BodyRate returns the constant rate (rad per unit of dt), in body axes, that carries orientation a to
// b in time dt by the shorter way. Rotors map body to space coordinates.
func BodyRate(a, b rotor.Rotor, dt float64) rotor.Vec {
	return rotor.Relative(a, b).RotationVector().Scale(1 / dt)
}

// SpaceRate returns the same rate in space axes.
func SpaceRate(a, b rotor.Rotor, dt float64) rotor.Vec {
	return rotor.Relative(a.Reverse(), b.Reverse()).RotationVector().Scale(-1 / dt)
}

// Step returns the orientation r after time dt at a constant body rate.
func Step(r rotor.Rotor, bodyRate rotor.Vec, dt float64) rotor.Rotor {
	return r.Mul(rotor.FromRotationVector(bodyRate.Scale(dt)))
}
