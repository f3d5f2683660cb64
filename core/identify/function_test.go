package identify

import (
	"math"
	"math/rand/v2"
	"testing"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/core/rotor"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

var functionShapes = []Function{
	{In: []int{4}, Out: 4}, {In: []int{4, 4}, Out: 4}, {In: []int{4}, Out: 9}, {In: []int{9}, Out: 4},
	{In: []int{4, 3}, Out: 3}, {In: []int{9, 3}, Out: 3}, {In: []int{4}, Out: 3}, {In: []int{9}, Out: 3},
	{In: []int{3}, Out: 4}, {In: []int{3}, Out: 9},
}

// Every function of the set is told from every other by its samples.
func TestFunctionsAreToldApart(t *testing.T) {
	for _, f := range functionShapes {
		for _, h := range f.hypotheses() {
			f.Eval = h.eval
			r := f.Identify()
			if assert.Len(t, r.Readings, 1, "%s: %v %s", h.reading, r.Readings, r.Reason) {
				got := r.Readings[0]
				got.Error = 0
				assert.Equal(t, h.reading, got)
			}
			assert.Greater(t, r.Nearest.Error, 1e-3, h.reading.String())
		}
	}
}

// Textbook formulas, written out, are what they are called: Hamilton's product with
// ij = k, the active matrix that sends x to y for a quarter turn about z.
func TestTextbookFunctions(t *testing.T) {
	product := Function{In: []int{4, 4}, Out: 4, Eval: func(in, out []float64) {
		a, b, c, d := in[0], in[1], in[2], in[3]
		e, f, g, h := in[4], in[5], in[6], in[7]
		out[0] = a*e - b*f - c*g - d*h
		out[1] = a*f + b*e + c*h - d*g
		out[2] = a*g - b*h + c*e + d*f
		out[3] = a*h + b*g - c*f + d*e
	}}
	r := product.Identify()
	require.True(t, r.Decided())
	first := convention.ScalarFirst
	r.Readings[0].Error = 0
	assert.Equal(t, FunctionReading{What: "product", Scalars: [3]convention.ScalarPlace{first, first, first}}, r.Readings[0])

	toMatrix := Function{In: []int{4}, Out: 9, Eval: func(in, out []float64) {
		x, y, z, w := in[0], in[1], in[2], in[3]
		copy(out, []float64{
			1 - 2*(y*y+z*z), 2 * (x*y - z*w), 2 * (x*z + y*w),
			2 * (x*y + z*w), 1 - 2*(x*x+z*z), 2 * (y*z - x*w),
			2 * (x*z - y*w), 2 * (y*z + x*w), 1 - 2*(x*x+y*y),
		})
	}}
	r = toMatrix.Identify()
	require.True(t, r.Decided())
	r.Readings[0].Error = 0
	assert.Equal(t, FunctionReading{What: "matrix of quaternion", Scalars: [3]convention.ScalarPlace{convention.ScalarLast}, Norm: UnitOnly}, r.Readings[0])
}

// Every sequence, order, sign and unit of angles, to and from quaternions and matrices.
func TestAngleFunctionsAreSolved(t *testing.T) {
	for _, size := range []int{4, 9} {
		for _, o := range inputs(size) {
			if o.reversed {
				continue
			}
			for way := range turnNames {
				for signs := range negations {
					turns := turnNames[way][0]
					turns.Negated = negations[signs]
					for _, unit := range units {
						f := Function{In: []int{3}, Out: size, Eval: func(in, out []float64) {
							h := halfTurns(in, unit.InRadians())
							o.put(turns.rotor(&h, &turns.Negated), out)
						}}
						r := f.Identify()
						require.Len(t, r.Readings, 1, "%s: %s", turns, r.Reason)
						assert.Equal(t, turns, *r.Readings[0].Turns)
						assert.Equal(t, unit, r.Readings[0].Unit)
						assert.Equal(t, o.place, r.Readings[0].Scalars[0])
					}
				}
			}
		}
	}
}

func TestAnglesOfARotation(t *testing.T) {
	for _, size := range []int{4, 9} {
		for _, seq := range angle.Sequences() {
			f := Function{In: []int{size}, Out: 3, Eval: func(in, out []float64) {
				n := seq.Angles(inputs(size)[0].rotor(in)).Numbers()
				for i := range out {
					out[i] = n[i] * 180 / math.Pi
				}
			}}
			r := f.Identify()
			require.Len(t, r.Readings, 1, "%s: %v %s", seq, r.Readings, r.Reason)
			got := r.Readings[0]
			assert.Equal(t, convention.Degree, got.Unit)
			want := angle.Reading{Seq: seq, Order: [3]int{0, 1, 2}}.Canonical()
			assert.Equal(t, want.Seq, got.Turns.Sequence)
			for k, o := range want.Order {
				assert.Equal(t, uint8(o), got.Turns.Order[k])
			}
			assert.Zero(t, got.Turns.Negated)
		}
	}
}

// Not one of them: a function that is wrong in a single term is called none of
// the set, and the nearest is named.
func TestWrongFunctionsAreNotIdentified(t *testing.T) {
	wrong := map[string]Function{
		"a product with one sign wrong": {In: []int{4, 4}, Out: 4, Eval: func(in, out []float64) {
			putRotor(readRotor(in, convention.ScalarFirst).Mul(readRotor(in[4:], convention.ScalarFirst)), out, convention.ScalarFirst)
			out[2] -= 2 * in[0] * in[6]
		}},
		"a rotation of something else": {In: []int{4, 3}, Out: 3, Eval: func(in, out []float64) {
			putVec(readVec(in[4:]).Add(readVec(in)), out)
		}},
		"half of the angles": {In: []int{3}, Out: 4, Eval: func(in, out []float64) {
			putRotor(angle.Sequences()[0].Rotor(in[0]/2, in[1]/2, in[2]/2), out, convention.ScalarFirst)
		}},
	}
	for name, f := range wrong {
		r := f.Identify()
		assert.Empty(t, r.Readings, name)
		assert.NotEmpty(t, r.Reason, name)
	}
}

func TestFunctionsThatSayNothing(t *testing.T) {
	constant := Function{In: []int{4}, Out: 4, Eval: func(_, out []float64) { out[0] = 1 }}
	assert.Equal(t, "its result is constant", constant.Identify().Reason)
	nan := Function{In: []int{4}, Out: 9, Eval: func(_, out []float64) { out[3] = math.NaN() }}
	assert.Contains(t, nan.Identify().Reason, "not finite")
	odd := Function{In: []int{5}, Out: 2, Eval: func(_, _ []float64) {}}
	assert.Contains(t, odd.Identify().Reason, "no rotation function")
}

// Random functions that are smooth but no rotations are never identified.
func TestUnrelatedFunctions(t *testing.T) {
	g := rand.New(rand.NewPCG(8, 9))
	for _, shape := range functionShapes {
		for range 50 {
			n := 0
			for _, k := range shape.In {
				n += k
			}
			weights := make([]float64, n*shape.Out)
			for i := range weights {
				weights[i] = g.NormFloat64()
			}
			f := shape
			f.Eval = func(in, out []float64) {
				for o := range out {
					for i, x := range in {
						out[o] += weights[o*n+i] * x
					}
				}
			}
			assert.Empty(t, f.Identify().Readings)
		}
	}
}

func TestFloat32Functions(t *testing.T) {
	f := Function{In: []int{4}, Out: 9, Tolerance: 1e-5, Eval: func(in, out []float64) {
		r := rotor.FromQuaternion(float64(float32(in[0])), float64(float32(in[1])), float64(float32(in[2])), float64(float32(in[3])))
		putMatrix(UnitOnly.rotation(r), out)
		for i, x := range out {
			out[i] = float64(float32(x))
		}
	}}
	r := f.Identify()
	require.True(t, r.Decided())
	assert.Equal(t, UnitOnly, r.Readings[0].Norm)
}

func BenchmarkFunctionOfAngles(b *testing.B) {
	f := Function{In: []int{3}, Out: 4, Eval: func(in, out []float64) {
		putRotor(angle.Sequences()[5].Rotor(in[0], in[1], in[2]), out, convention.ScalarLast)
	}}
	b.ReportAllocs()
	for b.Loop() {
		f.Identify()
	}
}
