package report

import (
	"bytes"
	"errors"
	"fmt"
	"regexp"
	"slices"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"dextral/rules"
	"dextral/rules/policy"
)

func TestTextGolden(t *testing.T) {
	golden(t, "text", text(t, sample(), Options{}))
	golden(t, "text-80", text(t, sample(), Options{Width: 80}))
	golden(t, "text-color", text(t, sample(), Options{Width: 100, Color: true}))
	golden(t, "text-nothing", text(t, &Report{}, Options{Width: 80}))
	golden(t, "text-clean", text(t, &Report{Audited: Counts{Files: 1, Values: 1}}, Options{}))
}

// Colour changes nothing but the escapes.
func TestColorOnlyAddsEscapes(t *testing.T) {
	plain, color := text(t, sample(), Options{Width: 80}), text(t, sample(), Options{Width: 80, Color: true})
	assert.NotEqual(t, plain, color)
	assert.Equal(t, string(plain), regexp.MustCompile("\x1b\\[[0-9;]*m").ReplaceAllString(string(color), ""))
}

// The first line of each finding is one that editors can follow.
func TestFirstLines(t *testing.T) {
	lines := strings.Split(string(text(t, sample(), Options{Width: 40})), "\n")
	for _, f := range sample().Findings {
		assert.Contains(t, lines, fmt.Sprintf("%s: %s: %s", f.Place, f.Rule, f.Message))
	}
}

// The order in which findings were made does not show.
func TestTextIsDeterministic(t *testing.T) {
	want := text(t, sample(), Options{Width: 80})
	rapid.Check(t, func(rt *rapid.T) {
		r := sample()
		r.Findings = rapid.Permutation(r.Findings).Draw(rt, "findings")
		r.Undecided = rapid.Permutation(r.Undecided).Draw(rt, "undecided")
		r.Unreadable = rapid.Permutation(r.Unreadable).Draw(rt, "unreadable")
		r.Sort()
		if !bytes.Equal(want, text(t, r, Options{Width: 80})) {
			rt.Fatal("differs")
		}
	})
}

// Explanations keep to the width, first lines, tables and commands stay whole.
func TestWidth(t *testing.T) {
	for _, wide := range []int{60, 80, 120} {
		for _, l := range strings.Split(string(text(t, sample(), Options{Width: wide})), "\n") {
			free := !strings.HasPrefix(l, " ") || strings.Contains(l, "repeat") || strings.HasPrefix(l, "    ") || strings.HasPrefix(l, "  evidence")
			if section := regexp.MustCompile(`^(audited|found|gate|undecided|unread|failed|left out|         )`).MatchString(l); section {
				free = false
			}
			if !free {
				assert.LessOrEqual(t, width(l), wide, l)
			}
		}
	}
}

// The summary alone is the end of the whole text.
func TestSummary(t *testing.T) {
	var b bytes.Buffer
	require.NoError(t, Summary(&b, sample(), Options{Width: 80}))
	assert.True(t, strings.HasPrefix(b.String(), "audited    "))
	assert.True(t, strings.HasSuffix(string(text(t, sample(), Options{Width: 80})), "\n\n"+b.String()))
}

func TestTallyAndGate(t *testing.T) {
	r := sample()
	assert.Equal(t, Tally{Errors: 3, Warnings: 1, Notes: 1, Waived: 1}, r.Tally())
	for gate, want := range map[policy.Gate]int{policy.GateError: 3, policy.GateWarning: 4, policy.GateNote: 5, policy.GateNever: 0} {
		r.Gate = gate
		assert.Equal(t, want, r.Failing(), gate.String())
	}
	r.Gate = policy.GateNever
	assert.Contains(t, string(text(t, r, Options{})), "gate       never: findings do not fail this audit\n")
}

// Text from audited files cannot move the cursor, break the line or turn the
// direction of writing.
func TestHarmless(t *testing.T) {
	nasty := "a\x1b[2Jb\r\nc\td\u202ee\u2028f\x00\xffg\u009bh\u200b"
	r := &Report{Findings: []*rules.Finding{{Rule: "r", Place: rules.Place{Path: nasty, Line: 1, Column: 1, Row: 3, Time: nasty}, Message: nasty, Claim: nasty, Remedy: nasty, Command: nasty,
		Evidence: []rules.Evidence{{What: nasty, Stated: rules.Words(nasty), Computed: rules.Quantity{Value: 1, Unit: nasty, Known: true}}},
		Related:  []rules.Related{{Message: nasty}},
		Waiver:   &rules.Waiver{Because: nasty, Owner: nasty}}},
		Undecided: []Undecided{{Why: nasty, Key: nasty}}, Unreadable: []Skipped{{Path: nasty, Why: nasty}}, Failed: []Failure{{Message: nasty}}}
	out := string(text(t, r, Options{}))
	assert.Regexp(t, `^[\n\x20-\x7e\x{fffd}]*$`, out)
	assert.Contains(t, out, `a\x1b[2Jb\x0d\nc d\u202ee\u2028f\x00`+"\ufffd"+`g\x9bh\u200b`)
	var b bytes.Buffer
	require.NoError(t, Readings(&b, []*rules.Value{{Key: nasty, Place: rules.Place{Path: nasty}, Why: nasty,
		Claims: rules.Claims{{Says: directionOf(nasty), Source: rules.Comment, Text: nasty, Place: rules.Place{Path: nasty}}}}}, Options{}))
	assert.Regexp(t, `^[\n\x20-\x7e\x{fffd}]*$`, b.String())
	assert.Equal(t, "grüße, 東京 °", clean("grüße, 東京 °"), "what is harmless stays")
}

func TestReasonsAreGroupedAndBounded(t *testing.T) {
	r := &Report{}
	for i := range 9 {
		for range i + 1 {
			r.Undecided = append(r.Undecided, Undecided{Place: rules.Place{Path: "a", Line: i + 1, Column: 1}, Key: "k", Why: fmt.Sprintf("reason %d", i)})
		}
	}
	out := string(text(t, r, Options{}))
	assert.Contains(t, out, "undecided  45 values; dextral readings lists them all\n           reason 8: a:9:1 k, a:9:1 k and 7 more\n")
	assert.Contains(t, out, "           reason 3: a:4:1 k, a:4:1 k and 2 more\n           and 3 other reasons\n")
	assert.NotContains(t, out, "reason 2")
}

func TestGrouped(t *testing.T) {
	for n, want := range map[int]string{0: "0", 12: "12", 999: "999", 1000: "1,000", 1234567: "1,234,567"} {
		assert.Equal(t, want, grouped(n))
	}
	assert.Equal(t, "1 log row", plural(int64(1), "log row"))
}

// A full disk or closed pipe is reported.
func TestWriteErrors(t *testing.T) {
	broken := errors.New("broken pipe")
	assert.ErrorIs(t, Text(failing{broken}, sample(), Options{}), broken)
	assert.ErrorIs(t, Summary(failing{broken}, sample(), Options{}), broken)
	assert.ErrorIs(t, Readings(failing{broken}, values(t), Options{}), broken)
	assert.ErrorIs(t, SARIF(failing{broken}, sample(), "0.1.0", two), broken)
}

type failing struct{ err error }

func (f failing) Write([]byte) (int, error) { return 0, f.err }

func TestReadingsGolden(t *testing.T) {
	all := values(t)
	slices.Reverse(all)
	var b bytes.Buffer
	require.NoError(t, Readings(&b, all, Options{Width: 80}))
	golden(t, "readings", b.Bytes())
	assert.Equal(t, "calib/old.yaml", all[1].Place.Path, "the caller's order is left alone")
	for _, l := range strings.Split(b.String(), "\n") {
		assert.LessOrEqual(t, width(l), 80, l)
	}
	assert.Equal(t, strings.Repeat("é", 60), shortened(strings.Repeat("é", 60)))
	assert.Equal(t, strings.Repeat("é", 57)+"...", shortened(strings.Repeat("é", 61)))
	b.Reset()
	require.NoError(t, Readings(&b, nil, Options{}))
	assert.Equal(t, "0 orientation values: 0 read, 0 undecided\n", b.String())
}
