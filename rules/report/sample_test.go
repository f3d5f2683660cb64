package report

import (
	"bytes"
	"flag"
	"math"
	"os"
	"path/filepath"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/rules"
	"dextral/rules/policy"
)

var update = flag.Bool("update", false, "write the golden files anew")

// golden compares output with a file.
func golden(t *testing.T, name string, got []byte) {
	t.Helper()
	file := filepath.Join("testdata", name+".golden")
	if *update {
		require.NoError(t, os.WriteFile(file, got, 0o644))
	}
	want, err := os.ReadFile(file)
	require.NoError(t, err)
	assert.Equal(t, string(want), string(got))
}

func at(path string, line, column, length int) rules.Place {
	return rules.Place{Path: path, Line: line, Column: column, EndLine: line, EndColumn: column + length}
}

const deg = math.Pi / 180

// sample is a report with every kind of entry, about the survey aircraft Tern.
func sample() *Report {
	row := at("logs/tern 2/flight.csv", 1842, 1, 60)
	row.Row, row.Time = 1841, "18.41 s"
	r := &Report{
		Findings: []*rules.Finding{
			{
				Rule: rules.RotorNotUnit, Level: rules.Error, Place: at("calib/imu.yaml", 7, 15, 34), Key: "imu.q_body_imu",
				Message: `imu.q_body_imu claims a unit quaternion, but its norm is 1.0213; put as it stands into the usual matrix formula it turns by 1.36 deg too much`,
				Claim:   `quaternion, by label "quaternion_wxyz"`,
				Evidence: []rules.Evidence{
					{What: "norm", Stated: rules.Plain(1), Computed: rules.Plain(1.021302), Residual: rules.Plain(0.021302)},
					{What: "deviation that the digits written allow", Computed: rules.Plain(0.000231)},
					{What: "turn by M = 1 + 2 w [u] + 2 [u][u]", Stated: rules.Degrees(31.5 * deg), Computed: rules.Degrees(32.8604 * deg), Residual: rules.Degrees(1.3604 * deg)},
				},
				Remedy: "take the numbers again from their source, or divide all four by the norm if they were only rounded",
				Edit: &rules.Edit{Why: "the numbers are normalised, which stays within the declared uncertainty of 1.5 deg",
					Was: []string{"0.9831", "0.2773"}, Now: []string{"0.9626", "0.2715"},
					Replacements: []rules.Replacement{{Place: at("calib/imu.yaml", 7, 16, 6), Old: "0.9831", New: "0.9626"}, {Place: at("calib/imu.yaml", 7, 24, 6), Old: "0.2773", New: "0.2715"}}},
			},
			{
				Rule: rules.MovingFixedSwapped, Level: rules.Error, Place: at("calib/cameras.yaml", 14, 10, 22), Key: "cameras.left.rpy",
				Message: "cameras.left.rpy and cameras.left.q state one orientation; they agree, to 0.0003 deg, only about fixed axes; as stated they differ by 23.4 deg",
				Claim:   "one orientation with cameras.left.q",
				Evidence: []rules.Evidence{
					{What: "as stated", Stated: rules.Words("angles, z-y'-x'' (moving axes), degree"), Residual: rules.Degrees(23.4137 * deg)},
					{What: "about fixed axes", Residual: rules.Degrees(0.000312 * deg)},
					{What: "as z-x'-y''", Residual: rules.Degrees(4.0961 * deg)},
					{What: "with the second angle negated", Residual: rules.Degrees(118.25 * deg)},
				},
				Related: []rules.Related{{Place: at("calib/cameras.yaml", 12, 8, 30), Message: "the other statement, cameras.left.q"}},
				Remedy:  "relabel the angles as fixed x-y-z",
				Command: `dextral identify --quaternion "0.8, 0.1, 0.5, 0.3" --angles "10, 20, 30" --scalar first`,
			},
			{
				Rule: rules.MirroredRotation, Level: rules.Warning, Place: at("calib/lidar.json", 3, 9, 120), Key: "R",
				Message: "R claims a rotation, but its determinant is -1: it is a mirror, and no rotation; the nearest one is off by 180 deg",
				Claim:   `rotation matrix, by name "R"`,
				Evidence: []rules.Evidence{
					{What: "determinant", Stated: rules.Plain(1), Computed: rules.Plain(-0.9999871), Residual: rules.Plain(-1.9999871)},
					{What: "direction it reverses", Computed: rules.Words("(0, 0, 1)")},
				},
				Waiver: &rules.Waiver{Rule: rules.MirroredRotation, Place: "calib/lidar.json#R", Until: "2031-03-31",
					Because: "image flip of the maker; renamed with the next driver", Owner: "M. Okafor", At: at("dextral.toml", 12, 1, 10)},
			},
			{
				Rule: rules.SignJump, Level: rules.Warning, Place: row, Key: "att",
				Message: "att jumps from R to -R once, first at row 1841, where the rotation moves by 0.2 deg; whoever interpolates or subtracts the numbers there sees a turn of 359.8 deg",
				Claim:   "rotation at every row",
				Evidence: []rules.Evidence{
					{What: "row 1841 (18.41 s)", Stated: rules.Degrees(0.2 * deg), Computed: rules.Degrees(359.8 * deg), Residual: rules.Degrees(359.6 * deg)},
				},
				Remedy: "R and -R are one rotation: choose the sign of each sample so that its scalar product with the one before is not negative",
			},
			{
				Rule: rules.NotFinite, Level: rules.Error, Place: rules.Place{Path: "logs/flight.bin"}, Key: "att",
				Message:  "att is not a number",
				Evidence: []rules.Evidence{{What: "w", Computed: rules.Plain(math.NaN())}, {What: "x", Computed: rules.Plain(math.Inf(-1))}},
			},
			{
				Rule: rules.DirectionReversed, Level: rules.Note, Place: at("mount/mount.go", 20, 3, 5), Key: "mount.Pod",
				Message: "mount.Pod and mount.PodQ are the reverse of each other, and neither states its direction",
				Claim:   "one orientation with mount.PodQ",
				Evidence: []rules.Evidence{
					{What: "as stated", Residual: rules.Degrees(64.2 * deg)},
					{What: "one of them reversed", Residual: rules.Degrees(2e-9 * deg)},
				},
			},
		},
		Audited:    Counts{GoPackages: 1, GoFiles: 2, Files: 27, Values: 61, LogRows: 12400},
		Undecided:  []Undecided{{at("calib/old.yaml", 3, 5, 20), "pod.q", "four numbers, and nothing says what they are"}, {at("calib/old.yaml", 9, 5, 20), "gps.q", "four numbers, and nothing says what they are"}, {at("calib/old.yaml", 12, 5, 20), "imu.q", "four numbers, and nothing says what they are"}, {at("calib/a.yaml", 1, 1, 2), "", "nine numbers that claim nothing"}},
		Unreadable: []Skipped{{"logs/flight.ulg", "binary log"}, {"logs/flight2.ulg", "binary log"}, {"spare.zip", "archive"}},
		Failed:     []Failure{{at("calib/broken.json", 8, 3, 1), "the object is not closed before the end of the file"}},
		LeftOut:    LeftOut{Ignored: 1120, Excluded: 3, NotText: 14, Other: 9},
		Gate:       policy.GateError,
	}
	r.Sort()
	return r
}

// values are orientation values read in all ways.
func values(t *testing.T) []*rules.Value {
	label, err := angle.ParseLabel("z-y'-x''", [3]angle.Role{angle.RoleYaw, angle.RolePitch, angle.RoleRoll})
	require.NoError(t, err)
	return []*rules.Value{
		{
			Form: convention.Quaternion, Key: "cameras.left.q", Place: at("calib/cameras.yaml", 12, 8, 30),
			Claims: rules.Claims{
				{Says: convention.Quaternion, Source: rules.Name, Text: "q", Place: at("calib/cameras.yaml", 12, 5, 1)},
				{Says: convention.ScalarFirst, Source: rules.Comment, Text: "# wxyz", Place: at("calib/cameras.yaml", 11, 5, 6)},
				{Says: convention.ScalarLast, Source: rules.Declaration, Text: `scalar = "last"`, Place: at("dextral.toml", 4, 1, 15)},
				{Says: convention.Direction{To: "body", From: "cam"}, Source: rules.Declaration, Text: `direction = "v_body = R v_cam"`, Place: at("dextral.toml", 5, 1, 30)},
			},
			Uncertainty: 0.05 * deg,
		},
		{
			Form: convention.Angles, Key: "cameras.left.rpy", Place: at("calib/cameras.yaml", 14, 10, 22),
			Claims: rules.Claims{
				{Says: convention.Angles, Source: rules.Label, Text: "yaw_pitch_roll", Place: at("calib/cameras.yaml", 14, 5, 14)},
				{Says: label, Source: rules.Comment, Text: "# z-y'-x''", Place: at("calib/cameras.yaml", 14, 40, 9)},
				{Says: convention.Degree, Source: rules.Sibling, Text: "units: deg", Place: at("calib/cameras.yaml", 2, 1, 10)},
			},
		},
		{
			Form: convention.Rotation, Key: "R", Place: at("calib/lidar.json", 3, 9, 120), Rows: 3, Cols: 3,
			Claims: rules.Claims{
				{Says: convention.Rotation, Source: rules.Name, Text: "R", Place: at("calib/lidar.json", 3, 3, 3)},
				{Says: convention.RowMajor, Source: rules.Shape, Place: at("calib/lidar.json", 3, 9, 120)},
			},
		},
		{Key: "pod.q", Place: at("calib/old.yaml", 3, 5, 20), Why: "four numbers, and nothing says what they are"},
		{Form: convention.Transform, Rows: 4, Cols: 4, Place: at("calib/\x1b[2Jodd.yaml", 1, 1, 9)},
	}
}

func text(t *testing.T, r *Report, o Options) []byte {
	t.Helper()
	var b bytes.Buffer
	require.NoError(t, Text(&b, r, o))
	return b.Bytes()
}
