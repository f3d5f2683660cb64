package claims

import (
	"math"
	"testing"

	"dextral/core/convention"

	"github.com/stretchr/testify/assert"
)

// A comment gives all three angles a range only if it speaks of one range, a full
// turn, and of no single angle.
func TestRangeOfComment(t *testing.T) {
	half, turn := convention.Range{Low: -math.Pi, High: math.Pi}, convention.Range{High: 2 * math.Pi}
	for text, want := range map[string]convention.Range{
		"deg, -180..180":                      half,
		"roll pitch yaw [deg], -180 to 180":   half,
		"euler angles in [-pi, pi]":           half,
		"angles (-180.0, 180.0]":              half,
		"each ±180 deg":                       half,
		"angles, +/- 180°":                    half,
		"degrees, 0 to 360":                   turn,
		"0..2*pi":                             turn,
		"-180 deg to +180 deg":                half,
		"-π to π":                             half,
		"yaw from 0 to 360":                   {},
		"roll pitch yaw, yaw from 0 to 360":   {},
		"-90 to 90":                           {},
		"-180..180, middle one -90..90":       {},
		"0 to 360 or -180 to 180":             {},
		"360 to 0":                            {},
		"cam0 to imu, rows 0 to 3":            {},
		"taken at 10:180, 360 frames":         {},
		"gain 0.180, 360":                     {},
		"-360 to 0":                           {},
		"range 1180 to 1360":                  {},
		"mounted 0, 360 in the first drawing": turn,
	} {
		assert.Equal(t, want, ReadComment(text).Range, text)
	}
}
