package identify

import (
	"fmt"
	"math"
	"math/rand/v2"
	"strings"

	"dextral/core/convention"
	"dextral/core/matrix"
	"dextral/core/rotor"
)

// Function is a numeric function whose conventions are asked for. Its inputs are
// groups of numbers: 4 for a quaternion, 9 for a matrix row by row, 3 for
// angles or a vector.
type Function struct {
	In        []int // sizes of the groups: {4}, {4, 4}, {9}, {3}, {4, 3} or {9, 3}
	Out       int   // numbers of the result: 4, 9 or 3
	Eval      func(in, out []float64)
	Tolerance float64 // largest error of a result of size one; 0 for 1e-9. A function that computes in float32 needs 1e-5
}

// Norm says what a function does with a quaternion that is not of norm one.
type Norm uint8

// The three formulas of one rotation: the sandwich divided by the square of the
// norm, the sandwich itself, which scales, and what remains of either when
// the norm is put to one beforehand, which shears.
const (
	AnyNorm Norm = iota // not asked
	Normalising
	Homogeneous
	UnitOnly
)

func (n Norm) String() string {
	return [...]string{"", "for any norm", "scaling by the square of the norm", "for unit norm only"}[n]
}

// FunctionReading is one thing that a function may compute.
type FunctionReading struct {
	What    string                    // "product", "rotated vector", "matrix of quaternion"...
	Scalars [3]convention.ScalarPlace // of the quaternions among inputs and result, in order
	Swapped bool                      // product b a: Shuster's a b
	Reverse [2]bool                   // the first, the second input is reversed
	Norm    Norm
	Kind    Parameters
	Turns   *Turns
	Unit    convention.Unit
	Error   float64 // largest error over all samples, relative to the size of the result
}

// String words the reading.
func (r FunctionReading) String() string {
	parts := []string{r.What}
	if r.Turns != nil {
		parts = append(parts, r.Turns.String())
	}
	if r.Unit != convention.UnitUnstated {
		parts = append(parts, "in "+r.Unit.String()+"s")
	}
	if r.Swapped {
		parts = append(parts, "of the operands in reverse order (Shuster's product)")
	}
	for i, reversed := range r.Reverse {
		if reversed {
			parts = append(parts, fmt.Sprintf("with input %d reversed", i+1))
		}
	}
	if r.Norm != AnyNorm {
		parts = append(parts, r.Norm.String())
	}
	for _, p := range r.Scalars {
		if p != convention.ScalarUnstated {
			parts = append(parts, strings.Fields(p.String())[0]+" "+strings.Fields(p.String())[1])
		}
	}
	return strings.Join(parts, ", ")
}

// FunctionResult says what a function computes.
type FunctionResult struct {
	Readings []FunctionReading // all that fit every sample; one if it is decided
	Nearest  FunctionReading   // the nearest that does not fit
	Reason   string            // why nothing is said
}

// Decided reports whether exactly one reading fits.
func (r FunctionResult) Decided() bool { return len(r.Readings) == 1 }

// hypothesis is a reading with what it computes. A result up to sign is a
// quaternion whose sign the function may choose.
type hypothesis struct {
	reading FunctionReading
	eval    func(in, out []float64)
	upTo    bool
}

const functionSamples = 12

// Identify tells what f computes, by its values on fixed samples: on the unit
// manifold, and off it for quaternions. Conversions of angles are solved, not
// enumerated: the values at zero and for one angle at a time give axes, signs and
// unit, and six orders are left.
func (f Function) Identify() FunctionResult {
	candidates := f.hypotheses()
	if candidates == nil {
		return FunctionResult{Reason: fmt.Sprintf("no rotation function takes groups of %v numbers and gives %d", f.In, f.Out)}
	}
	s, why := f.sample()
	if why != "" {
		return FunctionResult{Reason: why}
	}
	r := FunctionResult{Nearest: FunctionReading{Error: math.Inf(1)}}
	switch {
	case f.fromThree():
		candidates = append(candidates, f.solveAngles()...)
	case f.toThree():
		r.Readings = f.matchAngles(s)
	}
	for _, h := range candidates {
		h.reading.Error = s.error(h)
		switch {
		case h.reading.Error <= f.tolerance():
			r.Readings = append(r.Readings, h.reading)
		case h.reading.Error < r.Nearest.Error:
			r.Nearest = h.reading
		}
	}
	if len(r.Readings) == 0 {
		r.Reason = "it computes none of the functions known for these numbers"
	}
	return r
}

func (f Function) tolerance() float64 {
	if f.Tolerance > 0 {
		return f.Tolerance
	}
	return 1e-9
}

// fromThree and toThree tell conversions of three numbers.
func (f Function) fromThree() bool { return len(f.In) == 1 && f.In[0] == 3 }
func (f Function) toThree() bool   { return len(f.In) == 1 && f.Out == 3 }

// samples are inputs with the results of a function.
type samples struct{ in, out [][]float64 }

// sample draws the inputs, always the same, and evaluates. A function whose
// result never changes or is not finite says nothing. Conversions of three
// numbers may have no result for large ones: these samples are left out.
func (f Function) sample() (samples, string) {
	g := rand.New(rand.NewPCG(20, 24))
	var s samples
	varies := false
	for i := range functionSamples {
		var in []float64
		for _, size := range f.In {
			in = append(in, f.draw(g, size, i)...)
		}
		out := make([]float64, f.Out)
		f.Eval(append([]float64(nil), in...), out)
		if sum := distance(out, nil, 0); math.IsNaN(sum) || math.IsInf(sum, 0) {
			if f.fromThree() && wide(i) {
				continue
			}
			return s, fmt.Sprintf("its result is not finite for the input %.3g", in)
		}
		s.in, s.out = append(s.in, in), append(s.out, out)
		varies = varies || distance(out, s.out[0], 1) > f.tolerance()
	}
	if !varies {
		return s, "its result is constant"
	}
	return s, ""
}

// wide picks every other sample.
func wide(i int) bool { return i%2 == 1 }

// draw draws one group: a quaternion, of norm one but for every third sample
// of functions that work off the unit manifold too, a rotation matrix, or three
// numbers: small enough to be part of a unit quaternion, or wide enough to be
// degrees.
func (f Function) draw(g *rand.Rand, size, i int) []float64 {
	r, _ := rotor.Rotor{S: g.NormFloat64(), E23: g.NormFloat64(), E31: g.NormFloat64(), E12: g.NormFloat64()}.Unit()
	switch size {
	case 4:
		if i%3 == 2 && !f.toThree() {
			r = r.Scale(0.5 + g.Float64())
		}
		w, x, y, z := r.Quaternion()
		return []float64{w, x, y, z}
	case 9:
		m := make([]float64, 9)
		putMatrix(matrix.FromRotor(r), m)
		return m
	}
	scale := 0.57 // below 1/sqrt 3
	if f.fromThree() && wide(i) {
		scale = 80
	}
	v := make([]float64, size)
	for k := range v {
		v[k] = (2*g.Float64() - 1) * scale
	}
	return v
}

// error is the largest miss of a hypothesis.
func (s samples) error(h hypothesis) float64 {
	worst := 0.0
	for i, in := range s.in {
		want, got := make([]float64, len(s.out[i])), s.out[i]
		h.eval(in, want)
		miss, size := distance(want, got, 1), math.Max(1, distance(want, nil, 0))
		if h.upTo {
			miss = math.Min(miss, distance(want, got, -1))
		}
		if !(miss/size <= worst) { // NaN counts as a miss
			worst = miss / size
		}
	}
	if math.IsNaN(worst) {
		return math.Inf(1)
	}
	return worst
}

// distance is the length of want - sign*got.
func distance(want, got []float64, sign float64) float64 {
	sum := 0.0
	for k, x := range want {
		if sign != 0 {
			x -= sign * got[k]
		}
		sum += x * x
	}
	return math.Sqrt(sum)
}
