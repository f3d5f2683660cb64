package angle_test

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/core/angle"
	"dextral/core/internal/table"
	"dextral/core/rotor"
)

const (
	reference = "../../fixtures/reference/"
	deg       = math.Pi / 180
)

// outside bounds what two programs may differ by in turning three angles, of up to
// 2 pi in size and converted from degrees, into a rotor: each angle is off by two
// rounding units of 2 pi on either side, the product by Rounding.
const outside = 3*2*2*2*math.Pi*0x1p-53 + 2*angle.Rounding

// sequenceOf reads letters such as ZYX.
func sequenceOf(t testing.TB, letters string, isFixed bool) angle.Sequence {
	t.Helper()
	s := angle.Sequence{Fixed: isFixed}
	require.Len(t, letters, 3)
	for k := range s.Axes {
		s.Axes[k] = angle.Axis(strings.ToUpper(letters)[k] - 'X')
	}
	require.True(t, s.Valid(), letters)
	return s
}

func degrees(r table.Row, columns ...string) [3]float64 {
	n := r.Numbers("", columns...)
	return [3]float64{n[0] * deg, n[1] * deg, n[2] * deg}
}

func quaternion(r table.Row) rotor.Rotor {
	q := r.Numbers("q", "w", "x", "y", "z")
	return rotor.FromQuaternion(q[0], q[1], q[2], q[3])
}

// sameAngles compares two triples by value, with the tolerance of the outer
// angles amplified; near a singular point only by the rotor.
func sameAngles(t *testing.T, s angle.Sequence, got, want angle.Triple, where string) {
	assert.LessOrEqual(t, rotor.Angle(rebuilt(s, got), rebuilt(s, want)), outside, where)
	if amplified := outside * s.Amplification(got.B); amplified < 1e-6 {
		assert.LessOrEqual(t, math.Abs(got.B-want.B), outside, where)
		assert.LessOrEqual(t, math.Abs(angle.Wrap(got.A-want.A)), amplified, where)
		assert.LessOrEqual(t, math.Abs(angle.Wrap(got.C-want.C)), amplified, where)
	}
}

func triple(n [3]float64) angle.Triple { return angle.Triple{A: n[0], B: n[1], C: n[2]} }

// TestSciPy: all 24 sequences both ways against SciPy 1.10.1. What SciPy itself
// loses on the way back (back_residual_rad; near a singular point it takes
// an arc cosine and rounds off the eighth digit) is not ours to follow.
func TestSciPy(t *testing.T) {
	seen := map[angle.Sequence]int{}
	for _, row := range table.Read(t, reference+"angle_scipy.csv") {
		s := sequenceOf(t, row.Text("seq"), row.Text("kind") == "extrinsic")
		where := fmt.Sprint(s.Words(), " ", row.Text("label"))
		seen[s]++
		n, q := degrees(row, "a1_deg", "a2_deg", "a3_deg"), quaternion(row)
		assert.LessOrEqual(t, rotor.Angle(s.Rotor(n[0], n[1], n[2]), q), outside, where)

		got := s.Angles(q)
		assert.LessOrEqual(t, rotor.Angle(rebuilt(s, got), q), outside, where)
		exact := strings.HasPrefix(row.Text("label"), "singular_exact") && !s.Proper()
		for _, b := range singular(s) {
			exact = exact || math.Abs(n[1]-b) < 1e-12
		}
		assert.Equal(t, exact, got.Band != angle.Regular, "%s: %v", where, got.Band)
		if row.Number("back_residual_rad") < outside {
			sameAngles(t, s, got, triple(degrees(row, "back1_deg", "back2_deg", "back3_deg")), where)
		}
	}
	assert.Len(t, seen, 24)
}

// TestEigen: twelve sequences about moving axes against Eigen 3.4.0, whose eulerAngles
// keeps the first angle in 0..180 degrees and so gives the other triple half of the time.
func TestEigen(t *testing.T) {
	kept, folded := 0, 0
	for _, row := range table.Read(t, reference+"angle_eigen.csv") {
		s := moving(angle.Axis(row.Number("i")), angle.Axis(row.Number("j")), angle.Axis(row.Number("k")))
		where := s.Words() + " case " + row.Text("case")
		n, q := degrees(row, "a1_deg", "a2_deg", "a3_deg"), quaternion(row)
		assert.LessOrEqual(t, rotor.Angle(s.Rotor(n[0], n[1], n[2]), q), outside, where)
		got, e := s.Angles(q), triple(degrees(row, "e1_deg", "e2_deg", "e3_deg"))
		if math.Abs(angle.Wrap(got.B-e.B)) < 1e-9 {
			kept++
		} else {
			folded++
			got = s.Other(got)
		}
		sameAngles(t, s, got, e, where)
	}
	assert.Greater(t, kept, 100)
	assert.Greater(t, folded, 100)
}

// byAxis reads three numbers that stand in the order x, y, z whatever the sequence.
func byAxis(s angle.Sequence) angle.Reading {
	return angle.Reading{Seq: s, Order: [3]int{int(s.Axes[0]), int(s.Axes[1]), int(s.Axes[2])}}
}

// TestThree: three.js 0.187 stores angles by axis; its order names turns about
// moving axes. Away from the poles it gives the same angles back; within 0.026 degrees of
// them it sets the third angle to zero and misses the attitude, by
// bq_roundtrip_chord (which comes out of a square root of rounding errors, uncertain by 1e-7).
func TestThree(t *testing.T) {
	missed := 0.0
	for _, row := range table.Read(t, reference+"angle_three.csv") {
		r := byAxis(sequenceOf(t, row.Text("order"), false))
		where := row.Text("order") + " " + row.Text("label")
		q := quaternion(row)
		assert.LessOrEqual(t, rotor.Angle(r.Rotor(degrees(row, "x_deg", "y_deg", "z_deg")), q), outside, where)

		got, back := r.Numbers(q), degrees(row, "bqx_deg", "bqy_deg", "bqz_deg")
		assert.LessOrEqual(t, rotor.Angle(r.Rotor(got.Numbers()), q), outside, where)
		miss := rotor.Angle(r.Rotor(back), q)
		assert.InDelta(t, row.Number("bq_roundtrip_chord"), miss, 1e-7, where)
		missed = math.Max(missed, miss)
		if !strings.Contains(row.Text("label"), "singular") {
			for k, want := range back {
				assert.InDelta(t, 0, angle.Wrap(got.Numbers()[k]-want), 1e-13, where)
			}
		}
	}
	assert.InDelta(t, 0.00684, missed/deg, 1e-5, "the row of angle_disagreements.csv")
}

// readingOf is what one call of a library means by its three arguments.
func readingOf(t testing.TB, library, call string) angle.Reading {
	for _, row := range table.Read(t, reference+"angle_call_meaning.csv") {
		if row.Text("library") == library && row.Text("call") == call {
			r := angle.Reading{Seq: sequenceOf(t, row.Text("intrinsic_seq"), false)}
			_, err := fmt.Sscan(row.Text("args_for_axes"), &r.Order[0], &r.Order[1], &r.Order[2])
			require.NoError(t, err)
			for k := range r.Order {
				r.Order[k]--
			}
			require.True(t, r.Valid())
			return r
		}
	}
	t.Fatalf("no meaning of %s %s", library, call)
	return angle.Reading{}
}

// TestGLMatrix: gl-matrix 3.4.4, seven orders of arguments x, y, z.
func TestGLMatrix(t *testing.T) {
	for _, row := range table.Read(t, reference+"angle_glmatrix.csv") {
		r := readingOf(t, "gl-matrix", "quat.fromEuler(x,y,z,"+row.Text("order")+")")
		n := degrees(row, "x_deg", "y_deg", "z_deg")
		assert.LessOrEqual(t, rotor.Angle(r.Rotor(n), quaternion(row)), outside, "%v %v", r, n)
		assert.Equal(t, byAxis(r.Seq), r, "keyed by axis")
	}
}

// TestRobotics: thirteen calls of tf2, Bullet, KDL and assimp.
func TestRobotics(t *testing.T) {
	calls := map[string]bool{}
	for _, row := range table.Read(t, reference+"angle_robotics.csv") {
		call := row.Text("library") + " " + row.Text("call")
		calls[call] = true
		r := readingOf(t, row.Text("library"), row.Text("call"))
		n := degrees(row, "arg1_deg", "arg2_deg", "arg3_deg")
		assert.LessOrEqual(t, rotor.Angle(r.Rotor(n), quaternion(row)), outside, "%s %v", call, n)
	}
	assert.Len(t, calls, 13)
}

// TestERFA: ERFA's axis turns are passive and multiply on the left, so that
// their product is the transpose of turns about moving axes.
func TestERFA(t *testing.T) {
	for _, row := range table.Read(t, reference+"matrix_erfa_turns.csv") {
		axis := angle.Axis(strings.Index("xyz", row.Text("function")[1:]))
		s := fixed(axis, (axis+1)%3, axis)
		passive := matrixOf(s.Rotor(row.Number("angle_deg")*deg, 0, 0)).Transpose()
		where := row.Text("function") + " " + row.Text("angle_deg")
		assert.Less(t, passive.Sub(matrixIn(row, "m")).Norm(), outside, where)
		assert.Less(t, passive.Mul(matrixIn(row, "basem")).Sub(matrixIn(row, "outm")).Norm(), outside, where)
	}
}
