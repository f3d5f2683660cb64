package operation

import (
	"math"
	"testing"

	"dextral/core/matrix"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// Inputs on the brink are valid: whatever a function makes of them is its own doing.
func TestBrinkIsValid(t *testing.T) {
	for _, s := range Brink([]Operand{{Kind: Quaternion, Size: 4}, {Kind: Quaternion, Size: 4}}, 16) {
		for _, q := range [][]float64{s.In[:4], s.In[4:]} {
			assert.InDelta(t, 1, quat(q).Norm(), 4*0x1p-53, s.Note)
		}
	}
	for _, size := range []int{9, 16} {
		for _, s := range Brink([]Operand{{Kind: KindOf(size), Size: size}}, 16) {
			m := block(s.In)
			assert.Less(t, matrix.Defect(m), 16*0x1p-52, s.Note)
			assert.Positive(t, m.Det())
		}
	}
}

// Among them are sines beyond one, which is what an asin fails on.
func TestBrinkGoesOver(t *testing.T) {
	over := 0
	for _, s := range Brink([]Operand{{Kind: Quaternion, Size: 4}}, 16) {
		w, x, y, z := s.In[0], s.In[1], s.In[2], s.In[3]
		if math.Abs(2*(w*y-z*x)) > 1 || math.Abs(2*(w*x+y*z)) > 1 {
			over++
		}
	}
	assert.Positive(t, over)
}

// Miss tells a right result from a wrong one, and says nothing of inputs for which
// the operation is not defined.
func TestMiss(t *testing.T) {
	eval := func(samples []Sample) {
		for i := range samples {
			out := make([]float64, 9)
			putMatrix(out, matrix.FromRotor(quat(samples[i].In)))
			samples[i].Out, samples[i].OK = out, true
		}
	}
	f := &Function{In: []Operand{{Kind: Quaternion, Size: 4, Order: ScalarFirst}}, Out: []Operand{{Kind: Matrix3, Size: 9}}, Eval: eval}
	id := f.Identify()
	require.True(t, id.Is(ToMatrix))
	samples := Brink(f.In, 4)
	eval(samples)
	for i := range samples {
		miss, ok := f.Miss(id, &samples[i])
		assert.True(t, ok)
		assert.Less(t, miss, 1e-12)
		samples[i].Out[3] += 0.01
		miss, _ = f.Miss(id, &samples[i])
		assert.Greater(t, miss, 0.005)
		samples[i].Out[3] = math.NaN()
		miss, _ = f.Miss(id, &samples[i])
		assert.True(t, math.IsInf(miss, 1))
		samples[i].OK = false
		_, ok = f.Miss(id, &samples[i])
		assert.False(t, ok)
	}
}
