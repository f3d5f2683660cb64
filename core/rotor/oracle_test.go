package rotor_test

import (
	"fmt"
	"math"
	"math/big"
	"math/bits"
	"math/rand/v2"
	"testing"

	"dextral/core/rotor"
)

// The oracle of this package's tests is Cl(3,0) written down without any of
// the package's shortcuts: a multivector is a number for each set of basis
// vectors, the product of two sets is their symmetric difference with a sign
// for each exchange of neighbours, and the arithmetic has 300 bits.

// exact is indexed by the set of basis vectors: bit 0 for e1, 1 for e2, 2 for e3.
type exact [8]*big.Float

func newFloat(x float64) *big.Float { return new(big.Float).SetPrec(300).SetFloat64(x) }

func exactly(m rotor.Multivector) exact {
	return exact{
		0b000: newFloat(m.S),
		0b001: newFloat(m.E1), 0b010: newFloat(m.E2), 0b100: newFloat(m.E3),
		0b110: newFloat(m.E23), 0b101: newFloat(-m.E31), 0b011: newFloat(m.E12),
		0b111: newFloat(m.E123),
	}
}

func (x exact) float64() rotor.Multivector {
	f := func(set int) float64 { v, _ := x[set].Float64(); return v }
	return rotor.Multivector{
		S: f(0b000), E1: f(0b001), E2: f(0b010), E3: f(0b100),
		E23: f(0b110), E31: -f(0b101), E12: f(0b011), E123: f(0b111),
	}
}

// swaps counts the exchanges of neighbours that sort the product of two sets.
func swaps(a, b int) int {
	n := 0
	for a >>= 1; a != 0; a >>= 1 {
		n += bits.OnesCount(uint(a & b))
	}
	return n
}

func (x exact) mul(y exact) exact {
	p := exact{}
	for i := range p {
		p[i] = newFloat(0)
	}
	for i := range x {
		for j := range y {
			term := newFloat(0).Mul(x[i], y[j])
			if swaps(i, j)%2 == 1 {
				term.Neg(term)
			}
			p[i^j].Add(p[i^j], term)
		}
	}
	return p
}

// reverse sorts each product that is written backwards.
func (x exact) reverse() exact {
	r := exact{}
	for i := range x {
		r[i] = newFloat(0).Set(x[i])
		if k := bits.OnesCount(uint(i)); k*(k-1)/2%2 == 1 {
			r[i].Neg(r[i])
		}
	}
	return r
}

func exactRotor(r rotor.Rotor) exact { return exactly(r.Multivector()) }

// exactAngle is the angle of the rotation between two orientations, correctly
// rounded but for the last functions.
func exactAngle(a, b rotor.Rotor) float64 {
	r := exactRotor(a).reverse().mul(exactRotor(b))
	sum := newFloat(0)
	for _, set := range []int{0b110, 0b101, 0b011} {
		sum.Add(sum, newFloat(0).Mul(r[set], r[set]))
	}
	sin, _ := sum.Sqrt(sum).Float64()
	cos, _ := r[0].Float64()
	return 2 * math.Atan2(sin, math.Abs(cos))
}

// ulp is the distance of one from the next greater number.
const ulp = 0x1p-52

// components lists a multivector's numbers.
func components(m rotor.Multivector) [8]float64 {
	return [8]float64{m.S, m.E1, m.E2, m.E3, m.E23, m.E31, m.E12, m.E123}
}

// gap is the greatest difference between components; NaN if any is NaN.
func gap(a, b rotor.Multivector) float64 {
	x, y, worst := components(a), components(b), 0.0
	for i := range x {
		worst = max(worst, math.Abs(x[i]-y[i]))
	}
	return worst
}

func gapR(a, b rotor.Rotor) float64 { return gap(a.Multivector(), b.Multivector()) }
func gapV(a, b rotor.Vec) float64   { return gap(a.Multivector(), b.Multivector()) }

// within fails the test unless the error is at most the bound; NaN fails.
func within(t *testing.T, bound, err float64, format string, args ...any) {
	t.Helper()
	if !(err <= bound) {
		t.Errorf("%s: error %.3g, allowed %.3g", fmt.Sprintf(format, args...), err, bound)
	}
}

// TestGapSeesEveryComponent guards the tests: a comparison that overlooks a
// component would let anything pass.
func TestGapSeesEveryComponent(t *testing.T) {
	for i := range 8 {
		var c [8]float64
		for _, x := range []float64{0.5, math.NaN()} {
			c[i] = x
			m := rotor.Multivector{S: c[0], E1: c[1], E2: c[2], E3: c[3], E23: c[4], E31: c[5], E12: c[6], E123: c[7]}
			if g := gap(m, rotor.Multivector{}); g != 0.5 && !math.IsNaN(g) || g == 0 {
				t.Errorf("component %d: %v is overlooked", i, x)
			}
		}
	}
}

// trials is the number of random cases of a property.
const trials = 2000

// source is the source of random cases: the same on every run.
func source() *rand.Rand { return rand.New(rand.NewPCG(20240917, 1843)) }

func randomVec(rng *rand.Rand) rotor.Vec {
	return rotor.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()}
}

func randomUnit(rng *rand.Rand) rotor.Vec {
	u, _ := randomVec(rng).Unit()
	return u
}

// randomRotor is uniform over the unit rotors.
func randomRotor(rng *rand.Rand) rotor.Rotor {
	r, _ := rotor.Rotor{S: rng.NormFloat64(), E23: rng.NormFloat64(), E31: rng.NormFloat64(), E12: rng.NormFloat64()}.Unit()
	return r
}

func randomMultivector(rng *rand.Rand) rotor.Multivector {
	n := rng.NormFloat64
	return rotor.Multivector{S: n(), E1: n(), E2: n(), E3: n(), E23: n(), E31: n(), E12: n(), E123: n()}
}

// randomTurn turns about a random axis by an angle that is often at, or very
// near, a special one.
func randomTurn(rng *rand.Rand) rotor.Rotor {
	angle := 2 * math.Pi * rng.Float64()
	if rng.IntN(2) == 0 {
		angle = []float64{0, math.Pi / 2, math.Pi, 2 * math.Pi}[rng.IntN(4)]
		angle += []float64{0, 1, -1}[rng.IntN(3)] * math.Pow(10, -16*rng.Float64())
	}
	r, _ := rotor.FromAxisAngle(randomUnit(rng), angle)
	return r
}

// special rotors: no turn, full turn, quarter and half turns about the axes and
// about a diagonal, in both signs.
func special() []rotor.Rotor {
	h := math.Sqrt2 / 2
	all := []rotor.Rotor{
		rotor.One,
		{E23: 1}, {E31: 1}, {E12: 1},
		{S: h, E23: h}, {S: h, E31: h}, {S: h, E12: h},
		{E23: h, E31: h}, {E31: h, E12: h}, {E12: h, E23: h},
		{S: .5, E23: .5, E31: .5, E12: .5},
	}
	for _, r := range all {
		all = append(all, r.Neg())
	}
	return all
}
