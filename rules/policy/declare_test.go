package policy

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/rules"
)

// value makes a value of n numbers.
func value(path, key string, form convention.Form, n int, claims ...rules.Claim) *rules.Value {
	return &rules.Value{Form: form, Key: key, Place: rules.Place{Path: path, Line: 3, Column: 5},
		Numbers: make([]rules.Number, n), Claims: claims}
}

func says(term convention.Term, s rules.Source) rules.Claim {
	return rules.Claim{Says: term, Source: s}
}

func TestDeclareAddsAClaimWithItsPlace(t *testing.T) {
	p := parse(t, "[[claim]]\nfiles = 'a.yaml'\nkeys = '**.q'\n  scalar =  'last'\ndirection = 'body<-cam'\nuncertainty_deg = 0.5\ndouble = true\n")
	v := value("a.yaml", "cams.left.q", convention.Quaternion, 4, says(convention.ScalarFirst, rules.Comment))
	p.Declare(v)
	assert.Equal(t, convention.ScalarLast, v.Claims.Scalar(), "stronger than a comment")
	assert.Len(t, v.Claims.Conflicts(convention.OfScalar), 1, "and the conflict stays visible")
	c, _ := v.Claims.On(convention.OfScalar)
	assert.Equal(t, rules.Claim{Says: convention.ScalarLast, Source: rules.Declaration, Text: "scalar = 'last'",
		Place: rules.Place{Path: "dextral.toml", Line: 4, Column: 3, EndLine: 4, EndColumn: 19}}, c)
	assert.Equal(t, convention.Direction{To: "body", From: "cam"}, v.Claims.Direction())
	assert.InDelta(t, 0.5*math.Pi/180, v.Uncertainty, 1e-15)
	assert.True(t, v.Double)

	for _, other := range []*rules.Value{
		value("a.yaml", "cams.left.p", convention.Quaternion, 4),
		value("b.yaml", "cams.left.q", convention.Quaternion, 4),
		value("sub/a.yaml", "cams.left.q", convention.Quaternion, 4),
		value("../a.yaml", "cams.left.q", convention.Quaternion, 4),
	} {
		p.Declare(other)
		assert.Empty(t, other.Claims, "%s#%s", other.Place.Path, other.Key)
		assert.Zero(t, other.Uncertainty)
	}
}

// The format's own specification is stronger than a declaration.
func TestFormatStaysStronger(t *testing.T) {
	p := parse(t, "[[claim]]\nfiles = '**'\nscalar = 'first'\nform = 'axis-angle'\n")
	v := value("a.gltf", "rotation", convention.Quaternion, 4,
		says(convention.Quaternion, rules.Format), says(convention.ScalarLast, rules.Format))
	p.Declare(v)
	assert.Equal(t, convention.ScalarLast, v.Claims.Scalar())
	assert.Equal(t, convention.Quaternion, v.Form)
	assert.Contains(t, v.Claims, rules.Claim{Says: convention.AxisAngle, Source: rules.Declaration, Text: "form = 'axis-angle'",
		Place: rules.Place{Path: "dextral.toml", Line: 4, Column: 1, EndLine: 4, EndColumn: 20}}, "but it is on record")
}

// Of several declarations the last one is heard, subject by subject.
func TestLaterClaimsAreExceptions(t *testing.T) {
	p := parse(t, "[[claim]]\nfiles = '**'\nscalar = 'first'\nproduct = 'shuster'\n[[claim]]\nfiles = 'old/*'\nscalar = 'last'\n")
	old, now := value("old/a.yaml", "q", convention.Quaternion, 4), value("a.yaml", "q", convention.Quaternion, 4)
	p.Declare(old)
	p.Declare(now)
	assert.Equal(t, convention.ScalarLast, old.Claims.Scalar())
	assert.Equal(t, convention.ScalarFirst, now.Claims.Scalar())
	assert.Equal(t, convention.Shuster, old.Claims.Product())
	assert.Empty(t, old.Claims.Conflicts(convention.OfScalar))
}

// Defaults are heard only where nothing is said.
func TestDefaults(t *testing.T) {
	const text = "[defaults]\nscalar = 'first'\nunit = 'deg'\nstorage = 'column'\nsequence = \"z-y'-x''\"\n"
	p := parse(t, text)
	for _, c := range []struct {
		source rules.Source
		want   convention.ScalarPlace
	}{
		{rules.Shape, convention.ScalarFirst}, {rules.Name, convention.ScalarFirst},
		{rules.Sibling, convention.ScalarLast}, {rules.Label, convention.ScalarLast},
		{rules.Comment, convention.ScalarLast}, {rules.Format, convention.ScalarLast},
	} {
		v := value("a.yaml", "q", convention.Quaternion, 4, says(convention.ScalarLast, c.source))
		p.Declare(v)
		assert.Equal(t, c.want, v.Claims.Scalar(), c.source.String())
		if c.source.Stated() {
			assert.Empty(t, v.Claims.Conflicts(convention.OfScalar), "a default contradicts nobody")
		}
	}
	flat, rows := value("a.yaml", "R", convention.Rotation, 9), value("a.yaml", "R", convention.Rotation, 9, says(convention.RowMajor, rules.Shape))
	p.Declare(flat)
	p.Declare(rows)
	assert.Equal(t, convention.ColumnMajor, flat.Claims.Storage())
	assert.Equal(t, convention.RowMajor, rows.Claims.Storage(), "rows written one by one are not transposed by a default")

	over := parse(t, text+"[[claim]]\nfiles = '**'\nunit = 'rad'\n")
	v := value("a.yaml", "rpy", convention.Angles, 3)
	over.Declare(v)
	assert.Equal(t, convention.Radian, v.Claims.Unit())
	assert.Len(t, v.Claims, 2, "unit and sequence, each once")
}

// Claims without a meaning for a form are not made.
func TestOnlyWhatConcernsTheForm(t *testing.T) {
	p := parse(t, "[defaults]\nscalar = 'first'\nproduct = 'hamilton'\nunit = 'deg'\nstorage = 'row'\nsequence = \"z-y'-x''\"\n")
	for form, want := range map[convention.Form][]convention.Subject{
		convention.Quaternion:     {convention.OfScalar, convention.OfProduct},
		convention.Rotation:       {convention.OfStorage},
		convention.Transform:      {convention.OfStorage},
		convention.Angles:         {convention.OfUnit, convention.OfSequence},
		convention.RotationVector: {convention.OfUnit},
		convention.AxisAngle:      {convention.OfUnit},
		convention.Axis:           nil,
		convention.Triad:          nil,
	} {
		v := value("a.yaml", "x", form, 4)
		p.Declare(v)
		var got []convention.Subject
		for _, c := range v.Claims {
			got = append(got, c.Says.Subject())
		}
		assert.Equal(t, want, got, form.String())
	}
}

// The names of the numbers say in which order a declared sequence is written.
func TestSequenceFollowsTheNames(t *testing.T) {
	p := parse(t, "[defaults]\nsequence = \"z-y'-x''\"\n")
	plain, named := value("a.yaml", "rpy", convention.Angles, 3), value("a.yaml", "rpy", convention.Angles, 3)
	named.Roles = [3]angle.Role{angle.RoleRoll, angle.RolePitch, angle.RoleYaw}
	odd := value("a.yaml", "rpy", convention.Angles, 3)
	odd.Roles = [3]angle.Role{angle.RoleRoll, angle.RoleRoll, angle.RoleYaw}
	label := func(v *rules.Value) angle.Label {
		p.Declare(v)
		c, ok := v.Claims.On(convention.OfSequence)
		require.True(t, ok)
		return c.Says.(angle.Label)
	}
	a, b := label(plain), label(named)
	assert.True(t, a.Full)
	assert.True(t, b.Full)
	assert.False(t, a.Same(b), "roll pitch yaw is not in the order of the turns")
	assert.True(t, label(odd).Same(a))
}

func TestForm(t *testing.T) {
	declared := func(form string, v *rules.Value) *rules.Value {
		parse(t, "[[claim]]\nfiles = '**'\nform = '"+form+"'\n").Declare(v)
		return v
	}
	undecided := value("a.yaml", "data", convention.NoForm, 4)
	undecided.Why = "four numbers without a name"
	v := declared("quaternion", undecided)
	assert.True(t, v.Decided())
	assert.Equal(t, convention.Quaternion, v.Form)

	v = declared("quaternion", value("a.yaml", "data", convention.Rotation, 9))
	assert.False(t, v.Decided())
	assert.Equal(t, "declared to be a quaternion (dextral.toml:3:1), which does not fit its 9 numbers", v.Why)

	for _, c := range []struct {
		form       string
		n          int
		rows, cols int
	}{{"rotation", 9, 3, 3}, {"transform", 12, 3, 4}, {"transform", 16, 4, 4}, {"matrix", 9, 3, 3}, {"matrix", 12, 3, 4}, {"axis-map", 9, 3, 3}, {"triad", 9, 0, 0}, {"angles", 3, 0, 0}, {"axis-angle", 4, 0, 0}} {
		v := declared(c.form, value("a.yaml", "x", convention.NoForm, c.n))
		assert.True(t, v.Decided(), c.form)
		assert.Equal(t, [2]int{c.rows, c.cols}, [2]int{v.Rows, v.Cols}, c.form)
	}
	tall := value("a.yaml", "x", convention.Matrix, 12)
	tall.Rows, tall.Cols = 4, 3
	assert.Equal(t, 4, declared("transform", tall).Rows, "a shape that is known is kept")
}

func TestNoRotation(t *testing.T) {
	p := parse(t, "[[claim]]\nfiles = '**'\nrotation = false\n")
	m := value("a.yaml", "R_mis", convention.Rotation, 9, says(convention.Rotation, rules.Name))
	q := value("a.yaml", "bias", convention.Quaternion, 4)
	p.Declare(m)
	p.Declare(q)
	assert.Equal(t, convention.Matrix, m.Form)
	assert.True(t, m.Decided())
	assert.Empty(t, m.Claims.Conflicts(convention.OfForm), "a name is a custom, not a contradiction")
	assert.False(t, q.Decided())
	assert.Equal(t, "declared to claim no rotation (dextral.toml:3:1)", q.Why)
}

// Exceptions reach uncertainty and precision too.
func TestLaterPrecision(t *testing.T) {
	p := parse(t, "[[claim]]\nfiles = '**'\ndouble = true\nuncertainty_deg = 1\n[[claim]]\nfiles = 'old/*'\ndouble = false\nuncertainty_deg = 2\n[[claim]]\nfiles = '**'\nproduct = 'hamilton'\n")
	now, old := value("a.yaml", "q", convention.Quaternion, 4), value("old/a.yaml", "q", convention.Quaternion, 4)
	p.Declare(now)
	p.Declare(old)
	assert.True(t, now.Double)
	assert.False(t, old.Double)
	assert.InDelta(t, math.Pi/180, now.Uncertainty, 1e-15)
	assert.InDelta(t, 2*math.Pi/180, old.Uncertainty, 1e-15)
}

// A default says nothing about what is not known to be an orientation.
func TestDefaultsLeaveTheUndecidedAlone(t *testing.T) {
	v := value("a.yaml", "data", convention.NoForm, 4)
	v.Why = "four numbers without a name"
	parse(t, "[defaults]\nscalar = 'first'\n").Declare(v)
	assert.Empty(t, v.Claims)
	assert.False(t, v.Decided())
}

func TestDefaultPolicyDeclaresNothing(t *testing.T) {
	v := value("a.yaml", "q", convention.Quaternion, 4)
	Default().Declare(v)
	assert.Empty(t, v.Claims)
}

// Names that a key pattern captures become frames of the direction; declared axes say
// whether a map between two frames mirrors.
func TestCapturedNamesAndFrames(t *testing.T) {
	p, err := Parse("dextral.toml", []byte(`
[[claim]]
files = "**"
keys = "**.T_{to}_{from}"
direction = "v_{to} = R v_{from}"

[[frame]]
name = "body"
axes = "FRD"

[[frame]]
name = "cam"
axes = "right down forward"

[[frame]]
name = "screen"
axes = "right up forward"
`), ruleNames())
	require.NoError(t, err)
	for key, want := range map[string]string{"rig.T_body_cam": "v_body = R v_cam, right-handed", "T_screen_body": "v_screen = R v_body, left-handed", "rig.T_a_b": "v_a = R v_b", "rig.R_a_b": ""} {
		v := &rules.Value{Form: convention.Rotation, Key: key, Place: rules.Place{Path: "a.yaml"}, Rows: 3, Cols: 3}
		p.Declare(v)
		got := ""
		if d := v.Claims.Direction(); d.Stated() {
			got = d.String()
		}
		if c, ok := v.Claims.On(convention.OfHand); ok {
			got += ", " + c.Says.String()
		}
		assert.Equal(t, want, got, key)
	}
}
