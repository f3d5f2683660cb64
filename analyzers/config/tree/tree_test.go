package tree

import (
	"math"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"

	"dextral/analyzers/source"
)

func TestFloat(t *testing.T) {
	for text, want := range map[string]float64{
		"1": 1, "-1.5": -1.5, "+.5": .5, "5.": 5, "1e-3": 1e-3, "2.6862511e+002": 268.62511, "-0": 0,
		".inf": math.Inf(1), "-.Inf": math.Inf(-1), "Infinity": math.Inf(1), "-inf": math.Inf(-1), "1e999": math.Inf(1), "-1e999": math.Inf(-1), "1e-999": 0,
		"123456789012345678901234567890": 123456789012345678901234567890,
	} {
		got, ok := Float(text)
		assert.True(t, ok, text)
		assert.Equal(t, want, got, text)
	}
	for _, text := range []string{".nan", "NaN", "-nan"} {
		got, ok := Float(text)
		assert.True(t, ok && math.IsNaN(got), text)
	}
	for _, text := range []string{"", "-", "--1", "1_000", "0x1f", "0x1p-2", "1e", "e1", ".", "1.2.3", "1-2", "infinite", "0b1", "one", "1f", "½"} {
		_, ok := Float(text)
		assert.False(t, ok, text)
	}
}

// document is a file with one scalar that is all of it.
func document(text string) (*Document, *Node) {
	n := &Node{Text: text, Span: source.Span{To: len(text)}, Raw: source.Span{To: len(text)}}
	return &Document{File: source.New("mount.yaml", []byte(text)), Roots: []*Node{n}}, n
}

func TestNumbers(t *testing.T) {
	for text, want := range map[string][]string{
		"1 2 3": {"1", "2", "3"}, " 1,2;\n3\t": {"1", "2", "3"}, "1": {"1"}, "1 two": nil, "": nil, ", ,": nil, "1 2 3 4": nil, "[[1, 2], (3)]": {"1", "2", "3"}, "1 [deg]": nil, "{1, 2}": nil,
	} {
		d, n := document(text)
		var got []string
		for _, number := range d.Numbers(n, 3) {
			got = append(got, number.Text)
		}
		assert.Equal(t, want, got, "%q", text)
	}
	d, n := document("1 2")
	n.Raw = source.Span{}
	assert.Nil(t, d.Numbers(n, 3), "what stands nowhere is not read")
	assert.Nil(t, d.Numbers(nil, 3))
	assert.Nil(t, d.Numbers(&Node{Kind: Map}, 3))
	list := &Node{Kind: List, Items: []*Node{{Text: "1", Raw: source.Span{To: 1}}, {Kind: List}}}
	assert.Nil(t, d.Numbers(list, 3))
	_, ok := d.Number(n)
	assert.False(t, ok)
}

func TestSetRaw(t *testing.T) {
	f := source.New("mount.yaml", []byte("a  b\n c"))
	for text, want := range map[string]bool{"a b c": true, "a  b\n c": true, "a bc": false, "a b": false, "a b d": false} {
		n := &Node{Text: text}
		n.SetRaw(f, source.Span{To: 7})
		assert.Equal(t, want, !n.Raw.Empty(), text)
	}
}

func TestGet(t *testing.T) {
	one, two := &Node{}, &Node{}
	m := &Node{Kind: Map, Entries: []Entry{{Key: "a", Value: one}, {Key: "a", Value: two}}}
	assert.Same(t, one, m.Get("a"), "the first")
	assert.Nil(t, m.Get("b"))
	assert.Nil(t, one.Get("a"))
	assert.Nil(t, (*Node)(nil).Get("a"))
}

func TestComments(t *testing.T) {
	text := "# far\n\n# near\n# nearer\nx: 1 # beside\n# below\n"
	d, _ := document(text)
	d.Comments = HashComments(d.File, 0, nil, "")
	x := source.Span{From: strings.Index(text, "x"), To: strings.Index(text, "x") + 4}
	assert.Equal(t, []Comment{d.Comments[3]}, d.OnLines(x))
	assert.Equal(t, "beside", d.OnLines(x)[0].Text)
	assert.Equal(t, d.Comments[1:3], d.Above(d.File.Line(x.From)))
	assert.Empty(t, d.Above(1))
	assert.Empty(t, d.OnLines(source.Span{From: 7, To: 7}), "an empty line")
}
