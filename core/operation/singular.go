package operation

import (
	"math"

	"dextral/core/matrix"
	"dextral/core/rotor"
)

// point is a value of an operand where formulas tend to fail.
type point struct {
	note    string
	numbers []float64
}

var half = math.Sqrt(0.5)

func quaternionPoints() []point {
	return []point{
		{"identity", []float64{1, 0, 0, 0}}, {"identity with the sign changed", []float64{-1, 0, 0, 0}},
		{"180 deg about x", []float64{0, 1, 0, 0}}, {"180 deg about y", []float64{0, 0, 1, 0}}, {"180 deg about z", []float64{0, 0, 0, 1}},
		{"180 deg about an oblique axis", []float64{0, 0.48, 0.6, 0.64}},
		{"90 deg about x", []float64{half, half, 0, 0}}, {"90 deg about y", []float64{half, 0, half, 0}}, {"90 deg about z", []float64{half, 0, 0, half}},
		{"-90 deg about y", []float64{half, 0, -half, 0}}, {"-90 deg about x", []float64{half, -half, 0, 0}},
		{"120 deg about the diagonal", []float64{0.5, 0.5, 0.5, 0.5}}, {"turned by 120 deg to pitch 90 deg", []float64{0.5, -0.5, 0.5, 0.5}},
		{"zero", []float64{0, 0, 0, 0}},
	}
}

// matrixPoints are the matrices of the same rotations.
func matrixPoints(n int) []point {
	var all []point
	for _, p := range quaternionPoints() {
		m := make([]float64, n*n)
		if p.note != "zero" {
			r := matrix.FromRotor(rotor.FromQuaternion(p.numbers[0], p.numbers[1], p.numbers[2], p.numbers[3]))
			for i := range 3 {
				copy(m[n*i:], r[i][:])
			}
			m[n*n-1] = 1
			if n == 3 {
				m[8] = r[2][2]
			}
		}
		all = append(all, point{p.note, m})
	}
	return all
}

func threePoints() []point {
	h := math.Pi / 2
	return []point{
		{"zero", []float64{0, 0, 0}},
		{"x", []float64{1, 0, 0}}, {"y", []float64{0, 1, 0}}, {"z", []float64{0, 0, 1}},
		{"-x", []float64{-1, 0, 0}}, {"-y", []float64{0, -1, 0}}, {"-z", []float64{0, 0, -1}},
		{"90 deg in the second", []float64{0.3, h, 0.5}}, {"-90 deg in the second", []float64{0.3, -h, 0.5}},
		{"180 deg in the first", []float64{math.Pi, 0, 0}},
	}
}

func scalarPoints() []point {
	return []point{{"0", []float64{0}}, {"1", []float64{1}}, {"0.5", []float64{0.5}}, {"pi", []float64{math.Pi}}, {"-pi", []float64{-math.Pi}}, {"2 pi", []float64{2 * math.Pi}}}
}

func pointsOf(o Operand) []point {
	switch o.Kind {
	case Quaternion:
		return quaternionPoints()
	case Matrix3:
		return matrixPoints(3)
	case Matrix4:
		return matrixPoints(4)
	case Three:
		return threePoints()
	case Scalar:
		return scalarPoints()
	}
	return []point{{"zero", make([]float64, o.Size)}}
}

// singular lists every point of each operand beside an ordinary value of the others,
// and of two operands of one kind the pairs of equal, opposite and negated ones.
func singular(in []Operand) []Sample {
	g := newSource(7)
	ordinary := make([][]float64, len(in))
	for i, o := range in {
		ordinary[i] = g.operand(o, in, Unit, i)
	}
	var all []Sample
	add := func(note string, at map[int][]float64) {
		s := Sample{Family: Singular, Note: note}
		for i, o := range in {
			n, ok := at[i]
			if !ok {
				n = ordinary[i]
			}
			s.In = append(s.In, o.stored(n)...)
		}
		all = append(all, s)
	}
	for i, o := range in {
		for _, p := range pointsOf(o) {
			add(p.note, map[int][]float64{i: p.numbers})
		}
	}
	for i := range in {
		for j := i + 1; j < len(in); j++ {
			if in[i].Kind != in[j].Kind || in[i].Kind != Three && in[i].Kind != Quaternion {
				continue
			}
			negative := make([]float64, len(ordinary[i]))
			for k, x := range ordinary[i] {
				negative[k] = -x
			}
			add("both equal", map[int][]float64{j: ordinary[i]})
			add("the second is the negative of the first", map[int][]float64{j: negative})
			for k := range min(3, len(ordinary[i])) {
				p, q := make([]float64, len(ordinary[i])), make([]float64, len(ordinary[i]))
				p[k], q[k] = 1, -1
				add("opposite along axis "+"xyz"[k:k+1], map[int][]float64{i: p, j: q})
			}
		}
	}
	return all
}
