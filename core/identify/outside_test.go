package identify

import (
	"fmt"
	"strings"
	"testing"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/core/internal/table"
	"dextral/core/matrix"
	"dextral/core/rotor"
	"dextral/core/tolerance"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

const reference = "../../fixtures/reference/"

var single = tolerance.Precision{}.Quaternion() // what float32 leaves open

// call is what a library call means, as measured: the turns about moving axes.
func call(t *testing.T, name string) Turns {
	t.Helper()
	for _, row := range table.Read(t, reference+"angle_call_meaning.csv") {
		if row.Text("library")+" "+row.Text("call") == name {
			return meaning(row)
		}
	}
	t.Fatalf("no call %q", name)
	return Turns{}
}

func meaning(row table.Row) Turns {
	var turns Turns
	for k, letter := range row.Text("intrinsic_seq") {
		turns.Sequence.Axes[k] = angle.Axis(letter - 'X')
	}
	for k, arg := range strings.Fields(row.Text("args_for_axes")) {
		turns.Order[k] = arg[0] - '1'
	}
	return turns
}

// claim is the turns as a full label.
func (t Turns) claim() *angle.Label {
	r := angle.Reading{Seq: t.Sequence}
	for k, o := range t.Order {
		r.Order[k] = int(o)
	}
	return &angle.Label{Full: true, Readings: []angle.Reading{r}}
}

func inDegrees(turns Turns, n ...float64) Statement {
	return Statement{
		Form: convention.Angles, Numbers: n, Tolerance: tolerance.Precision{}.Angles(convention.Degree),
		Claim: Claim{Label: turns.claim(), Unit: convention.Degree},
	}
}

func quaternion(r rotor.Rotor) Statement {
	w, x, y, z := r.Quaternion()
	return Statement{
		Form: convention.Quaternion, Numbers: []float64{w, x, y, z}, Tolerance: single,
		Claim: Claim{Scalar: convention.ScalarFirst},
	}
}

func (t Turns) of(n ...float64) rotor.Rotor {
	h := halfTurns(n, convention.Degree.InRadians())
	return t.rotor(&h, &t.Negated)
}

// sidesOf gives the turns that the two sides of a disagreement about the same three
// numbers make of them.
func sidesOf(t *testing.T, a string) (one, other Turns, n []float64) {
	switch {
	case strings.HasPrefix(a, "three Euler default"):
		xyz := Turns{Sequence: angle.Sequence{Axes: [3]angle.Axis{angle.X, angle.Y, angle.Z}}, Order: [3]uint8{0, 1, 2}}
		return xyz, call(t, "assimp aiMatrix4x4t<double>::FromEulerAnglesXYZ(x,y,z)"), []float64{10, 20, 30}
	case strings.HasPrefix(a, "tf2 Quaternion::setEuler"):
		return call(t, "tf2 Quaternion::setEuler(yaw,pitch,roll)"), call(t, "tf2 Matrix3x3::setEulerYPR(yaw,pitch,roll)"), []float64{30, 20, 10}
	case strings.HasPrefix(a, "bullet btQuaternion::setEuler "):
		return call(t, "bullet btQuaternion::setEuler(yaw,pitch,roll)"), call(t, "bullet btMatrix3x3::setEulerYPR(yaw,pitch,roll)"), []float64{30, 20, 10}
	case strings.HasPrefix(a, "bullet btMatrix3x3::setEulerZYX"):
		return call(t, "bullet btMatrix3x3::setEulerZYX(eulerX,eulerY,eulerZ); back=getEulerZYX(yaw,pitch,roll)"), call(t, "bullet btQuaternion::setEulerZYX(yawZ,pitchY,rollX)"), []float64{30, 20, 10}
	}
	t.Fatalf("no such sides: %s", a)
	return
}

// Every measured disagreement between libraries that is a difference of
// convention is explained: the numbers of one side, under the claim of the
// other, are contradicted, and the changes that reconcile them are the difference.
func TestDisagreementsAreExplained(t *testing.T) {
	explained := 0
	for _, row := range table.Read(t, reference+"identify_disagreements.csv") {
		topic, difference := row.Text("topic"), row.Text("difference")
		var a, b Statement
		switch {
		case difference == "behaviour":
			continue // no convention: see the remark in the table
		case strings.HasPrefix(topic, "same numbers"):
			one, other, n := sidesOf(t, row.Text("a"))
			a, b = inDegrees(one, n...), quaternion(other.of(n...))
			assert.InDelta(t, row.Number("value"), rotor.Angle(one.of(n...), other.of(n...))/convention.Degree.InRadians(), 1e-6)
		case strings.HasPrefix(topic, "getter"):
			a, b = getter(t, row)
		case strings.HasPrefix(topic, "constructor"):
			a = Statement{Form: convention.Quaternion, Numbers: []float64{1, 2, 3, 4}, Tolerance: single, Claim: Claim{Scalar: convention.ScalarFirst}}
			b = quaternion(rotor.FromQuaternion(4, 1, 2, 3))
		case strings.HasPrefix(topic, "rotation vector"):
			a = Statement{Form: convention.RotationVector, Numbers: []float64{0, 0, 90}, Tolerance: single, Claim: Claim{Unit: convention.Degree}}
			b = Statement{Form: convention.Rotation, Numbers: []float64{0, 1, 0, -1, 0, 0, 0, 0, 1}, Tolerance: single}
		case strings.HasPrefix(topic, "same rotation"):
			r := rotor.FromQuaternion(.1, .2, .3, .4)
			a, b = quaternion(r), quaternion(r.Neg())
		case strings.HasPrefix(topic, "Eigen"):
			zyx := Turns{Sequence: angle.Sequence{Axes: [3]angle.Axis{angle.Z, angle.Y, angle.X}}, Order: [3]uint8{0, 1, 2}}
			a, b = inDegrees(zyx, -30, 20, 10), inDegrees(zyx, 150, 160, -170)
		default:
			t.Fatalf("no test for %q", topic)
		}
		explained++
		r := Same(a, b)
		switch difference {
		case "agrees", "sign":
			assert.Equal(t, Agree, r.Verdict, topic)
		case "direction": // nobody states it
			assert.Equal(t, AgreeInverse, r.Verdict, topic)
		default:
			assert.Equal(t, Contradicted, r.Verdict, "%s: %s", topic, r.Reason)
			assert.True(t, anyReading(r.Best, difference), "%s: %s, %v", topic, r.Best, r.Best.Changes)
			assert.False(t, r.Best.Tie)
		}
	}
	assert.Equal(t, 24, explained)
}

// anyReading reports whether a reading of least cost has these changes.
func anyReading(c Class, changes string) bool {
	for _, h := range c.Readings {
		if h.cost == c.Cost && h.changes.String() == changes {
			return true
		}
	}
	return false
}

// getter compares angles put in with angles given back, by the call's meaning.
func getter(t *testing.T, row table.Row) (a, b Statement) {
	turns := Turns{}
	for _, m := range table.Read(t, reference+"angle_call_meaning.csv") {
		if m.Text("library")+" "+m.Text("call") == row.Text("a") {
			turns = meaning(m)
		}
	}
	in, out := make([]float64, 3), make([]float64, 3)
	_, err := fmt.Sscanf(row.Text("topic"), "getter after setter, args (%g,%g,%g)", &in[0], &in[1], &in[2])
	require.NoError(t, err)
	_, err = fmt.Sscanf(row.Text("b"), "returned %g %g %g", &out[0], &out[1], &out[2])
	require.NoError(t, err)
	back := turns
	if strings.Contains(row.Text("a"), "back=getEulerZYX") { // which gives yaw first
		back.Order = [3]uint8{0, 1, 2}
	}
	return inDegrees(turns, in...), inDegrees(back, out...)
}

// The meaning of every call is found from what the library made of angles,
// with nothing claimed: over all rows one class remains, and it is the one measured
// by those who made the table.
func TestCallsAreIdentified(t *testing.T) {
	type found struct {
		keys map[alias]Class
		rows int
	}
	calls := map[string]*found{}
	for _, row := range table.Read(t, reference+"angle_robotics.csv") {
		name := row.Text("library") + " " + row.Text("call")
		a := inDegrees(Turns{}, row.Numbers("arg", "1_deg", "2_deg", "3_deg")...)
		a.Claim.Label = nil
		q := row.Numbers("q", "w", "x", "y", "z")
		b := quaternion(rotor.FromQuaternion(q[0], q[1], q[2], q[3]))
		// Turns and direction are one thing for a triple: hold the direction.
		a.Claim.Direction = convention.Direction{To: "shore", From: "hull"}
		b.Claim.Direction = a.Claim.Direction
		var s search
		require.Empty(t, s.read(a, b))
		s.inverse = Inverse.Cost()
		s.level(0)
		s.level(2) // orders that are neither the turns' nor the axes'
		if calls[name] == nil {
			calls[name] = &found{}
		}
		calls[name].rows++
		calls[name].keys = intersect(calls[name].keys, &s)
	}
	require.Len(t, calls, 13)
	for name, f := range calls {
		if assert.Len(t, f.keys, 1, name) {
			for _, class := range f.keys {
				got := class.Readings[0].A.Turns
				want := call(t, name)
				assert.InDelta(t, 0, rotor.Angle(got.movingOf(17, -31, 43), want.of(17, -31, 43)), 1e-12, "%s is %s", name, got)
			}
		}
	}
}

// movingOf is of for turns about either kind of axes.
func (t Turns) movingOf(n ...float64) rotor.Rotor {
	if t.Sequence.Fixed {
		t.Sequence = t.Sequence.Twin()
		t.Order[0], t.Order[2] = t.Order[2], t.Order[0]
	}
	return t.of(n...)
}

// intersect keeps the classes that fit another row too. Signs and directions are not asked here.
func intersect(before map[alias]Class, s *search) map[alias]Class {
	now := map[alias]Class{}
	for _, c := range s.found {
		if c.inverse || c.changes.has(AngleSign) || c.changes.has(Remap) {
			continue
		}
		if _, ok := before[c.key]; ok || before == nil {
			now[c.key] = Class{Readings: []Hypothesis{c.Hypothesis}}
		}
	}
	return now
}

// A vehicle's attitude in north-east-down with forward-right-down axes and in
// east-north-up with forward-left-up axes: two maps of axes.
func TestWorldAndBodyAxesAreIdentified(t *testing.T) {
	decided := 0
	for _, row := range table.Read(t, reference+"frame_ned_enu.csv") {
		n, e := row.Numbers("qn_", "w", "x", "y", "z"), row.Numbers("qe_", "w", "x", "y", "z")
		a, b := quaternion(rotor.FromQuaternion(e[0], e[1], e[2], e[3])), quaternion(rotor.FromQuaternion(n[0], n[1], n[2], n[3]))
		a.Tolerance, b.Tolerance = 1e-14, 1e-14
		a.Claim.Named, b.Claim.Named = true, true
		r := Same(a, b)
		if r.Verdict != Contradicted || !r.Decided || r.Best.Cost < 2*Remap.Cost() {
			continue // for turns about one axis, less explains as much
		}
		decided++
		h := r.Best.Readings[0]
		assert.Equal(t, "x,y,z -> y,x,-z", h.left.String(), "the world")
		assert.Equal(t, "x,y,z -> x,-y,-z", h.right.String(), "the body")
	}
	assert.GreaterOrEqual(t, decided, 20)
}

// Passive matrices: ERFA's of rotation vectors, and Shuster's of quaternions.
func TestPassiveMatricesAreIdentified(t *testing.T) {
	direction := convention.Direction{To: "stars", From: "probe"}
	passive := func(m []float64, a Statement, row string) {
		b := Statement{Form: convention.Rotation, Numbers: m, Tolerance: single}
		r := Same(a, b)
		if x, _ := matrix.FromFlat(m, convention.RowMajor); x.Rotor().TurnAngle() < 1e-4 || x.Sub(x.Transpose()).Norm() < 1e-4 {
			assert.Equal(t, Agree, r.Verdict, "a symmetric matrix is its own transpose: %s", row)
			return
		}
		assert.Equal(t, AgreeInverse, r.Verdict, row)
		a.Claim.Direction, b.Claim.Direction = direction, direction
		if r = Same(a, b); r.Verdict == Contradicted {
			assert.Equal(t, []Change{Inverse}, r.Best.Changes, row)
		}
		if a.Form == convention.Quaternion {
			a.Claim.Product = convention.Shuster
			assert.Equal(t, Agree, Same(a, b).Verdict, row)
		}
	}
	for _, row := range table.Read(t, reference+"matrix_erfa_rv2m.csv") {
		v := row.Numbers("v", "x", "y", "z")
		passive(row.Numbers("m", "00", "01", "02", "10", "11", "12", "20", "21", "22"),
			Statement{Form: convention.RotationVector, Numbers: v, Tolerance: single, Claim: Claim{Unit: convention.Radian}}, row.Text("label"))
	}
	for _, row := range table.Read(t, reference+"rotor_conventions.csv") {
		p := row.Numbers("p", "w", "x", "y", "z")
		passive(row.Numbers("A", "00", "01", "02", "10", "11", "12", "20", "21", "22"), quaternion(rotor.FromQuaternion(p[0], p[1], p[2], p[3])), row.Text("case"))
	}
}
