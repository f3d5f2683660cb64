package operation

import (
	"math"

	"dextral/core/matrix"
	"dextral/core/rotor"
)

func init() {
	known("qv", "v", func() []hypothesis { return rotate(0, 4) })
	known("vq", "v", func() []hypothesis { return rotate(3, 0) })
	for _, size := range []string{"m", "h"} {
		known("q", size, toMatrix)
		known(size, "q", fromMatrix)
	}
	known("mv", "v", func() []hypothesis { return apply(0, 9) })
	known("vm", "v", func() []hypothesis { return apply(3, 0) })
	known("hv", "v", func() []hypothesis { return applyRigid(0, 16) })
	known("vh", "v", func() []hypothesis { return applyRigid(3, 0) })
	known("hq", "q", func() []hypothesis { return applyFour(0, 16) })
	known("qh", "q", func() []hypothesis { return applyFour(4, 0) })
}

// matrix is that of r by one of the three formulas.
func (f Formula) matrix(r rotor.Rotor) matrix.Mat3 {
	square := r.Dot(r)
	switch f {
	case UnitOnly:
		return matrix.FromRotor(r)
	case Homogeneous:
		return matrix.FromRotor(r.Scale(1 / math.Sqrt(square))).Scale(square)
	}
	return matrix.FromRotor(r.Scale(1 / math.Sqrt(square)))
}

// formulas runs over direction and formula.
func formulas(each func(reversed bool, f Formula)) {
	for _, reversed := range [2]bool{false, true} {
		for _, f := range [3]Formula{Normalising, Homogeneous, UnitOnly} {
			each(reversed, f)
		}
	}
}

func rotate(q, v int) []hypothesis {
	var all []hypothesis
	formulas(func(reversed bool, f Formula) {
		all = append(all, hypothesis{reading: Reading{Op: RotateVector, Reversed: [2]bool{reversed}, Formula: f}, eval: func(in, out []float64) {
			m := f.matrix(quat(in[q:]))
			if reversed {
				m = m.Transpose()
			}
			putVec(out, m.Apply(vec(in[v:])))
		}})
	})
	return all
}

func toMatrix() []hypothesis {
	var all []hypothesis
	formulas(func(reversed bool, f Formula) {
		all = append(all, hypothesis{reading: Reading{Op: ToMatrix, Reversed: [2]bool{reversed}, Formula: f}, eval: func(in, out []float64) {
			m := f.matrix(quat(in))
			if reversed {
				m = m.Transpose()
			}
			put(out, m)
		}})
	})
	return all
}

// proper reports whether nine or sixteen numbers are a rotation.
func proper(n []float64) bool {
	m := block(n)
	e := m.Mul(m.Transpose()).Sub(matrix.Identity).Norm()
	return e < 1e-3 && m.Det() > 0
}

func fromMatrix() []hypothesis {
	var all []hypothesis
	for _, reversed := range [2]bool{false, true} {
		all = append(all, hypothesis{reading: Reading{Op: FromMatrix, Reversed: [2]bool{reversed}}, sign: true, valid: proper, eval: func(in, out []float64) {
			r := block(in).Rotor()
			if reversed {
				r = r.Reverse()
			}
			putQuat(out, r)
		}})
	}
	return all
}

// apply is a matrix, whose numbers start at m, times a vector.
func apply(m, v int) []hypothesis {
	var all []hypothesis
	for _, reversed := range [2]bool{false, true} {
		all = append(all, hypothesis{reading: Reading{Op: RotateVector, Reversed: [2]bool{reversed}, Detail: "by a matrix"}, eval: func(in, out []float64) {
			a := mat(in[m:])
			if reversed {
				a = a.Transpose()
			}
			putVec(out, a.Apply(vec(in[v:])))
		}})
	}
	return all
}

// four returns element i, j of sixteen numbers, or of their transpose.
func four(n []float64, transposed bool, i, j int) float64 {
	if transposed {
		i, j = j, i
	}
	return n[4*i+j]
}

// applyRigid takes a vector for a point, for a direction, or for a point in
// projective coordinates.
func applyRigid(h, v int) []hypothesis {
	var all []hypothesis
	for _, reversed := range [2]bool{false, true} {
		for _, detail := range []string{"a point", "a direction", "a point, divided by its fourth coordinate"} {
			all = append(all, hypothesis{reading: Reading{Op: RotateVector, Reversed: [2]bool{reversed}, Detail: "by a matrix, " + detail}, eval: func(in, out []float64) {
				x := [4]float64{in[v], in[v+1], in[v+2], 1}
				if detail == "a direction" {
					x[3] = 0
				}
				var y [4]float64
				for i := range 4 {
					for j := range 4 {
						y[i] += four(in[h:], reversed, i, j) * x[j]
					}
				}
				if len(detail) > 15 {
					for i := range 3 {
						y[i] /= y[3]
					}
				}
				copy(out, y[:3])
			}})
		}
	}
	return all
}

func applyFour(h, v int) []hypothesis {
	var all []hypothesis
	for _, reversed := range [2]bool{false, true} {
		all = append(all, hypothesis{reading: Reading{Op: LinearMap, Reversed: [2]bool{reversed}, Detail: "4x4 times four numbers"}, eval: func(in, out []float64) {
			for i := range 4 {
				out[i] = 0
				for j := range 4 {
					out[i] += four(in[h:], reversed, i, j) * in[v+j]
				}
			}
		}})
	}
	return all
}
