package literal

import (
	"slices"
	"strings"
	"unicode"
)

// split cuts a Go identifier into lower-case words: mountRPYDeg is mount, rpy,
// deg; R_cam_imu is r, cam, imu; quat_wxyz is quat, wxyz; q0 stays q0.
func split(name string) []string {
	var words []string
	runes := []rune(name)
	start := 0
	cut := func(end int) {
		if end > start {
			words = append(words, strings.ToLower(string(runes[start:end])))
		}
		start = end
	}
	for i, r := range runes {
		switch {
		case !unicode.IsLetter(r) && !unicode.IsDigit(r):
			cut(i)
			start = i + 1
		case i > start && unicode.IsUpper(r) && (!unicode.IsUpper(runes[i-1]) || i+1 < len(runes) && unicode.IsLower(runes[i+1])):
			cut(i)
		}
	}
	cut(len(runes))
	return words
}

func set(words string) map[string]bool {
	m := map[string]bool{}
	for _, w := range strings.Fields(words) {
		m[w] = true
	}
	return m
}

// Words by what they claim.
var (
	quaternionWords = set("quat quats quaternion quaternions rotor rotors versor versors unitquat unitquaternion")
	rotationWords   = set("rotation rotations rot rots attitude attitudes orientation orientations orient dcm dcms rotmat rotm rotmatrix")
	transformWords  = set("pose poses extrinsic extrinsics transform tf")
	anglesWords     = set("euler eulers rpy ypr eulerangles eul")
	vectorWords     = set("rotvec rvec rotationvector")
	matrixWords     = set("dense mat mat3 mat4 matrix matrix3 matrix4")
	// frameWords are customary names of frames: a matrix called bodyFromCam
	// with one of them on either side is a change of axes, where rgbFromXYZ is not.
	frameWords = set("body cam camera imu world ned enu nwu frd flu rdf ecef eci sensor lidar radar base odom map " +
		"earth inertial gimbal head vehicle robot tool flange gps gnss nav local mount tracker left right")
	// otherWords say that numbers of the shape of an orientation are none, or
	// are one that need not be unit.
	otherWords = set("dot rate rates omega deriv derivative derivatives vel velocity velocities speed cov covariance " +
		"noise sigma sigmas variance std stddev err error errors residual gain gains weight weights bias biases scale scales " +
		"sum total diff difference delta increment jac jacobian grad gradient tol tolerance eps epsilon inertia kernel " +
		"misalignment skew spin torque moment accel acceleration momentum colour color colors plane planes rect rects " +
		"bounds box min max limit limits step steps range threshold uncertainty drift coeff coeffs coefficients " +
		"shear mirror reflection flip raw unnormalized unnormalised random noisy count counts kf index indices idx size")
	// shapeWords name types of four numbers that are more often something else.
	shapeWords = set("vec vec4 vector vector4 vec4f vec4d point plane color colour rect rectangle rgba margin padding insets box bounds tuple float4")
)

func hasAny(words []string, set map[string]bool) bool {
	return slices.ContainsFunc(words, func(w string) bool { return set[w] })
}

// leads reports a name that begins with a letter of custom and goes on with
// names of frames: qBodyCam, R_cam_imu.
func leads(words []string, letters string) bool {
	return len(words) > 1 && len(words[0]) == 1 && strings.Contains(letters, words[0])
}

// joinsFrames reports xFromY, xToY and x_y with names of frames on both sides.
func joinsFrames(words []string) bool {
	if len(words) != 3 || words[1] != "from" && words[1] != "to" && words[1] != "wrt" {
		return false
	}
	return frameWords[words[0]] && frameWords[words[2]]
}
