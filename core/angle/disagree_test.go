package angle_test

import (
	"fmt"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/core/internal/table"
	"dextral/core/matrix"
	"dextral/core/rotor"
)

func matrixOf(r rotor.Rotor) matrix.Mat3 { return matrix.FromRotor(r) }

func matrixIn(row table.Row, prefix string) matrix.Mat3 {
	n := row.Numbers(prefix, "00", "01", "02", "10", "11", "12", "20", "21", "22")
	return matrix.Mat3{{n[0], n[1], n[2]}, {n[3], n[4], n[5]}, {n[6], n[7], n[8]}}
}

// named are the calls that the disagreements compare by name, and the order in
// which they take the numbers of the topic.
var named = map[string]struct {
	library, call string
	args          [3]float64
}{
	"gl-matrix quat.fromEuler default zyx (Rz Ry Rx), assimp FromEulerAnglesXYZ, URDF rpy": {"assimp", "aiMatrix4x4t<double>::FromEulerAnglesXYZ(x,y,z)", [3]float64{10, 20, 30}},
	"tf2 Quaternion::setEuler (YXZ: yaw about Y, pitch about X, roll about Z)":             {"tf2", "Quaternion::setEuler(yaw,pitch,roll)", [3]float64{30, 20, 10}},
	"tf2 Matrix3x3::setEulerYPR (ZYX)":                                                     {"tf2", "Matrix3x3::setEulerYPR(yaw,pitch,roll)", [3]float64{30, 20, 10}},
	"bullet btQuaternion::setEuler (YXZ)":                                                  {"bullet", "btQuaternion::setEuler(yaw,pitch,roll)", [3]float64{30, 20, 10}},
	"bullet btMatrix3x3::setEulerYPR (ZYX)":                                                {"bullet", "btMatrix3x3::setEulerYPR(yaw,pitch,roll)", [3]float64{30, 20, 10}},
	"bullet btMatrix3x3::setEulerZYX takes (X,Y,Z)":                                        {"bullet", "btMatrix3x3::setEulerZYX(eulerX,eulerY,eulerZ); back=getEulerZYX(yaw,pitch,roll)", [3]float64{30, 20, 10}},
	"bullet btQuaternion::setEulerZYX takes (Z,Y,X)":                                       {"bullet", "btQuaternion::setEulerZYX(yawZ,pitchY,rollX)", [3]float64{30, 20, 10}},
}

// attitude is what one side of a disagreement makes of the numbers.
func attitude(t *testing.T, side string) rotor.Rotor {
	if side == "three Euler default XYZ (Rx Ry Rz)" {
		return byAxis(moving(x, y, z)).Rotor([3]float64{10 * deg, 20 * deg, 30 * deg})
	}
	c, ok := named[side]
	require.True(t, ok, side)
	return readingOf(t, c.library, c.call).Rotor([3]float64{c.args[0] * deg, c.args[1] * deg, c.args[2] * deg})
}

// TestDisagreements recomputes what libraries disagree by: as a difference of
// readings, and, where a getter does not give back what a setter was given, as
// the distance from the attitude to what the angles returned mean. Values
// are printed with ten digits, in degrees.
func TestDisagreements(t *testing.T) {
	compared, returned := 0, 0
	for _, row := range table.Read(t, reference+"angle_disagreements.csv") {
		topic := row.Text("topic")
		switch {
		case strings.HasPrefix(topic, "same numbers"):
			compared++
			got := rotor.Angle(attitude(t, row.Text("a")), attitude(t, row.Text("b"))) / deg
			assert.InDelta(t, row.Number("value"), got, 5e-9*row.Number("value"), topic)
		case strings.HasPrefix(topic, "getter after setter"):
			returned++
			library, call, _ := strings.Cut(row.Text("a"), " ")
			set := readingOf(t, library, call)
			get := set
			if strings.Contains(call, "back=getEulerZYX(yaw,pitch,roll)") { // returns them the other way round
				get.Order = [3]int{0, 1, 2}
			}
			got := rotor.Angle(set.Rotor(scan(t, topic, "args (%g,%g,%g)")), get.Rotor(scan(t, row.Text("b"), "returned %g %g %g"))) / deg
			assert.InDelta(t, row.Number("value"), got, 5e-9*row.Number("value")+outside/deg, topic+" "+call)
		default: // three.js and Eigen: see TestThree, TestEigen
			assert.True(t, strings.HasPrefix(topic, "three") || strings.HasPrefix(topic, "Eigen"), topic)
		}
	}
	assert.Equal(t, []int{4, 24}, []int{compared, returned})
}

// scan reads three angles in degrees from the part of a text that a format describes.
func scan(t *testing.T, text, format string) [3]float64 {
	word, _, _ := strings.Cut(format, "%")
	at := strings.Index(text, word)
	require.GreaterOrEqual(t, at, 0, text)
	var n [3]float64
	_, err := fmt.Sscanf(text[at:], format, &n[0], &n[1], &n[2])
	require.NoError(t, err, text)
	for k := range n {
		n[k] *= deg
	}
	return n
}
