package angle

import (
	"math"

	"dextral/core/rotor"
)

// SpaceFromRates is the angular velocity in the axes of the space the body
// turns in, in rad/s, at angles n (rad) that change at rates (rad/s). It is the sum of each
// rate times the axis about which its turn is made.
func (s Sequence) SpaceFromRates(n, rates [3]float64) rotor.Vec {
	axes := s.turnAxes(n)
	return axes[0].Scale(rates[0]).Add(axes[1].Scale(rates[1])).Add(axes[2].Scale(rates[2]))
}

// BodyFromRates is the same angular velocity in the axes of the body.
func (s Sequence) BodyFromRates(n, rates [3]float64) rotor.Vec {
	return s.Rotor(n[0], n[1], n[2]).Reverse().Rotate(s.SpaceFromRates(n, rates))
}

// RatesFromSpace are the rates of the angles at n for an angular velocity in
// space axes. It is false, with zeros, within Rounding of a singular point, where the
// axes of the three turns lie in one plane and no rates give a velocity out of it.
func (s Sequence) RatesFromSpace(n [3]float64, space rotor.Vec) (rates [3]float64, ok bool) {
	u := s.turnAxes(n)
	normal := u[2].Cross(u[0]) // along u[1], which is perpendicular to both
	volume := u[1].Dot(normal) // cosine of the middle angle, or its sine, up to sign
	if !(math.Abs(volume) > Rounding) {
		return rates, false
	}
	// The dual basis: each rate is the velocity seen along the direction
	// that the other two turns cannot reach.
	rates[0] = u[1].Cross(u[2]).Dot(space) / volume
	rates[1] = u[1].Dot(space)
	rates[2] = u[0].Cross(u[1]).Dot(space) / volume
	return rates, true
}

// RatesFromBody is RatesFromSpace for an angular velocity in body axes.
func (s Sequence) RatesFromBody(n [3]float64, body rotor.Vec) (rates [3]float64, ok bool) {
	return s.RatesFromSpace(n, s.Rotor(n[0], n[1], n[2]).Rotate(body))
}

// Amplification is how much an outer angle changes for a small change of
// orientation, at most, at middle angle b: 1/cos b for three different axes,
// 1/sin b when the first axis returns; infinite at a singular point. The middle angle is never
// amplified.
func (s Sequence) Amplification(b float64) float64 {
	if s.Proper() {
		return 1 / math.Abs(math.Sin(b))
	}
	return 1 / math.Abs(math.Cos(b))
}

// turnAxes are the axes of the three turns, in the order of the numbers, in
// space. Moving axes: the first stays where it was, each later one has been carried by
// the turns before it. Fixed axes are those of the twin.
func (s Sequence) turnAxes(n [3]float64) [3]rotor.Vec {
	if s.Fixed {
		axes := s.Twin().turnAxes([3]float64{n[2], n[1], n[0]})
		return [3]rotor.Vec{axes[2], axes[1], axes[0]}
	}
	first := s.Axes[0].turn(n[0])
	second := first.Mul(s.Axes[1].turn(n[1]))
	return [3]rotor.Vec{
		s.Axes[0].unit(),
		first.Rotate(s.Axes[1].unit()),
		second.Rotate(s.Axes[2].unit()),
	}
}

// unit is the unit vector along a; NaN if there is no such axis.
func (a Axis) unit() rotor.Vec {
	switch a {
	case X:
		return rotor.Vec{X: 1}
	case Y:
		return rotor.Vec{Y: 1}
	case Z:
		return rotor.Vec{Z: 1}
	}
	return rotor.Vec{X: math.NaN(), Y: math.NaN(), Z: math.NaN()}
}

// turn is the rotor of one turn about a.
func (a Axis) turn(angle float64) rotor.Rotor {
	sin, cos := math.Sincos(angle / 2)
	u := a.unit()
	return rotor.FromQuaternion(cos, sin*u.X, sin*u.Y, sin*u.Z)
}
