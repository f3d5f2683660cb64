package identify

import (
	"math"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/core/rotor"
)

// probe is the single angle at which a conversion is asked for its axes, in
// the unit of the function: small enough to stay within half a turn in radians.
const probe = 0.5

// solveAngles reads a conversion from three angles off its values: with one
// angle alone it turns about one axis, by the angle in its unit. The order of the turns
// is what is left, six at most.
func (f Function) solveAngles() []hypothesis {
	var all []hypothesis
	for _, o := range inputs(f.Out) {
		if o.reversed {
			continue // the turns backwards, with signs: the same functions again
		}
		evaluate := func(n [3]float64) rotor.Rotor {
			out := make([]float64, f.Out)
			f.Eval(n[:], out)
			return o.rotor(out)
		}
		if evaluate([3]float64{}).TurnAngle() > f.angleTolerance() {
			continue
		}
		var axes [3]angle.Axis
		var negated [3]bool
		var unit convention.Unit
		ok := true
		for i := range 3 {
			n := [3]float64{}
			n[i] = probe
			var u convention.Unit
			axes[i], negated[i], u, ok = f.turnOf(evaluate(n))
			if !ok || i > 0 && u != unit {
				ok = false
				break
			}
			unit = u
		}
		if ok {
			all = append(all, turnsWith(axes, negated, unit, o, f.Out)...)
		}
	}
	return all
}

// angleTolerance is the tolerance as an angle: the error of a unit quaternion
// shows doubled in the rotation.
func (f Function) angleTolerance() float64 { return 4 * f.tolerance() }

// turnOf says about which axis, in which sense and unit a rotation by probe is.
func (f Function) turnOf(r rotor.Rotor) (axis angle.Axis, negated bool, unit convention.Unit, ok bool) {
	v := r.RotationVector()
	c := [3]float64{v.X, v.Y, v.Z}
	for i, x := range c {
		if math.Abs(x) > math.Abs(c[axis]) {
			axis = angle.Axis(i)
		}
	}
	size := math.Abs(c[axis])
	if math.Hypot(c[(axis+1)%3], c[(axis+2)%3]) > f.angleTolerance() {
		return axis, false, 0, false
	}
	for _, u := range units {
		if math.Abs(size-probe*u.InRadians()) <= f.angleTolerance() {
			return axis, c[axis] < 0, u, true
		}
	}
	return axis, false, 0, false
}

// turnsWith lists the orders in which three turns about known axes can be made.
func turnsWith(axes [3]angle.Axis, negated [3]bool, unit convention.Unit, o notation, size int) []hypothesis {
	var all []hypothesis
	for way := range turnNames {
		t := turnNames[way][0]
		fits := true
		for k, number := range t.Order {
			fits = fits && t.Sequence.Axes[k] == axes[number]
		}
		if !fits {
			continue
		}
		t.Negated = negated
		reading := FunctionReading{What: "rotation of angles", Turns: &t, Unit: unit, Scalars: [3]convention.ScalarPlace{o.place}}
		all = append(all, hypothesis{reading, func(in, out []float64) {
			h := halfTurns(in, unit.InRadians())
			o.put(t.rotor(&h, &t.Negated), out)
		}, size == 4})
	}
	return all
}

// matchAngles finds the sequences by which a function of a rotation could have
// computed its three numbers: those whose rotation is the one put in, in every
// sample. The numbers themselves are compared as rotations, since half of all triples
// are another triple's rotation.
func (f Function) matchAngles(s samples) []FunctionReading {
	var all []FunctionReading
	for _, in := range inputs(f.In[0]) {
		if in.reversed {
			continue
		}
		for _, unit := range units {
			for way := range turnNames {
				for signs := range negations {
					if worst := f.worstTurns(s, in, unit, way, signs); worst <= f.angleTolerance() {
						t := turnNames[way][0]
						t.Negated = negations[signs]
						all = append(all, FunctionReading{
							What: "angles", Turns: &t, Unit: unit, Scalars: [3]convention.ScalarPlace{in.place}, Error: worst,
						})
					}
				}
			}
		}
	}
	return all
}

// worstTurns is the largest angle between a rotation put in and the one of the
// angles given out; it stops at the first that is too large.
func (f Function) worstTurns(s samples, in notation, unit convention.Unit, way, signs int) float64 {
	worst := 0.0
	for i := range s.in {
		h := halfTurns(s.out[i], unit.InRadians())
		worst = math.Max(worst, rotor.Angle(turnNames[way][0].rotor(&h, &negations[signs]), in.rotor(s.in[i])))
		if worst > f.angleTolerance() {
			break
		}
	}
	return worst
}
