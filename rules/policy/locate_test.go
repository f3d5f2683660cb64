package policy

import (
	"fmt"
	"maps"
	"reflect"
	"slices"
	"strings"
	"testing"

	"github.com/BurntSushi/toml"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"
)

// agree compares the tree of places with what the library decoded: same keys,
// same lengths, and the text of every scalar decodes to the same scalar.
func agree(text string, n *node, v any, path string) error {
	switch v := v.(type) {
	case map[string]any:
		if n.table == nil {
			return fmt.Errorf("%s: no table", path)
		}
		if want, got := slices.Sorted(maps.Keys(v)), slices.Sorted(maps.Keys(n.table)); !slices.Equal(want, got) {
			return fmt.Errorf("%s: keys %q, located %q", path, want, got)
		}
		for k, e := range v {
			if err := agree(text, n.table[k], e, path+"."+k); err != nil {
				return err
			}
		}
		return nil
	case []map[string]any:
		if len(n.list) != len(v) {
			return fmt.Errorf("%s: %d tables, located %d", path, len(v), len(n.list))
		}
		for i, e := range v {
			if err := agree(text, n.list[i], e, fmt.Sprintf("%s[%d]", path, i)); err != nil {
				return err
			}
		}
		return nil
	case []any:
		if len(n.list) != len(v) {
			return fmt.Errorf("%s: %d elements, located %d", path, len(v), len(n.list))
		}
		for i, e := range v {
			if err := agree(text, n.list[i], e, fmt.Sprintf("%s[%d]", path, i)); err != nil {
				return err
			}
		}
		return nil
	}
	var one map[string]any
	written := text[n.value.start:n.value.end]
	if _, err := toml.Decode("v = "+written, &one); err != nil {
		return fmt.Errorf("%s: located %q: %w", path, written, err)
	}
	if !reflect.DeepEqual(one["v"], v) && fmt.Sprint(one["v"]) != fmt.Sprint(v) { // NaN is not equal to itself
		return fmt.Errorf("%s: located %q, decodes to %v, want %v", path, written, one["v"], v)
	}
	return nil
}

// awkward are valid texts that a careless scanner gets wrong.
var awkward = []string{
	"",
	"# only a comment",
	"a=1\r\nb = 'x' # y = 2\r\n",
	"a.b.c = 1\na.b.d = [1, 2,\n # three\n 3,]\n",
	"\"quo ted\".'lit.eral' = \"a # b = c ] } \\\" \\\\\"\n[\"x.y\".z]\nk = '\\'\n",
	"s = \"\"\"one\n# \\\"\"\" two\"\"\"\"\"\nt = '''a''b'''''\nu = ''''''\n",
	"d = 1979-05-27 07:32:00\ne=1979-05-27#c\nf = [07:32:00, 1e5, -inf, nan, 0xff, 1_000]\n",
	"p = {x = 1, y = {z = [ {a=1}, {b=2} ]}, \"k\" = '}'}\nq = {}\nr = []\n",
	"[[a]]\nx=1\n[[a.b]]\ny=1\n[[a.b]]\ny=2\n[a.c]\nz=1\n[[a]]\n[[a.b]]\ny=3\n",
	"[ a . \"b\" ] # header\nc = true\n[a]\nd = false\n",
	"[a.b.c]\nx = 1\n[a]\ny = 2\n",
	"\"\" = 1\n'' . x = 2\n"[:7],
	"\"\\u00e9\" = 1\n\"\\t\" = 2\n",
	"[[x]] # one\n[[x]]\n  [x.y]\n  z = 1\n[x.w]\n",
}

func TestLocateAgreesWithTheLibrary(t *testing.T) {
	for _, text := range append(slices.Clone(awkward), goodBlocks(t)...) {
		var vals map[string]any
		_, err := toml.Decode(text, &vals)
		require.NoError(t, err, "the sample must be valid: %s", text)
		assert.NoError(t, agree(text, locate(text), vals, ""), text)
	}
}

func goodBlocks(t *testing.T) []string {
	var all []string
	for _, b := range blocks(t, Doc) {
		if b.info == "toml" {
			all = append(all, b.text)
		}
	}
	return all
}

// The helper must be able to fail: a tree of another text disagrees.
func TestAgreeCanFail(t *testing.T) {
	text := "a = 1\nb = [1, 2]\n[[c]]\nd = 'x'\n"
	var vals map[string]any
	_, err := toml.Decode(text, &vals)
	require.NoError(t, err)
	require.NoError(t, agree(text, locate(text), vals, ""))
	for _, other := range []string{"a = 2\nb = [1, 2]\n[[c]]\nd = 'x'\n", "a = 1\nb = [1]\n[[c]]\nd = 'x'\n", "a = 1\nb = [1, 2]\n[c]\nd = 'x'\n", "a = 1\nb = [1, 2]\n[[c]]\ne = 'x'\n"} {
		assert.Error(t, agree(other, locate(other), vals, ""), other)
	}
}

// Random trees, written out in random layouts.
func TestLocateRandomTexts(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		text := randomTable(t, 0)
		var vals map[string]any
		if _, err := toml.Decode(text, &vals); err != nil {
			t.Skip("not valid")
		}
		if err := agree(text, locate(text), vals, ""); err != nil {
			t.Fatalf("%v\n%s", err, text)
		}
	})
}

func randomTable(t *rapid.T, depth int) string {
	var b strings.Builder
	gap := rapid.SampledFrom([]string{"", " ", "\t ", "  "})
	end := rapid.SampledFrom([]string{"\n", "\r\n", " # c = [\n", "\n\n"})
	for i := range rapid.IntRange(0, 4).Draw(t, "keys") {
		fmt.Fprintf(&b, "%s%s%s=%s%s%s", gap.Draw(t, "gap"), randomKey(t, i), gap.Draw(t, "gap"), gap.Draw(t, "gap"), randomValue(t, 0), end.Draw(t, "end"))
	}
	for i := range rapid.IntRange(0, 3).Draw(t, "tables") {
		key := randomKey(t, 10*(i+1))
		if rapid.Bool().Draw(t, "array") {
			for range rapid.IntRange(1, 3).Draw(t, "times") {
				fmt.Fprintf(&b, "[[%s]]%sv = %s\n", key, end.Draw(t, "end"), randomValue(t, 0))
			}
			fmt.Fprintf(&b, "[%s.sub]\nw = %s\n", key, randomValue(t, 0))
		} else {
			fmt.Fprintf(&b, "[ %s ]%sv = %s\n", key, end.Draw(t, "end"), randomValue(t, 0))
		}
	}
	return b.String()
}

func randomKey(t *rapid.T, i int) string {
	return fmt.Sprintf(rapid.SampledFrom([]string{"k%d", "\"k %d\"", "'k.%d'", "a%[1]d.b", "a%[1]d . \"é\".c", "\"q\\\"%d\""}).Draw(t, "key"), i)
}

func randomValue(t *rapid.T, depth int) string {
	kinds := 9
	if depth > 2 {
		kinds = 7
	}
	switch rapid.IntRange(0, kinds-1).Draw(t, "kind") {
	case 0:
		return rapid.SampledFrom([]string{"0", "-17", "+1_000", "0x1F", "1.5", "6e-3", "-inf", "nan", "true", "false"}).Draw(t, "bare")
	case 1:
		return rapid.SampledFrom([]string{"2031-03-31", "2031-03-31 07:00:00", "2031-03-31T07:00:00Z", "07:00:00"}).Draw(t, "date")
	case 2, 3:
		s := rapid.SampledFrom([]string{`"`, `"""`}).Draw(t, "quotes")
		return s + strings.Join(rapid.SliceOfN(rapid.SampledFrom([]string{"a", "#", "]", "}", ",", "=", `\"`, `\\`, `\u00e9`, "é", " ", "'"}), 0, 6).Draw(t, "parts"), "") + s
	case 4, 5:
		s := rapid.SampledFrom([]string{`'`, `'''`}).Draw(t, "quotes")
		return s + strings.Join(rapid.SliceOfN(rapid.SampledFrom([]string{"a", "#", "]", "}", ",", "=", `\`, `"`, "é", " "}), 0, 6).Draw(t, "parts"), "") + s
	case 6:
		return "{}"
	case 7:
		n := rapid.IntRange(0, 3).Draw(t, "elements")
		parts := make([]string, n)
		for i := range parts {
			parts[i] = rapid.SampledFrom([]string{"", " ", "\n", " # c ]\n"}).Draw(t, "blank") + randomValue(t, depth+1)
		}
		return "[" + strings.Join(parts, " ,") + rapid.SampledFrom([]string{"", " ", "\n"}).Draw(t, "blank") + "]"
	default:
		n := rapid.IntRange(1, 3).Draw(t, "pairs")
		parts := make([]string, n)
		for i := range parts {
			parts[i] = randomKey(t, i) + " = " + randomValue(t, depth+1)
		}
		return "{ " + strings.Join(parts, ", ") + " }"
	}
}

// Places are counted in code points, from 1.
func TestPlaces(t *testing.T) {
	text := "é = 'ü'\r\n\n[[a]]\n  b = [1,\n   22]\n"
	l := newLines("p.toml", text)
	n := locate(text)
	place := func(s span) string {
		p := l.at(s)
		return fmt.Sprintf("%d:%d-%d:%d", p.Line, p.Column, p.EndLine, p.EndColumn)
	}
	// é is no bare key in TOML 1.0, but the scanner does not care.
	assert.Equal(t, "1:1-1:2", place(n.child("é").key))
	assert.Equal(t, "1:5-1:8", place(n.child("é").value))
	a := n.child("a").element(0)
	assert.Equal(t, "3:1-3:6", place(a.value))
	assert.Equal(t, "4:3-4:4", place(a.child("b").key))
	assert.Equal(t, "4:7-5:7", place(a.child("b").value))
	assert.Equal(t, "5:4-5:6", place(a.child("b").element(1).value))
	assert.Zero(t, l.at(a.child("none").key).Line, "what stands nowhere is the whole file")
	assert.Zero(t, l.at((*node)(nil).child("x").element(3).key).Line)
}

// Any text must return, whatever it is; a text that the library accepts must
// be located as it was decoded.
func FuzzLocate(f *testing.F) {
	for _, text := range awkward {
		f.Add(text)
	}
	for _, text := range []string{"[", "[[", "a", "a = ", "= 1", "a = [", "a = {", "a = \"", "]", "a = }", "[a", "\"", "a = [1 2]", "\x00", "a.\nb"} {
		f.Add(text)
	}
	f.Fuzz(func(t *testing.T, text string) {
		text = strings.TrimPrefix(text, "\ufeff")
		n := locate(text)
		newLines("p", text).at(span{0, len(text)})
		var vals map[string]any
		if _, err := toml.Decode(text, &vals); err == nil && !strings.HasPrefix(text, "\xff\xfe") {
			if err := agree(text, n, vals, ""); err != nil {
				t.Fatal(err)
			}
		}
		if p, err := Parse("dextral.toml", []byte(text), nil); err != nil {
			_ = err.Error()
		} else {
			p.Excluded("a/b")
		}
	})
}
