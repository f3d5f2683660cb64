package operation

import (
	"math"

	"dextral/core/rotor"
)

func init() {
	known("q", "q", unary)
	known("qq", "q", binary)
	known("qs", "q", scaled)
	known("sq", "q", func() []hypothesis {
		return []hypothesis{{reading: Reading{Op: Scaled}, eval: func(in, out []float64) { putQuat(out, quat(in[1:]).Scale(in[0])) }}}
	})
	known("q", "s", measures)
	known("qq", "s", pairMeasures)
}

// functions of one quaternion; those that agree on the unit manifold are told
// apart off it.
func unary() []hypothesis {
	type f = func(rotor.Rotor) rotor.Rotor
	var all []hypothesis
	add := func(op Op, of f) {
		all = append(all, hypothesis{reading: Reading{Op: op}, eval: func(in, out []float64) { putQuat(out, of(quat(in))) }})
	}
	add(Copy, func(r rotor.Rotor) rotor.Rotor { return r })
	add(Negative, rotor.Rotor.Neg)
	add(Conjugate, rotor.Rotor.Reverse)
	add(NegConjugate, func(r rotor.Rotor) rotor.Rotor { return r.Reverse().Neg() })
	add(Inverse, func(r rotor.Rotor) rotor.Rotor { return r.Reverse().Scale(1 / r.Dot(r)) })
	add(Normalise, func(r rotor.Rotor) rotor.Rotor { return r.Scale(1 / r.Norm()) })
	add(Square, func(r rotor.Rotor) rotor.Rotor { return r.Mul(r) })
	add(Exponential, func(r rotor.Rotor) rotor.Rotor { return rotor.Exp(r.Bivector()).Scale(math.Exp(r.S)) })
	add(Logarithm, func(r rotor.Rotor) rotor.Rotor {
		b := r.Log()
		return rotor.Rotor{S: math.Log(r.Norm()), E23: b.E23, E31: b.E31, E12: b.E12}
	})
	return all
}

// functions of two quaternions: products of either order with either operand
// reversed, and componentwise ones.
func binary() []hypothesis {
	var all []hypothesis
	invert := func(r rotor.Rotor) rotor.Rotor { return r.Reverse().Scale(1 / r.Dot(r)) }
	for i := range 8 {
		reading := Reading{Op: Product, Swapped: i&1 != 0, Reversed: [2]bool{i&2 != 0, i&4 != 0}}
		multiply := func(a, b rotor.Rotor) rotor.Rotor {
			if reading.Swapped {
				a, b = b, a
			}
			return a.Mul(b)
		}
		all = append(all, hypothesis{reading: reading, eval: func(in, out []float64) {
			a, b := quat(in), quat(in[4:])
			if reading.Reversed[0] {
				a = a.Reverse()
			}
			if reading.Reversed[1] {
				b = b.Reverse()
			}
			putQuat(out, multiply(a, b))
		}})
		if i&6 == 2 || i&6 == 4 {
			quotient := reading
			quotient.Op = Quotient
			all = append(all, hypothesis{reading: quotient, eval: func(in, out []float64) {
				a, b := quat(in), quat(in[4:])
				if reading.Reversed[0] {
					a = invert(a)
				} else {
					b = invert(b)
				}
				putQuat(out, multiply(a, b))
			}})
		}
	}
	all = append(all,
		hypothesis{reading: Reading{Op: Sum}, eval: func(in, out []float64) { putQuat(out, quat(in).Add(quat(in[4:]))) }},
		hypothesis{reading: Reading{Op: Difference}, eval: func(in, out []float64) { putQuat(out, quat(in).Sub(quat(in[4:]))) }},
		hypothesis{reading: Reading{Op: Difference, Swapped: true}, eval: func(in, out []float64) { putQuat(out, quat(in[4:]).Sub(quat(in))) }})
	return all
}

func scaled() []hypothesis {
	return []hypothesis{
		{reading: Reading{Op: Scaled}, eval: func(in, out []float64) { putQuat(out, quat(in).Scale(in[4])) }},
		{reading: Reading{Op: Scaled, Detail: "divided"}, eval: func(in, out []float64) { putQuat(out, quat(in).Scale(1/in[4])) }},
		{reading: Reading{Op: Exponential, Detail: "power"}, sign: true, eval: func(in, out []float64) {
			b := quat(in).Log()
			putQuat(out, rotor.Exp(b.Scale(in[4])))
		}},
	}
}

// halfTurn is half the angle of a rotation, by its shorter way.
func halfTurn(r rotor.Rotor) float64 {
	b := r.Bivector()
	return math.Atan2(b.Norm(), math.Abs(r.S))
}

func measures() []hypothesis {
	of := func(op Op, f func(rotor.Rotor) float64) hypothesis {
		return hypothesis{reading: Reading{Op: op}, eval: func(in, out []float64) { out[0] = f(quat(in)) }}
	}
	return []hypothesis{
		of(Norm, rotor.Rotor.Norm),
		of(NormSquared, func(r rotor.Rotor) float64 { return r.Dot(r) }),
		of(ScalarPart, func(r rotor.Rotor) float64 { return r.S }),
		of(TurnAngle, func(r rotor.Rotor) float64 { return 2 * halfTurn(r) }),
		of(TurnAngle, func(r rotor.Rotor) float64 { return 2 * math.Atan2(r.Bivector().Norm(), r.S) }),
	}
}

func pairMeasures() []hypothesis {
	of := func(reading Reading, f func(a, b rotor.Rotor) float64) hypothesis {
		return hypothesis{reading: reading, eval: func(in, out []float64) { out[0] = f(quat(in), quat(in[4:])) }}
	}
	return []hypothesis{
		of(Reading{Op: Dot}, rotor.Rotor.Dot),
		of(Reading{Op: AngleBetween, Way: Shorter}, func(a, b rotor.Rotor) float64 { return 2 * halfTurn(a.Reverse().Mul(b)) }),
		of(Reading{Op: AngleBetween, Way: AsGiven}, func(a, b rotor.Rotor) float64 {
			return 2 * math.Acos(math.Max(-1, math.Min(1, a.Dot(b)/(a.Norm()*b.Norm()))))
		}),
		of(Reading{Op: AngleBetween, Scale: 0.5, Way: AsGiven}, func(a, b rotor.Rotor) float64 {
			return math.Acos(math.Max(-1, math.Min(1, a.Dot(b)/(a.Norm()*b.Norm()))))
		}),
		of(Reading{Op: AngleBetween, Scale: 0.5, Way: Shorter}, func(a, b rotor.Rotor) float64 { return halfTurn(a.Reverse().Mul(b)) }),
	}
}
