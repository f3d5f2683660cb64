package measure

import (
	"bytes"
	"encoding/gob"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/core/matrix"
	"dextral/core/operation"
)

func encode(t *testing.T, m *Meanings) []byte {
	var b bytes.Buffer
	require.NoError(t, gob.NewEncoder(&b).Encode(m))
	return b.Bytes()
}

// A fact survives its way into a file and back, and equal facts are equal bytes.
func TestFactsAsBytes(t *testing.T) {
	way := angle.Reading{Seq: angle.Sequence{Axes: [3]angle.Axis{angle.Z, angle.Y, angle.X}}, Order: [3]int{2, 1, 0}}
	turn := matrix.Mat3{{0, 1, 0}, {1, 0, 0}, {0, 0, -1}}
	m := &Meanings{
		Types: []TypeMeaning{{"a.Q", operation.Quaternion, []operation.Order{operation.ScalarLast}, 0, true}, {"a.M", operation.Matrix3, nil, convention.ColumnMajor, true}},
		Funcs: []FuncMeaning{
			{"a.FromEuler", "", []operation.Reading{{Op: operation.FromAngles, Angles: &way, Unit: convention.Degree, Orders: []operation.Order{operation.ScalarLast}}}, true},
			{"a.Map", "order == XYZ", []operation.Reading{{Op: operation.LinearMap, Map: &turn}}, false},
		},
	}
	first := encode(t, m)
	var back Meanings
	require.NoError(t, gob.NewDecoder(bytes.NewReader(first)).Decode(&back))
	assert.Equal(t, m, &back)
	assert.Equal(t, first, encode(t, &back))
	assert.Equal(t, "meanings of 2 types and 2 functions", m.String())
}

func TestFactsByName(t *testing.T) {
	m := &Meanings{
		Types: []TypeMeaning{{Name: "a.A"}, {Name: "a.C"}},
		Funcs: []FuncMeaning{{Name: "a.F", Case: "1"}, {Name: "a.F", Case: "2"}, {Name: "a.G"}},
	}
	assert.Equal(t, "a.C", m.Type("a.C").Name)
	assert.Nil(t, m.Type("a.B"))
	assert.Len(t, m.Func("a.F"), 2)
	assert.Len(t, m.Func("a.G"), 1)
	assert.Empty(t, m.Func("a.H"))
}

func TestComponents(t *testing.T) {
	for name, want := range map[string]int{"q.W": 0, "q.Real": 0, "q.V[0]": 1, "q.V.Y": 2, "q.Kmag": 3, "qz": 3, "q.x": 1} {
		k, ok := component(name)
		assert.True(t, ok, name)
		assert.Equal(t, want, k, name)
	}
	for _, name := range []string{"q[0]", "q.V[3]", "c.R8", "q.Alpha"} {
		_, ok := component(name)
		assert.False(t, ok, name)
	}
	o, ok := orderOfNames([]string{"q.V.X", "q.V.Y", "q.V.Z", "q.W"})
	assert.True(t, ok)
	assert.Equal(t, operation.ScalarLast, o)
	_, ok = orderOfNames([]string{"a", "b", "c", "d"})
	assert.False(t, ok)
}

func TestNegation(t *testing.T) {
	for text, want := range map[string]string{
		"trace > 0": "trace <= 0", "d <= 0.9995": "d > 0.9995", "a == b": "a != b",
		"a > b && c > d": "not (a > b && c > d)", "ok": "not (ok)", "f(x) > 1": "not (f(x) > 1)",
	} {
		assert.Equal(t, want, negation(text))
	}
}
