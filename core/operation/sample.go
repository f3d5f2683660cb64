package operation

import (
	"math"
	"math/rand/v2"

	"dextral/core/matrix"
	"dextral/core/rotor"
)

// Family says where a sample lies.
type Family uint8

// The families; see the package documentation.
const (
	Unit Family = iota
	Wide
	Tiny
	General
	Singular
	families
)

var familyNames = [...]string{"unit", "wide", "tiny", "general", "singular"}

func (f Family) String() string { return familyNames[f] }

// Sample is one evaluation of a function.
type Sample struct {
	Family Family
	Note   string    // of a singular sample: which point it is
	In     []float64 // operand after operand
	Out    []float64 // the same; NaN where nothing came out
	OK     bool      // the function returned, without an error
	Path   string    // the branches taken: equal for samples that took the same
}

// source draws samples, always the same ones.
type source struct{ *rand.Rand }

func newSource(seed uint64) source { return source{rand.New(rand.NewPCG(seed, 24))} }

// Draw returns n samples of a family for the given operands, to be evaluated.
// Equal arguments give equal samples.
func Draw(in []Operand, f Family, n int, seed uint64) []Sample {
	if f == Singular {
		return singular(in)
	}
	g := newSource(seed*uint64(families) + uint64(f))
	samples := make([]Sample, n)
	for i := range samples {
		var numbers []float64
		near := f == Tiny && pair(in)
		var first rotor.Rotor
		for _, o := range in {
			n := g.operand(o, in, f, i)
			switch {
			case near && o.Kind == Quaternion:
				first = g.near(first, i)
				n[0], n[1], n[2], n[3] = first.Quaternion()
			case near && o.Kind == Scalar:
				n[0] = g.scalar(Unit, i)
			}
			numbers = append(numbers, o.stored(n)...)
		}
		samples[i] = Sample{Family: f, In: numbers}
	}
	return samples
}

// pair reports whether there are two quaternions: then Tiny is how far they are
// apart.
func pair(in []Operand) bool {
	n := 0
	for _, o := range in {
		if o.Kind == Quaternion {
			n++
		}
	}
	return n == 2
}

// near is any rotation, or one that is up to some degrees from the given one; every
// other time with the opposite sign.
func (g source) near(first rotor.Rotor, i int) rotor.Rotor {
	if first == (rotor.Rotor{}) {
		return g.rotor(Unit)
	}
	r := first.Mul(rotor.FromRotationVector(g.vector(g.between(1e-3, 0.06))))
	if i%2 == 1 {
		r = r.Neg()
	}
	return r
}

// stored puts canonical numbers of a quaternion into the order of its operand.
func (o Operand) stored(n []float64) []float64 {
	if o.Kind != Quaternion || !o.Order.Known() {
		return n
	}
	out := make([]float64, 4)
	o.Order.store(n, out)
	return out
}

func (g source) operand(o Operand, all []Operand, f Family, i int) []float64 {
	switch o.Kind {
	case Quaternion:
		return g.quaternion(f, i)
	case Matrix3:
		return g.matrix3(f, i)
	case Matrix4:
		return g.matrix4(f, i)
	case Three:
		return g.three(f, i, unitVectors(all))
	case Scalar:
		return []float64{g.scalar(f, i)}
	}
	n := make([]float64, o.Size)
	for k := range n {
		n[k] = g.between(-1, 1)
	}
	return n
}

// unitVectors reports whether vectors of a function with these operands may have
// to be of unit length: axes, and directions between which to turn.
func unitVectors(all []Operand) bool {
	for _, o := range all {
		if o.Kind != Three && o.Kind != Scalar {
			return false
		}
	}
	return len(all) > 1
}

func (g source) between(a, b float64) float64 { return a + (b-a)*g.Float64() }

// rotor is any rotation, or with Tiny one by less than a milliradian. Its
// quaternion never is in the plane of two axes.
func (g source) rotor(f Family) rotor.Rotor {
	if f == Tiny {
		v := g.vector(g.between(1e-5, 1e-3))
		return rotor.FromRotationVector(v)
	}
	for {
		r, ok := rotor.Rotor{S: g.NormFloat64(), E23: g.NormFloat64(), E31: g.NormFloat64(), E12: g.NormFloat64()}.Unit()
		if ok && min(math.Abs(r.S), math.Abs(r.E23), math.Abs(r.E31), math.Abs(r.E12)) > 0.05 {
			return r
		}
	}
}

// vector has a random direction and the given length.
func (g source) vector(length float64) rotor.Vec {
	for {
		v, ok := rotor.Vec{X: g.NormFloat64(), Y: g.NormFloat64(), Z: g.NormFloat64()}.Unit()
		if ok && min(math.Abs(v.X), math.Abs(v.Y), math.Abs(v.Z)) > 0.05 {
			return v.Scale(length)
		}
	}
}

func (g source) quaternion(f Family, _ int) []float64 {
	r := g.rotor(f)
	if f == General {
		r = r.Scale(g.between(0.6, 1.6))
	}
	w, x, y, z := r.Quaternion()
	return []float64{w, x, y, z}
}

func (g source) matrix3(f Family, i int) []float64 {
	m := make([]float64, 9)
	if f == General {
		for k := range m {
			m[k] = g.between(-1, 1)
			if k%4 == 0 {
				m[k] += 1.5 // far from singular
			}
		}
		return m
	}
	putMatrix(m, matrix.FromRotor(g.rotor(f)))
	return m
}

// matrix4 is a rigid transform: without translation, because what turns directions
// alone need not respect one, and with Wide also with one in the last column or row.
func (g source) matrix4(f Family, i int) []float64 {
	m := make([]float64, 16)
	if f == General {
		for k := range m {
			m[k] = g.between(-1, 1)
			if k%5 == 0 {
				m[k] += 2
			}
		}
		return m
	}
	r := matrix.FromRotor(g.rotor(f))
	for row := range 3 {
		copy(m[4*row:], r[row][:])
	}
	m[15] = 1
	if f == Wide && i%3 > 0 {
		for k := range 3 {
			m[[]int{0, 4*k + 3, 12 + k}[i%3]] = g.between(-2, 2)
		}
	}
	return m
}

// three is a vector or three angles: within a unit quaternion's vector part,
// or wide enough for degrees.
func (g source) three(f Family, i int, unit bool) []float64 {
	length := g.between(0.4, 0.95)
	switch {
	case f == General:
		length = g.between(0.5, 2.5)
	case unit:
		length = 1
	case f == Wide && i%2 == 0:
		return []float64{g.between(-80, 80), g.between(-80, 80), g.between(-80, 80)}
	case f == Wide:
		return []float64{g.between(-1.4, 1.4), g.between(-1.4, 1.4), g.between(-1.4, 1.4)}
	case f == Tiny:
		length = g.between(1e-5, 1e-3)
	}
	v := g.vector(length)
	return []float64{v.X, v.Y, v.Z}
}

// scalar is a fraction of a way or a small angle, or an angle of any size.
func (g source) scalar(f Family, i int) float64 {
	switch {
	case f == Wide && i%2 == 0:
		return g.between(-170, 170)
	case f == Wide:
		return g.between(-3, 3)
	case f == Tiny:
		return g.between(1e-5, 1e-3)
	}
	return g.between(0.05, 0.95)
}

func putMatrix(out []float64, m matrix.Mat3) {
	for i := range 3 {
		copy(out[3*i:3*i+3], m[i][:])
	}
}
