package claims

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"

	"dextral/core/convention"
	"dextral/rules"
)

// What the words mean is common practice; the names marked "corpus" stand in
// public files.
func TestFormByNameAndShape(t *testing.T) {
	short := func(m Meaning) string {
		s := "-"
		if m.Form != convention.NoForm {
			s = map[rules.Source]string{rules.Label: "label ", rules.Name: "name "}[m.Source] + m.Form.String()
		}
		if m.Why != "" {
			s += "?"
		}
		return s
	}
	for _, row := range strings.Split(strings.TrimSpace(`
name                      | three                 | four                  | nine                  | sixteen
quaternion                | -                     | label quaternion      | -                     | -
mount_quat                | -                     | label quaternion      | -                     | -
baseOrientation           | -?                    | name quaternion       | label rotation matrix | name rigid transform
orientation_wxyz          | -?                    | name quaternion       | label rotation matrix | name rigid transform
attitude                  | -?                    | name quaternion       | label rotation matrix | name rigid transform
rotation                  | -?                    | name quaternion       | label rotation matrix | name rigid transform
q                         | -                     | name quaternion       | -                     | -
q_b_n                     | -                     | name quaternion       | -                     | -
qbn                       | -                     | name quaternion       | -                     | -
q_body_cam                | -                     | name quaternion       | -                     | -
Q                         | -                     | -                     | matrix?               | matrix?
rotation_matrix           | -                     | -                     | label rotation matrix | name rigid transform
rotmat                    | -                     | -                     | label rotation matrix | name rigid transform
DCM_body                  | -                     | -                     | label rotation matrix | name rigid transform
extrinsicRot              | -?                    | name quaternion       | label rotation matrix | label rigid transform
extrinsicRPY              | label angles          | -                     | name rotation matrix  | -
extrinsicTrans            | -                     | -                     | name rotation matrix  | label rigid transform
R                         | -                     | -                     | name rotation matrix  | name rigid transform
R_cam_imu                 | -                     | -                     | name rotation matrix  | name rigid transform
R_rect_00                 | -                     | -                     | name rotation matrix  | name rigid transform
Rbc                       | -                     | -                     | name rotation matrix  | name rigid transform
R1                        | -                     | -                     | name rotation matrix  | name rigid transform
r                         | -                     | -                     | -                     | -
T_cam_imu                 | -                     | -                     | -                     | name rigid transform
body_T_cam0               | -                     | -                     | -                     | name rigid transform
T_BS                      | -                     | -                     | -                     | name rigid transform
cam_R_m2c                 | -                     | -                     | name rotation matrix  | name rigid transform
Tr_velo_to_cam            | -                     | -                     | -                     | name rigid transform
cam_to_body               | -                     | -                     | -                     | name rigid transform
transform_matrix          | -                     | -                     | -                     | name rigid transform
pose                      | -                     | -                     | -                     | name rigid transform
extrinsics                | -                     | -                     | name rotation matrix  | label rigid transform
mount_matrix              | -                     | -                     | name rotation matrix  | matrix?
matrix                    | -                     | -                     | matrix?               | matrix?
rpy                       | label angles          | -                     | name rotation matrix  | -
rpyDeg                    | label angles          | -                     | name rotation matrix  | -
ypr_rad                   | label angles          | -                     | name rotation matrix  | -
euler_zyx_deg             | label angles          | -                     | name rotation matrix  | -
eulerAngles               | label angles          | -                     | name rotation matrix  | -
roll_pitch_yaw            | label angles          | -                     | -                     | -
rotation_angles           | label angles          | -                     | label rotation matrix | name rigid transform
angles_deg                | -?                    | -                     | -                     | -
joint_angles              | -                     | -                     | -                     | -
rvec                      | label rotation vector | -                     | -                     | -
rotation_vector           | label rotation vector | -                     | label rotation matrix | name rigid transform
rodrigues                 | label rotation vector | -                     | -                     | -
axis_angle                | label rotation vector | label axis and angle  | -                     | -
angle_axis                | label rotation vector | label axis and angle? | -                     | -
unit_axis                 | label axis            | -                     | -                     | -
spin_axis                 | name axis             | -                     | -                     | -
rotation_axis             | name axis             | -                     | label rotation matrix | name rigid transform
axis                      | name axis?            | -                     | -                     | -
plot_axis                 | -                     | -                     | -                     | -
direction_in_body         | -                     | -                     | -                     | -
intrinsics                | -                     | -                     | matrix?               | matrix?
camera_matrix             | -                     | -                     | matrix?               | matrix?
camera_rotation_matrix    | -                     | -                     | label rotation matrix | name rigid transform
K                         | -                     | -                     | matrix?               | matrix?
P_rect_02                 | -                     | -                     | -                     | -
P1                        | -                     | -                     | matrix?               | matrix?
E                         | -                     | -                     | matrix?               | matrix?
Tg                        | -                     | -                     | matrix?               | matrix?
projection_matrix         | -                     | -                     | matrix?               | matrix?
gyro_misalignment         | -                     | -                     | matrix?               | matrix?
soft_iron                 | -                     | -                     | matrix?               | matrix?
inertia                   | -                     | -                     | matrix?               | matrix?
homography                | -                     | -                     | matrix?               | matrix?
orientation_covariance    | -                     | -                     | matrix?               | matrix?
image_flip                | -                     | -                     | matrix?               | matrix?
q_noise                   | -                     | -                     | matrix?               | matrix?
rpy_limits                | -                     | -                     | matrix?               | matrix?
max_rpy                   | -                     | -                     | matrix?               | matrix?
attitude_rate             | -                     | -                     | matrix?               | matrix?
upper_rpy                 | -                     | -                     | matrix?               | matrix?
upper_lidar_rpy           | label angles          | -                     | name rotation matrix  | -
rate_gyro_rpy             | label angles          | -                     | name rotation matrix  | -
overlay_rgba              | -                     | -                     | matrix?               | matrix?
translation               | -                     | -                     | -                     | -
vertices                  | -                     | -                     | -                     | -
`), "\n")[1:] {
		cells := strings.Split(row, "|")
		for i := range cells {
			cells[i] = strings.TrimSpace(cells[i])
		}
		n := Read(cells[0])
		for i, shape := range []Shape{Three, Four, Nine, Rigid} {
			got := strings.Replace(short(n.Form(shape)), "name matrix", "matrix", 1)
			assert.Equal(t, cells[i+1], got, "%s, shape %d", cells[0], shape)
		}
	}
}

func TestStem(t *testing.T) {
	for name, want := range map[string]string{
		"quaternion": "", "rotation_matrix": "", "euler_zyx_deg": "", "R": "", "q": "", "T": "", "rpyDeg": "", "quat_xyzw": "",
		"mount_quaternion_wxyz": "mount", "mount_rpy_deg": "mount", "mountRPY": "mount", "R_mount": "mount",
		"q_body_cam": "body_cam", "R_body_cam": "body_cam", "body_T_cam": "body_cam", "R_cam_body": "cam_body", "Rbc": "b_c",
		"cam_to_body_quat": "cam_to_body", "body_from_cam": "body_from_cam", "cam2body_rpy": "cam_to_body",
		"quaternion_1": "1", "R1": "1", "left_rpy": "left", "orientation_quaternion": "orientation", "extrinsicRot": "extrinsic", "extrinsicRPY": "extrinsic",
		"R_inv": "inv", "T_imu_cam0": "imu_cam0",
	} {
		assert.Equal(t, want, Read(name).Stem, name)
	}
}

func TestTerms(t *testing.T) {
	n := Read("mount_quaternion_xyzw_jpl")
	assert.Equal(t, convention.ScalarLast, n.Scalar)
	assert.Equal(t, convention.Shuster, n.Product)
	assert.Equal(t, convention.ScalarFirst, Read("quat_w_x_y_z").Scalar)
	assert.Equal(t, convention.ScalarFirst, Read("scalarFirstQuat").Scalar)
	assert.Equal(t, convention.Degree, Read("yawDeg").Unit)
	assert.Equal(t, convention.Radian, Read("rpy_radians").Unit)
	assert.Equal(t, convention.UnitUnstated, Read("rad2deg_rpy").Unit, "both are named")
	assert.Equal(t, "mrad", Read("rpy_mrad").BadUnit)
	assert.Equal(t, convention.ColumnMajor, Read("R_col_major").Storage)
	assert.Equal(t, convention.RowMajor, Read("rotationRowMajor").Storage)
	assert.Equal(t, convention.LeftHanded, Read("axes_left_handed").Hand)
	assert.Equal(t, "zyx", Read("euler_zyx").Sequence)
	assert.Equal(t, "intrinsic 321", Read("euler_intrinsic_321").Sequence)
	assert.Empty(t, Read("rotation_xyz").Sequence, "may be components")
}

func TestDirection(t *testing.T) {
	for name, want := range map[string]string{
		"cam_to_body":              "v_body = R v_cam",
		"body_from_cam":            "v_body = R v_cam",
		"lidar2imu":                "v_imu = R v_lidar",
		"R_IMUtoGYRO":              "v_GYRO = R v_IMU",
		"R_CtoI":                   "v_I = R v_C",
		"Tr_velo_to_cam":           "v_cam = R v_velo",
		"cam_to_body_quaternion":   "v_body = R v_cam",
		"quat_base_link_to_camera": "v_camera = R v_base_link",
		"rotation_to_body":         "direction unstated",
		"T_cam_imu":                "direction unstated",
		"from_cam_to_body":         "direction unstated",
		"rotation":                 "direction unstated",
	} {
		assert.Equal(t, want, Read(name).Direction.String(), name)
	}
}

func TestSubscriptFrames(t *testing.T) {
	for name, want := range map[string][2]string{
		"T_cam_imu": {"cam", "imu"}, "body_T_cam0": {"body", "cam0"}, "q_b_n": {"b", "n"}, "Rwb": {"w", "b"}, "T_cn_cnm1": {"cn", "cnm1"},
		"T_cam_to_imu": {}, "rotation": {}, "T": {}, "T_BS": {}, "R_rect": {},
	} {
		first, second, ok := SubscriptFrames(name)
		assert.Equal(t, want, [2]string{first, second}, name)
		assert.Equal(t, want[0] != "", ok, name)
	}
}

// A word inside another thing's name, or below it, is not what the name is about.
func TestDeepNot(t *testing.T) {
	for name, want := range map[string]bool{
		"gains": true, "rpy_limits": true, "noise_params": true, "pid": true, "rates": true,
		"rate_gyro": false, "range_sensor": false, "lower_leg": false, "mount": false, "scale": false, "torque_sensor": false,
	} {
		assert.Equal(t, want, Read(name).Deep, name)
	}
}

func TestReadIn(t *testing.T) {
	assert.Equal(t, convention.Rotation, ReadIn("rotation", "matrix").Form(Nine).Form)
	assert.Equal(t, convention.Quaternion, ReadIn("quaternion", "data").Form(Four).Form)
	assert.Equal(t, convention.NoForm, ReadIn("quaternion", "offset").Form(Four).Form, "a name with words of its own stands alone")
	assert.Empty(t, ReadIn("mount", "matrix").Stem)
	assert.Equal(t, "mount.matrix", ReadIn("mount", "matrix").Text)
	assert.Equal(t, "rpy", ReadIn("mount", "rpy").Text)
	assert.Equal(t, "matrix", ReadIn("", "matrix").Text)
}

func TestComponents(t *testing.T) {
	for name, want := range map[string]string{
		"qw": "1 0 ", "qz": "1 3 ", "cam_qx": "1 1 cam", "q0": "2 0 ", "q_w": "3 0 q", "w": "3 0 ", "rotation_x": "3 1 rotation",
		"roll": "5 0 ", "mount_roll_deg": "5 0 mount", "pitchRad": "5 1 ", "yaw_angle": "5 2 ", "heading": "5 2 ",
		"x_axis": "6 0 ", "cam_z_axis": "6 2 cam",
		"roll_channel": "", "roll_kp": "", "roll_rate": "", "max_roll": "", "axis_roll": "", "rc_map_roll": "", "yaw_std": "", "w_axis": "", "spin_axis": "", "width": "",
	} {
		c, ok := Read(name).Component()
		got := ""
		if ok {
			got = strings.Join([]string{string(rune('0' + c.Set)), string(rune('0' + c.Index)), c.Lead}, " ")
		}
		assert.Equal(t, want, got, name)
	}
}

// Laws: no name panics; words keep all letters and digits in order; what is no
// orientation is none in any shape.
func TestAnyName(t *testing.T) {
	words := []string{"R", "T", "q", "to", "from", "cam", "body", "rpy", "deg", "rad", "matrix", "quaternion", "xyzw", "wxyz", "noise", "axis", "_", "2", "é", "", "Of", "1", "Tg", "zyx", "-"}
	rapid.Check(t, func(t *rapid.T) {
		name := strings.Join(rapid.SliceOfN(rapid.SampledFrom(words), 0, 6).Draw(t, "words"), "")
		if rapid.Bool().Draw(t, "free") {
			name = rapid.String().Draw(t, "name")
		}
		n := Read(name)
		joined := ""
		for _, w := range n.words {
			joined += w.raw
		}
		kept := strings.Map(func(r rune) rune {
			if strings.ContainsRune(joined, r) {
				return r
			}
			return -1
		}, name)
		if !strings.Contains(joined, "to") && len(kept) < len(joined) {
			t.Fatalf("%q became %q", name, joined)
		}
		for shape := Three; shape <= Rigid; shape++ {
			if m := n.Form(shape); n.Not != "" && m.Form != convention.NoForm && m.Why == "" {
				t.Fatalf("%q is %s, and yet %v", name, n.Not, m)
			}
		}
		n.Component()
		n.AxisAnglePart()
		SubscriptFrames(name)
		n.Neighbour("zyx deg")
	})
}
