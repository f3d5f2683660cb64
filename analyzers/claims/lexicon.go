package claims

import "strings"

// tag is a set of things that a word can say.
type tag uint64

const (
	quaternion  tag = 1 << iota // quaternion
	dcm                         // rotation matrix, in one word
	rotation                    // rotation, in some representation
	orientation                 // orientation, in some representation
	matrixWord                  // matrix
	rigid                       // rigid transform
	transform                   // transform of some kind
	euler                       // angles of a sequence
	angleWord                   // angle or angles
	rotvec                      // rotation vector
	vector                      // vector
	axis                        // axis
	axes                        // axes
	mapping                     // map between axes
	frameWord                   // frame
	physical                    // a thing that has an axis: spin axis, hinge axis
	mounting                    // how something is mounted
	role                        // roll, pitch, yaw
	degree                      // unit
	radian                      // unit
	otherUnit                   // a unit of angles that is not read
	scalarOrder                 // wxyz, xyzw
	letters3                    // three axes: zyx
	storage                     // row, column, major
	generic                     // says nothing, the key around it says it: data
	unit                        // of length one
	axisKind                    // moving, fixed
	linking                     // to, from
	leadsFrames                 // first word of a key that names a frame
	camera                      // camera
	filler                      // says nothing: params
	phrase                      // part of a phrase of package phrases
	not                         // no orientation
	headNot                     // no orientation if the name is about it: rates, but not rate_gyro
	deepNot                     // of a name that is about it: nothing below is an orientation either
)

// compounds are the tags of words that are written together with another:
// rpydeg, eulerzyx.
const compounds = quaternion | dcm | rotation | orientation | matrixWord | rigid | transform | euler | angleWord |
	rotvec | vector | axis | axes | mapping | degree | radian | scalarOrder | letters3 | role

// representation are the tags of words that do not tell which orientation it is.
const representation = quaternion | dcm | rotation | matrixWord | transform | euler | angleWord | rotvec | vector |
	role | degree | radian | otherUnit | scalarOrder | letters3 | storage | generic | unit | axisKind | filler

// lexicon holds the words with all that they can say.
var lexicon = map[string]tag{}

// notWhy gives the reason for words with the tag not.
var notWhy = map[string]string{}

func init() {
	for _, l := range []struct {
		tags  tag
		words string
	}{
		{quaternion, "quaternion quaternions quat quats versor versors"},
		{dcm, "dcm dcms rotmat rotmats rotm cosine cosines"},
		{rotation, "rotation rotations rot rots"},
		{orientation, "orientation orientations attitude attitudes orient"},
		{matrixWord, "matrix matrices mat mat3 mat4"},
		{rigid, "rigid isometry se3 homogeneous extrinsic extrinsics"},
		{transform, "transform transforms transformation transformations pose poses tf"},
		{euler, "euler eulers rpy ypr hpr rph"},
		{angleWord, "angle angles"},
		{rotvec, "rotvec rotvecs rvec rvecs rodrigues so3"},
		{vector, "vector vectors vec"},
		{axis, "axis"},
		{axes, "axes"},
		{mapping, "map mapping remap remapping"},
		{frameWord, "frame frames coordinate coordinates"},
		{physical, "spin pan tilt hinge joint revolute pivot gimbal boresight optical thrust rotor wheel elevation"},
		{mounting, "mount mounting"},
		{role, "roll pitch yaw heading"},
		{degree, "deg degs degree degrees"},
		{radian, "rad rads radian radians"},
		{otherUnit, "mrad mrads milliradian milliradians urad arcsec arcsecs arcseconds arcmin arcmins gon gons grad grads turns revolutions"},
		{scalarOrder, "wxyz xyzw"},
		{letters3, "xyz xzy yxz yzx zxy zyx xyx xzx yxy yzy zxz zyz"},
		{storage, "row column col major wise rowmajor colmajor columnmajor"},
		{generic, "data value values elements entries coeffs coefficients list array"},
		{unit, "unit"},
		{axisKind, "intrinsic extrinsic moving fixed static rotating"},
		{linking, "to from"},
		{leadsFrames, "frame header parent child to from target source"},
		{camera, "camera cam"},
		{filler, "param params parameter parameters config cfg settings options"},
	} {
		for _, w := range strings.Fields(l.words) {
			lexicon[w] |= l.tags
		}
	}
	for _, l := range []struct {
		tags       tag
		why, words string
	}{
		{not | deepNot, "noise, a weight or an error", "noise noises cov covar covariance covariances sigma sigmas std stds stddev stdev variance variances " +
			"uncertainty uncertainties weight weights error errors err residual residuals drift hessian jacobian jac"},
		{headNot, "information", "information"},
		{not | deepNot, "a control parameter", "gain gains kp ki kd kff pid limit limits max min maximum minimum bound bounds " +
			"tolerance tolerances tollerance tol threshold thresholds thresh cost costs penalty stiffness damping " +
			"trim trims stick joystick pwm rc servo servos channel channels mixer expo cutoff freq frequency hz dof timeout"},
		{headNot | deepNot, "a control parameter", "range ranges upper lower step steps button buttons index indices idx " +
			"count counts size sizes delay increment resolution enable enabled invert inverted reverse reversed controller control ctrl"},
		{headNot | deepNot, "a rate", "rate rates velocity velocities vel speed speeds acceleration accelerations omega momentum torque moment"},
		{not | deepNot, "a bias", "bias biases"},
		{not, "a scale or misalignment", "scale scales misalignment misalignments misalign sensitivity skew shear iron nonorthogonality crosstalk"},
		{not, "camera geometry or another projection", "intrinsics projection projective proj homography essential fundamental disparity distortion perspective affine warp rectify kernel"},
		{not, "a mirror", "flip mirror reflection"},
		{not, "inertia", "inertia"},
		{not, "a colour", "color colour colors colours rgb rgba hsv ccm overlay tint"},
	} {
		for _, w := range strings.Fields(l.words) {
			lexicon[w] |= l.tags
			notWhy[w] = l.why
		}
	}
	tagPhrases(scalarPhrases)
	tagPhrases(storagePhrases)
	tagPhrases(productPhrases)
	tagPhrases(handPhrases)
}

// tagPhrases marks the words of phrases, so that names without any are not
// searched for them.
func tagPhrases[T comparable](known phrases[T]) {
	for text := range known {
		for _, w := range strings.Fields(text) {
			lexicon[w] |= phrase
		}
	}
}

// notSymbols are customary names of matrices that are no rotations, in the case
// in which they are written.
var notSymbols = map[string]string{
	"K": "a camera matrix", "P": "a projection or covariance", "E": "an essential matrix", "F": "a fundamental or system matrix",
	"Q": "a disparity map or noise", "D": "distortion", "H": "a homography or observation matrix",
	"Tg": "gyroscope scale and misalignment", "Ta": "accelerometer scale and misalignment", "Tw": "gyroscope scale and misalignment",
	"Ts": "gyroscope sensitivity to acceleration",
}
