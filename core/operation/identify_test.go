package operation

import (
	"fmt"
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/core/convention"
)

// operands of a shape, with quaternions stored scalar first.
func operands(kinds string) []Operand {
	var all []Operand
	for _, c := range kinds {
		k := map[rune]Kind{'s': Scalar, 'v': Three, 'q': Quaternion, 'm': Matrix3, 'h': Matrix4}[c]
		all = append(all, Operand{Kind: k, Size: kindSizes[k], Order: ScalarFirst, Type: kindNames[k]})
	}
	return all
}

// evaluator runs a formula on stored numbers.
func evaluator(out int, f func(in, out []float64)) func([]Sample) {
	return func(samples []Sample) {
		for i := range samples {
			s := &samples[i]
			s.Out = make([]float64, out)
			f(s.In, s.Out)
			s.OK = true
		}
	}
}

// Every operation of the set is found, and told from every other: where two readings
// fit the same values, they are listed together, and no third one is.
func TestEveryOperationIsFound(t *testing.T) {
	together := map[string]bool{}
	for shape := range builders {
		for _, h := range shape.hypotheses() {
			if h.eval == nil {
				continue
			}
			f := &Function{In: operands(shape.In), Out: operands(shape.Out)}
			f.Eval = evaluator(size(f.Out), h.eval)
			id := f.Identify()
			if id.Why == "it gives no result for most inputs" || id.Why == "its result is constant" {
				t.Errorf("%v %s: %s", shape, h.reading, id.Why)
				continue
			}
			found := false
			for _, r := range id.Readings {
				found = found || r.String() == h.reading.String() || r.Op == h.reading.Op && id.OnUnit
			}
			require.True(t, found, "%v %s: found %v %s", shape, h.reading, id.Readings, id.Why)
			if len(id.Readings) > 1 {
				text := ""
				for _, r := range id.Readings {
					text += " | " + r.String()
				}
				together[fmt.Sprintf("%s -> %s:%s", shape.In, shape.Out, text)] = true
			}
		}
	}
	for s := range together {
		t.Log(s)
	}
	assert.LessOrEqual(t, len(together), 20)
}

// The textbook product, written out, in each of the 24 storage orders: a product alone
// leaves six of them open, and the true one is among these.
func TestProductInEveryOrder(t *testing.T) {
	for _, o := range Orders {
		op := operands("qqq")
		for i := range op {
			op[i].Order = Order{}
		}
		f := &Function{In: op[:2], Out: op[2:], Eval: evaluator(4, func(in, out []float64) {
			var a, b, c [4]float64
			o.load(in, a[:])
			o.load(in[4:], b[:])
			c[0] = a[0]*b[0] - a[1]*b[1] - a[2]*b[2] - a[3]*b[3]
			c[1] = a[0]*b[1] + a[1]*b[0] + a[2]*b[3] - a[3]*b[2]
			c[2] = a[0]*b[2] - a[1]*b[3] + a[2]*b[0] + a[3]*b[1]
			c[3] = a[0]*b[3] + a[1]*b[2] - a[2]*b[1] + a[3]*b[0]
			o.store(c[:], out)
		})}
		id := f.Identify()
		require.Len(t, id.Readings, 6)
		assert.True(t, contains(id.Readings, Reading{Op: Product, Orders: []Order{o, o, o}}), "%s: %v", o, id.Readings)
	}
}

// The rotation matrices of the three elementary turns, active, as every textbook
// has them: a quarter turn about z sends x to y.
func TestElementaryTurns(t *testing.T) {
	f := &Function{In: operands("s"), Out: operands("m"), Eval: evaluator(9, func(in, out []float64) {
		sin, cos := math.Sincos(in[0] * math.Pi / 180)
		copy(out, []float64{cos, -sin, 0, sin, cos, 0, 0, 0, 1})
	})}
	id := f.Identify()
	require.Len(t, id.Readings, 1)
	assert.Equal(t, Reading{Op: AxisTurn, Axis: "z", Unit: convention.Degree, Scale: 1}, id.Readings[0])
}

func TestNothingIsSaid(t *testing.T) {
	f := &Function{In: operands("q"), Out: operands("q"), Eval: evaluator(4, func(_, out []float64) { out[0] = 1 })}
	assert.Equal(t, "its result is constant", f.Identify().Why)
	f.Eval = evaluator(4, func(in, out []float64) { out[0] = math.NaN() })
	assert.NotEmpty(t, f.Identify().Why)
	assert.Empty(t, f.Identify().Readings)
	f.In = operands("qqqq")
	assert.Equal(t, "no known operation has these operands", f.Identify().Why)
	f.In, f.Eval = operands("q"), func(s []Sample) {}
	assert.Equal(t, "it gives no result for most inputs", f.Identify().Why)
}
