package rules

import (
	"fmt"
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"dextral/core/convention"
	"dextral/core/rotor"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// declared makes the last claim of a value one of dextral.toml.
func declared(v *Value) *Value {
	v.Claims[len(v.Claims)-1].Source = Declaration
	return v
}

// placed gives every number a place, as readers do.
func placed(v *Value) *Value {
	for i := range v.Numbers {
		v.Numbers[i].Place = Place{Path: v.Place.Path, Line: v.Place.Line, Column: 10 * (i + 1)}
	}
	return v
}

func texts(v *Value) string {
	var all []string
	for _, n := range v.Numbers {
		all = append(all, n.Text)
	}
	return strings.Join(all, " ")
}

// matrixOf is the active matrix of a unit quaternion w x y z, row by row, by the
// textbook formula (common practice, no source).
func matrixOf(q [4]float64) [9]float64 {
	w, x, y, z := q[0], q[1], q[2], q[3]
	return [9]float64{1 - 2*(y*y+z*z), 2 * (x*y - w*z), 2 * (x*z + w*y), 2 * (x*y + w*z), 1 - 2*(x*x+z*z), 2 * (y*z - w*x), 2 * (x*z - w*y), 2 * (y*z + w*x), 1 - 2*(x*x+y*y)}
}

func randomQuaternion(g *rand.Rand) [4]float64 {
	var q [4]float64
	n := 0.0
	for i := range q {
		q[i] = g.NormFloat64()
		n += q[i] * q[i]
	}
	for i := range q {
		q[i] /= math.Sqrt(n)
	}
	return q
}

func five(numbers ...float64) string {
	var all []string
	for _, x := range numbers {
		all = append(all, fmt.Sprintf("%.5f", x))
	}
	return strings.Join(all, " ")
}

// editsOf are the edits that a group of values is offered.
func editsOf(values ...*Value) []*Edit {
	var all []*Edit
	for _, f := range CheckValues(values) {
		if f.Edit != nil {
			all = append(all, f.Edit)
		}
	}
	return all
}

// Numbers in the other order than the one declared are put into it where a twin
// that knows no such order shows it, digit for digit; and never otherwise.
func TestOrderIsSettledByDeclarationAndTwin(t *testing.T) {
	g := rand.New(rand.NewPCG(7, 1))
	offered := 0
	for range 300 {
		q := randomQuaternion(g)
		m := matrixOf(q)
		twin := func() *Value { return value(convention.Rotation, five(m[:]...), convention.RowMajor) }
		first := five(q[0], q[1], q[2], q[3])
		wrong := func() *Value { return placed(value(convention.Quaternion, first, convention.ScalarLast)) }
		for _, e := range editsOf(declared(wrong()), twin()) {
			offered++
			assert.Equal(t, five(q[1], q[2], q[3], q[0]), strings.Join(e.Now, " "))
			assert.Equal(t, first, strings.Join(e.Was, " "))
			assert.Contains(t, e.Why, "the declaration fixes scalar last")
		}
		assert.Empty(t, editsOf(wrong(), twin()), "a comment is not enough")
		assert.Empty(t, editsOf(declared(wrong())), "nor is a declaration without a twin")
		right := value(convention.Quaternion, first, convention.ScalarFirst)
		assert.Empty(t, editsOf(declared(placed(right)), twin()))
		other := value(convention.Quaternion, first, convention.ScalarFirst)
		assert.Empty(t, editsOf(declared(wrong()), other), "of two quaternions either may be wrong")
		named := declared(wrong())
		named.Claims[len(named.Claims)-1].Text = ComponentText + "w, x, y, z"
		assert.Empty(t, editsOf(named, twin()), "named components stand in no order")
		disputed := declared(wrong())
		disputed.Claims = append(disputed.Claims, Claim{Says: convention.ScalarFirst, Source: Comment, Text: "w x y z"})
		assert.Empty(t, editsOf(disputed, twin()), "where a comment says what the numbers say, that is the question")
	}
	assert.Greater(t, offered, 270, "most random rotations settle it")
}

// Where the numbers cannot tell, nothing is offered.
func TestSpecialNumbersSettleNothing(t *testing.T) {
	for _, q := range [][4]float64{{1, 0, 0, 0}, {0.5, 0.5, 0.5, 0.5}, {math.Sqrt2 / 2, 0, 0, math.Sqrt2 / 2}, {0, 1, 0, 0}} {
		m := matrixOf(q)
		v := declared(placed(value(convention.Quaternion, five(q[:]...), convention.ScalarLast)))
		for _, e := range editsOf(v, value(convention.Rotation, five(m[:]...), convention.RowMajor)) {
			assert.Equal(t, five(q[1], q[2], q[3], q[0]), strings.Join(e.Now, " "), "%v", q)
		}
	}
}

// A flat matrix in the other order than declared is not transposed: it may as well
// be the reverse that is meant.
func TestFlatMatrixIsNotReordered(t *testing.T) {
	g := rand.New(rand.NewPCG(7, 2))
	d := convention.Direction{To: "body", From: "cam"}
	for range 50 {
		q := randomQuaternion(g)
		m := matrixOf(q)
		flat := declared(placed(value(convention.Rotation, five(m[:]...), d, convention.ColumnMajor)))
		twin := value(convention.Quaternion, five(q[:]...), d, convention.ScalarFirst)
		require.NotEmpty(t, CheckValues([]*Value{flat, twin}))
		assert.Empty(t, editsOf(flat, twin))
	}
}

// Normalising is offered up to the uncertainty, not beyond, keeps the digits of
// the file, and leaves nothing to find.
func TestNormalisedWithinTolerance(t *testing.T) {
	g := rand.New(rand.NewPCG(7, 3))
	const uncertainty = 0.01
	for range 300 {
		q := randomQuaternion(g)
		n := 1 + 0.02*(2*g.Float64()-1)
		v := placed(value(convention.Quaternion, five(n*q[0], n*q[1], n*q[2], n*q[3]), convention.ScalarFirst))
		v.Uncertainty = uncertainty
		found := CheckValues([]*Value{v})
		off := math.Abs(norm(v.Floats()) - 1)
		if off <= v.precision().Norm(4, 1) {
			assert.Empty(t, found)
			continue
		}
		require.Len(t, found, 1)
		if moved := 2 * math.Asin(off); moved > uncertainty {
			assert.Nil(t, found[0].Edit, "%v moves by up to %v", n, moved)
			continue
		}
		e := found[0].Edit
		require.NotNil(t, e, "%v", n)
		w := value(convention.Quaternion, strings.Join(e.Now, " "), convention.ScalarFirst)
		assert.Empty(t, CheckValues([]*Value{w}))
		for i, text := range e.Now {
			assert.Len(t, strings.TrimLeft(text, "-"), 7, "five digits behind the point stay")
			assert.InDelta(t, q[i], w.Numbers[i].Value, 3e-5)
		}
		v.Uncertainty = 0
		assert.Nil(t, CheckValues([]*Value{v})[0].Edit, "without a declaration a typing error is as likely")
	}
}

// Numbers that are declared to be double and are good to float32 only.
func TestNormalisedFromFloat32(t *testing.T) {
	q := rotor.FromRotationVector(rotor.Vec{X: 0.3, Y: -0.5, Z: 0.2})
	w, x, y, z := q.Quaternion()
	text := fmt.Sprintf("%.17f %.17f %.17f %.17f", float64(float32(w)), float64(float32(x)), float64(float32(y)), float64(float32(z)))
	v := placed(value(convention.Quaternion, text, convention.ScalarFirst))
	v.Double = true
	found := CheckValues([]*Value{v})
	require.Len(t, found, 1)
	require.NotNil(t, found[0].Edit)
	fixed := value(convention.Quaternion, strings.Join(found[0].Edit.Now, " "), convention.ScalarFirst)
	fixed.Double = true
	assert.Empty(t, CheckValues([]*Value{fixed}))
	assert.Equal(t, text, texts(v), "the value itself is not changed")
}

// Where a writer drops zeros, 0.5 has as many digits as the others, and gets them.
func TestNormalisedWithDroppedZeros(t *testing.T) {
	v := placed(value(convention.Rotation, "0.5019999999999999 -0.5 0.7071067811865476 0.7071067811865476 0.7071067811865476 0. -0.5 0.5 0.7071067811865476", convention.RowMajor))
	v.Uncertainty = 0.01
	found := CheckValues([]*Value{v})
	require.Len(t, found, 1)
	require.NotNil(t, found[0].Edit)
	now := value(convention.Rotation, strings.Join(found[0].Edit.Now, " "), convention.RowMajor)
	assert.Empty(t, CheckValues([]*Value{now}))
	assert.Len(t, strings.TrimPrefix(now.Numbers[1].Text, "-"), 18)
}

func TestRestyle(t *testing.T) {
	for _, c := range []struct {
		like string
		x    float64
		want string
	}{
		{"0.7071", 0.70705, "0.7070"}, {"-0.7071", -0.7, "-0.7000"}, {"+0.50", 0.499, "+0.50"}, {".7071", 0.7, ".7000"},
		{"-.7071", -0.7, "-.7000"}, {"1", 0.9996, "0.9996"}, {"1.", 0.9996, "0.9996"}, {"0", 0, "0"}, {"-0.0", 0, "-0.0"},
		{"1.250e-3", 0.0012511, "1.251e-3"}, {"-1.25E+02", -125.4, "-1.25E+02"}, {"7.07D-01", 0.708, "7.08D-01"},
		{"-0.001", -0.0001, "0.000"}, {"0x1p-3", 0.3, ""}, {"1_0.5", 0.3, ""}, {"1e", 0.3, ""},
	} {
		assert.Equal(t, c.want, restyle(c.like, c.x, 1, 4), c.like)
	}
	assert.Equal(t, "0.50049", restyle("0.5", 0.50049, 5, 5))
	assert.Equal(t, "5.0049e-1", restyle("5e-1", 0.50049, 4, 4))
}
