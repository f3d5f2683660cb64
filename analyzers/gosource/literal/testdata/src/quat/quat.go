// Package quat holds quaternions in the storage styles of Go programs.
package quat

import "math"

type Quat struct{ W, X, Y, Z float64 }

type Number struct{ Real, Imag, Jmag, Kmag float64 } // the package's name speaks for it

type Last struct{ X, Y, Z, W float32 } // scalar last in memory; the fields have names

type Vec3 [3]float64

type Parts struct {
	W float64
	V Vec3
}

type Xyz struct{ X, Y, Z float64 }

type Pair struct {
	Real float64
	Imag Xyz
}

type Rotor struct{ S, I, J, K float64 }

// Euler4 is the parameters of Euler; the package's name says that they are a quaternion.
type Euler4 struct{ Q0, Q1, Q2, Q3 float64 }

type ListQuat [4]float64

var MountQuat = Quat{W: 0.8, Z: 0.6} // want `^quaternion MountQuat 0.8 0 0 0.6: form=quaternion by label, scalar place=scalar first \(w x y z\) by label$`

var StowQuat = Quat{0.8, 0, 0, -0.6} // want `^quaternion StowQuat 0.8 0 0 -0.6:`

var LastQuat = Last{0, 0, 0.6, 0.8} // want `^quaternion LastQuat 0 0 0.6 0.8: .*scalar last \(x y z w\) by label$`

var LastKeyed = Last{W: 0.8, Z: 0.6} // want `^quaternion LastKeyed 0.8 0 0 0.6: .*scalar first \(w x y z\) by label$`

var swappedQuat = Last{0.8, 0, 0, 0.6} // w x y z // want `^quaternion swappedQuat 0.8 0 0 0.6: .*scalar first \(w x y z\) by comment$`

var NumberRotation = Number{Imag: 1} // want `^quaternion NumberRotation 0 1 0 0: form=quaternion by label`

var PartsQuat = Parts{0.8, Vec3{0, 0, 0.6}} // want `^quaternion PartsQuat 0.8 0 0 0.6:`

var KeyedParts = Parts{W: 0.8, V: Vec3{2: 0.6}} // want `^quaternion KeyedParts 0.8 0 0 0.6: form=quaternion by name`

var PairQuat = Pair{Real: 0.8, Imag: Xyz{Z: 0.6}} // want `^quaternion PairQuat 0.8 0 0 0.6:`

var bare = Rotor{S: 1} // want `^quaternion bare 1 0 0 0: form=quaternion by name`

var Digits = Euler4{1, 0, 0, 0} // want `^quaternion Digits 1 0 0 0: form=quaternion by name`

var QuatDigits = Euler4{1, 0, 0, 0} // want `^quaternion QuatDigits 1 0 0 0:`

var Listed = ListQuat{1, 0, 0, 0} // want `^quaternion Listed 1 0 0 0: form=quaternion by name$`

var OrientationXYZW = [4]float64{0, 0, 0, 1} // want `^quaternion OrientationXYZW 0 0 0 1: form=quaternion by name, scalar place=scalar last \(x y z w\) by label$`

var qBodyCam = [4]float64{1, 0, 0, 0} // want `^quaternion qBodyCam 1 0 0 0: form=quaternion by name$`

var bolt = [4]float64{0, 0, 0, 1} // quaternion, x y z w // want `^quaternion bolt 0 0 0 1: form=quaternion by comment, scalar place=scalar last \(x y z w\) by comment$`

var sliceQuat = []float32{1, 0, 0, 0} // want `^quaternion sliceQuat 1 0 0 0:`

var pointed = &Quat{W: 1} // want `^quaternion pointed 1 0 0 0: form=quaternion by name`

var converted = Quat(struct{ W, X, Y, Z float64 }{W: 1}) // want `^quaternion converted 1 0 0 0: form=quaternion by name`

var turned = Quat{math.Cos(math.Pi / 6), 0, 0, math.Sin(math.Pi / 6)} // want `^quaternion turned 0.8660254037844386 0 0 0.5:`

const c45 = 0.7071

var signs = Quat{-(c45), +c45, float64(0), 2 * 0.35355} // want `^quaternion signs -0.7071 0.7071 0 0.7071:`

var halves = Quat{math.Sqrt2 / 2, -math.Sqrt(0.5), 0, 0} // want `^quaternion halves 0.7071067811865476 -0.7071067811865476 0 0:`

// Unset quaternions are for the rules to name.
var UnsetQuat = Quat{W: 0, X: 0, Y: 0, Z: 0} // want `^quaternion UnsetQuat 0 0 0 0:`

var zeroValue Quat // states nothing

var emptyQuat = Quat{} // states nothing either

var start = Quat{1, 2, 3, 4} // want `^quaternion start 1 2 3 4: .*undecided: only its type speaks of a quaternion, and its numbers do not look like a rotation`

var target = Quat{X: 3.5, Y: 2} // want `^quaternion target 0 3.5 2 0: .*undecided: only its type`

var targetRotation = Quat{X: 3.5, Y: 2} // want `^quaternion targetRotation 0 3.5 2 0: [^;]*$`

func angle() float64 { return 1 }

var computedQuat = Quat{W: math.Cos(angle())} // want `^skip: it is computed at run time`

// Pointing is a quaternion, scalar last.
type Pointing [4]float64

var aim = Pointing{0, 0, 0, 1} // want `^quaternion aim 0 0 0 1: form=quaternion by name, scalar place=scalar last`

var UnknownQuat = Quat{-1, -1, -1, -1} // want `^quaternion UnknownQuat -1 -1 -1 -1: .*undecided: its numbers are all the same`

var EvenQuat = Quat{0.5, 0.5, 0.5, 0.5} // want `^quaternion EvenQuat 0.5 0.5 0.5 0.5: [^;]*$`

var invalidQuat = Quat{2, 0, 0, 0} // meant to be wrong
