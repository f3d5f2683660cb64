package operation

import (
	"math"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/core/matrix"
	"dextral/core/rotor"
)

// solvers read conventions off the values at chosen inputs, where enumeration
// would be long.
var solvers = map[Shape]func(*trial) []hypothesis{}

func init() {
	for _, k := range []string{"q", "m", "h"} {
		solvers[Shape{"v", k}] = fromAngles
		solvers[Shape{k, "v"}] = toAngles
		known("s", k, axisTurns)
	}
	known("sv", "v", func() []hypothesis { return turnsAboutAxes(1, 0) })
	known("vs", "v", func() []hypothesis { return turnsAboutAxes(0, 3) })
	solvers[Shape{"v", "v"}] = linearMap
	solvers[Shape{"q", "q"}] = axisMapped
}

// customary are the orders that are assumed for quaternions where the values
// cannot tell the order from the names of the axes.
func (t *trial) customary() []combo {
	if len(t.combos) == 1 {
		return t.combos
	}
	var all []combo
	for _, c := range t.combos {
		fine := true
		for _, o := range c.orders(t.f.In, t.f.Out) {
			fine = fine && (o == ScalarFirst || o == ScalarLast)
		}
		if fine {
			all = append(all, c)
		}
	}
	return all
}

// at evaluates the function at chosen inputs.
func (t *trial) at(inputs ...[]float64) []Sample {
	samples := make([]Sample, len(inputs))
	for i, in := range inputs {
		samples[i].In = in
	}
	t.f.Eval(samples)
	return samples
}

// probe is the single angle at which a conversion is asked for its axes: less
// than half a turn in radians, twice over.
const probe = 0.75

// fromAngles: with one angle alone the rotation is about one axis, by the angle in
// its unit. The order of the turns is what is left.
func fromAngles(t *trial) []hypothesis {
	samples := t.at([]float64{0, 0, 0}, []float64{probe, 0, 0}, []float64{0, probe, 0}, []float64{0, 0, probe})
	for _, s := range samples {
		if !s.OK {
			return nil
		}
	}
	var all []hypothesis
	for _, c := range t.customary() {
		read := func(s Sample) rotor.Rotor { return rotationIn(reordered(s.Out, t.f.Out, c.out)) }
		if !(halfTurn(read(samples[0])) <= 4*t.f.Tolerance()) {
			continue
		}
		var turns [3]turn
		ok := true
		for i := range 3 {
			turns[i], ok = t.turnOf(read(samples[i+1]))
			if !ok || turns[i].unit != turns[0].unit || turns[i].scale != turns[0].scale {
				ok = false
				break
			}
		}
		if ok {
			all = append(all, sequences(turns, c.orders(t.f.In, t.f.Out))...)
		}
	}
	return all
}

// turn is a rotation about a coordinate axis by a multiple of the probe.
type turn struct {
	axis    angle.Axis
	negated bool
	unit    convention.Unit
	scale   float64
}

func (t *trial) turnOf(r rotor.Rotor) (turn, bool) {
	v := r.RotationVector()
	c := [3]float64{v.X, v.Y, v.Z}
	var a turn
	for i, x := range c {
		if math.Abs(x) > math.Abs(c[a.axis]) {
			a.axis = angle.Axis(i)
		}
	}
	a.negated = c[a.axis] < 0
	if !(math.Hypot(c[(a.axis+1)%3], c[(a.axis+2)%3]) <= 4*t.f.Tolerance()) {
		return a, false
	}
	for _, a.unit = range units {
		for _, a.scale = range scales {
			if math.Abs(math.Abs(c[a.axis])-probe*a.unit.InRadians()*a.scale) <= 4*t.f.Tolerance()*a.unit.InRadians() {
				return a, true
			}
		}
	}
	return a, false
}

var permutations = [6][3]int{{0, 1, 2}, {0, 2, 1}, {1, 0, 2}, {1, 2, 0}, {2, 0, 1}, {2, 1, 0}}

// sequences lists the orders in which three turns about known axes may be
// made, about moving axes.
func sequences(turns [3]turn, orders []Order) []hypothesis {
	var all []hypothesis
	for _, p := range permutations {
		seq := angle.Sequence{Axes: [3]angle.Axis{turns[p[0]].axis, turns[p[1]].axis, turns[p[2]].axis}}
		if !seq.Valid() {
			continue
		}
		way := angle.Reading{Seq: seq, Order: p}
		reading := Reading{Op: FromAngles, Angles: &way, Unit: turns[0].unit, Scale: turns[0].scale, Orders: orders}
		for i := range 3 {
			reading.Negated[i] = turns[i].negated
		}
		reading.normaliseSigns()
		all = append(all, hypothesis{reading: reading, sign: true, eval: func(in, out []float64) {
			putRotation(out, reading.rotation(in))
		}})
	}
	return all
}

// normaliseSigns takes three turns with all signs wrong for the reverse of the
// turns backwards.
func (r *Reading) normaliseSigns() {
	if r.Negated != [3]bool{true, true, true} {
		return
	}
	way := *r.Angles
	way.Seq.Axes[0], way.Seq.Axes[2] = way.Seq.Axes[2], way.Seq.Axes[0]
	way.Order[0], way.Order[2] = way.Order[2], way.Order[0]
	r.Angles, r.Negated, r.Reversed[0] = &way, [3]bool{}, true
}

// rotation is that of three angles as the reading has it.
func (r *Reading) rotation(n []float64) rotor.Rotor {
	var a [3]float64
	for i, x := range n[:3] {
		a[i] = x * r.Unit.InRadians()
		if r.Scale != 0 {
			a[i] *= r.Scale
		}
		if r.Negated[i] {
			a[i] = -a[i]
		}
	}
	turned := r.Angles.Rotor(a)
	if r.Reversed[0] {
		turned = turned.Reverse()
	}
	return turned
}

// toAngles tries every sequence, order, sign and unit: the rotation of the
// angles must be the one put in.
func toAngles(t *trial) []hypothesis {
	var all []hypothesis
	var first *Sample
	for i := range t.samples {
		if s := &t.samples[i]; s.OK && s.Family == Unit {
			first = s
			break
		}
	}
	if first == nil {
		return nil
	}
	for _, c := range t.customary() {
		one := t.canonical(first, c)
		want := rotationIn(one.in)
		orders := c.orders(t.f.In, t.f.Out)
		for _, unit := range units {
			for _, seq := range angle.Sequences()[:12] {
				for _, p := range permutations {
					for signs := range 8 {
						way := angle.Reading{Seq: seq, Order: p}
						reading := Reading{Op: AnglesOf, Angles: &way, Unit: unit, Orders: orders, Negated: [3]bool{signs&1 != 0, signs&2 != 0, signs&4 != 0}}
						if !(apart(reading.rotation(one.out), want) <= 8*t.f.Tolerance()) {
							continue
						}
						reading.normaliseSigns()
						all = append(all, hypothesis{reading: reading, miss: func(in, out []float64) float64 {
							return apart(reading.rotation(out), rotationIn(in))
						}})
					}
				}
			}
		}
	}
	return all
}

// axisTurns are rotations by one angle about a coordinate axis.
func axisTurns() []hypothesis {
	var all []hypothesis
	for axis := range 3 {
		for _, unit := range units {
			for _, scale := range scales {
				for _, reversed := range [2]bool{false, true} {
					reading := Reading{Op: AxisTurn, Axis: "xyz"[axis : axis+1], Unit: unit, Scale: scale, Reversed: [2]bool{reversed}}
					all = append(all, hypothesis{reading: reading, sign: true, eval: func(in, out []float64) {
						putRotation(out, aboutAxis(axis, in[0]*unit.InRadians()*scale, reversed))
					}})
				}
			}
		}
	}
	return all
}

func aboutAxis(axis int, a float64, reversed bool) rotor.Rotor {
	if reversed {
		a = -a
	}
	sin, cos := math.Sincos(a / 2)
	q := [4]float64{cos}
	q[axis+1] = sin
	return quat(q[:])
}

// turnsAboutAxes turn a vector about a coordinate axis.
func turnsAboutAxes(v, s int) []hypothesis {
	all := []hypothesis{
		{reading: Reading{Op: Scaled}, eval: func(in, out []float64) { putVec(out, vec(in[v:]).Scale(in[s])) }},
		{reading: Reading{Op: Scaled, Detail: "divided"}, eval: func(in, out []float64) { putVec(out, vec(in[v:]).Scale(1/in[s])) }},
	}
	for axis := range 3 {
		for _, unit := range units {
			for _, reversed := range [2]bool{false, true} {
				reading := Reading{Op: RotateVector, Axis: "xyz"[axis : axis+1], Unit: unit, Reversed: [2]bool{reversed}}
				all = append(all, hypothesis{reading: reading, eval: func(in, out []float64) {
					putVec(out, aboutAxis(axis, in[s]*unit.InRadians(), reversed).Rotate(vec(in[v:])))
				}})
			}
		}
	}
	return all
}

// linearMap reads the matrix off the images of the axes.
func linearMap(t *trial) []hypothesis {
	s := t.at([]float64{0, 0, 0}, []float64{1, 0, 0}, []float64{0, 1, 0}, []float64{0, 0, 1})
	for _, x := range s {
		if !x.OK {
			return nil
		}
	}
	if vec(s[0].Out).Norm() != 0 {
		return nil
	}
	m := matrix.FromColumns(vec(s[1].Out), vec(s[2].Out), vec(s[3].Out))
	if !m.Finite() {
		return nil
	}
	reading := Reading{Op: LinearMap, Map: &m}
	if m == matrix.Identity {
		reading = Reading{Op: Copy}
	}
	return []hypothesis{{reading: reading, eval: func(in, out []float64) { putVec(out, m.Apply(vec(in))) }}}
}

// axisMapped reads a map of quaternions as a change of axes: f(q) f(1)~ is the
// rotation q in other axes. A map of the vector part that is no rotation is kept too: it
// is a mirror.
func axisMapped(t *trial) []hypothesis {
	var all []hypothesis
	for _, c := range t.customary() {
		units := [][]float64{{1, 0, 0, 0}, {0, 1, 0, 0}, {0, 0, 1, 0}, {0, 0, 0, 1}}
		var images [4]rotor.Rotor
		stored := make([][]float64, 4)
		for k, u := range units {
			stored[k] = make([]float64, 4)
			c.in[0].store(u, stored[k])
		}
		ok := true
		for k, s := range t.at(stored...) {
			ok = ok && s.OK
			images[k] = quat(reordered(s.Out, t.f.Out, c.out))
		}
		if !ok {
			continue
		}
		back := images[0].Reverse()
		var columns [3]rotor.Vec
		for k := range 3 {
			w, x, y, z := images[k+1].Mul(back).Quaternion()
			ok = ok && math.Abs(w) <= t.f.Tolerance()
			columns[k] = rotor.Vec{X: x, Y: y, Z: z}
		}
		m := matrix.FromColumns(columns[0], columns[1], columns[2])
		if !ok || m == matrix.Identity && images[0] == rotor.One {
			continue
		}
		reading := Reading{Op: AxisMapped, Map: &m, Orders: c.orders(t.f.In, t.f.Out)}
		if images[0] != rotor.One {
			reading.Detail = "and turned"
		}
		all = append(all, hypothesis{reading: reading, sign: true, eval: func(in, out []float64) {
			r := images[0].Scale(in[0])
			for k := range 3 {
				r = r.Add(images[k+1].Scale(in[k+1]))
			}
			putQuat(out, r)
		}})
	}
	return all
}
