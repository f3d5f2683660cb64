package jsondoc

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/analyzers/config/tree"
	"dextral/analyzers/config/tree/treetest"
	"dextral/analyzers/source"
)

func TestRead(t *testing.T) {
	for name, c := range map[string]struct{ text, want string }{
		"plain":            {`{"q": [1, -2.5e-3, null, true]}`, "{q:[<1> <-2.5e-3> <null> <true>]}"},
		"strings":          {`["1 0 0", "\u0031", "a\nb", ""]`, `[<1 0 0> <> <> <>]`},
		"comments, commas": {"// head\n{\"a\": [1, /* two */ 2,], // end\n}\n", "{a:[<1> <2>]}"},
		"not finite":       {`[NaN, -Infinity, Infinity, "NaN"]`, "[<NaN> <-Infinity> <Infinity> <NaN>]"},
		"CRLF and a mark":  {"\ufeff{\r\n\"a\": 1\r\n}", "{a:<1>}"},
		"key twice":        {`{"a": 1, "a": 2}`, "{a:<1> a:<2>}"},
		"escaped key":      {`{"\u0071": 1}`, `{\u0071:<1>}`},
		"lone surrogate":   {`{"a": "\ud800"}`, "{a:<>}"},
		"huge":             {`[1e999, 123456789012345678901234567890]`, "[<1e999> <123456789012345678901234567890>]"},
	} {
		t.Run(name, func(t *testing.T) {
			d, err := Read(source.New("mount.json", []byte(c.text)))
			require.NoError(t, err)
			require.Len(t, d.Roots, 1)
			assert.Equal(t, c.want, treetest.Outline(d, d.Roots[0]))
		})
	}
}

func TestComments(t *testing.T) {
	d, err := Read(source.New("mount.json", []byte("// head\n{ \"a\": \"// no\", // one\n /* two\n  * three */ \"b\": 1 }")))
	require.NoError(t, err)
	var got []string
	for _, c := range d.Comments {
		got = append(got, d.File.Place(c.Span).String()+" "+c.Text)
	}
	assert.Equal(t, []string{"mount.json:1:1 head", "mount.json:2:17 one", "mount.json:3:2 two", "mount.json:4:1 three"}, got)
}

// The fault is marked in the input.
func TestErrors(t *testing.T) {
	for name, c := range map[string]struct{ text, problem string }{
		"truncated list":   {"{\n\"q\": [1, 0,¶", "unexpected EOF"},
		"truncated number": {"{\"q\": ¶1.", "parsing"},
		"truncated string": {"{\"q\": \"ab¶", "parsing"},
		"empty":            {"¶", "unexpected EOF"},
		"behind the end":   {"{}\n¶x", "after top-level value"},
		"no colon":         {"{\"q\" ¶1}", "after object name"},
		"behind a mark":    {"\ufeff{\n\"é\" ¶1}", "after object name"},
		"python":           {"{\"q\": ¶None}", "None"},
	} {
		t.Run(name, func(t *testing.T) {
			at := strings.Index(c.text, "¶")
			f := source.New("mount.json", []byte(strings.Replace(c.text, "¶", "", 1)))
			_, err := Read(f)
			var e *source.Error
			require.ErrorAs(t, err, &e)
			want := f.Place(source.Span{From: at, To: at})
			assert.Equal(t, want.String(), e.Place.String())
			assert.ErrorContains(t, e, "this is not JSON")
			assert.NotEmpty(t, e.Remedy)
		})
	}
}

func TestBounds(t *testing.T) {
	nested := func(n int) string { return strings.Repeat("[", n) + strings.Repeat("]", n) }
	_, err := Read(source.New("mount.json", []byte(nested(tree.MaxDepth))))
	assert.NoError(t, err)
	_, err = Read(source.New("mount.json", []byte(nested(10_000_000))))
	assert.ErrorContains(t, err, "mount.json:1:501: nested deeper than 500 levels")
	_, err = Read(source.New("mount.json", []byte("["+strings.Repeat("1,", tree.MaxNodes)+"1]")))
	assert.ErrorContains(t, err, "more than 1000000 items")
}

// Laws: no panic; every place lies in the file; a scalar's text stands where Raw
// says; hidden words come back.
func FuzzRead(f *testing.F) {
	for _, text := range []string{`{"a": [1, 2]}`, `[NaN, -Infinity]`, "// c\n{\"a\": /* d */ \"\\u0031\",}", "\ufeff[\"NaN\", Infinity]", `{"a": {"b": [[1]]}}`, "[1"} {
		f.Add([]byte(text))
	}
	f.Fuzz(func(t *testing.T, text []byte) {
		file := source.New("mount.json", text)
		if file.CheckText() != nil {
			return
		}
		d, err := Read(file)
		if err != nil {
			var e *source.Error
			require.ErrorAs(t, err, &e)
			require.LessOrEqual(t, e.Place.Line, file.Lines())
			return
		}
		require.NoError(t, treetest.Check(d))
	})
}
