package kinematics

import "dextral/core/rotor"

// Derivative returns R' of a rotor from body to space that turns at the given
// body rate.
func Derivative(r rotor.Rotor, bodyRate rotor.Vec) rotor.Rotor {
	half := bodyRate.Scale(-0.5)
	return r.Mul(rotor.Rotor{E23: half.X, E31: half.Y, E12: half.Z})
}

// BodyRate returns the constant rate, in body axes and in rad per unit of dt,
// that carries unit rotor a to b or -b in time dt the shorter way. It is the
// rate at the middle of the interval up to terms in dt^2. For dt = 0 it is not
// finite.
func BodyRate(a, b rotor.Rotor, dt float64) rotor.Vec {
	return rotor.Relative(a, b).RotationVector().Scale(1 / dt)
}

// SpaceRate returns the rate that [BodyRate] returns, in space axes.
func SpaceRate(a, b rotor.Rotor, dt float64) rotor.Vec {
	// b a~ = (a b~)~, and a b~ is relative to a~.
	return rotor.Relative(a.Reverse(), b.Reverse()).RotationVector().Scale(-1 / dt)
}

// Step returns the orientation r after time dt at a constant body rate.
func Step(r rotor.Rotor, bodyRate rotor.Vec, dt float64) rotor.Rotor {
	return r.Mul(rotor.FromRotationVector(bodyRate.Scale(dt)))
}
