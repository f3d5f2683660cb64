package operation

import (
	"math"

	"dextral/core/convention"
	"dextral/core/matrix"
	"dextral/core/rotor"
)

func init() {
	known("vv", "v", vectorPairs)
	known("vv", "s", func() []hypothesis {
		return []hypothesis{
			{reading: Reading{Op: Dot}, eval: func(in, out []float64) { out[0] = vec(in).Dot(vec(in[3:])) }},
			{reading: Reading{Op: Length, Detail: "of the difference"}, eval: func(in, out []float64) { out[0] = vec(in).Sub(vec(in[3:])).Norm() }},
			{reading: Reading{Op: TurnAngle, Detail: "between vectors"}, eval: func(in, out []float64) {
				a, b := vec(in), vec(in[3:])
				out[0] = math.Atan2(a.Cross(b).Norm(), a.Dot(b))
			}},
		}
	})
	known("v", "s", func() []hypothesis {
		return []hypothesis{
			{reading: Reading{Op: Length}, eval: func(in, out []float64) { out[0] = vec(in).Norm() }},
			{reading: Reading{Op: Length, Detail: "squared"}, eval: func(in, out []float64) { out[0] = vec(in).Dot(vec(in)) }},
		}
	})
	known("v", "v", func() []hypothesis {
		return []hypothesis{
			{reading: Reading{Op: UnitVector}, eval: func(in, out []float64) {
				v := vec(in)
				putVec(out, v.Scale(1/v.Norm()))
			}},
		}
	})
	for _, out := range []string{"q", "m", "h"} {
		known("vs", out, func() []hypothesis { return axisAngle(0, 3) })
		known("sv", out, func() []hypothesis { return axisAngle(1, 0) })
		known("vv", out, twoVectors)
		known("v", out, fromVector)
		known(out, "v", toVector)
		known(out, "vs", func() []hypothesis { return axisAngleOf(0, 3) })
		known(out, "sv", func() []hypothesis { return axisAngleOf(1, 0) })
	}
	known("v", "q", func() []hypothesis {
		return []hypothesis{{reading: Reading{Op: PureOf}, eval: func(in, out []float64) {
			out[0] = 0
			copy(out[1:], in)
		}}}
	})
	known("q", "v", func() []hypothesis {
		return []hypothesis{{reading: Reading{Op: VectorPart}, eval: func(in, out []float64) { copy(out, in[1:]) }}}
	})
	known("v", "m", func() []hypothesis {
		var all []hypothesis
		for _, reversed := range [2]bool{false, true} {
			all = append(all, hypothesis{reading: Reading{Op: Skew, Reversed: [2]bool{reversed}}, eval: func(in, out []float64) {
				x, y, z := in[0], in[1], in[2]
				m := matrix.Mat3{{0, -z, y}, {z, 0, -x}, {-y, x, 0}}
				if reversed {
					m = m.Transpose()
				}
				putMatrix(out, m)
			}})
		}
		return all
	})
	known("vvs", "v", rodrigues)
	known("vsv", "v", func() []hypothesis { return reorder(rodrigues(), 0, 1, 2, 6, 3, 4, 5) })
}

// reorder makes hypotheses of another order of the numbers that go in: to[i] is
// where number i goes.
func reorder(list []hypothesis, to ...int) []hypothesis {
	for i := range list {
		eval := list[i].eval
		list[i].eval = func(in, out []float64) {
			moved := make([]float64, len(in))
			for k, x := range in {
				moved[to[k]] = x
			}
			eval(moved, out)
		}
	}
	return list
}

func vectorPairs() []hypothesis {
	of := func(r Reading, f func(a, b rotor.Vec) rotor.Vec) hypothesis {
		return hypothesis{reading: r, eval: func(in, out []float64) { putVec(out, f(vec(in), vec(in[3:]))) }}
	}
	return []hypothesis{
		of(Reading{Op: Cross}, rotor.Vec.Cross),
		of(Reading{Op: Cross, Swapped: true}, func(a, b rotor.Vec) rotor.Vec { return b.Cross(a) }),
		of(Reading{Op: Sum}, rotor.Vec.Add),
		of(Reading{Op: Difference}, rotor.Vec.Sub),
	}
}

// units are those of angles.
var units = [2]convention.Unit{convention.Radian, convention.Degree}

// scales are what a slip with a half makes of a turn.
var scales = [3]float64{1, 0.5, 2}

func axisAngle(v, s int) []hypothesis {
	var all []hypothesis
	for _, unit := range units {
		for _, scale := range scales {
			for _, reversed := range [2]bool{false, true} {
				for _, f := range [2]Formula{UnitOnly, Normalising} {
					reading := Reading{Op: FromAxisAngle, Unit: unit, Scale: scale, Formula: f, Reversed: [2]bool{reversed}}
					all = append(all, hypothesis{reading: reading, eval: func(in, out []float64) {
						axis, a := vec(in[v:]), in[s]*unit.InRadians()*scale
						if reversed {
							a = -a
						}
						putAxisAngle(out, axis, a, f)
					}, sign: false})
				}
			}
		}
	}
	return all
}

// putAxisAngle writes the rotation as a quaternion or a matrix. Of an axis that
// is not a unit vector the plain formulas make what they make.
func putAxisAngle(out []float64, axis rotor.Vec, a float64, f Formula) {
	if f == Normalising {
		axis = axis.Scale(1 / axis.Norm())
	}
	sin, cos := math.Sincos(a / 2)
	if len(out) == 4 {
		putQuat(out, rotor.FromQuaternion(cos, axis.X*sin, axis.Y*sin, axis.Z*sin))
		return
	}
	sin, cos = math.Sincos(a)
	x, y, z, t := axis.X, axis.Y, axis.Z, 1-cos
	put(out, matrix.Mat3{
		{cos + x*x*t, x*y*t - z*sin, x*z*t + y*sin},
		{x*y*t + z*sin, cos + y*y*t, y*z*t - x*sin},
		{x*z*t - y*sin, y*z*t + x*sin, cos + z*z*t},
	})
}

// rodrigues turns a vector about an axis; swapped if the axis comes first.
func rodrigues() []hypothesis {
	var all []hypothesis
	for _, swapped := range [2]bool{false, true} {
		for _, unit := range units {
			for _, reversed := range [2]bool{false, true} {
				for _, f := range [2]Formula{UnitOnly, Normalising} {
					reading := Reading{Op: RotateVector, Unit: unit, Reversed: [2]bool{reversed}, Swapped: swapped, Formula: f, Detail: "about an axis"}
					all = append(all, hypothesis{reading: reading, eval: func(in, out []float64) {
						v, axis := vec(in), vec(in[3:])
						if swapped {
							v, axis = axis, v
						}
						a := in[6] * unit.InRadians()
						if reversed {
							a = -a
						}
						var m [9]float64
						putAxisAngle(m[:], axis, a, f)
						putVec(out, mat(m[:]).Apply(v))
					}})
				}
			}
		}
	}
	return all
}

// rotationIn takes the rotation out of a quaternion or a matrix.
func rotationIn(n []float64) rotor.Rotor {
	if len(n) == 4 {
		r, _ := quat(n).Unit()
		return r
	}
	return block(n).Rotor()
}

func putRotation(out []float64, r rotor.Rotor) {
	if len(out) == 4 {
		putQuat(out, r)
		return
	}
	put(out, matrix.FromRotor(r))
}

// axisAngleOf compares axis and angle as a rotation: both may change sign.
func axisAngleOf(v, s int) []hypothesis {
	var all []hypothesis
	for _, unit := range units {
		for _, reversed := range [2]bool{false, true} {
			for _, scale := range scales {
				reading := Reading{Op: AxisAngleOf, Unit: unit, Reversed: [2]bool{reversed}, Scale: scale}
				all = append(all, hypothesis{reading: reading, miss: func(in, out []float64) float64 {
					want := rotationIn(in)
					if reversed {
						want = want.Reverse()
					}
					var q [4]float64
					putAxisAngle(q[:], vec(out[v:]), out[s]*unit.InRadians()/scale, UnitOnly)
					return apart(quat(q[:]), want)
				}})
			}
		}
	}
	return all
}

// apart is the distance of two quaternions, of either sign.
func apart(a, b rotor.Rotor) float64 {
	d, e := a.Sub(b), a.Add(b)
	m := math.Sqrt(math.Min(d.Dot(d), e.Dot(e)))
	if math.IsNaN(m) {
		return math.Inf(1)
	}
	return m
}

// threes are the three-number forms of a rotation other than angles.
var threes = []struct {
	to, from Op
	unit     convention.Unit
	vector   func(rotor.Rotor) rotor.Vec
	rotor    func(rotor.Vec) rotor.Rotor
}{
	{RotvecOf, FromRotvec, convention.Radian, rotor.Rotor.RotationVector, rotor.FromRotationVector},
	{RotvecOf, FromRotvec, convention.Degree,
		func(r rotor.Rotor) rotor.Vec { return r.RotationVector().Scale(180 / math.Pi) },
		func(v rotor.Vec) rotor.Rotor { return rotor.FromRotationVector(v.Scale(math.Pi / 180)) }},
	{Gibbs, FromGibbs, 0, func(r rotor.Rotor) rotor.Vec { v, _ := r.Gibbs(); return v }, rotor.FromGibbs},
	{MRP, FromMRP, 0, rotor.Rotor.MRP, rotor.FromMRP},
}

func fromVector() []hypothesis {
	var all []hypothesis
	for _, k := range threes {
		for _, reversed := range [2]bool{false, true} {
			all = append(all, hypothesis{reading: Reading{Op: k.from, Unit: k.unit, Reversed: [2]bool{reversed}}, sign: true, eval: func(in, out []float64) {
				r := k.rotor(vec(in))
				if reversed {
					r = r.Reverse()
				}
				putRotation(out, r)
			}})
		}
	}
	all = append(all, hypothesis{reading: Reading{Op: FromRotvec, Scale: 2}, eval: func(in, out []float64) {
		putRotation(out, rotor.FromRotationVector(vec(in).Scale(2)))
	}}, hypothesis{reading: Reading{Op: FromRotvec, Scale: 0.5}, eval: func(in, out []float64) {
		putRotation(out, rotor.FromRotationVector(vec(in).Scale(0.5)))
	}})
	return all
}

func toVector() []hypothesis {
	var all []hypothesis
	for _, k := range threes {
		for _, reversed := range [2]bool{false, true} {
			all = append(all, hypothesis{reading: Reading{Op: k.to, Unit: k.unit, Reversed: [2]bool{reversed}}, miss: func(in, out []float64) float64 {
				r := rotationIn(in)
				if reversed {
					r = r.Reverse()
				}
				return apart(k.rotor(vec(out)), r) // the vector of a turn the long way round is as good
			}})
		}
	}
	for axis := range 3 {
		for _, reversed := range [2]bool{false, true} {
			all = append(all, hypothesis{reading: Reading{Op: RotateVector, Axis: "xyz"[axis : axis+1], Reversed: [2]bool{reversed}}, eval: func(in, out []float64) {
				m := matrix.FromRotor(rotationIn(in))
				if len(in) != 4 {
					m = block(in)
				}
				if reversed {
					putVec(out, m.Row(axis))
				} else {
					putVec(out, m.Column(axis))
				}
			}})
		}
	}
	return all
}

// twoVectors turn the first onto the second the shortest way, or the other way
// round.
func twoVectors() []hypothesis {
	var all []hypothesis
	for _, reversed := range [2]bool{false, true} {
		all = append(all, hypothesis{reading: Reading{Op: TwoVectors, Reversed: [2]bool{reversed}}, sign: true, eval: func(in, out []float64) {
			a, b := vec(in), vec(in[3:])
			a, b = a.Scale(1/a.Norm()), b.Scale(1/b.Norm())
			if reversed {
				a, b = b, a
			}
			c := a.Cross(b)
			r, _ := rotor.FromQuaternion(1+a.Dot(b), c.X, c.Y, c.Z).Unit()
			putRotation(out, r)
		}})
	}
	return all
}
