package rotor

// Mean returns the rotation whose summed squared sine of half the angle to the
// given rotations is least, whatever their signs and norms: the dominant
// eigenvector of the sum of r r^T (F. L. Markley et al., "Averaging
// quaternions", J. Guidance, Control, and Dynamics 30 (2007) 1193). Its sign is that of
// the first rotor's side.
//
// It reports false, with One, when the mean is undetermined: no rotors, one
// that is zero or not finite, or several rotations equally good (two that differ by a half turn).
func Mean(rotors []Rotor) (Rotor, bool) {
	var form Form
	for _, r := range rotors {
		u, ok := r.Unit()
		if !ok {
			return One, false
		}
		form.AddSquare(u, 1)
	}
	best, _, ok := form.Maximum()
	if ok && best.Dot(rotors[0]) < 0 {
		best = best.Neg()
	}
	return best, ok
}
