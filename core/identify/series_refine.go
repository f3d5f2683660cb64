package identify

import (
	"math"

	"dextral/core/rotor"
)

// refine estimates by how much the rates are late and their constant offset,
// by least squares over what the best class leaves open.
//
// To first order rates late by tau lack, over a window, tau times the change of the rate from
// its start to its end, which the predictions of its neighbours give. An
// offset is estimated only where the motion swings enough: a quarter of its power must
// not be constant.
func (s *spans) refine(r *SeriesResult) {
	c := &r.Best
	n := len(s.rate)
	miss := make([]rotor.Vec, n)
	var mean rotor.Vec
	for i := range s.rate {
		miss[i] = s.rate[i].Scale(c.unit.InRadians()).Sub(c.predict(s.predicted[c.axes][i]))
		mean = mean.Add(miss[i])
	}
	mean = mean.Scale(1 / float64(n))
	t := s.sums()
	if centred := t.centred(); n < 30 || !centred.excited(t) {
		return
	}
	var square, cross, power float64
	used := 0
	for i := 1; i+1 < n; i++ {
		if s.window[i-1].To.Row != s.window[i].From.Row || s.window[i].To.Row != s.window[i+1].From.Row {
			continue
		}
		d := c.predict(s.predicted[c.axes][i+1].Sub(s.predicted[c.axes][i-1])).Scale(-0.5 / s.dt[i])
		e := miss[i].Sub(mean)
		cross, power, square = cross+e.Dot(d), power+d.Dot(d), square+e.Dot(e)
		used++
	}
	if used < 30 || power == 0 {
		return
	}
	left := math.Max(square-cross*cross/power, 0)
	r.Delay = estimate(cross/power, math.Sqrt(left/(3*float64(used)*power)))
	r.Delay.Known = r.Delay.Known && left < square/2
	deviation := math.Sqrt(left / (3 * float64(used) * float64(n)))
	for i, x := range [3]float64{mean.X, mean.Y, mean.Z} {
		r.Bias[i] = estimate(x, deviation)
	}
}

func estimate(value, deviation float64) Estimate {
	return Estimate{value, deviation, math.Abs(value) > 3*deviation}
}

// predict maps a predicted rate to the axes and the sign of the class.
func (c *SeriesClass) predict(v rotor.Vec) rotor.Vec {
	x := [3]float64{v.X, v.Y, v.Z}
	var out [3]float64
	for j, to := range axisMaps[c.cube] {
		if to.negated != c.negated {
			out[to.axis] = -x[j]
		} else {
			out[to.axis] = x[j]
		}
	}
	return rotor.Vec{X: out[0], Y: out[1], Z: out[2]}
}
