package operation

import (
	"math"
)

// trial is a function with its samples.
type trial struct {
	f        *Function
	samples  []Sample // evaluated: unit, wide, tiny, general
	combos   []combo
	constant bool // on the manifold
	offUnit  bool // some sample off it has a result
}

func newTrial(f *Function) *trial {
	t := &trial{f: f}
	for _, d := range []struct {
		family Family
		n      int
	}{{Unit, unitSamples}, {Wide, wideSamples}, {Tiny, tinySamples}, {General, generalSamples}} {
		t.samples = append(t.samples, Draw(f.In, d.family, d.n, 1)...)
	}
	f.Eval(t.samples)
	t.combos = combosOf(f.In, f.Out)
	return t
}

// maxIdentified bounds the samples by which a function is identified.
const maxIdentified = 320

// cover draws samples on the manifold as long as they take new paths, and evaluates
// them: a branch that is taken by one rotation in a hundred may be the wrong one.
func (t *trial) cover(most int) {
	paths := map[string]bool{}
	for i := range t.samples {
		paths[t.samples[i].Path] = true
	}
	if len(paths) < 2 {
		return
	}
	for seed := uint64(3); len(t.samples) < most; seed++ {
		more := Draw(t.f.In, Unit, 64, seed)
		t.f.Eval(more)
		news := false
		for i := range more {
			if !paths[more[i].Path] {
				news, paths[more[i].Path] = true, true
			}
		}
		t.samples = append(t.samples, more...)
		if !news {
			return
		}
	}
}

// useless says why the samples show nothing.
func (t *trial) useless() string {
	failed, total := 0, 0
	varies, variesUnit := false, false
	var first, firstUnit []float64
	for i := range t.samples {
		s := &t.samples[i]
		if s.Family == Unit {
			total++
			if !s.OK {
				failed++
				continue
			}
		}
		if !s.OK {
			continue
		}
		t.offUnit = t.offUnit || s.Family == General
		if first == nil {
			first = s.Out
		}
		varies = varies || differ(first, s.Out, t.f.Tolerance())
		if s.Family == Unit {
			if firstUnit == nil {
				firstUnit = s.Out
			}
			variesUnit = variesUnit || differ(firstUnit, s.Out, t.f.Tolerance())
		}
	}
	t.constant = !variesUnit
	switch {
	case failed > total/2:
		return "it gives no result for most inputs"
	case !varies:
		return "its result is constant"
	}
	return ""
}

func differ(a, b []float64, tolerance float64) bool {
	for i := range a {
		if !(math.Abs(a[i]-b[i]) <= tolerance*math.Max(1, math.Abs(a[i]))) {
			return true
		}
	}
	return false
}

// combo is one assumption on how the quaternions of a function are stored.
type combo struct {
	in, out []Order // of each operand; unknown for others
}

// orders lists those of the quaternions, for readings.
func (c combo) orders(in, out []Operand) (all []Order) {
	for i, o := range in {
		if o.Kind == Quaternion {
			all = append(all, c.in[i])
		}
	}
	for i, o := range out {
		if o.Kind == Quaternion {
			all = append(all, c.out[i])
		}
	}
	return all
}

// combosOf lists the ways in which the quaternions may be stored: one order
// for each type, and for each operand without one.
func combosOf(in, out []Operand) []combo {
	groups := map[string][]*Order{}
	var names []string
	base := combo{make([]Order, len(in)), make([]Order, len(out))}
	note := func(o Operand, at *Order) {
		if o.Kind != Quaternion {
			return
		}
		if o.Order.Known() {
			*at = o.Order
			return
		}
		if _, ok := groups[o.Type]; !ok {
			names = append(names, o.Type)
		}
		groups[o.Type] = append(groups[o.Type], at)
	}
	for i, o := range in {
		note(o, &base.in[i])
	}
	for i, o := range out {
		note(o, &base.out[i])
	}
	var all []combo
	var fill func(k int)
	fill = func(k int) {
		if k == len(names) {
			all = append(all, combo{append([]Order(nil), base.in...), append([]Order(nil), base.out...)})
			return
		}
		orders := Orders
		if k > 1 {
			orders = orders[:2] // more than two kinds of storage in one function: the customary ones
		}
		for _, o := range orders {
			for _, at := range groups[names[k]] {
				*at = o
			}
			fill(k + 1)
		}
	}
	fill(0)
	return all
}

// canonical is a sample with its quaternions in canonical order.
type canonical struct{ in, out []float64 }

func (t *trial) canonical(s *Sample, c combo) canonical {
	return canonical{reordered(s.In, t.f.In, c.in), reordered(s.Out, t.f.Out, c.out)}
}

func reordered(numbers []float64, list []Operand, orders []Order) []float64 {
	var n []float64
	at := 0
	for i, o := range list {
		if o.Kind == Quaternion && orders[i] != ScalarFirst {
			if n == nil {
				n = append([]float64(nil), numbers...)
			}
			orders[i].load(numbers[at:at+4], n[at:at+4])
		}
		at += o.Size
	}
	if n == nil {
		return numbers
	}
	return n
}

// search returns the hypotheses that agree with every sample on the manifold.
func (t *trial) search(list []hypothesis) []match {
	var found []match
	if len(list) == 0 {
		return nil
	}
	scratch := make([]float64, 16)
	for _, c := range t.combos {
		cache := make([]canonical, len(t.samples))
		for h := range list {
			if m, ok := t.test(&list[h], c, cache, scratch); ok {
				found = append(found, m)
			}
		}
	}
	return found
}

// confirm holds what was found against the samples of further branches.
func (t *trial) confirm(found []match) []match {
	before := len(t.samples)
	if t.cover(maxIdentified); len(t.samples) == before {
		return found
	}
	scratch := make([]float64, 16)
	var kept []match
	for _, m := range found {
		if again, ok := t.test(m.of, m.stored, make([]canonical, len(t.samples)), scratch); ok {
			kept = append(kept, again)
		}
	}
	return kept
}

// test holds a hypothesis against the samples, and stops at the first that
// disagrees.
func (t *trial) test(h *hypothesis, c combo, cache []canonical, scratch []float64) (match, bool) {
	if len(h.reading.Orders) > 0 && !equalOrders(h.reading.Orders, c.orders(t.f.In, t.f.Out)) {
		return match{}, false // solved for another storage
	}
	m := match{reading: h.reading, general: t.offUnit, of: h, stored: c}
	tested := 0
	tolerance := t.f.Tolerance()
	for i := range t.samples {
		s := &t.samples[i]
		if !s.OK {
			continue
		}
		if cache[i].in == nil {
			cache[i] = t.canonical(s, c)
		}
		e := h.error(cache[i].in, cache[i].out, scratch)
		if math.IsNaN(e) {
			continue
		}
		if s.Family == General {
			m.general = m.general && e <= tolerance
			continue
		}
		if e > tolerance {
			return match{}, false
		}
		tested++
		m.error = math.Max(m.error, e)
	}
	if tested < unitSamples/2 {
		return match{}, false
	}
	m.reading.Orders = c.orders(t.f.In, t.f.Out)
	return m, true
}
