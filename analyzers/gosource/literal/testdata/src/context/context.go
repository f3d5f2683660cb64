// Package context tries every place in which a literal can stand.
package context

import (
	"math"

	"tern.example/attitude"
)

type Camera struct {
	Name  string
	Mount attitude.Quaternion // from the camera to the body
	QCam  [4]float64          // x y z w
}

type Rig struct {
	Cameras map[string]Camera
	Spares  []attitude.Quaternion
	Grid    [2]Camera
}

var rig = Rig{
	Cameras: map[string]Camera{
		"front": {Mount: attitude.Quaternion{W: 1}}, // want `^quaternion rig.Cameras\[front\].Mount 1 0 0 0: .*direction=v_body = R v_camera by name`
		"left":  {QCam: [4]float64{0, 0, 0, 1}},     // want `^quaternion rig.Cameras\[left\].QCam 0 0 0 1: .*scalar last \(x y z w\) by comment`
	},
	Spares: []attitude.Quaternion{
		{X: 1}, // want `^quaternion rig.Spares\[0\] 0 1 0 0:`
		5:      {Y: 1}, // want `^quaternion rig.Spares\[5\] 0 0 1 0:`
	},
	Grid: [2]Camera{{Name: "a", Mount: attitude.Quaternion{Z: 1}}}, // want `^quaternion rig.Grid\[0\].Mount 0 0 0 1:`
}

var (
	// stowed is a comment above. Scalar first.
	stowed      = attitude.Quaternion{W: 1}                            // want `^quaternion stowed 1 0 0 0:`
	pair, other = attitude.Quaternion{W: 1}, attitude.Quaternion{X: 1} // want `^quaternion pair 1` `^quaternion other 0 1`
)

// DefaultMount returns how the camera is mounted.
func DefaultMount() attitude.Quaternion {
	return attitude.Quaternion{W: 0.8, X: 0.6} // want `^quaternion DefaultMount 0.8 0.6 0 0:`
}

// Log is arithmetic: what it returns need not be unit.
func Log() attitude.Quaternion {
	return attitude.Quaternion{X: 0.3} // want `^skip: it is an argument or an operand`
}

func (r Rig) Orientation() (attitude.Quaternion, error) {
	return attitude.Quaternion{W: 0.6, X: 0.8}, nil // want `^quaternion Rig.Orientation 0.6 0.8 0 0:`
}

func local(list []attitude.Quaternion) {
	q := attitude.Quaternion{W: 1} // want `^quaternion local.q 1 0 0 0:`
	_ = q
	var second = attitude.Quaternion{X: 1} // want `^quaternion local.second 0 1 0 0:`
	_ = second
	rig.Spares[0] = attitude.Quaternion{Y: 1}     // want `^quaternion local.rig.Spares\[0\] 0 0 1 0:`
	rig.Grid[1].Mount = attitude.Quaternion{Z: 1} // want `^quaternion local.rig.Grid\[1\].Mount 0 0 0 1:`
	func() {
		inner := attitude.Quaternion{W: 1} // want `^quaternion local.inner 1 0 0 0:`
		_ = inner
	}()
	if true {
		q := attitude.Quaternion{X: 1} // want `^quaternion local.q#2 0 1 0 0:`
		_ = q
	}
}

// Norms mean nothing where a literal is made unit at once, or later.
func normalised() {
	a := attitude.Quaternion{1, 2, 3, 4}.Normalize()         // want `^skip: it is normalised at once`
	b := attitude.Normalise(attitude.Quaternion{1, 2, 3, 4}) // want `^skip: it is normalised at once`
	c := attitude.Quaternion{1, 2, 3, 4}                     // want `^skip: it is changed after it is initialised`
	c = c.Normalize()
	d := attitude.Quaternion{1, 2, 3, 4} // want `^skip: it is changed after it is initialised`
	e := attitude.Normalise(d)
	_, _, _, _ = a, b, c, e
}

// Parts that are set later are not known yet.
func partly(w float64) {
	a := attitude.Quaternion{X: 0.6} // want `^skip: it is changed after it is initialised`
	a.W = math.Sqrt(w)
	b := attitude.Quaternion{X: 0.6} // want `^skip: it is changed after it is initialised`
	b.SetScalar(w)
	c := attitude.Quaternion{X: 0.6} // want `^skip: it is changed after it is initialised`
	fill(&c)
	mountRotation := [3][3]float64{{1, 0, 0}, {0, 1, 0}} // want `^skip: it is changed after it is initialised`
	mountRotation[2][2] = w
	_, _, _, _ = a, b, c, mountRotation
}

func fill(q *attitude.Quaternion) { q.W = 0.8 }

// Arguments and operands have no name of their own; fields inside do.
func operands() {
	v := attitude.Rotate(attitude.Quaternion{1, 2, 3, 4}, attitude.Vector{1, 2, 3}) // want `^skip: it is an argument or an operand`
	use(Camera{Mount: attitude.Quaternion{W: 1}})                                   // want `^quaternion operands.Mount 1 0 0 0:`
	_ = v
	for _, q := range []attitude.Quaternion{{W: 1}, {X: 1}} { // want `^skip: it is an argument` `^skip: it is an argument`
		_ = q
	}
	if (attitude.Quaternion{W: 1}) == (attitude.Quaternion{X: 1}) { // want `^skip: it is an argument` `^skip: it is an argument`
		return
	}
}

func use(Camera) {}

// A comment that belongs to the statement above says nothing of the one below.
func neighbours() {
	qOne := [4]float64{0, 0, 0, 1} // x y z w // want `scalar last`
	qTwo := [4]float64{1, 0, 0, 0} // want `^quaternion neighbours.qTwo 1 0 0 0: form=quaternion by name$`
	// x y z w
	qThree := [4]float64{0, 0, 0, 1} // want `scalar last`
	_, _, _ = qOne, qTwo, qThree
}
