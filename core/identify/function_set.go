package identify

import (
	"math"
	"slices"

	"dextral/core/convention"
	"dextral/core/matrix"
	"dextral/core/rotor"
)

var places = [2]convention.ScalarPlace{convention.ScalarFirst, convention.ScalarLast}

// readRotor takes a rotor from four numbers, as putRotor writes it.
func readRotor(n []float64, p convention.ScalarPlace) rotor.Rotor {
	if p == convention.ScalarLast {
		return rotor.FromQuaternion(n[3], n[0], n[1], n[2])
	}
	return rotor.FromQuaternion(n[0], n[1], n[2], n[3])
}

func putRotor(r rotor.Rotor, out []float64, p convention.ScalarPlace) {
	w, x, y, z := r.Quaternion()
	if p == convention.ScalarLast {
		out[0], out[1], out[2], out[3] = x, y, z, w
		return
	}
	out[0], out[1], out[2], out[3] = w, x, y, z
}

func readMatrix(n []float64) matrix.Mat3 {
	m, _ := matrix.FromFlat(n[:9], convention.RowMajor)
	return m
}

func putMatrix(m matrix.Mat3, out []float64) {
	for i := range 3 {
		copy(out[3*i:3*i+3], m[i][:])
	}
}

func putVec(v rotor.Vec, out []float64) { out[0], out[1], out[2] = v.X, v.Y, v.Z }

func readVec(n []float64) rotor.Vec { return rotor.Vec{X: n[0], Y: n[1], Z: n[2]} }

// hypotheses lists what a function of this shape may compute; nil if nothing
// is known. Angles are not among them: see solveAngles and matchAngles.
func (f Function) hypotheses() []hypothesis {
	switch {
	case slices.Equal(f.In, []int{4}) && f.Out == 4:
		return unary()
	case slices.Equal(f.In, []int{4, 4}) && f.Out == 4:
		return products()
	case slices.Equal(f.In, []int{4}) && f.Out == 9:
		return toMatrix()
	case slices.Equal(f.In, []int{9}) && f.Out == 4:
		return fromMatrix()
	case slices.Equal(f.In, []int{4, 3}) && f.Out == 3:
		return rotations()
	case slices.Equal(f.In, []int{9, 3}) && f.Out == 3:
		return matrixRotations()
	case slices.Equal(f.In, []int{4}) && f.Out == 3, slices.Equal(f.In, []int{9}) && f.Out == 3:
		return toVector(f.In[0])
	case slices.Equal(f.In, []int{3}) && (f.Out == 4 || f.Out == 9):
		return fromVector(f.Out)
	}
	return nil
}

// unary are the functions of one quaternion. On the unit manifold inverse and
// conjugate are one; the samples off it tell.
func unary() []hypothesis {
	functions := []struct {
		what string
		of   func(rotor.Rotor) rotor.Rotor
	}{
		{"identity", func(r rotor.Rotor) rotor.Rotor { return r }},
		{"negative", rotor.Rotor.Neg},
		{"conjugate", rotor.Rotor.Reverse},
		{"negative of the conjugate", func(r rotor.Rotor) rotor.Rotor { return r.Reverse().Neg() }},
		{"inverse", func(r rotor.Rotor) rotor.Rotor { return r.Reverse().Scale(1 / r.Dot(r)) }},
		{"unit quaternion", func(r rotor.Rotor) rotor.Rotor { return r.Scale(1 / r.Norm()) }},
		{"square", func(r rotor.Rotor) rotor.Rotor { return r.Mul(r) }},
	}
	var all []hypothesis
	for _, u := range functions {
		for _, in := range places {
			for _, out := range places {
				if in != out && u.what != "identity" || in == out && in == convention.ScalarLast && placeless(u.what) {
					continue // a change of place with something else is no known function
				}
				reading := FunctionReading{What: u.what, Scalars: [3]convention.ScalarPlace{in, out}}
				if in == out && placeless(u.what) {
					reading.Scalars = [3]convention.ScalarPlace{}
				}
				all = append(all, hypothesis{reading, func(x, y []float64) { putRotor(u.of(readRotor(x, in)), y, out) }, false})
			}
		}
	}
	return all
}

// placeless reports whether a function is the same wherever the scalar stands.
func placeless(what string) bool {
	return what == "identity" || what == "negative" || what == "unit quaternion"
}

func products() []hypothesis {
	var all []hypothesis
	for _, p := range places {
		for _, q := range places {
			for _, o := range places {
				for i := range 8 {
					reading := FunctionReading{
						What: "product", Scalars: [3]convention.ScalarPlace{p, q, o},
						Swapped: i&1 != 0, Reverse: [2]bool{i&2 != 0, i&4 != 0},
					}
					all = append(all, hypothesis{reading, func(in, out []float64) {
						a, b := readRotor(in, p), readRotor(in[4:], q)
						if reading.Reverse[0] {
							a = a.Reverse()
						}
						if reading.Reverse[1] {
							b = b.Reverse()
						}
						if reading.Swapped {
							a, b = b, a
						}
						putRotor(a.Mul(b), out, o)
					}, false})
				}
			}
		}
	}
	return all
}

// rotation is the matrix of r by one of the three formulas.
func (n Norm) rotation(r rotor.Rotor) matrix.Mat3 {
	square := r.Dot(r)
	switch n {
	case UnitOnly:
		return matrix.FromRotor(r)
	case Homogeneous:
		return matrix.FromRotor(r.Scale(1 / math.Sqrt(square))).Scale(square)
	}
	return matrix.FromRotor(r.Scale(1 / math.Sqrt(square)))
}

// formulas runs over scalar place, direction and formula.
func formulas(each func(p convention.ScalarPlace, reversed bool, n Norm)) {
	for _, p := range places {
		for _, reversed := range [2]bool{false, true} {
			for _, n := range [3]Norm{Normalising, Homogeneous, UnitOnly} {
				each(p, reversed, n)
			}
		}
	}
}

func toMatrix() []hypothesis {
	var all []hypothesis
	formulas(func(p convention.ScalarPlace, reversed bool, n Norm) {
		reading := FunctionReading{What: "matrix of quaternion", Scalars: [3]convention.ScalarPlace{p}, Reverse: [2]bool{reversed}, Norm: n}
		all = append(all, hypothesis{reading, func(in, out []float64) {
			m := n.rotation(readRotor(in, p))
			if reversed {
				m = m.Transpose()
			}
			putMatrix(m, out)
		}, false})
	})
	return all
}

func rotations() []hypothesis {
	var all []hypothesis
	formulas(func(p convention.ScalarPlace, reversed bool, n Norm) {
		reading := FunctionReading{What: "rotated vector", Scalars: [3]convention.ScalarPlace{p}, Reverse: [2]bool{reversed}, Norm: n}
		all = append(all, hypothesis{reading, func(in, out []float64) {
			m := n.rotation(readRotor(in, p))
			if reversed {
				m = m.Transpose()
			}
			putVec(m.Apply(readVec(in[4:])), out)
		}, false})
	})
	return all
}

func fromMatrix() []hypothesis {
	var all []hypothesis
	for _, p := range places {
		for _, reversed := range [2]bool{false, true} {
			reading := FunctionReading{What: "quaternion of matrix", Scalars: [3]convention.ScalarPlace{p}, Reverse: [2]bool{reversed}}
			all = append(all, hypothesis{reading, func(in, out []float64) {
				r := readMatrix(in).Rotor()
				if reversed {
					r = r.Reverse()
				}
				putRotor(r, out, p)
			}, true})
		}
	}
	return all
}

func matrixRotations() []hypothesis {
	var all []hypothesis
	for _, reversed := range [2]bool{false, true} {
		reading := FunctionReading{What: "rotated vector", Reverse: [2]bool{reversed}}
		all = append(all, hypothesis{reading, func(in, out []float64) {
			m := readMatrix(in)
			if reversed {
				m = m.Transpose()
			}
			putVec(m.Apply(readVec(in[9:])), out)
		}, false})
	}
	return all
}

// threes are the three-number rotations with their unit.
var threes = []struct {
	kind Parameters
	unit convention.Unit
}{
	{AxisTimesAngle, convention.Radian}, {AxisTimesAngle, convention.Degree}, {Gibbs, 0}, {MRP, 0}, {VectorPart, 0},
}

// vector are the three numbers of a rotation, and rotor is the way back.
func (p Parameters) vector(r rotor.Rotor, unit convention.Unit) rotor.Vec {
	switch p {
	case Gibbs:
		v, _ := r.Gibbs()
		return v
	case MRP:
		return r.MRP()
	case VectorPart:
		_, x, y, z := r.Quaternion()
		return rotor.Vec{X: x, Y: y, Z: z}
	}
	return r.RotationVector().Scale(1 / unit.InRadians())
}

func (p Parameters) rotor(v rotor.Vec, unit convention.Unit) rotor.Rotor {
	switch p {
	case Gibbs:
		return rotor.FromGibbs(v)
	case MRP:
		return rotor.FromMRP(v)
	case VectorPart:
		return rotor.FromQuaternion(math.Sqrt(max(0, 1-v.Dot(v))), v.X, v.Y, v.Z)
	}
	return rotor.FromRotationVector(v.Scale(unit.InRadians()))
}

func toVector(from int) []hypothesis {
	var all []hypothesis
	for _, k := range threes {
		for _, in := range inputs(from) {
			reading := FunctionReading{What: k.kind.String(), Kind: k.kind, Unit: k.unit, Scalars: [3]convention.ScalarPlace{in.place}, Reverse: [2]bool{in.reversed}}
			all = append(all, hypothesis{reading, func(x, out []float64) {
				putVec(k.kind.vector(in.rotor(x), k.unit), out)
			}, false})
		}
	}
	return all
}

func fromVector(to int) []hypothesis {
	var all []hypothesis
	for _, k := range threes {
		for _, o := range inputs(to) {
			reading := FunctionReading{What: "rotation of " + k.kind.String(), Kind: k.kind, Unit: k.unit, Scalars: [3]convention.ScalarPlace{o.place}, Reverse: [2]bool{o.reversed}}
			all = append(all, hypothesis{reading, func(in, out []float64) {
				o.put(k.kind.rotor(readVec(in), k.unit), out)
			}, to == 4})
		}
	}
	return all
}

// notation is a way to write a rotation: four numbers or nine, or the reverse.
type notation struct {
	place    convention.ScalarPlace // unstated for a matrix
	reversed bool
}

func inputs(size int) []notation {
	if size == 9 {
		return []notation{{0, false}, {0, true}}
	}
	return []notation{
		{convention.ScalarFirst, false}, {convention.ScalarFirst, true},
		{convention.ScalarLast, false}, {convention.ScalarLast, true},
	}
}

func (n notation) rotor(x []float64) rotor.Rotor {
	var r rotor.Rotor
	if n.place == convention.ScalarUnstated {
		if r = readMatrix(x).Rotor(); r.S < 0 {
			r = r.Neg() // the turn by less than half a circle
		}
	} else {
		r, _ = readRotor(x, n.place).Unit()
	}
	if n.reversed {
		return r.Reverse()
	}
	return r
}

func (n notation) put(r rotor.Rotor, out []float64) {
	if n.reversed {
		r = r.Reverse()
	}
	if n.place == convention.ScalarUnstated {
		putMatrix(matrix.FromRotor(r), out)
		return
	}
	putRotor(r, out, n.place)
}
