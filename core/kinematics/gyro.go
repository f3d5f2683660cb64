package kinematics

import "dextral/core/rotor"

// Increment returns the rotation vector, in body axes at the start, of the turn
// during dt while the body rate goes from a to b:
//
//	dt (a + b)/2 + dt^2 (a x b)/12
//
// The second term is the coning correction: by the time of the later rates the
// body axes have turned themselves (J. E. Bortz, "A new mathematical
// formulation for strapdown inertial navigation", IEEE Trans. AES 7 (1971) 61,
// from memory; the term is his integral for a rate linear in time). The error of
// one step is of order dt^5 for such a rate, and of order dt^3, from the
// trapezium, for any other smooth one.
func Increment(a, b rotor.Vec, dt float64) rotor.Vec {
	return a.Add(b).Scale(dt / 2).Add(a.Cross(b).Scale(dt * dt / 12))
}

// Sample is an orientation and a body rate at one time.
type Sample struct {
	T    float64
	R    rotor.Rotor // body to space, of norm one
	Rate rotor.Vec   // body axes, rad per unit of T
}

// Interpolate returns the orientation at time t between two samples: that of a
// carried on by the gyro, with what then fails to close at b spread evenly over
// the interval. It is a's orientation at a's time and b's, up to sign, at b's;
// between them the error is of third order in the length of the interval. The
// samples need different times.
func Interpolate(a, b Sample, t float64) rotor.Rotor {
	part := (t - a.T) / (b.T - a.T)
	miss := rotor.Relative(carry(a, b, 1), b.R).RotationVector()
	return Step(carry(a, b, part), miss, part)
}

// carry returns a's orientation carried on by the gyro over a part of the
// interval, the rate going evenly from a's to b's.
func carry(a, b Sample, part float64) rotor.Rotor {
	rate := a.Rate.Scale(1 - part).Add(b.Rate.Scale(part))
	return a.R.Mul(rotor.FromRotationVector(Increment(a.Rate, rate, part*(b.T-a.T))))
}
