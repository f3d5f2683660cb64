package config

import (
	"testing"

	"github.com/stretchr/testify/assert"
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
