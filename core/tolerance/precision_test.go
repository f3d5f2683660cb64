package tolerance_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/core/matrix"
	"dextral/core/rotor"
	"dextral/core/tolerance"
)

func source() *rand.Rand { return rand.New(rand.NewPCG(7, 53)) }

func norm(v []float64) float64 {
	sum := 0.0
	for _, x := range v {
		sum += x * x
	}
	return math.Sqrt(sum)
}

func randomUnit(rng *rand.Rand, n int) (v [4]float64) {
	for k := range n {
		v[k] = rng.NormFloat64()
	}
	size := norm(v[:])
	for k := range v {
		v[k] /= size
	}
	return v
}

func rotorOf(v [4]float64) rotor.Rotor { return rotor.FromQuaternion(v[0], v[1], v[2], v[3]) }

func nine(m *matrix.Mat3) []*float64 {
	var all []*float64
	for i := range m {
		for j := range m[i] {
			all = append(all, &m[i][j])
		}
	}
	return all
}

// A disturbance changes numbers by at most h each. There are two: rounding to
// the nearest multiple of 2h, and the worst case, h with any signs.
type disturbance func(x float64) float64

func rounding(h float64) disturbance {
	return func(x float64) float64 { return math.Round(x/(2*h)) * 2 * h }
}

func corners(h float64, rng *rand.Rand) disturbance {
	return func(x float64) float64 { return x + h*float64(2*rng.IntN(2)-1) }
}

// A quantity is a bound of tolerance with the miss that it bounds: how much a
// random example changes under a disturbance.
type quantity struct {
	name  string
	bound func(tolerance.Precision) float64
	miss  func(rng *rand.Rand, d disturbance) float64
	tight float64 // share of the bound that the corners are seen to reach
}

var quantities = []quantity{
	{"norm of a quaternion", func(p tolerance.Precision) float64 { return p.Norm(4, 1) }, func(rng *rand.Rand, d disturbance) float64 {
		q := nearHalf(rng)
		for k := range q {
			q[k] = d(q[k])
		}
		return math.Abs(norm(q[:]) - 1)
	}, 0.99},
	{"quaternion", tolerance.Precision.Quaternion, func(rng *rand.Rand, d disturbance) float64 {
		q := nearHalf(rng)
		r := rotorOf(q)
		for k := range q {
			q[k] = d(q[k])
		}
		return rotor.Angle(r, rotorOf(q))
	}, 0.99},
	{"matrix", tolerance.Precision.Matrix, func(rng *rand.Rand, d disturbance) float64 {
		r, m := rounded(rng, d)
		nearest, _, _ := matrix.Nearest(m)
		return rotor.Angle(r, nearest.Rotor())
	}, 0.90},
	{"defect of a matrix", tolerance.Precision.Defect, func(rng *rand.Rand, d disturbance) float64 {
		_, m := rounded(rng, d)
		return matrix.Defect(m)
	}, 0.90},
	{"determinant of a matrix", tolerance.Precision.Det, func(rng *rand.Rand, d disturbance) float64 {
		_, m := rounded(rng, d)
		return math.Abs(m.Det() - 1)
	}, 0.90},
	{"angles in radians", func(p tolerance.Precision) float64 { return p.Angles(convention.Radian) }, turned(1), 0.98},
	{"angles in degrees", func(p tolerance.Precision) float64 { return p.Angles(convention.Degree) }, turned(math.Pi / 180), 0.98},
	{"rotation vector", func(p tolerance.Precision) float64 { return p.RotationVector(convention.Radian) }, func(rng *rand.Rand, d disturbance) float64 {
		u, turn := randomUnit(rng, 3), rng.Float64()*math.Pi
		v := rotor.Vec{X: u[0], Y: u[1], Z: u[2]}.Scale(turn)
		return rotor.Angle(rotor.FromRotationVector(v), rotor.FromRotationVector(rotor.Vec{X: d(v.X), Y: d(v.Y), Z: d(v.Z)}))
	}, 0.95},
	{"axis", tolerance.Precision.Axis, func(rng *rand.Rand, d disturbance) float64 {
		u := randomUnit(rng, 3)
		v := rotor.Vec{X: u[0], Y: u[1], Z: u[2]}
		return v.Angle(rotor.Vec{X: d(v.X), Y: d(v.Y), Z: d(v.Z)})
	}, 0.98},
	{"axis and angle", func(p tolerance.Precision) float64 { return p.AxisAngle(convention.Radian) }, func(rng *rand.Rand, d disturbance) float64 {
		u, turn := randomUnit(rng, 3), math.Pi*math.Sqrt(rng.Float64())
		r, _ := rotor.FromAxisAngle(rotor.Vec{X: u[0], Y: u[1], Z: u[2]}, turn)
		s, _ := rotor.FromAxisAngle(rotor.Vec{X: d(u[0]), Y: d(u[1]), Z: d(u[2])}, d(turn))
		return rotor.Angle(r, s)
	}, 0.9},
	{"one angle", func(p tolerance.Precision) float64 { return p.Angle(convention.Degree) }, func(rng *rand.Rand, d disturbance) float64 {
		a := rng.Float64() * 360
		return math.Abs(d(a)-a) * math.Pi / 180
	}, 0.99},
}

// nearHalf is a random unit quaternion, half of the time one near (1, 1, 1, 1)/2, where
// errors add up most.
func nearHalf(rng *rand.Rand) [4]float64 {
	q := randomUnit(rng, 4)
	if rng.IntN(2) == 0 {
		for k := range q {
			q[k] = 0.5 + q[k]*0.01
		}
		size := norm(q[:])
		for k := range q {
			q[k] /= size
		}
	}
	return q
}

func rounded(rng *rand.Rand, d disturbance) (rotor.Rotor, matrix.Mat3) {
	r := rotorOf(randomUnit(rng, 4))
	if rng.IntN(4) == 0 { // two axes nearly along coordinates, and its like
		r = rotor.FromRotationVector(rotor.Vec{X: rng.NormFloat64() * 0.02, Y: rng.NormFloat64() * 0.02, Z: rng.NormFloat64() * 0.02})
	}
	m := matrix.FromRotor(r)
	for _, x := range nine(&m) {
		*x = d(*x)
	}
	return r, m
}

func turned(unit float64) func(*rand.Rand, disturbance) float64 {
	return func(rng *rand.Rand, d disturbance) float64 {
		s := angle.Sequences()[rng.IntN(24)]
		a, b, c := rng.NormFloat64(), rng.NormFloat64(), rng.NormFloat64()
		return rotor.Angle(s.Rotor(a, b, c), s.Rotor(d(a/unit)*unit, d(b/unit)*unit, d(c/unit)*unit))
	}
}

// TestBounds: rounding stays below each bound; so do the worst errors of the same
// size, and those come close, so that the bound could not be much smaller.
func TestBounds(t *testing.T) {
	rng := source()
	for _, q := range quantities {
		closest := 0.0
		for _, h := range []float64{0.005, 0.0005, 0.5e-6} {
			bound := q.bound(tolerance.Precision{Half: h, Double: true})
			inRounding, inCorners := 0.0, 0.0
			for range 40000 {
				inRounding = math.Max(inRounding, q.miss(rng, rounding(h)))
				inCorners = math.Max(inCorners, q.miss(rng, corners(h, rng)))
			}
			assert.LessOrEqual(t, inRounding, bound, "%s, h %v", q.name, h)
			assert.LessOrEqual(t, inCorners, bound, "%s, h %v", q.name, h)
			t.Logf("%-24s h %-7v rounding reaches %.2f of the bound, any errors %.2f", q.name, h, inRounding/bound, inCorners/bound)
			closest = math.Max(closest, inCorners/bound)
		}
		assert.Greater(t, closest, q.tight, q.name)
	}
}

// single rounds to float32.
func single(x float64) float64 { return float64(float32(x)) }

// TestFloat32: a quaternion that has been normalised in float32, the matrix made of
// it there, angles and an axis stored there are within the bounds of the zero Precision.
func TestFloat32(t *testing.T) {
	rng := source()
	p := tolerance.Precision{}
	worst := map[string]float64{}
	reach := func(name string, miss, bound float64) {
		assert.LessOrEqual(t, miss, bound, name)
		worst[name] = math.Max(worst[name], miss/bound)
	}
	for range 50000 {
		var q, out [4]float32
		var sum float32
		for k := range q {
			q[k] = float32(rng.NormFloat64() * 10)
			sum += q[k] * q[k]
		}
		length := float32(math.Sqrt(float64(sum)))
		var u [4]float64
		for k := range q {
			out[k] = q[k] / length
			u[k] = float64(out[k])
		}
		exact := rotor.FromQuaternion(float64(q[0]), float64(q[1]), float64(q[2]), float64(q[3]))
		reach("norm", math.Abs(norm(u[:])-1), p.Norm(4, 1))
		reach("quaternion", rotor.Angle(exact, rotorOf(u)), p.Quaternion())

		m := matrixInSingle(out)
		reach("defect", matrix.Defect(m), p.Defect())
		reach("det", math.Abs(m.Det()-1), p.Det())
		nearest, _, _ := matrix.Nearest(m)
		reach("matrix", rotor.Angle(exact, nearest.Rotor()), p.Matrix())

		s := angle.Sequences()[rng.IntN(24)]
		a, b, c := (rng.Float64()-0.5)*360, (rng.Float64()-0.5)*360, (rng.Float64()-0.5)*360
		const deg = math.Pi / 180
		reach("angles", rotor.Angle(s.Rotor(a*deg, b*deg, c*deg), s.Rotor(single(a)*deg, single(b)*deg, single(c)*deg)), p.Angles(convention.Degree))
	}
	for name, share := range worst {
		t.Logf("%-10s reaches %.2f of the bound", name, share)
		assert.Greater(t, share, 0.02, name)
	}
}

// matrixInSingle is the matrix of a quaternion, computed in float32.
func matrixInSingle(q [4]float32) matrix.Mat3 {
	w, x, y, z := q[0], q[1], q[2], q[3]
	m := [3][3]float32{
		{1 - 2*(y*y+z*z), 2 * (x*y - z*w), 2 * (x*z + y*w)},
		{2 * (x*y + z*w), 1 - 2*(x*x+z*z), 2 * (y*z - x*w)},
		{2 * (x*z - y*w), 2 * (y*z + x*w), 1 - 2*(x*x+y*y)},
	}
	var wide matrix.Mat3
	for i := range m {
		for j := range m[i] {
			wide[i][j] = float64(m[i][j])
		}
	}
	return wide
}

// TestDouble: the same in float64, where the declared bounds are 2^29 times smaller.
func TestDouble(t *testing.T) {
	rng := source()
	p := tolerance.Precision{Double: true}
	for range 20000 {
		q := randomUnit(rng, 4)
		assert.LessOrEqual(t, math.Abs(norm(q[:])-1), p.Norm(4, 1))
		m := matrix.FromRotor(rotorOf(q))
		assert.LessOrEqual(t, matrix.Defect(m), 2*p.Defect(), "computing the defect rounds as well")
	}
	assert.InEpsilon(t, 0x1p29, tolerance.Precision{}.Quaternion()/p.Quaternion(), 1e-6)
}

func TestQuantised(t *testing.T) {
	rng := source()
	p := tolerance.Quantised(32767)
	p.Double = true
	assert.Equal(t, p.Half, tolerance.Quantised(-32767).Half)
	worst := 0.0
	for range 50000 {
		q := randomUnit(rng, 4)
		r := rotorOf(q)
		for k := range q {
			q[k] = math.Round(q[k]*32767) / 32767
		}
		assert.LessOrEqual(t, math.Abs(norm(q[:])-1), p.Norm(4, 1))
		worst = math.Max(worst, rotor.Angle(r, rotorOf(q)))
	}
	assert.LessOrEqual(t, worst, p.Quaternion())
	assert.Greater(t, worst, 0.8*p.Quaternion())
	assert.InDelta(t, 0.0035, p.Quaternion()*180/math.Pi, 0.0001, "degrees")
}

func TestDeclared(t *testing.T) {
	p := tolerance.Precision{Half: 0.005, Declared: 0.02}
	for _, bound := range angular(p) {
		assert.Equal(t, 0.02, bound)
	}
	without := tolerance.Precision{Half: 0.005}
	assert.Equal(t, without.Norm(4, 1), p.Norm(4, 1))
	assert.Equal(t, without.Defect(), p.Defect())
	assert.Equal(t, without.Det(), p.Det())
}

func angular(p tolerance.Precision) []float64 {
	return []float64{
		p.Quaternion(), p.Matrix(), p.Angles(convention.Degree), p.Angles(convention.UnitUnstated), p.RotationVector(convention.Radian),
		p.Axis(), p.AxisAngle(convention.Radian), p.Angle(convention.Degree),
	}
}

// TestExtremes: bounds grow with the half unit, are at most a half turn, and
// are that for what is no number.
func TestExtremes(t *testing.T) {
	before := angular(tolerance.Precision{})
	for _, half := range []float64{1e-9, 1e-3, 0.1, 0.3, 0.34, 0.5, 1, 100, 1e300, math.Inf(1)} {
		now := angular(tolerance.Precision{Half: half})
		for k := range now {
			assert.True(t, now[k] >= before[k] && now[k] <= math.Pi, "half %v, bound %d: %v", half, k, now[k])
		}
		before = now
	}
	for k, bound := range angular(tolerance.Precision{Half: math.NaN()}) {
		assert.True(t, bound >= math.Pi/2, "bound %d: %v", k, bound)
	}
	assert.Equal(t, math.Pi, tolerance.Precision{Half: 1}.Matrix())
	assert.Equal(t, math.Pi, tolerance.Quantised(0).Quaternion())
}
