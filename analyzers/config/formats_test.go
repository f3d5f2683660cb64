package config

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/convention"
)

func TestURDF(t *testing.T) {
	text := `<robot name="tern">
  <joint name="mast" type="fixed"><parent link="base"/><child link="mast"/><origin xyz="0 0 1" rpy="0 0 1.57"/></joint>
  <joint name="pan" type="revolute"><parent link="mast"/><child link="${head}"/><origin rpy="0 0 0" quat_xyzw="0 0 0 1"/><axis xyz="0 0 1"/></joint>
  <link name="mast"><visual><origin rpy="0 ${pi/2} 0"/></visual><inertial><origin rpy="0 0 0"/></inertial></link>
  <gazebo><pose>1 2 3 4 5 6</pose><rpy>1 2 3</rpy></gazebo>
</robot>`
	assert.Equal(t, []string{
		"robot.joint[mast].origin.rpy: angles; format angles; format v_base = R v_mast; format radian; format x-y-z (fixed axes)",
		"robot.joint[pan].origin.rpy: angles; format angles; format radian; format x-y-z (fixed axes); of robot.joint[pan].origin/",
		"robot.joint[pan].origin.quat_xyzw: quaternion; format quaternion; format scalar last (x y z w); label scalar last (x y z w); of robot.joint[pan].origin/",
		"robot.joint[pan].axis.xyz: axis; name axis",
		"robot.link.inertial.origin.rpy: angles; format angles; format radian; format x-y-z (fixed axes)",
	}, summaries(t, "m.urdf", text))
}

func TestSDF(t *testing.T) {
	text := `<sdf version="1.9"><model name="tern"><pose>1 2 3 0.1 0.2 0.3</pose>
  <link name="a"><pose degrees="true">1 2 3 10 20 30</pose></link>
  <link name="b"><pose rotation_format='quat_xyzw'>
      1 2 3   0 0 0 1
    </pose></link>
  <link name="c"><pose rotation_format="euler_rpy" relative_to="a">0 0 0 0 0 0</pose><pose>1 2 3</pose></link>
  <joint name="j"><axis><xyz>0 0 1</xyz></axis><axis2><xyz expressed_in="a">1 0 0</xyz></axis2></joint>
</model></sdf>`
	assert.Equal(t, []string{
		"sdf.model.pose: angles; format angles; format radian; format x-y-z (fixed axes)",
		"sdf.model.link[a].pose: angles; format angles; format degree; format x-y-z (fixed axes)",
		"sdf.model.link[b].pose: quaternion; format quaternion; format scalar last (x y z w)",
		"sdf.model.link[c].pose[0]: angles; format angles; format radian; format x-y-z (fixed axes)",
		"sdf.model.joint.axis.xyz: axis; name axis",
		"sdf.model.joint.axis2.xyz: axis; name axis",
	}, summaries(t, "m.sdf", text))
}

func TestLaunch(t *testing.T) {
	text := `<launch>
  <node name="a" pkg="tf" type="static_transform_publisher" args="0 0 0 -1.57 0 -1.57 base_link cam 100"/>
  <node name="b" pkg="tf2_ros" exec="static_transform_publisher" args="0 0 0 0 0 0 1 base_link $(arg lens)"/>
  <node name="c" pkg="tf2_ros" exec="static_transform_publisher" args="--roll 0.1 --pitch 0 --yaw 3 --frame-id base --child-frame-id cam"/>
  <node name="d" pkg="tf2_ros" exec="static_transform_publisher" args="--qw 1 --qx 0 --qy 0 --qz 0"/>
  <node name="e" pkg="tf" type="static_transform_publisher" args="0 0 0 $(arg yaw) 0 0 base_link cam 100"/>
  <node name="f" type="other" args="0 0 0 0 0 0 1 a b"/>
  <param name="rotation" value="1 0 0 0"/>
</launch>`
	assert.Equal(t, []string{
		"launch.node[a].args: angles; format angles; format v_base_link = R v_cam; format radian; format z-y'-x'' (moving axes)",
		"launch.node[b].args: quaternion; format quaternion; format scalar last (x y z w)",
		"launch.node[c].args: angles; format angles; format v_base = R v_cam; format radian; format z-y'-x'' (moving axes)",
		"launch.node[d].args: quaternion; format quaternion; format scalar last (x y z w)",
	}, summaries(t, "m.launch", text))
}

func TestOpenCVStorage(t *testing.T) {
	text := `<?xml version="1.0"?><opencv_storage>
<R type_id="opencv-matrix"><rows>3</rows><cols>3</cols><dt>d</dt><data>
    1.0e+000 0. 0. 0. 1. 0. 0. 0. 1.</data></R>
<T type_id="opencv-matrix"><rows>3</rows><cols>1</cols><dt>d</dt><data>1. 2. 3.</data></T>
<rvec type_id="opencv-matrix"><rows>3</rows><cols>1</cols><dt>d</dt><data>0.1 0.2 0.3</data></rvec>
<P1 type_id="opencv-matrix"><rows>3</rows><cols>4</cols><dt>d</dt><data>1 0 0 0 0 1 0 0 0 0 1 0</data></P1>
</opencv_storage>`
	assert.Equal(t, []string{
		"opencv_storage.R: rotation matrix; name rotation matrix; of opencv_storage/",
		"opencv_storage.rvec: rotation vector; label rotation vector; of opencv_storage/",
		"opencv_storage.P1: matrix; undecided",
	}, summaries(t, "m.xml", text))
}

// Where the format normalises, length is no matter.
func TestMJCF(t *testing.T) {
	assert.Equal(t, []string{"mujoco.body.quat: quaternion; format quaternion; format scalar first (w x y z); undecided"},
		summaries(t, "m.xml", `<mujoco><body quat="2 0 0 0" euler="0 90 0"/></mujoco>`))
}

// Comments and attributes beside a value are read in any XML.
func TestXMLByCustom(t *testing.T) {
	text := `<rig><mount name="nose" units="deg"><!-- fixed axes x-y-z --><rpy>1 2 3</rpy><quaternion order="wxyz">1 0 0 0</quaternion></mount>
<!-- <mount><rpy>4 5 6</rpy></mount> -->
<camera qw="1" qx="0" qy="0" qz="0"/></rig>`
	assert.Equal(t, []string{
		"rig.mount.rpy: angles; label angles; sibling degree; comment x-y-z (fixed axes); of rig.mount/",
		"rig.mount.quaternion: quaternion; label quaternion; sibling scalar first (w x y z); of rig.mount/",
		"rig.camera: quaternion; label scalar first (w x y z); label quaternion",
	}, summaries(t, "m.xml", text))
}

func TestTOML(t *testing.T) {
	text := "# angles in degrees\nangle_unit = 'deg'\n[cam.mount]\nrpy = [1, 2, 3] # roll pitch yaw, z-y'-x''\nquaternion = {w = 1.0, x = 0.0, y = 0.0, z = 0.0}\n[[imu]]\nR = [[1, 0, 0], [0, 1, 0], [0, 0, 1]] # v_body = R v_imu\n"
	assert.Equal(t, []string{
		"cam.mount.rpy: angles; label angles; comment angles; sibling degree; comment z-y'-x'' (moving axes) of numbers 3, 2, 1; of cam.mount/",
		"cam.mount.quaternion: quaternion; label scalar first (w x y z); label quaternion; of cam.mount/",
		"imu[0].R: rotation matrix; name rotation matrix; comment v_body = R v_imu",
	}, summaries(t, "m.toml", text))
}

func TestINI(t *testing.T) {
	text := "[cam.mount]\nrpy_deg = 1, 2, 3 ; roll pitch yaw, fixed axes x-y-z\nquaternion_wxyz = [1, 0, 0, 0]\n\n[lens]\n# v_body = R v_lens\nR = 1 0 0\n    0 1 0\n    0 0 1\n" +
		"[park]\npark.qw=1\npark.qx=0\npark.qy=0\npark.qz=0\n"
	assert.Equal(t, []string{
		"cam.mount.rpy_deg: angles; label angles; comment angles; label degree; comment x-y-z (fixed axes); of cam.mount/",
		"cam.mount.quaternion_wxyz: quaternion; label quaternion; label scalar first (w x y z); of cam.mount/",
		"lens.R: rotation matrix; name rotation matrix; comment v_body = R v_lens",
		"park.park: quaternion; label scalar first (w x y z); label quaternion",
	}, summaries(t, "m.ini", text))
}

func TestParameters(t *testing.T) {
	assert.Equal(t, []string{"AHRS_ORIENTATION: nothing; undecided", "COMPASS_ORIENT2: nothing; undecided"},
		summaries(t, "m.param", "AHRS_ORIENTATION,6 # Yaw270\nCOMPASS_ORIENT2 0\nGMB_ROLL,1\nGMB_PITCH,2\nGMB_YAW,3\nAHRS_TRIM_X,0.01\nROT_FILTER,2\n"))
}

func TestColonText(t *testing.T) {
	assert.Equal(t, []string{
		"P0: matrix; undecided",
		"R0_rect: rotation matrix; name rotation matrix",
		"Tr_velo_to_cam: rigid transform; name rigid transform; name v_cam = R v_velo",
	}, summaries(t, "m.txt", "P0: 7e2 0 6e2 0 0 7e2 1e2 0 0 0 1 0\nR0_rect: 1 0 0 0 1 0 0 0 1\nTr_velo_to_cam: 1 0 0 0 0 1 0 0 0 0 1 0\nT: 1 2 3\n"))
}

func TestPoseGraph(t *testing.T) {
	assert.Equal(t, []string{
		"VERTEX_SE3:QUAT[0]: quaternion; format quaternion; format scalar last (x y z w)",
		"EDGE_SE3:QUAT[0 1]: quaternion; format quaternion; format scalar last (x y z w)",
		"EDGE3[0 1]: angles; format angles; format radian; undecided",
	}, summaries(t, "m.g2o", "VERTEX_SE3:QUAT 0 1 2 3 0 0 0 1\nEDGE_SE3:QUAT 0 1 1 2 3 0 0 0 1 10 0 0\nEDGE3 0 1 1 2 3 4 5 6\nVERTEX_SE2 0 1 2 3\n"))
}

// The two issues of the standard: the second fixes the direction by the frames,
// the first has a keyword for it and leaves the quaternion's meaning open
// (CCSDS 504.0-B-2, annexes F and J).
func TestCCSDS(t *testing.T) {
	second := "CCSDS_APM_VERS = 2.0\nEPOCH = 2031-03-04T12:00:00\nQUAT_START\nREF_FRAME_A = ICRF\nREF_FRAME_B = BODY\nQ1 = 0\nQ2 = 0\nQ3 = 0\nQC = 1\nQ1_DOT = 0 [1/s]\nQUAT_STOP\n" +
		"EULER_START\nREF_FRAME_A = ICRF\nREF_FRAME_B = BODY\nEULER_ROT_SEQ = ZYX\nANGLE_1 = 3 [deg]\nANGLE_2 = 2 [deg]\nANGLE_3 = 1 [deg]\nEULER_STOP\n"
	want := []string{
		"QUAT: quaternion; format scalar first (w x y z); format quaternion; format v_ICRF = R v_BODY; of /ICRF_to_BODY",
		"EULER: angles; label degree; format angles; format v_ICRF = R v_BODY; format degree; format z-y'-x'' (moving axes); of /ICRF_to_BODY",
	}
	assert.Equal(t, want, summaries(t, "m.kvn", second))
	v := readText(t, "m.kvn", second).Values[1]
	assert.Equal(t, "3", v.Numbers[0].Text, "without its unit")

	xml := `<apm id="CCSDS_APM_VERS" version="2.0"><body><segment><data><quaternionState><REF_FRAME_A>ICRF</REF_FRAME_A><REF_FRAME_B>BODY</REF_FRAME_B>
<quaternion><Q1>0</Q1><Q2>0</Q2><Q3>0</Q3><QC>1</QC></quaternion></quaternionState>
<eulerAngleState><REF_FRAME_A>ICRF</REF_FRAME_A><REF_FRAME_B>BODY</REF_FRAME_B><EULER_ROT_SEQ>ZYX</EULER_ROT_SEQ>
<ANGLE_1 units="deg">3</ANGLE_1><ANGLE_2 units="deg">2</ANGLE_2><ANGLE_3 units="deg">1</ANGLE_3></eulerAngleState></data></segment></body></apm>`
	var values []string
	for _, s := range summaries(t, "m.xml", xml) {
		_, says, _ := strings.Cut(s, ": ")
		values = append(values, says)
	}
	for i, s := range want {
		_, says, _ := strings.Cut(s, ": ")
		assert.Equal(t, says, values[i])
	}

	first := "CCSDS_APM_VERS = 1.0\nQ_FRAME_A = BODY\nQ_FRAME_B = ICRF\nQ_DIR = B2A\nQ1 = 0\nQ2 = 0\nQ3 = 0\nQC = 1\n" +
		"EULER_FRAME_A = ICRF\nEULER_FRAME_B = BODY\nEULER_DIR = A2B\nEULER_ROT_SEQ = 321\nZ_ANGLE = 3\nY_ANGLE = 2\nX_ANGLE = 1\n"
	assert.Equal(t, []string{
		"Q1, Q2, Q3, QC: quaternion; format scalar first (w x y z); format quaternion; of /ICRF_to_BODY",
		"EULER_ROT_SEQ: angles; format angles; format degree; format z-y'-x'' (moving axes); of /ICRF_to_BODY",
	}, summaries(t, "m.kvn", first))
	assert.Equal(t, []float64{3, 2, 1}, readText(t, "m.kvn", first).Values[1].Floats(), "as written")

	radians := readText(t, "m.kvn", strings.ReplaceAll(second, "[deg]", "[rad]")).Values[1]
	assert.Len(t, radians.Claims.Conflicts(convention.OfUnit), 1, "the format's unit is not open to choice")

	wrong := readText(t, "m.kvn", strings.Replace(first, "321", "331", 1))
	assert.False(t, wrong.Values[1].Decided())
	assert.Equal(t, `m.kvn:12:17 EULER_ROT_SEQ "331" names no sequence of these angles; it must be three axes, none twice in a row`,
		wrong.Warnings[0].Place.String()+" "+wrong.Warnings[0].Message)
	assert.Empty(t, wrong.Values[0].Of)
	assert.Empty(t, readText(t, "m.kvn", strings.Replace(first, "Q_DIR = B2A", "Q_DIR = A2B", 1)).Values[0].Of, "the other way round is another orientation")
}
