package rotor

// Slerp returns the rotor at part t of the shorter turn from a to b, both of
// norm one, at a constant rate: a at t = 0, b or -b at t = 1, up to rounding.
// Beyond 0..1 the turn goes on. Half a turn has two equally short ways; the
// sign of b decides.
func Slerp(a, b Rotor, t float64) Rotor {
	if a.Dot(b) < 0 {
		b = b.Neg()
	}
	return along(a, b, t)
}

// SlerpLong returns the rotor at part t of the longer turn from a to b, the
// other way round in the same plane. From a to a it is a full turn, the plane
// of which nothing determines: e12, as in [Rotor.Log], turned by a.
func SlerpLong(a, b Rotor, t float64) Rotor {
	if a.Dot(b) >= 0 {
		b = b.Neg()
	}
	return along(a, b, t)
}

// along returns a exp(t log(a~ b)).
func along(a, b Rotor, t float64) Rotor {
	return a.Mul(Exp(Relative(a, b).Log().Scale(t)))
}

// Lifter turns a series of rotations into a continuous path of rotors: of r
// and -r it returns the one nearer to the rotor before. A series that makes a
// full turn ends at minus its start. It guesses right as long as the rotation
// moves by less than 180 degrees from one to the next.
//
// The zero Lifter is ready; it returns the first rotor as it is. Rotors that
// are zero or not finite are returned as they are too, and passed over.
type Lifter struct{ last Rotor }

// Next returns r or -r, whichever continues the path.
func (l *Lifter) Next(r Rotor) Rotor {
	dot := l.last.Dot(r)
	if dot < 0 {
		r = r.Neg()
	}
	if r != (Rotor{}) && r.Finite() {
		l.last = r
	}
	return r
}

// Lift makes a series continuous in place, as [Lifter] does.
func Lift(series []Rotor) {
	var l Lifter
	for i, r := range series {
		series[i] = l.Next(r)
	}
}
