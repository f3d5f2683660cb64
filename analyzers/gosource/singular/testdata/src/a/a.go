package a

import "math"

type Quat struct{ W, X, Y, Z float64 }

// Mul makes it known where the scalar stands.
func (a Quat) Mul(b Quat) Quat {
	return Quat{
		W: a.W*b.W - a.X*b.X - a.Y*b.Y - a.Z*b.Z,
		X: a.W*b.X + a.X*b.W + a.Y*b.Z - a.Z*b.Y,
		Y: a.W*b.Y - a.X*b.Z + a.Y*b.W + a.Z*b.X,
		Z: a.W*b.Z + a.X*b.Y - a.Y*b.X + a.Z*b.W,
	}
}

// Euler takes the arc sine as it comes.
func (q Quat) Euler() (roll, pitch, yaw float64) { // want `singular-point: Quat.Euler computes the angles of a rotation, .*90 deg about y.*gives.* NaN`
	roll = math.Atan2(2*(q.W*q.X+q.Y*q.Z), 1-2*(q.X*q.X+q.Y*q.Y))
	pitch = math.Asin(2 * (q.W*q.Y - q.Z*q.X))
	yaw = math.Atan2(2*(q.W*q.Z+q.X*q.Y), 1-2*(q.Y*q.Y+q.Z*q.Z))
	return
}

// Clamped is wrong at gimbal lock in another way: both arc tangents are of nothing.
func (q Quat) Clamped() (roll, pitch, yaw float64) { // want `singular-point: Quat.Clamped computes the angles of a rotation, .* off by`
	roll = math.Atan2(2*(q.W*q.X+q.Y*q.Z), 1-2*(q.X*q.X+q.Y*q.Y))
	pitch = math.Asin(math.Max(-1, math.Min(1, 2*(q.W*q.Y-q.Z*q.X))))
	yaw = math.Atan2(2*(q.W*q.Z+q.X*q.Y), 1-2*(q.Y*q.Y+q.Z*q.Z))
	return
}

// Locked treats gimbal lock apart.
func (q Quat) Locked() (roll, pitch, yaw float64) {
	s := 2 * (q.W*q.Y - q.Z*q.X)
	if math.Abs(s) > 1-1e-9 {
		return 0, math.Copysign(math.Pi/2, s), -2 * math.Copysign(1, s) * math.Atan2(q.X, q.W)
	}
	roll = math.Atan2(2*(q.W*q.X+q.Y*q.Z), 1-2*(q.X*q.X+q.Y*q.Y))
	pitch = math.Asin(s)
	yaw = math.Atan2(2*(q.W*q.Z+q.X*q.Y), 1-2*(q.Y*q.Y+q.Z*q.Z))
	return
}

// RotationVector divides by the sine of half the angle.
func (q Quat) RotationVector() [3]float64 { // want `singular-point: Quat.RotationVector computes the rotation vector.*identity, it gives NaN`
	s := math.Sqrt(q.X*q.X + q.Y*q.Y + q.Z*q.Z)
	f := 2 * math.Atan2(s, q.W) / s
	return [3]float64{f * q.X, f * q.Y, f * q.Z}
}

// RotVec does not.
func (q Quat) RotVec() [3]float64 {
	s := math.Sqrt(q.X*q.X + q.Y*q.Y + q.Z*q.Z)
	f := 2.0
	if s > 1e-12 {
		f = 2 * math.Atan2(s, q.W) / s
	}
	return [3]float64{f * q.X, f * q.Y, f * q.Z}
}

// FromMatrix knows all four branches.
func FromMatrix(m [3][3]float64) Quat {
	switch t := m[0][0] + m[1][1] + m[2][2]; {
	case t > 0:
		s := 2 * math.Sqrt(t+1)
		return Quat{s / 4, (m[2][1] - m[1][2]) / s, (m[0][2] - m[2][0]) / s, (m[1][0] - m[0][1]) / s}
	case m[0][0] > m[1][1] && m[0][0] > m[2][2]:
		s := 2 * math.Sqrt(1+m[0][0]-m[1][1]-m[2][2])
		return Quat{(m[2][1] - m[1][2]) / s, s / 4, (m[0][1] + m[1][0]) / s, (m[0][2] + m[2][0]) / s}
	case m[1][1] > m[2][2]:
		s := 2 * math.Sqrt(1+m[1][1]-m[0][0]-m[2][2])
		return Quat{(m[0][2] - m[2][0]) / s, (m[0][1] + m[1][0]) / s, s / 4, (m[1][2] + m[2][1]) / s}
	default:
		s := 2 * math.Sqrt(1+m[2][2]-m[0][0]-m[1][1])
		return Quat{(m[1][0] - m[0][1]) / s, (m[0][2] + m[2][0]) / s, (m[1][2] + m[2][1]) / s, s / 4}
	}
}

// FromTrace knows one: it fails for half turns.
func FromTrace(m [3][3]float64) Quat { // want `singular-point: FromTrace computes the quaternion of a matrix`
	w := math.Sqrt(1+m[0][0]+m[1][1]+m[2][2]) / 2
	return Quat{w, (m[2][1] - m[1][2]) / (4 * w), (m[0][2] - m[2][0]) / (4 * w), (m[1][0] - m[0][1]) / (4 * w)}
}

// Slerp divides by the sine of an angle that may be nothing.
func Slerp(a, b Quat, t float64) Quat { // want `singular-point: Slerp computes the spherical interpolation.* both equal, it gives NaN`
	d := a.W*b.W + a.X*b.X + a.Y*b.Y + a.Z*b.Z
	if d < 0 {
		b, d = Quat{-b.W, -b.X, -b.Y, -b.Z}, -d
	}
	angle := math.Acos(d)
	s := math.Sin(angle)
	f, g := math.Sin((1-t)*angle)/s, math.Sin(t*angle)/s
	return Quat{f*a.W + g*b.W, f*a.X + g*b.X, f*a.Y + g*b.Y, f*a.Z + g*b.Z}
}

// Unit of zero is none of the caller's rotations.
func (q Quat) Unit() Quat {
	n := math.Sqrt(q.W*q.W + q.X*q.X + q.Y*q.Y + q.Z*q.Z)
	return Quat{q.W / n, q.X / n, q.Y / n, q.Z / n}
}
