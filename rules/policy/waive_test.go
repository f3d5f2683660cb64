package policy

import (
	"strings"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/rules"
)

func day(s string) time.Time {
	d, err := time.Parse(time.DateOnly, s)
	if err != nil {
		panic(err)
	}
	return d.Add(12 * time.Hour)
}

func everything(string) bool { return true }

func finding(rule, path, key string) *rules.Finding {
	return &rules.Finding{Rule: rule, Level: rules.Error, Key: key, Place: rules.Place{Path: path, Line: 1, Column: 1}}
}

const twoWaivers = `
[[waiver]]
rule = "rotor-not-unit"
place = "config/*.yaml#cams.*.q"
until = 2031-03-31
because = "new certificate ordered"
owner = "M. Okafor"

[[waiver]]
rule = "sign-jump"
place = "logs/{*,*/*}.csv"
until = 2031-06-30
because = "recorder of the first season"
owner = "L. Brandt"
`

func TestWaiveMatches(t *testing.T) {
	p := parse(t, twoWaivers)
	require.Len(t, p.Waivers, 2)
	assert.Equal(t, &rules.Waiver{Rule: "rotor-not-unit", Place: "config/*.yaml#cams.*.q", Until: "2031-03-31",
		Because: "new certificate ordered", Owner: "M. Okafor",
		At: rules.Place{Path: "dextral.toml", Line: 2, Column: 1, EndLine: 2, EndColumn: 11}}, p.Waivers[0])
	hit := []*rules.Finding{
		finding("rotor-not-unit", "config/a.yaml", "cams.left.q"),
		finding("sign-jump", "logs/a/b.csv", "att"), finding("sign-jump", "logs/c.csv", ""),
	}
	miss := []*rules.Finding{
		finding("rotor-not-unit", "config/a.yaml", "cams.left.p"), finding("rotor-not-unit", "config/b/a.yaml", "cams.left.q"),
		finding("axis-not-unit", "config/a.yaml", "cams.left.q"), finding("sign-jump", "log/c.csv", "att"),
		finding("sign-jump", "../logs/c.csv", "att"),
	}
	assert.Empty(t, p.Waive(append(hit, miss...), Scope{Today: day("2031-01-01"), Covered: everything}))
	for _, f := range hit {
		require.NotNil(t, f.Waiver, f.Place.Path)
		assert.Equal(t, f.Rule, f.Waiver.Rule)
	}
	for _, f := range miss {
		assert.Nil(t, f.Waiver, "%s#%s", f.Place.Path, f.Key)
	}
}

// The last day is included; the day after, the finding counts again and the
// waiver is reported.
func TestWaiverEnds(t *testing.T) {
	p := parse(t, twoWaivers)
	on := func(today time.Time) (*rules.Finding, []*rules.Finding) {
		f := finding("rotor-not-unit", "config/a.yaml", "cams.left.q")
		return f, p.Waive([]*rules.Finding{f, finding("sign-jump", "logs/c.csv", "")}, Scope{Today: today, Covered: everything})
	}
	f, own := on(day("2031-03-31"))
	assert.NotNil(t, f.Waiver)
	assert.Empty(t, own)

	f, own = on(day("2031-04-02"))
	assert.Nil(t, f.Waiver)
	require.Len(t, own, 1)
	e := own[0]
	assert.Equal(t, rules.WaiverExpired, e.Rule)
	assert.Equal(t, rules.Warning, e.Level)
	assert.Equal(t, "dextral.toml:2:1", e.Place.String())
	assert.Equal(t, "the waiver of rotor-not-unit at config/*.yaml#cams.*.q ended on 2031-03-31", e.Message)
	assert.Equal(t, 2.0, e.Evidence[0].Residual.Value)
	assert.Contains(t, e.Remedy, "M. Okafor")

	late := time.FixedZone("late", -11*3600)
	f, _ = on(time.Date(2031, 3, 31, 23, 59, 0, 0, late)) // already the next day in UTC
	assert.NotNil(t, f.Waiver, "days are those of the user's own zone")
}

func TestUnusedWaivers(t *testing.T) {
	p := parse(t, twoWaivers)
	own := p.Waive(nil, Scope{Today: day("2031-01-01"), Covered: everything})
	require.Len(t, own, 2)
	assert.Equal(t, rules.WaiverUnused, own[0].Rule)
	assert.Equal(t, "the waiver of rotor-not-unit at config/*.yaml#cams.*.q matches no finding", own[0].Message)
	assert.NotEqual(t, own[0].Fingerprint(), own[1].Fingerprint())

	own = p.Waive(nil, Scope{Today: day("2031-05-01"), Covered: everything})
	require.Len(t, own, 2)
	assert.Equal(t, rules.WaiverExpired, own[0].Rule, "expired comes before unused")
	assert.Equal(t, "delete it", own[0].Remedy)
	assert.True(t, strings.HasSuffix(own[0].Message, "and it matches no finding"))
}

// What was not audited is not unused. The question is about all that the glob
// can match: its directory without wildcards.
func TestPartialRunsCallNothingUnused(t *testing.T) {
	p := parse(t, twoWaivers+strings.Replace(waiverText("2031-12-31"), "logs/*.csv", "config/one.yaml", 1)+
		strings.Replace(waiverText("2031-12-31"), "logs/*.csv", "**/x.csv", 1))
	var asked []string
	own := p.Waive(nil, Scope{Today: day("2031-01-01"), Covered: func(path string) bool {
		asked = append(asked, path)
		return path == "logs"
	}})
	assert.Equal(t, []string{"config", "logs", "config/one.yaml", "."}, asked)
	require.Len(t, own, 2)
	assert.Equal(t, "dextral.toml:9:1", own[0].Place.String())
	assert.Equal(t, rules.WaiverTooBroad, own[1].Rule)

	elsewhere, err := Parse("survey/dextral.toml", []byte(twoWaivers), ruleNames())
	require.NoError(t, err)
	asked = nil
	elsewhere.Waive(nil, Scope{Today: day("2031-01-01"), Covered: func(path string) bool { asked = append(asked, path); return false }})
	assert.Equal(t, []string{"survey/config", "survey/logs"}, asked, "relative to where the command was started")
}

// Two waivers of one finding: the first one counts, none is unused.
func TestOverlappingWaivers(t *testing.T) {
	p := parse(t, waiverText("2030-01-01")+waiverText("2031-12-31")+waiverText("2032-12-31"))
	f := finding("sign-jump", "logs/a.csv", "")
	own := p.Waive([]*rules.Finding{f}, Scope{Today: day("2031-01-01"), Covered: everything})
	require.NotNil(t, f.Waiver)
	assert.Equal(t, "2031-12-31", f.Waiver.Until, "an expired one does not stand in the way")
	require.Len(t, own, 1)
	assert.Equal(t, rules.WaiverExpired, own[0].Rule)
}

func TestDefaultPolicyWaivesNothing(t *testing.T) {
	f := finding("sign-jump", "logs/a.csv", "")
	assert.Empty(t, Default().Waive([]*rules.Finding{f}, Scope{Today: day("2031-01-01"), Covered: everything}))
	assert.Nil(t, f.Waiver)
}
