package gosource

import (
	"testing"

	"github.com/stretchr/testify/assert"
)

// TestMentions has words of orientations in the spellings of Go programs, and
// what is near to them and not one.
func TestMentions(t *testing.T) {
	for _, src := range []string{
		"var mountQuat Q", "type RotationMatrix T", "mountRPYDeg", "bodyDCM", "// a quaternion", "eulerZYX",
		"x.QW = 1", "qBodyCam", "q_body_cam", "R_cam_imu = 1", "[3][3]float64{}", "YAW", "spinAxis", "x, kmag",
	} {
		assert.True(t, mentions([]byte(src)), src)
	}
	for _, src := range []string{
		"", "var protocol string", "wrote carrot", "q := 1", "query", "R := 1", "type T struct{ x int }",
		"quatrain", "[3]float64{}", "iota", "r_body", "sq_root",
	} {
		assert.False(t, mentions([]byte(src)), src)
	}
}
