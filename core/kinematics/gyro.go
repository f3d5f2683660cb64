package kinematics

import "dextral/core/rotor"

// Increment returns the rotation vector (rad), in body axes at the start, of
// the turn during dt while the body rate goes from a to b:
//
//	dt (a + b)/2 + dt^2 (a x b)/12
//
// The second term is the coning correction: the axes of later rates have
// themselves turned. For a rate that is linear in time the error is of order
// dt^5 a step, for any smooth rate of order dt^3, so that a
// path integrated with it is right to second order.
func Increment(a, b rotor.Vec, dt float64) rotor.Vec {
	return a.Add(b).Scale(dt / 2).Add(a.Cross(b).Scale(dt * dt / 12))
}

// Sample is an orientation and a body rate at one time.
type Sample struct {
	T    float64
	R    rotor.Rotor // body to space
	Rate rotor.Vec   // body axes, rad per unit of T
}

// Interpolate returns the orientation at time t between two samples: a's,
// advanced by the gyro, with what the gyro fails to close at b spread evenly over the interval. It
// is exact at both ends (up to the sign of the rotor at b) and its error
// is of third order in the length of the interval.
func Interpolate(a, b Sample, t float64) rotor.Rotor {
	dt := b.T - a.T
	tau := (t - a.T) / dt
	full := a.R.Mul(rotor.FromRotationVector(Increment(a.Rate, b.Rate, dt)))
	miss := rotor.Relative(full, b.R).RotationVector()
	rate := a.Rate.Scale(1 - tau).Add(b.Rate.Scale(tau))
	part := rotor.FromRotationVector(Increment(a.Rate, rate, t-a.T))
	return a.R.Mul(part).Mul(rotor.FromRotationVector(miss.Scale(tau)))
}
