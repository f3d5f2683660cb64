// Package colour is full of fours, threes and nines that are no orientations.
// Nothing here may be found, but where it says so.
package colour

type Vec4 struct{ X, Y, Z, W float64 }

type Plane struct{ A, B, C, D float64 }

type RGBA struct{ R, G, B, A float64 }

type Rect struct{ X, Y, W, H float64 }

type Quaternion struct{ W, X, Y, Z float64 }

var sky = Vec4{0.2, 0.3, 0.9, 1}      // four floats without a word of rotation
var ground = Plane{0, 0, 1, -2}       // a plane
var ink = RGBA{0.1, 0.1, 0.1, 1}      // a colour
var frame = Rect{0, 0, 640, 480}      // a rectangle
var weights = [4]float64{1, 2, 3, 4}  // a list
var clip = []float64{0, 0, 1, 1}      // a list
var tint = Quaternion{1, 0.5, 0.5, 1} // a colour in quaternion's clothes

var rotationRate = Quaternion{0, 0.1, 0.2, 0.3}   // a rate
var qDot = Quaternion{0, 0.1, 0.2, 0.3}           // a derivative
var spin = Quaternion{X: 0.1}                     // a rate
var orientationCov = [9]float64{1, 2, 3}          // a covariance
var quatError = Quaternion{0, 0.1, 0.2, 0.3}      // an error
var attitudeGain = [3]float64{1, 2, 3}            // a gain
var rotationLimits = [3]float64{0.1, 0.2, 0.3}    // limits
var rollPitchYawRates = [3]float64{0.1, 0.2, 0.3} // rates

var limits = struct{ Roll, Pitch, Yaw float64 }{30, 20, 90} // limits

type PIDGains struct{ Roll, Pitch, Yaw float64 }

var tuned = PIDGains{1.2, 1.1, 0.4} // a type of gains

var Gains = map[string]Quaternion{"attitude": {1, 1, 1, 1}} // nothing below a gain is an orientation

var kernel = [3][3]float64{{1, 2, 1}, {2, 4, 2}, {1, 2, 1}} // a kernel

var cameraMatrix = [3][3]float64{{800, 0, 320}, {0, 800, 240}, {0, 0, 1}} // a camera matrix

var rgbToXYZ = [3][3]float64{{0.41, 0.36, 0.18}, {0.21, 0.72, 0.07}, {0.02, 0.12, 0.95}} // colours

var gyroMisalignment = [3][3]float64{{1, 0.001, 0}, {0, 1, 0}, {0, 0, 1}} // a misalignment

var inertia = [3][3]float64{{1, 0, 0}, {0, 2, 0}, {0, 0, 3}} // an inertia

// scaled is not a rotation.
var scaledDCM = [3][3]float64{{2, 0, 0}, {0, 2, 0}, {0, 0, 2}}

var R = [3][3]float64{{0.1, 0, 0}, {0, 0.1, 0}, {0, 0, 0.1}} // want `^rotation matrix R .*undecided: one letter may as well name the noise`

var modelTransform = [4][4]float64{{2, 0, 0, 0}, {0, 2, 0, 0}, {0, 0, 2, 0}, {0, 0, 0, 1}} // it may scale

var posToIJ = [4][4]int{{0, 1, 3, 2}, {0, 2, 3, 1}, {3, 2, 0, 1}, {3, 1, 0, 2}} // a table

var sumNear2D = []float64{1e-8, 1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11} // twelve coefficients

var quartiles = struct{ Q0, Q1, Q2, Q3 float64 }{1, 2, 3, 4} // quartiles

var xAxis = []float64{0, 1, 2} // ticks of a plot

var rotationTicks = []float64{1, 2, 3, 4, 5} // five numbers

var ksRotations = [16]uint8{1, 1, 2, 2, 2, 2, 2, 2, 1, 2, 2, 2, 2, 2, 2, 1} // shifts of a cipher

var tileRotations = []float64{0, 90, 180, 270} // four rotations, an angle each

var sweepRotations = []float64{0, 10, 20, 30, 40, 50, 60, 70, 80} // nine of them

var rotation = []float64{0, 90, 180, 270} // want `^quaternion rotation .*undecided: the name leaves room for something else`

var cells = [9]int{1, 0, 0, 0, 1, 0, 0, 0, 1} // a board
