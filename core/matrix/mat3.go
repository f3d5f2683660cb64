package matrix

import (
	"math"

	"dextral/core/convention"
	"dextral/core/rotor"
)

// Mat3 is a 3x3 matrix, M[row][column], that acts on column vectors.
type Mat3 [3][3]float64

// Identity is the matrix that maps every vector to itself.
var Identity = Mat3{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}}

// FromFlat fills a matrix with nine numbers in the given storage order. It
// reports false when there are not nine or the order is unstated.
func FromFlat(nine []float64, order convention.Storage) (Mat3, bool) {
	if len(nine) != 9 || order == convention.StorageUnstated {
		return Mat3{}, false
	}
	var m Mat3
	for i, x := range nine {
		m[i/3][i%3] = x
	}
	if order == convention.ColumnMajor {
		m = m.Transpose()
	}
	return m, true
}

// FromColumns returns the matrix with the given columns: the images of e1, e2
// and e3.
func FromColumns(x, y, z rotor.Vec) Mat3 {
	return Mat3{{x.X, y.X, z.X}, {x.Y, y.Y, z.Y}, {x.Z, y.Z, z.Z}}
}

// Mul returns the matrix product m n: n first, m second.
func (m Mat3) Mul(n Mat3) (p Mat3) {
	mul(&p, &m, &n)
	return p
}

// mul takes pointers, as the other functions behind methods in this package do:
// so the method is short enough to be inlined, and matrices are not copied from
// call to call.
func mul(p, m, n *Mat3) {
	for i := range p {
		x, y, z := m[i][0], m[i][1], m[i][2]
		p[i][0] = x*n[0][0] + y*n[1][0] + z*n[2][0]
		p[i][1] = x*n[0][1] + y*n[1][1] + z*n[2][1]
		p[i][2] = x*n[0][2] + y*n[1][2] + z*n[2][2]
	}
}

// Sub returns m - n.
func (m Mat3) Sub(n Mat3) Mat3 {
	for i := range 3 {
		for j := range 3 {
			m[i][j] -= n[i][j]
		}
	}
	return m
}

// Scale returns s m.
func (m Mat3) Scale(s float64) Mat3 {
	for i := range 3 {
		for j := range 3 {
			m[i][j] *= s
		}
	}
	return m
}

// Transpose returns m with rows and columns exchanged.
func (m Mat3) Transpose() Mat3 {
	return Mat3{{m[0][0], m[1][0], m[2][0]}, {m[0][1], m[1][1], m[2][1]}, {m[0][2], m[1][2], m[2][2]}}
}

// Det returns the determinant: the volume, with its sign, of the images of e1,
// e2 and e3.
func (m Mat3) Det() float64 { return m.Column(0).Dot(m.Column(1).Cross(m.Column(2))) }

// Trace returns the sum of the diagonal: 1 + 2 cos a of a rotation by angle a.
func (m Mat3) Trace() float64 { return m[0][0] + m[1][1] + m[2][2] }

// Apply returns m v.
func (m Mat3) Apply(v rotor.Vec) rotor.Vec { return apply(&m, v) }

func apply(m *Mat3, v rotor.Vec) rotor.Vec {
	return rotor.Vec{
		X: m[0][0]*v.X + m[0][1]*v.Y + m[0][2]*v.Z,
		Y: m[1][0]*v.X + m[1][1]*v.Y + m[1][2]*v.Z,
		Z: m[2][0]*v.X + m[2][1]*v.Y + m[2][2]*v.Z,
	}
}

// Row returns row i.
func (m Mat3) Row(i int) rotor.Vec { return rotor.Vec{X: m[i][0], Y: m[i][1], Z: m[i][2]} }

// Column returns column j, the image of basis vector j.
func (m Mat3) Column(j int) rotor.Vec { return rotor.Vec{X: m[0][j], Y: m[1][j], Z: m[2][j]} }

// Finite reports whether no element is NaN or infinite.
func (m Mat3) Finite() bool { return m.Row(0).Finite() && m.Row(1).Finite() && m.Row(2).Finite() }

// Norm returns the Frobenius norm: the root of the sum of the squares of the
// elements.
func (m Mat3) Norm() float64 {
	return math.Hypot(math.Hypot(m.Row(0).Norm(), m.Row(1).Norm()), m.Row(2).Norm())
}
