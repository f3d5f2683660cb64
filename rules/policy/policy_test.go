package policy

import (
	"errors"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/rules"
)

// parse reads a text that must be right.
func parse(t *testing.T, text string) *Policy {
	t.Helper()
	p, err := Parse("dextral.toml", []byte(text), ruleNames())
	require.NoError(t, err)
	return p
}

func TestErrorsSayWhereAndWhatIsAllowed(t *testing.T) {
	cases := []struct{ name, text, want string }{
		{"unknown key", "gates = 'error'", `dextral.toml:1:1: unknown key "gates"; did you mean "gate"? (allowed: claim, defaults, exclude, frame, gate, rig, waiver, waiver_files)`},
		{"unknown key far from any", "colour = 1", `dextral.toml:1:1: unknown key "colour" (allowed: claim, defaults, exclude, frame, gate, rig, waiver, waiver_files)`},
		{"unknown table", "[[waivers]]\nrule = 'x'", `dextral.toml:1:3: unknown key "waivers"; did you mean "waiver"? (allowed: claim, defaults, exclude, frame, gate, rig, waiver, waiver_files)`},
		{"column in code points", "[[claim]]\nfiles = ['é/ü', '/z']\nunit = 'deg'", `dextral.toml:2:17: files in [[claim]]: "/z" is absolute; globs are relative to the directory of this file`},
		{"carriage returns", "gate = 'error'\r\nexclude = 3\r\n", `dextral.toml:2:11: exclude must be a string or an array of strings, not an integer`},
		{"byte order mark", "\ufeffgate = 'nite'", `dextral.toml:1:8: gate cannot be "nite"; did you mean "note"? (allowed: error, warning, note, never)`},
		{"level", "gate = 'fatal'", `dextral.toml:1:8: gate cannot be "fatal" (allowed: error, warning, note, never)`},
		{"level of another type", "gate = true", `dextral.toml:1:8: gate must be a string, not a boolean`},
		{"scalar place", "[defaults]\nscalar = 'w'", `dextral.toml:2:10: scalar in [defaults] cannot be "w" (allowed: first, last)`},
		{"sequence", "[defaults]\nsequence = 'zzy'", `dextral.toml:2:12: sequence in [defaults]: angle label "zzy" is not an angle sequence: "zzy"; three axes are needed, none twice in a row`},
		{"direction among defaults", "[defaults]\ndirection = 'a<-b'", `dextral.toml:2:1: unknown key "direction" in [defaults] (allowed: product, scalar, sequence, storage, unit)`},
		{"table of another type", "defaults = 'hamilton'", `dextral.toml:1:12: defaults must be a table: [defaults], not a string`},
		{"one table for many", "[claim]\nfiles = 'a'", `dextral.toml:1:1: claim must be an array of tables: [[claim]], not a table`},
		{"array of something else", "rig = ['a']", `dextral.toml:1:8: rig must be an array of tables: [[rig]]; this element is a string`},
		{"element of another type", "exclude = ['a', 2]", `dextral.toml:1:17: exclude must be a string or an array of strings; this element is an integer`},
		{"empty array", "exclude = []", `dextral.toml:1:11: exclude is empty; leave it out, or write a string or an array of strings`},
		{"glob", "exclude = 'a[b'", `dextral.toml:1:11: exclude: "a[b" is not a glob; * stands for a part of a name, ** for any directories, [a-z] and {a,b} for alternatives`},
		{"backslash", `exclude = 'a\b'`, `dextral.toml:1:11: exclude: "a\\b" contains \; write / between directories on every system`},
		{"exception", "exclude = '!a'", `dextral.toml:1:11: exclude: "!a" begins with !; a glob says what it means, there are no exceptions to it`},
		{"outside", "exclude = '../a'", `dextral.toml:1:11: exclude: "../a" leaves the directory of this file, where nothing is governed by it`},
		{"empty glob", "exclude = './'", `dextral.toml:1:11: exclude: "./" is empty; write a path or a glob such as config/**/*.yaml`},
		{"key pattern", "[[claim]]\nfiles = 'a'\nkeys = 'a..b'\nunit = 'deg'", `dextral.toml:3:8: keys in [[claim]]: "a..b" has an empty element; write elements with one dot between them, such as cameras.*.q`},
		{"doubled star in an element", "[[claim]]\nfiles = 'a'\nkeys = ['a.b**']\nunit = 'deg'", `dextral.toml:3:9: keys in [[claim]]: "a.b**" has ** beside other characters; ** is an element of its own`},
		{"alternatives in keys", "[[claim]]\nfiles = 'a'\nkeys = '{a,b}'\nunit = 'deg'", `dextral.toml:3:8: keys in [[claim]]: "{a,b}" contains ? or a brace; a key pattern knows *, ** and {name}, alternatives are listed one by one`},
		{"form", "[[claim]]\nfiles = 'a'\nform = 'quat'", `dextral.toml:3:8: form in [[claim]] cannot be "quat"; did you mean "quaternion"? (allowed: quaternion, rotation, transform, angles, rotation-vector, axis-angle, axis, triad, axis-map, matrix)`},
		{"rotation = true", "[[claim]]\nfiles = 'a'\nrotation = true", `dextral.toml:3:12: rotation in [[claim]] can only be false; to claim a rotation write form = "rotation"`},
		{"uncertainty", "[[claim]]\nfiles = 'a'\nuncertainty_deg = -0.1", `dextral.toml:3:19: uncertainty_deg in [[claim]] must be above 0 and at most 180 degrees`},
		{"uncertainty that is no number", "[[claim]]\nfiles = 'a'\nuncertainty_deg = nan", `dextral.toml:3:19: uncertainty_deg in [[claim]] must be above 0 and at most 180 degrees`},
		{"uncertainty in words", "[[claim]]\nfiles = 'a'\nuncertainty_deg = 'small'", `dextral.toml:3:19: uncertainty_deg in [[claim]] must be a number, not a string`},
		{"claim without files", "[[claim]]\nunit = 'deg'", `dextral.toml:1:1: [[claim]] lacks files`},
		{"rig twice", "[[rig]]\nname='a'\nfiles='x'\n[[rig]]\nname='a'\nfiles='y'", `dextral.toml:5:6: a rig named "a" stands above already; put all its files there`},
		{"rig without name", "[[rig]]\nname=' '\nfiles='x'", `dextral.toml:2:6: name in [[rig]] is empty`},
		{"date and time", waiverText("2031-03-31T12:00:00"), `dextral.toml:4:9: until in [[waiver]] must be a date such as 2031-03-31, without a time`},
		{"time", waiverText("12:00:00"), `dextral.toml:4:9: until in [[waiver]] must be a date such as 2031-03-31, without a time`},
		{"a number for a date", waiverText("2031"), `dextral.toml:4:9: until in [[waiver]] must be a date such as 2031-03-31, not an integer`},
		{"waiver of a waiver", strings.Replace(waiverText("2031-03-31"), "sign-jump", "waiver-expired", 1), `dextral.toml:2:8: waiver-expired is not waived by another waiver; renew the waiver it speaks of, or delete it`},
		{"waiver of no file", strings.Replace(waiverText("2031-03-31"), "logs/*.csv", "#q", 1), `dextral.toml:3:9: place in [[waiver]]: "#q" names no file; write path#key`},
		{"waiver of an empty key", strings.Replace(waiverText("2031-03-31"), "logs/*.csv", "a.csv#", 1), `dextral.toml:3:9: place in [[waiver]]: "a.csv#" has an empty element; write elements with one dot between them, such as cameras.*.q`},
		{"inline tables have places too", "claim = [{files = 'a', unit = 'x'}]", `dextral.toml:1:31: unit in [[claim]] cannot be "x" (allowed: deg, rad)`},
		{"dotted keys too", "defaults.unit = 1", `dextral.toml:1:17: unit in [defaults] must be a string, not an integer`},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			_, err := Parse("dextral.toml", []byte(c.text), ruleNames())
			require.Error(t, err)
			assert.Equal(t, c.want, err.Error())
			var first *Error
			require.True(t, errors.As(err, &first), "typed")
			assert.Equal(t, "dextral.toml", first.Place.Path)
		})
	}
}

func waiverText(until string) string {
	return "[[waiver]]\nrule = 'sign-jump'\nplace = 'logs/*.csv'\nuntil = " + until + "\nbecause = 'recorder'\nowner = 'Saltmarsh Survey'\n"
}

// A rule name near no other lists all of them.
func TestUnknownRule(t *testing.T) {
	_, err := Parse("dextral.toml", []byte(strings.Replace(waiverText("2031-03-31"), "sign-jump", "x", 1)), []string{"sign-jump", "norm-loss"})
	assert.EqualError(t, err, `dextral.toml:2:8: no rule is named "x" (known: sign-jump, norm-loss)`)
}

// Syntax errors carry the library's message at our kind of place: columns in
// code points, which the library counts in bytes.
func TestSyntaxErrors(t *testing.T) {
	for text, want := range map[string]string{
		"gate = ":                       "dextral.toml:1:7:",
		"gate = 'error'\ngate = 'note'": "dextral.toml:2:1:",
		"exclude = ['é', x]":            "dextral.toml:1:17:",
		"\xff\xfeg\x00":                 "dextral.toml:1:1:",
		"[a\nb = 1":                     "dextral.toml:1:",
	} {
		_, err := Parse("dextral.toml", []byte(text), nil)
		require.Error(t, err, text)
		assert.True(t, strings.HasPrefix(err.Error(), want), "%q: %s", text, err)
		assert.Contains(t, err.Error(), "is not TOML")
		var typed *Error
		assert.True(t, errors.As(err, &typed))
	}
}

// All errors of a file are reported, in the order of the text.
func TestAllErrorsAtOnce(t *testing.T) {
	_, err := Parse("dextral.toml", []byte("zeta = 1\n[defaults]\nunit = 'x'\n[[rig]]\n[[claim]]\nfiles = '/'\n"), ruleNames())
	var all Errors
	require.True(t, errors.As(err, &all))
	require.Len(t, all, 5)
	for i := range all[1:] {
		assert.Negative(t, all[i].Place.Compare(all[i+1].Place))
	}
	assert.Equal(t, 5, strings.Count(err.Error()+"\n", "\n"))
}

func TestGate(t *testing.T) {
	assert.Equal(t, GateError, Default().Gate)
	assert.Equal(t, GateError, parse(t, "").Gate)
	levels := []rules.Level{rules.Note, rules.Warning, rules.Error}
	for i, name := range []string{"note", "warning", "error", "never"} {
		g := parse(t, "gate = '"+name+"'").Gate
		assert.Equal(t, name, g.String())
		for j, l := range levels {
			assert.Equal(t, j >= i, g.Fails(l), "gate %s, finding %s", g, l)
		}
	}
	_, ok := ParseGate("Error")
	assert.False(t, ok)
}

func TestFindAndLoad(t *testing.T) {
	dir := t.TempDir()
	write := func(name, text string) {
		require.NoError(t, os.WriteFile(filepath.Join(dir, name), []byte(text), 0o644))
	}
	found, err := Find(dir)
	require.NoError(t, err)
	assert.Empty(t, found)

	write(".dextral.toml", "gate = 'note'")
	found, err = Find(dir)
	require.NoError(t, err)
	p, err := Load(found, nil)
	require.NoError(t, err)
	assert.Equal(t, GateNote, p.Gate)
	assert.Equal(t, filepath.ToSlash(filepath.Join(dir, ".dextral.toml")), p.Path)

	write("dextral.toml", "")
	_, err = Find(dir)
	assert.ErrorContains(t, err, "keep one of them")

	require.NoError(t, os.Remove(filepath.Join(dir, "dextral.toml")))
	require.NoError(t, os.Mkdir(filepath.Join(dir, "dextral.toml"), 0o755))
	_, err = Find(dir)
	assert.ErrorContains(t, err, "is a directory")

	_, err = Load(filepath.Join(dir, "none.toml"), nil)
	assert.ErrorIs(t, err, os.ErrNotExist)
	_, err = Load(dir, nil)
	assert.Error(t, err)

	write("big.toml", strings.Repeat("# as long as a book\n", maxSize/20+1))
	_, err = Load(filepath.Join(dir, "big.toml"), nil)
	assert.ErrorContains(t, err, "is larger than 4194304 bytes")
}

func TestExcluded(t *testing.T) {
	p := parse(t, "exclude = ['third_party', './build/', 'gen/**', '**/*.bak.yaml', 'calib/old?.json']")
	for path, want := range map[string]bool{
		"third_party": true, "third_party/a/b.yaml": true, "third_party_2/a.yaml": false, "a/third_party/b.yaml": false,
		"build": true, "build/x": true, "builder": false,
		"gen": true, "gen/a/b/c": true,
		"x.bak.yaml": true, "a/b/x.bak.yaml": true, "x.yaml": false,
		"calib/old1.json": true, "calib/old.json": false, "calib/old12.json": false,
		".": false, "../third_party/x": false, "/third_party": false,
	} {
		assert.Equal(t, want, p.Excluded(path), path)
	}
	assert.False(t, parse(t, "exclude = '*'").Excluded("."), "the root itself is never excluded")
	assert.False(t, Default().Excluded("third_party"))
}

// Paths are relative to where the command was started, globs to the file.
func TestPathsFromElsewhere(t *testing.T) {
	dir := t.TempDir()
	below := filepath.Join(dir, "survey", "config")
	require.NoError(t, os.MkdirAll(below, 0o755))
	t.Chdir(filepath.Join(dir, "survey"))
	const text = "exclude = 'config/old'"
	at := func(name string) *Policy {
		p, err := Parse(name, []byte(text), nil)
		require.NoError(t, err)
		return p
	}
	here := at("dextral.toml")
	assert.True(t, here.Excluded("config/old/a.yaml"))
	assert.True(t, here.Excluded("./config/old/a.yaml"))
	assert.True(t, here.Excluded("../survey/config/old/a.yaml"))
	cwd, err := os.Getwd()
	require.NoError(t, err)
	assert.True(t, here.Excluded(filepath.ToSlash(filepath.Join(cwd, "config/old/a.yaml"))))

	t.Chdir(dir)
	above := at("survey/dextral.toml")
	assert.True(t, above.Excluded("survey/config/old/a.yaml"))
	assert.False(t, above.Excluded("config/old/a.yaml"))

	t.Chdir(below)
	up := at("../dextral.toml")
	assert.Equal(t, "../dextral.toml", up.Path)
	assert.True(t, up.Excluded("old/a.yaml"))
	assert.False(t, up.Excluded("config/old/a.yaml"))
	absolute := at(filepath.ToSlash(filepath.Join(cwd, "dextral.toml")))
	assert.True(t, absolute.Excluded("old/a.yaml"))
}

func TestRigOf(t *testing.T) {
	p := parse(t, `
[[rig]]
name = "tern-1"
files = ["config/tern1/**", "config/pod.yaml"]
[[rig]]
name = "tern-2"
files = ["config/tern2/*", "config/*.yaml"]
`)
	for path, want := range map[string]string{
		"config/tern1/a/b.yaml": "tern-1", "config/pod.yaml": "tern-1", "config/other.yaml": "tern-2",
		"config/tern2/a.yaml": "tern-2", "config/tern2/a/b.yaml": "", "logs/a.csv": "",
	} {
		assert.Equal(t, want, p.RigOf(path), path)
	}
	assert.Empty(t, Default().RigOf("a"))
}

func TestKeyPatterns(t *testing.T) {
	for _, c := range []struct {
		pattern, key string
		want         bool
	}{
		{"q", "q", true}, {"q", "qq", false}, {"q", "a.q", false}, {"*", "q", true}, {"*", "a.q", false},
		{"a.*.q", "a.b.q", true}, {"a.*.q", "a.q", false}, {"a.*.q", "a.b.c.q", false},
		{"**", "", true}, {"**", "a", true}, {"**", "a.b.c", true},
		{"**.q", "q", true}, {"**.q", "a.b.q", true}, {"**.q", "a.bq", false},
		{"a.**", "a", true}, {"a.**", "a.b.c", true}, {"a.**", "ab", false},
		{"a.**.z", "a.z", true}, {"a.**.z", "a.b.c.z", true}, {"a.**.z", "a.b.c", false},
		{"cam*.q_*_imu", "cam0.q_b_imu", true}, {"cam*.q_*_imu", "cam0.q_b_gps", false},
		{"edges[3].q", "edges.3.q", true}, {"edges.*.q", "edges[12].q", true}, {"edges[*].q", "edges[12].q", true},
		{"a+b", "a+b", true}, {"a+b", "aab", false}, {"/camera/q", "/camera/q", true}, {"Q", "q", false},
		{"a.*", "a.", true}, {"(*T).q", "(*T).q", true},
	} {
		k, err := parseKeyPattern(c.pattern)
		require.NoError(t, err, c.pattern)
		assert.Equal(t, c.want, k.matches(c.key), "%s on %s", c.pattern, c.key)
	}
}

func TestNearest(t *testing.T) {
	words := []string{"files", "keys", "rule", "place", "until", "because", "owner", "unit", "uncertainty_deg"}
	for word, want := range map[string]string{
		"file": "files", "flies": "files", "kyes": "keys", "untill": "until", "Until": "until",
		"uncertainty": "uncertainty_deg", "reason": "", "x": "", "": "", "owners": "owner",
	} {
		assert.Equal(t, want, nearest(word, words), word)
	}
	assert.Equal(t, 1, slips("ab", "ba"))
	assert.Equal(t, 3, slips("", "abc"))
	assert.Equal(t, 0, slips("abc", "abc"))
	assert.Equal(t, 3, slips("kitten", "sitting")) // the usual textbook example; from memory
}
