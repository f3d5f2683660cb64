package rotor

// Mean returns the mean of rotations, whatever the signs and norms of their
// rotors: the one for which the sum of the squared sines of half the angles to
// them is least (F. L. Markley, Y. Cheng, J. L. Crassidis and Y. Oshman,
// "Averaging quaternions", J. Guidance, Control, and Dynamics 30 (2007) 1193).
// Its sign is that of the side of the first rotor.
//
// It reports false, with One, when nothing determines the mean: there are no
// rotors, one is zero or not finite, or rotations in different places do
// equally well up to rounding, such as between two half a turn apart.
func Mean(rotors []Rotor) (Rotor, bool) {
	var f Form
	for _, r := range rotors {
		u, ok := r.Unit()
		if !ok {
			return One, false
		}
		f.AddSquare(u, 1)
	}
	// Each element is a sum of n squares or products, wrong by up to n roundings
	// of itself, and the norm of four by four such errors is at most four times
	// as large. The rest is for the unit rotors and for Peak.
	peak, ok := f.Peak()
	if !ok || !peak.Single(float64(2*len(rotors)+32)) {
		return One, false
	}
	if peak.At.Dot(rotors[0]) < 0 {
		return peak.At.Neg(), true
	}
	return peak.At, true
}
