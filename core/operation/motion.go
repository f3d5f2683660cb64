package operation

import (
	"math"

	"dextral/core/convention"
	"dextral/core/rotor"
)

func init() {
	known("qqs", "q", func() []hypothesis { return interpolate(0, 4, 8) })
	known("sqq", "q", func() []hypothesis { return interpolate(1, 5, 0) })
	known("qv", "q", func() []hypothesis { return derivatives(0, 4) })
	known("vq", "q", func() []hypothesis { return derivatives(3, 0) })
	known("qvs", "q", func() []hypothesis { return steps(0, 4, 7) })
}

// interpolate lists spherical, normalised linear and linear interpolation
// with either end first.
func interpolate(a, b, t int) []hypothesis {
	var all []hypothesis
	for _, swapped := range [2]bool{false, true} {
		for _, way := range []Way{Shorter, AsGiven, Longer} {
			ends := func(in []float64) (p, q rotor.Rotor, f float64) {
				p, q, f = quat(in[a:]), quat(in[b:]), in[t]
				if swapped {
					p, q = q, p
				}
				if dot := p.Dot(q); way == Shorter && dot < 0 || way == Longer && dot >= 0 {
					q = q.Neg()
				}
				return p, q, f
			}
			// From p the longer way to p is a full turn in no particular plane;
			// within 1e-3 of it, rounding decides the plane to 1e-13 only.
			fraction := func(in []float64) bool {
				p, q, f := ends(in)
				return f >= 0 && f <= 1 && (way != Longer || p.Dot(q) > -(1-0.5e-6)*p.Norm()*q.Norm())
			}
			add := func(op Op, sign bool, slack func([]float64) float64, of func(p, q rotor.Rotor, f float64) rotor.Rotor) {
				all = append(all, hypothesis{reading: Reading{Op: op, Way: way, Swapped: swapped}, sign: sign, slack: slack, valid: fraction, eval: func(in, out []float64) {
					p, q, f := ends(in)
					putQuat(out, of(p, q, f))
				}})
			}
			// Between ends that are an angle d apart the linear path leaves
			// the spherical one by less than d^3/16: common practice is to
			// use it for small d.
			add(Slerp, way != AsGiven, func(in []float64) float64 {
				p, q, _ := ends(in)
				d := math.Acos(math.Max(-1, math.Min(1, p.Dot(q)/(p.Norm()*q.Norm()))))
				if d < 0.1 {
					return d * d * d / 16
				}
				return 0
			}, slerp)
			add(Nlerp, way != AsGiven, nil, func(p, q rotor.Rotor, f float64) rotor.Rotor {
				r := p.Scale(1 - f).Add(q.Scale(f))
				return r.Scale(1 / r.Norm())
			})
			add(Lerp, false, nil, func(p, q rotor.Rotor, f float64) rotor.Rotor { return p.Scale(1 - f).Add(q.Scale(f)) })
		}
	}
	return all
}

// slerp takes p and q with the signs they have.
func slerp(p, q rotor.Rotor, f float64) rotor.Rotor {
	d := math.Acos(math.Max(-1, math.Min(1, p.Dot(q)/(p.Norm()*q.Norm()))))
	if s := math.Sin(d); s > 1e-9 {
		return p.Scale(math.Sin((1-f)*d) / s).Add(q.Scale(math.Sin(f*d) / s))
	}
	return p
}

// pure is the quaternion of a rate.
func pure(v rotor.Vec) rotor.Rotor { return rotor.FromQuaternion(0, v.X, v.Y, v.Z) }

// derivatives are q w/2 for rates in body axes, w q/2 in space axes, if q maps from
// body to space. The factor may be missing, or the sign may be that of the reverse.
func derivatives(q, v int) []hypothesis {
	var all []hypothesis
	for _, axes := range []convention.RateAxes{convention.BodyRates, convention.SpaceRates} {
		for _, factor := range []float64{0.5, 1, -0.5, -1} {
			reading := Reading{Op: Derivative, Rates: axes, Scale: 2 * factor}
			if factor < 0 {
				reading.Reversed[1], reading.Scale = true, -2*factor
			}
			all = append(all, hypothesis{reading: reading, eval: func(in, out []float64) {
				r, w := quat(in[q:]), pure(vec(in[v:]))
				d := w.Mul(r)
				if axes == convention.BodyRates {
					d = r.Mul(w)
				}
				putQuat(out, d.Scale(factor))
			}})
		}
	}
	return all
}

// steps integrate over a time: by the exponential, or to first order with and
// without normalising afterwards.
func steps(q, v, t int) []hypothesis {
	var all []hypothesis
	for _, axes := range []convention.RateAxes{convention.BodyRates, convention.SpaceRates} {
		for _, how := range []string{"exact", "first order", "first order, normalised"} {
			for _, scale := range []float64{1, 2, 0.5, -1} {
				reading := Reading{Op: Step, Rates: axes, Detail: how, Scale: scale}
				if scale < 0 {
					reading.Reversed[1], reading.Scale = true, 1
				}
				all = append(all, hypothesis{reading: reading, eval: func(in, out []float64) {
					r, w := quat(in[q:]), vec(in[v:]).Scale(in[t]*scale)
					turn := rotor.FromRotationVector(w)
					if how != "exact" {
						turn = pure(w.Scale(0.5)).Add(rotor.One)
					}
					next := turn.Mul(r)
					if axes == convention.BodyRates {
						next = r.Mul(turn)
					}
					if how == "first order, normalised" {
						next = next.Scale(1 / next.Norm())
					}
					putQuat(out, next)
				}})
			}
		}
	}
	return all
}
