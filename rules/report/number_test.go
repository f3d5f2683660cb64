package report

import (
	"math"
	"strconv"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"

	"dextral/core/convention"
	"dextral/rules"
)

func directionOf(frame string) convention.Term { return convention.Direction{To: frame, From: frame} }

func inDegrees(x float64) rules.Quantity { return rules.Quantity{Value: x, Unit: "deg", Known: true} }

func TestResiduals(t *testing.T) {
	for x, want := range map[float64]string{
		0: "0", 23.4137: "23.4", 4.0961: "4.1", 1.3604: "1.36", 179.97: "180", 118.25: "118.2", 359.6: "359.6",
		0.04137: "0.0414", 0.0054321: "0.0054", 0.000312: "0.0003", 0.0009996: "0.001", 2e-9: "0", -23.4137: "-23.4", 180: "180", 9.9996: "10",
	} {
		assert.Equal(t, want, residualText(inDegrees(x)), x)
	}
	for x, want := range map[float64]string{
		0: "0", 0.021302: "0.0213", -0.5: "-0.5", 2.13e-5: "2.13e-5", 2e-16: "2e-16", -1.9999871: "-2", 12400: "12400", 1e20: "1e20", 123456.7: "123457", 3.7e8 + 0.5: "3.7e8",
	} {
		assert.Equal(t, want, residualText(rules.Plain(x)), x)
	}
	assert.Equal(t, "NaN", residualText(inDegrees(math.NaN())))
	assert.Equal(t, "inf", residualText(rules.Plain(math.Inf(1))))
	assert.Equal(t, "-inf", computedText(rules.Plain(math.Inf(-1)), rules.Plain(1)))
}

// A computed number shows how far it is from the stated one.
func TestComputedShowsTheDifference(t *testing.T) {
	for _, c := range []struct {
		x, stated float64
		want      string
	}{
		{1.021302, 1, "1.0213"}, {1.0000213, 1, "1.0000213"}, {0.99999871, 1, "0.99999871"}, {1 + 2.2e-16, 1, "1"},
		{1, 1, "1"}, {-0.9999871, 1, "-1"}, {32.8604, 31.5, "32.86"}, {0.0123, 0, "0.0123"}, {0, 1, "0"},
		{1e-17, 0, "1e-17"}, {90, 1.5707963, "90"}, {0.001, 57, "0.001"}, {1.5e9, 1, "1500000000"},
	} {
		assert.Equal(t, c.want, computedText(rules.Plain(c.x), rules.Plain(c.stated)), "%v for %v", c.x, c.stated)
	}
	assert.Equal(t, "359.8", computedText(inDegrees(359.8), inDegrees(0.2)))
	alone := rules.Quantity{}
	assert.Equal(t, "-0.9999871", computedText(rules.Plain(-0.9999871), alone))
	assert.Equal(t, "0.000231", computedText(rules.Plain(0.000231), alone))
	assert.Equal(t, "1", computedText(rules.Plain(1), alone))
	assert.Equal(t, "23.4", computedText(inDegrees(23.4137), rules.Words("z-y'-x''")))
	assert.Equal(t, "1.02", computedText(inDegrees(1.02131), alone), "one degree is nothing special")
	assert.Equal(t, "31.5", statedText(inDegrees(31.5)))
	assert.Equal(t, "0.1", statedText(rules.Plain(0.1)))
	assert.Equal(t, "75.3156", statedText(inDegrees(75.31564289)))
}

// What is printed is near what was meant: to half a unit of the third digit of
// the number, or of the deviation that it is to show.
func TestPrintedNumbersAreNear(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		x := rapid.Float64Range(-1e300, 1e300).Draw(t, "x")
		s := residualText(rules.Plain(x))
		back, err := strconv.ParseFloat(s, 64)
		if err != nil {
			t.Fatal(err)
		}
		if math.Abs(back-x) > math.Abs(x)*5.0001e-3 {
			t.Fatalf("%v prints as %s", x, s)
		}
		d := rapid.Float64Range(1e-12, 10).Draw(t, "deviation")
		s = computedText(rules.Plain(1+d), rules.Plain(1))
		back, err = strconv.ParseFloat(s, 64)
		if err != nil {
			t.Fatal(err)
		}
		if math.Abs(back-(1+d)) > d*5.0001e-3+3e-16 {
			t.Fatalf("1 + %v prints as %s", d, s)
		}
		if strings.Contains(s, ".") && (strings.HasSuffix(s, "0") || strings.HasSuffix(s, ".")) {
			t.Fatalf("%s has trailing zeros", s)
		}
	})
}

// Points of a column stand below each other, whatever the magnitudes.
func TestTablesAlign(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		var rows []rules.Evidence
		for range rapid.IntRange(1, 6).Draw(t, "rows") {
			e := rules.Evidence{What: rapid.SampledFrom([]string{"a", "a long label", "grüße", "東京"}).Draw(t, "what")}
			e.Residual = inDegrees(rapid.Float64Range(1e-3, 180).Draw(t, "residual"))
			if rapid.Bool().Draw(t, "stated") {
				e.Stated = rules.Words(rapid.SampledFrom([]string{"x", "angles, z-y'-x''"}).Draw(t, "words"))
			}
			rows = append(rows, e)
		}
		lines := evidence(rows, 0)
		points := map[int]bool{}
		for _, l := range lines[1:] {
			number := strings.TrimSuffix(l, " deg")
			start := strings.LastIndexByte(number, ' ') + 1
			whole, _, _ := strings.Cut(number[start:], ".")
			points[width(number[:start]+whole)] = true
		}
		if len(points) != 1 {
			t.Fatalf("not aligned:\n%s", strings.Join(lines, "\n"))
		}
	})
}

func TestEvidenceShowsOnlyColumnsWithContent(t *testing.T) {
	assert.Equal(t, []string{
		"evidence     residual",
		"  as stated  23.4 deg",
	}, evidence([]rules.Evidence{{What: "as stated", Residual: inDegrees(23.4137)}}, 0))
	assert.Equal(t, []string{"evidence", "  and 3 more rows"}, evidence([]rules.Evidence{{What: "and 3 more rows"}}, 0))
}

// Long words are folded in their own column; numbers stand on the first line.
func TestTablesFoldWords(t *testing.T) {
	rows := []rules.Evidence{
		{What: "with one the reverse of the other (a conjugate, a transpose or the opposite direction), the second turning twice as far", Residual: inDegrees(29.4)},
		{What: "as stated", Stated: rules.Words("angles, z-y'-x'' (moving axes), degree, v_body = R v_cam"), Residual: inDegrees(5.27)},
	}
	assert.Equal(t, []string{
		"evidence                                              stated                                    residual",
		"  with one the reverse of the other (a conjugate, a                                            29.4 deg",
		"    transpose or the opposite direction), the second",
		"    turning twice as far",
		"  as stated                                           angles, z-y'-x'' (moving axes), degree,   5.27 deg",
		"                                                      v_body = R v_cam",
	}, evidence(rows, 0))
	for _, wide := range []int{80, 100} {
		for _, l := range evidence(rows, wide) {
			assert.LessOrEqual(t, width(l), wide, l)
		}
	}
}
