// Package angles holds three angles, rotation vectors, axes.
package angles

type Euler struct{ Roll, Pitch, Yaw float64 } // degrees

type EulerXYZ struct{ X, Y, Z float64 }

type Pose struct {
	East, North                     float64
	YawDeg, PitchDeg, RollDeg       float64
	QX, QY, QZ, QW                  float64
	MountRoll, MountPitch, MountYaw float64
}

type Vector struct{ X, Y, Z float64 }

type Hinge struct {
	Axis     [3]float64
	AngleDeg float64
}

type Joint struct {
	SpinAxis Vector
	Limit    float64
}

var deck = Euler{Roll: 1.5, Yaw: -90} // want `^angles deck.Roll 1.5 -90 0: form=angles by label, unit=degree by comment, sequence=roll, yaw, pitch \(order of turns unstated\) by label; roll yaw pitch$`

var positional = Euler{1, 2, 3} // want `^angles positional.Roll 1 2 3: .*; roll pitch yaw$`

var named = EulerXYZ{0.1, 0.2, 0.3} // want `^angles named 0.1 0.2 0.3: form=angles by label, sequence=xyz \(kind of axes unstated\) by label; x y z$`

var fix = Pose{
	East:   12,
	YawDeg: 90, PitchDeg: -2, // want `^angles fix.YawDeg 90 -2 0: .*unit=degree by label, .*; yaw pitch roll of A$`
	QW: 1, QX: 0, // want `^quaternion fix.QW 1 0 0 0: .* of A$`
	MountYaw: 0.5, // want `^angles fix.Mount 0.5 0 0: .*; yaw roll pitch$`
}

var mountRPYDeg = [3]float64{1, 2, 3} // want `^angles mountRPYDeg 1 2 3: form=angles by label, unit=degree by label, sequence=roll, pitch, yaw \(kind of axes unstated\) by label; roll pitch yaw$`

var eulerZYX = []float64{0.1, 0.2, 0.3} // radians // want `^angles eulerZYX 0.1 0.2 0.3: form=angles by label, unit=radian by comment, sequence=zyx \(kind of axes unstated\) by label$`

var tilt = [3]float64{0.1, 0.2, 0.3} // Euler angles z-y'-x'' in deg // want `^angles tilt 0.1 0.2 0.3: form=angles by comment, unit=degree by comment, sequence=z-y'-x'' \(moving axes\) by comment$`

var rotationVector = [3]float64{0, 0, 1.5} // want `^rotation vector rotationVector 0 0 1.5: form=rotation vector by label$`

var cameraRvec = Vector{0, 0, 1.5} // want `^rotation vector cameraRvec `

var cameraRotation = Vector{0, 0, 1.5} // want `^three numbers cameraRotation 0 0 1.5: .*undecided: three numbers under this name may be angles or a rotation vector`

var door = Hinge{Axis: [3]float64{0, 0.6, 0.8}, AngleDeg: 30} // want `^axis and angle door.Axis 0 0.6 0.8 30: form=axis and angle by name, unit=degree by label$`

var wheel = Joint{SpinAxis: Vector{0, 1, 0}, Limit: 3} // want `^axis wheel.SpinAxis 0 1 0: form=axis by name; undecided: nothing says that the axis has unit length$`

var unitAxis = Vector{0, 1, 0} // want `^axis unitAxis 0 1 0: form=axis by label$`

// A function may make the axis unit.
var hatch = Hinge{Axis: [3]float64{1, 1, 0}, AngleDeg: 30} // want `^axis and angle hatch.Axis 1 1 0 30: .*undecided: nothing says that the axis has unit length$`

var maxRates = Euler{1, 2, 3} // limits

const (
	boomRoll  = 1.0 // want `^angles boom 1.0 2.0 3.5: .*; roll pitch yaw$`
	boomPitch = 2.0
	boomYaw   = 3.5
	otherRoll = 1.0 // it has no pitch and yaw beside it
)

type Control struct{ Roll, Pitch, Yaw, Throttle string }

var keys = Control{"a", "b", "c", "d"} // no numbers

var lostRPY = [3]float64{-1, -1, -1} // want `^angles lostRPY .*undecided: its numbers are all the same`

var evenRPY = [3]float64{45, 45, 45} // want `^angles evenRPY 45 45 45: .*; roll pitch yaw$`
