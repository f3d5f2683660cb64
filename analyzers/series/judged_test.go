package series

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/rules"
)

// circling writes roll, pitch and a heading that goes round, in a unit per degree.
func circling(unit string, per, pitch float64) string {
	var text strings.Builder
	fmt.Fprintf(&text, "t_s,roll [%[1]s],pitch [%[1]s],yaw [%[1]s]\n", unit)
	for i := range 400 {
		heading := math.Remainder(float64(i)*4, 360)
		fmt.Fprintf(&text, "%.1f,%.4f,%.4f,%.4f\n", 0.1*float64(i), 20*per, pitch*per*math.Sin(float64(i)/9), heading*per)
	}
	return text.String()
}

// Angles in another unit than stated are found by what they reach and where they wrap.
func TestUnitOfAngles(t *testing.T) {
	const rad = math.Pi / 180
	for _, c := range []struct {
		unit       string
		per, pitch float64
		rules      []string
	}{
		{"deg", 1, 30, nil},
		{"rad", rad, 30, nil},
		{"rad", 1, 30, []string{rules.AngleUnitWrong}},
		{"deg", rad, 30, []string{rules.AngleUnitWrong}},
		{"rad", 1, 1, nil}, // pitch could be radians, and the others unwrapped
		{"deg", 1, 88, []string{rules.GimbalLock}},
		{"rad", rad, 88, []string{rules.GimbalLock}},
		{"deg", 1, 84, nil},
		{"deg", 1, 120, nil}, // not the middle angle of a sequence
	} {
		r := read(t, circling(c.unit, c.per, c.pitch), Options{})
		var found []string
		for _, f := range rules.CheckSeries(r.Channels[0]) {
			found = append(found, f.Rule)
		}
		assert.Equal(t, c.rules, found, "%+v", c)
	}
}

// Rows that are not finite are a warning within a log, and a note where it begins with them.
func TestRowsNotFinite(t *testing.T) {
	for row, want := range map[int]rules.Level{0: rules.Note, 7: rules.Warning} {
		text := flight("t_s,qw,qx,qy,qz\n", 40, func(i int) string {
			if i == row {
				return fmt.Sprintf("%d,nan,0,0,0", i)
			}
			return fmt.Sprintf("%d,%s", i, wxyz(i))
		})
		r := read(t, text, Options{})
		var at []rules.Level
		for _, f := range rules.CheckSeries(r.Channels[0]) {
			if f.Rule == rules.NotFinite {
				at = append(at, f.Level)
			}
		}
		assert.Equal(t, []rules.Level{want}, at, "row %d", row)
	}
}
