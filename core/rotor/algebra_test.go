package rotor_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/rotor"
)

// basis lists the eight basis elements.
func basis() []rotor.Multivector {
	return []rotor.Multivector{
		{S: 1}, {E1: 1}, {E2: 1}, {E3: 1}, {E23: 1}, {E31: 1}, {E12: 1}, {E123: 1},
	}
}

// TestBasisProducts compares the 64 products of basis elements with the oracle.
func TestBasisProducts(t *testing.T) {
	for _, a := range basis() {
		for _, b := range basis() {
			assert.Equal(t, exactly(a).mul(exactly(b)).float64(), a.Mul(b), "%+v times %+v", a, b)
		}
	}
}

// TestDefinitions holds the package to the words of its documentation.
func TestDefinitions(t *testing.T) {
	e1, e2, e3 := rotor.Multivector{E1: 1}, rotor.Multivector{E2: 1}, rotor.Multivector{E3: 1}
	volume := rotor.Multivector{E123: 1}
	assert.Equal(t, volume, e1.Mul(e2).Mul(e3))
	assert.Equal(t, rotor.Multivector{E12: 1}, volume.Mul(e3), "I e3 = e12")
	assert.Equal(t, rotor.Vec{Z: 3}.Plane().Multivector(), volume.Mul(rotor.Multivector{E3: 3}))
	assert.Equal(t, rotor.Vec{X: 1, Y: 2, Z: 3}, rotor.Vec{X: 1, Y: 2, Z: 3}.Plane().Axis())
	assert.Equal(t, rotor.Bivector{E12: 1}, rotor.Vec{X: 1}.Wedge(rotor.Vec{Y: 1}))
	assert.Equal(t, rotor.Vec{Z: 1}, rotor.Vec{X: 1}.Cross(rotor.Vec{Y: 1}))

	quarter := rotor.Exp(rotor.Bivector{E12: 1}.Scale(-math.Pi / 4))
	within(t, ulp, gapV(quarter.Rotate(rotor.Vec{X: 1}), rotor.Vec{Y: 1}), "exp(-e12 pi/4) turns e1 to e2")
	within(t, ulp, gapV(quarter.RotateBivector(rotor.Bivector{E23: 1}).Axis(), rotor.Vec{Y: 1}), "and e23 to e31")
}

// TestProduct compares products with the exact ones: each component is a sum
// of four (eight) terms, hence at most four (eight) roundings of numbers below
// the product of the norms.
func TestProduct(t *testing.T) {
	rng := source()
	for range trials {
		a, b := randomMultivector(rng), randomMultivector(rng)
		size := norm(a) * norm(b)
		within(t, 8*ulp*size, gap(a.Mul(b), exactly(a).mul(exactly(b)).float64()), "%+v times %+v", a, b)
		r, q := a.Even(), b.Even()
		within(t, 4*ulp*r.Norm()*q.Norm(), gapR(r.Mul(q), exactRotor(r).mul(exactRotor(q)).float64().Even()), "%+v times %+v", r, q)
	}
}

func norm(m rotor.Multivector) float64 {
	sum := 0.0
	for _, x := range components(m) {
		sum += x * x
	}
	return math.Sqrt(sum)
}

func TestReverse(t *testing.T) {
	rng := source()
	for _, m := range basis() {
		assert.Equal(t, exactly(m).reverse().float64(), m.Reverse())
	}
	for range trials {
		a, b := randomMultivector(rng), randomMultivector(rng)
		within(t, 16*ulp*norm(a)*norm(b), gap(a.Mul(b).Reverse(), b.Reverse().Mul(a.Reverse())), "(ab)~ = b~a~ at %+v, %+v", a, b)
		r := a.Even()
		assert.Equal(t, r.Multivector().Reverse(), r.Reverse().Multivector())
	}
}

func TestGrades(t *testing.T) {
	m := randomMultivector(source())
	sum := rotor.Multivector{}
	for k := range 4 {
		g := m.Grade(k)
		assert.Equal(t, g, g.Grade(k))
		assert.Equal(t, rotor.Multivector{}, g.Grade((k+1)%4))
		sum = sum.Add(g)
	}
	assert.Equal(t, m, sum)
	assert.Equal(t, rotor.Multivector{}, m.Grade(4))
	assert.Equal(t, rotor.Multivector{}, m.Grade(-1))
	assert.Equal(t, m.Grade(1), m.Vec().Multivector())
	assert.Equal(t, m.Grade(2), m.Bivector().Multivector())
	assert.Equal(t, m.Grade(0).Add(m.Grade(2)), m.Even().Multivector())
	assert.Equal(t, 2*m.E123, m.Scale(2).E123)
}

// TestSandwich compares the three sandwiches with the exact one and with each
// other: on vectors, planes, volumes and general multivectors, and for rotors
// that are not of norm one.
func TestSandwich(t *testing.T) {
	rng := source()
	for range trials {
		r, m := randomTurn(rng), randomMultivector(rng)
		want := exactRotor(r).mul(exactly(m)).mul(exactRotor(r).reverse()).float64()
		bound := 16 * ulp * norm(m)
		within(t, bound, gap(r.Sandwich(m), want), "r m r~, r = %+v, m = %+v", r, m)
		within(t, bound, gapV(r.Rotate(m.Vec()), want.Vec()), "vector part, r = %+v, m = %+v", r, m)
		within(t, bound, gap(r.RotateBivector(m.Bivector()).Multivector(), want.Grade(2)), "plane, r = %+v, m = %+v", r, m)
		within(t, bound, math.Abs(r.Sandwich(m).E123-m.E123), "volumes stay, r = %+v", r)
		within(t, bound, gapV(r.Neg().Rotate(m.Vec()), r.Rotate(m.Vec())), "-R turns as R does, r = %+v", r)

		long := r.Scale(3)
		within(t, 9*bound, gap(long.Sandwich(m), want.Scale(9)), "lengths grow by the square of the norm")
		v, turned := m.Vec(), want.Vec()
		within(t, 9*bound, gapV(long.Rotate(v), v.Add(turned.Sub(v).Scale(9))), "Rotate with a norm of 3")
	}
}

// TestComposition: the product turns as its factors do, the right one first.
func TestComposition(t *testing.T) {
	rng := source()
	for range trials {
		a, b, v := randomRotor(rng), randomRotor(rng), randomVec(rng)
		within(t, 20*ulp*v.Norm(), gapV(a.Mul(b).Rotate(v), a.Rotate(b.Rotate(v))), "a = %+v, b = %+v", a, b)
		within(t, 20*ulp*v.Norm(), gapV(a.Reverse().Rotate(a.Rotate(v)), v), "a = %+v", a)
		within(t, 8*ulp, math.Abs(a.Rotate(randomUnit(rng)).Norm()-1), "lengths stay, a = %+v", a)
	}
}
