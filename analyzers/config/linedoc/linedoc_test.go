package linedoc

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

type readFunc func(*source.File) (*tree.Document, error)

func outline(t *testing.T, read readFunc, text string) string {
	t.Helper()
	d, err := read(source.New("mount.txt", []byte(text)))
	require.NoError(t, err)
	require.NoError(t, treetest.Check(d))
	s := treetest.Outline(d, d.Roots[0])
	for _, c := range d.Comments {
		s += " #" + c.Text
	}
	return s
}

func TestSections(t *testing.T) {
	for name, c := range map[string]struct{ text, want string }{
		"sections":         {"a = 1\n[cam]\nq = 1 0 0 0\n rpy: 1, 2, 3 \n[imu]\n[cam]\nR=2\n", "{a:<1> cam:{q:<1 0 0 0> rpy:<1, 2, 3> R:<2>} imu:{}}"},
		"comments":         {"# head\n; two\n! three\na = 1 # one\nb = x#y ; z\n", "{a:<1> b:<x#y>} #head #two #three #one #z"},
		"quotes":           {"a = \"1 2\"\nb = '3'\nc = \"\n", "{a:<1 2> b:<3> c:<\">}"},
		"continuation":     {"R = 1 0 0\n    0 1 0\n    0 0 1\nb = 1\n", "{R:<1 0 0\n    0 1 0\n    0 0 1> b:<1>}"},
		"not indented":     {"R = 1 0 0\n0 1 0\n", "{R:<1 0 0>}"},
		"rows in brackets": {"R = [[1, 0],\n  [0, 1]]\n", "{R:<[[1, 0],\n  [0, 1]]>}"},
		"CRLF, a mark":     {"\ufeff[é]\r\nä = 1\r\n", "{é:{ä:<1>}}"},
		"not INI":          {"gen = Generator()\nnothing here\n=\n", "{gen:<Generator()>}"},
	} {
		t.Run(name, func(t *testing.T) { assert.Equal(t, c.want, outline(t, Sections, c.text)) })
	}
}

func TestParameters(t *testing.T) {
	for text, want := range map[string]string{
		"A_X,-0.5  # why\nB 2\nC\t3\nD=4\n": "{A_X:<-0.5> B:<2> C:<3> D:<4>} #why",
		"1\t1\tCAL_ROT\t6\t6\n":             "{CAL_ROT:<6>}",
		"A,B\nA 1 2\n1 2\n// off\n#A,1\n":   "{} #off #A,1",
	} {
		assert.Equal(t, want, outline(t, Parameters, text), text)
	}
}

func TestColon(t *testing.T) {
	text := "calib_time: 15-Mar-2012 11:37:16\nR: 1 0 0 0 1 0 0 0 1\nT: 1 2 3\n\nnothing\nP:\n"
	assert.Equal(t, "{calib_time:<15-Mar-2012 11:37:16> R:<1 0 0 0 1 0 0 0 1> T:<1 2 3>}", outline(t, Colon, text))
	for head, want := range map[string]bool{
		"R: 1 0 0 0 1 0 0 0 1\nT: 1 2 3\n":                true,
		"\ufeff# c\nP0: 1 0 0 0 0 1 0 0 0 0 1 0\nTr: 1 0": true,
		"P0: 1 0 0 0 0 1 0 0 0 0 1 0\nTr_velo":            true,
		"Dear all,\nR: 1 0 0 0 1 0 0 0 1\n":               false,
		"note: see below\nprice: 3\n":                     false,
		"two words: 1 0 0 0 1 0 0 0 1\n":                  false,
		"":                                                false,
		"R: 1 0 0 0 1 0 0 0 1 m\n":                        false,
	} {
		assert.Equal(t, want, IsColon([]byte(head)), head)
	}
}

func TestKeyValue(t *testing.T) {
	for name, c := range map[string]struct{ text, want string }{
		"blocks":   {"V = 2.0\nCOMMENT a = b\nQUAT_START\nQ1 = 0.5 [1/s]\nQUAT_STOP\nX = y z\n", "{V:<2.0> QUAT:{Q1:[1/s] <0.5>} X:<y z>} #a = b"},
		"repeated": {"Q_START\nA = 1\nQ_STOP\nQ_START\nA = 2\nQ_STOP\n", "{Q:[{A:<1>} {A:<2>}]}"},
		"open":     {"Q_START\nA = 1\n", "{Q:{A:<1>}}"},
		"crossed":  {"Q_START\nA = 1\nR_STOP\nB = 2\nQ_STOP\n", "{Q:{A:<1> B:<2>}}"},
		"closed":   {"_STOP\nA = 1\n", "{A:<1>}"},
		"data":     {"DATA_START\n2031-03-04T12:00:00 0 0 0 1\nDATA_STOP\n", "{DATA:{}}"},
	} {
		t.Run(name, func(t *testing.T) { assert.Equal(t, c.want, outline(t, KeyValue, c.text)) })
	}
	_, err := KeyValue(source.New("m.kvn", []byte(strings.Repeat("A_START\n", 1000))))
	assert.ErrorContains(t, err, "nested deeper than 500 levels")
}

func TestGraph(t *testing.T) {
	text := "VERTEX_SE3:QUAT 0 1 2 3 0 0 0 1\n# c\nEDGE_SE3:QUAT 0  1   1 2 3 0 0 0 1 10 0\nEDGE_SE3:QUAT 0 1 4\nFIX 0\nVERTEX_SE3:QUAT 1\n"
	d, err := Graph(source.New("m.g2o", []byte(text)))
	require.NoError(t, err)
	assert.Equal(t, "{VERTEX_SE3:QUAT:[<1 2 3 0 0 0 1>] EDGE_SE3:QUAT:[<1 2 3 0 0 0 1 10 0> <4>]}", treetest.Outline(d, d.Roots[0]))
	edges := d.Roots[0].Get("EDGE_SE3:QUAT")
	assert.Equal(t, "0 1", edges.ItemKeys[0].Name)
	assert.Empty(t, edges.ItemKeys[1].Name, "the second edge between the two")
	assert.True(t, IsGraph([]byte("\n EDGE_SE3:QUAT 0 1 1\n")))
	assert.False(t, IsGraph([]byte("EDGE\n")) || IsGraph(nil) || IsGraph([]byte("VERTEX")))
}

func TestBounds(t *testing.T) {
	for _, read := range []readFunc{Sections, Parameters, Colon, KeyValue, Graph, Kernel, Sheet} {
		_, err := read(source.New("m", []byte(strings.Repeat("\n", tree.MaxNodes+1))))
		assert.ErrorContains(t, err, "more than the 1000000 that are read")
	}
	var many strings.Builder
	for i := range 100_000 {
		fmt.Fprintf(&many, "[s%d]\na = %d # c\n", i, i)
	}
	_, err := Sections(source.New("m", []byte(many.String())))
	assert.NoError(t, err)
}

// Laws: no panic; places as treetest.Check wants them.
func TestKernel(t *testing.T) {
	for name, c := range map[string]struct{ text, want string }{
		"lines":     {"KPL/FK\nA = 1\n\\begindata\nA = ( 1,\n  2 )\nB = 'x y'\n\\begintext\nC = 1\n\\begindata\nD=( 'x' )\n", "{A:<1,\n  2> B:<x y> D:<x>} #KPL/FK #A = 1 #C = 1"},
		"appended":  {"\\begindata\nA = 1\nA += ( 2 3 )\nB += 4\n", "{A:[<1> <2 3>] B:<4>}"},
		"again":     {"\\begindata\nA = 1\nB = 2\nA = 3\n", "{A:<3> B:<2>}"},
		"not ended": {"\\begindata\nA = ( 1\n2\n", "{A:<( 1\n2>}"},
	} {
		t.Run(name, func(t *testing.T) { assert.Equal(t, c.want, outline(t, Kernel, c.text)) })
	}
	assert.True(t, IsKernel([]byte("KPL/FK\n")))
	assert.False(t, IsKernel([]byte("resource \"a\" {\n}\n")))
}

func TestSheet(t *testing.T) {
	for name, c := range map[string]struct{ text, want string }{
		"commas":        {"name,roll [deg],note\nnose, 1.5 ,\"a, b\"\n# off\ntail,2,\n", "{nose:{roll [deg]:<1.5> note:<a, b>} tail:{roll [deg]:<2>}} #off"},
		"tabs":          {"id\tyaw\tpart\n1\t2\tnose\n1\t3\ttail\n", "{nose:{id:<1> yaw:<2>} tail:{id:<1> yaw:<3>}}"},
		"semicolons":    {"name;a\nx;1\n", "{x:{a:<1>}}"},
		"matrix":        {"name,b,R_11,R_12,R_13,R_21,R_22,R_23,R_31,R_32,R_33\na,0,1,2,3,4,5,6,7,8,9\n", "{a:{b:<0> R_11:[<1> <2> <3> <4> <5> <6> <7> <8> <9>]}}"},
		"times":         {"name,time [s],roll\na,1,2\nb,2,3\n", "{}"},
		"dates":         {"day,roll\n2031-01-01,2\n2031-01-02,3\n", "{}"},
		"equal names":   {"state,roll\nok,2\nok,3\n", "{}"},
		"no header":     {"nose,1\ntail,2\n", "{}"},
		"no names":      {"roll,yaw\n1,2\n", "{}"},
		"uneven":        {"name,roll\na,1\nb,1,2\n", "{}"},
		"only a header": {"name,roll\n", "{}"},
		"long":          {"name,roll\n" + strings.Repeat("a,1\n", 300), "{}"},
	} {
		t.Run(name, func(t *testing.T) { assert.Equal(t, c.want, outline(t, Sheet, c.text)) })
	}
}

func FuzzRead(f *testing.F) {
	for _, text := range []string{"[a]\nb = 1 # c\n  2\n", "A,1\n1\t1\tB\t2\t9\n", "R: 1 2 3\n", "A_START\nB = 1 [deg]\nA_STOP\nCOMMENT x\n", "EDGE_SE3:QUAT 0 1 1 2 3 0 0 0 1\n", "_STOP\n", "name,roll [deg],b\na,1,2\nb,\"3\",4\n", "KPL/FK\n\\begindata\nA = ( 1,\n 2 )\nA += 3\nB = 'x'\n\\begintext\n", "\ufeffa:'b'\r\n"} {
		f.Add([]byte(text))
	}
	f.Fuzz(func(t *testing.T, text []byte) {
		file := source.New("m", text)
		if file.CheckText() != nil {
			return
		}
		IsColon(text)
		IsGraph(text)
		for _, read := range []readFunc{Sections, Parameters, Colon, KeyValue, Graph} {
			if d, err := read(file); err == nil {
				require.NoError(t, treetest.Check(d))
			}
		}
	})
}
