package matrix_test

import (
	"math"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/internal/table"
	"dextral/core/matrix"
	"dextral/core/rotor"
)

const reference = "../../fixtures/reference/"

// outside is the error allowed between two computations in double precision of
// a dozen operations on numbers near one.
const outside = 32 * ulp

func quaternionAt(r table.Row, prefix string) rotor.Rotor {
	q := r.Numbers(prefix, "x", "y", "z", "w")
	return rotor.FromQuaternion(q[3], q[0], q[1], q[2])
}

func vecAt(r table.Row, prefix string) rotor.Vec {
	v := r.Numbers(prefix, "x", "y", "z")
	return rotor.Vec{X: v[0], Y: v[1], Z: v[2]}
}

// matAt reads nine columns, row by row as in every table.
func matAt(r table.Row, prefix string) (m matrix.Mat3) {
	for i, x := range r.Numbers(prefix, "00", "01", "02", "10", "11", "12", "20", "21", "22") {
		m[i/3][i%3] = x
	}
	return m
}

// TestActiveOutside: matrices of quaternions from six libraries, all active,
// and the way back.
func TestActiveOutside(t *testing.T) {
	for _, c := range []struct{ library, file, q, m string }{
		{"SciPy, products", "rotor_scipy_compose.csv", "pq", "pq_m"},
		{"SciPy, vectors", "rotor_scipy_vectors.csv", "q", "m"},
		{"Eigen", "rotor_eigen.csv", "p", "m"},
		{"three.js", "rotor_graphics.csv", "a", "m"},
		{"gl-matrix, 3x3", "rotor_graphics.csv", "a", "gl3_m"},
		{"gl-matrix, 4x4", "rotor_graphics.csv", "a", "gl4_m"},
		{"gonum", "rotor_gonum_r3.csv", "q", "m"},
		{"three.js, axis and angle", "rotor_graphics_axisangle.csv", "q", "m"},
		{"gl-matrix, axis and angle", "rotor_graphics_axisangle.csv", "g", "gl_m"},
		{"SciPy, the active one of two", "rotor_conventions.csv", "p", "M"},
	} {
		for i, row := range table.Read(t, reference+c.file) {
			r, m := quaternionAt(row, c.q), matAt(row, c.m)
			within(t, outside, gap(matrix.FromRotor(r), m), "%s, row %d", c.library, i)
			within(t, outside, sameRotation(m.Rotor(), r), "%s, row %d, back", c.library, i)
		}
	}
	for i, row := range table.Read(t, reference+"rotor_graphics.csv") {
		within(t, outside, sameRotation(matAt(row, "gl3_m").Rotor(), quaternionAt(row, "gl_frommat3")), "gl-matrix, fromMat3, row %d", i)
	}
}

// TestPassiveOutside: the attitude matrix of Shuster's texts and ERFA's
// matrices are passive, the transposes of ours.
func TestPassiveOutside(t *testing.T) {
	for i, row := range table.Read(t, reference+"rotor_conventions.csv") {
		p, q := quaternionAt(row, "p"), quaternionAt(row, "q")
		within(t, outside, gap(matrix.FromRotor(p).Transpose(), matAt(row, "A")), "row %d", i)
		// A(p) A(q) is A of Shuster's product p q, the geometric product q p.
		both := matrix.FromRotor(p).Transpose().Mul(matrix.FromRotor(q).Transpose())
		within(t, outside, gap(both, matrix.FromRotor(quaternionAt(row, "shu_")).Transpose()), "row %d", i)
	}
	for _, row := range table.Read(t, reference+"matrix_erfa_rv2m.csv") {
		v, m := vecAt(row, "v"), matAt(row, "m")
		size := max(1, v.Norm()) // angles of many turns are rounded by an ulp of their own
		passive := matrix.FromRotor(rotor.FromRotationVector(v)).Transpose()
		within(t, outside*size, gap(passive, m), "ERFA rv2m, %s", row.Text("label"))
		// rm2v takes the axis from the antisymmetric part, where an ulp grows
		// by the inverse of the sine of the angle.
		r := m.Transpose().Rotor()
		slack := outside / max(math.Sin(r.TurnAngle()), 1e-8)
		within(t, slack, sameRotation(rotor.FromRotationVector(vecAt(row, "back")), r), "ERFA rm2v, %s", row.Text("label"))
	}
	for i, row := range table.Read(t, reference+"matrix_erfa_turns.csv") {
		axis := map[string]rotor.Vec{"rx": {X: 1}, "ry": {Y: 1}, "rz": {Z: 1}}[row.Text("function")]
		r, ok := rotor.FromAxisAngle(axis, row.Number("angle_rad"))
		assert.True(t, ok)
		passive := matrix.FromRotor(r).Transpose()
		within(t, outside, gap(passive, matAt(row, "m")), "ERFA %s, row %d", row.Text("function"), i)
		within(t, outside, gap(passive.Mul(matAt(row, "basem")), matAt(row, "outm")), "ERFA %s, row %d, on the left", row.Text("function"), i)
	}
}

// TestProductsOutside: ERFA's products of matrices and vectors.
func TestProductsOutside(t *testing.T) {
	for i, row := range table.Read(t, reference+"matrix_erfa_products.csv") {
		a, b, p := matAt(row, "a_m"), matAt(row, "b_m"), vecAt(row, "p")
		within(t, outside, gap(a.Mul(b), matAt(row, "ab_m")), "row %d", i)
		assert.Equal(t, matAt(row, "at_m"), a.Transpose(), "row %d", i)
		within(t, outside*p.Norm(), gapV(a.Apply(p), vecAt(row, "ap")), "row %d", i)
		within(t, outside*p.Norm(), gapV(a.Transpose().Apply(p), vecAt(row, "atp")), "row %d", i)
	}
}

// TestPublishedByERFA runs the test program of ERFA, which is derived from the
// IAU's SOFA: general matrices and vectors, with the tolerances printed there.
func TestPublishedByERFA(t *testing.T) {
	inputs, calls := map[string]float64{}, 0
	var got map[string]float64
	function := ""
	for _, row := range table.Read(t, reference+"matrix_erfa_published.csv") {
		if f := row.Text("function"); f != function {
			function, inputs = f, map[string]float64{}
		}
		name := row.Text("variable_or_call")
		switch row.Text("role") {
		case "input":
			inputs[name] = row.Number("value")
		case "call":
			got = erfa(t, function, inputs)
			calls++
		case "expected":
			x, ok := got[name[strings.IndexByte(name+"[", '['):]]
			assert.True(t, ok, "%s: %s", function, name)
			// The printed inputs and outputs are doubles: two ulp are rounding.
			within(t, row.Number("tolerance")+2*ulp*math.Abs(x), math.Abs(x-row.Number("value")), "%s: %s", function, name)
		}
	}
	assert.Equal(t, 9, calls)
}

// erfa does what the function of this name does, with the core's means. Results
// are keyed by their subscripts.
func erfa(t *testing.T, function string, in map[string]float64) map[string]float64 {
	vec := func(name string) rotor.Vec {
		return rotor.Vec{X: in[name+"[0]"], Y: in[name+"[1]"], Z: in[name+"[2]"]}
	}
	mat := func(name string) (m matrix.Mat3) {
		for i := range 9 {
			m[i/3][i%3] = in[name+"["+digit(i/3)+"]["+digit(i%3)+"]"]
		}
		return m
	}
	switch function {
	case "rv2m":
		return subscripts(matrix.FromRotor(rotor.FromRotationVector(vec("w"))).Transpose())
	case "rm2v":
		// The printed matrix is a mirror; rm2v looks at the antisymmetric part
		// and at the trace alone.
		m := mat("r")
		within(t, 4*ulp, math.Abs(m.Det()+1), "determinant of rm2v's input")
		v := rotor.Vec{X: m[1][2] - m[2][1], Y: m[2][0] - m[0][2], Z: m[0][1] - m[1][0]}
		return subscript(v.Scale(math.Atan2(v.Norm(), m.Trace()-1) / v.Norm()))
	case "rxr":
		return subscripts(mat("a").Mul(mat("b")))
	case "tr":
		return subscripts(mat("r").Transpose())
	case "rxp":
		return subscript(mat("r").Apply(vec("p")))
	case "trxp":
		return subscript(mat("r").Transpose().Apply(vec("p")))
	case "pxp":
		return subscript(vec("a").Cross(vec("b")))
	case "pdp":
		return map[string]float64{"": vec("a").Dot(vec("b"))}
	case "sepp":
		return map[string]float64{"": vec("a").Angle(vec("b"))}
	}
	t.Fatalf("unknown function %q", function)
	return nil
}

func digit(i int) string { return string(rune('0' + i)) }

func subscript(v rotor.Vec) map[string]float64 {
	return map[string]float64{"[0]": v.X, "[1]": v.Y, "[2]": v.Z}
}

func subscripts(m matrix.Mat3) map[string]float64 {
	all := map[string]float64{}
	for i := range 9 {
		all["["+digit(i/3)+"]["+digit(i%3)+"]"] = m[i/3][i%3]
	}
	return all
}

// TestPublished holds matrices against worked examples in print. A printed
// number is wrong by half a unit of its last digit.
func TestPublished(t *testing.T) {
	turn := func(x, y, z, angle float64) matrix.Mat3 {
		r, _ := rotor.FromAxisAngle(rotor.Vec{X: x, Y: y, Z: z}, angle*math.Pi/180)
		return matrix.FromRotor(r)
	}
	// VectorNav, "Inertial navigation primer", section 6.1 (read): the passive
	// matrix of 3-2-1 (102, 20, 14) deg.
	dcm := matrix.Mat3{{-.1954, .9192, -.3420}, {-.9663, -.1208, .2273}, {.1676, .3749, .9118}}
	within(t, .5e-4, gap(turn(0, 0, 1, 102).Mul(turn(0, 1, 0, 20)).Mul(turn(1, 0, 0, 14)).Transpose(), dcm), "VectorNav")

	// J. J. Craig, "Introduction to Robotics": 30 deg about (.707, .707, 0), and
	// the same about an axis through the point P = (1, 2, 3), which moves the
	// origin by P - R P (from memory).
	craig := matrix.Mat3{{.933, .067, .354}, {.067, .933, -.354}, {-.354, .354, .866}}
	r := turn(.707, .707, 0, 30)
	within(t, .5e-3, gap(r, craig), "Craig")
	p := rotor.Vec{X: 1, Y: 2, Z: 3}
	within(t, .5e-2, gapV(p.Sub(r.Apply(p)), rotor.Vec{X: -1.13, Y: 1.13, Z: .05}), "Craig, axis off the origin")

	// spatial-math 0.2, documentation of quatOfDcm (read): a passive matrix.
	q := rotor.FromQuaternion(math.Sqrt2/2, 0, 0, math.Sqrt2/2)
	within(t, 2*ulp, sameRotation(matrix.Mat3{{0, 1, 0}, {-1, 0, 0}, {0, 0, 1}}.Transpose().Rotor(), q), "spatial-math")
}
