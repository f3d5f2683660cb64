package series

import (
	"bytes"
	"compress/gzip"
	"context"
	"errors"
	"fmt"
	"io"
	"math/rand/v2"
	"strings"
	"testing"
	"testing/iotest"

	"github.com/klauspost/compress/zstd"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/core/matrix"
	"dextral/core/rotor"
	"dextral/rules"
)

func read(t require.TestingT, text string, opts Options) Result {
	r, err := Read(context.Background(), "tern.csv", strings.NewReader(text), opts)
	require.NoError(t, err)
	return r
}

// turn is the orientation of row i of a flight that rolls slowly: the
// quaternion changes sign nowhere.
func turn(i int) rotor.Rotor {
	return rotor.FromRotationVector(rotor.Vec{X: 0.2 + 0.001*float64(i), Y: 0.1, Z: 0.3})
}

// flight is a log of the given rows; row prints one.
func flight(header string, rows int, row func(i int) string) string {
	var b strings.Builder
	b.WriteString(header)
	for i := range rows {
		b.WriteString(row(i))
		b.WriteByte('\n')
	}
	return b.String()
}

func wxyz(i int) string {
	w, x, y, z := turn(i).Quaternion()
	return fmt.Sprintf("%.6f,%.6f,%.6f,%.6f", w, x, y, z)
}

func TestQuaternionChannel(t *testing.T) {
	r := read(t, flight("time_us,qw,qx,qy,qz\n", 100, func(i int) string {
		s := wxyz(i)
		if i >= 40 && i < 60 { // two jumps, before rows 41 and 61
			w, x, y, z := turn(i).Neg().Quaternion()
			s = fmt.Sprintf("%.6f,%.6f,%.6f,%.6f", w, x, y, z)
		}
		return fmt.Sprintf("%d,%s", 1000*i, s)
	}), Options{})
	require.Len(t, r.Channels, 1)
	s := r.Channels[0]
	assert.Equal(t, "q", s.Value.Key)
	assert.Equal(t, convention.Quaternion, s.Value.Form)
	assert.Equal(t, convention.ScalarFirst, s.Value.Claims.Scalar())
	assert.Equal(t, []string{"qw", "qx", "qy", "qz"}, s.Columns)
	assert.Equal(t, rules.Place{Path: "tern.csv", Line: 1, Column: 9, EndLine: 1, EndColumn: 20}, s.Value.Place)
	assert.Equal(t, rules.Place{Path: "tern.csv", Line: 2, Column: 3, EndLine: 2, EndColumn: 11}, s.Value.Numbers[0].Place)
	assert.EqualValues(t, 100, s.Rows)
	assert.Equal(t, "us", s.Unit)
	assert.Equal(t, 0.5e-6, s.Half)
	assert.False(t, s.Float32)
	c := s.Continuity
	require.EqualValues(t, 2, c.JumpCount)
	assert.EqualValues(t, 41, c.Jumps[0].Row)
	assert.Equal(t, rules.Place{Path: "tern.csv", Line: 42, Column: 1, EndLine: 43, EndColumn: 1, Row: 41}, s.RowPlace(41))
	assert.Equal(t, "40000", s.Stamp(c.Jumps[0].T))
	assert.InDelta(t, 1, c.MaxNorm.Value, 1e-6) // |q| of numbers that are off by half a unit: sqrt(4)/2 units
	assert.Equal(t, "comma-separated", r.Format)
	assert.Zero(t, r.BadRows)
}

func TestScalarLastByDeclaration(t *testing.T) {
	text := flight("t,q1,q2,q3,q4\n", 50, func(i int) string {
		w, x, y, z := turn(i).Quaternion()
		return fmt.Sprintf("%d,%.6f,%.6f,%.6f,%.6f", i, -x, -y, -z, w) // x is below zero everywhere, w is not
	})
	r := read(t, text, Options{})
	require.Len(t, r.Channels, 1)
	assert.Equal(t, convention.ScalarUnstated, r.Channels[0].Value.Claims.Scalar())
	r = read(t, text, Options{Declare: func(v *rules.Value) {
		v.Claims = append(v.Claims, rules.Claim{Says: convention.ScalarLast, Source: rules.Declaration})
	}})
	assert.Zero(t, r.Channels[0].Continuity.NegativeScalar.Count)
	assert.Equal(t, []string{"q1", "q2", "q3", "q4"}, r.Channels[0].Columns)
}

// A declaration settles what names leave open, and takes away what they claim.
func TestDeclaredForm(t *testing.T) {
	declare := func(f convention.Form) Options {
		return Options{Declare: func(v *rules.Value) {
			v.Form, v.Why = f, ""
			v.Claims = append(v.Claims, rules.Claim{Says: f, Source: rules.Declaration})
		}}
	}
	text := "t,rot_x,rot_y,rot_z\n0,0.1,0.2,0.3\n1,0.1,0.2,0.3\n"
	r := read(t, text, Options{})
	assert.Empty(t, r.Channels)
	require.Len(t, r.Undecided, 1)
	assert.Contains(t, r.Undecided[0].Why, "without a fourth")
	assert.Zero(t, r.Rows, "nothing to read rows for")
	r = read(t, text, declare(convention.RotationVector))
	require.Len(t, r.Channels, 1)
	assert.EqualValues(t, 2, r.Rows)

	joints := "t,q0,q1,q2,q3\n0,1.5,0.2,0.3,0.1\n1,1.5,0.2,0.3,0.1\n"
	r = read(t, joints, Options{})
	require.Len(t, r.Undecided, 1)
	assert.Contains(t, r.Undecided[0].Why, "norm of the first rows is 1.546")
	assert.Len(t, read(t, joints, declare(convention.Quaternion)).Channels, 1, "declared: held to its word")
	assert.Empty(t, read(t, "qw,qx,qy,qz\n1,0,0,0\n", declare(convention.NoForm)).Channels)
}

func TestAnglesAndPairs(t *testing.T) {
	seq := angle.Sequence{Axes: [3]angle.Axis{angle.Z, angle.Y, angle.X}}
	r := read(t, flight("t,att_qw,att_qx,att_qy,att_qz,att_yaw [deg],att_pitch [deg],att_roll [deg]\n", 500, func(i int) string {
		a := seq.Angles(turn(i))
		return fmt.Sprintf("%d,%s,%.4f,%.4f,%.4f", i, wxyz(i), a.A*180/3.141592653589793, a.B*180/3.141592653589793, a.C*180/3.141592653589793)
	}), Options{})
	require.Len(t, r.Channels, 2)
	angles := r.Channels[1]
	assert.Equal(t, convention.Degree, angles.Value.Claims.Unit())
	assert.Equal(t, [3]angle.Role{angle.RoleYaw, angle.RolePitch, angle.RoleRoll}, angles.Value.Roles)
	assert.Equal(t, 0.5e-4, angles.Half)
	require.Len(t, angles.Ranges, 3)
	assert.Less(t, angles.Ranges[2].Min.Value, angles.Ranges[2].Max.Value)
	assert.EqualValues(t, 500, angles.Ranges[2].Max.Row)
	require.Len(t, r.Pairs, 1)
	p := r.Pairs[0]
	assert.Same(t, r.Channels[0], p.First)
	assert.Same(t, angles, p.Second)
	assert.Greater(t, len(p.Samples), 16)
	for _, s := range p.Samples { // both sides are of the row they say
		w, _, _, _ := turn(int(s.Row - 1)).Quaternion()
		assert.InDelta(t, w, s.First[0], 1e-6)
		assert.InDelta(t, seq.Angles(turn(int(s.Row-1))).A*180/3.141592653589793, s.Second[0], 1e-4)
	}
}

// Channels of different bodies, or two of the same kind, are not compared.
func TestNoPair(t *testing.T) {
	for _, header := range []string{
		"t,gt_qw,gt_qx,gt_qy,gt_qz,est_yaw,est_pitch,est_roll",
		"t,qw,qx,qy,qz,des_roll,des_pitch,des_yaw",
	} {
		r := read(t, flight(header+"\n", 5, func(i int) string { return fmt.Sprintf("%d,%s,0.1,0.2,0.3", i, wxyz(i)) }), Options{})
		assert.Len(t, r.Channels, 2, header)
		assert.Empty(t, r.Pairs, header)
	}
}

func TestMatrixChannel(t *testing.T) {
	row := func(i int) string {
		m := matrix.FromRotor(turn(i))
		return fmt.Sprintf("%d,%.8f,%.8f,%.8f,%.8f,%.8f,%.8f,%.8f,%.8f,%.8f", i, m[0][0], m[0][1], m[0][2], m[1][0], m[1][1], m[1][2], m[2][0], m[2][1], m[2][2])
	}
	r := read(t, flight("t,R00,R01,R02,R10,R11,R12,R20,R21,R22\n", 40, row), Options{})
	require.Len(t, r.Channels, 1)
	m := r.Channels[0].Matrices
	assert.EqualValues(t, 40, m.Count)
	assert.Zero(t, m.Mirrors.Count)
	assert.Less(t, m.Defect.Value, 6*0.5e-8*1.01) // 6 half units, to first order
	noise := flight("t,R00,R01,R02,R10,R11,R12,R20,R21,R22\n", 40, func(i int) string { return fmt.Sprintf("%d,0.04,0,0,0,0.04,0,0,0,0.09", i) })
	r = read(t, noise, Options{})
	assert.Empty(t, r.Channels)
	require.Len(t, r.Undecided, 1)
	assert.Contains(t, r.Undecided[0].Why, "not orthonormal")
}

func TestHeaderless(t *testing.T) {
	tum := func(i int) string {
		w, x, y, z := turn(i).Quaternion()
		return fmt.Sprintf("%.4f 1.5 %d 0.25 %.7f %.7f %.7f %.7f", 1700000000+0.1*float64(i), i, x, y, z, w)
	}
	r := read(t, flight("", 30, tum), Options{})
	require.Len(t, r.Channels, 1)
	s := r.Channels[0]
	assert.Equal(t, convention.ScalarLast, s.Value.Claims.Scalar())
	claim, _ := s.Value.FormClaim()
	assert.Equal(t, rules.Shape, claim.Source)
	assert.Equal(t, "columns 5-8", s.Value.Key)
	assert.Equal(t, "s", s.Unit)
	assert.Zero(t, s.Continuity.NegativeScalar.Count)
	w, _, _, _ := turn(0).Quaternion()
	assert.InDelta(t, w, s.Value.Numbers[3].Value, 1e-7)

	r = read(t, flight("# timestamp tx ty tz qx qy qz qw\n", 30, tum), Options{})
	require.Len(t, r.Channels, 1)
	assert.Equal(t, []string{"qw", "qx", "qy", "qz"}, r.Channels[0].Columns)

	kitti := func(i int) string {
		m := matrix.FromRotor(turn(i))
		return fmt.Sprintf("%e %e %e %d %e %e %e 0.5 %e %e %e 1", m[0][0], m[0][1], m[0][2], i, m[1][0], m[1][1], m[1][2], m[2][0], m[2][1], m[2][2])
	}
	r = read(t, flight("", 30, kitti), Options{})
	require.Len(t, r.Channels, 1)
	assert.Equal(t, convention.Transform, r.Channels[0].Value.Form)
	assert.Less(t, r.Channels[0].Matrices.Defect.Value, 6*0.5e-6)
	assert.Nil(t, r.Clock)

	r = read(t, flight("", 30, func(i int) string { return strings.ReplaceAll(fmt.Sprintf("%d,%s", i, wxyz(i)), ",", " ") }), Options{})
	assert.Empty(t, r.Channels)
	require.Len(t, r.Undecided, 1)
	assert.Contains(t, r.Undecided[0].Why, "four columns of unit norm")
	for name, text := range map[string]string{
		"labels":       "1 0 0 0\n0 0 1 0\n0 0 0 1\n",
		"measurements": "1.5 2.5 3.5 4.5 5 6 7 8\n1.5 2.5 3.5 4.5 5 6 7 8\n",
		"calibration":  "R: 0.5 0.5 0.5 0.5\nR: 0.5 0.5 0.5 -0.5\nT: 1 2 3 4\nT: 1 2 3 4\nR: 0.5 0.5 0.5 0.5\nR: 0.5 0.5 0.5 -0.5\n",
		"few rows":     "0.5 0.5 0.5 0.5 7\n0.5 0.5 0.5 -0.5 7\n",
	} {
		r := read(t, text, Options{})
		assert.Empty(t, r.Channels, name)
		assert.Empty(t, r.Undecided, name)
	}
}

func TestHeadersInManyLines(t *testing.T) {
	for _, header := range []string{
		"time,roll,pitch,yaw\n[s],[deg],[deg],[deg]\n",
		"time,roll,pitch,yaw\ns,deg,deg,deg\n",
		"s,deg,deg,deg\ntime,roll,pitch,yaw\n",
		"Survey 12, aircraft Tern\n# recorded by Saltmarsh Survey\n\ntime [s],roll [deg],pitch [deg],yaw [deg]\n",
	} {
		r := read(t, flight(header, 3, func(i int) string { return fmt.Sprintf("%d,10.5,0.25,90.5", i) }), Options{})
		require.Len(t, r.Channels, 1, header)
		assert.Equal(t, convention.Degree, r.Channels[0].Value.Claims.Unit(), header)
		assert.Equal(t, "s", r.Channels[0].Unit, header)
		assert.EqualValues(t, 3, r.Rows, header)
		assert.Zero(t, r.BadRows, header)
	}
	r := read(t, flight("time,orientation,,,\n,x,y,z,w\n", 3, func(i int) string { return fmt.Sprintf("%d,0.1,0.2,0.3,0.927362", i) }), Options{})
	require.Len(t, r.Channels, 1)
	assert.Equal(t, "orientation", r.Channels[0].Value.Key)
}

func TestBadRows(t *testing.T) {
	var lines []string
	for i := range 20 {
		lines = append(lines, fmt.Sprintf("%d,%s", i, wxyz(i)))
	}
	lines[2] = "2,1,0,0"
	lines[3] = "# paused"
	lines[4] = ""
	lines[5] = "5,one,0,0,0"
	lines[6] = "6,1,0,0,0,7"
	lines[7] = "7," + strings.Repeat("0", 70000) + ",0,0,1"
	lines[8] = "8," + strings.Repeat("0", 300000)
	lines[9] = "9,nan,nan,nan,nan"
	lines[10] = "10,,,,"
	lines[11] = "11,inf,0,0,0"
	lines[12] = "\x00\x01\xff\xfe"
	r := read(t, "t,qw,qx,qy,qz\r\n"+strings.Join(lines, "\r\n"), Options{}) // no line end at the end
	require.Len(t, r.Channels, 1)
	assert.EqualValues(t, 6, r.BadRows)
	assert.EqualValues(t, 12, r.Rows)
	var shown []string
	for _, b := range r.FirstBad {
		assert.Equal(t, int64(b.Place.Line-1), b.Place.Row)
		shown = append(shown, fmt.Sprintf("%d %s", b.Place.Line, b.Reason))
	}
	assert.Equal(t, []string{
		"4 has 4 columns; 5 are expected",
		"7 column 2 (qw) is no number",
		"8 has 6 columns; 5 are expected",
		"9 is longer than 65536 bytes",
		"10 is longer than 65536 bytes",
		"14 column 1, the time stamp, is no number",
	}, shown)
	c := r.Channels[0].Continuity
	assert.EqualValues(t, 2, c.NonFinite.Count)
	assert.EqualValues(t, 10, c.NonFinite.First.Row)
	assert.EqualValues(t, 1, r.Channels[0].Gaps.Count)
	assert.EqualValues(t, 11, r.Channels[0].Gaps.First.Row)
	assert.Zero(t, c.JumpCount, "the neighbours of a gap are neighbours")
}

func TestManyBadRows(t *testing.T) {
	r := read(t, flight("t,qw,qx,qy,qz\n0,1,0,0,0\n", 5000, func(int) string { return "x" }), Options{})
	assert.EqualValues(t, 5000, r.BadRows)
	assert.Len(t, r.FirstBad, MaxBadRows)
}

func TestNothingToRead(t *testing.T) {
	for name, text := range map[string]string{
		"empty":          "",
		"blank":          "\n \n",
		"header only":    "t,qw,qx,qy,qz\n",
		"something else": "date,price\n1,2\n3,4\n",
		"prose":          "Dear all,\n\nthe flight is off.\n",
		"binary":         "\x00\x01\x02,\xff",
	} {
		r := read(t, text, Options{})
		assert.Empty(t, r.Channels, name)
		assert.Empty(t, r.Undecided, name)
		assert.Zero(t, r.Rows, name)
	}
}

func TestListOfOrientations(t *testing.T) {
	r := read(t, "camera,qw,qx,qy,qz\nleft,1,0,0,0\nright,-1,0,0,0\n", Options{})
	assert.Empty(t, r.Channels)
	require.Len(t, r.Undecided, 1)
	assert.Contains(t, r.Undecided[0].Why, "not a series")
	r = read(t, "t,mode,qw,qx,qy,qz\n0,on,1,0,0,0\n1,off,-1,0,0,0\n", Options{})
	assert.Len(t, r.Channels, 1)
}

// Independent orientations, such as check values, are no series: nothing can jump there.
func TestIndependentRows(t *testing.T) {
	rng := rand.New(rand.NewPCG(9, 9))
	random := func(int) string {
		r, _ := rotor.Rotor{S: rng.NormFloat64(), E23: rng.NormFloat64(), E31: rng.NormFloat64(), E12: rng.NormFloat64()}.Unit()
		w, x, y, z := r.Quaternion()
		return fmt.Sprintf("%.9f,%.9f,%.9f,%.9f", w, x, y, z)
	}
	r := read(t, flight("qw,qx,qy,qz\n", 40, random), Options{})
	require.Len(t, r.Channels, 1)
	assert.Contains(t, r.Channels[0].Value.Why, "a list of orientations")
	r = read(t, flight("t,qw,qx,qy,qz\n", 40, func(i int) string { return fmt.Sprintf("%d,%s", i, random(i)) }), Options{})
	assert.Empty(t, r.Channels[0].Value.Why, "whoever gives times says that it is a series")
	r = read(t, flight("case,t,qw,qx,qy,qz\n", 40, func(i int) string { return fmt.Sprintf("%d,%d,%s", i/4, i%4, wxyz(i)) }), Options{})
	assert.Contains(t, r.Channels[0].Value.Why, "column t runs backwards at 9 of 40 rows")
	assert.Nil(t, r.Channels[0].Clock, "nor is that a fault of the log")
}

func TestHeaderTooLong(t *testing.T) {
	text := strings.Repeat("a", HeadSize) + ",qw,qx,qy,qz\n1,1,0,0,0\n"
	_, err := Read(context.Background(), "f", strings.NewReader(text), Options{})
	require.ErrorContains(t, err, "no row in its first 262144 bytes")
	assert.True(t, Recognise("a.csv", []byte(text[:HeadSize])).Readable, "so that somebody is told")
	assert.True(t, Recognise("a.csv", []byte(text[:5000])).Readable)
	assert.True(t, Recognise("a.txt", []byte(text[:HeadSize])).None())
}

// A header of thousands of channels costs neither time nor memory without bound.
func TestManyChannels(t *testing.T) {
	var header, row strings.Builder
	for i := range 3000 {
		fmt.Fprintf(&header, "a%d_qw,a%d_qx,a%d_qy,a%d_qz,", i, i, i, i)
		row.WriteString("1,0,0,0,")
	}
	r := read(t, header.String()+"t\n"+row.String()+"0\n"+row.String()+"1\n", Options{})
	assert.Len(t, r.Channels, MaxChannels)
	assert.Len(t, r.Undecided, 3000-MaxChannels)
	assert.Contains(t, r.Undecided[0].Why, "more than 256 channels")
}

func TestWholeNumbersAreUndecided(t *testing.T) {
	r := read(t, flight("t,qw,qx,qy,qz\n", 100, func(i int) string { return fmt.Sprintf("%d,16384,12,-3,%d", i, i) }), Options{})
	require.Len(t, r.Channels, 1)
	assert.Contains(t, r.Channels[0].Value.Why, "scale that nothing states")
	assert.False(t, r.Channels[0].Value.Decided())
	r = read(t, flight("t,qw,qx,qy,qz\n", 100, func(i int) string { return "0,1,0,0,0" }), Options{})
	assert.True(t, r.Channels[0].Value.Decided())
}

func TestClock(t *testing.T) {
	for _, c := range []struct{ header, start, step, unit string }{
		{"timestamp", "1700000000123456789", "", "ns"}, {"timestamp", "1700000000.25", "", "s"}, {"timestamp", "1700000000250", "", "ms"},
		{"timestamp", "1700000000250000", "", "us"}, {"timestamp", "12.5", "", ""}, {"t [ms]", "12.5", "", "ms"},
		{"utc", "2026-03-01T08:30:00.25Z", "", "s"},
	} {
		r := read(t, flight(c.header+",qw,qx,qy,qz\n", 3, func(i int) string { return c.start + "," + wxyz(i) }), Options{})
		require.NotNil(t, r.Clock, c.header)
		assert.Equal(t, c.unit, r.Clock.Unit, c.start)
		assert.Equal(t, c.header, r.Clock.Column)
		assert.EqualValues(t, 2, r.Clock.NonIncreasing())
		assert.EqualValues(t, 2, r.Clock.RepeatedAt[0].Row)
	}
	r := read(t, flight("time,qw,qx,qy,qz\n", 3, func(i int) string { return "08:30 h," + wxyz(i) }), Options{})
	assert.Nil(t, r.Clock, "a time that is no number is no reason to read nothing")
	assert.EqualValues(t, 3, r.Rows)
	r = read(t, flight("stamp.sec,stamp.nanosec,qw,qx,qy,qz\n", 30, func(i int) string {
		return fmt.Sprintf("%d,%d,%s", 1700000000+i/10, i%10*100000000, wxyz(i))
	}), Options{})
	assert.Zero(t, r.Clock.NonIncreasing())
	assert.InDelta(t, 2.9, r.Clock.Span, 1e-9)
	assert.Equal(t, "1700000002.9", r.Clock.Last)
}

func TestJSONLines(t *testing.T) {
	text := flight("", 50, func(i int) string {
		w, x, y, z := turn(i).Quaternion()
		if i == 20 {
			return "{\"stamp\":"
		}
		return fmt.Sprintf(`{"header":{"stamp":{"sec":%d,"nanosec":%d},"frame_id":"body"},"orientation":{"x":%.6f,"y":%.6f,"z":%.6f,"w":%.6f}}`, 1700000000+i, i, x, y, z, w)
	})
	r := read(t, text, Options{})
	assert.Equal(t, "JSON lines", r.Format)
	require.Len(t, r.Channels, 1)
	s := r.Channels[0]
	assert.Equal(t, "orientation", s.Value.Key)
	assert.Equal(t, []string{"orientation.w", "orientation.x", "orientation.y", "orientation.z"}, s.Columns)
	assert.EqualValues(t, 49, r.Rows)
	assert.EqualValues(t, 1, r.BadRows)
	assert.Equal(t, 21, r.FirstBad[0].Place.Line)
	assert.Equal(t, "is no JSON object", r.FirstBad[0].Reason)
	assert.Equal(t, "1700000049.000000049", r.Clock.Last)
	number := s.Value.Numbers[0]
	line := strings.Split(text, "\n")[0]
	assert.Equal(t, number.Text, line[number.Place.Column-1:number.Place.EndColumn-1])
	assert.Equal(t, print(r), print(read(t, text, Options{Workers: 3, block: 400})))
}

// print is all of a result but the functions.
func print(r Result) string {
	s := fmt.Sprintf("%s %d %v %d %v", r.Format, r.Rows, r.Clock, r.BadRows, r.FirstBad)
	for _, c := range r.Channels {
		v := *c
		v.RowPlace, v.Stamp, v.Clock = nil, nil, nil
		s += fmt.Sprintf("\n%+v", v)
	}
	for _, p := range r.Pairs {
		s += fmt.Sprintf("\n%+v", p.Samples)
	}
	return s
}

// Any size of blocks and any number of workers gives the same bytes.
func TestAnySplitGivesTheSame(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		cell := rapid.SampledFrom([]string{"0.5", "-0.5", "0.70710678", "1", "0", "", "nan", "x", "\"0.25\""})
		var b strings.Builder
		b.WriteString("t,qw,qx,qy,qz,roll,pitch,yaw,note\n0,0.5,0.5,0.5,0.5,1.25,2,3,first\n")
		for i := range rapid.IntRange(0, 60).Draw(t, "rows") {
			switch rapid.IntRange(0, 9).Draw(t, "kind") {
			case 0:
				b.WriteString("\n# comment\n")
			case 1:
				b.WriteString("short,row\n")
			case 2:
				fmt.Fprintf(&b, "%d,1,0,0,0,0.5,1,1,\"two\nlines\"\r\n", i)
			default:
				fmt.Fprintf(&b, "%d", i/2)
				for range 7 {
					b.WriteString("," + cell.Draw(t, "cell"))
				}
				b.WriteString(",\n")
			}
		}
		text := b.String()
		want := print(read(t, text, Options{}))
		opts := Options{Workers: rapid.IntRange(1, 4).Draw(t, "workers"), block: rapid.IntRange(100, 1000).Draw(t, "block")}
		require.Equal(t, want, print(read(t, text, opts)))
	})
}

func TestPacked(t *testing.T) {
	text := flight("t,qw,qx,qy,qz\n", 20000, func(i int) string { return fmt.Sprintf("%d,%s", i, wxyz(i)) })
	for name, pack := range map[string]func(io.Writer) io.WriteCloser{
		"gzip": func(w io.Writer) io.WriteCloser { return gzip.NewWriter(w) },
		"zstd": func(w io.Writer) io.WriteCloser {
			z, err := zstd.NewWriter(w)
			require.NoError(t, err)
			return z
		},
	} {
		var packed bytes.Buffer
		z := pack(&packed)
		_, err := io.WriteString(z, text)
		require.NoError(t, err)
		require.NoError(t, z.Close())
		r, err := Read(context.Background(), "tern.csv", bytes.NewReader(packed.Bytes()), Options{})
		require.NoError(t, err, name)
		assert.Equal(t, print(read(t, text, Options{})), print(r), name)
		assert.Equal(t, Kind{"delimited text, " + name, true}, Recognise("tern.csv.gz", packed.Bytes()[:packed.Len()/2]))

		r, err = Read(context.Background(), "tern.csv", bytes.NewReader(packed.Bytes()[:packed.Len()-1000]), Options{})
		require.ErrorIs(t, err, io.ErrUnexpectedEOF, name)
		assert.ErrorContains(t, err, "reading stopped near line")
		assert.Greater(t, r.Rows, int64(5000), "the good part is kept")
		assert.Zero(t, r.BadRows, "half a row at the end is not a bad one")
	}
	_, err := Read(context.Background(), "f", strings.NewReader("\x1f\x8bnot gzip"), Options{})
	require.ErrorContains(t, err, "cannot be unpacked: gzip: invalid header")
	_, err = Read(context.Background(), "f", strings.NewReader("\x28\xb5\x2f\xfdnot zstd"), Options{})
	require.ErrorContains(t, err, "cannot be unpacked: zstd: ")
	assert.Equal(t, Kind{Name: "gzip, gzip"}, Recognise("a.csv.gz", twiceZipped(t)))
}

func twiceZipped(t *testing.T) []byte {
	data := []byte("t,qw,qx,qy,qz\n0,1,0,0,0\n")
	for range 2 {
		var out bytes.Buffer
		z := gzip.NewWriter(&out)
		_, err := z.Write(data)
		require.NoError(t, err)
		require.NoError(t, z.Close())
		data = out.Bytes()
	}
	return data
}

func TestReaderFails(t *testing.T) {
	broken := errors.New("the disk is gone")
	text := flight("t,qw,qx,qy,qz\n", 50000, func(i int) string { return fmt.Sprintf("%d,%s", i, wxyz(i)) })
	for _, workers := range []int{1, 3} {
		r, err := Read(context.Background(), "f", io.MultiReader(strings.NewReader(text), iotest.ErrReader(broken)), Options{Workers: workers})
		require.ErrorIs(t, err, broken)
		assert.EqualValues(t, 50000, r.Rows)
		_, err = Read(context.Background(), "f", iotest.ErrReader(broken), Options{Workers: workers})
		require.ErrorIs(t, err, broken)
	}
}

// endless is a log that never ends, and cancels its own reading after a while.
type endless struct {
	rows   string
	after  int
	cancel func()
}

func (e *endless) Read(p []byte) (int, error) {
	if e.after--; e.after == 0 {
		e.cancel()
	}
	return copy(p, e.rows), nil
}

func TestInterrupt(t *testing.T) {
	for _, workers := range []int{1, 3} {
		ctx, cancel := context.WithCancel(context.Background())
		rows := flight("", 100, func(i int) string { return fmt.Sprintf("%d,%s", i, wxyz(i)) })
		r, err := Read(ctx, "f", io.MultiReader(strings.NewReader("t,qw,qx,qy,qz\n"), &endless{rows, 5000, cancel}), Options{Workers: workers})
		require.ErrorIs(t, err, context.Canceled)
		assert.Greater(t, r.Rows, int64(1000), "what was found so far is kept")
		require.Len(t, r.Channels, 1)
	}
}

func TestRecognise(t *testing.T) {
	table := "t,qw,qx,qy,qz\n0,1,0,0,0\n1,1,0,0,0\n"
	for _, c := range []struct {
		name, head string
		want       Kind
	}{
		{"a.csv", table, Kind{"delimited text", true}},
		{"a.CSV", table, Kind{"delimited text", true}},
		{"log", table, Kind{"delimited text", true}},
		{"a.csv", "a,b\n1,2\n", Kind{"delimited text", true}}, // read, and found to hold no orientation
		{"a.txt", "a,b\n1,2\n", Kind{}},
		{"a.txt", "hello\n", Kind{}},
		{"a.md", table, Kind{}},
		{"a.go", table, Kind{}},
		{"a.csv", "", Kind{}},
		{"a.bag", "#ROSBAG V2.0\n", Kind{Name: "ROS bag"}},
		{"a.mcap", "\x89MCAP0\r\n", Kind{Name: "MCAP"}},
		{"a.ulg", "ULog\x01\x12\x35\x01", Kind{"ULog", true}},
		{"a.mat", "MATLAB 5.0 MAT-file, Platform", Kind{Name: "MAT-file"}},
		{"a.h5", "\x89HDF\r\n\x1a\n", Kind{Name: "HDF5"}},
		{"a.parquet", "PAR1\x15\x04", Kind{"Parquet", true}},
		{"a.npz", "PK\x03\x04\x00", Kind{Name: "NumPy archive"}},
		{"a.zip", "PK\x03\x04\x00", Kind{Name: "zip archive"}},
		{"a.tlog", "\x00\x05\x99\x00", Kind{Name: "MAVLink telemetry log"}},
		{"a.csv", "\xff\xfet\x00,\x00", Kind{Name: "UTF-16 text"}},
		{"a.kvn", "CCSDS_AEM_VERS = 2.0\n", Kind{Name: "CCSDS attitude ephemeris (KVN)"}},
		{"a.tar", strings.Repeat("\x00", 257) + "ustar\x00", Kind{Name: "tar archive"}},
		{"a.dll", "MZ\x00\x00", Kind{}},
		{"a.jsonl", "{\"q\":[0.5,0.5,0.5,0.5]}\n", Kind{"JSON lines", true}},
		{"a.log", "{\"qw\":1,\"qx\":0,\"qy\":0,\"qz\":0}\n{\"qw\":1}\n", Kind{"JSON lines", true}},
		{"a.json", "{\"qw\":1,\"qx\":0,\"qy\":0,\"qz\":0}\n{\"qw\":1}\n", Kind{"JSON lines", true}},
		{"a.json", "{\"qw\":1,\"qx\":0,\"qy\":0,\"qz\":0}\n", Kind{}},
		{"a.json", "{\"t\":[\n0.5,0.5,0.5,0.5\n]}\n", Kind{}},
		{"a.jsonl", "[1]\n[2]\n", Kind{}},
	} {
		assert.Equal(t, c.want, Recognise(c.name, []byte(c.head)), "%s %q", c.name, c.head)
	}
}

// No allocation per row: ten times the rows allocate no more.
func TestMemoryDoesNotDependOnLength(t *testing.T) {
	text := func(rows int) string {
		return flight("t,qw,qx,qy,qz,roll,pitch,yaw\n", rows, func(i int) string { return fmt.Sprintf("%d,%s,0.125,0.25,0.5", i, wxyz(i)) })
	}
	short, long := text(4000), text(30000)
	allocs := func(s string, workers int) float64 {
		return testing.AllocsPerRun(3, func() { read(t, s, Options{Workers: workers}) })
	}
	for _, workers := range []int{1, 2} {
		a, b := allocs(short, workers), allocs(long, workers)
		assert.InDelta(t, a, b, 100, "workers %d", workers) // scheduling takes a few
	}
}

func FuzzRead(f *testing.F) {
	rng := rand.New(rand.NewPCG(1, 1))
	for _, s := range []string{
		"t,qw,qx,qy,qz\n0,1,0,0,0\n", "#timestamp, q_RS_w [], q_RS_x [], q_RS_y [], q_RS_z []\n1,0.5,0.5,0.5,0.5\n",
		flight("", 4, func(i int) string { return "1 2 3 4 0.5 0.5 0.5 0.5" }), "t;roll [deg];pitch [deg];yaw [deg]\n0,5;1;2;3\n", "\x1f\x8b\x08",
		fmt.Sprintf("t,R11,R12\n%d,1\n", rng.Int()), "{\"t\":1,\"q\":[0.5,0.5,0.5,0.5]}\n{\"t\":2,\"q\":[1,0,0,0]}\n",
	} {
		f.Add([]byte(s))
	}
	f.Fuzz(func(t *testing.T, data []byte) {
		Recognise("a.csv", data)
		r, err := Read(context.Background(), "a.csv", bytes.NewReader(data), Options{})
		if err != nil {
			_, packed := packingOf(data)
			require.Truef(t, packed || headTooLong(data), "%v", err)
			return
		}
		again, err := Read(context.Background(), "a.csv", bytes.NewReader(data), Options{Workers: 2})
		require.NoError(t, err)
		require.Equal(t, print(r), print(again))
		for _, c := range r.Channels {
			require.Len(t, c.Columns, len(c.Value.Numbers))
			require.LessOrEqual(t, c.Continuity.Rows, r.Rows)
		}
	})
}
