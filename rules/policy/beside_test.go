package policy

import (
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"dextral/rules"
)

var comment = rules.Place{Path: "mount.yaml", Line: 7, Column: 3, EndLine: 7, EndColumn: 90}

func beside(t require.TestingT, text string) *Beside {
	b, err := ParseBeside(text, comment, ruleNames())
	require.NoError(t, err, text)
	return b
}

const accepted = `dextral:waive rule = "rotor-not-unit", until = 2031-03-31, because = "away, # for \"repair\"", owner = 'Jonna'`

func TestBesideHasTheGrammarOfTheSheet(t *testing.T) {
	b := beside(t, accepted)
	assert.Equal(t, &rules.Waiver{Rule: "rotor-not-unit", Until: "2031-03-31", Because: `away, # for "repair"`, Owner: "Jonna", At: comment}, b.Waiver)
	assert.True(t, b.Inline())
	assert.Equal(t, b.Waiver, beside(t, "dextral:waive\n rule = \"rotor-not-unit\",\n  until = 2031-03-31, because = \"away, # for \\\"repair\\\"\",\n owner = 'Jonna'\n").Waiver, "over several lines")
	assert.Equal(t, b.Waiver, beside(t, "dextral: waive"+accepted[len("dextral:waive"):]).Waiver, "with a blank")
	rapid.Check(t, func(rt *rapid.T) {
		word := rapid.StringMatching(`[a-z"'\\#,={}é]{1,9}( [a-z"'\\#,={}é]{1,9}){0,3}`)
		w := &rules.Waiver{Rule: "sign-jump", Until: "2031-12-31", Because: word.Draw(rt, "because"), Owner: word.Draw(rt, "owner"), At: comment}
		assert.Equal(rt, w, beside(rt, Comment(w)).Waiver)
	})
}

func TestBesideIsStrict(t *testing.T) {
	for text, want := range map[string]string{
		"dextral:waive": `mount.yaml:7:3: dextral:waive lacks rule, until, because, owner`,
		`dextral:waive rule = "rotor-not-unit", until = 2031-03-31, because = "x"`:                           `mount.yaml:7:3: dextral:waive lacks owner`,
		`dextral:waive rule = "rotor-not-unti", until = 2031-03-31, because = "x", owner = "y"`:              `mount.yaml:7:3: no rule is named "rotor-not-unti"; did you mean "rotor-not-unit"?`,
		`dextral:waive rule = "waiver-unused", until = 2031-03-31, because = "x", owner = "y"`:               `mount.yaml:7:3: waiver-unused is not waived by another waiver; renew the waiver it speaks of, or delete it`,
		`dextral:waive rule = "rotor-not-unit", place = "a", until = 2031-03-31, because = "x", owner = "y"`: `mount.yaml:7:3: unknown key "place" in dextral:waive (allowed: because, owner, rule, until)`,
		`dextral:waive rule = "rotor-not-unit", until = "2031-03-31", because = "x", owner = "y"`:            `mount.yaml:7:3: until in dextral:waive must be a date such as 2031-03-31, without quotes`,
		`dextral:wave`:   `mount.yaml:7:3: dextral:wave is not understood; did you mean "dextral:waive"? (the only such comment is dextral:waive)`,
		`dextral:ignore`: `mount.yaml:7:3: dextral:ignore is not understood (the only such comment is dextral:waive)`,
	} {
		_, err := ParseBeside(text, comment, ruleNames())
		assert.EqualError(t, err, want)
	}
	for _, text := range []string{`dextral:waive rotor-not-unit`, `dextral:waive rule = "a" until = 1`, `dextral:waive }`, "dextral:waive rule = \"rotor-not-unit\"}\nx = {"} {
		_, err := ParseBeside(text, comment, ruleNames())
		var errs Errors
		require.ErrorAs(t, err, &errs, text)
		assert.Equal(t, comment, errs[0].Place)
	}
}

func TestWhatSpeaksToDextral(t *testing.T) {
	for _, text := range []string{accepted, "dextral:waive", "dextral:wave x", "dextral: waive rule = 'x'", "dextral:ignore"} {
		assert.True(t, Addresses(text), text)
	}
	for _, text := range []string{"", "dextral", "dextral: see the manual", "dextral: waive the fee", "see dextral:waive", "dextral:", "Dextral:waive"} {
		assert.False(t, Addresses(text), text)
	}
}

// A waiver beside a value is heard before one of the sheet; both are used.
func TestBesideIsHeardFirst(t *testing.T) {
	p := parse(t, `
[[waiver]]
rule = "rotor-not-unit"
place = "mount.yaml#camera.q"
until = 2031-03-31
because = "x"
owner = "y"
`)
	b := beside(t, accepted)
	b.First, b.Last = 8, 8
	f := finding("rotor-not-unit", "mount.yaml", "camera.q")
	f.Place.Line, f.Place.EndLine = 9, 10
	far := finding("rotor-not-unit", "mount.yaml", "camera.q")
	far.Place.Line, far.Place.EndLine = 11, 12
	s := Scope{Today: day("2031-01-01"), Covered: everything, Beside: []*Beside{b}, Lines: func(f *rules.Finding) (int, int) { return f.Place.Line - 1, f.Place.EndLine }}
	assert.Empty(t, p.Waive([]*rules.Finding{f, far}, s))
	assert.Same(t, b.Waiver, f.Waiver)
	assert.Same(t, p.Waivers[0], far.Waiver)

	other := finding("axis-not-unit", "mount.yaml", "")
	other.Place.Line = 8
	own := Default().Waive([]*rules.Finding{other}, s)
	require.Len(t, own, 1)
	assert.Equal(t, "mount.yaml:7:3", own[0].Place.String())
	assert.Equal(t, "the waiver of rotor-not-unit in this comment matches no finding", own[0].Message)
	s.Today = day("2031-04-01")
	own = Default().Waive([]*rules.Finding{f}, s)
	require.Len(t, own, 1)
	assert.Equal(t, rules.WaiverExpired, own[0].Rule)
}
