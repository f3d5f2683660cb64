package config

import (
	"testing"

	"github.com/stretchr/testify/require"

	"dextral/analyzers/source"
	"dextral/core/convention"
	"dextral/rules"
)

var fuzzNames = []string{"m.yaml", "m.json", "m.gltf", "m.toml", "m.xml", "m.ini", "m.param", "m.kvn", "m.g2o", "m.txt", "m.c", "m.py", "m.m", "m.tf", "m.csv"}

// Laws of Read, for any text in any format: no panic; an error says where and
// what to do; every number stands where its place says; what is decided has as
// many numbers as its form, and a claim that decides it.
func FuzzRead(f *testing.F) {
	for _, text := range []string{
		"q: [1, 0, 0, 0] # x y z w\n", "a: {roll: 1, pitch: 2, yaw: 3, units: deg}\nR: [[1, 0, 0], [0, 1, 0], [0, 0, 1]]\n",
		"%YAML:1.0\nR: !!opencv-matrix\n  rows: 3\n  cols: 3\n  data: [1., 0, 0, 0, 1, 0, 0, 0, 1]\n", "axes: x forward, y left, z up\naxis_map: +y,+x,-z\n",
		"{\"T\": {\"qx\": 0, \"qy\": 0, \"qz\": 0, \"qw\": 1}, \"rpy\": [NaN, 1e999, 2]}", "nodes: [{rotation: [1, 1, 1, 1]}]",
		"h: {axis: [0, 0, 1], angle_deg: 3}\nc: {x_axis: [1, 0, 0], y_axis: [0, 1, 0], z_axis: [0, 0, 1]}\n", "b: &b {rpy: [1, 2, 3]}\nc: {<<: *b}\n",
		"euler_zyx: \"1 2 3\" # moving axes\norientation: {type: quaternion, value: {w: 1, x: 0, y: 0, z: 0}}\n", "rotation: [0 0 0 1]\n",
		"[a]\nrpy_deg = [1, 2, 3] # zyx\n[[b]]\nq = {w = 1, x = 0, y = 0, z = 0}\n",
		"<robot><joint name='j'><parent link='a'/><child link='b'/><origin rpy='0 0 1' quat_xyzw='0 0 0 1'/><axis xyz='0 0 1'/></joint></robot>",
		"<sdf><model><pose degrees='true'>1 2 3 4 5 6</pose><pose rotation_format='quat_xyzw'>1 2 3 0 0 0 1</pose></model></sdf>",
		"<launch><node exec='static_transform_publisher' args='0 0 0 1 2 3 map odom 10'/><node type='static_transform_publisher' args='--qx 0 --qy 0 --qz 0 --qw 1 --frame-id a --child-frame-id b'/></launch>",
		"<opencv_storage><R type_id='opencv-matrix'><rows>3</rows><cols>3</cols><data>1 0 0 0 1 0 0 0 1</data></R></opencv_storage>", "<mujoco><body quat='1 0 0 0'/></mujoco>",
		"[cam]\nR = 1 0 0\n    0 1 0\n    0 0 1\nrpy_deg = [1, 2, 3] ; zyx\n", "AHRS_ORIENTATION,6\n", "R: 1 0 0 0 1 0 0 0 1\nTr_velo_to_cam: 1 0 0 0 0 1 0 0 0 0 1 0\n",
		"CCSDS_APM_VERS = 2.0\nQUAT_START\nREF_FRAME_A = A\nREF_FRAME_B = B\nQ1 = 0\nQ2 = 0\nQ3 = 0\nQC = 1\nQUAT_STOP\nEULER_START\nREF_FRAME_A = A\nREF_FRAME_B = B\nEULER_ROT_SEQ = ZYX\nANGLE_1 = 1\nANGLE_2 = 2\nANGLE_3 = 3\nEULER_STOP\n",
		"KPL/FK\n\\begindata\nTKFRAME_1_ANGLES = ( 1.0D0, 2\n 3 )\nTKFRAME_1_ANGLES += 4\nTKFRAME_1_AXES = ( 3, 2, 3 )\nTKFRAME_1_UNITS = 'DEGREES'\nTKFRAME_1_RELATIVE = 'A'\nTKFRAME_1_Q = (1 0 0 0)\n\\begintext\n",
		"name,roll [deg],pitch [deg],yaw [deg],qw,qx,qy,qz\nnose,1,2,3,1,0,0,0\n\"tail\",4,5,6,0,1,0,0\n",
		"const double q_nose[4] = {1, 0, 0, 0}; // x y z w\nstruct a m = {.rpy = {M_PI/2, 0, 1}, .R = {{1, 0, 0}, {0, 1, 0}, {0, 0, 1}}};\n",
		"q = Rotation.from_quat([0, 0, 0, 1]) # scipy\nrpy = np.deg2rad([10, 20, 30])\n", "R = [1 0 0; 0 1 0; 0 0 1];\nq = quaternion(1, 0, 0, 0); % wxyz\n",
		"{{0\u0cd7},0\u0cd7rpY: [NAN 0 0]}", "VERTEX_SE3:QUAT 0 1 2 3 0 0 0 1\nEDGE3 0 1 1 2 3 4 5 6\n",
	} {
		for kind := range byte(len(fuzzNames)) {
			f.Add(kind, []byte(text))
		}
	}
	f.Fuzz(func(t *testing.T, kind byte, text []byte) {
		name := fuzzNames[int(kind)%len(fuzzNames)]
		file := source.New(name, text)
		result, err := Read(name, text)
		if err != nil {
			var e *source.Error
			require.ErrorAs(t, err, &e)
			require.NotEmpty(t, e.Remedy)
			require.LessOrEqual(t, e.Place.Line, file.Lines())
			return
		}
		for _, v := range result.Values {
			for _, n := range v.Numbers {
				require.Equal(t, n.Text, at(file, n.Place))
			}
			require.NotEmpty(t, at(file, v.Place))
			for _, c := range v.Claims {
				require.NotNil(t, c.Says)
			}
			if !v.Decided() {
				require.Empty(t, v.Of)
				continue
			}
			want := map[convention.Form]int{convention.Quaternion: 4, convention.Rotation: 9, convention.Angles: 3, convention.RotationVector: 3,
				convention.AxisAngle: 4, convention.Axis: 3, convention.Triad: 9, convention.AxisMap: 9, convention.Transform: v.Rows * v.Cols}
			require.Len(t, v.Numbers, want[v.Form], "%s", v.Form)
			_, ok := v.FormClaim()
			require.True(t, ok)
		}
	})
}

// at cuts a place out of a file by its line spans.
func at(f *source.File, p rules.Place) string {
	offset := func(line, column int) int {
		span := f.LineSpan(line)
		at := span.From
		for at < len(f.Text) {
			if l, c := f.Position(at); l > line || l == line && c >= column {
				break
			}
			at++
		}
		return at
	}
	return f.Slice(source.Span{From: offset(p.Line, p.Column), To: offset(p.EndLine, p.EndColumn)})
}
