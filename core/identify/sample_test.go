package identify

import (
	"fmt"
	"math"
	"math/rand/v2"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/core/matrix"
	"dextral/core/rotor"
	"dextral/core/tolerance"
)

// A shape is a family of orientations.
type shape struct {
	name    string
	generic bool
	draw    func(*rand.Rand) rotor.Rotor
}

func haar(g *rand.Rand) rotor.Rotor {
	r, _ := rotor.Rotor{S: g.NormFloat64(), E23: g.NormFloat64(), E31: g.NormFloat64(), E12: g.NormFloat64()}.Unit()
	return r
}

func small(g *rand.Rand) rotor.Rotor {
	return rotor.FromRotationVector(rotor.Vec{X: g.NormFloat64(), Y: g.NormFloat64(), Z: g.NormFloat64()}.Scale(0.02))
}

func axisTurn(g *rand.Rand, angle float64) rotor.Rotor {
	n := [3]float64{}
	n[g.IntN(3)] = angle
	return rotor.FromRotationVector(rotor.Vec{X: n[0], Y: n[1], Z: n[2]})
}

func anyCube(g *rand.Rand) rotor.Rotor { return cubes[g.IntN(24)] }

// shapes are what orientations in files look like, from the generic to those
// that decide nothing.
var shapes = []shape{
	{"generic", true, haar},
	{"within some degrees of identity", false, small},
	{"within some degrees of an axis map", false, func(g *rand.Rand) rotor.Rotor { return anyCube(g).Mul(small(g)) }},
	{"one axis", false, func(g *rand.Rand) rotor.Rotor { return axisTurn(g, (g.Float64()-.5)*6) }},
	{"one axis, multiple of 5 degrees", false, func(g *rand.Rand) rotor.Rotor {
		return axisTurn(g, float64(g.IntN(73)-36)*5*math.Pi/180)
	}},
	{"two axes", false, func(g *rand.Rand) rotor.Rotor {
		return axisTurn(g, (g.Float64()-.5)*6).Mul(axisTurn(g, (g.Float64()-.5)*3))
	}},
	{"axis map", false, anyCube},
}

// A digits is a way in which numbers are rounded.
type digits struct {
	name      string
	round     func(float64) float64
	precision tolerance.Precision
}

func decimals(n int) digits {
	scale := math.Pow(10, float64(n))
	return digits{fmt.Sprintf("%d decimals", n), func(x float64) float64 { return math.Round(x*scale) / scale },
		tolerance.Precision{Half: 0.5 / scale, Double: n > 9}}
}

const sixDecimals = "6 decimals"

var roundings = []digits{
	decimals(3), decimals(4), decimals(6), decimals(9),
	{"float32", func(x float64) float64 { return float64(float32(x)) }, tolerance.Precision{}},
	{"float64", func(x float64) float64 { return x }, tolerance.Precision{Double: true}},
}

// sample is a pair of statements before rounding.
type sample struct {
	a, b    Statement
	unit    convention.Unit // in which the angles of a are written
	planted changeSet
	outside bool // the two have nothing to do with each other
}

// write states r in a form and with the conventions of the claim.
func write(form convention.Form, r rotor.Rotor, c Claim) []float64 {
	unit := c.Unit.InRadians()
	w, x, y, z := r.Quaternion()
	switch form {
	case convention.Quaternion:
		if c.Scalar == convention.ScalarLast {
			return []float64{x, y, z, w}
		}
		return []float64{w, x, y, z}
	case convention.Rotation:
		m := matrix.FromRotor(r)
		return append(append(append([]float64{}, m[0][:]...), m[1][:]...), m[2][:]...)
	case convention.RotationVector:
		v := r.RotationVector().Scale(1 / unit)
		return []float64{v.X, v.Y, v.Z}
	case convention.AxisAngle:
		axis, angle := r.AxisAngle()
		return []float64{axis.X, axis.Y, axis.Z, angle / unit}
	}
	n := c.Label.Readings[0].Numbers(r).Numbers()
	return []float64{n[0] / unit, n[1] / unit, n[2] / unit}
}

// roundTo rounds the numbers of a statement and gives it the tolerance of its
// digits. Degrees lose two decimals, which they do not need.
func (d digits) roundTo(s Statement, unit convention.Unit) Statement {
	p, round := d.precision, d.round
	if s.Form == convention.Angles && unit == convention.Degree && p.Half > 0 {
		p.Half *= 100
		round = func(x float64) float64 { return 100 * d.round(x/100) }
	}
	n := make([]float64, len(s.Numbers))
	for i, x := range s.Numbers {
		n[i] = round(x)
	}
	s.Numbers = n
	switch s.Form {
	case convention.Quaternion:
		s.Tolerance = p.Quaternion()
	case convention.Rotation:
		s.Tolerance = p.Matrix()
	case convention.RotationVector:
		s.Tolerance = p.RotationVector(s.Claim.Unit)
	case convention.AxisAngle:
		s.Tolerance = p.AxisAngle(s.Claim.Unit)
	default:
		s.Tolerance = p.Angles(s.Claim.Unit)
	}
	return s
}

// A kind is a pair of forms.
type kind struct {
	a, b  convention.Form
	bare  bool // nothing is claimed
	title string
}

var kinds = []kind{
	{convention.Quaternion, convention.Rotation, false, "quaternion, matrix"},
	{convention.Angles, convention.Quaternion, false, "angles, quaternion"},
	{convention.Angles, convention.Rotation, false, "angles, matrix"},
	{convention.Angles, convention.Quaternion, true, "angles, quaternion, nothing claimed"},
	{convention.Quaternion, convention.Quaternion, false, "two quaternions"},
	{convention.Rotation, convention.Rotation, false, "two matrices"},
	{convention.RotationVector, convention.Quaternion, false, "rotation vector, quaternion"},
	{convention.AxisAngle, convention.Rotation, false, "axis and angle, matrix"},
}

func fullLabel(s angle.Sequence) *angle.Label {
	return &angle.Label{Text: s.String(), Full: true, Readings: []angle.Reading{{Seq: s, Order: [3]int{0, 1, 2}}}}
}

func anySequence(g *rand.Rand) angle.Sequence { return angle.Sequences()[g.IntN(24)] }

func (k kind) claim(g *rand.Rand, form convention.Form) Claim {
	c := Claim{Direction: convention.Direction{To: "map", From: "hull"}}
	switch form {
	case convention.Quaternion:
		c.Scalar = convention.ScalarFirst + convention.ScalarPlace(g.IntN(2))
	case convention.Angles:
		c.Label = fullLabel(anySequence(g))
		c.Unit = convention.Radian + convention.Unit(g.IntN(2))
	case convention.RotationVector, convention.AxisAngle:
		c.Unit = convention.Radian + convention.Unit(g.IntN(2))
	}
	return c
}

// slips lists the changes that can be planted in a pair of this kind.
func (k kind) slips() []Change {
	if k.bare {
		return nil
	}
	all := []Change{Inverse, Remap}
	for _, f := range [2]convention.Form{k.a, k.b} {
		switch f {
		case convention.Quaternion:
			all = append(all, ScalarOrder, HalfAngle)
		case convention.Rotation:
			all = append(all, Mirror)
		case convention.Angles:
			all = append(all, UnitSlip, MovingFixed, Sequence, AngleOrder, AngleSign)
		default:
			all = append(all, UnitSlip, HalfAngle)
		}
	}
	return all
}

// sample draws a pair: a third as claimed, a third with one slip or two, a
// third without any relation in the set.
func (k kind) sample(g *rand.Rand, sh shape) sample {
	r := sh.draw(g)
	other := r
	var planted changeSet
	s := sample{}
	switch slips := k.slips(); g.IntN(3) {
	case 1:
		for range 1 + g.IntN(2) {
			if len(slips) > 0 {
				planted |= set(slips[g.IntN(len(slips))])
			}
		}
		if planted.has(Remap) && planted.has(HalfAngle) || planted.has(Mirror) && planted&set(Remap, HalfAngle) != 0 {
			planted &^= set(HalfAngle, Mirror) // not joined in the set
		}
		other = planted.turn(g, r)
	case 2:
		s.outside = true
		other = sh.draw(g)
		if g.IntN(2) == 0 { // the same, measured again
			other = r.Mul(small(g))
		}
	}
	claimA, claimB := k.claim(g, k.a), k.claim(g, k.b)
	s.a = Statement{Form: k.a, Claim: claimA, Numbers: write(k.a, r, claimA)}
	s.b = Statement{Form: k.b, Claim: claimB, Numbers: write(k.b, other, claimB)}
	s.unit, s.planted = claimA.Unit, planted
	planted.misstate(g, &s.a, &s.b)
	if k.bare {
		s.a.Claim, s.b.Claim = Claim{}, Claim{}
	}
	return s
}

// turn plants the changes that are relations between rotations.
func (c changeSet) turn(g *rand.Rand, r rotor.Rotor) rotor.Rotor {
	if c.has(HalfAngle) {
		r = r.Mul(r)
	}
	if c.has(Inverse) {
		r = r.Reverse()
	}
	if c.has(Remap) {
		m := cubes[1+g.IntN(23)]
		switch g.IntN(3) {
		case 0:
			r = m.Mul(r)
		case 1:
			r = r.Mul(m)
		default:
			r = m.Mul(r).Mul(m.Reverse())
		}
	}
	return r
}

// misstate plants the changes that are slips of claims and numbers.
func (c changeSet) misstate(g *rand.Rand, a, b *Statement) {
	if c.has(ScalarOrder) {
		q := b
		if a.Form == convention.Quaternion && (b.Form != convention.Quaternion || g.IntN(2) == 0) {
			q = a
		}
		q.Claim.Scalar = convention.ScalarFirst + convention.ScalarLast - q.Claim.Scalar
	}
	if c.has(UnitSlip) {
		a.Claim.Unit = convention.Radian + convention.Degree - a.Claim.Unit
	}
	if c.has(MovingFixed) {
		seq := a.Claim.Label.Readings[0].Seq
		seq.Fixed = !seq.Fixed
		a.Claim.Label = fullLabel(seq)
	}
	if c.has(Sequence) {
		a.Claim.Label = fullLabel(anySequence(g))
	}
	if c.has(AngleOrder) {
		n := a.Numbers
		i := g.IntN(2)
		n[i], n[i+1] = n[i+1], n[i]
	}
	if c.has(AngleSign) {
		signs := 1 + g.IntN(7)
		for i := range 3 {
			if signs>>i&1 != 0 {
				a.Numbers[i] = -a.Numbers[i]
			}
		}
	}
	if c.has(Mirror) {
		m := b
		if a.Form == convention.Rotation {
			m = a
		}
		from, step := 3*g.IntN(3), 1
		if g.IntN(2) == 0 {
			from, step = g.IntN(3), 3
		}
		for i := range 3 {
			m.Numbers[from+i*step] = -m.Numbers[from+i*step]
		}
	}
}

// exact is the residual of a hypothesis on the numbers before rounding, whose
// relation either holds or does not.
func (h Hypothesis) exact(a, b Statement) float64 {
	var s search
	if why := s.read(a, b); why != "" {
		panic(why)
	}
	x, y := s.a.find(h.A), s.b.find(h.B)
	if h.power == 1 {
		x = x.Mul(x)
	}
	if h.inverse {
		y = y.Reverse()
	}
	if h.power == 2 {
		y = y.Mul(y)
	}
	return rotor.Angle(x, cubes[h.left].Mul(y).Mul(cubes[h.right]))
}

func (d *side) find(how Reading) rotor.Rotor {
	for c := range maxCost + 1 {
		for _, r := range d.at(c) {
			if d.reading(r.code) == how {
				return r.rotor
			}
		}
	}
	panic("no such reading: " + how.String())
}
