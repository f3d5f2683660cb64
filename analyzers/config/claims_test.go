package config

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
)

// cases are YAML texts, each with the values that are to be found in it.
type cases []struct{ name, text, want string }

func (all cases) run(t *testing.T) {
	t.Helper()
	for _, c := range all {
		t.Run(c.name, func(t *testing.T) {
			assert.Equal(t, strings.TrimSpace(c.want), strings.Join(summaries(t, "m.yaml", c.text), "\n"), c.text)
		})
	}
}

func TestShapes(t *testing.T) {
	cases{
		{"flat nine", "R: [1, 0, 0, 0, 1, 0, 0, 0, 1]\n", "R: rotation matrix; name rotation matrix"},
		{"flat twelve", "T: [1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1, 0]\n", "T: rigid transform; name rigid transform"},
		{"rows", "dcm:\n- [1, 0, 0]\n- [0, 1, 0]\n- [0, 0, 1]\n", "dcm: rotation matrix; label rotation matrix"},
		{"rows of text", "dcm:\n- 1 0 0\n- 0 1 0\n- 0 0 1\n", "dcm: rotation matrix; label rotation matrix"},
		{"3x4 rows", "T_a_b: [[1, 0, 0, 0], [0, 1, 0, 0], [0, 0, 1, 0]]\n", "T_a_b: rigid transform; name rigid transform"},
		{"block", "R: {rows: 3, cols: 3, data: [1, 0, 0, 0, 1, 0, 0, 0, 1]}\n", "R: rotation matrix; name rotation matrix"},
		{"block in quotes", "R: {rows: '3', cols: '3', data: '1 0 0 0 1 0 0 0 1'}\n", "R: rotation matrix; name rotation matrix"},
		{"block of a vector", "rvec: !!opencv-matrix\n  rows: 3\n  cols: 1\n  dt: d\n  data: [0., 0., 1.]\n", "rvec: rotation vector; label rotation vector"},
		{"block without a claim", "A: {rows: 3, cols: 3, data: [1, 0, 0, 0, 1, 0, 0, 0, 1]}\n", "A: matrix; undecided"},
		{"block of another size", "D: {rows: 1, cols: 5, data: [1, 2, 3, 4, 5]}\n", ""},
		{"column of rows", "rvec: [[0.1], [0.2], [0.3]]\n", "rvec: rotation vector; label rotation vector"},
		{"list of quaternions", "quaternions:\n- [1, 0, 0, 0]\n- [0, 1, 0, 0]\n- [0, 1, 0, 0]\n- [0, 1, 0, 0]\n",
			"quaternions[0]: quaternion; label quaternion\nquaternions[1]: quaternion; label quaternion\nquaternions[2]: quaternion; label quaternion\nquaternions[3]: quaternion; label quaternion"},
		{"list of maps", "cams: [{R: [[1, 0, 0], [0, 1, 0], [0, 0, 1]]}]\n", "cams[0].R: rotation matrix; name rotation matrix"},
		{"inner name that says nothing", "rotation: {matrix: [[1, 0, 0], [0, 1, 0], [0, 0, 1]]}\norientation: {value: [1, 0, 0, 0]}\n",
			"rotation.matrix: rotation matrix; label rotation matrix\norientation.value: quaternion; name quaternion"},
		{"ragged rows", "R: [[1, 0, 0], [0, 1], [0, 0, 1]]\n", ""},
		{"words among numbers", "q: [1, 0, 0, x]\n", ""},
		{"unset", "q: [0, 0, 0, 0]\nR: [0, 0, 0, 0, 0, 0, 0, 0, 0]\n", "q: quaternion; name quaternion\nR: rotation matrix; name rotation matrix"},
		{"not finite", "quaternion: [.nan, .inf, -.inf, 1e999]\n", "quaternion: quaternion; label quaternion"},
	}.run(t)
}

func TestNames(t *testing.T) {
	cases{
		{"unit in the key", "rpy_deg: [1, 2, 3]\n", "rpy_deg: angles; label angles; label degree; name roll, pitch, yaw (kind of axes unstated)"},
		{"sequence in the key", "euler_zyx_rad: [1, 2, 3]\n", "euler_zyx_rad: angles; label angles; label radian; label zyx (kind of axes unstated)"},
		{"full sequence in the key", "euler_intrinsic_zyx: [1, 2, 3]\n", "euler_intrinsic_zyx: angles; label angles; label z-y'-x'' (moving axes)"},
		{"order in the key", "rotation_wxyz: [1, 0, 0, 0]\n", "rotation_wxyz: quaternion; name quaternion; label scalar first (w x y z)"},
		{"direction in the key", "cam_to_body_quat: [1, 0, 0, 0]\n", "cam_to_body_quat: quaternion; label quaternion; name v_body = R v_cam"},
		{"components", "mount: {qx: 0, qy: 0, qz: 0, qw: 1}\n", "mount: quaternion; label scalar first (w x y z); label quaternion"},
		{"components of one name", "cam_qw: 1\ncam_qx: 0\ncam_qy: 0\ncam_qz: 0\n", "cam: quaternion; label scalar first (w x y z); label quaternion"},
		{"components at the root", "q0: 1\nq1: 0\nq2: 0\nq3: 0\n", "q0, q1, q2, q3: quaternion; label scalar first (w x y z); label quaternion"},
		{"components under a direction", "lidar_to_imu: {x: 0, qw: 1, qx: 0, qy: 0, qz: 0}\n", "lidar_to_imu: quaternion; label scalar first (w x y z); label quaternion; name v_imu = R v_lidar"},
		{"order of components is settled", "orientation_xyzw: {x: 0, y: 0, z: 0, w: 1} # x y z w\n", "orientation_xyzw: quaternion; label scalar first (w x y z); label quaternion"},
		{"angles", "mount: {roll: 1, pitch: 2, yaw: 3}\n", "mount: angles; label angles; name roll, pitch, yaw (kind of axes unstated)"},
		{"angles about x, y, z", "euler_deg: {x: 1, y: 2, z: 3}\n", "euler_deg: angles; label angles; label degree; name x, y, z (kind of axes unstated)"},
		{"rx, ry, rz", "rpy_deg: {rx: 1, ry: 2, rz: 3}\n", "rpy_deg: angles; label angles; label degree; name x, y, z (kind of axes unstated)"},
		{"two angles", "gimbal: {pitch: 1, yaw: 2}\n", "gimbal: angles; label angles; undecided"},
		{"one angle", "yaw: 1\n", ""},
		{"axis and angle", "hinge: {axis: [0, 0, 1], angle_deg: 30}\n", "hinge: axis and angle; label degree; label axis and angle"},
		{"list of axis and angle", "axis_angle: [0, 0, 1, 0.5]\n", "axis_angle: axis and angle; label axis and angle"},
		{"axes", "cam:\n  x_axis: [1, 0, 0]\n  y_axis: [0, 1, 0]\n  z_axis: [0, 0, 1]\n", "cam: triad; label triad"},
		{"axes by letter", "axes: {x: [1, 0, 0], y: [0, 1, 0], z: [0, 0, 1]}\n", "axes: triad; label triad"},
		{"axes in words", "axes: [forward, left, up]\nframe: NED\n", "axes: triad; label triad\nframe: triad; label triad"},
		{"axes that claim a hand", "axes: x forward, y right, z up, right-handed\n", "axes: triad; label right-handed; label triad"},
		{"axes in words with a hand", "body_axes: x forward, y left, right-handed\n", "body_axes: triad; label right-handed; label triad"},
		{"axis maps", "axis_map: [y, x, -z]\nimu_orientation: +y,+x,-z\naxis_map_2: {map: 'x, -y, -z', hand: right}\n",
			"axis_map: axis map; name axis map\nimu_orientation: axis map; name axis map\naxis_map_2.map: axis map; name axis map; sibling right-handed"},
		{"other unit", "rpy_mrad: [1, 2, 3]\n", "rpy_mrad: angles; label angles; name roll, pitch, yaw (kind of axes unstated); undecided"},
	}.run(t)
}

func TestNeighbours(t *testing.T) {
	cases{
		{"unit", "mount: {rpy: [1, 2, 3], units: deg}\n", "mount.rpy: angles; label angles; sibling degree; name roll, pitch, yaw (kind of axes unstated)"},
		{"unit of lengths", "mount: {rpy: [1, 2, 3], units: mm}\n", "mount.rpy: angles; label angles; name roll, pitch, yaw (kind of axes unstated)"},
		{"flag", "mount: {roll: 1, pitch: 2, yaw: 3, degrees: true}\n", "mount: angles; label angles; sibling degree; name roll, pitch, yaw (kind of axes unstated)"},
		{"unit of all angles", "angle_unit: rad\na: {b: {rpy: [1, 2, 3]}}\n", "a.b.rpy: angles; label angles; sibling radian; name roll, pitch, yaw (kind of axes unstated)"},
		{"unit elsewhere", "units: rad\na: {b: {rpy: [1, 2, 3]}}\n", "a.b.rpy: angles; label angles; name roll, pitch, yaw (kind of axes unstated)"},
		{"full sequence", "stow: {sequence: \"z-y'-x''\", angles_deg: [1, 2, 3]}\n", "stow.angles_deg: angles; label angles; label degree; label z-y'-x'' (moving axes)"},
		{"bare sequence", "stow: {euler: [1, 2, 3], order: ZYX}\n", "stow.euler: angles; label angles; sibling sequence ZYX (kind of axes unstated)"},
		{"sequence in two keys", "stow: {euler: [1, 2, 3], order: zyx, convention: intrinsic}\n", "stow.euler: angles; label angles; label z-y'-x'' (moving axes)"},
		{"sequence of another", "m: {cam_euler: [1, 2, 3], imu_order: ZYX}\n", "m.cam_euler: angles; label angles"},
		{"form", "orientation: {type: quaternion, value: {w: 1, x: 0, y: 0, z: 0}}\n", "orientation.value: quaternion; label scalar first (w x y z); label quaternion"},
		{"form of three numbers", "mount: {rotation: [1, 2, 3], format: rpy}\n", "mount.rotation: angles; sibling angles; name roll, pitch, yaw (kind of axes unstated)"},
		{"scalar", "mount: {quaternion: [1, 0, 0, 0], order: wxyz}\n", "mount.quaternion: quaternion; label quaternion; sibling scalar first (w x y z)"},
		{"product", "mount: {quaternion: [1, 0, 0, 0], convention: JPL}\n", "mount.quaternion: quaternion; label quaternion; sibling Shuster (ij = -k)"},
		{"frames", "a: {to_frame: body, from_frame: cam, R: [1, 0, 0, 0, 1, 0, 0, 0, 1]}\n", "a.R: rotation matrix; name rotation matrix; sibling v_body = R v_cam"},
		{"frames around", "header: {frame_id: map}\nchild_frame_id: imu\ntransform: {rotation: {x: 0, y: 0, z: 0, w: 1}}\n",
			"transform.rotation: quaternion; label scalar first (w x y z); label quaternion; sibling v_map = R v_imu"},
		{"one frame", "frame_id: map\nquaternion: [1, 0, 0, 0]\n", "quaternion: quaternion; label quaternion"},
	}.run(t)
}

func TestComments(t *testing.T) {
	cases{
		{"order", "quaternion: [1, 0, 0, 0] # x y z w\n", "quaternion: quaternion; label quaternion; comment scalar last (x y z w)"},
		{"roles and unit", "euler: [1, 2, 3] # yaw pitch roll [deg]\n",
			"euler: angles; label angles; comment angles; comment degree; name yaw, pitch, roll (kind of axes unstated)"},
		{"full sequence", "rpy: [1, 2, 3] # moving axes z-y'-x''\n", "rpy: angles; label angles; comment z-y'-x'' (moving axes) of numbers 3, 2, 1"},
		{"fuller sequence", "euler_zyx: [1, 2, 3] # intrinsic ZYX\n", "euler_zyx: angles; label angles; comment z-y'-x'' (moving axes)"},
		{"other sequence", "euler_zyx: [1, 2, 3] # intrinsic XZY\n", "euler_zyx: angles; label angles; label zyx (kind of axes unstated); comment x-z'-y'' (moving axes)"},
		{"above", "# fixed axes x-y-z,\n# in degrees, the three angles\neuler: [1, 2, 3]\n", "euler: angles; label angles; comment degree; comment x-y-z (fixed axes)"},
		{"above, of something else", "# tolerance 1 deg\neuler: [1, 2, 3]\n", "euler: angles; label angles"},
		{"too far above", "# x y z w\n\nq: [1, 0, 0, 0]\n", "q: quaternion; name quaternion"},
		{"switched off above", "# x y z w\n# q: [0, 0, 0, 1]\nq: [1, 0, 0, 0]\n", "q: quaternion; name quaternion"},
		{"switched off beside", "q: [1, 0, 0, 0] # q: [0, 0, 0, 1] # xyzw\n", "q: quaternion; name quaternion"},
		{"form", "mount: [1, 0, 0, 0] # quaternion w x y z\n", "mount: quaternion; comment quaternion; comment scalar first (w x y z)"},
		{"form above", "# mounting quaternion (w, x, y, z)\nmount: [1, 0, 0, 0]\n", "mount: quaternion; comment quaternion; comment scalar first (w x y z)"},
		{"form above, vaguely", "# used by the quaternion filter\nbox: [1, 2, 3, 4]\n", ""},
		{"form of three", "rotation: [1, 2, 3] # rodrigues\n", "rotation: rotation vector; comment rotation vector"},
		{"denial", "R: [2, 0, 0, 0, 1, 0, 0, 0, 1] # not a rotation\nq: [1, 2, 3, 4] # not a quaternion\n", "R: matrix; undecided"},
		{"conflict stays", "q_wxyz: [1, 0, 0, 0] # x y z w\n", "q_wxyz: quaternion; name quaternion; label scalar first (w x y z); comment scalar last (x y z w)"},
		{"direction", "R: [1, 0, 0, 0, 1, 0, 0, 0, 1] # v_body = R v_cam\n", "R: rotation matrix; name rotation matrix; comment v_body = R v_cam"},
		{"direction in words", "R: [1, 0, 0, 0, 1, 0, 0, 0, 1] # camera to body\n", "R: rotation matrix; name rotation matrix; name v_body = R v_camera"},
		{"hand above a map", "# measured, right-handed\naxes:\n  x: [1, 0, 0]\n  y: [0, 1, 0]\n  z: [0, 0, 1]\n", "axes: triad; label triad; comment right-handed"},
		{"on a component", "m: {roll: 1, # [deg]\n  pitch: 2, yaw: 3, k: [1, 2]} # rad\n", "m: angles; label angles; comment degree; comment radian; name roll, pitch, yaw (kind of axes unstated)"},
		{"column by column", "R: [1, 0, 0, 0, 1, 0, 0, 0, 1] # column-major\n", "R: rotation matrix; name rotation matrix; comment column by column"},
	}.run(t)
}

func TestNoOrientations(t *testing.T) {
	cases{
		{"build matrix", "strategy:\n  matrix:\n    go: [1.21, 1.22, 1.23]\n    os: [linux, darwin, windows]\n", ""},
		{"gains", "attitude_pid:\n  gains: {roll: 4.5, pitch: 4.5, yaw: 2.8}\n  rpy_limits: [30, 30, 90]\n", ""},
		{"noise", "imu_noise:\n  orientation: [0.1, 0.1, 0.1]\n  rpy: [1, 2, 3]\norientation_covariance: [0.1, 0, 0, 0, 0.1, 0, 0, 0, 0.1]\n", ""},
		{"rates", "rates: {roll: 200, pitch: 200, yaw: 150}\nmax_rate_deg: {roll: 1, pitch: 2, yaw: 3}\n", ""},
		{"channels", "rc_map: {roll: 1, pitch: 2, yaw: 4}\nservo_roll: 1\nservo_pitch: 2\nservo_yaw: 3\n", ""},
		{"axes of a chart", "x_axis: [0, 10]\ny_axis: [0, 5]\naxis: [0, 1, 2]\nplot_axis: [0, 10, 100]\n", "axis: axis; name axis; undecided"},
		{"colours and boxes", "rgba: [0.9, 0.3, 0.1, 1.0]\nbox: {x: 1, y: 2, w: 3, h: 4}\nplane: {x: 0, y: 0, z: 1, w: 2}\n", ""},
		{"camera", "intrinsics: [458.6, 457.3, 367.2, 248.4]\nK: [1, 0, 2, 0, 1, 2, 0, 0, 1]\nprojection_matrix: {rows: 3, cols: 4, data: [1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1, 0]}\n",
			"K: matrix; undecided\nprojection_matrix: matrix; undecided"},
		{"biases", "calib_gyro_bias: [0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0]\n", ""},
		{"joints", "q0: 1\nq1: 2\nq2: 3\nq3: 4\nq4: 5\njoint_angles: [1, 2, 3]\n", ""},
		{"topic remapping", "remap: [from, to, x]\nremappings: {a: b}\n", ""},
		{"covariance called R", "R: [[0.1, 0.01, 0], [0.01, 0.1, 0], [0, 0, 0.2]]\nQ: [[1, 0, 0], [0, 1, 0], [0, 0, 1]]\n", "R: rotation matrix; name rotation matrix; undecided\nQ: matrix; undecided"},
		{"augmentation", "rotation: [0, 30, 45, 90]\n", "rotation: quaternion; name quaternion; undecided"},
		{"axis and angle under rotation", "rotation: [0, 0, 1, 1.57]\n", "rotation: quaternion; name quaternion; undecided"},
		{"three under rotation", "rotation: [0.1, 0.2, 0.3]\norientation: {x: 1, y: 2, z: 3}\n", "rotation: nothing; undecided\norientation: nothing; undecided"},
		{"transition matrix", "T: [[0.5, 0.5, 0, 0], [0, 1, 0, 0], [0, 0, 1, 0], [0, 0, 0.5, 0.5]]\n", "T: rigid transform; name rigid transform; undecided"},
		{"text", "quaternion: see the manual\nrpy: '1, 2'\naxes: all\norientation: portrait\n", ""},
		{"axis names", "axes: [z, y, x]\norder: [x, y, z]\n", ""},
		{"identity called R", "R: [1, 0, 0, 0, 1, 0, 0, 0, 1]\n", "R: rotation matrix; name rotation matrix"},
		{"half turn called R", "R: [-1, 0, 0, 0, 1, 0, 0, 0, -1]\n", "R: rotation matrix; name rotation matrix"},
	}.run(t)
}

func TestTwins(t *testing.T) {
	of := func(text string) string {
		var all []string
		for _, v := range readText(t, "m.yaml", text).Values {
			all = append(all, v.Of)
		}
		return strings.Join(all, " ")
	}
	for _, c := range []struct{ name, text, want string }{
		{"one stem", "a: {mount_quaternion: [1, 0, 0, 0], mount_rpy_deg: [0, 0, 0]}", "a/mount a/mount"},
		{"no stem", "a: {quaternion: [1, 0, 0, 0], rotation_matrix: [1, 0, 0, 0, 1, 0, 0, 0, 1], euler_deg: [0, 0, 0]}", "a/ a/ a/"},
		{"symbols", "{R: [1, 0, 0, 0, 1, 0, 0, 0, 1], q: [1, 0, 0, 0]}", "/ /"},
		{"named and list", "park: {yaw: 1, pitch: 2, roll: 3, quaternion: [1, 0, 0, 0]}", "park/ park/"},
		{"two named", "{pose: {qw: 1, qx: 0, qy: 0, qz: 0, roll: 0, pitch: 0, yaw: 0}}", "pose/ pose/"},
		{"inner maps", "{a: {quaternion: {w: 1, x: 0, y: 0, z: 0}, rpy: {roll: 0, pitch: 0, yaw: 0}}}", "a/ a/"},
		{"two of one form", "{extrinsicRot: [-1, 0, 0, 0, 1, 0, 0, 0, -1], extrinsicRPY: [0, -1, 0, 1, 0, 0, 0, 0, 1]}", " "},
		{"two of one form and one more", "{rpy_deg: [1, 2, 3], rpy_rad: [1, 2, 3], quaternion: [1, 0, 0, 0]}", "  "},
		{"other frames", "{q_body_cam: [1, 0, 0, 0], R_body_imu: [1, 0, 0, 0, 1, 0, 0, 0, 1]}", " "},
		{"other order of frames", "{q_body_cam: [1, 0, 0, 0], R_cam_body: [1, 0, 0, 0, 1, 0, 0, 0, 1]}", " "},
		{"to and from", "{cam_to_body_quat: [1, 0, 0, 0], body_to_cam_rpy: [0, 0, 0]}", " "},
		{"left and right", "{left_quat: [1, 0, 0, 0], right_rpy: [0, 0, 0]}", " "},
		{"numbered", "{quat_1: [1, 0, 0, 0], rpy_2: [0, 0, 0]}", " "},
		{"inverse", "{R: [1, 0, 0, 0, 1, 0, 0, 0, 1], q_inv: [1, 0, 0, 0]}", " "},
		{"two maps", "{a: {quat: [1, 0, 0, 0]}, b: {rpy: [0, 0, 0]}}", " "},
		{"two items", "[{quat: [1, 0, 0, 0]}, {rpy: [0, 0, 0]}]", " "},
		{"two directions", "quat: [1, 0, 0, 0] # v_a = R v_b\nrpy: [0, 0, 0] # v_b = R v_a", " "},
		{"one direction", "quat: [1, 0, 0, 0] # v_a = R v_b\nrpy: [0, 0, 0]", "/ /"},
		{"undecided", "{rotation: [1, 2, 3], quaternion: [1, 0, 0, 0]}", " "},
		{"an axis beside", "{spin_axis: [0, 0, 1], quaternion: [1, 0, 0, 0]}", " "},
	} {
		assert.Equal(t, c.want, of(c.text), c.name)
	}
}

func TestGLTF(t *testing.T) {
	text := `{"asset": {"version": "2.0"}, "nodes": [{"rotation": [1, 1, 1, 1], "matrix": [2, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1]}],
		"accessors": [{"max": [1, 2, 3, 4], "rotation": [1, 2, 3, 4]}], "extras": {"quaternion": [1, 0, 0, 0]}}`
	assert.Equal(t, []string{
		"nodes[0].rotation: quaternion; format quaternion; format scalar last (x y z w)",
		"nodes[0].matrix: matrix; format column by column; undecided",
	}, summaries(t, "m.gltf", text))
}
