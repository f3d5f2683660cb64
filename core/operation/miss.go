package operation

import (
	"math"
	"slices"
)

// Miss is an operation that a function nearly computes, and what stands between
// them.
type Miss struct {
	Reading    Reading
	Samples    []Sample    // on the unit manifold: evaluated, with the paths taken
	Expected   [][]float64 // what the operation gives for each, stored as the function stores
	Wrong      []bool      // which of them differ
	Components []int       // results, by place, that differ in some sample; all others agree in all
	Worst      int         // the sample that differs most
	Error      float64     // its error, relative to the size of the result
	Mean       float64     // mean error of the samples that differ
	Terms      []Term      // the terms that differ, where the results are sums of terms
	Edit       string      // one change of the inputs that makes them agree, in words; "" if there is none
	Factor     string      // how the result is a multiple of what is expected, in words; "" if it is none
}

// cost is how far-fetched the explanation is: few terms that differ are likelier than
// many, and an operation that is computed for a part of the samples is likelier meant
// than one that never is.
func (m *Miss) cost() float64 {
	k := 30 * (1 - m.Share())
	switch {
	case len(m.Terms) > 0 && math.IsNaN(m.Terms[0].Found):
		return k + 12
	case len(m.Terms) > 0:
		return k + float64(len(m.Terms))
	case m.Edit != "":
		return k + 2.5
	case m.Factor != "":
		return k + 10
	}
	return k + 100
}

// Multiple reports whether the result is a constant multiple of the one expected.
func (m *Miss) Multiple() bool {
	return len(m.Terms) == 1 && m.Terms[0].Of == wholeResult
}

// Anywhere reports whether an operation is the same off the unit manifold: it is
// one of linear algebra, not of rotations.
func (op Op) Anywhere() bool { return anywhere[op] }

// Share is the share of samples in which the function is right.
func (m *Miss) Share() float64 {
	right := 0
	for _, w := range m.Wrong {
		if !w {
			right++
		}
	}
	return float64(right) / float64(max(1, len(m.Wrong)))
}

// Angle is the largest angle, in radians, between the rotation expected and the
// one found, where both are rotations in the form of the last operand; 0 if it is
// none.
func (f *Function) Angle(m *Miss) float64 {
	if len(f.Out) != 1 || f.Out[0].Kind == Three || f.Out[0].Kind == Scalar {
		return 0
	}
	worst := 0.0
	for i, w := range m.Wrong {
		if !w {
			continue
		}
		order := f.Out[0].Order
		if n := len(m.Reading.Orders); n > 0 {
			order = m.Reading.Orders[n-1]
		}
		a := rotationIn(reordered(m.Samples[i].Out, f.Out, []Order{order}))
		b := rotationIn(reordered(m.Expected[i], f.Out, []Order{order}))
		if angle := 2 * halfTurn(a.Reverse().Mul(b)); angle > worst {
			worst = angle
		}
	}
	return worst
}

// Explain finds the operation out of ops that the function comes nearest to, and
// explains the difference. It returns nil if there is none of this shape, the
// function gives nothing to compare, or it computes one of them.
func (f *Function) Explain(ops ...Op) *Miss {
	var list []hypothesis
	for _, h := range append(slices.Clone(f.Shape().hypotheses()), f.enumerated(ops)...) {
		if h.eval != nil && slices.Contains(ops, h.reading.Op) {
			list = append(list, h)
		}
	}
	if len(list) == 0 {
		return nil
	}
	t := &trial{f: f, combos: combosOf(f.In, f.Out)}
	t.draw(rotations(list))
	if len(t.samples) < unitSamples {
		return nil
	}
	best := t.rank(list)
	var chosen *Miss
	cost := math.Inf(1)
	for _, c := range best {
		m := t.miss(c)
		if len(m.Components) == 0 {
			return nil
		}
		t.explain(m, c)
		if k := m.cost() + c.score; k < cost {
			chosen, cost = m, k
		}
	}
	return chosen
}

// rotations reports whether hypotheses are about rotations only: others are held
// against samples off the manifold too.
func rotations(list []hypothesis) bool {
	for _, h := range list {
		if !anywhere[h.reading.Op] {
			return true
		}
	}
	return false
}

// anywhere are the operations that are the same off the unit manifold.
var anywhere = map[Op]bool{
	MatrixProduct: true, MatrixInverse: true, Transpose: true, Determinant: true, Trace: true, Cross: true, Skew: true, Dot: true, Sum: true, Difference: true,
}

// draw evaluates samples of all families for an explanation, and as many more as take
// new paths.
func (t *trial) draw(rotation bool) {
	for _, d := range []struct {
		family Family
		n      int
	}{{Unit, 64}, {Wide, 24}, {Tiny, 16}, {General, 64}} {
		if d.family != General || !rotation {
			t.samples = append(t.samples, Draw(t.f.In, d.family, d.n, 2)...)
		}
	}
	t.f.Eval(t.samples)
	t.cover(maxExplained)
	t.samples = slices.DeleteFunc(t.samples, func(s Sample) bool { return !s.OK || undefined(s.Out) })
}

// maxExplained bounds the samples by which a difference is explained.
const maxExplained = 480

// undefined reports whether a result is no number in all places.
func undefined(out []float64) bool {
	for _, x := range out {
		if !math.IsNaN(x) {
			return false
		}
	}
	return true
}

// miss compares a candidate with all samples.
func (t *trial) miss(c candidate) *Miss {
	m := &Miss{Reading: c.h.reading}
	differs := make([]bool, size(t.f.Out))
	wrong := 0
	for i := range t.samples {
		s := &t.samples[i]
		ready := t.canonical(s, c.combo)
		if c.h.valid != nil && !c.h.valid(ready.in) {
			continue
		}
		want := make([]float64, len(ready.out))
		c.h.eval(ready.in, want)
		c.h.alignSign(want, ready.out)
		stored := t.stored(want, c.combo)
		worst := 0.0
		slack := t.f.Tolerance()
		if c.h.slack != nil {
			slack += c.h.slack(ready.in)
		}
		for k, x := range s.Out {
			e := t.f.componentError(m.Reading, stored[k], x)
			if e > slack {
				differs[k] = true
				worst = math.Max(worst, e)
			}
		}
		m.Samples = append(m.Samples, *s)
		m.Expected = append(m.Expected, stored)
		m.Wrong = append(m.Wrong, worst > 0)
		if worst > 0 {
			wrong++
			m.Mean += math.Min(1, worst)
		}
		if worst > m.Error {
			m.Error, m.Worst = worst, len(m.Samples)-1
		}
	}
	m.Mean /= float64(max(1, wrong))
	for k, d := range differs {
		if d {
			m.Components = append(m.Components, k)
		}
	}
	return m
}

// stored puts canonical results into the order of the function.
func (t *trial) stored(canonical []float64, c combo) []float64 {
	out := slices.Clone(canonical)
	at := 0
	for i, o := range t.f.Out {
		if o.Kind == Quaternion {
			c.out[i].store(canonical[at:at+4], out[at:at+4])
		}
		at += o.Size
	}
	return out
}
