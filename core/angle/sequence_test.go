package angle_test

import (
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/angle"
	"dextral/core/rotor"
)

const (
	x = angle.X
	y = angle.Y
	z = angle.Z
)

func moving(a, b, c angle.Axis) angle.Sequence {
	return angle.Sequence{Axes: [3]angle.Axis{a, b, c}}
}

func fixed(a, b, c angle.Axis) angle.Sequence {
	return angle.Sequence{Axes: [3]angle.Axis{a, b, c}, Fixed: true}
}

func TestSequencesAreTheValidOnes(t *testing.T) {
	listed := map[angle.Sequence]bool{}
	for _, s := range angle.Sequences() {
		listed[s] = true
	}
	assert.Len(t, listed, 24, "all different")
	for code := range 5 * 5 * 5 * 2 { // axes 3 and 4 do not exist
		s := angle.Sequence{
			Axes:  [3]angle.Axis{angle.Axis(code % 5), angle.Axis(code / 5 % 5), angle.Axis(code / 25 % 5)},
			Fixed: code >= 125,
		}
		assert.Equal(t, listed[s], s.Valid(), "%+v", s)
		assert.Equal(t, listed[s], s.Rotor(0.1, 0.2, 0.3).Finite(), "%+v", s)
		assert.Equal(t, listed[s], s.Angles(rotor.Rotor{S: 1, E12: 1}).A == s.Angles(rotor.Rotor{S: 1, E12: 1}).A, "%+v", s)
	}
	assert.False(t, angle.Sequence{}.Valid())
}

func TestSequenceNames(t *testing.T) {
	assert.Equal(t, "z-y'-x''", moving(z, y, x).String())
	assert.Equal(t, "z-x'-z''", moving(z, x, z).String())
	assert.Equal(t, "x-y-z", fixed(x, y, z).String())
	assert.Equal(t, "z-y'-x'' (moving axes)", moving(z, y, x).Words())
	assert.Equal(t, "z-y-z (fixed axes)", fixed(z, y, z).Words())
	assert.Equal(t, "?-?-?", fixed(3, 99, 255).String())
	names := map[string]bool{}
	for _, s := range angle.Sequences() {
		names[s.String()] = true
	}
	assert.Len(t, names, 24)
}

func TestTwin(t *testing.T) {
	assert.Equal(t, fixed(x, y, z), moving(z, y, x).Twin())
	for _, s := range angle.Sequences() {
		assert.NotEqual(t, s, s.Twin())
		assert.Equal(t, s, s.Twin().Twin())
		assert.True(t, s.Twin().Valid())
		assert.Equal(t, s.Rotor(0.1, 0.2, 0.3), s.Twin().Rotor(0.3, 0.2, 0.1), s.Words())
	}
}
