package operation

import (
	"math"
	"slices"
)

// Term is one term of a result that is a sum of terms, with the factor it
// should have and the one it has.
type Term struct {
	Result   int    // which of the results, by place
	What     string // the term in the author's words: "a.W*b.Z"
	Of       string // of which quantity, if it is not the result itself
	Expected float64
	Found    float64
}

// explain looks for what makes the difference: terms, a factor, an edit of the
// inputs.
func (t *trial) explain(m *Miss, c candidate) {
	rows := t.rowsOf(m)
	if len(rows) == 0 {
		return
	}
	switch m.Reading.Op {
	case FromMatrix:
		m.Terms = t.matrixTerms(m, c, rows)
	case AnglesOf:
		m.Terms = t.angleTerms(m, c, rows)
	}
	if m.Terms == nil {
		m.Terms, m.Factor = t.scaleTerms(m, c, rows)
	}
	if m.Terms == nil {
		if terms := t.sumTerms(m, c, rows); terms != nil {
			m.Terms, m.Factor = terms, ""
		}
	}
	if m.Terms == nil && m.Factor == "" {
		m.Terms = t.culpritTerms(m, c, rows)
	}
	if m.Terms == nil && m.Factor == "" && (m.Reading.Op == Slerp || m.Reading.Op == Nlerp) {
		m.Terms = t.weightTerms(m, c, rows)
	}
	if terms := t.factorTerms(m, c, rows); terms != nil && (len(m.Terms) == 0 || len(m.Terms) > len(terms)) {
		m.Terms = terms
	}
	if len(m.Terms) == 0 || len(m.Terms) > 3 {
		if m.Edit = t.edit(m, c, rows); m.Edit != "" {
			m.Terms = nil
		}
	}
}

// rowsOf picks the samples of the path on which most of the wrong ones lie, and
// draws more of them: of the first family that has wrong ones.
func (t *trial) rowsOf(m *Miss) []Sample {
	count := map[string]int{}
	best, family := "", families
	for i, wrong := range m.Wrong {
		if wrong {
			s := &m.Samples[i]
			if count[s.Path]++; count[s.Path] > count[best] || count[best] == 0 {
				best = s.Path
			}
		}
	}
	for i, wrong := range m.Wrong {
		if f := m.Samples[i].Family; wrong && m.Samples[i].Path == best && f < family && f != Wide {
			family = f
		}
	}
	if anywhere[m.Reading.Op] {
		family = General
	}
	if family == families {
		return nil
	}
	var rows []Sample
	for seed := uint64(20); seed < 36 && len(rows) < maxRows; seed++ {
		more := Draw(t.f.In, family, 64, seed)
		t.f.Eval(more)
		for _, s := range more {
			if s.OK && s.Path == best && !slices.ContainsFunc(s.Out, math.IsNaN) {
				rows = append(rows, s)
			}
		}
	}
	return rows
}

// maxRows is enough for the largest basis but one, that of products of 4x4 matrices.
const maxRows = 360

// table is a set of functions with their values on samples, factored.
type table struct {
	basis []factorFunc
	rows  []canonical
	*linear
}

// tabulate evaluates a basis. It is of use only if there are more samples than
// functions and the functions are independent.
func (t *trial) tabulate(basis []factorFunc, rows []Sample, c combo) *table {
	if len(basis) == 0 || len(rows) < len(basis)+4 {
		return nil
	}
	rows = rows[:min(len(rows), 2*len(basis)+16)]
	tab := &table{basis: basis}
	for i := range rows {
		tab.rows = append(tab.rows, t.canonical(&rows[i], c))
	}
	tab.linear = factor(len(rows), len(basis), func(i, j int) float64 { return basis[j].of(tab.rows[i].in) })
	if !tab.full {
		return nil
	}
	return tab
}

// fit finds the coefficients of a quantity, or nil if it is no sum of the
// functions.
func (tab *table) fit(tolerance float64, value func(r *canonical) float64) []float64 {
	b := make([]float64, len(tab.rows))
	for i := range tab.rows {
		b[i] = value(&tab.rows[i])
		if math.IsNaN(b[i]) || math.IsInf(b[i], 0) {
			return nil
		}
	}
	x, left := tab.solve(b)
	if !(left <= tolerance) {
		return nil
	}
	return x
}

// coefficientTolerance is the smallest difference of factors that is none of
// rounding: the factors of formulas are halves and whole numbers.
func (f *Function) coefficientTolerance() float64 { return 16 * math.Sqrt(f.Tolerance()) / 10 }

// compare lists the functions of the table in which two quantities differ; ok is false
// if one of them is no sum of these functions.
func (t *trial) compare(tab *table, place int, of string, want, got func(r *canonical) float64) (terms []Term, ok bool) {
	found, expected := tab.fit(64*t.f.Tolerance(), got), tab.fit(64*t.f.Tolerance(), want)
	if found == nil || expected == nil {
		return nil, false
	}
	for j := range found {
		if math.Abs(found[j]-expected[j]) > t.f.coefficientTolerance() {
			terms = append(terms, Term{place, tab.basis[j].name, of, tidy(expected[j]), tidy(found[j])})
		}
	}
	return terms, true
}

// tidy takes rounding off a factor.
func tidy(x float64) float64 {
	if r := math.Round(x*24) / 24; math.Abs(x-r) < 1e-4 {
		return r
	}
	return x
}

// maxTerms is the number of terms that still count as an explanation.
const maxTerms = 8

// sumTerms compares results that are sums of terms.
func (t *trial) sumTerms(m *Miss, c candidate, rows []Sample) []Term {
	tab := t.tabulate(t.f.basis(m.Reading, c.combo), rows, c.combo)
	if tab == nil {
		return nil
	}
	var all []Term
	want := make([]float64, size(t.f.Out))
	divisor := t.divisor(m.Reading)
	for _, place := range m.Components {
		k := t.canonicalPlace(place, c.combo)
		if k >= len(want) {
			return nil
		}
		terms, ok := t.compare(tab, place, "", func(r *canonical) float64 {
			c.h.eval(r.in, want)
			c.h.alignSign(want, r.out)
			return want[k] * divisor(r.in)
		}, func(r *canonical) float64 { return r.out[k] * divisor(r.in) })
		if !ok {
			return nil
		}
		all = append(all, terms...)
	}
	if len(all) > maxTerms*max(1, len(m.Components)/2) {
		return nil
	}
	return all
}

// divisor is what makes a quotient of polynomials one of them.
func (t *trial) divisor(r Reading) func(in []float64) float64 {
	if r.Op == MatrixInverse && t.f.In[0].Kind == Matrix3 {
		return func(in []float64) float64 { return determinant(in, 3) }
	}
	return func([]float64) float64 { return 1 }
}

// canonicalPlace is where a stored result stands among the canonical ones.
func (t *trial) canonicalPlace(place int, c combo) int {
	at := 0
	for i, o := range t.f.Out {
		if place < at+o.Size {
			if o.Kind == Quaternion {
				for k, p := range c.out[i] {
					if int(p) == place-at {
						return at + k
					}
				}
			}
			return place
		}
		at += o.Size
	}
	return place
}

// edit looks for one input that is read in place of another, or with its sign
// changed.
func (t *trial) edit(m *Miss, c candidate, rows []Sample) string {
	var names []string
	var operand []int
	for i, o := range t.f.In {
		names = append(names, operandNames(o, c.combo.in[i])...)
		for range o.Size {
			operand = append(operand, i)
		}
	}
	want := make([]float64, size(t.f.Out))
	agrees := func(change func(in []float64)) bool {
		for i := range rows[:min(len(rows), 24)] {
			r := t.canonical(&rows[i], c.combo)
			in := slices.Clone(r.in)
			change(in)
			c.h.eval(in, want)
			c.h.alignSign(want, r.out)
			for k, x := range r.out {
				if !(t.f.componentError(m.Reading, want[k], x) <= t.f.Tolerance()) {
					return false
				}
			}
		}
		return len(rows) > 3
	}
	for i := range names {
		if agrees(func(in []float64) { in[i] = -in[i] }) {
			return "with the sign of " + names[i] + " changed"
		}
		if k := t.f.In[operand[i]].Kind; k == Three || k == Scalar {
			if agrees(func(in []float64) { in[i] /= 2 }) {
				return "with half of " + names[i]
			}
			if agrees(func(in []float64) { in[i] *= 2 }) {
				return "with twice " + names[i]
			}
		}
		for j := range names {
			if i != j && agrees(func(in []float64) { in[i] = in[j] }) {
				return "with " + names[j] + " read where " + names[i] + " stands"
			}
			if i < j && operand[i] == operand[j] && agrees(func(in []float64) { in[i], in[j] = in[j], in[i] }) {
				return "with " + names[i] + " and " + names[j] + " exchanged"
			}
		}
	}
	return ""
}
