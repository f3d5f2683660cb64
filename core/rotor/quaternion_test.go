package rotor_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/rotor"
)

// TestUnits: i i = j j = k k = i j k = -1, as W. R. Hamilton cut into the
// bridge in 1843, and the tempting units do not.
func TestUnits(t *testing.T) {
	e1, e2, e3 := rotor.Multivector{E1: 1}, rotor.Multivector{E2: 1}, rotor.Multivector{E3: 1}
	i, j, k := rotor.FromQuaternion(0, 1, 0, 0), rotor.FromQuaternion(0, 0, 1, 0), rotor.FromQuaternion(0, 0, 0, 1)
	assert.Equal(t, e3.Mul(e2).Even(), i, "i = e3e2")
	assert.Equal(t, e1.Mul(e3).Even(), j, "j = e1e3")
	assert.Equal(t, e2.Mul(e1).Even(), k, "k = e2e1")
	minus := rotor.Rotor{S: -1}
	for _, square := range []rotor.Rotor{i.Mul(i), j.Mul(j), k.Mul(k), i.Mul(j).Mul(k)} {
		assert.Equal(t, minus, square)
	}
	assert.Equal(t, k, i.Mul(j))
	assert.Equal(t, k.Reverse().Neg(), i.Reverse().Mul(j.Reverse()), "with i = e2e3, j = e3e1, k = e1e2: i j = -k")
}

// hamilton and shuster are the two products in their texts' own form, of
// numbers (w, x, y, z): vector parts p x q and -p x q. The second is equation
// (171) of M. D. Shuster, "A survey of attitude representations", J.
// Astronautical Sciences 41 (1993) 439 (number from memory).
func hamilton(p, q [4]float64) [4]float64 { return quaternionProduct(p, q, 1) }
func shuster(p, q [4]float64) [4]float64  { return quaternionProduct(p, q, -1) }

func quaternionProduct(p, q [4]float64, cross float64) [4]float64 {
	return [4]float64{
		p[0]*q[0] - p[1]*q[1] - p[2]*q[2] - p[3]*q[3],
		p[0]*q[1] + p[1]*q[0] + cross*(p[2]*q[3]-p[3]*q[2]),
		p[0]*q[2] + p[2]*q[0] + cross*(p[3]*q[1]-p[1]*q[3]),
		p[0]*q[3] + p[3]*q[0] + cross*(p[1]*q[2]-p[2]*q[1]),
	}
}

func fromNumbers(q [4]float64) rotor.Rotor { return rotor.FromQuaternion(q[0], q[1], q[2], q[3]) }

// TestProducts: Hamilton's product is the geometric one, Shuster's the
// geometric one in the opposite order. On small integers both sides are exact.
func TestProducts(t *testing.T) {
	rng := source()
	for range trials {
		var p, q [4]float64
		for i := range p {
			p[i], q[i] = float64(rng.IntN(2001)-1000), float64(rng.IntN(2001)-1000)
		}
		a, b := fromNumbers(p), fromNumbers(q)
		assert.Equal(t, fromNumbers(hamilton(p, q)), a.Mul(b))
		assert.Equal(t, fromNumbers(shuster(p, q)), b.Mul(a))
	}
}

// TestQuaternionOfAxisAndAngle: (cos a/2, n sin a/2), which is what the four
// numbers mean in both algebras.
func TestQuaternionOfAxisAndAngle(t *testing.T) {
	rng := source()
	for range trials {
		n, angle := randomUnit(rng), 2*math.Pi*rng.Float64()
		r, ok := rotor.FromAxisAngle(n, angle)
		assert.True(t, ok)
		w, x, y, z := r.Quaternion()
		s := math.Sin(angle / 2)
		within(t, 2*ulp, math.Abs(w-math.Cos(angle/2)), "w")
		within(t, 2*ulp, gapV(rotor.Vec{X: x, Y: y, Z: z}, n.Scale(s)), "vector part")
		assert.Equal(t, r, rotor.FromQuaternion(w, x, y, z))
	}
}
