package operation

import (
	"math"
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/core/rotor"
)

// named gives every number of a list of operands a name of its own.
func named(list []Operand, prefix string) []Operand {
	for i := range list {
		for k := range list[i].Size {
			list[i].Names = append(list[i].Names, prefix+string(rune('a'+i))+string(rune('0'+k%10))+string(rune('0'+k/10)))
		}
	}
	return list
}

// planted is an operation with one more term in one result.
func planted(t *testing.T, s Shape, op Op, choose func(Reading) bool, g *rand.Rand) {
	f := &Function{In: named(operands(s.In), "in "), Out: named(operands(s.Out), "out ")}
	var h *hypothesis
	for _, k := range s.hypotheses() {
		if k.reading.Op == op && choose(k.reading) {
			h = &k
			break
		}
	}
	require.NotNil(t, h)
	c := combosOf(f.In, f.Out)[0]
	basis := f.basis(h.reading, c)
	require.NotEmpty(t, basis, "%s", h.reading)
	term, place := basis[g.IntN(len(basis))], g.IntN(size(f.Out))
	factor := []float64{-1, 2, 0.5}[g.IntN(3)]
	f.Eval = evaluator(size(f.Out), func(in, out []float64) {
		h.eval(in, out)
		out[place] += factor * term.of(in)
	})
	m := f.Explain(op)
	require.NotNil(t, m, "%s with %g %s in %d", h.reading, factor, term.name, place)
	assert.Equal(t, []int{place}, m.Components)
	if assert.Len(t, m.Terms, 1, "%s with %g %s: %v %s", h.reading, factor, term.name, m.Terms, f.Difference(m)) {
		assert.Equal(t, term.name, m.Terms[0].What)
		assert.InDelta(t, factor, m.Terms[0].Found-m.Terms[0].Expected, 1e-4)
		assert.Contains(t, f.Difference(m), f.ResultName(place))
	}
	assert.InDelta(t, 1-m.Share(), 1, 0.2)
}

// A term that is planted into an operation is found again, whatever it is.
func TestPlantedTerms(t *testing.T) {
	g := rand.New(rand.NewPCG(3, 4))
	plain := func(r Reading) bool {
		return !r.Swapped && r.Reversed == [2]bool{} && (r.Scale == 0 || r.Scale == 1) && r.Formula != Normalising
	}
	for range 12 {
		planted(t, Shape{"qq", "q"}, Product, plain, g)
		planted(t, Shape{"q", "q"}, Conjugate, plain, g)
		planted(t, Shape{"q", "m"}, ToMatrix, plain, g)
		planted(t, Shape{"qv", "v"}, RotateVector, plain, g)
		planted(t, Shape{"qv", "q"}, Derivative, plain, g)
		planted(t, Shape{"vs", "m"}, FromAxisAngle, plain, g)
		planted(t, Shape{"vs", "q"}, FromAxisAngle, plain, g)
		planted(t, Shape{"mv", "v"}, RotateVector, plain, g)
		planted(t, Shape{"vv", "v"}, Cross, plain, g)
		planted(t, Shape{"m", "m"}, Transpose, plain, g)
		planted(t, Shape{"mm", "m"}, MatrixProduct, plain, g)
		planted(t, Shape{"qqs", "q"}, Nlerp, func(r Reading) bool { return plain(r) && r.Way == AsGiven }, g)
	}
}

// textbookFromMatrix is Shepperd's method with four branches, each with its
// formula.
func textbookFromMatrix(in []float64) (q [4]float64, branch string) {
	m := func(i, j int) float64 { return in[3*i+j] }
	switch trace := m(0, 0) + m(1, 1) + m(2, 2); {
	case trace > 0:
		s := 2 * math.Sqrt(trace+1)
		return [4]float64{s / 4, (m(2, 1) - m(1, 2)) / s, (m(0, 2) - m(2, 0)) / s, (m(1, 0) - m(0, 1)) / s}, "w"
	case m(0, 0) > m(1, 1) && m(0, 0) > m(2, 2):
		s := 2 * math.Sqrt(1+m(0, 0)-m(1, 1)-m(2, 2))
		return [4]float64{(m(2, 1) - m(1, 2)) / s, s / 4, (m(0, 1) + m(1, 0)) / s, (m(0, 2) + m(2, 0)) / s}, "x"
	case m(1, 1) > m(2, 2):
		s := 2 * math.Sqrt(1+m(1, 1)-m(0, 0)-m(2, 2))
		return [4]float64{(m(0, 2) - m(2, 0)) / s, (m(0, 1) + m(1, 0)) / s, s / 4, (m(1, 2) + m(2, 1)) / s}, "y"
	}
	s := 2 * math.Sqrt(1+m(2, 2)-m(0, 0)-m(1, 1))
	return [4]float64{(m(1, 0) - m(0, 1)) / s, (m(0, 2) + m(2, 0)) / s, (m(1, 2) + m(2, 1)) / s, s / 4}, "z"
}

// One branch of four is wrong: the others tell what was meant, and the term is named.
func TestWrongBranch(t *testing.T) {
	f := &Function{In: operands("m"), Out: operands("q")}
	f.In[0].Names = []string{"m00", "m01", "m02", "m10", "m11", "m12", "m20", "m21", "m22"}
	f.Out[0].Names = []string{"w", "x", "y", "z"}
	f.Eval = func(samples []Sample) {
		for i := range samples {
			s := &samples[i]
			q, branch := textbookFromMatrix(s.In)
			if branch == "y" {
				q[1] = (s.In[1] - s.In[3]) / (4 * q[2])
			}
			s.Out, s.OK, s.Path = q[:], true, branch
		}
	}
	m := f.Explain(FromMatrix)
	require.NotNil(t, m)
	assert.Greater(t, m.Share(), 0.5)
	for i, s := range m.Samples {
		assert.Equal(t, s.Path == "y", m.Wrong[i])
	}
	assert.Equal(t, "x (four times its product with y): the term m10 enters with the wrong sign", f.Difference(m))
}

// Inputs that change places, and a divisor that lacks a term.
func TestEditsAndDivisors(t *testing.T) {
	f := &Function{In: named(operands("qqs"), ""), Out: operands("q"), Eval: evaluator(4, func(in, out []float64) {
		in = append([]float64(nil), in...)
		in[1], in[2] = in[2], in[1]
		h := interpolate(0, 4, 8)[0]
		h.eval(in, out)
	})}
	m := f.Explain(Slerp)
	require.NotNil(t, m)
	assert.Equal(t, "it equals the operation with a10 and a20 exchanged", f.Difference(m))

	f = &Function{In: operands("q"), Out: operands("q")}
	f.In[0].Names = []string{"w", "x", "y", "z"}
	f.Eval = evaluator(4, func(in, out []float64) {
		n := math.Sqrt(in[0]*in[0] + in[1]*in[1] + in[2]*in[2])
		for k := range out {
			out[k] = in[k] / n
		}
	})
	m = f.Explain(Normalise)
	require.NotNil(t, m)
	assert.Equal(t, "the square of the divisor: the term z*z is missing", f.Difference(m))
}

// What is right needs no explanation, and what is nothing of the kind has none.
func TestNoExplanation(t *testing.T) {
	f := &Function{In: operands("qq"), Out: operands("q"), Eval: evaluator(4, func(in, out []float64) { putQuat(out, quat(in[4:]).Mul(quat(in))) })}
	assert.Nil(t, f.Explain(Product))
	f.Eval = evaluator(4, func(in, out []float64) {
		putQuat(out, rotor.Exp(quat(in).Bivector()).Mul(rotor.Exp(quat(in[4:]).Bivector())))
	})
	m := f.Explain(Product)
	require.NotNil(t, m)
	assert.Empty(t, f.Difference(m))
	assert.Nil(t, f.Explain(Slerp))
}
