package operation

import (
	"math"
	"slices"
	"sort"

	"dextral/core/angle"
	"dextral/core/convention"
)

// candidate is a hypothesis in one storage with its score.
type candidate struct {
	h     hypothesis
	combo combo
	score float64 // share of results that differ, and a little for how much
}

// rank scores hypotheses and returns the best few.
func (t *trial) rank(list []hypothesis) []candidate {
	var all []candidate
	few := t.few()
	for _, c := range t.combos {
		ready := make([]canonical, len(few))
		for i := range few {
			ready[i] = t.canonical(&few[i], c)
		}
		for _, h := range list {
			if len(h.reading.Orders) > 0 && !equalOrders(h.reading.Orders, c.orders(t.f.In, t.f.Out)) {
				continue
			}
			h.reading.Orders = c.orders(t.f.In, t.f.Out)
			all = append(all, candidate{h, c, t.score(&h, ready)})
		}
	}
	sort.SliceStable(all, func(i, j int) bool { return all[i].score < all[j].score })
	return all[:min(len(all), 12)]
}

// few picks samples of all families.
func (t *trial) few() []Sample {
	var some []Sample
	count := map[Family]int{}
	for _, s := range t.samples {
		if count[s.Family]++; count[s.Family] <= 12 {
			some = append(some, s)
		}
	}
	return some
}

func (t *trial) score(h *hypothesis, samples []canonical) float64 {
	differ, total, size := 0, 0, 0.0
	want := make([]float64, 16)
	for _, s := range samples {
		if h.valid != nil && !h.valid(s.in) {
			continue
		}
		w := want[:len(s.out)]
		h.eval(s.in, w)
		h.alignSign(w, s.out)
		for k, x := range s.out {
			total++
			e := t.f.componentError(h.reading, w[k], x)
			if !(e <= t.f.Tolerance()) {
				differ++
				size += math.Min(1, e)
			}
		}
	}
	if total == 0 {
		return 2
	}
	return (float64(differ) + 0.1*size) / float64(total)
}

// componentError is the distance of two numbers, as angles where they are some.
func (f *Function) componentError(r Reading, want, got float64) float64 {
	d := want - got
	if r.Op == AnglesOf {
		d = math.Remainder(d*r.Unit.InRadians(), 2*math.Pi)
	}
	d = math.Abs(d) / math.Max(1, math.Abs(want))
	if math.IsNaN(d) {
		return math.Inf(1)
	}
	return d
}

// alignSign gives an expected quaternion of either sign the one that is nearer,
// by the number of components that agree.
func (h *hypothesis) alignSign(want, got []float64) {
	if !h.sign || len(want) != 4 {
		return
	}
	plus, minus := 0.0, 0.0
	for k := range want {
		plus += math.Min(1e-3, math.Abs(want[k]-got[k]))
		minus += math.Min(1e-3, math.Abs(want[k]+got[k]))
	}
	if minus < plus {
		for k := range want {
			want[k] = -want[k]
		}
	}
}

// enumerated lists hypotheses that are solved for when a function is right.
func (f *Function) enumerated(ops []Op) []hypothesis {
	var all []hypothesis
	from, to := slices.Contains(ops, FromAngles), slices.Contains(ops, AnglesOf)
	if solvers[f.Shape()] == nil || !from && !to || f.In[0].Kind == Three == (f.Out[0].Kind == Three) {
		return nil
	}
	for _, unit := range units {
		for _, seq := range angle.Sequences()[:12] {
			for _, p := range permutations {
				for _, reversed := range [2]bool{false, true} {
					way := angle.Reading{Seq: seq, Order: p}
					r := Reading{Op: FromAngles, Angles: &way, Unit: unit, Reversed: [2]bool{reversed}}
					if f.In[0].Kind == Three {
						all = append(all, hypothesis{reading: r, sign: true, eval: func(in, out []float64) { putRotation(out, r.rotation(in)) }})
						continue
					}
					r.Op = AnglesOf
					all = append(all, hypothesis{reading: r, eval: func(in, out []float64) { r.putAngles(in, out, unit) }})
				}
			}
		}
	}
	return all
}

// putAngles are the angles of a rotation as the reading has them.
func (r *Reading) putAngles(in, out []float64, unit convention.Unit) {
	rotation := rotationIn(in)
	if r.Reversed[0] {
		rotation = rotation.Reverse()
	}
	n := r.Angles.Numbers(rotation).Numbers()
	for k := range out {
		out[k] = n[k] / unit.InRadians()
	}
}
