// Package a maps vectors and quaternions between frames.
package a

// V is a vector.
type V struct{ X, Y, Z float64 }

// Quaternion is a unit quaternion.
type Quaternion struct{ W, X, Y, Z float64 }

// Mul is Hamilton's product.
func (a Quaternion) Mul(b Quaternion) Quaternion {
	return Quaternion{
		W: a.W*b.W - a.X*b.X - a.Y*b.Y - a.Z*b.Z,
		X: a.W*b.X + a.X*b.W + a.Y*b.Z - a.Z*b.Y,
		Y: a.W*b.Y - a.X*b.Z + a.Y*b.W + a.Z*b.X,
		Z: a.W*b.Z + a.X*b.Y - a.Y*b.X + a.Z*b.W,
	}
}

func NEDToENU(v V) V { return V{v.Y, v.X, -v.Z} }

func enuFromNED(v V) V { return V{v.Y, v.X, v.Z} } // want `enuFromNED maps \(x, y, z\) to \(y, x, z\), which has determinant -1`

func FRDToFLU(v V) V { return V{v.X, -v.Y, -v.Z} }

func frd2flu(v V) V { return V{-v.X, -v.Y, v.Z} } // want `function-mislabelled: frd2flu maps \(x, y, z\) to \(-x, -y, z\); between the frames of its name the map is \(x, y, z\) to \(x, -y, -z\)`

func RotateQuarter(v V) V { return V{-v.Y, -v.X, v.Z} } // want `it mirrors, and is called a rotation`

func QuarterTurn(v V) V { return V{-v.Y, v.X, v.Z} }

func Flip(v V) V { return V{v.X, v.Y, -v.Z} } // nobody calls it a rotation

// A mirror turns the sense of a rotation over once more: two signs change.
func ToLeftHanded(q Quaternion) Quaternion { return Quaternion{q.W, -q.X, -q.Y, q.Z} }

func ToLeft(q Quaternion) Quaternion { return Quaternion{q.W, q.X, q.Y, -q.Z} } // want `ToLeft maps the vector part of a quaternion, \(x, y, z\) to \(x, y, -z\), with determinant -1`

func NEDToENUQuat(q Quaternion) Quaternion { return Quaternion{q.W, q.Y, q.X, q.Z} } // want `a change of axes between the frames of its name, mirrored or not, has \+1`

func Conj(q Quaternion) Quaternion { return Quaternion{q.W, -q.X, -q.Y, -q.Z} }

// RGBA is a colour.
type RGBA struct{ R, G, B, A float64 }

func (c RGBA) Negative() RGBA { return RGBA{-c.R, c.G, c.B, c.A} }
