// Package matrix holds rotation matrices, rigid transforms, triads and maps.
package matrix

import "tern.example/attitude"

type Vec struct{ X, Y, Z float64 }

type RotationMatrix struct{ m [3][3]float64 }

type Mat3 [9]float64

type Frame struct{ X, Y, Z Vec }

type Axes struct{ XAxis, YAxis, ZAxis [3]float64 }

// DCM is a direction cosine matrix, row by row.
type Table [3][3]float64

type Dense struct{ data []float64 }

func NewDense(r, c int, data []float64) *Dense { return &Dense{data} }

func Sum(list []float64) float64 { return list[0] }

var MountRotation = [3][3]float64{{1, 0, 0}, {0, 0, -1}, {0, 1, 0}} // want `^rotation matrix MountRotation 1 0 0 0 0 -1 0 1 0: form=rotation matrix by label$`

var bodyDCM = [9]float64{1, 0, 0, 0, 1, 0, 0, 0, 1} // column-major // want `^rotation matrix bodyDCM .*: form=rotation matrix by label, storage=column by column by comment$`

var sparse = Mat3{0: 1, 4: 1, 8: 1} // nothing says that it is a rotation

var attitudeRows = []Vec{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}} // want `^rotation matrix attitudeRows 1 0 0 0 1 0 0 0 1:`

var wrapped = RotationMatrix{m: [3][3]float64{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}}} // want `^rotation matrix wrapped.m 1 0 0 0 1 0 0 0 1: form=rotation matrix by label$`

var told = attitude.Matrix{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}} // want `^rotation matrix told .*by label$`

var documented = Table{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}} // want `^rotation matrix documented .*: form=rotation matrix by comment, storage=row by row by comment$`

var R_body_cam = [3][3]float64{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}} // want `^rotation matrix R_body_cam .*: form=rotation matrix by name$`

var T_cam_imu = [4][4]float64{{1, 0, 0, 0}, {0, 1, 0, 0}, {0, 0, 1, 0}, {0, 0, 0, 1}} // want `^rigid transform T_cam_imu .*by name$`

var lidarExtrinsics = [3][4]float64{{1, 0, 0, 0.5}, {0, 1, 0, 0}, {0, 0, 1, 0}} // want `^rigid transform lidarExtrinsics .*by label$`

var flatExtrinsic = []float64{1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1} // want `^rigid transform flatExtrinsic `

var denseRotation = NewDense(3, 3, []float64{0, 1, 0, 1, 0, 0, 0, 0, 1}) // want `^rotation matrix denseRotation 0 1 0 1 0 0 0 0 1:`

var denseOther = NewDense(2, 4, []float64{0, 1, 0, 1, 0, 0, 0, 0}) // two by four

var rotationSum = Sum([]float64{0, 1, 0, 1, 0, 0, 0, 0, 1}) // no matrix is made of it

var body = Frame{X: Vec{1, 0, 0}, Y: Vec{0, 1, 0}, Z: Vec{0, 0, 1}} // want `^triad body.X 1 0 0 0 1 0 0 0 1: form=triad by name$`

var tool = Axes{XAxis: [3]float64{1, 0, 0}, ZAxis: [3]float64{0, 0, 1}, YAxis: [3]float64{0, 1, 0}} // want `^triad tool.XAxis 1 0 0 0 1 0 0 0 1:`

var half = Axes{XAxis: [3]float64{1, 0, 0}} // two axes are missing

var axisRemap = [3][3]int{{0, 1, 0}, {1, 0, 0}, {0, 0, -1}} // want `^axis map axisRemap 0 1 0 1 0 0 0 0 -1: form=axis map by name$`

var tooMany = [3][3]float64{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}}

var ragged = [][]float64{{1, 0, 0}, {0, 1}, {0, 0, 1}} // rows of different length

var turnRotation = [3][3]int{{0, -1, 0}, {1, 0, 0}, {0, 0, 1}} // want `^rotation matrix turnRotation 0 -1 0 1 0 0 0 0 1:`

var rotations = [][3][3]float64{{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}}} // want `^rotation matrix rotations\[0\] 1 0 0 0 1 0 0 0 1:`
