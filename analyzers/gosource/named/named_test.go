package named

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/operation"
)

func TestWords(t *testing.T) {
	for name, want := range map[string]string{
		"QuatMul": "quat mul", "ToRotationMatrix": "to rotation matrix", "fromRPYDeg": "from rpy deg", "NEDToENU": "ned to enu",
		"mat3_from_quat": "mat3 from quat", "RotateX": "rotate x", "Mat4ToQuat": "mat4 to quat", "": "", "slerp": "slerp",
	} {
		assert.Equal(t, want, strings.Join(Words(name), " "), name)
	}
}

// What a word means depends on what goes in and comes out.
func TestMeaning(t *testing.T) {
	for _, c := range []struct {
		name, in, out string
		op            operation.Op
		claimed       bool
	}{
		{"Mul", "qq", "q", operation.Product, true},
		{"Mul", "mm", "m", operation.MatrixProduct, true},
		{"Norm", "q", "s", operation.Norm, true},
		{"Norm", "q", "q", operation.Normalise, true},
		{"Matrix", "q", "m", operation.ToMatrix, true},
		{"Matrix", "m", "q", operation.ToMatrix, false},
		{"Matrix", "m", "q", operation.FromMatrix, true},
		{"FromEuler", "v", "q", operation.FromAngles, true},
		{"Euler", "q", "v", operation.AnglesOf, true},
		{"RotateX", "sv", "v", operation.RotateVector, true},
		{"RotateX", "s", "m", operation.AxisTurn, true},
		{"FromAxisAngle", "vs", "q", operation.FromAxisAngle, true},
		{"FromAxisAngle", "v", "q", operation.FromAxisAngle, false},
		{"Vector", "q", "v", operation.RotvecOf, false}, // the vector part, as likely as not
		{"Blend", "qq", "q", operation.Product, false},
	} {
		found := find(Words(c.name), operation.Shape{In: c.in, Out: c.out})
		assert.Equal(t, c.claimed, contains(found.Ops, c.op), "%s %s -> %s: %v", c.name, c.in, c.out, found.Ops)
	}
}

func contains(list []operation.Op, op operation.Op) bool {
	for _, o := range list {
		if o == op {
			return true
		}
	}
	return false
}

// In running text only what is certain counts: an inverse may be one of a sine.
func TestSpoken(t *testing.T) {
	for text, want := range map[string]string{
		"returns the hamilton product of a and b":  "hamilton product",
		"returns the inverse sine of q":            "",
		"multiplies two colours":                   "",
		"converts a quaternion to a matrix":        "quaternion",
		"builds the rotation matrix of the angles": "rotation matrix",
	} {
		assert.Equal(t, want, strings.Join(spoken(strings.Fields(text)), " "), text)
	}
	assert.Equal(t, "The first", firstSentence("The\nfirst. The second."))
}
