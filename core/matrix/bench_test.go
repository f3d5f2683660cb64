package matrix_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/num/quat"
	"gonum.org/v1/gonum/spatial/r3"

	"dextral/core/matrix"
	"dextral/core/rotor"
)

// As in package rotor, each benchmark runs dextral beside gonum, where gonum
// has the operation, and beside code as graphics libraries write it:
//
//	go test -run - -bench . -benchmem -count 10 ./core/rotor ./core/matrix

const benchSize = 256 // fits the cache; a power of two

func BenchmarkToMatrix(b *testing.B) {
	rng := source()
	var (
		r   [benchSize]rotor.Rotor
		g   [benchSize]r3.Rotation
		out [benchSize]matrix.Mat3
		pl  [benchSize]plainMat
		gm  [benchSize]*r3.Mat
	)
	for i := range r {
		r[i] = randomRotor(rng)
		w, x, y, z := r[i].Quaternion()
		g[i] = r3.Rotation(quat.Number{Real: w, Imag: x, Jmag: y, Kmag: z})
	}
	b.Run("dextral", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			out[k] = matrix.FromRotor(r[k])
		}
	})
	b.Run("gonum", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			gm[k] = g[k].Mat()
		}
	})
	b.Run("plain", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			pl[k] = plainFromQuaternion(quat.Number(g[k]))
		}
	})
}

func BenchmarkFromMatrix(b *testing.B) {
	rng := source()
	var (
		m   [benchSize]matrix.Mat3
		p   [benchSize]plainMat
		out [benchSize]rotor.Rotor
		q   [benchSize]quat.Number
	)
	for i := range m {
		m[i] = matrix.FromRotor(randomRotor(rng))
		p[i] = toPlain(m[i])
	}
	b.Run("dextral", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			out[k] = m[k].Rotor()
		}
	})
	b.Run("plain", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			q[k] = p[k].quaternion()
		}
	})
}

func BenchmarkMatrixProduct(b *testing.B) {
	rng := source()
	var (
		m, out [benchSize]matrix.Mat3
		g, gm  [benchSize]*r3.Mat
		p, pl  [benchSize]plainMat
	)
	for i := range m {
		m[i] = matrix.FromRotor(randomRotor(rng))
		p[i] = toPlain(m[i])
		g[i], gm[i] = r3.NewMat(p[i].transpose().slice()), r3.NewMat(nil)
	}
	b.Run("dextral", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			out[k] = m[k].Mul(m[benchSize-1-k])
		}
	})
	b.Run("gonum", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			gm[k].Mul(g[k], g[benchSize-1-k])
		}
	})
	b.Run("plain", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			pl[k] = p[k].mul(p[benchSize-1-k])
		}
	})
}

// BenchmarkApply: gonum's MulVec works on a pointer. A matrix that is a value is
// copied, 72 bytes, which costs as much as the nine multiplications.
func BenchmarkApply(b *testing.B) {
	rng := source()
	var (
		m      [benchSize]matrix.Mat3
		g      [benchSize]*r3.Mat
		p      [benchSize]plainMat
		v, out [benchSize]rotor.Vec
		gv     [benchSize]r3.Vec
		pv     [benchSize][3]float64
	)
	for i := range m {
		m[i] = matrix.FromRotor(randomRotor(rng))
		p[i] = toPlain(m[i])
		g[i] = r3.NewMat(p[i].transpose().slice())
		v[i] = randomVec(rng)
	}
	b.Run("dextral", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			out[k] = m[k].Apply(v[k])
		}
	})
	b.Run("gonum", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			gv[k] = g[k].MulVec(r3.Vec(v[k]))
		}
	})
	b.Run("plain", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			pv[k] = p[k].apply([3]float64{v[k].X, v[k].Y, v[k].Z})
		}
	})
}

// BenchmarkNearest has no peer at hand that is as general; it is here to be
// known.
func BenchmarkNearest(b *testing.B) {
	rng := source()
	var m [benchSize]matrix.Mat3
	for i := range m {
		m[i] = noisy(rng, matrix.FromRotor(randomRotor(rng)), 0.01)
	}
	b.ResetTimer()
	for i := 0; i < b.N; i++ {
		matrix.Nearest(m[i%benchSize])
	}
}

// plainMat is a matrix as graphics libraries store it, column by column.
type plainMat [9]float64

func toPlain(m matrix.Mat3) plainMat {
	return plainMat{m[0][0], m[1][0], m[2][0], m[0][1], m[1][1], m[2][1], m[0][2], m[1][2], m[2][2]}
}

func (a plainMat) slice() []float64 { return a[:] }

func (a plainMat) transpose() plainMat {
	return plainMat{a[0], a[3], a[6], a[1], a[4], a[7], a[2], a[5], a[8]}
}

func (a plainMat) mul(b plainMat) plainMat {
	return plainMat{
		a[0]*b[0] + a[3]*b[1] + a[6]*b[2], a[1]*b[0] + a[4]*b[1] + a[7]*b[2], a[2]*b[0] + a[5]*b[1] + a[8]*b[2],
		a[0]*b[3] + a[3]*b[4] + a[6]*b[5], a[1]*b[3] + a[4]*b[4] + a[7]*b[5], a[2]*b[3] + a[5]*b[4] + a[8]*b[5],
		a[0]*b[6] + a[3]*b[7] + a[6]*b[8], a[1]*b[6] + a[4]*b[7] + a[7]*b[8], a[2]*b[6] + a[5]*b[7] + a[8]*b[8],
	}
}

func (a plainMat) apply(v [3]float64) [3]float64 {
	return [3]float64{a[0]*v[0] + a[3]*v[1] + a[6]*v[2], a[1]*v[0] + a[4]*v[1] + a[7]*v[2], a[2]*v[0] + a[5]*v[1] + a[8]*v[2]}
}

func plainFromQuaternion(q quat.Number) plainMat {
	w, x, y, z := q.Real, q.Imag, q.Jmag, q.Kmag
	return plainMat{
		1 - 2*y*y - 2*z*z, 2*x*y + 2*w*z, 2*x*z - 2*w*y,
		2*x*y - 2*w*z, 1 - 2*x*x - 2*z*z, 2*y*z + 2*w*x,
		2*x*z + 2*w*y, 2*y*z - 2*w*x, 1 - 2*x*x - 2*y*y,
	}
}

func (a plainMat) quaternion() quat.Number {
	switch trace := a[0] + a[4] + a[8]; {
	case trace > 0:
		s := 0.5 / math.Sqrt(trace+1)
		return quat.Number{Real: 0.25 / s, Imag: (a[5] - a[7]) * s, Jmag: (a[6] - a[2]) * s, Kmag: (a[1] - a[3]) * s}
	case a[0] > a[4] && a[0] > a[8]:
		s := 2 * math.Sqrt(1+a[0]-a[4]-a[8])
		return quat.Number{Real: (a[5] - a[7]) / s, Imag: 0.25 * s, Jmag: (a[3] + a[1]) / s, Kmag: (a[6] + a[2]) / s}
	case a[4] > a[8]:
		s := 2 * math.Sqrt(1+a[4]-a[0]-a[8])
		return quat.Number{Real: (a[6] - a[2]) / s, Imag: (a[3] + a[1]) / s, Jmag: 0.25 * s, Kmag: (a[7] + a[5]) / s}
	default:
		s := 2 * math.Sqrt(1+a[8]-a[0]-a[4])
		return quat.Number{Real: (a[1] - a[3]) / s, Imag: (a[6] + a[2]) / s, Jmag: (a[7] + a[5]) / s, Kmag: 0.25 * s}
	}
}
