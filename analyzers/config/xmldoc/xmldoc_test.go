package xmldoc

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
	d, err := Read(source.New("mount.xml", []byte(text)))
	require.NoError(t, err)
	return d
}

func TestRead(t *testing.T) {
	for name, c := range map[string]struct{ text, want string }{
		"attributes":          {`<a x="1" y = '2 3'/>`, "{a:{x:<1> y:<2 3>}}"},
		"text":                {"<a>\n 1 2\n 3 </a>", "{a:<1 2\n 3>}"},
		"attributes and text": {`<a x="1">2</a>`, "{a:{x:<1> :<2>}}"},
		"children":            {"<a><b>1</b><c><d>2</d></c></a>", "{a:{b:<1> c:{d:<2>}}}"},
		"repeated":            {"<a><b>1</b><c/><b>2</b></a>", "{a:{b:[<1> <2>] c:<>}}"},
		"attribute and child": {`<a b="1"><b>2</b></a>`, "{a:{b:[<1> <2>]}}"},
		"entities":            {`<a x="&#49;">1 &lt; 2</a>`, "{a:{x:<> :<>}}"},
		"character data":      {"<a><![CDATA[1 2]]></a>", "{a:<>}"},
		"comment in text":     {"<a>1 <!-- one --> 2</a>", "{a:<>}"},
		"head":                {"\ufeff<?xml version=\"1.0\" encoding=\"ISO-8859-1\"?>\r\n<!DOCTYPE a>\r\n<a x=\"é\"\r\n y=\"1\"/>\r\n", "{a:{x:<é> y:<1>}}"},
		"prefixes":            {`<x:a x:y="1"/>`, "{x:a:{x:y:<1>}}"},
		"nothing":             {"", "<>"},
	} {
		t.Run(name, func(t *testing.T) {
			d := read(t, c.text)
			assert.Equal(t, c.want, treetest.Outline(d, d.Roots[0]))
			require.NoError(t, treetest.Check(d))
		})
	}
}

func TestItemsGoByTheirNames(t *testing.T) {
	d := read(t, `<r><j name="a"/><j name="b"/><j/><k name="x"/><k name="x"/><k name="y"/></r>`)
	names := func(key string) (s []string) {
		for _, k := range d.Roots[0].Get("r").Get(key).ItemKeys {
			s = append(s, k.Name)
		}
		return s
	}
	assert.Equal(t, []string{"a", "b", ""}, names("j"))
	assert.Equal(t, []string{"", "", "y"}, names("k"), "a name that two share names neither")
	second := d.Roots[0].Get("r").Get("j").ItemKeys[1].At
	assert.Equal(t, strings.Index(d.File.Slice(source.Span{To: len(d.File.Text)}), `j name="b"`), second.From)
}

func TestComments(t *testing.T) {
	d := read(t, "<!-- head -->\n<a> <!-- one\n two --> <b/></a>")
	var got []string
	for _, c := range d.Comments {
		got = append(got, d.File.Place(c.Span).String()+" "+c.Text)
	}
	assert.Equal(t, []string{"mount.xml:1:1 head", "mount.xml:2:5 one", "mount.xml:3:1 two"}, got)
}

func TestErrors(t *testing.T) {
	for name, c := range map[string]struct{ text, at, problem, remedy string }{
		"open element":    {"<a>\n<b>", "2:2", "the element b is not closed", "complete it"},
		"open tag":        {"<a>\n<b x=", "2:6", "unexpected EOF", "complete it"},
		"crossed":         {"<a>\n<b></a></b>", "2:4", "</a> closes an element that is not open", "in order"},
		"closed too much": {"<a/></a>", "1:5", "closes an element that is not open", "in order"},
		"no quotes":       {"<a>\n<b x=1/></a>", "2:6", "unquoted", "mend"},
		"unknown entity":  {"<a>&bomb;</a>", "1:10", "invalid character entity", "mend"},
	} {
		t.Run(name, func(t *testing.T) {
			_, err := Read(source.New("mount.xml", []byte(c.text)))
			var e *source.Error
			require.ErrorAs(t, err, &e)
			assert.Contains(t, e.Problem, c.problem)
			assert.Contains(t, e.Remedy, c.remedy)
			assert.Equal(t, strings.Split(c.at, ":")[0], fmt.Sprint(e.Place.Line))
		})
	}
}

// Nothing is fetched and nothing is expanded.
func TestEntityBomb(t *testing.T) {
	text := "<!DOCTYPE a [<!ENTITY b \"1 1\"><!ENTITY c \"&b;&b;&b;\"><!ENTITY d SYSTEM \"file:///etc/hosts\">]>\n<a>"
	for _, entity := range []string{"&c;", "&d;"} {
		_, err := Read(source.New("mount.xml", []byte(text+entity+"</a>")))
		assert.ErrorContains(t, err, "invalid character entity")
	}
}

func TestBounds(t *testing.T) {
	_, err := Read(source.New("mount.xml", []byte(strings.Repeat("<a>", 100_000))))
	assert.ErrorContains(t, err, "nested deeper than 500 levels")
	_, err = Read(source.New("mount.xml", []byte("<r>"+strings.Repeat("<a/>", tree.MaxNodes)+"</r>")))
	assert.ErrorContains(t, err, "more than the 1000000 that are read")
	var many strings.Builder
	for i := range 50_000 {
		fmt.Fprintf(&many, "<a name='%d'/><b%d/>", i, i)
	}
	read(t, "<r>"+many.String()+"</r>")
}

// Laws: no panic; places as treetest.Check wants them; errors have a place.
func FuzzRead(f *testing.F) {
	for _, text := range []string{
		`<?xml version="1.0"?><a x="1 2" y='&amp;'><b>1</b><b name="n"/>t<!-- c --></a>`, "<a><![CDATA[1]]></a>", "<a:b c:d='1'/>", "<a", "<a x=>", "<a>\r\n1</a>", "<!DOCTYPE a [<!ENTITY b 'c'>]><a/>",
	} {
		f.Add([]byte(text))
	}
	f.Fuzz(func(t *testing.T, text []byte) {
		file := source.New("mount.xml", text)
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
