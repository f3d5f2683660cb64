package angle

import "math"

// Wrap brings an angle in radians into (-pi, pi] by whole turns of 2 math.Pi.
// NaN for an infinite angle.
func Wrap(x float64) float64 {
	if x > -math.Pi && x <= math.Pi {
		return x
	}
	return wrapped(math.Remainder(x, 2*math.Pi))
}

// Unwrap is the angle that differs from x by whole turns and is nearest to
// previous; half a turn away it is the later one.
func Unwrap(previous, x float64) float64 { return previous + Wrap(x-previous) }

// Other is the second triple of angles with the same rotor, outside of the
// range of Angles: (a + pi, pi - b, c + pi), or (a + pi, -b, c + pi) when the
// first axis returns.
func (s Sequence) Other(t Triple) Triple {
	b := -t.B
	if !s.Proper() {
		b = Wrap(math.Pi - t.B)
	}
	return Triple{Wrap(t.A + math.Pi), b, Wrap(t.C + math.Pi), t.Band}
}
