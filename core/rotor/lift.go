package rotor

// Lifter turns a series of rotations into a continuous path of rotors: of r
// and -r it returns the one nearer to the rotor before. A series that makes a
// full turn ends at minus its start. The zero Lifter is ready for the first rotor, which
// it returns unchanged.
type Lifter struct {
	last    Rotor
	started bool
}

// Next returns r or -r, continuing the path.
func (l *Lifter) Next(r Rotor) Rotor {
	if l.started && l.last.Dot(r) < 0 {
		r = r.Neg()
	}
	l.last, l.started = r, true
	return r
}

// Lift makes the series sign-continuous in place.
func Lift(series []Rotor) {
	var l Lifter
	for i, r := range series {
		series[i] = l.Next(r)
	}
}
