package rotor_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/num/quat"
	"gonum.org/v1/gonum/spatial/r3"

	"dextral/core/rotor"
)

// Each benchmark runs dextral beside gonum and beside code as it is written in
// graphics libraries (below, from memory), on the same inputs in one run:
//
//	go test -run - -bench . -benchmem -count 10 ./core/rotor ./core/matrix

const benchSize = 256 // fits the cache; a power of two

type benchData struct {
	r, q     [benchSize]rotor.Rotor
	gr, gq   [benchSize]quat.Number
	mr, mq   [benchSize]plainQuat
	v        [benchSize]rotor.Vec
	gv       [benchSize]r3.Vec
	mv       [benchSize]plainVec
	b        [benchSize]rotor.Bivector
	gb       [benchSize]quat.Number
	t        [benchSize]float64
	outR     [benchSize]rotor.Rotor
	outG     [benchSize]quat.Number
	outM     [benchSize]plainQuat
	outV     [benchSize]rotor.Vec
	outGV    [benchSize]r3.Vec
	outMV    [benchSize]plainVec
	outB     [benchSize]rotor.Bivector
	outAngle [benchSize]float64
}

func newBenchData() *benchData {
	rng := source()
	var d benchData
	for i := range benchSize {
		d.r[i], d.q[i] = randomRotor(rng), randomRotor(rng)
		d.gr[i], d.gq[i] = toGonum(d.r[i]), toGonum(d.q[i])
		d.mr[i], d.mq[i] = toPlain(d.r[i]), toPlain(d.q[i])
		d.v[i] = randomVec(rng)
		d.gv[i], d.mv[i] = r3.Vec(d.v[i]), plainVec{d.v[i].X, d.v[i].Y, d.v[i].Z}
		d.b[i] = randomVec(rng).Plane()
		d.gb[i] = quat.Number{Imag: -d.b[i].E23, Jmag: -d.b[i].E31, Kmag: -d.b[i].E12}
		d.t[i] = rng.Float64()
	}
	return &d
}

func BenchmarkProduct(b *testing.B) {
	d := newBenchData()
	b.Run("dextral", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			d.outR[k] = d.r[k].Mul(d.q[k])
		}
	})
	b.Run("gonum", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			d.outG[k] = quat.Mul(d.gr[k], d.gq[k])
		}
	})
	b.Run("plain", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			d.outM[k] = d.mr[k].mul(d.mq[k])
		}
	})
}

func BenchmarkRotate(b *testing.B) {
	d := newBenchData()
	b.Run("dextral", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			d.outV[k] = d.r[k].Rotate(d.v[k])
		}
	})
	b.Run("gonum", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			d.outGV[k] = r3.Rotation(d.gr[k]).Rotate(d.gv[k])
		}
	})
	b.Run("plain", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			d.outMV[k] = d.mr[k].rotate(d.mv[k])
		}
	})
}

func BenchmarkExp(b *testing.B) {
	d := newBenchData()
	b.Run("dextral", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			d.outR[k] = rotor.Exp(d.b[k])
		}
	})
	b.Run("gonum", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			d.outG[k] = quat.Exp(d.gb[k])
		}
	})
}

func BenchmarkLog(b *testing.B) {
	d := newBenchData()
	b.Run("dextral", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			d.outB[k] = d.r[k].Log()
		}
	})
	b.Run("gonum", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			d.outG[k] = quat.Log(d.gr[k])
		}
	})
}

func BenchmarkSlerp(b *testing.B) {
	d := newBenchData()
	b.Run("dextral", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			d.outR[k] = rotor.Slerp(d.r[k], d.q[k], d.t[k])
		}
	})
	b.Run("gonum", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			d.outG[k] = quat.Mul(d.gr[k], quat.PowReal(quat.Mul(quat.Conj(d.gr[k]), d.gq[k]), d.t[k]))
		}
	})
	b.Run("plain", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			d.outM[k] = d.mr[k].slerp(d.mq[k], d.t[k])
		}
	})
}

func BenchmarkAngle(b *testing.B) {
	d := newBenchData()
	b.Run("dextral", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			d.outAngle[k] = rotor.Angle(d.r[k], d.q[k])
		}
	})
	b.Run("plain", func(b *testing.B) {
		for i := 0; i < b.N; i++ {
			k := i % benchSize
			d.outAngle[k] = d.mr[k].angle(d.mq[k])
		}
	})
}

func toGonum(r rotor.Rotor) quat.Number {
	w, x, y, z := r.Quaternion()
	return quat.Number{Real: w, Imag: x, Jmag: y, Kmag: z}
}

// plainVec and plainQuat are vectors and quaternions as graphics libraries
// write them: arrays, small methods, the scalar beside the vector.
type plainVec [3]float64

func (a plainVec) add(b plainVec) plainVec { return plainVec{a[0] + b[0], a[1] + b[1], a[2] + b[2]} }
func (a plainVec) mul(c float64) plainVec  { return plainVec{a[0] * c, a[1] * c, a[2] * c} }
func (a plainVec) dot(b plainVec) float64  { return a[0]*b[0] + a[1]*b[1] + a[2]*b[2] }
func (a plainVec) cross(b plainVec) plainVec {
	return plainVec{a[1]*b[2] - a[2]*b[1], a[2]*b[0] - a[0]*b[2], a[0]*b[1] - a[1]*b[0]}
}

type plainQuat struct {
	w float64
	v plainVec
}

func toPlain(r rotor.Rotor) plainQuat {
	w, x, y, z := r.Quaternion()
	return plainQuat{w, plainVec{x, y, z}}
}

func (p plainQuat) mul(q plainQuat) plainQuat {
	return plainQuat{p.w*q.w - p.v.dot(q.v), p.v.cross(q.v).add(q.v.mul(p.w)).add(p.v.mul(q.w))}
}

func (p plainQuat) rotate(v plainVec) plainVec {
	c := p.v.cross(v)
	return v.add(c.mul(2 * p.w)).add(p.v.mul(2).cross(c))
}

func (p plainQuat) dot(q plainQuat) float64 { return p.w*q.w + p.v.dot(q.v) }

func (p plainQuat) scale(c float64) plainQuat { return plainQuat{p.w * c, p.v.mul(c)} }

func (p plainQuat) add(q plainQuat) plainQuat { return plainQuat{p.w + q.w, p.v.add(q.v)} }

func (p plainQuat) slerp(q plainQuat, t float64) plainQuat {
	cos := p.dot(q)
	if cos < 0 {
		q, cos = q.scale(-1), -cos
	}
	if cos > 0.9995 {
		s := p.scale(1 - t).add(q.scale(t))
		return s.scale(1 / math.Sqrt(s.dot(s)))
	}
	a := math.Acos(cos)
	sin := math.Sin(a)
	return p.scale(math.Sin((1-t)*a) / sin).add(q.scale(math.Sin(t*a) / sin))
}

func (p plainQuat) angle(q plainQuat) float64 { return 2 * math.Acos(math.Abs(p.dot(q))) }
