package b

// Quat is a rotation.
type Quat struct{ W, X, Y, Z float64 }

// Rotate turns a vector.
func (q Quat) Rotate(v [3]float64) [3]float64 {
	x, y, z := q.W*v[0]+q.Y*v[2]-q.Z*v[1], q.W*v[1]+q.Z*v[0]-q.X*v[2], q.W*v[2]+q.X*v[1]-q.Y*v[0]
	return [3]float64{v[0] + 2*(q.Y*z-q.Z*y), v[1] + 2*(q.Z*x-q.X*z), v[2] + 2*(q.X*y-q.Y*x)}
}

// Mat is a rotation matrix, row by row.
type Mat [3][3]float64

// Apply turns a vector.
func (m Mat) Apply(v [3]float64) [3]float64 {
	return [3]float64{
		m[0][0]*v[0] + m[0][1]*v[1] + m[0][2]*v[2],
		m[1][0]*v[0] + m[1][1]*v[1] + m[1][2]*v[2],
		m[2][0]*v[0] + m[2][1]*v[1] + m[2][2]*v[2],
	}
}

// Matrix is the matrix of q.
func (q Quat) Matrix() Mat {
	return Mat{
		{1 - 2*(q.Y*q.Y+q.Z*q.Z), 2 * (q.X*q.Y - q.W*q.Z), 2 * (q.X*q.Z + q.W*q.Y)},
		{2 * (q.X*q.Y + q.W*q.Z), 1 - 2*(q.X*q.X+q.Z*q.Z), 2 * (q.Y*q.Z - q.W*q.X)},
		{2 * (q.X*q.Z - q.W*q.Y), 2 * (q.Y*q.Z + q.W*q.X), 1 - 2*(q.X*q.X+q.Y*q.Y)},
	}
}

// Mul composes two rotations.
func (a Quat) Mul(b Quat) Quat {
	return Quat{
		a.W*b.W - a.X*b.X - a.Y*b.Y - a.Z*b.Z,
		a.W*b.X + a.X*b.W + a.Y*b.Z - a.Z*b.Y,
		a.W*b.Y - a.X*b.Z + a.Y*b.W + a.Z*b.X,
		a.W*b.Z + a.X*b.Y - a.Y*b.X + a.Z*b.W,
	}
}

// Mul composes in the other order than quaternions do.
func (m Mat) Mul(n Mat) Mat {
	var p Mat
	for i := range 3 {
		for j := range 3 {
			p[i][j] = n[i][0]*m[0][j] + n[i][1]*m[1][j] + n[i][2]*m[2][j]
		}
	}
	return p
}
