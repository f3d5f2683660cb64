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
	golden(t, "text-200", text(t, sample(), Options{Width: 200}))
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

// The first line of each finding is one that editors can follow: whole in files
// and pipes, and on a terminal with its message wrapped below.
func TestFirstLines(t *testing.T) {
	lines := strings.Split(string(text(t, sample(), Options{})), "\n")
	narrow := string(text(t, sample(), Options{Width: 40}))
	for _, f := range sample().Findings {
		line := fmt.Sprintf("%s: %s: %s", f.Place, f.Rule, f.Message)
		assert.Contains(t, lines, line)
		assert.Contains(t, strings.ReplaceAll(narrow, "\n    ", " "), line)
		assert.Contains(t, "\n"+narrow, "\n"+f.Place.String()+":")
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

// Everything but commands keeps to the width of usual terminals.
func TestWidth(t *testing.T) {
	for _, wide := range []int{80, 120, 200} {
		for _, l := range strings.Split(string(text(t, sample(), Options{Width: wide})), "\n") {
			if !strings.HasPrefix(l, "  repeat") {
				assert.LessOrEqual(t, width(l), wide, l)
			}
		}
	}
}

// Findings of one cause are shown once with their evidence, all with their first
// lines; two are shown in full, and so is what is waived or of another cause.
func TestOneCauseIsShownOnce(t *testing.T) {
	make := func(n int) *Report {
		r := sample()
		for i := range n {
			f := *r.Findings[1]
			f.Key = fmt.Sprintf("cams[%d].q", i)
			f.Place = at("calib/cams.yaml", 10*(i+1), 5, 20)
			f.Message = fmt.Sprintf("%s claims a unit quaternion, but its norm is 1.0%d", f.Key, i)
			r.Findings = append(r.Findings, &f)
		}
		r.Sort()
		return r
	}
	assert.NotContains(t, string(text(t, make(2), Options{})), "one cause")
	out := string(text(t, make(4), Options{}))
	for i := range 4 {
		assert.Contains(t, out, fmt.Sprintf("\ncalib/cams.yaml:%d:5: rotor-not-unit: cams[%d].q claims", 10*(i+1), i))
	}
	assert.Equal(t, 2, strings.Count(out, "deviation that the digits written allow"), "once for the four, once for the other file")
	assert.Contains(t, out, "\n  alike    these 4 are alike and may have one cause; the other formats give the evidence of each\n")
	assert.Contains(t, out, "found      7 errors", "all are counted")
	r := make(4)
	for _, f := range r.Findings {
		if strings.HasPrefix(f.Key, "cams[") {
			f.Waiver = &rules.Waiver{Rule: f.Rule, Place: "x", Until: "2031-01-01"}
		}
	}
	assert.NotContains(t, string(text(t, r, Options{})), "one cause")
}

// What a file of waivers accepts is counted, not listed.
func TestBacklogIsCounted(t *testing.T) {
	r := sample()
	for i, f := range r.Findings[1:5] {
		f.Waiver = &rules.Waiver{Rule: f.Rule, Place: "x", Until: fmt.Sprintf("2031-0%d-01", 9-i), InFile: true, At: at("backlog.toml", 9, 1, 10)}
	}
	out := string(text(t, r, Options{}))
	assert.Contains(t, out, "\nfound      1 error, 1 note; waived: 4\nwaived     4 by backlog.toml, the first until 2031-06-01: 1 mirrored-rotation, 1 not-finite, 1 rotor-not-unit, 1 sign-jump\ngate")
	assert.NotContains(t, out, "logs/flight.bin")
}

// Where a terminal shows ASCII only, other characters become escapes.
func TestASCII(t *testing.T) {
	r := &Report{Findings: []*rules.Finding{{Rule: "r", Place: rules.Place{Path: "grün/東.yaml", Line: 1, Column: 1}, Message: "q\u0302 \U0001f6e9"}}}
	out := string(text(t, r, Options{ASCII: true, Color: true, Width: 80}))
	assert.Regexp(t, `^[\n\x1b\x20-\x7e]*$`, out)
	assert.Contains(t, out, `gr\u00fcn/\u6771.yaml:1:1:`)
	assert.Contains(t, out, `q\u0302 \U0001f6e9`)
	assert.Equal(t, string(text(t, sample(), Options{})), string(text(t, sample(), Options{ASCII: true})), "dextral itself writes nothing else")
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
