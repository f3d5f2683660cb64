// Package twins states orientations twice.
package twins

import "tern.example/attitude"

type Mount struct {
	Quat     attitude.Quaternion
	RPYDeg   [3]float64
	Spare    attitude.Quaternion
	SpareDCM [3][3]float64
}

var fields = Mount{
	Quat:     attitude.Quaternion{W: 1},                      // want `^quaternion fields.Quat .* of A$`
	RPYDeg:   [3]float64{0, 0, 0},                            // want `^angles fields.RPYDeg .* of A$`
	Spare:    attitude.Quaternion{W: 1},                      // want `^quaternion fields.Spare .* of B$`
	SpareDCM: [3][3]float64{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}}, // want `^rotation matrix fields.SpareDCM .* of B$`
}

var again = Mount{
	Quat:   attitude.Quaternion{X: 1}, // want `^quaternion again.Quat .* of C$`
	RPYDeg: [3]float64{180, 0, 0},     // want `^angles again.RPYDeg .* of C$`
}

var (
	bayQuat = attitude.Quaternion{W: 1} // want `^quaternion bayQuat .* of D$`
	bayRPY  = [3]float64{0, 0, 0}       // want `^angles bayRPY .* of D$`
)

// One name for two quaternions: which of them the matrix repeats is not said.
var (
	boomQuat     = attitude.Quaternion{W: 1}                      // want `^quaternion boomQuat .*[a-z]$`
	boomQuatWXYZ = attitude.Quaternion{X: 1}                      // want `^quaternion boomQuatWXYZ .*[a-z]$`
	boomDCM      = [3][3]float64{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}} // want `^rotation matrix boomDCM .*[a-z]$`
)

// Opposite directions are two orientations.
var (
	bodyFromCamQuat = attitude.Quaternion{W: 1}                      // want `^quaternion bodyFromCamQuat .*[a-z]$`
	camFromBodyDCM  = [3][3]float64{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}} // want `^rotation matrix camFromBodyDCM .*[a-z]$`
)

// Without other words, variables of a package are not related.
var (
	quat = attitude.Quaternion{W: 1}                      // want `^quaternion quat .*[a-z]$`
	dcm  = [3][3]float64{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}} // want `^rotation matrix dcm .*[a-z]$`
)

func branches(up bool) {
	if up {
		mastQuat := attitude.Quaternion{W: 1} // want `^quaternion branches.mastQuat .*[a-z]$`
		_ = mastQuat
	} else {
		mastQuat := attitude.Quaternion{X: 1} // want `^quaternion branches.mastQuat#2 .*[a-z]$`
		_ = mastQuat
	}
	mastRPY := [3]float64{0, 0, 0} // want `^angles branches.mastRPY .*[a-z]$`
	_ = mastRPY
}
