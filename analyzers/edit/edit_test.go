package edit_test

import (
	"bytes"
	"os"
	"os/exec"
	"path/filepath"
	"strconv"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"dextral/analyzers/edit"
	"dextral/analyzers/rewrite"
	"dextral/analyzers/source"
	"dextral/rules"
)

// finding makes one with an edit that writes other texts for some words of a
// file, found by their order.
func finding(f *source.File, words map[string]string) *rules.Finding {
	e := &rules.Edit{}
	for old, now := range words {
		from := bytes.Index(f.Text, []byte(old))
		e.Replacements = append(e.Replacements, rules.Replacement{Place: f.Place(source.Span{From: from, To: from + len(old)}), Old: old, New: now})
	}
	return &rules.Finding{Place: rules.Place{Path: f.Path, Line: 1}, Edit: e}
}

// in writes a file into a new working directory.
func in(t *testing.T, name, text string) (*source.File, map[string]rewrite.Sum) {
	t.Helper()
	t.Chdir(t.TempDir())
	require.NoError(t, os.WriteFile(name, []byte(text), 0o644))
	return source.New(name, []byte(text)), map[string]rewrite.Sum{name: rewrite.SumOf([]byte(text))}
}

func TestNothingElseIsTouched(t *testing.T) {
	const text = "\ufeff# übung\r\na: [0.11, é, 0.12]  # keep\r\n\r\nb: {x: 0.13,\ty: 0.14} # 0.11 too"
	f, sums := in(t, "a.yaml", text)
	files, refused := edit.Plan([]*rules.Finding{
		finding(f, map[string]string{"0.14": "-1.5e3"}), finding(f, map[string]string{"0.11": "0.12", "0.12": "0.11"}),
		{Place: rules.Place{Path: "a.yaml"}}, {Edit: finding(f, map[string]string{"0.13": "9"}).Edit, Waiver: &rules.Waiver{}},
	}, sums)
	assert.Empty(t, refused)
	require.Len(t, files, 1)
	want := strings.Replace(strings.Replace(text, "[0.11, é, 0.12]", "[0.12, é, 0.11]", 1), "0.14", "-1.5e3", 1)
	assert.Equal(t, want, string(files[0].New))
	assert.Len(t, files[0].Findings, 2)
	require.NoError(t, files[0].Write())
	got, err := os.ReadFile("a.yaml")
	require.NoError(t, err)
	assert.Equal(t, want, string(got))
	assert.ErrorIs(t, files[0].Write(), rewrite.ErrChanged, "once only")
}

func TestWhatIsRefused(t *testing.T) {
	f, sums := in(t, "a.yaml", "a: [0.11, 0.12]\n")
	one := finding(f, map[string]string{"0.11": "0.21"})
	same := finding(f, map[string]string{"0.11": "0.21"})
	other := finding(f, map[string]string{"0.11": "0.31", "0.12": "0.32"})
	files, refused := edit.Plan([]*rules.Finding{one, same, other}, sums)
	require.Len(t, files, 1)
	assert.Equal(t, "a: [0.21, 0.12]\n", string(files[0].New), "the same edit twice is one")
	require.Len(t, refused, 1)
	assert.Contains(t, refused[0].Why.Error(), "is changed for another finding")

	for _, place := range []rules.Place{{Path: "a.yaml", Line: 1, Column: 5}, {Path: "a.yaml", Line: 9, Column: 1}, {Path: "a.yaml", Line: 1, Column: 99}, {Path: "a.yaml"}} {
		wrong := finding(f, nil)
		wrong.Edit.Replacements = []rules.Replacement{{Place: place, Old: "7.77", New: "8"}}
		files, refused = edit.Plan([]*rules.Finding{wrong}, sums)
		assert.Empty(t, files)
		require.Len(t, refused, 1)
		assert.Contains(t, refused[0].Why.Error(), "does not stand at")
	}

	require.NoError(t, os.WriteFile("a.yaml", []byte("a: [0.11, 0.12] \n"), 0o644))
	files, refused = edit.Plan([]*rules.Finding{one}, sums)
	assert.Empty(t, files)
	require.Len(t, refused, 1)
	assert.ErrorIs(t, refused[0].Why, rewrite.ErrChanged)

	require.NoError(t, os.Remove("a.yaml"))
	_, refused = edit.Plan([]*rules.Finding{one}, sums)
	assert.ErrorIs(t, refused[0].Why, os.ErrNotExist)
}

// The diff is a patch: whoever applies it gets the new text.
func TestDiffIsAPatch(t *testing.T) {
	git, err := exec.LookPath("git")
	if err != nil {
		t.Skip("no git command")
	}
	t.Chdir(t.TempDir())
	rapid.Check(t, func(rt *rapid.T) {
		end := rapid.SampledFrom([]string{"\n", "\r\n"}).Draw(rt, "line end")
		lines := rapid.SliceOfN(rapid.Bool(), 1, 40).Draw(rt, "changed")
		var text strings.Builder
		var edits []*rules.Finding
		for i := range lines {
			text.WriteString("key: 0." + strconv.Itoa(100+i) + " # words" + end)
		}
		whole := text.String()
		if rapid.Bool().Draw(rt, "open end") {
			whole = strings.TrimSuffix(whole, end)
		}
		f := source.New("a.yaml", []byte(whole))
		for i, changed := range lines {
			if changed {
				edits = append(edits, finding(f, map[string]string{"0." + strconv.Itoa(100+i): "0.5"}))
			}
		}
		require.NoError(rt, os.WriteFile("a.yaml", []byte(whole), 0o644))
		files, refused := edit.Plan(edits, map[string]rewrite.Sum{"a.yaml": rewrite.SumOf([]byte(whole))})
		require.Empty(rt, refused)
		if len(files) == 0 {
			return
		}
		var patch bytes.Buffer
		require.NoError(rt, files[0].Diff(&patch))
		apply := exec.Command(git, "apply", "--whitespace=nowarn", "-")
		apply.Stdin = &patch
		out, err := apply.CombinedOutput()
		require.NoError(rt, err, string(out))
		got, err := os.ReadFile("a.yaml")
		require.NoError(rt, err)
		assert.Equal(rt, string(files[0].New), string(got))
	})
}

func TestDiffShowsThreeLinesAround(t *testing.T) {
	var text strings.Builder
	for i := range 20 {
		text.WriteString(strconv.Itoa(10+i) + "\n")
	}
	f, sums := in(t, filepath.ToSlash("a.txt"), text.String())
	files, _ := edit.Plan([]*rules.Finding{finding(f, map[string]string{"12": "x", "18": "y", "29": "z"})}, sums)
	var b bytes.Buffer
	require.NoError(t, files[0].Diff(&b))
	assert.Equal(t, "--- a/a.txt\n+++ b/a.txt\n@@ -1,12 +1,12 @@\n 10\n 11\n-12\n+x\n 13\n 14\n 15\n 16\n 17\n-18\n+y\n 19\n 20\n 21\n@@ -17,4 +17,4 @@\n 26\n 27\n 28\n-29\n+z\n", b.String())
}
