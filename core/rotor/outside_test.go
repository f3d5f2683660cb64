package rotor_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/internal/table"
	"dextral/core/rotor"
)

// The check values of this file come from other libraries; the tables name
// versions, calls and conventions in their first lines. Quaternions are
// compared up to sign: the sign is the library's choice.

const reference = "../../fixtures/reference/"

// outside is the error allowed between two computations in double precision of
// a dozen operations on numbers near one.
const outside = 32 * ulp

// quaternionAt reads the columns prefix + x, y, z, w.
func quaternionAt(r table.Row, prefix string) rotor.Rotor {
	q := r.Numbers(prefix, "x", "y", "z", "w")
	return rotor.FromQuaternion(q[3], q[0], q[1], q[2])
}

func vecAt(r table.Row, prefix string) rotor.Vec {
	v := r.Numbers(prefix, "x", "y", "z")
	return rotor.Vec{X: v[0], Y: v[1], Z: v[2]}
}

// TestProductOutside: eight libraries multiply as the core does, all by
// Hamilton's rule, and a ninth table holds Shuster's product.
func TestProductOutside(t *testing.T) {
	for _, c := range []struct{ library, file, p, q, pq string }{
		{"SciPy", "rotor_scipy_compose.csv", "p", "q", "pq"},
		{"Eigen", "rotor_eigen.csv", "p", "q", "pq"},
		{"three.js", "rotor_graphics.csv", "a", "b", "ab"},
		{"three.js, premultiply", "rotor_graphics.csv", "b", "a", "ba_premul"},
		{"gl-matrix", "rotor_graphics.csv", "a", "b", "gl_ab"},
		{"gonum", "rotor_gonum_quat.csv", "p", "q", "pq"},
		{"tf2, Bullet, orocos-kdl, assimp", "rotor_robotics.csv", "p", "q", "pq"},
		{"own formulas, Hamilton", "rotor_conventions.csv", "p", "q", "ham_"},
		{"own formulas, Shuster", "rotor_conventions.csv", "q", "p", "shu_"},
	} {
		for i, row := range table.Read(t, reference+c.file) {
			got := quaternionAt(row, c.p).Mul(quaternionAt(row, c.q))
			within(t, outside, sameRotation(got, quaternionAt(row, c.pq)), "%s, row %d", c.library, i)
		}
	}
}

// TestRotateOutside: vectors turned actively.
func TestRotateOutside(t *testing.T) {
	for _, c := range []struct{ library, file, q, v, turned string }{
		{"SciPy", "rotor_scipy_compose.csv", "p", "v", "p_v_"},
		{"SciPy, of a product", "rotor_scipy_compose.csv", "pq", "v", "pq_v_"},
		{"Eigen", "rotor_eigen.csv", "p", "v", "pv"},
		{"three.js", "rotor_graphics.csv", "a", "v", "r"},
		{"gl-matrix", "rotor_graphics.csv", "a", "v", "gl_r"},
		{"gonum", "rotor_gonum_r3.csv", "q", "v", "r"},
	} {
		for i, row := range table.Read(t, reference+c.file) {
			v := vecAt(row, c.v)
			got := quaternionAt(row, c.q).Rotate(v)
			within(t, outside*v.Norm(), gapV(got, vecAt(row, c.turned)), "%s, row %d", c.library, i)
		}
	}
	for i, row := range table.Read(t, reference+"rotor_scipy_compose.csv") {
		v := vecAt(row, "v")
		within(t, outside*v.Norm(), gapV(quaternionAt(row, "p").Reverse().Rotate(v), vecAt(row, "pinv_v_")), "SciPy, inverse, row %d", i)
	}
	for i, row := range table.Read(t, reference+"rotor_robotics.csv") {
		v := rotor.Vec{X: 1, Y: 2, Z: 3} // as the table's first column says
		within(t, outside*v.Norm(), gapV(quaternionAt(row, "p").Rotate(v), vecAt(row, "r")), "%s, row %d", row.Text("library"), i)
	}
}

// TestAngleOutside: the angle between orientations, among them q and -q, equal
// ones and half turns. Libraries that take an arc cosine of a product near one
// are wrong by the root of an ulp there, and gl-matrix gives NaN for q and -q.
func TestAngleOutside(t *testing.T) {
	rootUlp := 4 * math.Sqrt(ulp)
	for _, c := range []struct {
		library, file, p, q, angle string
		bound                      float64
	}{
		{"SciPy", "rotor_scipy_compose.csv", "p", "q", "rel_rad", outside},
		{"Eigen", "rotor_eigen.csv", "p", "q", "dist_rad", outside},
		{"three.js", "rotor_graphics.csv", "a", "b", "angle_rad", rootUlp},
		{"gl-matrix", "rotor_graphics.csv", "a", "b", "gl_angle_rad", rootUlp},
		{"tf2, Bullet", "rotor_robotics.csv", "p", "q", "angle_shortest_rad", rootUlp},
	} {
		checked := 0
		for i, row := range table.Read(t, reference+c.file) {
			if c.angle == "angle_shortest_rad" && row.Text("library")[0] != 't' && row.Text("library")[0] != 'b' {
				continue
			}
			if want := row.Number(c.angle); !math.IsNaN(want) {
				checked++
				got := rotor.Angle(quaternionAt(row, c.p), quaternionAt(row, c.q))
				within(t, c.bound, math.Abs(got-math.Min(want, 2*math.Pi-want)), "%s, row %d", c.library, i)
			}
		}
		assert.GreaterOrEqual(t, checked, 39, c.library)
	}
}

// TestSlerpOutside: SciPy at many parameters and special pairs, others at 0.3.
func TestSlerpOutside(t *testing.T) {
	for i, row := range table.Read(t, reference+"rotor_scipy_slerp.csv") {
		got := rotor.Slerp(quaternionAt(row, "a"), quaternionAt(row, "b"), row.Number("t"))
		within(t, outside, sameRotation(got, quaternionAt(row, "q")), "SciPy, row %d, %s", i, row.Text("label"))
	}
	for _, c := range []struct{ library, file, a, b, s string }{
		{"Eigen", "rotor_eigen.csv", "p", "q", "s"},
		{"three.js", "rotor_graphics.csv", "a", "b", "slerp03"},
		{"gl-matrix", "rotor_graphics.csv", "a", "b", "gl_slerp03"},
		{"tf2, Bullet, assimp", "rotor_robotics.csv", "p", "q", "s"},
	} {
		for i, row := range table.Read(t, reference+c.file) {
			if math.IsNaN(row.Number(c.s + "w")) {
				continue // orocos-kdl has no such function
			}
			got := rotor.Slerp(quaternionAt(row, c.a), quaternionAt(row, c.b), 0.3)
			within(t, outside, sameRotation(got, quaternionAt(row, c.s)), "%s, row %d", c.library, i)
		}
	}
}

// TestVectorsOutside: SciPy's rotation vectors and MRP, in and out.
func TestVectorsOutside(t *testing.T) {
	for _, row := range table.Read(t, reference+"rotor_scipy_vectors.csv") {
		in := row.Numbers("in", "1", "2", "3")
		v := rotor.Vec{X: in[0], Y: in[1], Z: in[2]}
		r := rotor.FromRotationVector(v)
		if row.Text("kind") == "mrp" {
			r = rotor.FromMRP(v)
		}
		what := row.Text("kind") + " " + row.Text("label")
		within(t, outside, sameRotation(r, quaternionAt(row, "q")), "%s", what)
		within(t, outside, sameVector(r.RotationVector(), vecAt(row, "rv"), row), "%s, rotation vector", what)
		within(t, outside, sameVector(r.MRP(), vecAt(row, "mrp"), row), "%s, MRP", what)
		within(t, outside, math.Abs(r.TurnAngle()-row.Number("angle_rad")), "%s, angle", what)
	}
}

// sameVector is the gap between rotation vectors or MRP; at half a turn the
// sense is open.
func sameVector(a, b rotor.Vec, row table.Row) float64 {
	if math.Pi-row.Number("angle_rad") < 1e-15 {
		return min(gapV(a, b), gapV(a, b.Neg()))
	}
	return gapV(a, b)
}

// TestAxisAngleOutside: axis and angle of any length and sign.
func TestAxisAngleOutside(t *testing.T) {
	for _, c := range []struct{ library, file, axis, angle, q string }{
		{"Eigen", "rotor_eigen_vectors.csv", "u", "angle_rad", "aa"},
		{"three.js", "rotor_graphics_axisangle.csv", "a", "angle_rad", "q"},
		{"gl-matrix", "rotor_graphics_axisangle.csv", "a", "angle_rad", "g"},
		{"gonum", "rotor_gonum_r3.csv", "ax", "angle_rad", "q"},
	} {
		for i, row := range table.Read(t, reference+c.file) {
			r, ok := rotor.FromAxisAngle(vecAt(row, c.axis), row.Number(c.angle))
			assert.True(t, ok)
			within(t, outside, sameRotation(r, quaternionAt(row, c.q)), "%s, row %d", c.library, i)
		}
	}
	for i, row := range table.Read(t, reference+"rotor_eigen.csv") {
		back, ok := rotor.FromAxisAngle(vecAt(row, "aa_"), row.Number("aa_angle"))
		assert.True(t, ok)
		within(t, outside, sameRotation(back, quaternionAt(row, "p")), "Eigen, row %d", i)
	}
}

// TestBetweenOutside: Eigen turns one vector onto another. Opposite vectors
// leave the plane open, and there Eigen chooses another one.
func TestBetweenOutside(t *testing.T) {
	for i, row := range table.Read(t, reference+"rotor_eigen_vectors.csv") {
		a, b, q := vecAt(row, "a"), vecAt(row, "b"), quaternionAt(row, "q")
		r, ok := rotor.Between(a, b)
		assert.True(t, ok)
		if a.Angle(b) > math.Pi-1e-7 {
			an, _ := a.Unit()
			within(t, outside, gapV(r.Rotate(an), an.Neg()), "row %d", i)
			within(t, 1e-7, gapV(q.Rotate(an), an.Neg()), "Eigen, row %d", i)
			continue
		}
		within(t, outside, sameRotation(r, q), "row %d", i)
	}
}

// TestExpLogOutside: gonum's exponential and logarithm of quaternions, which
// are Exp and Log of the bivector -(x e23 + y e31 + z e12).
func TestExpLogOutside(t *testing.T) {
	for i, row := range table.Read(t, reference+"rotor_gonum_quat.csv") {
		log := vecAt(row, "log").Neg().Plane()
		r := quaternionAt(row, "p")
		within(t, outside, gapV(r.Log().Axis(), log.Axis()), "log, row %d", i)
		within(t, outside, gapR(rotor.Exp(log), quaternionAt(row, "exp")), "exp, row %d", i)
		within(t, outside, gapR(rotor.Exp(r.Log().Scale(0.3)), quaternionAt(row, "pow")), "power 0.3, row %d", i)
		s := quaternionAt(row, "s")
		inverse := s.Reverse().Scale(1 / s.Dot(s))
		within(t, outside, gapR(inverse, quaternionAt(row, "sinv")), "inverse of norm %g, row %d", s.Norm(), i)
	}
}
