package identify

import (
	"math"
	"testing"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/core/rotor"

	"github.com/stretchr/testify/assert"
)

func label(t *testing.T, text string) *angle.Label {
	t.Helper()
	l, err := angle.ParseLabel(text, [3]angle.Role{})
	if err != nil {
		t.Fatal(err)
	}
	return &l
}

func quaternionOf(r rotor.Rotor, scalar convention.ScalarPlace) Statement {
	w, x, y, z := r.Quaternion()
	n := []float64{w, x, y, z}
	if scalar == convention.ScalarLast {
		n = []float64{x, y, z, w}
	}
	return Statement{Form: convention.Quaternion, Numbers: n, Tolerance: 1e-6, Claim: Claim{Scalar: scalar}}
}

func TestSlipsAreTold(t *testing.T) {
	moving := angle.Sequence{Axes: [3]angle.Axis{angle.Z, angle.Y, angle.X}}
	deg := math.Pi / 180
	r := moving.Rotor(102*deg, 20*deg, 14*deg)
	angles := Statement{Form: convention.Angles, Numbers: []float64{102, 20, 14}, Tolerance: 1e-6,
		Claim: Claim{Unit: convention.Degree, Label: label(t, "z-y'-x''")}}
	q := quaternionOf(r, convention.ScalarFirst)

	res := Same(angles, q)
	assert.Equal(t, Agree, res.Verdict, "%+v", res)

	wrong := angles
	wrong.Claim.Label = label(t, "intrinsic xyz")
	t.Log(Same(wrong, q).Best, Same(wrong, q))
	wrong.Claim.Label = label(t, "z-y-x fixed axes")
	res = Same(wrong, q)
	t.Log(res.Verdict, res.Best, res.Next, res.Margin)
	assert.Equal(t, []Change{MovingFixed}, res.Best.Changes)
	wrong = angles
	wrong.Claim.Unit = convention.Radian
	res = Same(wrong, q)
	assert.Equal(t, []Change{UnitSlip}, res.Best.Changes)
	wrong = angles
	wrong.Numbers = []float64{102, -20, 14}
	res = Same(wrong, q)
	assert.Equal(t, []Change{AngleSign}, res.Best.Changes)
	t.Log(res.Verdict, res.Best, res.Next, res.Margin)
	last := q
	last.Claim.Scalar = convention.ScalarLast
	res = Same(angles, last)
	assert.Equal(t, Contradicted, res.Verdict)
	t.Log(res.Verdict, res.Best, res.Next, res.Margin)
	assert.Equal(t, []Change{ScalarOrder}, res.Best.Changes)
	q.Numbers[2] = -q.Numbers[2]
	res = Same(angles, q)
	t.Log(res.Verdict, res.Best, res.Next, res.Reason)
	for _, c := range res.Classes {
		t.Log(c, c.Residual)
	}
	rr := quaternionOf(cubes[5].Mul(r), convention.ScalarFirst)
	res = Same(angles, rr)
	t.Log(res.Verdict, res.Best, res.Next, res.Reason)
	rr = quaternionOf(r.Mul(r), convention.ScalarFirst)
	res = Same(angles, rr)
	t.Log(res.Verdict, res.Best, res.Next, res.Reason)
	rr = quaternionOf(r.Mul(rotor.FromRotationVector(rotor.Vec{X: 0.3, Y: 0.3, Z: 0.1})), convention.ScalarFirst)
	res = Same(angles, rr)
	t.Log(res.Verdict, res.Best, res.Next, res.Reason)
	for _, c := range res.Classes {
		t.Log(c, c.Residual, c.Cost)
	}
}

func BenchmarkUnexplained(b *testing.B) {
	l, _ := angle.ParseLabel("z-y'-x''", [3]angle.Role{})
	angles := Statement{Form: convention.Angles, Numbers: []float64{102, 20, 14}, Tolerance: 1e-6,
		Claim: Claim{Unit: convention.Degree, Label: &l}}
	q := Statement{Form: convention.Quaternion, Numbers: []float64{.1, .2, .3, .4}, Tolerance: 1e-6}
	b.ReportAllocs()
	for b.Loop() {
		Same(angles, q)
	}
}
