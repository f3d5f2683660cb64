package yamldoc

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
	d, err := Read(source.New("mount.yaml", []byte(text)))
	require.NoError(t, err)
	return d
}

func TestRead(t *testing.T) {
	for name, c := range map[string]struct{ text, want string }{
		"block":               {"a: 1\nb:\n  - 2\n  - c: 3\n", "{a:<1> b:[<2> {c:<3>}]}"},
		"flow":                {"a: [ 1., 2, {b: -.inf, c: .nan} ]\n", "{a:[<1.> <2> {b:<-.inf> c:<.nan>}]}"},
		"CRLF and a mark":     {"\ufeffa: 1\r\nb: [2,\r\n 3]\r\n", "{a:<1> b:[<2> <3>]}"},
		"keys beyond ASCII":   {"größe: 1\n姿: \"2\"\n", "{größe:<1> 姿:<2>}"},
		"line separators":     {"a: é\u2028b: 1\u0085c: 2\rd: 3\n", "{a:<é> b:<1> c:<2> d:<3>}"},
		"quotes":              {`{a: 'it''s 1', b: "1 2"}`, "{a:<> b:<1 2>}"},
		"escapes are nowhere": {`a: "\x31"`, "{a:<>}"},
		"no commas":           {"a: [0 0 0 1]\n", "{a:[<0 0 0 1>]}"},
		"plain on two lines":  {"a: 1 2\n  3 4\n", "{a:<1 2\n  3 4>}"},
		"literal":             {"a: |2-\n   1 2\n   3\nb: 4\n", "{a:<1 2\n   3> b:<4>}"},
		"folded":              {"a: > # why\n  1 2\n  3\n\nb: 4\n", "{a:<1 2\n  3> b:<4>}"},
		"tag and anchor":      {"a: &x !!float 0.5\nb: !!opencv-matrix # 3x3\n  rows: 3\n", "{a:!!float <0.5> b:!!opencv-matrix {rows:<3>}}"},
		"reference":           {"a: &x [1, 2]\nb: *x\n", "{a:[<1> <2>] b:[<1> <2>]}"},
		"merge":               {"a: &x {p: 1, q: 2}\nb:\n  <<: *x\n  q: 3\n", "{a:{p:<1> q:<2>} b:{q:<3> p:<1>}}"},
		"merge of two":        {"a: &x {p: 1}\nb: &y {p: 2, q: 3}\nc: {<<: [*x, *y]}\n", "{a:{p:<1>} b:{p:<2> q:<3>} c:{p:<1> q:<3>}}"},
		"nothing":             {"a:\nb: ~\n", "{a:<> b:<~>}"},
		"key twice":           {"a: 1\na: 2\n", "{a:<1> a:<2>}"},
		"OpenCV head":         {"%YAML:1.0\n---\na: !!opencv-matrix\n   data: [ 1., 0. ]\n", "{a:!!opencv-matrix {data:[<1.> <0.>]}}"},
		"one pair in a list":  {"a: [b: 1]\n", "{a:[{b:<1>}]}"},
	} {
		t.Run(name, func(t *testing.T) {
			d := read(t, c.text)
			require.Len(t, d.Roots, 1)
			assert.Equal(t, c.want, treetest.Outline(d, d.Roots[0]))
		})
	}
}

func TestDocuments(t *testing.T) {
	d := read(t, "a: 1\n---\nb: 2\n...\n")
	require.Len(t, d.Roots, 2)
	assert.Equal(t, "{b:<2>}", treetest.Outline(d, d.Roots[1]))
	assert.Empty(t, read(t, "").Roots)
	assert.Empty(t, read(t, "# nothing but a comment\n").Roots)
}

// Spans are marked in the input: the value of a is everything between the marks.
func TestSpans(t *testing.T) {
	for _, text := range []string{
		"a: «[1, 2]» # [3]\nb: 3\n",
		"a: «[ # first\n 1, # one\n 2, # two ]\n]»\n",
		"a: «[]»\n",
		"a: &x !!seq «[1]»\n",
		"a:\n  «- 1\n  - [2]»\nb: 1\n",
		"a: «\"x ] \\\" y\"»\n",
		"a: «'it''s'»\n",
		"b: &x [1, [2]]\na: [*x, «[3, *x]»]\n",
	} {
		from := strings.Index(text, "«")
		to := strings.Index(text, "»") - len("«")
		n := read(t, strings.NewReplacer("«", "", "»", "").Replace(text)).Roots[0].Get("a")
		if strings.Contains(text, "*x") {
			n = n.Items[1]
		}
		assert.Equal(t, source.Span{From: from, To: to}, n.Span, text)
	}
}

func TestComments(t *testing.T) {
	text := strings.Join([]string{
		"# head",
		"a: 1 # one",
		"b: x#y # two # more",
		`c: "# no" # three`,
		"d: |",
		"  # no comment",
		"  5",
		"e: [1, # four",
		"  2]# five",
		"f: !t 'x # no' ##  six",
	}, "\n")
	var got []string
	d := read(t, text)
	for _, c := range d.Comments {
		got = append(got, c.Text)
		assert.Equal(t, byte('#'), text[c.Span.From])
	}
	assert.Equal(t, []string{"head", "one", "two # more", "three", "four", "five", "six"}, got)
}

func TestCommentsBesideAndAbove(t *testing.T) {
	d := read(t, "# lost\n\n# far\n# near\na: [1, # one\n  2] # two\n# below\nb: 1\n")
	texts := func(cs []tree.Comment) (s []string) {
		for _, c := range cs {
			s = append(s, c.Text)
		}
		return s
	}
	assert.Equal(t, []string{"far", "near"}, texts(d.Above(5)))
	assert.Equal(t, []string{"one", "two"}, texts(d.OnLines(d.Roots[0].Get("a").Span)))
	assert.Equal(t, []string{"below"}, texts(d.Above(8)))
	assert.Empty(t, texts(d.Above(1)))
	assert.Empty(t, texts(d.OnLines(source.Span{})))
}

func TestErrors(t *testing.T) {
	for name, c := range map[string]struct{ text, at, problem, remedy string }{
		"tab":                {"a: 1\n\tb: 2\n", "2:1", "tab", "spaces"},
		"tab at the head":    {"\ta: 1", "1:1", "cannot start any token", "spaces"},
		"at sign":            {"a: 1\nb: @x\n", "2:4", "cannot start any token", "quote"},
		"colon in text":      {"a: 1\nb: c: d\n", "2:5", "mapping values", "quote"},
		"unclosed bracket":   {"a: 1\nb: 2\nc: [1,2\n", "3:1", "did not find expected ',' or ']'", "close"},
		"control character":  {"a: 1\nb: \x01\n", "2:4", "control characters", "remove"},
		"unknown anchor":     {"a: 1\nb: *z\n", "2:4", "unknown anchor", "define"},
		"reference to self":  {"a: &x\n  - 1\n  - *x\n", "3:5", "stands inside", "remove"},
		"merge of self":      {"a: &x\n  <<: *x\n", "2:7", "stands inside", "remove"},
		"two bad characters": {"é: '1'\nb: `\n", "2:4", "cannot start", "quote"},
	} {
		t.Run(name, func(t *testing.T) {
			_, err := Read(source.New("mount.yaml", []byte(c.text)))
			var e *source.Error
			require.ErrorAs(t, err, &e)
			assert.Equal(t, "mount.yaml:"+c.at, e.Place.String())
			assert.Contains(t, e.Problem, c.problem)
			assert.Contains(t, e.Remedy, c.remedy)
		})
	}
}

// bomb is the usual chain of lists, each of ten references to the one before.
func bomb(levels int) string {
	text := "a0: &a0 [1, 1, 1, 1, 1, 1, 1, 1, 1, 1]\n"
	for i := 1; i <= levels; i++ {
		ref := fmt.Sprintf("*a%d", i-1)
		text += fmt.Sprintf("a%d: &a%d [%s]\n", i, i, strings.Join([]string{ref, ref, ref, ref, ref, ref, ref, ref, ref, ref}, ", "))
	}
	return text
}

func TestReferencesAreBounded(t *testing.T) {
	_, err := Read(source.New("mount.yaml", []byte(bomb(2)))) // 1000 items
	assert.NoError(t, err)
	merges := "a0: &a0 {k: 1}\n"
	for i := 1; i < 40; i++ {
		merges += fmt.Sprintf("a%d: &a%d {<<: [*a%d, *a%d], k%d: 1}\n", i, i, i-1, i-1, i)
	}
	for name, text := range map[string]string{"lists": bomb(9), "merges": merges} {
		_, err := Read(source.New("mount.yaml", []byte(text)))
		var e *source.Error
		require.ErrorAs(t, err, &e, name)
		assert.Contains(t, e.Problem, "expand to more than 100000 items", name)
	}
}

func TestDepthIsBounded(t *testing.T) {
	nested := func(n int) string { return strings.Repeat("[", n) + strings.Repeat("]", n) }
	_, err := Read(source.New("mount.yaml", []byte(nested(tree.MaxDepth))))
	assert.NoError(t, err)
	for _, n := range []int{tree.MaxDepth + 1, 9_000, 20_000} {
		_, err := Read(source.New("mount.yaml", []byte(nested(n))))
		assert.Error(t, err, n)
	}
}

func TestSizeIsBounded(t *testing.T) {
	_, err := Read(source.New("mount.yaml", []byte("["+strings.Repeat("1,", tree.MaxNodes)+"1]")))
	assert.ErrorContains(t, err, "more than the 1000000 that are read")
}

// Laws: no panic; every place lies in the file; a scalar's text stands where Raw
// says; children lie inside the file; comments begin with their mark.
func FuzzRead(f *testing.F) {
	for _, text := range []string{
		"a: [1, 2]\n", "%YAML:1.0\n---\nb: !!opencv-matrix\n  rows: 3\n  data: [ 1., 0 ]\n", "a: &x {p: 1}\nb:\n  <<: *x\n",
		"a: |\n  1\n  2\n# c\nb: >-\n 3\n", "? [1]\n: 2\n", "a: 'x''y' # c\n", "- &a [*a]", "\ufeffa: é\u2028b: 1\r\n", "a: \"\\x31 \\\n  2\"\n", "--- \n...\n---\n- 1\n",
	} {
		f.Add([]byte(text))
	}
	f.Fuzz(func(t *testing.T, text []byte) {
		file := source.New("mount.yaml", text)
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
