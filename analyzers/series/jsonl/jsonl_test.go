package jsonl

import (
	"encoding/json"
	"fmt"
	"math"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"dextral/analyzers/series/fold"
	"dextral/analyzers/series/text"
)

func names(h *Head) string {
	var s []string
	for _, f := range h.Names {
		s = append(s, f.Text)
	}
	return strings.Join(s, " ")
}

func TestSniff(t *testing.T) {
	h, ok := Sniff("f", []byte("\xef\xbb\xbf"+`{"t": 1.5, "frame": "map", "pose": {"q": [0.5, 0.5, 0.5, 0.5], "ok": true}}
{"t": 2, "pose": {"q": [1, 0, 0, 0]}, "gyro": null}
`), true)
	require.True(t, ok)
	assert.Equal(t, "t frame pose.q[0] pose.q[1] pose.q[2] pose.q[3] pose.ok gyro", names(h))
	assert.Len(t, h.Rows, 2)
	assert.Equal(t, 3, h.Offset)
	cells := h.Loose(h.Rows[1])
	assert.Equal(t, 2.0, cells[0].Value())
	assert.Equal(t, fold.Gap, cells[1].State)
	assert.Equal(t, 1.0, cells[2].Value())
	n := h.Number("f", h.Rows[0], 2)
	assert.Equal(t, "0.5", n.Text)
	assert.Equal(t, 1, n.Place.Line)
	line := `{"t": 1.5, "frame": "map", "pose": {"q": [`
	assert.Equal(t, len(line)+1, n.Place.Column)
	assert.Equal(t, len(line)+4, n.Place.EndColumn)
	assert.Equal(t, 3, h.Names[0].Place.Column, "the key, without quotes")

	for _, s := range []string{"", "{}", `{"a":"b"}`, "[1,2]\n[3,4]\n", `{"a":1`, "{\n\"a\": 1\n}\n", "1\n2\n", `{"a":1} x`, `{"a":1}` + "\nnothing\n"} {
		_, ok := Sniff("f", []byte(s), true)
		assert.False(t, ok, s)
	}
	_, ok = Sniff("f", []byte(strings.Repeat(`{"a":`, 1000)+"1"+strings.Repeat("}", 1000)), true)
	assert.False(t, ok, "too deep")
	h, ok = Sniff("f", []byte(`{"a":[`+strings.Repeat("1,", 1000)+`1]}`), true)
	require.True(t, ok)
	assert.Len(t, h.Names, maxItems)
}

// table reads all columns of the rows like the given one.
func table(t require.TestingT, row string) (*Table, []fold.Cell) {
	h, ok := Sniff("f", []byte(row), true)
	require.True(t, ok)
	for i := range h.Cells {
		h.Cells[i] = i
	}
	return &h.Table, make([]fold.Cell, h.Width)
}

func TestRow(t *testing.T) {
	table, cells := table(t, `{"a":1,"b":{"c":2,"d":[3,4]},"e":5}`)
	for row, want := range map[string]string{
		`{"a":1,"b":{"c":2,"d":[3,4]},"e":5}`:                             "[1 2 3 4 5]",
		` { "e" : 5 , "b" : { "d" : [ 3 , 4 ] } , "a" : -1.5e1 } ` + "\r": "[-15 NaN 3 4 5]",
		`{}`:                              "[NaN NaN NaN NaN NaN]",
		`{"a":null,"b":7,"e":NaN}`:        "[NaN NaN NaN NaN NaN]",
		`{"a":"1","b":{"d":[3,4,9,{}]}}`:  "[1 NaN 3 4 NaN]",
		`{"z":{"a":[{"}":"\"]"}]},"a":2}`: "[2 NaN NaN NaN NaN]",
		`{"a":1,"a":2}`:                   "[2 NaN NaN NaN NaN]",
		`{"a":Infinity,"e":-Infinity}`:    "[+Inf NaN NaN NaN -Inf]",
	} {
		assert.Equal(t, text.Fault{}, table.Row([]byte(row), cells), row)
		values := make([]float64, len(cells))
		for i := range cells {
			values[i] = cells[i].Value()
		}
		assert.Equal(t, want, fmt.Sprint(values), row)
	}
	for row, want := range map[string]text.Fault{
		`{"a":true}`:                       {Kind: text.NotNumber, Column: 0},
		`{"a":1,"e":"five"}`:               {Kind: text.NotNumber, Column: 4},
		`{"a":1`:                           {Kind: text.Garbled},
		`{"a":1}}`:                         {Kind: text.Garbled},
		`{"a" 1}`:                          {Kind: text.Garbled},
		`{"a":}`:                           {Kind: text.Garbled},
		`{"a":"x`:                          {Kind: text.Garbled},
		`{"a":"x\`:                         {Kind: text.Garbled},
		`[1]`:                              {Kind: text.Garbled},
		`x`:                                {Kind: text.Garbled},
		strings.Repeat("[", 100):           {Kind: text.Garbled},
		`{"z":` + strings.Repeat("[", 100): {Kind: text.Garbled},
		`{"z":"` + strings.Repeat("x", 70000) + `"}`: {Kind: text.TooLong},
	} {
		assert.Equal(t, want, table.Row([]byte(row), cells), "%.30s", row)
	}
}

func TestRowDoesNotAllocate(t *testing.T) {
	table, cells := table(t, `{"a":1,"b":{"c":2,"d":[3,4]},"e":5}`)
	for _, row := range []string{`{"a":1.25,"b":{"c":2,"d":[3,4]},"e":5}`, `{"a":"nan","x":"y"}`, `{"a":tru`} {
		line := []byte(row)
		assert.Zero(t, testing.AllocsPerRun(100, func() { table.Row(line, cells) }), row)
	}
}

// What encoding/json prints is read as encoding/json reads it.
func TestAgainstEncodingJSON(t *testing.T) {
	type row struct {
		T float64            `json:"t"`
		Q [4]float64         `json:"q"`
		M map[string]float64 `json:"m"`
		S string             `json:"s"`
	}
	rapid.Check(t, func(t *rapid.T) {
		var want row
		want.T = rapid.Float64().Draw(t, "t")
		for i := range want.Q {
			want.Q[i] = rapid.Float64().Draw(t, "q")
		}
		want.S = rapid.String().Draw(t, "s")
		want.M = map[string]float64{"x": rapid.Float64().Draw(t, "x"), "y": 1}
		line, err := json.Marshal(want)
		require.NoError(t, err)
		table, cells := table(t, `{"t":0,"q":[0,0,0,0],"m":{"x":0,"y":0},"s":""}`)
		table.Cells[7] = -1 // the string
		require.Equal(t, text.Fault{}, table.Row(line, cells), string(line))
		for i, w := range []float64{want.T, want.Q[0], want.Q[1], want.Q[2], want.Q[3], want.M["x"], 1} {
			require.Equal(t, math.Float64bits(w), math.Float64bits(cells[i].Value()), string(line))
		}
	})
}

func FuzzRow(f *testing.F) {
	for _, s := range []string{`{"a":1,"b":{"c":2,"d":[3,4]},"e":5}`, `{"a":{"a":[[1]]}}` + "\n" + `{"a":"\\\""}`, `{`, `{"":1}`, "{}0\n{\"\":\"0\"}"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, s string) {
		h, ok := Sniff("f", []byte(s), true)
		if !ok {
			return
		}
		cells := make([]fold.Cell, h.Width)
		for i := range h.Cells {
			h.Cells[i] = i
		}
		for _, r := range h.Rows {
			require.NotEqual(t, text.Garbled, h.Row(r.Text, cells).Kind)
			for i := range h.Width {
				h.Number("f", r, i)
			}
		}
		if json.Valid([]byte(strings.TrimSpace(s))) && !strings.Contains(s, "\n") {
			require.Len(t, h.Rows, 1)
		}
	})
}
