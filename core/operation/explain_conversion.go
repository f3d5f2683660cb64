package operation

import (
	"math"
	"sort"

	"dextral/core/angle"
)

// elements is the basis of a rotation's matrix: its elements, or the products of
// two of a quaternion's numbers; the second form has no constant, because on
// the unit sphere the sum of the squares is one.
func (t *trial) elements(c candidate) []factorFunc {
	names := operandNames(t.f.In[0], c.combo.in[0])
	switch t.f.In[0].Kind {
	case Quaternion:
		return quadratic(names, 0)
	case Matrix4:
		var all []factorFunc
		for i := range 3 {
			for j := range 3 {
				all = append(all, factorFunc{names[4*i+j], func(in []float64) float64 { return in[4*i+j] }})
			}
		}
		return append(all, factorFunc{"1", one.of})
	}
	return append(linearIn(names, 0), factorFunc{"1", one.of})
}

// matrixTerms explains a quaternion of a matrix: in each branch, four times the
// product of a component with the one that is computed first is a sum of
// elements.
func (t *trial) matrixTerms(m *Miss, c candidate, rows []Sample) []Term {
	tab := t.tabulate(t.elements(c), rows, c.combo)
	if tab == nil {
		return nil
	}
	want := make([]float64, 4)
	expected := func(r *canonical) []float64 {
		c.h.eval(r.in, want)
		c.h.alignSign(want, r.out)
		return want
	}
	var best []Term
	for _, first := range largest(tab.rows, expected) {
		var all []Term
		ok := true
		for _, place := range m.Components {
			k := t.canonicalPlace(place, c.combo)
			var terms []Term
			terms, ok = t.compare(tab, place, "four times its product with "+t.resultName(first, c), func(r *canonical) float64 {
				e := expected(r)
				return 4 * e[first] * e[k]
			}, func(r *canonical) float64 {
				e := expected(r)
				if k == first {
					return 4 * r.out[k] * r.out[k]
				}
				return 4 * e[first] * r.out[k]
			})
			if !ok {
				break
			}
			all = append(all, terms...)
		}
		if ok && len(all) > 0 && (best == nil || len(all) < len(best)) {
			best = all
		}
	}
	if best != nil {
		return best
	}
	return t.firstComponent(m, c, tab, expected)
}

// largest lists the components by their size in the samples of a branch: the one that
// is computed first is meant to be the greatest there.
func largest(rows []canonical, expected func(*canonical) []float64) []int {
	var squares [4]float64
	for i := range rows {
		for k, x := range expected(&rows[i]) {
			squares[k] += x * x
		}
	}
	order := []int{0, 1, 2, 3}
	sort.SliceStable(order, func(i, j int) bool { return squares[order[i]] > squares[order[j]] })
	return order
}

// firstComponent explains the case that the component computed first is wrong, and
// the others with it, because they are divided by it.
func (t *trial) firstComponent(m *Miss, c candidate, tab *table, expected func(*canonical) []float64) []Term {
	var best []Term
	for _, place := range m.Components {
		k := t.canonicalPlace(place, c.combo)
		terms, ok := t.compare(tab, place, "four times its square",
			func(r *canonical) float64 { e := expected(r)[k]; return 4 * e * e },
			func(r *canonical) float64 { return 4 * r.out[k] * r.out[k] })
		if ok && len(terms) > 0 && (best == nil || len(terms) < len(best)) {
			best = terms
		}
	}
	return best
}

// resultName is what the author calls a canonical number of the result.
func (t *trial) resultName(k int, c candidate) string {
	o := t.f.Out[0]
	names := operandNames(o, c.combo.out[0])
	if k < len(names) {
		return names[k]
	}
	return ""
}

// angleTerms explains angles: the sine of the middle one is an element, and of the outer
// ones sine and cosine, each times a common factor, are elements.
func (t *trial) angleTerms(m *Miss, c candidate, rows []Sample) []Term {
	tab := t.tabulate(t.elements(c), rows, c.combo)
	if tab == nil {
		return nil
	}
	unit := m.Reading.Unit.InRadians()
	want := make([]float64, 3)
	way := m.Reading.Angles
	middle := way.Order[1]
	var all []Term
	for _, place := range m.Components {
		got := func(r *canonical) float64 { return r.out[place] * unit }
		expected := func(r *canonical) float64 { c.h.eval(r.in, want); return want[place] * unit }
		terms, ok := []Term(nil), false
		if place == middle {
			of := func(x float64) float64 { return math.Sin(x) }
			name := "its sine"
			if way.Seq.Proper() {
				of, name = math.Cos, "its cosine"
			}
			terms, ok = t.compare(tab, place, name, func(r *canonical) float64 { return of(expected(r)) }, func(r *canonical) float64 { return of(got(r)) })
		} else {
			terms, ok = t.outerTerms(tab, place, common(way.Seq, func(r *canonical) float64 { c.h.eval(r.in, want); return want[middle] * unit }), expected, got)
		}
		if !ok {
			return nil
		}
		all = append(all, terms...)
	}
	return all
}

// common is the factor with which sine and cosine of the outer angles are elements
// of the matrix.
func common(s angle.Sequence, middle func(*canonical) float64) func(*canonical) float64 {
	return func(r *canonical) float64 {
		if s.Proper() {
			return math.Sin(middle(r))
		}
		return math.Cos(middle(r))
	}
}

// outerTerms tries which of the two arguments of the arc tangent is wrong.
func (t *trial) outerTerms(tab *table, place int, factor, expected, got func(*canonical) float64) ([]Term, bool) {
	up := func(r *canonical) float64 { return factor(r) * math.Sin(expected(r)) }
	down := func(r *canonical) float64 { return factor(r) * math.Cos(expected(r)) }
	tries := []struct {
		of        string
		want, got func(*canonical) float64
	}{
		{"the first argument of its arc tangent", up, func(r *canonical) float64 { return down(r) * math.Tan(got(r)) }},
		{"the second argument of its arc tangent", down, func(r *canonical) float64 { return up(r) / math.Tan(got(r)) }},
		{"its sine", func(r *canonical) float64 { return math.Sin(expected(r)) }, func(r *canonical) float64 { return math.Sin(got(r)) }},
	}
	for _, try := range tries {
		if terms, ok := t.compare(tab, place, try.of, try.want, try.got); ok && len(terms) > 0 && len(terms) <= maxTerms {
			return terms, true
		}
	}
	return nil, false
}
