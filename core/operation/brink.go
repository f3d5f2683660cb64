package operation

import (
	"math"

	"dextral/core/matrix"
	"dextral/core/rotor"
)

// Brink returns samples where formulas fail by rounding alone: rotations whose
// second angle is a right angle in one of the six Tait-Bryan sequences, half turns
// about any axis, the identity, turns too small for a square to be noticed, and of
// two operands of one kind equal ones. Each is given as arithmetic leaves it, so that a
// sine may come out as 1.0000000000000002. All inputs are valid: quaternions and axes
// are of unit length, matrices are rotations, to rounding.
func Brink(in []Operand, n int) []Sample {
	g := newSource(11)
	var all []Sample
	for i, o := range in {
		for _, edge := range edges {
			for range n {
				numbers, ok := g.edge(o, edge)
				if !ok {
					break
				}
				all = append(all, g.beside(in, edge, map[int][]float64{i: numbers}))
			}
		}
		for j := i + 1; j < len(in); j++ {
			if o.Kind != in[j].Kind || o.Kind != Quaternion && o.Kind != Three {
				continue
			}
			for k := range n {
				a, b, note := g.pair(o, in, k)
				all = append(all, g.beside(in, note, map[int][]float64{i: a, j: b}))
			}
		}
	}
	return all
}

// edges are the places, in words.
var edges = []string{
	"90 deg about y between two other turns", "-90 deg about y between two other turns",
	"90 deg about x between two other turns", "-90 deg about x between two other turns",
	"90 deg about z between two other turns", "-90 deg about z between two other turns",
	"180 deg about some axis", "a turn by less than 1e-9 rad", "the identity",
}

// beside completes a sample with ordinary values.
func (g source) beside(in []Operand, note string, at map[int][]float64) Sample {
	s := Sample{Family: Singular, Note: note}
	for i, o := range in {
		n, ok := at[i]
		if !ok {
			n = g.operand(o, in, Unit, 0)
		}
		s.In = append(s.In, o.stored(n)...)
	}
	return s
}

// edge gives an operand that holds a rotation at a place.
func (g source) edge(o Operand, note string) ([]float64, bool) {
	if o.Kind != Quaternion && o.Kind != Matrix3 && o.Kind != Matrix4 {
		return nil, false
	}
	r := g.edgeRotor(note)
	if o.Kind == Quaternion {
		w, x, y, z := r.Quaternion()
		return []float64{w, x, y, z}, true
	}
	size := 3
	if o.Kind == Matrix4 {
		size = 4
	}
	m := make([]float64, size*size)
	rotation := matrix.FromRotor(r)
	for i := range 3 {
		copy(m[size*i:], rotation[i][:])
	}
	if size == 4 {
		m[15] = 1
	}
	return m, true
}

func (g source) edgeRotor(note string) rotor.Rotor {
	switch note {
	case "the identity":
		return rotor.One
	case "180 deg about some axis":
		v := g.vector(1)
		return rotor.FromQuaternion(0, v.X, v.Y, v.Z)
	case "a turn by less than 1e-9 rad":
		return rotor.FromRotationVector(g.vector(math.Pow(10, g.between(-12, -9))))
	}
	axis := map[byte]int{'x': 0, 'y': 1, 'z': 2}[note[len(note)-len("y between two other turns")]]
	a := math.Pi / 2
	if note[0] == '-' {
		a = -a
	}
	first, last := (axis+1)%3, (axis+2)%3
	if g.Float64() < 0.5 {
		first, last = last, first
	}
	// The turns are composed as programs compose them, with their rounding.
	r := aboutAxis(first, g.between(-3, 3), false).Mul(aboutAxis(axis, a, false)).Mul(aboutAxis(last, g.between(-3, 3), false))
	unit, _ := r.Unit()
	return unit
}

// pair is two equal operands, or two that differ by a turn too small to matter.
func (g source) pair(o Operand, in []Operand, k int) (a, b []float64, note string) {
	a = g.operand(o, in, Unit, 0)
	if o.Kind == Quaternion && k%2 == 1 {
		w, x, y, z := quat(a).Mul(rotor.FromRotationVector(g.vector(1e-9))).Quaternion()
		return a, []float64{w, x, y, z}, "two that differ by 1e-9 rad"
	}
	return a, append([]float64(nil), a...), "two equal ones"
}
