package operation

import (
	"fmt"
	"math"
)

// wholeResult is what a term is of that stands for a constant factor.
const wholeResult = "the whole result"

// ratio is the factor between a result and the expected one, and whether the
// result is such a multiple.
func (t *trial) ratio(h *hypothesis, r *canonical, want []float64) (float64, bool) {
	h.eval(r.in, want)
	h.alignSign(want, r.out)
	dot, square := 0.0, 0.0
	for k, x := range want {
		dot += x * r.out[k]
		square += x * x
	}
	f := dot / square
	for k, x := range r.out {
		if !(math.Abs(x-f*want[k]) <= 16*t.f.Tolerance()*math.Max(1, math.Abs(x))) {
			return f, false
		}
	}
	return f, true
}

// factorTerms explains single results that are a constant multiple of the ones
// expected.
func (t *trial) factorTerms(m *Miss, c candidate, rows []Sample) []Term {
	if 2*len(m.Components) > size(t.f.Out) || len(rows) < 12 || m.Reading.Op == AnglesOf {
		return nil
	}
	want := make([]float64, size(t.f.Out))
	var all []Term
	for _, place := range m.Components {
		k := t.canonicalPlace(place, c.combo)
		dot, square := 0.0, 0.0
		ready := make([]canonical, len(rows))
		expected := make([]float64, len(rows))
		for i := range rows {
			ready[i] = t.canonical(&rows[i], c.combo)
			c.h.eval(ready[i].in, want)
			c.h.alignSign(want, ready[i].out)
			expected[i] = want[k]
			dot += want[k] * ready[i].out[k]
			square += want[k] * want[k]
		}
		factor := dot / square
		for i := range rows {
			if !(math.Abs(ready[i].out[k]-factor*expected[i]) <= 16*t.f.Tolerance()) {
				return nil
			}
		}
		all = append(all, Term{Result: place, Expected: 1, Found: tidy(factor)})
	}
	return all
}

// scaleTerms explains a result that is a multiple of the expected one: by a factor, or
// by a divisor that is a sum of squares in some way. If nothing explains the factor its
// range is put in words.
func (t *trial) scaleTerms(m *Miss, c candidate, rows []Sample) ([]Term, string) {
	if len(rows) < 12 {
		return nil, ""
	}
	want := make([]float64, size(t.f.Out))
	lowest, highest := math.Inf(1), math.Inf(-1)
	for i := range rows {
		r := t.canonical(&rows[i], c.combo)
		f, ok := t.ratio(&c.h, &r, want)
		if !ok {
			return nil, ""
		}
		lowest, highest = math.Min(lowest, f), math.Max(highest, f)
	}
	if highest-lowest < 64*t.f.Tolerance()*math.Max(1, math.Abs(highest)) {
		return []Term{{Result: -1, Of: wholeResult, Expected: 1, Found: tidy((lowest + highest) / 2)}}, ""
	}
	ratio := func(r *canonical) float64 { f, _ := t.ratio(&c.h, r, want); return f }
	if terms := t.divisorTerms(m, c, rows, ratio); terms != nil {
		return terms, ""
	}
	if len(t.f.Out) == 1 && t.f.Out[0].Kind == Scalar {
		return nil, "" // any two numbers are multiples of each other
	}
	return nil, fmt.Sprintf("the result is what is expected times a factor from %.3g to %.3g", lowest, highest)
}

// divisorTerms fits what the result is divided by.
func (t *trial) divisorTerms(m *Miss, c candidate, rows []Sample, ratio func(*canonical) float64) []Term {
	if m.Reading.Op == MatrixInverse && t.f.In[0].Kind == Matrix3 {
		tab := t.tabulate(cubic(t.f.In[0].Names, 0), rows, c.combo)
		if tab == nil {
			return nil
		}
		terms, ok := t.compare(tab, -1, "the determinant", func(r *canonical) float64 { return determinant(r.in, 3) },
			func(r *canonical) float64 { return determinant(r.in, 3) / ratio(r) })
		if !ok {
			return nil
		}
		return terms
	}
	var quads []factorFunc
	at := 0
	for i, o := range t.f.In {
		if o.Kind == Quaternion || o.Kind == Three {
			quads = append(quads, quadratic(operandNames(o, c.combo.in[i]), at)...)
		}
		at += o.Size
	}
	tab := t.tabulate(quads, rows, c.combo)
	if tab == nil {
		return nil
	}
	for _, form := range []struct {
		of string
		f  func(x float64) float64
	}{
		{"the divisor", func(x float64) float64 { return 1 / x }},
		{"the square of the divisor", func(x float64) float64 { return 1 / (x * x) }},
		{"the factor", func(x float64) float64 { return x }},
		{"the square of the result", func(x float64) float64 { return x * x }},
	} {
		terms, ok := t.compare(tab, -1, form.of, func(*canonical) float64 { return form.f(1) }, func(r *canonical) float64 { return form.f(ratio(r)) })
		if ok && len(terms) > 0 && len(terms) <= maxTerms {
			return terms
		}
	}
	return nil
}

// culpritTerms explains a normalised quaternion of which one component was wrong
// before it was divided by its norm, which spoils all: the others keep their
// proportions.
func (t *trial) culpritTerms(m *Miss, c candidate, rows []Sample) []Term {
	if len(t.f.Out) != 1 || t.f.Out[0].Kind != Quaternion || len(m.Components) < 4 || len(rows) < 12 {
		return nil
	}
	if len(t.f.In) == 1 && t.f.In[0].Kind == Quaternion {
		return nil // all powers of a quaternion have their vector parts in proportion
	}
	want := make([]float64, 4)
	// others is the factor of the components other than k, if they have one.
	others := func(r *canonical, k int) (float64, bool) {
		c.h.eval(r.in, want)
		dot, square := 0.0, 0.0
		for j, x := range want {
			if j != k {
				dot += x * r.out[j]
				square += x * x
			}
		}
		f := dot / square
		for j, x := range r.out {
			if j != k && !(math.Abs(x-f*want[j]) <= 16*t.f.Tolerance()) {
				return f, false
			}
		}
		return f, true
	}
	for k := range 4 {
		fits := true
		for i := 0; i < len(rows) && fits; i++ {
			r := t.canonical(&rows[i], c.combo)
			_, fits = others(&r, k)
		}
		if !fits {
			continue
		}
		place := t.storedPlace(k, c.combo)
		basis, weight := t.unnormalised(m, c)
		if tab := t.tabulate(basis, rows, c.combo); tab != nil {
			terms, ok := t.compare(tab, place, "before it is normalised",
				func(r *canonical) float64 { c.h.eval(r.in, want); return want[k] * weight(r.in) },
				func(r *canonical) float64 { f, _ := others(r, k); return r.out[k] / f * weight(r.in) })
			if ok && len(terms) > 0 && len(terms) <= maxTerms {
				return terms
			}
		}
		return []Term{{Result: place, Of: "before it is normalised", Expected: 1, Found: math.NaN()}}
	}
	return nil
}

// unnormalised is a basis for a normalised result and the length that it had before.
func (t *trial) unnormalised(m *Miss, c candidate) ([]factorFunc, func(in []float64) float64) {
	switch m.Reading.Op {
	case TwoVectors:
		a, b := t.f.In[0], t.f.In[1]
		basis := append(times(linearIn(a.Names, 0), linearIn(b.Names, 3)), factorFunc{"1", one.of})
		return basis, func(in []float64) float64 { return math.Sqrt(2 * (1 + vec(in).Dot(vec(in[3:])))) }
	}
	return t.f.basis(m.Reading, c.combo), func([]float64) float64 { return 1 }
}

// storedPlace is where a canonical number of a single quaternion is stored.
func (t *trial) storedPlace(k int, c combo) int {
	if o := c.out[0]; o.Known() {
		return int(o[k])
	}
	return k
}

// weightTerms explains an interpolation with wrong weights: those that belong to another
// angle between the ends, or one that differs by itself.
func (t *trial) weightTerms(m *Miss, c candidate, rows []Sample) []Term {
	a, b, f := 0, 4, 8
	if t.f.In[0].Kind == Scalar {
		a, b, f = 1, 5, 0
	}
	var found [][3]float64 // weights, and the cosine that they belong to
	consistent := m.Reading.Op == Slerp
	for i := range rows {
		r := t.canonical(&rows[i], c.combo)
		p, q, ok := weights(r.in[a:a+4], r.in[b:b+4], r.out, t.f.Tolerance())
		if !ok {
			return nil
		}
		if m.Reading.Swapped {
			p, q = q, p
		}
		cos, fits := angleOfWeights(p, q, r.in[f], t.f.Tolerance())
		consistent = consistent && fits
		found = append(found, [3]float64{p, q, cos})
	}
	if consistent {
		ends := times(linearIn(operandNames(t.f.In[a/4], c.combo.in[a/4]), a), linearIn(operandNames(t.f.In[(b+3)/4], c.combo.in[(b+3)/4]), b))
		if tab := t.tabulate(ends, rows, c.combo); tab != nil {
			at := map[*canonical]int{}
			for i := range tab.rows {
				at[&tab.rows[i]] = i
			}
			dot := func(r *canonical) float64 { return quat(r.in[a:]).Dot(quat(r.in[b:])) }
			terms, ok := t.compare(tab, -1, "the scalar product of the ends", dot, func(r *canonical) float64 {
				i := at[r]
				return math.Copysign(found[i][2], found[i][1]) // of the end as it was given
			})
			if ok && len(terms) > 0 && len(terms) <= maxTerms {
				return terms
			}
		}
		return []Term{{Result: -1, Of: "the weights, which belong to another angle between the ends,", Expected: 1, Found: math.NaN()}}
	}
	return []Term{{Result: -1, Of: "the weights of the ends", Expected: 1, Found: math.NaN()}}
}

// weights solves out = p a + q b.
func weights(a, b, out []float64, tolerance float64) (p, q float64, ok bool) {
	aa, ab, bb, ao, bo := 0.0, 0.0, 0.0, 0.0, 0.0
	for k := range 4 {
		aa += a[k] * a[k]
		ab += a[k] * b[k]
		bb += b[k] * b[k]
		ao += a[k] * out[k]
		bo += b[k] * out[k]
	}
	det := aa*bb - ab*ab
	p, q = (ao*bb-bo*ab)/det, (bo*aa-ao*ab)/det
	for k := range 4 {
		if !(math.Abs(p*a[k]+q*b[k]-out[k]) <= 16*tolerance) {
			return p, q, false
		}
	}
	return p, q, true
}

// angleOfWeights finds the cosine of the angle d for which p = sin((1-t)d)/sin d
// and |q| = sin(t d)/sin d, and whether there is one.
func angleOfWeights(p, q, t, tolerance float64) (float64, bool) {
	low, high := 1e-9, math.Pi-1e-9
	for range 60 {
		d := (low + high) / 2
		if math.Sin(t*d)/math.Sin(d) < math.Abs(q) {
			low = d
		} else {
			high = d
		}
	}
	d := (low + high) / 2
	return math.Cos(d), math.Abs(math.Sin((1-t)*d)/math.Sin(d)-p) <= 1e3*tolerance
}
