// Package a has functions and words that do not agree, and some that do.
package a

import "math"

// Quat is stored w, x, y, z.
type Quat [4]float64

// Other is stored w, x, y, z, or so it says.
type Other [4]float64 // want `Other is stored as x y z w, as its functions compute \(Other.Mul\); its comment says scalar first \(w x y z\)`

// Vec is a vector.
type Vec struct{ X, Y, Z float64 }

// Mul returns the Hamilton product.
func (a Quat) Mul(b Quat) Quat {
	return Quat{
		a[0]*b[0] - a[1]*b[1] - a[2]*b[2] - a[3]*b[3],
		a[0]*b[1] + a[1]*b[0] + a[2]*b[3] - a[3]*b[2],
		a[0]*b[2] - a[1]*b[3] + a[2]*b[0] + a[3]*b[1],
		a[0]*b[3] + a[1]*b[2] - a[2]*b[1] + a[3]*b[0],
	}
}

// Compose returns the Hamilton product.
func (a Quat) Compose(b Quat) Quat { return b.Mul(a) } // want `Quat.Compose computes the product of Shuster \(ij = -k\); its comment says Hamilton \(ij = k\)`

// Conj is the reverse.
func (a Quat) Conj() Quat { return Quat{a[0], -a[1], -a[2], -a[3]} }

// Rotate is an active rotation.
func (a Quat) Rotate(v Vec) Vec {
	r := a.Mul(Quat{0, v.X, v.Y, v.Z}).Mul(a.Conj())
	return Vec{r[1], r[2], r[3]}
}

// RotatePassively is an active rotation, it says.
func (a Quat) RotatePassively(v Vec) Vec { return a.Conj().Rotate(v) } // want `its comment says active`

// Mul is the product.
func (a Other) Mul(b Other) Other {
	return Other{
		a[3]*b[0] + a[0]*b[3] + a[1]*b[2] - a[2]*b[1],
		a[3]*b[1] - a[0]*b[2] + a[1]*b[3] + a[2]*b[0],
		a[3]*b[2] + a[0]*b[1] - a[1]*b[0] + a[2]*b[3],
		a[3]*b[3] - a[0]*b[0] - a[1]*b[1] - a[2]*b[2],
	}
}

// Conj is the reverse.
func (a Other) Conj() Other { return Other{-a[0], -a[1], -a[2], a[3]} }

// Rotate turns a vector.
func (a Other) Rotate(v Vec) Vec {
	r := a.Mul(Other{v.X, v.Y, v.Z, 0}).Mul(a.Conj())
	return Vec{r[0], r[1], r[2]}
}

func about(axis int, angle float64) Quat {
	s, c := math.Sincos(angle / 2)
	q := Quat{c}
	q[axis+1] = s
	return q
}

// FromZYX turns about z, then the new y, then the new x: intrinsic z-y-x.
func FromZYX(a, b, c float64) Quat { return about(2, a).Mul(about(1, b)).Mul(about(0, c)) }

// FromFixed turns about the fixed axes z-y-x.
func FromFixed(a, b, c float64) Quat { return about(2, a).Mul(about(1, b)).Mul(about(0, c)) } // want `FromFixed computes z-y'-x'' \(moving axes\); its comment says .*x are at least|deg apart`

// FromXYZ may mean fixed axes, which it computes.
func FromXYZ(x, y, z float64) Quat { return about(2, z).Mul(about(1, y)).Mul(about(0, x)) }

// EulerXZY is about other axes than its name says.
func EulerXZY(a, b, c float64) Quat { return about(1, a).Mul(about(2, b)).Mul(about(1, c)) } // want `EulerXZY computes y-z'-y''`

// RollPitchYaw is by the custom of aircraft.
func RollPitchYaw(roll, pitch, yaw float64) Quat {
	return about(2, yaw).Mul(about(1, pitch)).Mul(about(0, roll))
}

// Camera is by the custom of computer graphics.
func Camera(yaw, pitch, roll float64) Quat {
	return about(1, yaw).Mul(about(0, pitch)).Mul(about(2, roll))
}

// Attitude has two angles exchanged.
func Attitude(roll, pitch, yaw float64) Quat { // want `Attitude computes turns by roll about y, pitch about x, yaw about z; its parameters say roll, pitch, yaw`
	return about(2, yaw).Mul(about(1, roll)).Mul(about(0, pitch))
}

// Degrees takes radians in spite of its parameters.
func Degrees(rollDeg, pitchDeg, yawDeg float64) Quat { // want `Degrees computes with angles in radians; its name says degrees`
	return about(2, yawDeg).Mul(about(1, pitchDeg)).Mul(about(0, rollDeg))
}

// AboutX returns a rotation by an angle in degrees.
func AboutX(a float64) Quat { return about(0, a) } // want `AboutX computes with angles in radians; its comment says degrees`

// Plus adds.
func (a Quat) Plus(b Quat) Quat { return Quat{a[0] + b[0], a[1] + b[1], a[2] + b[2], a[3] + b[3]} }

// Inverse undoes a rotation.
func (a Quat) Inverse() Quat { return a.Conj() } // want `Quat.Inverse computes the conjugate; its name says inverse; that is the inverse at norm one only, and Quat.Plus makes`

// Inv undoes the rotation of a unit quaternion.
func (a Quat) Inv() Quat { return a.Conj() }

// Inverse undoes a rotation; nothing here makes one that is not of unit norm.
func (a Other) Inverse() Other { return a.Conj() }

// Slerp takes a short cut.
func Slerp(a, b Quat, t float64) Quat { // want `Slerp computes the normalised linear interpolation; its name says spherical interpolation`
	d := 1.0
	if a[0]*b[0]+a[1]*b[1]+a[2]*b[2]+a[3]*b[3] < 0 {
		d = -1
	}
	n := 0.0
	var r Quat
	for i := range r {
		r[i] = (1-t)*a[i] + t*d*b[i]
		n += r[i] * r[i]
	}
	for i := range r {
		r[i] /= math.Sqrt(n)
	}
	return r
}
