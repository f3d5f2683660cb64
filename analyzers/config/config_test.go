package config

import (
	"fmt"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/rules"
)

// read reads a text as a file of that name.
func readText(t *testing.T, name, text string) Result {
	t.Helper()
	r, err := Read(name, []byte(text))
	require.NoError(t, err)
	return r
}

// sources are the short names of sources in expectations.
var sources = map[rules.Source]string{
	rules.Shape: "shape", rules.Name: "name", rules.Sibling: "sibling", rules.Label: "label",
	rules.Comment: "comment", rules.Declaration: "declaration", rules.Format: "format",
}

// summary writes a value in one line: key, form, claims except that of form
// unless form is inferred, twin group, why it is undecided.
func summary(v *rules.Value) string {
	s := v.Key + ": " + v.Form.String()
	if v.Form == 0 {
		s = v.Key + ": nothing"
	}
	for _, c := range v.Claims {
		s += fmt.Sprintf("; %s %s", sources[c.Source], c.Says)
	}
	if v.Of != "" {
		s += "; of " + v.Of
	}
	if v.Why != "" {
		s += "; undecided"
	}
	return s
}

func summaries(t *testing.T, name, text string) []string {
	t.Helper()
	var all []string
	for _, v := range readText(t, name, text).Values {
		all = append(all, summary(v))
	}
	return all
}

func TestFormat(t *testing.T) {
	for name, want := range map[string]string{
		"a/mount.yaml": "YAML", "mount.YML": "YAML", "m.json": "JSON", "m.jsonc": "JSON", "m.gltf": "glTF", "m.txt": "", "yaml": "",
	} {
		assert.Equal(t, want, Format(name), name)
	}
	for _, c := range []struct{ name, head, want string }{
		{"m.kvn", "\ufeff\r\nCCSDS_APM_VERS = 2.0\n", "CCSDS attitude parameter message"}, {"m.kvn", "CCSDS_AEM_VERS = 2.0\n", ""},
		{"m.txt", "EDGE_SE3:QUAT 0 1 1\n", "pose graph"}, {"m.txt", "R: 1 0 0 0 1 0 0 0 1\n", "calibration text"}, {"m.log", "R: 1 0 0 0 1 0 0 0 1\n", ""},
		{"m.txt", "R: see below\n", ""}, {"m", "", ""}, {"m.yaml", "", "YAML"},
	} {
		assert.Equal(t, c.want, Recognise(c.name, []byte(c.head)), c.name+" "+c.head)
	}
	_, err := Read("mount.txt", []byte("q: 1"))
	assert.ErrorContains(t, err, "mount.txt:1:1: this format is not read")
}

// Both formats give the same values for the same tree.
func TestYAMLAndJSONAgree(t *testing.T) {
	yaml := "mount:\n  rpy_deg: [1, 2, 3]\n  quaternion: {w: 1, x: 0, y: 0, z: 0}\n  units: deg\nR: [[1, 0, 0], [0, 1, 0], [0, 0, 1]]\n"
	json := `{"mount": {"rpy_deg": [1, 2, 3], "quaternion": {"w": 1, "x": 0, "y": 0, "z": 0}, "units": "deg"}, "R": [[1, 0, 0], [0, 1, 0], [0, 0, 1]]}`
	assert.Equal(t, summaries(t, "m.yaml", yaml), summaries(t, "m.json", json))
	assert.Len(t, summaries(t, "m.yaml", yaml), 3)
}

// The numbers are marked in the input: what stands between the marks is the text
// of the number whose turn it is, and its place.
func TestPlaces(t *testing.T) {
	for _, c := range []struct{ name, text string }{
		{"m.yaml", "q: [«0.5», «+.5», «-5e-1», # no 0.5\n  «.5»]\n"},
		{"m.yaml", "\ufeffäöü: 1\r\nR:\r\n- [«1.», «0», «0»]\r\n- [«0», «1», «0»]\r\n- [«0», «0», «1»]\r\n"},
		{"m.yaml", "rpy: \"«0» «0»   «1.57»\"\n"},
		{"m.yaml", "rotation: {x: 0, y: 0, z: 0, w: 1}\n"},
		{"m.json", "{\"é\": 1, \"R\": {\"rows\": 3, \"cols\": 3, \"data\": [«1», «0», «0», «0», «1», «0», «0», «0», «1»]}}"},
		{"m.json", "// é\n{\"rpy\": [«NaN», «1e999»,\n «-Infinity»]}"},
		{"m.yaml", "axes: [«forward», «left», «up»]\n"},
		{"m.yaml", "axes: «x forward, y left, z up»\n"},
		{"m.yaml", "axis_map: \"«+y», «+x», «-z»\"\n"},
	} {
		plain := strings.NewReplacer("«", "", "»", "").Replace(c.text)
		var want []string
		for _, part := range strings.Split(c.text, "«")[1:] {
			number, _, _ := strings.Cut(part, "»")
			want = append(want, number)
		}
		var got []string
		for _, v := range readText(t, c.name, plain).Values {
			for i, n := range v.Numbers {
				if i == 0 || n.Place != v.Numbers[i-1].Place {
					got = append(got, n.Text)
				}
				assert.Equal(t, n.Text, cut(t, plain, n.Place), c.text)
			}
		}
		if len(want) > 0 {
			assert.Equal(t, want, got, c.text)
		}
	}
}

// cut cuts a place out of a text, counting lines and code points afresh.
func cut(t *testing.T, text string, p rules.Place) string {
	t.Helper()
	lines := strings.Split(strings.TrimPrefix(text, "\ufeff"), "\n")
	require.True(t, p.Line >= 1 && p.EndLine <= len(lines), "%v", p)
	if p.Line == p.EndLine {
		return string([]rune(lines[p.Line-1])[p.Column-1 : p.EndColumn-1])
	}
	s := string([]rune(lines[p.Line-1])[p.Column-1:])
	for _, line := range lines[p.Line : p.EndLine-1] {
		s += "\n" + line
	}
	return s + "\n" + string([]rune(lines[p.EndLine-1])[:p.EndColumn-1])
}

func TestPlacesOfValueKeyAndClaims(t *testing.T) {
	text := "mount:\n  # v_body = R v_cam\n  rotation_wxyz: [1, 0,\n    0, 0]  # x y z w\n"
	v := readText(t, "m.yaml", text).Values[0]
	assert.Equal(t, "[1, 0,\n    0, 0]", cut(t, text, v.Place))
	assert.Equal(t, "rotation_wxyz", cut(t, text, v.KeyAt))
	var words []string
	for _, c := range v.Claims {
		words = append(words, cut(t, text, c.Place))
	}
	assert.Equal(t, []string{"rotation_wxyz", "rotation_wxyz", "# x y z w", "# v_body = R v_cam"}, words)
}

// Components come in the order w, x, y, z, and stand from the first to the last.
func TestNamedComponents(t *testing.T) {
	text := "pose:\n  t: 1\n  q_z: 0.1\n  q_w: 0.2\n  q_x: 0.3\n  q_y: 0.4\n"
	v := readText(t, "m.yaml", text).Values[0]
	assert.Equal(t, []float64{0.2, 0.3, 0.4, 0.1}, v.Floats())
	assert.Equal(t, "0.1\n  q_w: 0.2\n  q_x: 0.3\n  q_y: 0.4", cut(t, text, v.Place))
	assert.Equal(t, "pose.q", v.Key)

	v = readText(t, "m.yaml", "park: {yaw_deg: 1, pitch_deg: 2, roll_deg: 3}\n").Values[0]
	assert.Equal(t, []float64{1, 2, 3}, v.Floats(), "angles keep the written order")
	assert.Equal(t, "[yaw pitch roll]", fmt.Sprint(v.Roles))
}

func TestDocumentsAndReferences(t *testing.T) {
	assert.Equal(t, []string{
		"q: quaternion; name quaternion",
		"document 2.q: quaternion; name quaternion",
	}, summaries(t, "m.yaml", "q: [1, 0, 0, 0]\n---\nq: [1, 0, 0, 0]\n"))
	text := "base: &b {rpy_deg: [1, 2, 3]}\nleft:\n  <<: *b\n  quaternion: &q [1, 0, 0, 0]\nright: {quaternion: *q}\n"
	assert.Equal(t, []string{
		"base.rpy_deg: angles; label angles; label degree; name roll, pitch, yaw (kind of axes unstated)",
		"left.rpy_deg: angles; label angles; label degree; name roll, pitch, yaw (kind of axes unstated); of left/",
		"left.quaternion: quaternion; label quaternion; of left/",
		"right.quaternion: quaternion; label quaternion",
	}, summaries(t, "m.yaml", text))
}

func TestWarnings(t *testing.T) {
	for text, want := range map[string]string{
		"quaternion: [0 0 0 1]\n":                                 "m.yaml:1:13 quaternion has no commas between its numbers: programs read one text, not a list of numbers",
		"q: [1, 0, 0, 0]\nq: [0, 1, 0, 0]\n":                      "m.yaml:2:1 the key q stands on line 1 already; programs keep one of the two, and not all the same one",
		"R: {rows: 3, cols: 3, data: [1, 2, 3, 4, 5, 6, 7, 8]}\n": "m.yaml:1:29 R states 3 rows and 3 columns, but its data are not 9 numbers; it is not read",
		"n: [1 2 3 4]\nk: 1\nk: 2\n":                              "",
	} {
		var got []string
		for _, w := range readText(t, "m.yaml", text).Warnings {
			got = append(got, w.Place.String()+" "+w.Message)
		}
		assert.Equal(t, want, strings.Join(got, "\n"), text)
	}
}
