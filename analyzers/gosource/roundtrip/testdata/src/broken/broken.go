package broken

import "math"

// Quat is a unit quaternion.
type Quat struct{ W, X, Y, Z float64 }

// Mul composes.
func (a Quat) Mul(b Quat) Quat {
	return Quat{
		a.W*b.W - a.X*b.X - a.Y*b.Y - a.Z*b.Z,
		a.W*b.X + a.X*b.W + a.Y*b.Z - a.Z*b.Y,
		a.W*b.Y - a.X*b.Z + a.Y*b.W + a.Z*b.X,
		a.W*b.Z + a.X*b.Y - a.Y*b.X + a.Z*b.W,
	}
}

// Matrix turns vectors as q does.
func (q Quat) Matrix() [3][3]float64 {
	return [3][3]float64{
		{1 - 2*(q.Y*q.Y+q.Z*q.Z), 2 * (q.X*q.Y - q.W*q.Z), 2 * (q.X*q.Z + q.W*q.Y)},
		{2 * (q.X*q.Y + q.W*q.Z), 1 - 2*(q.X*q.X+q.Z*q.Z), 2 * (q.Y*q.Z - q.W*q.X)},
		{2 * (q.X*q.Z - q.W*q.Y), 2 * (q.Y*q.Z + q.W*q.X), 1 - 2*(q.X*q.X+q.Y*q.Y)},
	}
}

// FromMatrix takes the largest component first.
func FromMatrix(m [3][3]float64) Quat { // want `round-trip-broken: FromMatrix does not undo Quat.Matrix: .* passive`
	a, b, c := m[1][2]-m[2][1], m[2][0]-m[0][2], m[0][1]-m[1][0]
	q := Quat{
		math.Sqrt(math.Max(0, 1+m[0][0]+m[1][1]+m[2][2])) / 2,
		math.Copysign(math.Sqrt(math.Max(0, 1+m[0][0]-m[1][1]-m[2][2]))/2, a),
		math.Copysign(math.Sqrt(math.Max(0, 1-m[0][0]+m[1][1]-m[2][2]))/2, b),
		math.Copysign(math.Sqrt(math.Max(0, 1-m[0][0]-m[1][1]+m[2][2]))/2, c),
	}
	return q
}

// FromEuler makes roll, pitch and yaw into a rotation.
func FromEuler(roll, pitch, yaw float64) Quat {
	x := Quat{W: math.Cos(roll / 2), X: math.Sin(roll / 2)}
	y := Quat{W: math.Cos(pitch / 2), Y: math.Sin(pitch / 2)}
	z := Quat{W: math.Cos(yaw / 2), Z: math.Sin(yaw / 2)}
	return x.Mul(y).Mul(z)
}

// Euler returns roll, pitch and yaw.
func (q Quat) Euler() (roll, pitch, yaw float64) { // want `round-trip-broken: Quat.Euler does not undo FromEuler: .* deg away; Quat.Euler computes the angles of a rotation, x-y-z .fixed axes..*, and FromEuler the rotation of angles, x-y'-z''`
	roll = math.Atan2(2*(q.W*q.X+q.Y*q.Z), 1-2*(q.X*q.X+q.Y*q.Y))
	pitch = math.Asin(math.Max(-1, math.Min(1, 2*(q.W*q.Y-q.Z*q.X))))
	yaw = math.Atan2(2*(q.W*q.Z+q.X*q.Y), 1-2*(q.Y*q.Y+q.Z*q.Z))
	return
}
