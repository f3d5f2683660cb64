package series

import (
	"flag"
	"fmt"
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/core/rotor"
	"dextral/rules"
)

var flights = flag.Int("flights", 10, "random flights for each kind of injected fault")

// logRow is a row of a simulated log.
type logRow struct {
	q [4]float64
	w rotor.Vec
	a [3]float64 // roll, pitch, yaw in degrees
}

// anyLog flies 30 s at 50 Hz about all axes: kinematics in steps of 2 ms, rates with
// noise and an offset.
func anyLog(g *rand.Rand) []logRow {
	var swing [3][2][3]float64
	for i := range swing {
		for k := range swing[i] {
			swing[i][k] = [3]float64{0.2 + 0.5*g.Float64(), 0.4 + 2*g.Float64(), 2 * math.Pi * g.Float64()}
		}
	}
	rate := func(t float64) rotor.Vec {
		var w [3]float64
		for i := range swing {
			for _, s := range swing[i] {
				w[i] += s[0] * math.Sin(s[1]*t+s[2])
			}
		}
		return rotor.Vec{X: w[0], Y: w[1], Z: w[2]}
	}
	offset := rotor.Vec{X: g.NormFloat64(), Y: g.NormFloat64(), Z: g.NormFloat64()}.Scale(0.01)
	r := rotor.FromRotationVector(rotor.Vec{X: g.NormFloat64(), Y: g.NormFloat64(), Z: g.NormFloat64()}.Scale(0.5))
	var rows []logRow
	for ms := 0; ms < 30000; ms += 2 {
		t := float64(ms) / 1000
		if ms%20 == 0 {
			w, x, y, z := r.Quaternion()
			noise := rotor.Vec{X: g.NormFloat64(), Y: g.NormFloat64(), Z: g.NormFloat64()}.Scale(0.02)
			rows = append(rows, logRow{[4]float64{w, x, y, z}, rate(t).Add(offset).Add(noise), rollPitchYaw(w, x, y, z)})
		}
		r = r.Mul(rotor.FromRotationVector(rate(t + 0.001).Scale(0.002)))
	}
	return rows
}

// rollPitchYaw of the matrix of the quaternion, z-y'-x”, by the usual formula (any text).
func rollPitchYaw(w, x, y, z float64) [3]float64 {
	const deg = 180 / math.Pi
	return [3]float64{math.Atan2(2*(y*z+w*x), 1-2*(x*x+y*y)) * deg, math.Asin(max(-1, min(1, 2*(w*y-x*z)))) * deg, math.Atan2(2*(x*y+w*z), 1-2*(y*y+z*z)) * deg}
}

func logText(rows []logRow) string {
	var text strings.Builder
	text.WriteString("t_s,att_qw,att_qx,att_qy,att_qz,gyro_x [rad/s],gyro_y [rad/s],gyro_z [rad/s],att_roll [deg],att_pitch [deg],att_yaw [deg]\n")
	for i, r := range rows {
		fmt.Fprintf(&text, "%.2f,%.6f,%.6f,%.6f,%.6f,%.5f,%.5f,%.5f,%.4f,%.4f,%.4f\n", 0.02*float64(i), r.q[0], r.q[1], r.q[2], r.q[3], r.w.X, r.w.Y, r.w.Z, r.a[0], r.a[1], r.a[2])
	}
	return text.String()
}

// judged are the findings on a log, of a level at least, but those on gimbal lock, which flights
// about all axes do pass.
func judged(t *testing.T, rows []logRow, least rules.Level) []*rules.Finding {
	r := read(t, logText(rows), Options{})
	var found []*rules.Finding
	for _, s := range r.Channels {
		found = append(found, rules.CheckSeries(s)...)
	}
	for _, p := range r.Pairs {
		found = append(found, rules.CheckPair(p)...)
	}
	var out []*rules.Finding
	for _, f := range found {
		if f.Level >= least && f.Rule != rules.GimbalLock {
			out = append(out, f)
		}
	}
	return out
}

// faults are injected from row n on, to row m where they end; they say which rule
// must speak, and in which rows: from low to high.
var faults = []struct {
	name, rule string
	inject     func(rows []logRow, n, m int)
	rows       func(n, m int) (low, high int) // nil: the whole log
}{
	{"sign jumps", rules.SignJump, func(rows []logRow, n, m int) {
		for i := n; i < m; i++ {
			negate(rows[i].q[:])
		}
	}, func(n, _ int) (int, int) { return n + 1, n + 1 }},
	{"swapped order", rules.GyroDisagrees, func(rows []logRow, _, _ int) {
		for i := range rows {
			q := &rows[i].q
			*q = [4]float64{q[1], q[2], q[3], q[0]}
		}
	}, nil},
	{"degrees", rules.GyroDisagrees, func(rows []logRow, _, _ int) {
		for i := range rows {
			rows[i].w = rows[i].w.Scale(180 / math.Pi)
		}
	}, nil},
	{"conjugate beside angles", rules.DirectionReversed, func(rows []logRow, _, _ int) { // a note: nobody states a direction
		for i := range rows {
			negate(rows[i].q[1:])
		}
	}, nil},
	{"wrong sequence", rules.SequenceMislabelled, func(rows []logRow, _, _ int) {
		for i := range rows {
			rows[i].a[0], rows[i].a[2] = rows[i].a[2], rows[i].a[0]
		}
	}, nil},
	{"stale rows", rules.StaleRows, func(rows []logRow, n, _ int) {
		for i := n + 1; i < n+40; i++ {
			rows[i].q, rows[i].a = rows[n].q, rows[n].a
		}
	}, func(n, _ int) (int, int) { return n + 1, n + 1 }},
	{"mid-log conjugate", rules.ConventionChanges, func(rows []logRow, n, m int) {
		for i := n; i < m; i++ {
			negate(rows[i].q[1:])
		}
	}, func(n, _ int) (int, int) { return n + 1, n + 11 }},
	{"mid-log degrees", rules.ConventionChanges, func(rows []logRow, n, _ int) {
		for i := n; i < len(rows); i++ {
			rows[i].w = rows[i].w.Scale(180 / math.Pi)
		}
	}, func(n, _ int) (int, int) { return n + 1, n + 11 }},
}

func negate(v []float64) {
	for i := range v {
		v[i] = -v[i]
	}
}

// TestInjectedFaults: faults are found with their rows, and nothing in the clean twins.
func TestInjectedFaults(t *testing.T) {
	for k, fault := range faults {
		g := rand.New(rand.NewPCG(7, uint64(k)))
		found, clean := 0, 0
		for range *flights {
			rows := anyLog(g)
			if f := judged(t, rows, rules.Warning); len(f) > 0 {
				clean++
				t.Logf("clean twin: %s", f[0].Message)
			}
			n := 200 + g.IntN(500)
			m := n + 300 + g.IntN(300)
			fault.inject(rows, n, m)
			hit := false
			all := judged(t, rows, rules.Note)
			for _, f := range all {
				low, high := 0, math.MaxInt
				if fault.rows != nil {
					low, high = fault.rows(n, m)
				}
				hit = hit || f.Rule == fault.rule && f.Place.Row >= int64(low) && f.Place.Row <= int64(high)
			}
			if hit {
				found++
			} else {
				t.Logf("%s at rows %d to %d missed: %d other findings", fault.name, n+1, m+1, len(all))
				for _, f := range all {
					t.Logf("   %s row %d: %.200s", f.Rule, f.Place.Row, f.Message)
				}
			}
		}
		t.Logf("%-24s found %d of %d, in clean twins %d", fault.name, found, *flights, clean)
		assert.GreaterOrEqual(t, float64(found), 0.98*float64(*flights)-0.5, fault.name)
		assert.Zero(t, clean, fault.name)
	}
}
