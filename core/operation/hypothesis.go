package operation

import (
	"math"
	"sync"

	"dextral/core/matrix"
	"dextral/core/rotor"
)

// hypothesis is a reading with what it computes, on canonical numbers.
type hypothesis struct {
	reading Reading
	eval    func(in, out []float64)
	sign    bool                            // the result is a quaternion of either sign
	slack   func(in []float64) float64      // by how much an honest approximation may miss
	miss    func(in, out []float64) float64 // instead of comparing numbers
	valid   func(in []float64) bool         // where the operation is defined; nil: everywhere
}

// error is how far a result is from what the hypothesis gives, relative to its size;
// NaN where the hypothesis says nothing.
func (h *hypothesis) error(in, out []float64, scratch []float64) float64 {
	if h.valid != nil && !h.valid(in) {
		return math.NaN()
	}
	if h.miss != nil {
		return h.miss(in, out)
	}
	want := scratch[:len(out)]
	h.eval(in, want)
	miss, other, size := 0.0, 0.0, 0.0
	for i, x := range want {
		miss += (x - out[i]) * (x - out[i])
		other += (x + out[i]) * (x + out[i])
		size += x * x
	}
	if h.sign {
		miss = math.Min(miss, other)
	}
	e := math.Sqrt(miss) / math.Max(1, math.Sqrt(size))
	if h.slack != nil {
		e = math.Max(0, e-h.slack(in))
	}
	if math.IsNaN(e) {
		return math.Inf(1)
	}
	return e
}

// tables holds what is known for each shape, made when it is first asked for.
var tables sync.Map // Shape -> []hypothesis

// hypotheses lists what a function of this shape may compute, except what
// is solved from its values; see solvers.
func (s Shape) hypotheses() []hypothesis {
	if t, ok := tables.Load(s); ok {
		return t.([]hypothesis)
	}
	var all []hypothesis
	if build := builders[s]; build != nil {
		all = build()
	}
	t, _ := tables.LoadOrStore(s, all)
	return t.([]hypothesis)
}

// Known reports whether any operation of this shape is known.
func (s Shape) Known() bool { return builders[s] != nil || solvers[s] != nil }

// builders make the hypotheses of each shape. Letters: s scalar, v three numbers,
// q four, m and h matrices of nine and sixteen.
var builders = map[Shape]func() []hypothesis{}

func known(in, out string, build func() []hypothesis) {
	s := Shape{in, out}
	if before := builders[s]; before != nil {
		builders[s] = func() []hypothesis { return append(before(), build()...) }
		return
	}
	builders[s] = build
}

// Canonical numbers to rotors, vectors and matrices and back.

func quat(n []float64) rotor.Rotor { return rotor.FromQuaternion(n[0], n[1], n[2], n[3]) }

func putQuat(out []float64, r rotor.Rotor) { out[0], out[1], out[2], out[3] = r.Quaternion() }

func vec(n []float64) rotor.Vec { return rotor.Vec{X: n[0], Y: n[1], Z: n[2]} }

func putVec(out []float64, v rotor.Vec) { out[0], out[1], out[2] = v.X, v.Y, v.Z }

func mat(n []float64) (m matrix.Mat3) {
	for i := range 3 {
		copy(m[i][:], n[3*i:])
	}
	return m
}

// put writes a 3x3 matrix into nine numbers, or into sixteen as a rotation of
// homogeneous coordinates.
func put(out []float64, m matrix.Mat3) {
	if len(out) == 9 {
		putMatrix(out, m)
		return
	}
	clear(out)
	for i := range 3 {
		copy(out[4*i:], m[i][:])
	}
	out[15] = 1
}

// block is the 3x3 of nine or sixteen numbers.
func block(n []float64) matrix.Mat3 {
	if len(n) == 9 {
		return mat(n)
	}
	var m matrix.Mat3
	for i := range 3 {
		copy(m[i][:], n[4*i:4*i+3])
	}
	return m
}
