package frame_test

import (
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/frame"
	"dextral/core/internal/table"
	"dextral/core/matrix"
	"dextral/core/rotor"
)

const ulp = 0x1p-52

func source() *rand.Rand { return rand.New(rand.NewPCG(37, 48)) }

func random(rng *rand.Rand) rotor.Rotor {
	r, _ := rotor.Rotor{S: rng.NormFloat64(), E23: rng.NormFloat64(), E31: rng.NormFloat64(), E12: rng.NormFloat64()}.Unit()
	return r
}

// triads are all 48 of a body.
func triads() []frame.Triad {
	var all []frame.Triad
	for x := frame.Forward; x <= frame.Down; x++ {
		for y := frame.Forward; y <= frame.Down; y++ {
			for z := frame.Forward; z <= frame.Down; z++ {
				if triad := (frame.Triad{X: x, Y: y, Z: z}); triad.Valid() {
					all = append(all, triad)
				}
			}
		}
	}
	return all
}

// TestRemap: the remapped rotor does to mapped vectors what the rotor does to
// vectors, for proper maps and mirrors, and P and -P do the same.
func TestRemap(t *testing.T) {
	rng := source()
	maps := 0
	for _, triad := range triads() {
		p := triad.Matrix()
		maps++
		r, v := random(rng), rotor.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()}
		got := frame.Remap(p, r)
		assert.Less(t, got.Rotate(p.Apply(v)).Sub(p.Apply(r.Rotate(v))).Norm(), 32*ulp, triad)
		assert.Equal(t, got, frame.Remap(p.Scale(-1), r), triad)
		want := p.Mul(matrix.FromRotor(r)).Mul(p.Transpose())
		assert.Less(t, matrix.FromRotor(got).Sub(want).Norm(), 8*ulp, triad)
		assert.InDelta(t, r.S, got.S, 0, "the angle stays")
	}
	assert.Equal(t, 48, maps)
}

// TestConvert: both sides mapped; impossible when only one of them is mirrored.
func TestConvert(t *testing.T) {
	rng := source()
	for range 500 {
		all := triads()
		p, q := all[rng.IntN(48)].Matrix(), all[rng.IntN(48)].Matrix()
		r := random(rng)
		got, ok := frame.Convert(p, q, r)
		assert.Equal(t, p.Det() == q.Det(), ok)
		if ok {
			want := p.Mul(matrix.FromRotor(r)).Mul(q.Transpose())
			assert.Less(t, matrix.FromRotor(got).Sub(want).Norm(), 16*ulp)
		}
	}
}

// TestNEDToENU: 40 attitudes of FRD in NED as FLU in ENU.
func TestNEDToENU(t *testing.T) {
	world, _ := frame.AxisMap(parsed(t, "ENU"), parsed(t, "NED"))
	body, _ := frame.AxisMap(parsed(t, "FLU"), parsed(t, "FRD"))
	for _, row := range table.Read(t, reference+"frame_ned_enu.csv") {
		n, e := row.Numbers("qn_", "w", "x", "y", "z"), row.Numbers("qe_", "w", "x", "y", "z")
		got, ok := frame.Convert(world, body, rotor.FromQuaternion(n[0], n[1], n[2], n[3]))
		assert.True(t, ok)
		assert.Less(t, rotor.Angle(got, rotor.FromQuaternion(e[0], e[1], e[2], e[3])), 16*ulp)
		assert.Less(t, matrix.FromRotor(got).Sub(matrixIn(row, "m")).Norm(), 16*ulp)
	}
}
