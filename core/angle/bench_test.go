package angle

import (
	"math"
	"math/rand/v2"
	"testing"
	"time"

	"dextral/core/rotor"
)

// Straightforward code for any order of moving axes, in the style of graphics
// libraries: half-angle products by order one way, elements of the matrix by order
// the other. Three of the orders are enough to keep the switch.
type plainQuat struct {
	W float64
	V [3]float64
}

type plainOrder int

const (
	plainXYZ plainOrder = iota
	plainZXY
	plainZYX
)

func plainQuaternion(a1, a2, a3 float64, order plainOrder) plainQuat {
	var s, c [3]float64
	s[0], c[0] = math.Sincos(a1 / 2)
	s[1], c[1] = math.Sincos(a2 / 2)
	s[2], c[2] = math.Sincos(a3 / 2)
	q := plainQuat{}
	switch order {
	case plainXYZ:
		q.W = c[0]*c[1]*c[2] - s[0]*s[1]*s[2]
		q.V[0] = s[0]*c[1]*c[2] + c[0]*s[1]*s[2]
		q.V[1] = c[0]*s[1]*c[2] - s[0]*c[1]*s[2]
		q.V[2] = c[0]*c[1]*s[2] + s[0]*s[1]*c[2]
	case plainZXY:
		q.W = c[0]*c[1]*c[2] - s[0]*s[1]*s[2]
		q.V[0] = c[0]*s[1]*c[2] - s[0]*c[1]*s[2]
		q.V[1] = c[0]*c[1]*s[2] + s[0]*s[1]*c[2]
		q.V[2] = s[0]*c[1]*c[2] + c[0]*s[1]*s[2]
	case plainZYX:
		q.W = c[0]*c[1]*c[2] + s[0]*s[1]*s[2]
		q.V[0] = c[0]*c[1]*s[2] - s[0]*s[1]*c[2]
		q.V[1] = c[0]*s[1]*c[2] + s[0]*c[1]*s[2]
		q.V[2] = s[0]*c[1]*c[2] - c[0]*s[1]*s[2]
	}
	return q
}

func (q plainQuat) matrix() (m [3][3]float64) {
	x, y, z := q.V[0], q.V[1], q.V[2]
	m[0] = [3]float64{1 - 2*(y*y+z*z), 2 * (x*y - z*q.W), 2 * (x*z + y*q.W)}
	m[1] = [3]float64{2 * (x*y + z*q.W), 1 - 2*(x*x+z*z), 2 * (y*z - x*q.W)}
	m[2] = [3]float64{2 * (x*z - y*q.W), 2 * (y*z + x*q.W), 1 - 2*(x*x+y*y)}
	return m
}

func plainAngles(q plainQuat, order plainOrder) (a1, a2, a3 float64) {
	m := q.matrix()
	asin := func(x float64) float64 { return math.Asin(max(-1, min(1, x))) }
	switch order {
	case plainXYZ:
		return math.Atan2(-m[1][2], m[2][2]), asin(m[0][2]), math.Atan2(-m[0][1], m[0][0])
	case plainZXY:
		return math.Atan2(-m[0][1], m[1][1]), asin(m[2][1]), math.Atan2(-m[2][0], m[2][2])
	case plainZYX:
		return math.Atan2(m[1][0], m[0][0]), asin(-m[2][0]), math.Atan2(m[2][1], m[2][2])
	}
	return 0, 0, 0
}

// Several inputs in turn, so that branches are not learned by heart.
func inputs() (angles [256][3]float64, rotors [256]rotor.Rotor, quats [256]plainQuat) {
	rng := rand.New(rand.NewPCG(24, 1))
	for k := range angles {
		angles[k] = [3]float64{(rng.Float64() - 0.5) * 6, (rng.Float64() - 0.5) * 3, (rng.Float64() - 0.5) * 6}
		rotors[k] = zyx.Rotor(angles[k][0], angles[k][1], angles[k][2])
		quats[k] = plainQuaternion(angles[k][0], angles[k][1], angles[k][2], plainZYX)
	}
	return angles, rotors, quats
}

var zyx = Sequence{Axes: [3]Axis{Z, Y, X}}

var (
	sinkRotor  rotor.Rotor
	sinkTriple Triple
	sinkQuat   plainQuat
)

// TestPlainCode: the code compared with computes the same.
func TestPlainCode(t *testing.T) {
	orders := map[plainOrder]Sequence{plainXYZ: {Axes: [3]Axis{X, Y, Z}}, plainZXY: {Axes: [3]Axis{Z, X, Y}}, plainZYX: zyx}
	for order, s := range orders {
		q := plainQuaternion(0.3, -1.2, 2.5, order)
		if d := rotor.Angle(s.Rotor(0.3, -1.2, 2.5), rotor.FromQuaternion(q.W, q.V[0], q.V[1], q.V[2])); d > Rounding {
			t.Errorf("%s: %v off", s, d)
		}
		if a, b, c := plainAngles(q, order); math.Abs(a-0.3)+math.Abs(b+1.2)+math.Abs(c-2.5) > 1e-14 {
			t.Errorf("%s: %v %v %v", s, a, b, c)
		}
	}
}

// BenchmarkRatio reports time of dextral over time of the plain code: batches
// in turn, the fastest of each, so that other load on the machine hits both.
func BenchmarkRatio(b *testing.B) {
	angles, rotors, quats := inputs()
	b.Run("rotor", func(b *testing.B) {
		ratio(b, func(k int) {
			n := &angles[k%256]
			sinkRotor = zyx.Rotor(n[0], n[1], n[2])
		}, func(k int) {
			n := &angles[k%256]
			sinkQuat = plainQuaternion(n[0], n[1], n[2], plainZYX)
		})
	})
	b.Run("angles", func(b *testing.B) {
		ratio(b, func(k int) {
			sinkTriple = zyx.Angles(rotors[k%256])
		}, func(k int) {
			a, b, c := plainAngles(quats[k%256], plainZYX)
			sinkTriple = Triple{A: a, B: b, C: c}
		})
	})
}

func ratio(b *testing.B, ours, plain func(k int)) {
	b.ReportAllocs()
	fastest := func(f func(int), so time.Duration) time.Duration {
		start := time.Now()
		for k := range 1024 {
			f(k)
		}
		return min(so, time.Since(start))
	}
	own, other := time.Hour, time.Hour
	for b.Loop() {
		own, other = fastest(ours, own), fastest(plain, other)
	}
	b.ReportMetric(float64(own.Nanoseconds())/1024, "ns/dextral")
	b.ReportMetric(float64(other.Nanoseconds())/1024, "ns/plain")
	b.ReportMetric(float64(own)/float64(other), "ratio")
}
