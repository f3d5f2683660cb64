package claims

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"

	"dextral/core/angle"
	"dextral/core/convention"
)

var (
	none = [3]angle.Role{}
	rpy  = [3]angle.Role{angle.RoleRoll, angle.RolePitch, angle.RoleYaw}
	ypr  = [3]angle.Role{angle.RoleYaw, angle.RolePitch, angle.RoleRoll}
)

func TestScalarInComments(t *testing.T) {
	for text, want := range map[string]convention.ScalarPlace{
		"xyzw": convention.ScalarLast, "x y z w, as the driver logs it": convention.ScalarLast, "(qx, qy, qz, qw)": convention.ScalarLast,
		"[w, x, y, z]": convention.ScalarFirst, "Hamilton, scalar-first": convention.ScalarFirst, "q_w q_x q_y q_z": convention.ScalarFirst,
		"wxyz, not xyzw": convention.ScalarUnstated, "x y z": convention.ScalarUnstated, "from wxyz to xyzw": convention.ScalarUnstated,
		"x, y, z, width": convention.ScalarUnstated, "": convention.ScalarUnstated,
	} {
		assert.Equal(t, want, ReadComment(text).Scalar, text)
	}
}

func TestUnitInComments(t *testing.T) {
	for text, want := range map[string]convention.Unit{
		"[deg]": convention.Degree, "roll pitch yaw [deg]": convention.Degree, "in degrees": convention.Degree, "90deg off": convention.Degree, "12.5°": convention.Degree,
		"(rad)": convention.Radian, "radians": convention.Radian, "[rad], 90 deg is 1.57": convention.Radian,
		"deg or rad?": convention.UnitUnstated, "rad/s": convention.UnitUnstated, "deg per second": convention.UnitUnstated, "[deg/s]": convention.UnitUnstated,
		"20 °C": convention.UnitUnstated, "radtan": convention.UnitUnstated, "degraded": convention.UnitUnstated,
	} {
		assert.Equal(t, want, ReadComment(text).Unit, text)
	}
}

func TestDirectionInComments(t *testing.T) {
	for text, want := range map[string]string{
		"v_body = R v_cam":                        "v_body = R v_cam equation",
		"p_imu = T_imu_cam * p_cam, see manual":   "v_imu = R v_cam equation",
		"v_body = R v_cam. Do not touch.":         "v_body = R v_cam equation",
		"body<-cam":                               "v_body = R v_cam equation",
		"rotation from camera to IMU R_CtoI":      "v_IMU = R v_camera",
		"T_lb (lidar -> imu)":                     "v_imu = R v_lidar",
		"body to world":                           "v_world = R v_body",
		"cam to body, then body to world":         "direction unstated",
		"set to 1":                                "direction unstated",
		"changed from 0.1 to 0.2":                 "direction unstated",
		"v_body = R^T v_cam":                      "direction unstated",
		"v_body = R p_cam":                        "direction unstated",
		"v_a = R v_b; v_c = R v_d":                "direction unstated",
		"do not turn the camera to the left side": "direction unstated",
	} {
		c := ReadComment(text)
		got := c.Direction.String()
		if c.Equation {
			got += " equation"
		}
		assert.Equal(t, want, got, text)
	}
}

func TestOtherTermsInComments(t *testing.T) {
	assert.Equal(t, convention.ColumnMajor, ReadComment("stored by columns").Storage)
	assert.Equal(t, convention.RowMajor, ReadComment("row-major 3x3").Storage)
	assert.Equal(t, convention.Shuster, ReadComment("JPL quaternion").Product)
	assert.Equal(t, convention.LeftHanded, ReadComment("Left-handed!").Hand)
	assert.Equal(t, convention.HandUnstated, ReadComment("not left-handed but right-handed").Hand)
	assert.Equal(t, rpy, ReadComment("roll, pitch and yaw, i.e. roll pitch yaw").Roles)
	assert.Equal(t, ypr, ReadComment("heading pitch roll").Roles)
	assert.Equal(t, none, ReadComment("roll and pitch").Roles)
	assert.Equal(t, convention.Quaternion, ReadComment("a unit quaternion").Form)
	assert.Equal(t, convention.Angles, ReadComment("Euler angles (rpy)").Form)
	assert.Equal(t, convention.NoForm, ReadComment("quaternion of the rotation matrix above").Form, "it speaks of two")
	for text, want := range map[string]bool{
		"not a rotation": true, "this is not a proper rotation matrix": true, "not orthonormal": true, "no rotation matrix": true,
		"no rotation between the two": false, "rotation": false, "do not edit; rotation": false,
	} {
		assert.Equal(t, want, ReadComment(text).Not, text)
	}
}

func TestSwitchedOffLines(t *testing.T) {
	for text, want := range map[string]bool{
		"extrinsicRot: [1, 0, 0,": true, "0, 1, 0,": true, "0, 0, 1]": true, "q: 0.5 # old": true, "- [1.0, 0.0]": true, `"q": "x"`: true, "use_deg: true": true,
		"rpy: roll pitch yaw": false, "xyzw": false, "Extrinsics: T_lb (lidar -> imu)": false, "note: body to world": false, "90 deg": false, "": false,
	} {
		assert.Equal(t, want, IsCode(text), text)
	}
}

func TestSequenceIn(t *testing.T) {
	for _, c := range []struct {
		text  string
		roles [3]angle.Role
		want  string // "" for none
	}{
		{"roll pitch yaw about fixed axes, x-y-z", rpy, "x-y-z (fixed axes)"},
		{"yaw pitch roll, z-y'-x''", ypr, "z-y'-x'' (moving axes)"},
		{"Angles as the tool prints them: x-y'-z'', about moving axes.", none, "x-y'-z'' (moving axes)"},
		{"ZYX", none, "ZYX (kind of axes unstated)"},
		{"sequence 321", none, "sequence 321 (kind of axes unstated)"},
		{"convention zyx", none, "convention zyx (kind of axes unstated)"},
		{"intrinsic ZYX, degrees", none, "z-y'-x'' (moving axes)"},
		{"sxyz", none, "x-y-z (fixed axes)"},
		{"roll pitch yaw", rpy, ""},
		{"xyz in metres", none, ""},
		{"XYZ or ZYX, nobody knows", none, ""},
		{"lens 321 of the old series", none, ""},
		{"fixed in March", none, ""},
		{"", none, ""},
	} {
		label, ok := SequenceIn(c.text, c.roles)
		got := ""
		if ok {
			got = label.String()
		}
		assert.Equal(t, c.want, got, c.text)
	}
}

func TestNeighbours(t *testing.T) {
	n, ok := Read("units").Neighbour("deg, m")
	assert.True(t, ok)
	assert.Equal(t, convention.Degree, n.Unit)
	assert.False(t, n.Angular)
	n, _ = Read("angle_unit").Neighbour("radians")
	assert.True(t, n.Angular && n.Unit == convention.Radian)
	n, _ = Read("degrees").Neighbour("false")
	assert.Equal(t, convention.Radian, n.Unit)
	n, _ = Read("angles_in_degrees").Neighbour("true")
	assert.Equal(t, convention.Degree, n.Unit)
	n, _ = Read("order").Neighbour("wxyz")
	assert.Equal(t, convention.ScalarFirst, n.Scalar)
	assert.Empty(t, n.Sequence)
	n, _ = Read("rotation_format").Neighbour("quat_xyzw")
	assert.True(t, n.Form == convention.Quaternion && n.Scalar == convention.ScalarLast)
	n, _ = Read("storage_order").Neighbour("column-major")
	assert.Equal(t, convention.ColumnMajor, n.Storage)
	n, _ = Read("handedness").Neighbour("left")
	assert.Equal(t, convention.LeftHanded, n.Hand)
	n, _ = Read("quaternion_convention").Neighbour("JPL")
	assert.Equal(t, convention.Shuster, n.Product)
	n, _ = Read("convention").Neighbour("intrinsic")
	assert.Equal(t, "intrinsic", n.AxisKind)
	n, _ = Read("mount_order").Neighbour("ypr")
	assert.True(t, n.Stem == "mount" && n.Roles == ypr)
	n, _ = Read("child_frame_id").Neighbour("imu")
	assert.Equal(t, "imu", n.From)
	n, _ = Read("scalar_first").Neighbour("true")
	assert.Equal(t, convention.ScalarFirst, n.Scalar)
	for _, key := range []string{"serial", "", "degrees", "unit_axis", "filter", "order_id"} {
		_, ok := Read(key).Neighbour("7")
		assert.False(t, ok, key)
	}
}

func TestAxisMap(t *testing.T) {
	m, signed, ok := AxisMap(strings.Fields("+y +x -z"))
	assert.True(t, ok && signed)
	assert.Equal(t, [3][3]float64{{0, 1, 0}, {1, 0, 0}, {0, 0, -1}}, m)
	_, signed, ok = AxisMap(strings.Fields("Z y x"))
	assert.True(t, ok && !signed)
	for _, text := range []string{"x y", "x y y", "x y zz", "x y +-z", "x y -", "a b c"} {
		_, _, ok := AxisMap(strings.Fields(text))
		assert.False(t, ok, text)
	}
}

func TestAxisWords(t *testing.T) {
	for text, want := range map[string]convention.Hand{
		"FLU": convention.RightHanded, "ned": convention.RightHanded, "x forward, y left, z up": convention.RightHanded,
		"forward-right-up": convention.LeftHanded, "camera": convention.HandUnstated, "xyz": convention.HandUnstated, "forward forward up": convention.HandUnstated,
	} {
		triad, ok := AxisWords(text)
		assert.Equal(t, want != convention.HandUnstated, ok, text)
		if ok {
			assert.Equal(t, want, triad.Handedness(), text)
		}
	}
}

func TestAnyComment(t *testing.T) {
	words := []string{"xyzw", "deg", "[rad]", "body", "to", "from", "cam", "->", "<-", "v_a = R v_b", "z-y'-x''", "intrinsic", "ZYX", "not a rotation", "°", "\u2033", ","}
	rapid.Check(t, func(t *rapid.T) {
		text := strings.Join(rapid.SliceOfN(rapid.SampledFrom(words), 0, 9).Draw(t, "words"), " ")
		if rapid.Bool().Draw(t, "free") {
			text = rapid.String().Draw(t, "text")
		}
		ReadComment(text)
		IsCode(text)
		if label, ok := SequenceIn(text, rpy); ok && len(label.Readings) == 0 {
			t.Fatalf("%q has a label without readings", text)
		}
		AxisWords(text)
	})
}
