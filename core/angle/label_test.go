package angle_test

import (
	"errors"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/core/rotor"
)

var (
	noRoles = [3]angle.Role{}
	rpy     = [3]angle.Role{angle.RoleRoll, angle.RolePitch, angle.RoleYaw}
	ypr     = [3]angle.Role{angle.RoleYaw, angle.RolePitch, angle.RoleRoll}
	listed  = [3]int{0, 1, 2}
	turned  = [3]int{2, 1, 0}
)

func read(t *testing.T, text string, roles [3]angle.Role) angle.Label {
	t.Helper()
	label, err := angle.ParseLabel(text, roles)
	require.NoError(t, err)
	assert.Equal(t, text, label.Text)
	return label
}

// TestFullLabels: labels that say everything, by the sequence that they say.
func TestFullLabels(t *testing.T) {
	for want, texts := range map[angle.Sequence][]string{
		moving(z, y, x): {
			"z-y'-x''", "z-y\u2032-x\u2033", "z-y\u2019-x\u201d", "z-y'-x\"", "Z-Y'-X''", "zy'x''", "z y' x''", "z\u2013y\u2032\u2013x\u2033", "z'-y''-x'''", "z-y'-x'",
			"intrinsic ZYX", "ZYX intrinsic", "intrinsic_zyx", "intrinsicZYX", "intrinsic 3-2-1", "intrinsic Euler angles, ZYX", "Tait-Bryan z-y'-x'' (intrinsic)",
			"z-y-x about moving axes", "rotating axes zyx", "zyx in the body axes", "body-fixed 321", "3-2-1 about body-fixed axes", "rzyx",
			"moving yaw-pitch-roll", "yaw-pitch-roll about moving axes", "intrinsic ypr", "yaw, pitch, roll (z-y'-x'')", "heading, pitch, roll, intrinsic",
			"z-y'-x'' (moving axes)",
		},
		fixed(x, y, z): {
			"extrinsic xyz", "xyz extrinsic", "extrinsic_xyz", "static XYZ", "x-y-z fixed axes", "x-y-z (fixed axes)", "sxyz", "space-fixed 123", "1-2-3 about the world axes",
			"about fixed axes x, y, z", "rpy about fixed axes", "fixed-axis roll, pitch, yaw", "fixed axis rpy", "roll, pitch, yaw about the fixed axes x-y-z",
		},
		moving(z, x, z): {"z-x'-z''", "intrinsic ZXZ", "body-fixed 3-1-3", "proper Euler angles z-x'-z''"},
		fixed(y, z, y):  {"extrinsic yzy", "static 2-3-2"},
	} {
		for _, text := range texts {
			label := read(t, text, noRoles)
			assert.True(t, label.Full, text)
			if assert.Len(t, label.Readings, 1, text) {
				r := label.Readings[0]
				assert.Equal(t, angle.Reading{Seq: want, Order: listed}, r, text)
				assert.Equal(t, want.Words(), label.String(), text)
			}
		}
	}
}

// meanings writes readings down shortly.
func meanings(readings []angle.Reading) []string {
	var all []string
	for _, r := range readings {
		all = append(all, r.Canonical().String())
	}
	return all
}

// TestBareLabels: what each of them may mean (ruling: moving, fixed, keyed by axis, both ways).
func TestBareLabels(t *testing.T) {
	zyx := []angle.Reading{
		{Seq: moving(z, y, x), Order: listed}, {Seq: moving(z, y, x), Order: turned},
		{Seq: fixed(z, y, x), Order: listed}, {Seq: fixed(z, y, x), Order: turned},
		{Seq: moving(z, y, x), Order: listed, Inverse: true}, {Seq: moving(z, y, x), Order: turned, Inverse: true},
		{Seq: fixed(z, y, x), Order: listed, Inverse: true}, {Seq: fixed(z, y, x), Order: turned, Inverse: true},
	}
	names := []angle.Reading{ // roll, pitch, yaw: the number of each axis is known
		{Seq: fixed(x, y, z), Order: listed}, {Seq: moving(x, y, z), Order: listed},
		{Seq: fixed(x, y, z), Order: listed, Inverse: true}, {Seq: moving(x, y, z), Order: listed, Inverse: true},
	}
	zxz := []angle.Reading{
		{Seq: moving(z, x, z), Order: listed}, {Seq: fixed(z, x, z), Order: listed},
		{Seq: moving(z, x, z), Order: listed, Inverse: true}, {Seq: fixed(z, x, z), Order: listed, Inverse: true},
	}
	for _, c := range []struct {
		texts string
		want  []angle.Reading
	}{
		{"ZYX|zyx|321|3-2-1|z-y-x|z, y, x|3 2 1|euler_zyx|eulerZYX|Euler 3-2-1|rotation order ZYX|Euler angles (ZYX)|'ZYX'|\"ZYX\"|\u201cZYX\u201d|deg zyx|EulerZYXOrder", zyx},
		{"rpy|RPY|roll pitch yaw|roll, pitch, yaw|roll-pitch-yaw|rollPitchYaw|RollPitchYaw|r-p-y|r, p, y|rpy_deg|rpyAngles|bank, pitch, heading", names},
		{"ZXZ|313|3-1-3|z-x-z|euler zxz", zxz},
	} {
		for _, text := range strings.Split(c.texts, "|") {
			label := read(t, text, noRoles)
			assert.False(t, label.Full, text)
			assert.ElementsMatch(t, meanings(c.want), meanings(label.Readings), text)
			assert.Contains(t, label.String(), text)
		}
	}
	assert.Equal(t, names, read(t, "rpy", noRoles).Readings, "in the order written, custom first")
	assert.Equal(t, moving(z, y, x), read(t, "ypr", noRoles).Readings[0].Seq)
	assert.Equal(t, listed, read(t, "ypr", noRoles).Readings[0].Order)
}

// TestXYZ: where listing and keying by axis coincide, nothing is said twice.
func TestXYZ(t *testing.T) {
	assert.Len(t, read(t, "XYZ", noRoles).Readings, 4)
	assert.Len(t, read(t, "ZYX", noRoles).Readings, 8)
	assert.Len(t, read(t, "yzx", noRoles).Readings, 8)
}

// TestRolesDecideTheOrder: named numbers follow their names, whatever the label.
func TestRolesDecideTheOrder(t *testing.T) {
	for _, c := range []struct {
		text  string
		roles [3]angle.Role
		want  [3]int // of the turns about z, y, x
		full  bool
	}{
		{"z-y'-x''", rpy, turned, true},
		{"z-y'-x''", ypr, listed, true},
		{"intrinsic ZYX", [3]angle.Role{angle.RoleX, angle.RoleY, angle.RoleZ}, turned, true},
		{"intrinsic ZYX", [3]angle.Role{angle.RolePitch, angle.RoleYaw, angle.RoleRoll}, [3]int{1, 0, 2}, true},
		{"intrinsic ZYX", [3]angle.Role{angle.RoleFirst, angle.RoleSecond, angle.RoleThird}, listed, true},
		{"intrinsic ZYX", [3]angle.Role{angle.RoleThird, angle.RoleFirst, angle.RoleSecond}, [3]int{1, 2, 0}, true},
		{"ZYX", rpy, turned, false},
		{"ZYX", ypr, listed, false},
		{"rpy, z-y'-x''", noRoles, turned, true},
	} {
		label := read(t, c.text, c.roles)
		assert.Equal(t, c.full, label.Full)
		assert.Equal(t, angle.Reading{Seq: moving(z, y, x), Order: c.want}, label.Readings[0], c.text)
	}
	assert.Len(t, read(t, "ZYX", rpy).Readings, 4, "moving and fixed, both ways")
	assert.Len(t, read(t, "zxz", [3]angle.Role{angle.RoleFirst, angle.RoleSecond, angle.RoleThird}).Readings, 4)
}

// TestNamesAndKind: names of numbers with a kind of axes list the turns only
// where custom agrees; otherwise either order may be meant.
func TestNamesAndKind(t *testing.T) {
	for text, want := range map[string][]angle.Reading{
		"moving roll pitch yaw":      {{Seq: moving(x, y, z), Order: listed}, {Seq: moving(z, y, x), Order: turned}},
		"yaw-pitch-roll, fixed axes": {{Seq: fixed(x, y, z), Order: turned}, {Seq: fixed(z, y, x), Order: listed}},
		"intrinsic pitch, roll, yaw": {
			{Seq: moving(y, x, z), Order: listed}, {Seq: moving(z, y, x), Order: [3]int{2, 0, 1}}, {Seq: moving(x, y, z), Order: [3]int{1, 0, 2}},
		},
	} {
		label := read(t, text, noRoles)
		assert.False(t, label.Full, text)
		for _, r := range want {
			assert.True(t, label.Means(r), "%s: %v", text, r)
			r.Inverse = true
			assert.True(t, label.Means(r), "%s: %v", text, r)
		}
		assert.Len(t, label.Readings, 2*len(want), text)
	}
}

func TestCustomary(t *testing.T) {
	for _, roles := range [][3]angle.Role{rpy, ypr, {angle.RoleX, angle.RoleY, angle.RoleZ}, {angle.RolePitch, angle.RoleRoll, angle.RoleYaw}} {
		label, err := angle.Customary(roles)
		require.NoError(t, err)
		assert.False(t, label.Full)
		assert.Len(t, label.Readings, 4)
		// Moving z-y-x with (yaw, pitch, roll) is fixed x-y-z with (roll, pitch, yaw).
		n := [3]float64{}
		for k, role := range roles {
			axis, _ := role.Axis()
			n[k] = []float64{0.1, 0.2, 0.3}[axis]
		}
		assert.LessOrEqual(t, rotor.Angle(moving(z, y, x).Rotor(0.3, 0.2, 0.1), label.Readings[0].Rotor(n)), angle.Rounding)
		assert.LessOrEqual(t, rotor.Angle(fixed(x, y, z).Rotor(0.1, 0.2, 0.3), label.Readings[0].Rotor(n)), angle.Rounding)
	}
	assert.Equal(t, "roll, pitch, yaw (kind of axes unstated)", must(angle.Customary(rpy)).String())
	_, err := angle.Customary(noRoles)
	assert.ErrorIs(t, err, angle.ErrRoles)
	_, err = angle.Customary([3]angle.Role{angle.RoleRoll, angle.RoleX, angle.RoleYaw})
	assert.ErrorIs(t, err, angle.ErrRoles)
}

func must(l angle.Label, err error) angle.Label {
	if err != nil {
		panic(err)
	}
	return l
}

func TestBadLabels(t *testing.T) {
	for text, want := range map[string]error{
		"": angle.ErrNoSequence, "euler": angle.ErrNoSequence, "intrinsic": angle.ErrNoSequence, "about fixed axes": angle.ErrNoSequence,
		"hello": angle.ErrNoSequence, "quaternion xyzw": angle.ErrNoSequence, "4-5-6": angle.ErrNoSequence, "not intrinsic ZYX": angle.ErrNoSequence, "body's zyx": angle.ErrNoSequence,
		"331": angle.ErrSequence, "XXY": angle.ErrSequence, "zzz": angle.ErrSequence, "roll, roll, yaw": angle.ErrSequence, "rpr": angle.ErrSequence, "xy": angle.ErrSequence, "roll pitch": angle.ErrSequence,
		"xyzx": angle.ErrNoSequence, "x-y-z-x": angle.ErrSequence, "z2x": angle.ErrSequence, "xyz or zyx": angle.ErrNoSequence, "xyz, zyx": angle.ErrSequence, "123 zyx": angle.ErrSequence,
		"extrinsic z-y'-x''": angle.ErrSequence, "fixed moving xyz": angle.ErrSequence, "intrinsic sxyz": angle.ErrSequence, "z''-y'-x": angle.ErrSequence, "z'-y-x''": angle.ErrSequence,
	} {
		_, err := angle.ParseLabel(text, noRoles)
		if assert.ErrorIs(t, err, want, text) {
			assert.Contains(t, err.Error(), "angle label")
		}
	}
	for _, c := range []struct {
		text  string
		roles [3]angle.Role
	}{
		{"ZYX", [3]angle.Role{angle.RoleRoll, angle.RolePitch, angle.RoleNone}},
		{"ZYX", [3]angle.Role{angle.RoleRoll, angle.RoleRoll, angle.RoleYaw}},
		{"ZYX", [3]angle.Role{angle.RoleRoll, angle.RolePitch, angle.RoleFirst}},
		{"ZYX", [3]angle.Role{99, 99, 99}},
		{"z-x'-z''", rpy},
	} {
		_, err := angle.ParseLabel(c.text, c.roles)
		assert.ErrorIs(t, err, angle.ErrRoles, c.text)
	}
}

// TestBodyFixedFrame: a frame that is fixed to the body is no kind of turn.
func TestBodyFixedFrame(t *testing.T) {
	assert.False(t, read(t, "ZYX in the body-fixed frame", noRoles).Full)
	assert.False(t, read(t, "earth-fixed frame, ZYX", noRoles).Full)
	assert.False(t, read(t, "body rpy", noRoles).Full)
}

// TestWordsAreReadBack: every sequence and its words are one full label.
func TestWordsAreReadBack(t *testing.T) {
	for _, s := range angle.Sequences() {
		label := read(t, s.Words(), noRoles)
		assert.True(t, label.Full)
		assert.Equal(t, []angle.Reading{{Seq: s, Order: listed}}, label.Readings)
	}
}

func TestLabelIsATerm(t *testing.T) {
	var term convention.Term = read(t, "ZYX", noRoles)
	assert.Equal(t, convention.OfSequence, term.Subject())
	assert.Equal(t, "ZYX (kind of axes unstated)", term.String())
	assert.Equal(t, "moving rpy (order of turns unstated)", read(t, "moving rpy", noRoles).String())
	assert.Equal(t, "sequence unstated", angle.Label{}.String())
	assert.Equal(t, "sequence unstated", angle.Label{Text: "ZYX"}.String())
}

func TestSame(t *testing.T) {
	same := func(a, b string) bool { return read(t, a, noRoles).Same(read(t, b, noRoles)) }
	assert.True(t, same("ZYX", "3-2-1"))
	assert.True(t, same("rpy", "roll pitch yaw"))
	assert.True(t, same("z-y'-x''", "intrinsic zyx"))
	assert.False(t, same("z-y'-x''", "ZYX"))
	assert.False(t, same("ZYX", "XYZ"))
	assert.False(t, same("z-y'-x''", "x-y'-z''"))
	assert.True(t, must(angle.ParseLabel("extrinsic xyz", rpy)).Same(must(angle.ParseLabel("intrinsic zyx", rpy))), "keyed by axis, the twin is the same")
}

func drawReading(rt *rapid.T, name string) angle.Reading {
	orders := [][3]int{{0, 1, 2}, {0, 2, 1}, {1, 0, 2}, {1, 2, 0}, {2, 0, 1}, {2, 1, 0}}
	return angle.Reading{
		Seq:     anySequence.Draw(rt, name+" sequence"),
		Order:   rapid.SampledFrom(orders).Draw(rt, name+" order"),
		Inverse: rapid.Bool().Draw(rt, name+" inverse"),
	}
}

// TestCanonical: equal canonical forms mean equal rotors, different ones
// different rotors for general numbers.
func TestCanonical(t *testing.T) {
	n := [3]float64{0.37, 0.71, 1.13}
	rapid.Check(t, func(rt *rapid.T) {
		a, b := drawReading(rt, "a"), drawReading(rt, "b")
		assert.False(rt, a.Canonical().Seq.Fixed)
		assert.LessOrEqual(rt, rotor.Angle(a.Rotor(n), a.Canonical().Rotor(n)), angle.Rounding)
		same := rotor.Angle(a.Rotor(n), b.Rotor(n)) < 1e-9
		assert.Equal(rt, same, a.Canonical() == b.Canonical(), "%v and %v", a, b)
	})
}

func TestReadingNumbers(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		r, q := drawReading(rt, "r"), anyRotor().Draw(rt, "rotor")
		n := r.Numbers(q)
		assert.LessOrEqual(rt, rotor.Angle(q, r.Rotor(n.Numbers())), 4*angle.Rounding, "%v %v", r, n)
	})
	for _, bad := range []angle.Reading{{}, {Seq: moving(z, y, x)}, {Seq: moving(z, y, x), Order: [3]int{0, 1, 3}}, {Seq: moving(z, y, x), Order: [3]int{0, -1, 2}}} {
		assert.False(t, bad.Valid())
		assert.False(t, bad.Rotor([3]float64{1, 2, 3}).Finite())
		assert.NotEqual(t, bad.Numbers(rotor.One), bad.Numbers(rotor.One), "NaN")
		assert.NotPanics(t, func() { _ = bad.String() })
	}
	assert.Equal(t, "reverse of z-y'-x'' (moving axes) of numbers 3, 2, 1", angle.Reading{Seq: moving(z, y, x), Order: turned, Inverse: true}.String())
}

func FuzzParseLabel(f *testing.F) {
	for _, text := range []string{"z-y'-x''", "rpy", "3-2-1", "sxyz", "XYZEuler", "z\u2032", "\xff'x", "body-fixed", "x'y'z'"} {
		f.Add(text)
	}
	f.Fuzz(func(t *testing.T, text string) {
		label, err := angle.ParseLabel(text, noRoles)
		if err != nil {
			known := errors.Is(err, angle.ErrNoSequence) || errors.Is(err, angle.ErrSequence) || errors.Is(err, angle.ErrRoles)
			assert.True(t, known, "%v", err)
			return
		}
		assert.NotEmpty(t, label.Readings)
		for _, r := range label.Readings {
			assert.True(t, r.Valid())
			assert.False(t, label.Full && r.Inverse)
		}
		again, err := angle.ParseLabel(strings.ToUpper(text), noRoles)
		if err == nil { // camel case may be lost
			assert.Equal(t, label.Full, again.Full)
		}
	})
}

// Listed names the same rotation for all numbers.
func TestListed(t *testing.T) {
	n := [3]float64{0.3, -0.7, 1.9}
	for _, s := range angle.Sequences() {
		for _, o := range [][3]int{{0, 1, 2}, {2, 1, 0}, {1, 0, 2}} {
			r := angle.Reading{Seq: s, Order: o}
			l := r.Listed()
			assert.Less(t, rotor.Angle(r.Rotor(n), l.Rotor(n)), 1e-14)
			if o[1] == 1 {
				assert.Equal(t, [3]int{0, 1, 2}, l.Order)
			}
		}
	}
}
