package audit

import (
	"context"
	"encoding/csv"
	"flag"
	"fmt"
	"math"
	"math/rand/v2"
	"os"
	"path"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"testing"
	"time"

	"dextral/rules"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

var faultyFiles = flag.Int("faulty", 4, "files of each fault and format in TestMutations; DEVELOPERS.md has 100")

// The oracle of this test is plain algebra of its own, so that a mistake of the rotor
// core cannot hide itself. Quaternions are w, x, y, z; products are Hamilton's; matrices
// are active, row by row. TestOracle holds it against SciPy's table.
type quaternion [4]float64

func (a quaternion) mul(b quaternion) quaternion {
	return quaternion{
		a[0]*b[0] - a[1]*b[1] - a[2]*b[2] - a[3]*b[3],
		a[0]*b[1] + a[1]*b[0] + a[2]*b[3] - a[3]*b[2],
		a[0]*b[2] - a[1]*b[3] + a[2]*b[0] + a[3]*b[1],
		a[0]*b[3] + a[1]*b[2] - a[2]*b[1] + a[3]*b[0],
	}
}

func (a quaternion) conj() quaternion { return quaternion{a[0], -a[1], -a[2], -a[3]} }

func (a quaternion) matrix() (m [9]float64) {
	for j := range 3 {
		var e quaternion
		e[j+1] = 1
		v := a.mul(e).mul(a.conj())
		for i := range 3 {
			m[3*i+j] = v[i+1]
		}
	}
	return m
}

// about is a turn about axis 0, 1 or 2, in degrees.
func about(axis int, deg float64) quaternion {
	s, c := math.Sincos(deg * math.Pi / 360)
	q := quaternion{c}
	q[axis+1] = s
	return q
}

// moving makes turns about moving axes: "zyx" is z-y'-x”.
func moving(axes string, deg [3]float64) quaternion {
	q := quaternion{1}
	for i, a := range []byte(axes) {
		q = q.mul(about(int(a-'x'), deg[i]))
	}
	return q
}

// apart is the angle between two rotations in degrees.
func apart(a, b quaternion) float64 {
	d := a.conj().mul(b)
	return 2 * math.Atan2(math.Hypot(math.Hypot(d[1], d[2]), d[3]), math.Abs(d[0])) * 180 / math.Pi
}

func TestOracle(t *testing.T) {
	f, err := os.Open(filepath.Join("..", "..", "fixtures", "reference", "angle_scipy.csv"))
	require.NoError(t, err)
	defer f.Close()
	r := csv.NewReader(f)
	r.Comment = '#'
	rows, err := r.ReadAll()
	require.NoError(t, err)
	n := 0
	for _, row := range rows[1:] {
		if row[0] != "intrinsic" {
			continue
		}
		var x [7]float64
		for i := range x {
			x[i], err = strconv.ParseFloat(row[4+i], 64)
			require.NoError(t, err)
		}
		got := moving(strings.ToLower(row[1]), [3]float64{x[0], x[1], x[2]})
		assert.Less(t, apart(got, quaternion{x[6], x[3], x[4], x[5]}), 1e-6, strings.Join(row[:4], " "))
		n++
	}
	require.Greater(t, n, 400)
}

// statement is one orientation stated three times, as numbers to be written.
type statement struct {
	q       [4]float64 // w x y z
	m       [9]float64
	angles  [3]float64 // z-y'-x'', deg
	dropped int        // of the quaternion: the number that lost a digit, from 1; 0: none
}

func stated(deg [3]float64) statement {
	q := moving("zyx", deg)
	return statement{q: q, m: q.matrix(), angles: deg}
}

// fault is a slip of one kind, and the rules that name it rightly.
type fault struct {
	name  string
	apply func(s *statement, r *rand.Rand) (hidden bool) // hidden: it cannot be seen in these numbers
	rules []string
	needs string // what the format has to state: q, m, a
}

var enuFromNED = quaternion{0, math.Sqrt2 / 2, math.Sqrt2 / 2, 0} // v_enu = P v_ned exchanges x and y and reverses z
var fluFromFRD = quaternion{0, 1, 0, 0}

var faults = []fault{
	{"scalar order", func(s *statement, _ *rand.Rand) bool {
		s.q = [4]float64{s.q[1], s.q[2], s.q[3], s.q[0]}
		return false
	}, []string{rules.ScalarMisplaced}, "q"},
	{"conjugate", func(s *statement, _ *rand.Rand) bool { s.q = quaternion(s.q).conj(); return false }, []string{rules.DirectionReversed}, "q"},
	{"transpose", func(s *statement, _ *rand.Rand) bool { s.m = quaternion(s.q).conj().matrix(); return false }, []string{rules.DirectionReversed}, "m"},
	{"mirror", func(s *statement, r *rand.Rand) bool {
		j := r.IntN(3)
		for i := range 3 {
			s.m[3*i+j] = -s.m[3*i+j]
		}
		return false
	}, []string{rules.MirroredRotation}, "m"},
	{"degrees for radians", func(s *statement, _ *rand.Rand) bool {
		for i := range s.angles {
			s.angles[i] *= math.Pi / 180
		}
		return false
	}, []string{rules.AngleUnitWrong}, "a"},
	{"another sequence", func(s *statement, _ *rand.Rand) bool {
		// The angles of the same rotation about x, then y', then z''.
		m := quaternion(s.q).matrix()
		b := math.Asin(m[2])
		a, c := math.Atan2(-m[5], m[8]), math.Atan2(-m[1], m[0])
		s.angles = [3]float64{a * 180 / math.Pi, b * 180 / math.Pi, c * 180 / math.Pi}
		return apart(moving("zyx", s.angles), s.q) < 0.01
	}, []string{rules.SequenceMislabelled}, "a"},
	{"fixed for moving", func(s *statement, _ *rand.Rand) bool {
		// z-y-x about fixed axes: x-y'-z'' with the numbers the other way round.
		m := quaternion(s.q).matrix()
		b := math.Asin(m[2])
		a, c := math.Atan2(-m[5], m[8]), math.Atan2(-m[1], m[0])
		s.angles = [3]float64{c * 180 / math.Pi, b * 180 / math.Pi, a * 180 / math.Pi}
		return apart(moving("zyx", s.angles), s.q) < 0.01
	}, []string{rules.MovingFixedSwapped}, "a"},
	{"sign of a number of the quaternion", func(s *statement, r *rand.Rand) bool { s.q[1+r.IntN(3)] *= -1; return false },
		[]string{rules.AxesSwapped, rules.RepresentationsDiffer}, "q"},
	{"sign of a number of the matrix", func(s *statement, r *rand.Rand) bool { s.m[r.IntN(9)] *= -1; return false },
		[]string{rules.MatrixNotOrthonormal, rules.MirroredRotation}, "m"},
	{"sign of an angle", func(s *statement, r *rand.Rand) bool { s.angles[r.IntN(3)] *= -1; return false }, []string{rules.AngleSignReversed}, "a"},
	{"dropped digit", func(s *statement, r *rand.Rand) bool {
		s.dropped = 1 + r.IntN(4)
		x := digits(*s)[s.dropped-1]
		y, _ := strconv.ParseFloat(x, 64)
		return math.Abs(y-s.q[s.dropped-1]) < 1e-3
	}, []string{rules.RotorNotUnit, rules.RepresentationsDiffer}, "q"},
	{"NED for ENU", func(s *statement, _ *rand.Rand) bool { s.q = enuFromNED.mul(s.q); return false }, []string{rules.AxesSwapped}, "q"},
	{"FRD for FLU", func(s *statement, _ *rand.Rand) bool { s.q = quaternion(s.q).mul(fluFromFRD); return false }, []string{rules.AxesSwapped}, "q"},
}

// digits are the four numbers of the quaternion as written, one with its third decimal
// left out.
func digits(s statement) []string {
	list := numbers(s.q[:])
	if s.dropped > 0 {
		x := list[s.dropped-1]
		at := strings.IndexByte(x, '.') + 3
		list[s.dropped-1] = x[:at] + x[at+1:]
	}
	return list
}

func numbers(x []float64) (list []string) {
	for _, v := range x {
		list = append(list, strconv.FormatFloat(v, 'f', 7, 64))
	}
	return list
}

func rows(m [9]float64, open, end, between string) string {
	var parts []string
	for i := range 3 {
		parts = append(parts, open+strings.Join(numbers(m[3*i:3*i+3]), ", ")+end)
	}
	return strings.Join(parts, between)
}

// formats write a statement with labels that state all of it.
var formats = []struct {
	name, file, states string
	last               bool // the scalar is written last
	write              func(s statement) string
}{
	{"YAML", "a.yaml", "qma", false, func(s statement) string {
		return fmt.Sprintf("mount:\n  quaternion_wxyz: [%s]\n  rotation_matrix: [%s]\n  euler_angles_deg: [%s]  # intrinsic z-y'-x''\n",
			strings.Join(digits(s), ", "), rows(s.m, "[", "]", ", "), strings.Join(numbers(s.angles[:]), ", "))
	}},
	{"YAML, by name", "a.yml", "qm", false, func(s statement) string {
		d := digits(s)
		return fmt.Sprintf("mount:\n  quaternion: {qx: %s, qy: %s, qz: %s, qw: %s}\n  rotation_matrix:\n    rows: 3\n    cols: 3\n    data: [%s]\n", d[1], d[2], d[3], d[0], strings.Join(numbers(s.m[:]), ", "))
	}},
	{"JSON", "a.jsonc", "qma", true, func(s statement) string {
		d := digits(s)
		return fmt.Sprintf("{\"mount\": {\n  \"quaternion_xyzw\": [%s, %s, %s, %s],\n  \"rotation_matrix\": [%s],\n  \"euler_angles_deg\": [%s] // intrinsic z-y'-x''\n}}\n",
			d[1], d[2], d[3], d[0], rows(s.m, "[", "]", ", "), strings.Join(numbers(s.angles[:]), ", "))
	}},
	{"TOML", "a.toml", "qma", false, func(s statement) string {
		return fmt.Sprintf("[mount]\nquaternion_wxyz = [%s]\nrotation_matrix = [%s]\neuler_angles_deg = [%s] # intrinsic z-y'-x''\n",
			strings.Join(digits(s), ", "), rows(s.m, "[", "]", ", "), strings.Join(numbers(s.angles[:]), ", "))
	}},
	{"INI", "a.ini", "qma", false, func(s statement) string {
		return fmt.Sprintf("[mount]\nquaternion_wxyz = %s\nrotation_matrix = %s\neuler_angles_deg = %s ; intrinsic z-y'-x''\n",
			strings.Join(digits(s), " "), strings.Join(numbers(s.m[:]), " "), strings.Join(numbers(s.angles[:]), " "))
	}},
	{"XML", "a.xml", "qm", false, func(s statement) string {
		return fmt.Sprintf("<rig><mount quaternion_wxyz=\"%s\" rotation_matrix=\"%s\"/></rig>\n", strings.Join(digits(s), " "), strings.Join(numbers(s.m[:]), " "))
	}},
	{"CCSDS", "a.kvn", "qa", false, func(s statement) string {
		d, a := digits(s), numbers(s.angles[:])
		return fmt.Sprintf("CCSDS_APM_VERS = 2.0\nCREATION_DATE = 2031-03-04T13:00:00\nORIGINATOR = SALTMARSH\nOBJECT_NAME = TERN\nOBJECT_ID = 2031-001A\nTIME_SYSTEM = UTC\nEPOCH = 2031-03-04T12:00:00\n"+
			"QUAT_START\nREF_FRAME_A = ICRF\nREF_FRAME_B = SC_BODY_1\nQ1 = %s\nQ2 = %s\nQ3 = %s\nQC = %s\nQUAT_STOP\n"+
			"EULER_START\nREF_FRAME_A = ICRF\nREF_FRAME_B = SC_BODY_1\nEULER_ROT_SEQ = ZYX\nANGLE_1 = %s [deg]\nANGLE_2 = %s [deg]\nANGLE_3 = %s [deg]\nEULER_STOP\n", d[1], d[2], d[3], d[0], a[0], a[1], a[2])
	}},
	{"C++", "a.cpp", "qm", false, func(s statement) string {
		return fmt.Sprintf("const Mount mount = {\n  .quaternion_wxyz = {%s},\n  .rotation_matrix = {%s},\n};\n", strings.Join(digits(s), ", "), rows(s.m, "{", "}", ", "))
	}},
	{"Go", "a.go", "qm", false, func(s statement) string {
		return fmt.Sprintf("package mount\n\ntype Mount struct {\n\tQuaternionWXYZ [4]float64\n\tRotationMatrix [3][3]float64\n}\n\nvar Camera = Mount{\n\tQuaternionWXYZ: [4]float64{%s},\n\tRotationMatrix: [3][3]float64{%s},\n}\n",
			strings.Join(digits(s), ", "), rows(s.m, "{", "}", ", "))
	}},
}

// generic draws angles whose rotation, and what the faults make of it, is no special
// one: nothing fits by accident.
func generic(r *rand.Rand) [3]float64 {
	for {
		deg := [3]float64{r.Float64()*300 - 150, r.Float64()*120 - 60, r.Float64()*300 - 150}
		q := moving("zyx", deg)
		least := 1.0
		for i, x := range q {
			least = math.Min(least, math.Abs(x))
			for _, y := range q[i+1:] {
				least = math.Min(least, math.Abs(math.Abs(x)-math.Abs(y)))
			}
		}
		for _, a := range deg {
			least = math.Min(least, math.Abs(a)/90)
		}
		if least > 0.07 {
			return deg
		}
	}
}

// TestMutations plants every fault in clean files of every format and holds the audit
// to reporting it, by the right name, and to silence on the clean ones.
func TestMutations(t *testing.T) {
	r := rand.New(rand.NewPCG(7, 24))
	var table strings.Builder
	seen, found, named := 0, 0, 0
	for _, format := range formats {
		dir := t.TempDir()
		write := func(at string, s statement) {
			name := filepath.Join(dir, filepath.FromSlash(at), format.file)
			require.NoError(t, os.MkdirAll(filepath.Dir(name), 0o755))
			require.NoError(t, os.WriteFile(name, []byte(format.write(s)), 0o644))
		}
		planted := map[string]fault{}
		for i, f := range faults {
			if !strings.Contains(format.states, f.needs) || len(format.states) < 2 {
				continue
			}
			for k := range *faultyFiles {
				s := stated(generic(r))
				write(fmt.Sprintf("clean%d_%d", i, k), s)
				hidden := f.apply(&s, r)
				if f.name == "scalar order" && format.last { // the numbers stand as if the scalar came first
					s.q = [4]float64{s.q[2], s.q[3], s.q[0], s.q[1]}
				}
				if at := fmt.Sprintf("faulty%d_%d", i, k); !hidden {
					write(at, s)
					planted[at] = f
				}
			}
		}
		t.Chdir(dir)
		result, err := Run(context.Background(), Options{Today: time.Date(2030, 1, 1, 0, 0, 0, 0, time.UTC)})
		require.NoError(t, err)
		require.Empty(t, result.Report.Failed)
		byPlace := map[string][]string{}
		for _, f := range result.Report.Findings {
			at := path.Dir(f.Place.Path)
			assert.False(t, strings.HasPrefix(at, "clean") && f.Level > rules.Note, "%s: %s: %s", format.name, f.Rule, f.Message)
			byPlace[at] = append(byPlace[at], f.Rule)
		}
		for _, f := range faults {
			of, reported, right := 0, 0, 0
			for at, p := range planted {
				if p.name != f.name {
					continue
				}
				of++
				if len(byPlace[at]) > 0 {
					reported++
				}
				if slices.ContainsFunc(byPlace[at], func(rule string) bool { return slices.Contains(f.rules, rule) }) {
					right++
				} else {
					t.Logf("%s, %s: %s got %v\n%s", format.name, f.name, at, byPlace[at], read(t, filepath.Join(dir, at, format.file)))
				}
			}
			if of > 0 {
				fmt.Fprintf(&table, "| %s | %s | %d | %d | %d |\n", format.name, f.name, of, reported, right)
			}
			seen, found, named = seen+of, found+reported, named+right
		}
	}
	t.Logf("%d observable faults: %.2f %% reported, %.2f %% rightly named\n\n%s", seen, 100*float64(found)/float64(seen), 100*float64(named)/float64(seen), table.String())
	assert.GreaterOrEqual(t, float64(found), 0.98*float64(seen))
	assert.GreaterOrEqual(t, float64(named), 0.98*float64(seen))
}

func read(t *testing.T, name string) string {
	text, err := os.ReadFile(name)
	require.NoError(t, err)
	return string(text)
}

// What is right by a convention of its own, or claims no rotation, gives no error and
// no warning.
func TestCleanTwins(t *testing.T) {
	s := stated([3]float64{30, 20, 10})
	passive := quaternion(s.q).conj().matrix()
	files := map[string]string{
		"dextral.toml":   "[[claim]]\nfiles = \"passive.yaml\"\nkeys = \"mount.rotation_matrix\"\ndirection = \"v_body = R v_ned\"\n\n[[claim]]\nfiles = \"passive.yaml\"\nkeys = \"mount.quaternion_wxyz\"\ndirection = \"v_ned = R v_body\"\n",
		"passive.yaml":   fmt.Sprintf("mount:\n  quaternion_wxyz: [%s]\n  rotation_matrix: [%s]\n", strings.Join(numbers(s.q[:]), ", "), rows(passive, "[", "]", ", ")),
		"graphics.yaml":  "# left-handed: x right, y up, z forward\nworld_axes: \"x right, y up, z forward, left-handed\"\nflip: [[1, 0, 0], [0, 1, 0], [0, 0, -1]]\n",
		"small.yaml":     "alignment:\n  rotation_matrix: [[1.0, -0.0021, 0.0013], [0.0021, 1.0, -0.0008], [-0.0013, 0.0008, 1.0]]\n",
		"imu.yaml":       "accel:\n  bias: [0.01, -0.02, 0.003]\n  scale: [[1.002, 0, 0], [0, 0.998, 0], [0, 0, 1.001]]\n  misalignment: [[1, 0.0021, -0.0013], [0.0004, 1, 0.0008], [0.0013, -0.0006, 1]]\ncamera:\n  K: [[458.6, 0, 367.2], [0, 457.3, 248.4], [0, 0, 1]]\n  intrinsics: [458.6, 457.3, 367.2, 248.4]\n",
		"unset.yaml":     "spare:\n  quaternion_wxyz: [0, 0, 0, 0]\n  rpy_deg: [0, 0, 0]\n",
		"tern.param":     "AHRS_ORIENTATION,6\nCOMPASS_ORIENT,0\nAHRS_TRIM_X,0.0021\n",
		"sign.yaml":      fmt.Sprintf("mount:\n  quaternion_wxyz: [%s]\n  rotation_matrix: [%s]\n", strings.Join(numbers([]float64{-s.q[0], -s.q[1], -s.q[2], -s.q[3]}), ", "), rows(s.m, "[", "]", ", ")),
		"quantised.yaml": "mount:\n  quaternion: [28377, 0, 16384, 0]\n",
		"node.gltf":      "{\"asset\": {\"version\": \"2.0\"}, \"nodes\": [{\"scale\": [1, 1, -1], \"rotation\": [0, 0, 0.3826834, 0.9238795]}]}\n",
		"logs.csv":       "t,qw,qx,qy,qz,gyro_bias_x,gyro_bias_y,gyro_bias_z\n0.0,1,0,0,0,0.01,0.02,0.03\n0.1,0.9999995,0.001,0,0,0.01,0.02,0.03\n0.2,0.999998,0.002,0,0,0.01,0.02,0.03\n",
	}
	dir := t.TempDir()
	for name, text := range files {
		require.NoError(t, os.WriteFile(filepath.Join(dir, name), []byte(text), 0o644))
	}
	t.Chdir(dir)
	result, err := Run(context.Background(), Options{Today: time.Date(2030, 1, 1, 0, 0, 0, 0, time.UTC)})
	require.NoError(t, err)
	require.Empty(t, result.Report.Failed)
	for _, f := range result.Report.Findings {
		assert.Equal(t, rules.Note, f.Level, "%s: %s: %s", f.Place, f.Rule, f.Message)
	}
}
