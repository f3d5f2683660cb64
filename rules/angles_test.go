package rules

import (
	"math"
	"testing"

	"dextral/core/convention"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// What gimbal lock leaves determined, by algebra: Rz(a) Ry(90 deg) Rx(b) = Ry(90 deg) Rx(b-a),
// and at -90 deg the sum; a label that fits both kinds of axes names neither.
func TestKeptAtGimbalLock(t *testing.T) {
	message := func(text, numbers string) string {
		found := CheckValues([]*Value{value(convention.Angles, numbers, label(t, text), convention.Degree)})
		require.Len(t, found, 1)
		return found[0].Message
	}
	assert.Contains(t, message("z-y'-x''", "50.0 90.0 20.0"), "only their difference, 30 deg, is determined")
	assert.Contains(t, message("z-y'-x''", "50.0 -90.0 20.0"), "only their sum, 70 deg, is determined")
	assert.Contains(t, message("z-y-x about fixed axes", "50.0 90.0 20.0"), "only their sum, 70 deg, is determined")
	assert.Contains(t, message("zyx", "50.0 90.0 20.0"), "their sum or difference is")
}

// Gimbal lock is noted where both outer angles say something, whatever the unit.
func TestGimbalLock(t *testing.T) {
	zyx := label(t, "z-y'-x''")
	for text, want := range map[string]string{"30.0 90.0 20.0": "note gimbal-locked", "30.0 -90.0 20.0": "note gimbal-locked", "30.0 89.9 20.0": "", "30.0 90.0 0.0": "", "90.0 30.0 90.0": ""} {
		assert.Equal(t, want, rules(CheckValues([]*Value{value(convention.Angles, text, zyx, convention.Degree)})), text)
	}
	assert.Equal(t, "note gimbal-locked", rules(CheckValues([]*Value{value(convention.Angles, "0.3 1.570796 0.2", zyx, convention.Radian)})))
	assert.Empty(t, CheckValues([]*Value{value(convention.Angles, "30.0 90.0 20.0", label(t, "z-x'-z''"), convention.Degree)}))
}

// Degrees where radians are stated show by their size and by being round; angles that
// ran on do not.
func TestLargeAngle(t *testing.T) {
	xyz := label(t, "x-y-z about fixed axes")
	for text, want := range map[string]string{"0 90 0": "warning angle-beyond-turn", "0 -45 180": "warning angle-beyond-turn", "0 1.5708 0": "", "0 7.1 0": "", "0 0 5": "", "0 3600 0": "", "10 1.5 0": ""} {
		assert.Equal(t, want, rules(CheckValues([]*Value{value(convention.Angles, text, xyz, convention.Radian)})), text)
	}
	assert.Empty(t, CheckValues([]*Value{value(convention.Angles, "0 720 0", xyz, convention.Degree)}))
}

// A stated range holds to the digits written, ends included; without one angles run on.
func TestStatedRange(t *testing.T) {
	zyx := label(t, "z-y'-x''")
	half := convention.Range{Low: -math.Pi, High: math.Pi}
	for text, want := range map[string]string{
		"0 0 180": "", "-180.0 20.5 180.0": "", "0.0 0.0 180.1": "error angle-out-of-range",
		"0 0 -190.0": "error angle-out-of-range", "nan 0 0": "error not-finite",
	} {
		assert.Equal(t, want, rules(CheckValues([]*Value{value(convention.Angles, text, zyx, convention.Degree, half)})), text)
	}
	assert.Empty(t, CheckValues([]*Value{value(convention.Angles, "0.0 0.0 725.0", zyx, convention.Degree)}))
	assert.Empty(t, CheckValues([]*Value{value(convention.Angles, "0.0 0.0 3.1416", zyx, convention.Radian, half)}))
	for text, remedy := range map[string]string{"0.0 0.0 215.0": "-145 deg", "0.0 0.0 -530.0": "-170 deg", "0.0 0.0 575.0": "-145 deg"} {
		found := CheckValues([]*Value{value(convention.Angles, text, zyx, convention.Degree, half)})
		require.Len(t, found, 1)
		assert.Contains(t, found[0].Remedy, remedy)
	}
	narrow := CheckValues([]*Value{value(convention.Angles, "0.0 0.0 40.0", zyx, convention.Degree, convention.Range{Low: -0.5, High: 0.5})})
	require.Len(t, narrow, 1)
	assert.Equal(t, "correct the angle, or the range that is stated", narrow[0].Remedy)
}
