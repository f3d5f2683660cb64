package identify

import (
	"math"
	"testing"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/core/rotor"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// tern is the attitude of the survey aircraft in the README: yaw 102, pitch 20, roll 14 degrees.
var tern = angle.Sequence{Axes: [3]angle.Axis{angle.Z, angle.Y, angle.X}}.Rotor(102*math.Pi/180, 20*math.Pi/180, 14*math.Pi/180)

func label(t testing.TB, text string, roles ...angle.Role) *angle.Label {
	t.Helper()
	var r [3]angle.Role
	copy(r[:], roles)
	l, err := angle.ParseLabel(text, r)
	require.NoError(t, err)
	return &l
}

func ternAngles(t testing.TB) Statement {
	return Statement{
		Form: convention.Angles, Numbers: []float64{102, 20, 14}, Tolerance: 1e-6,
		Claim: Claim{Unit: convention.Degree, Label: label(t, "z-y'-x''")},
	}
}

func matrixOf(r rotor.Rotor) Statement {
	return Statement{Form: convention.Rotation, Numbers: write(convention.Rotation, r, Claim{}), Tolerance: 1e-6}
}

func TestAgreement(t *testing.T) {
	r := Same(ternAngles(t), quaternion(tern))
	assert.Equal(t, Agree, r.Verdict)
	assert.True(t, r.Decided)
	assert.Less(t, r.Stated.Residual, 1e-12)
	assert.Greater(t, r.Margin, 100.0)
	assert.Equal(t, r.Stated, r.Best)
	assert.Empty(t, r.Best.Changes)
	assert.Equal(t, "with the angles read as z-y'-x'' (moving axes) in degrees, the quaternion's scalar first (w x y z)", r.Best.String())
}

func TestEverySlipIsTold(t *testing.T) {
	quarter, _ := rotor.FromAxisAngle(rotor.Vec{X: 1}, math.Pi/2)
	for _, c := range []struct {
		change Change
		words  string
		plant  func(a, q *Statement)
	}{
		{ScalarOrder, "with the quaternion's scalar first (w x y z)", func(_, q *Statement) { q.Claim.Scalar = convention.ScalarLast }},
		{UnitSlip, "with the angles read as z-y'-x'' (moving axes) in degrees", func(a, _ *Statement) { a.Claim.Unit = convention.Radian }},
		{MovingFixed, "with the angles read as z-y'-x'' (moving axes) in degrees", func(a, _ *Statement) { a.Claim.Label = label(t, "z-y-x fixed axes") }},
		{AngleOrder, "with the angles read as z-y'-x'' (moving axes) of numbers 2, 1, 3 in degrees", func(a, _ *Statement) { a.Numbers = []float64{20, 102, 14} }},
		{Sequence, "with the angles read as z-y'-x'' (moving axes) in degrees", func(a, _ *Statement) { a.Claim.Label = label(t, "y-x'-y''") }},
		{AngleSign, "with the angles read as z-y'-x'' (moving axes) with number 2 negated in degrees", func(a, _ *Statement) { a.Numbers[1] = -20 }},
		{HalfAngle, "with twice the turn of the first", func(_, q *Statement) { *q = quaternion(tern.Mul(tern)) }},
		{Remap, "with the axes of the result mapped x,y,z -> x,-z,y", func(_, q *Statement) { *q = quaternion(quarter.Mul(tern)) }},
	} {
		a, q := ternAngles(t), quaternion(tern)
		c.plant(&a, &q)
		r := Same(a, q)
		require.Equal(t, Contradicted, r.Verdict, "%s: %s", c.change, r.Reason)
		assert.True(t, r.Decided, c.change.String())
		assert.Equal(t, []Change{c.change}, r.Best.Changes)
		assert.Equal(t, c.change.Cost(), r.Best.Cost)
		assert.Equal(t, c.words, r.Best.String())
		assert.Greater(t, r.Stated.Residual, 0.1, c.change.String())
		swapped := Same(q, a)
		assert.Equal(t, r.Best.Cost, swapped.Best.Cost, "the order of the two does not matter: %s", c.change)
		assert.Equal(t, r.Verdict, swapped.Verdict)
	}
}

// Direction decides whether a reverse is a note or a contradiction.
func TestDirection(t *testing.T) {
	there := convention.Direction{To: "shore", From: "hull"}
	a, b := quaternion(tern), matrixOf(tern.Reverse())
	r := Same(a, b)
	assert.Equal(t, AgreeInverse, r.Verdict)
	assert.InDelta(t, tern.Mul(tern).TurnAngle(), r.Stated.Residual, 1e-9, "as one rotation they differ by this")
	assert.Less(t, r.Best.Residual, 1e-9)
	a.Claim.Direction = there
	assert.Equal(t, AgreeInverse, Same(a, b).Verdict, "one side states nothing")
	b.Claim.Direction = there.Reverse()
	assert.Equal(t, Agree, Same(a, b).Verdict, "stated as each other's reverse")
	b.Claim.Direction = there
	r = Same(a, b)
	assert.Equal(t, Contradicted, r.Verdict)
	assert.Equal(t, []Change{Inverse}, r.Best.Changes)
	a.Claim.Product = convention.Shuster
	assert.Equal(t, Agree, Same(a, b).Verdict, "Shuster's matrix of the same numbers is the transpose")
	b.Claim.Direction = convention.Direction{To: "mast", From: "keel"}
	assert.Equal(t, AgreeInverse, Same(a, b).Verdict, "other frames say nothing about these")
	b.Claim.Storage = convention.ColumnMajor
	assert.Equal(t, Agree, Same(a, b).Verdict, "stored by columns")
}

// A bare label is contradicted only when all that it may mean fails.
func TestBareLabels(t *testing.T) {
	fixed := angle.Sequence{Axes: [3]angle.Axis{angle.Z, angle.Y, angle.X}, Fixed: true}
	there := convention.Direction{To: "shore", From: "hull"}
	deg := math.Pi / 180
	for name, r := range map[string]rotor.Rotor{
		"moving": tern, "fixed": fixed.Rotor(102*deg, 20*deg, 14*deg),
		"reversed": tern.Reverse(), "keyed by axis": fixed.Rotor(14*deg, 20*deg, 102*deg),
	} {
		a, q := ternAngles(t), quaternion(r)
		a.Claim.Label = label(t, "ZYX")
		a.Claim.Direction, q.Claim.Direction = there, there
		assert.Contains(t, []Verdict{Agree, AgreeInverse}, Same(a, q).Verdict, name)
	}
	a, q := ternAngles(t), quaternion(tern)
	a.Claim.Label = label(t, "YXZ")
	assert.Equal(t, Contradicted, Same(a, q).Verdict)
}

func TestUnstatedUnitIsSettledByTheTwin(t *testing.T) {
	for _, unit := range units {
		a := ternAngles(t)
		for i := range a.Numbers {
			a.Numbers[i] *= math.Pi / 180 / unit.InRadians()
		}
		a.Claim.Unit = convention.UnitUnstated
		r := Same(a, quaternion(tern))
		require.Equal(t, Agree, r.Verdict)
		assert.True(t, r.Decided)
		assert.Equal(t, unit, r.Best.Readings[0].A.Unit)
	}
}

// The tolerance belongs to the unit that is claimed: numbers with few digits
// in radians are coarse if they should have been degrees, and the other way round.
func TestToleranceFollowsTheUnit(t *testing.T) {
	a := Statement{Form: convention.Angles, Numbers: []float64{1.780, 0.349, 0.244}, Claim: Claim{Unit: convention.Degree, Label: label(t, "z-y'-x''")}}
	a.Tolerance = decimals(3).precision.Angles(convention.Degree)
	r := Same(a, quaternion(tern))
	assert.Equal(t, Contradicted, r.Verdict, r.Reason)
	assert.Equal(t, []Change{UnitSlip}, r.Best.Changes)
}

func TestNamedComponentsAreNotReordered(t *testing.T) {
	a, b := quaternion(tern), matrixOf(tern)
	a.Claim.Scalar, a.Claim.Named = convention.ScalarLast, true
	r := Same(a, b)
	assert.Equal(t, 2, r.Best.Cost, "names would have to be wrong")
}

func TestMirrors(t *testing.T) {
	for i := range 3 {
		for j, step := range []int{1, 3} { // a row, a column
			m := matrixOf(tern)
			for k := range 3 {
				from := i
				if step == 1 {
					from = 3 * i
				}
				m.Numbers[from+k*step] *= -1
			}
			r := Same(quaternion(tern), m)
			require.Equal(t, Contradicted, r.Verdict, r.Reason)
			assert.Equal(t, []Change{Mirror}, r.Best.Changes)
			assert.Contains(t, r.Best.String(), []string{"row ", "column "}[j]+string(rune('1'+i))+" of the matrix negated")
			assert.Equal(t, math.Pi, r.Stated.Residual, "no rotation is near a mirror")
			assert.Equal(t, Agree, Same(m, m).Verdict, "two mirrors may be one map")
		}
	}
}

// Where distinct changes cannot be told apart, none is recommended.
func TestTies(t *testing.T) {
	there := convention.Direction{To: "shore", From: "hull"}
	turn := rotor.FromRotationVector(rotor.Vec{Z: 0.7})
	a := quaternion(turn)
	b := Statement{Form: convention.Angles, Numbers: []float64{0, 0, -0.7}, Tolerance: 1e-9, Claim: Claim{Unit: convention.Radian, Label: label(t, "x-y'-z''")}}
	a.Claim.Direction, b.Claim.Direction, a.Tolerance = there, there, 1e-9
	r := Same(a, b)
	assert.Equal(t, []Change{Inverse}, r.Best.Changes, "a sign of the angle or a map of axes would cost more")
	assert.Equal(t, Contradicted, r.Verdict)

	equal := ternAngles(t) // two equal numbers: which of them was exchanged with the third?
	equal.Numbers = []float64{25.3, 71.9, 25.3}
	zyx := equal.Claim.Label.Readings[0].Seq
	r = Same(equal, quaternion(zyx.Rotor(71.9*math.Pi/180, 25.3*math.Pi/180, 25.3*math.Pi/180)))
	assert.Equal(t, Contradicted, r.Verdict, r.Reason)
	assert.True(t, r.Best.Tie)
	assert.False(t, r.Decided)
	assert.Contains(t, r.Best.String(), "; or ")

	half := quaternion(rotor.FromRotationVector(rotor.Vec{Z: math.Pi / 2}))
	other := quaternion(rotor.FromRotationVector(rotor.Vec{X: math.Pi / 2}))
	r = Same(half, other) // two maps of axes: anything may have happened
	assert.Equal(t, Unexplained, r.Verdict)
	assert.False(t, r.Decided)
	assert.NotEmpty(t, r.Reason)
	assert.Greater(t, len(r.Classes), 1)
}

// Evidence that may be an accident decides nothing: one number, however many
// digits it has, supports one change, and whole degrees not even that.
func TestAccidentsDecideNothing(t *testing.T) {
	there := convention.Direction{To: "shore", From: "hull"}
	yaw := func(degrees float64) Statement {
		s := quaternion(rotor.FromRotationVector(rotor.Vec{Z: degrees * math.Pi / 180}))
		s.Claim.Direction, s.Tolerance = there, 1e-9
		return s
	}
	assert.Equal(t, Contradicted, Same(yaw(37.2519), yaw(-37.2519)).Verdict)
	assert.Equal(t, Unexplained, Same(yaw(45), yaw(-45)).Verdict, "a left and a right one, perhaps")
	assert.Equal(t, Unexplained, Same(yaw(37.2519), yaw(2*37.2519)).Verdict, "half angles need two numbers")
	assert.Equal(t, Unexplained, Same(yaw(37.2519), yaw(61.3)).Verdict)
	nearly := rotor.FromRotationVector(rotor.Vec{X: 1e-7, Y: 1.6e-7, Z: 0.65}) // what is below the tolerance is no number
	a, b := quaternion(nearly), quaternion(nearly.Mul(nearly))
	a.Tolerance, b.Tolerance = 4e-8, 4e-8
	assert.Equal(t, Unexplained, Same(a, b).Verdict)
}

// Of small angles a dearer reading may miss by less than the digits show. The
// cheapest is named, but it is not decided: here the order of the numbers was
// planted as well.
func TestRivals(t *testing.T) {
	a := Statement{
		Form: convention.Angles, Numbers: []float64{-0.611708, 1.929970, 0.006277},
		Claim: Claim{Unit: convention.Degree, Label: label(t, "x-y-x fixed axes")},
	}
	a.Tolerance = decimals(6).precision.Angles(convention.Degree)
	q := quaternion(rotor.FromQuaternion(0.999844, -0.005338, -0.000035, 0.016841))
	q.Tolerance = decimals(6).precision.Quaternion()
	r := Same(a, q)
	assert.Equal(t, Contradicted, r.Verdict, r.Reason)
	assert.Equal(t, []Change{Sequence}, r.Best.Changes)
	assert.False(t, r.Best.Tie)
	assert.False(t, r.Decided)
}

func TestCloseIsUndecided(t *testing.T) {
	a, b := quaternion(tern), quaternion(tern.Mul(rotor.FromRotationVector(rotor.Vec{X: 2.5e-6})))
	a.Tolerance, b.Tolerance = 0.5e-6, 0.5e-6
	r := Same(a, b)
	assert.Equal(t, Undecided, r.Verdict)
	assert.Contains(t, r.Reason, "little more than")
}

func TestOtherForms(t *testing.T) {
	v := tern.RotationVector()
	vector := Statement{Form: convention.RotationVector, Numbers: []float64{v.X, v.Y, v.Z}, Tolerance: 1e-7, Claim: Claim{Unit: convention.Radian}}
	assert.Equal(t, Agree, Same(vector, quaternion(tern)).Verdict)
	for kind, numbers := range map[Parameters]rotor.Vec{
		Gibbs: Gibbs.vector(tern, 0), MRP: MRP.vector(tern, 0), VectorPart: VectorPart.vector(tern, 0),
	} {
		s := vector
		s.Numbers = []float64{numbers.X, numbers.Y, numbers.Z}
		r := Same(s, quaternion(tern))
		require.Equal(t, Contradicted, r.Verdict, kind.String())
		assert.Equal(t, []Change{Kind}, r.Best.Changes)
		assert.Equal(t, kind, r.Best.Readings[0].A.Parameters)
	}
	axis, turn := tern.AxisAngle()
	pair := Statement{Form: convention.AxisAngle, Numbers: []float64{axis.X, axis.Y, axis.Z, turn}, Tolerance: 1e-7, Claim: Claim{Unit: convention.Degree}}
	r := Same(pair, quaternion(tern))
	assert.Equal(t, []Change{UnitSlip}, r.Best.Changes)
}

func TestUnreadable(t *testing.T) {
	good := quaternion(tern)
	for why, s := range map[string]Statement{
		"not finite":          {Form: convention.Quaternion, Numbers: []float64{1, math.NaN(), 0, 0}},
		"numbers are zero":    {Form: convention.Quaternion, Numbers: []float64{0, 0, 0, 0}},
		"3 numbers, not 4":    {Form: convention.Quaternion, Numbers: []float64{0, 0, 0}},
		"axis is zero":        {Form: convention.AxisAngle, Numbers: []float64{0, 0, 0, 1}},
		"far from a rotation": {Form: convention.Rotation, Numbers: []float64{1, 0, 0, 0, 2, 0, 0, 0, 3}},
		"is not compared":     {Form: convention.Triad, Numbers: make([]float64, 9)},
		"tolerance":           {Form: convention.Quaternion, Numbers: []float64{1, 0, 0, 0}, Tolerance: math.NaN()},
	} {
		r := Same(s, good)
		assert.Equal(t, Undecided, r.Verdict)
		assert.Contains(t, r.Reason, "the first cannot be read")
		assert.Contains(t, r.Reason, why)
		assert.Contains(t, Same(good, s).Reason, "the second cannot be read")
	}
}

func FuzzSame(f *testing.F) {
	f.Add(1.0, 0.0, 0.0, 0.0, 1e-6, uint8(0))
	f.Add(1e308, -1e308, 5e-324, 0.3, math.Inf(1), uint8(13))
	f.Add(math.NaN(), 1.0, 2.0, 3.0, 0.0, uint8(200))
	f.Fuzz(func(t *testing.T, a, b, c, d, tol float64, pick uint8) {
		forms := []convention.Form{convention.Quaternion, convention.Rotation, convention.Angles, convention.RotationVector, convention.AxisAngle, convention.Matrix}
		numbers := []float64{a, b, c, d, a * b, c - d, d, a, b}
		make := func(k int) Statement {
			n := []int{4, 9, 3, 3, 4, 9}[k%6]
			return Statement{
				Form: forms[k%6], Numbers: numbers[:n], Tolerance: tol,
				Claim: Claim{Unit: convention.Unit(pick % 3), Scalar: convention.ScalarPlace(pick / 3 % 3)},
			}
		}
		one, other := make(int(pick%7)), make(int(pick/7))
		r := Same(one, other)
		if r.Verdict == Undecided && r.Reason == "" {
			t.Error("undecided without a reason")
		}
		if r.Verdict != Undecided && math.IsNaN(r.Best.Residual) {
			t.Errorf("%s with residual NaN", r.Verdict)
		}
		if again := Same(one, other); again.Verdict != r.Verdict || again.Best.String() != r.Best.String() {
			t.Error("not the same twice")
		}
	})
}
