package rules

import (
	"math"
	"math/rand/v2"
	"testing"

	"dextral/core/convention"
	"dextral/core/matrix"
	"dextral/core/rotor"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// TestTurnShowsTheResidual: the two rotations of a finding lie as far apart as its
// evidence says, whatever is wrong and whatever is left unstated.
func TestTurnShowsTheResidual(t *testing.T) {
	rnd := rand.New(rand.NewPCG(7, 11))
	shown := 0
	for range 60 {
		r := randomRotor(rnd)
		w, x, y, z := r.Quaternion()
		m := matrix.FromRotor(r)
		to := convention.Direction{To: "body", From: "cam"}
		for _, pair := range [][2]*Value{
			{value(convention.Quaternion, printed(6, x, y, z, w), convention.ScalarFirst), value(convention.Rotation, printed(6, flat(m)...))},
			{value(convention.Quaternion, printed(6, w, x, y, z), convention.ScalarFirst, to), value(convention.Rotation, printed(6, flat(m.Transpose())...), to)},
			{value(convention.Quaternion, printed(6, w, x, y, z)), value(convention.Rotation, printed(6, flat(matrix.FromRotor(randomRotor(rnd)))...))},
		} {
			for _, f := range CheckValues(pair[:]) {
				if f.Turn == nil {
					continue
				}
				shown++
				assert.InDelta(t, f.Evidence[0].Residual.Value, f.Turn.Angle()*180/math.Pi, 1e-4, f.Message)
				assert.Equal(t, f.Key, f.Turn.By)
			}
		}
	}
	assert.Greater(t, shown, 150, "of 180, of which few special ones cannot be told")
}

// TestTurnIsSilentInDoubt: no drawing rather than one that contradicts the numbers.
func TestTurnIsSilentInDoubt(t *testing.T) {
	a, b := value(convention.Quaternion, "1 0 0 0", convention.ScalarFirst), value(convention.Quaternion, "0.8 0.6 0 0", convention.ScalarFirst)
	require.NotNil(t, turnBetween(a, b, 2*math.Acos(0.8)))
	assert.Nil(t, turnBetween(a, b, 1))
	assert.Nil(t, turnBetween(a, b, math.NaN()))
	for _, bad := range []string{"0 0 0 0", "NaN 0 0 1", "Inf 0 0 1"} {
		assert.Nil(t, turnBetween(value(convention.Quaternion, bad, convention.ScalarFirst), b, 1), bad)
	}
	assert.Nil(t, turnAround(rotor.Rotor{}, 0))
	assert.Nil(t, turnAround(rotor.One, 1))
	assert.NotNil(t, turnAround(rotor.One.Neg(), 0), "R and -R are one rotation")
}
