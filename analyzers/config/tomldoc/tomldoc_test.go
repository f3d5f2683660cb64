package tomldoc

import (
	"fmt"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/analyzers/config/tree"
	"dextral/analyzers/config/tree/treetest"
	"dextral/analyzers/source"
)

func read(t *testing.T, text string) *tree.Document {
	t.Helper()
	d, err := Read(source.New("mount.toml", []byte(text)))
	require.NoError(t, err)
	return d
}

func TestRead(t *testing.T) {
	for name, c := range map[string]struct{ text, want string }{
		"keys":              {"a = 1\n\"b c\" = -2.5e-3\n'd' = inf\n", "{a:<1> b c:<-2.5e-3> d:<inf>}"},
		"tables":            {"[a]\nx = 1\n[a.b]\ny = 2\n[c]\n", "{a:{x:<1> b:{y:<2>}} c:{}}"},
		"arrays of tables":  {"[[a]]\nx = 1\n[[a]]\nx = 2\n[a.b]\ny = 3\n", "{a:[{x:<1>} {x:<2> b:{y:<3>}}]}"},
		"dotted keys":       {"a.b.c = 1\na.d = 2\n", "{a:{b:{c:<1>} d:<2>}}"},
		"arrays":            {"a = [ [1, 2], # [3]\n [3, 4,], ]\nb = []\n", "{a:[[<1> <2>] [<3> <4>]] b:[]}"},
		"inline tables":     {"a = { x = 1, y.z = [2], w = {} }\n", "{a:{x:<1> y:{z:[<2>]} w:{}}}"},
		"strings":           {"a = \"1 2\"\nb = '3 4'\nc = \"\"\"\n5\n6\"\"\"\nd = \"\\u0031\"\ne = ''\n", "{a:<1 2> b:<3 4> c:<\n5\n6> d:<> e:<>}"},
		"CRLF and a mark":   {"\ufeffa = 1\r\nb = [2,\r\n3]\r\n", "{a:<1> b:[<2> <3>]}"},
		"key twice":         {"a = 1\na = 2\n", "{a:<1> a:<2>}"},
		"table over scalar": {"a = 1\n[a]\nb = 2\n", "{a:<1> a:{b:<2>}}"},
		"nothing":           {"", "{}"},
	} {
		t.Run(name, func(t *testing.T) {
			d := read(t, c.text)
			assert.Equal(t, c.want, treetest.Outline(d, d.Roots[0]))
		})
	}
}

// The value of a is everything between the marks.
func TestSpans(t *testing.T) {
	for _, text := range []string{
		"a = «[1, 2]» # [3]\n", "a = «[ # ]\n 1, # ]\n]»\n", "a = «[]»\n", "a = «{x = [1], y = 2}»\n", "a = «\"x ] y\"»\n", "a=«12»#c\n", "a = «[[1], [ ] ]»", "a   =   «'''x'''»\n",
	} {
		from := strings.Index(text, "«")
		to := strings.Index(text, "»") - len("«")
		n := read(t, strings.NewReplacer("«", "", "»", "").Replace(text)).Roots[0].Get("a")
		assert.Equal(t, source.Span{From: from, To: to}, n.Span, text)
	}
}

func TestComments(t *testing.T) {
	d := read(t, "# head\na = '# no' # one\n\"#b\" = [1, # two\n2]#three\n")
	var got []string
	for _, c := range d.Comments {
		got = append(got, c.Text)
	}
	assert.Equal(t, []string{"head", "one", "two", "three"}, got)
}

// The fault is marked in the input.
func TestErrors(t *testing.T) {
	for name, c := range map[string]struct{ text, problem string }{
		"no value":    {"a = 1\nb =¶\n", "value"},
		"bare word":   {"a = ¶yes\n", "incomplete"},
		"open array":  {"a = [1, 2¶", "incomplete"},
		"no key":      {"é = 1\n", "invalid character"},
		"two on line": {"a = 1 ¶b = 2\n", "newline"},
	} {
		t.Run(name, func(t *testing.T) {
			f := source.New("mount.toml", []byte(strings.Replace(c.text, "¶", "", 1)))
			_, err := Read(f)
			var e *source.Error
			require.ErrorAs(t, err, &e)
			assert.Contains(t, e.Problem, "this is not TOML")
			if at := strings.Index(c.text, "¶"); at >= 0 {
				want, _ := f.Position(min(at, len(f.Text)-1))
				assert.Equal(t, want, e.Place.Line)
			}
		})
	}
}

func TestBounds(t *testing.T) {
	for _, text := range []string{
		"a = " + strings.Repeat("[", 600) + strings.Repeat("]", 600), "a = " + strings.Repeat("[", 20_000),
		strings.Repeat("a.", 600) + "b = 1", "[" + strings.Repeat("a.", 600) + "b]", "a = [" + strings.Repeat("1,", tree.MaxNodes) + "1]",
	} {
		_, err := Read(source.New("mount.toml", []byte(text)))
		var e *source.Error
		require.ErrorAs(t, err, &e)
	}
	var many strings.Builder
	for i := range 100_000 {
		fmt.Fprintf(&many, "[t%d]\nx = 1\n", i)
	}
	assert.Len(t, read(t, many.String()).Roots[0].Entries, 100_000)
}

// Laws: no panic; every place lies in the file; a scalar's text stands where Raw
// says.
func FuzzRead(f *testing.F) {
	for _, text := range []string{
		"a = 1\n[b]\nc = [1, 2]\n[[d]]\ne.f = {g = 'h'} # i\n", "\ufeffa = \"\\u0031\"\n", "a = '''\nx'''\nb = \"\"\"y\\\n z\"\"\"\n", "a = [{b = [1]}, {}]\n", "a.b = 1\n[a.b]\n", "a = [1\n",
	} {
		f.Add([]byte(text))
	}
	f.Fuzz(func(t *testing.T, text []byte) {
		file := source.New("mount.toml", text)
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
