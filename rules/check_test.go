package rules

import (
	"fmt"
	"math"
	"math/rand/v2"
	"strconv"
	"strings"
	"testing"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/core/matrix"
	"dextral/core/rotor"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// value makes a value of a form out of the text of its numbers, claimed by a
// word (Label) and with further claims of the same strength.
func value(form convention.Form, text string, says ...convention.Term) *Value {
	v := &Value{Form: form, Key: "mount." + strings.ReplaceAll(form.String(), " ", "_"), Of: "mount"}
	v.Place = Place{Path: "mount.yaml", Line: int(form) + 1, Column: 3}
	for _, word := range strings.Fields(text) {
		x, err := strconv.ParseFloat(word, 64)
		if err != nil {
			panic(err)
		}
		v.Numbers = append(v.Numbers, Number{Text: word, Value: x})
	}
	switch n := len(v.Numbers); n {
	case 9:
		v.Rows, v.Cols = 3, 3
	case 12:
		v.Rows, v.Cols = 3, 4
	case 16:
		v.Rows, v.Cols = 4, 4
	}
	for _, s := range append([]convention.Term{form}, says...) {
		v.Claims = append(v.Claims, Claim{Says: s, Source: Label})
	}
	return v
}

// inferred weakens all claims to customs of naming.
func inferred(v *Value) *Value {
	for i := range v.Claims {
		v.Claims[i].Source = Name
	}
	return v
}

func label(t *testing.T, text string) angle.Label {
	t.Helper()
	l, err := angle.ParseLabel(text, [3]angle.Role{})
	require.NoError(t, err)
	return l
}

// printed writes numbers with so many decimals.
func printed(decimals int, x ...float64) string {
	var words []string
	for _, a := range x {
		words = append(words, strconv.FormatFloat(a, 'f', decimals, 64))
	}
	return strings.Join(words, " ")
}

func rules(found []*Finding) string {
	var names []string
	for _, f := range found {
		names = append(names, f.Level.String()+" "+f.Rule)
	}
	return strings.Join(names, "; ")
}

const (
	mirror = "1 0 0 0 1 0 0 0 -1"
)

// TestSingleValues holds what is reported on one value and, in the rows
// without a rule, what must stay silent.
func TestSingleValues(t *testing.T) {
	q, m := convention.Quaternion, convention.Rotation
	for _, c := range []struct {
		name string
		v    *Value
		want string
	}{
		{"unit by its digits", value(q, "0.7071 0 0 0.7071", convention.ScalarLast), ""},
		{"three decimals", value(q, "0.146 0.354 0.354 0.854"), ""},
		{"one digit dropped", value(q, "0.707 0 0 0.0707", convention.ScalarLast), "error rotor-not-unit"},
		{"norm two", value(q, "1 1 1 1", convention.ScalarLast), "error rotor-not-unit"},
		{"inferred by a short name", inferred(value(q, "1 1 1 1")), "warning rotor-not-unit"},
		{"unset", value(q, "0 0 0 0"), "note orientation-unset"},
		{"unset by NaN", value(q, "NaN NaN NaN NaN"), ""},
		{"one NaN", value(q, "1 0 NaN 0"), "error not-finite"},
		{"identity", value(m, "1 0 0 0 1 0 0 0 1"), ""},
		{"mirror", value(m, mirror), "error mirrored-rotation"},
		{"mirror without a claim", value(convention.Matrix, mirror), ""},
		{"two rows exchanged", value(m, "0 1 0 1 0 0 0 0 1"), "error mirrored-rotation"},
		{"scaled by 25.4", value(m, "25.4 0 0 0 25.4 0 0 0 25.4"), "error matrix-not-orthonormal"},
		{"one sign lost", value(m, "0.8660 0.5 0 0.5 0.8660 0 0 0 1"), "error matrix-not-orthonormal"},
		{"first order", value(m, "1 -0.0200 0.0100 0.0200 1 -0.0300 -0.0100 0.0300 1"), "note first-order-angles"},
		{"first order, as far as two decimals tell a rotation", value(m, "1 -0.02 0.01 0.02 1 -0.03 -0.01 0.03 1"), ""},
		{"zero matrix", value(m, "0 0 0 0 0 0 0 0 0"), "note orientation-unset"},
		{"rigid transform", value(convention.Transform, "0 -1 0 10.123 1 0 0 -3 0 0 1 0.5 0 0 0 1"), ""},
		{"mirroring transform", value(convention.Transform, "1 0 0 10 0 1 0 20 0 0 -1 30"), "error mirrored-rotation"},
		{"unit axis", value(convention.Axis, "0 0.6 0.8"), ""},
		{"long axis", value(convention.Axis, "1 1 0"), "error axis-not-unit"},
		{"left-handed triad that claims right", value(convention.Triad, "1 0 0 0 1 0 0 0 -1", convention.RightHanded), "error left-handed-triad"},
		{"left-handed triad that says so", value(convention.Triad, "1 0 0 0 1 0 0 0 -1", convention.LeftHanded), ""},
		{"triad without a claim", value(convention.Triad, "1 0 0 0 1 0 0 0 -1"), ""},
		{"right-handed triad that claims left", value(convention.Triad, "1 0 0 0 1 0 0 0 1", convention.LeftHanded), "error left-handed-triad"},
		{"NED from ENU", value(convention.AxisMap, "0 1 0 1 0 0 0 0 -1"), ""},
		{"NEU from ENU", value(convention.AxisMap, "0 1 0 1 0 0 0 0 1"), "error mirroring-axis-map"},
		{"map to a left-handed frame", value(convention.AxisMap, "0 1 0 1 0 0 0 0 1", convention.LeftHanded), ""},
		{"two scalar places", value(q, "0.5 0.5 0.5 0.5", convention.ScalarFirst, convention.ScalarLast), "error claims-conflict"},
		{"bare and full label that can both hold", value(convention.Angles, "10 20 30", label(t, "ZYX"), label(t, "z-y'-x''")), ""},
		{"labels that exclude each other", value(convention.Angles, "10 20 30", label(t, "x-y'-z''"), label(t, "z-y'-x''")), "error claims-conflict"},
	} {
		t.Run(c.name, func(t *testing.T) {
			found := checkOne(c.v)
			assert.Equal(t, c.want, rules(found))
			for _, f := range found {
				assert.NotEmpty(t, f.Evidence, "a finding without evidence is an opinion")
			}
		})
	}
}

// TestUndecidedStaysSilent: what cannot be read is not judged.
func TestUndecidedStaysSilent(t *testing.T) {
	v := value(convention.Rotation, mirror)
	v.Why = "nothing says that it is a rotation"
	assert.Empty(t, checkOne(v))
}

// TestRoundedRotationsAreSilent: every rotation written with d decimals is a
// rotation as far as its digits show, and every mirror of it is not.
func TestRoundedRotationsAreSilent(t *testing.T) {
	rnd := rand.New(rand.NewPCG(11, 3))
	for range 2000 {
		r := randomRotor(rnd)
		m := matrix.FromRotor(r)
		w, x, y, z := r.Quaternion()
		for d := 2; d <= 9; d++ {
			nine := printed(d, flat(m)...)
			require.Empty(t, checkOne(value(convention.Rotation, nine)), nine)
			require.Empty(t, checkOne(value(convention.Quaternion, printed(d, w, x, y, z))))
			for row := range 3 {
				mirrored := m
				for j := range 3 {
					mirrored[row][j] *= -1
				}
				require.Equal(t, "error mirrored-rotation", rules(checkOne(value(convention.Rotation, printed(d, flat(mirrored)...)))))
			}
		}
	}
}

func randomRotor(rnd *rand.Rand) rotor.Rotor {
	r, _ := rotor.FromQuaternion(rnd.NormFloat64(), rnd.NormFloat64(), rnd.NormFloat64(), rnd.NormFloat64()).Unit()
	return r
}

func flat(m matrix.Mat3) []float64 {
	var nine []float64
	for _, row := range m {
		nine = append(nine, row[:]...)
	}
	return nine
}

// TestMatrixFormulaExcess compares the formula in closed form with the matrix
// that a program would build.
func TestMatrixFormulaExcess(t *testing.T) {
	for _, n := range []float64{0.9, 0.999, 1, 1.01, 1.3} {
		for half := 1.0; half < 180; half += 7 {
			h := half * math.Pi / 180
			w, u := n*math.Cos(h), n*math.Sin(h)
			// About z: row 0 of 1 + 2 w [u] + 2 [u][u] is (1 - 2 u^2, -2 w u, 0).
			turned := math.Atan2(2*w*u, 1-2*u*u)
			want := math.Remainder(turned-2*h, 2*math.Pi)
			assert.InDelta(t, want, matrixFormulaExcess(w, n), 1e-12, "n=%g half=%g", n, half)
		}
	}
	assert.InDelta(t, 0, worstMatrixFormulaExcess(1), 1e-12)
}

// TestTwins holds which rule names each way in which two statements of one
// orientation can contradict each other. The orientation is generic.
func TestTwins(t *testing.T) {
	moving := label(t, "z-y'-x''")
	yaw, pitch, roll := 40.0, -25.0, 65.0
	r := moving.Readings[0].Rotor([3]float64{yaw * math.Pi / 180, pitch * math.Pi / 180, roll * math.Pi / 180})
	w, x, y, z := r.Quaternion()
	m := matrix.FromRotor(r)
	first, last := printed(6, w, x, y, z), printed(6, x, y, z, w)
	angles := printed(3, yaw, pitch, roll)
	other := angle.Sequence{Axes: moving.Readings[0].Seq.Axes, Fixed: true}.Angles(r)
	fixed := printed(3, other.A*180/math.Pi, other.B*180/math.Pi, other.C*180/math.Pi)
	q, a, rot := convention.Quaternion, convention.Angles, convention.Rotation
	ab, ba := convention.Direction{To: "body", From: "cam"}, convention.Direction{To: "cam", From: "body"}
	for _, c := range []struct {
		name string
		a, b *Value
		want string
	}{
		{"agree", value(q, first, convention.ScalarFirst), value(a, angles, moving, convention.Degree), ""},
		{"agree, sign changed", value(q, printed(6, -w, -x, -y, -z), convention.ScalarFirst), value(a, angles, moving, convention.Degree), ""},
		{"agree, scalar place unstated", value(q, last), value(a, angles, moving, convention.Degree), ""},
		{"agree, a bare label of either kind", value(q, first, convention.ScalarFirst), value(a, fixed, label(t, "ZYX"), convention.Degree), ""},
		{"agree, turned twice about", value(q, first, convention.ScalarFirst), value(a, printed(3, yaw+360, pitch, roll), moving, convention.Degree), ""},
		{"scalar at the other end", value(q, last, convention.ScalarFirst), value(rot, printed(6, flat(m)...)), "error scalar-misplaced"},
		{"fixed for moving", value(q, first, convention.ScalarFirst), value(a, fixed, moving, convention.Degree), "error moving-fixed-swapped"},
		{"another order", value(q, first, convention.ScalarFirst), value(a, angles, label(t, "x-y'-z''"), convention.Degree), "error sequence-mislabelled"},
		{"radians called degrees", value(q, first, convention.ScalarFirst), value(a, printed(6, yaw*math.Pi/180, pitch*math.Pi/180, roll*math.Pi/180), moving, convention.Degree), "error angle-unit-wrong"},
		{"reverse, both directions stated", value(q, first, convention.ScalarFirst, ab), value(rot, printed(6, flat(m.Transpose())...), ab), "error direction-reversed"},
		{"reverse, opposite directions stated", value(q, first, convention.ScalarFirst, ab), value(rot, printed(6, flat(m.Transpose())...), ba), ""},
		{"reverse, no direction stated", value(q, first, convention.ScalarFirst), value(rot, printed(6, flat(m.Transpose())...)), "note direction-reversed"},
		{"unrelated", value(q, "0.5 0.5 -0.5 0.5", convention.ScalarFirst), value(rot, printed(6, flat(m)...)), "error representations-differ"},
		{"identity fits everything", value(q, "0 0 0 1"), value(a, "0 0 0", label(t, "ZYX")), ""},
	} {
		t.Run(c.name, func(t *testing.T) {
			found := CheckValues([]*Value{c.a, c.b})
			assert.Equal(t, c.want, rules(found))
			for _, f := range found {
				assert.NotEmpty(t, f.Evidence)
				assert.NotEmpty(t, f.Related)
			}
		})
	}
}

// TestOneWrongAmongThree: the value that disagrees with two others is the one
// reported, wherever it stands.
func TestOneWrongAmongThree(t *testing.T) {
	rnd := rand.New(rand.NewPCG(5, 8))
	r := randomRotor(rnd)
	w, x, y, z := r.Quaternion()
	axis, turn := r.AxisAngle()
	wrong := randomRotor(rnd)
	good := []*Value{
		value(convention.Quaternion, printed(6, w, x, y, z), convention.ScalarFirst),
		value(convention.RotationVector, printed(6, axis.X*turn, axis.Y*turn, axis.Z*turn), convention.Radian),
	}
	bad := value(convention.Rotation, printed(6, flat(matrix.FromRotor(wrong))...))
	for line := range 3 {
		bad.Place.Line = line * 10
		found := CheckValues(append([]*Value{bad}, good...))
		require.Len(t, found, 1)
		assert.Equal(t, bad.Key, found[0].Key)
	}
}

// TestFingerprint does not depend on lines and numbers, but on rule, file,
// place in the structure and claim.
func TestFingerprint(t *testing.T) {
	f := Finding{Rule: SignJump, Place: Place{Path: "a.csv", Line: 3}, Key: "q", Claim: "rotation", Message: "12 deg"}
	g := f
	g.Place.Line, g.Message, g.Evidence = 9, "13 deg", []Evidence{{What: "norm"}}
	assert.Equal(t, f.Fingerprint(), g.Fingerprint())
	for i, change := range []func(*Finding){
		func(h *Finding) { h.Rule = NormLoss }, func(h *Finding) { h.Place.Path = "b.csv" },
		func(h *Finding) { h.Key = "p" }, func(h *Finding) { h.Claim = "unit" },
	} {
		h := f
		change(&h)
		assert.NotEqual(t, f.Fingerprint(), h.Fingerprint(), fmt.Sprint("change ", i))
	}
}

func TestZeroAxis(t *testing.T) {
	zero := value(convention.AxisAngle, "0 0 0 0.5", convention.Radian)
	assert.Equal(t, "error axis-not-unit", rules(CheckValues([]*Value{zero})))
	open := value(convention.AxisAngle, "0 0 0 0", convention.Radian)
	assert.Equal(t, "note orientation-unset", rules(CheckValues([]*Value{open})))
}

func TestBottomRow(t *testing.T) {
	const upper = "1.0 0.0 0.0 0.2 0.0 1.0 0.0 0.3 0.0 0.0 1.0 0.4 "
	for text, want := range map[string]string{
		upper + "0 0 0 1": "", upper + "0.0 0.0 0.0 1.0": "", upper + "1e-9 0 0 0.9999999": "",
		"1 0 0 0 0 1 0 0 0 0 1 0 0.2 0.3 0.4 1": "", // a flat list may be filled column by column
		upper + "0 0 0 2":                       "error bottom-row-wrong",
		upper + "0 0 0 0":                       "error bottom-row-wrong",
		upper + "0 0 1 0":                       "error bottom-row-wrong",
	} {
		assert.Equal(t, want, rules(CheckValues([]*Value{value(convention.Transform, text)})), text)
	}
	assert.Equal(t, "warning bottom-row-wrong", rules(CheckValues([]*Value{inferred(value(convention.Transform, upper+"0 0 0 2"))})))
	for row, says := range map[string]string{"0 0 0 0": "no inverse", "0 0 0 2": "divided by 2", "0 0 1 0": "as a projection does"} {
		assert.Contains(t, CheckValues([]*Value{value(convention.Transform, upper+row)})[0].Message, says)
	}
	nested := value(convention.Transform, "1 0 0 0 0 1 0 0 0 0 1 0 0.2 0.3 0.4 1")
	nested.Nested = true
	assert.Equal(t, "note bottom-row-wrong", rules(CheckValues([]*Value{nested})))
}

// A map between a right-handed and a left-handed frame, as declared, must mirror.
func TestDeclaredHands(t *testing.T) {
	declared := func(form convention.Form, text string, hand convention.Hand) *Value {
		v := value(form, text)
		v.Claims = append(v.Claims, Claim{Says: hand, Source: Declaration})
		return v
	}
	const plain = "1 0 0 0 1 0 0 0 1"
	for _, form := range []convention.Form{convention.Rotation, convention.AxisMap} {
		assert.Empty(t, CheckValues([]*Value{declared(form, mirror, convention.LeftHanded)}))
		assert.Empty(t, CheckValues([]*Value{declared(form, plain, convention.RightHanded)}))
		assert.Equal(t, "error mirroring-axis-map", rules(CheckValues([]*Value{declared(form, plain, convention.LeftHanded)})))
		assert.NotEmpty(t, CheckValues([]*Value{declared(form, mirror, convention.RightHanded)}))
	}
}

// A neighbouring key that contradicts a comment or label on the unit is noted; beside a
// declaration, which is there to correct it, it is not.
func TestNeighbourConflict(t *testing.T) {
	for source, want := range map[Source]string{Comment: "note claims-conflict", Label: "note claims-conflict", Declaration: "", Name: ""} {
		v := value(convention.Angles, "0.1 0.2 0.3", label(t, "z-y'-x''"))
		v.Claims = append(v.Claims, Claim{Says: convention.Degree, Source: source, Text: "degrees"}, Claim{Says: convention.Radian, Source: Sibling, Text: "units: rad"})
		assert.Equal(t, want, rules(CheckValues([]*Value{v})), source)
	}
}
