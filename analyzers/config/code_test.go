package config

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
)

// What libraries do with numbers: Eigen, tf2, Bullet, assimp and KDL as measured with
// them (their constructors of 1, 2, 3, 4 read back), the others from memory of their
// documentation.
func TestCodeOrders(t *testing.T) {
	text := `const Eigen::Quaterniond a(0.5, 0.5, 0.5, 0.5);
tf2::Quaternion b(0.5, 0.5, 0.5, 0.5);
btQuaternion c(0.5, 0.5, 0.5, 0.5);
auto d = aiQuaternion(0.5, 0.5, 0.5, 0.5);
KDL::Rotation e = KDL::Rotation::Quaternion(0.5, 0.5, 0.5, 0.5);
double quat[4] = {0.5, 0.5, 0.5, 0.5}; // x y z w
double rpy_deg[3] = {10, 20, 30};
double nothing[4] = {1, 2, 3, 4};
`
	assert.Equal(t, []string{
		"a: quaternion; format quaternion; format scalar first (w x y z)",
		"b: quaternion; format quaternion; format scalar last (x y z w)",
		"c: quaternion; format quaternion; format scalar last (x y z w)",
		"d: quaternion; format quaternion; format scalar first (w x y z)",
		"e: quaternion; format quaternion; format scalar last (x y z w)",
		"quat: quaternion; label quaternion; comment scalar last (x y z w)",
		"rpy_deg: angles; label angles; label degree; name roll, pitch, yaw (kind of axes unstated)",
	}, summaries(t, "m.cpp", text))
}

func TestCodePython(t *testing.T) {
	text := `from scipy.spatial.transform import Rotation as R
a = R.from_quat([0.0, 0.0, 0.0, 1.0])
b = R.from_euler('ZYX', [30, 20, 10], degrees=True)
c = R.from_euler('xyz', [0.1, 0.2, 0.3])
rpy = np.deg2rad([10, 20, 30])
euler = [np.pi / 2, 0.0, np.deg2rad(30)]
quat_conj = conjugate([0.1, 0.2, 0.3, 0.4])
`
	assert.Equal(t, []string{
		"a: quaternion; format quaternion; format scalar last (x y z w)",
		"b: angles; format angles; format degree; format z-y'-x'' (moving axes)",
		"c: angles; format angles; format radian; format x-y-z (fixed axes)",
		"rpy: angles; label angles; format degree; name roll, pitch, yaw (kind of axes unstated)",
		"euler: angles; label angles",
	}, summaries(t, "m.py", text))
}

// Numbers that an expression computes have its value, and its text as it stands.
func TestCodeExpressions(t *testing.T) {
	v := readText(t, "m.c", "double rpy[3] = {M_PI/2, -M_PI_4, 30.0*M_PI/180.0};").Values[0]
	assert.InDeltaSlice(t, []float64{1.5707963267948966, -0.7853981633974483, 0.5235987755982988}, v.Floats(), 1e-15)
	assert.Equal(t, "m.c:1:18", v.Numbers[0].Place.String())
	assert.Equal(t, "30.0*M_PI/180.0", v.Numbers[2].Text)
}

// Names in programs mean many things: what does not fit a short name is no error.
func TestCodeDoubts(t *testing.T) {
	for name, text := range map[string]string{
		"whole numbers":     "double q[4] = {1, 2, 3, 4};",
		"far from a unit":   "double R[9] = {0.5, 3.25, 0.1, 9.5, 0.2, 0.3, 0.4, 0.5, 0.6};",
		"normalised":        "# scipy\nr = R.from_quat([0.3, 0.1, 0.1, 0.1])",
		"a name alone":      "double T[16] = {1.5, 2.5, 3.5, 4.5, 1, 2, 3, 4, 1, 2, 3, 4, 1, 2, 3, 4};",
		"a vector to scale": "double axis[3] = {0.5, 0.25, 0.125};",
	} {
		file := "m.c"
		if strings.HasPrefix(text, "#") {
			file = "m.py"
		}
		for _, v := range readText(t, file, text).Values {
			assert.False(t, v.Decided(), "%s: %s", name, v.Form)
		}
	}
	assert.Empty(t, readText(t, "m.c", "double q[4] = {0, 0, 0, 0}; float R[3][3] = {{0}};").Values, "zeros initialise")
}

func TestCodeTooLarge(t *testing.T) {
	r := readText(t, "m.c", strings.Repeat("double q[4] = {1, 0, 0, 0};\n", 600_000))
	assert.Empty(t, r.Values)
	assert.Len(t, r.Warnings, 1)
}

func TestXacro(t *testing.T) {
	text := `<robot xmlns:xacro="http://ros.org/wiki/xacro" name="tern">
  <xacro:property name="tilt" value="${radians(30)}"/><xacro:property name="twice" value="${2*tilt}"/><xacro:property name="other" value="${f(1)}"/>
  <xacro:property name="again" value="1.0"/><xacro:property name="again" value="2.0"/>
  <link name="a"><visual><origin rpy="${-pi/4} ${tilt} ${twice + 0.5}"/></visual><collision><origin rpy="0 ${other} 0"/></collision><inertial><origin rpy="0 ${again} 0"/></inertial></link>
</robot>`
	values := readText(t, "m.xacro", text).Values
	assert.Len(t, values, 1, "the others use what this file does not settle")
	assert.InDeltaSlice(t, []float64{-0.7853981633974483, 0.5235987755982988, 1.5471975511965976}, values[0].Floats(), 1e-15)
	assert.Empty(t, readText(t, "m.urdf", `<robot name="tern"><link name="a"><visual><origin rpy="0 ${pi} 0"/></visual></link></robot>`).Values, "no xacro file")
}
