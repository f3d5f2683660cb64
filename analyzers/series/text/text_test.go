package text

import (
	"fmt"
	"math"
	"strconv"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"dextral/analyzers/series/fold"
)

// table reads all columns of rows of the given width.
func table(delimiter, point byte, width int) (*Table, []fold.Cell) {
	t := &Table{Delimiter: delimiter, Point: point, Width: width, Cells: make([]int, width)}
	for i := range t.Cells {
		t.Cells[i] = i
	}
	return t, make([]fold.Cell, width)
}

func shown(cells []fold.Cell) string {
	texts := make([]string, len(cells))
	for i := range cells {
		texts[i] = strconv.FormatFloat(cells[i].Value(), 'g', -1, 64)
		if cells[i].State == fold.Gap {
			texts[i] = "_"
		}
	}
	return strings.Join(texts, " ")
}

func TestRow(t *testing.T) {
	for _, c := range []struct {
		delimiter, point byte
		record, want     string
	}{
		{',', '.', "1,2,3", "1 2 3"},
		{',', '.', "1.5,-2e3,.5", "1.5 -2000 0.5"},
		{',', '.', " 1 ,\t2, 3 ", "1 2 3"},
		{',', '.', `"1","2",3`, "1 2 3"},
		{',', '.', `'1',"2 ", " 3"`, "1 2 3"},
		{',', '.', "1,,3", "1 _ 3"},
		{',', '.', ",,", "_ _ _"},
		{',', '.', "1,2,", "1 2 _"},
		{',', '.', "1,2,3,", "1 2 3"},
		{',', '.', "nan,NaN,-nan", "NaN NaN NaN"},
		{',', '.', "inf,-Inf,+Infinity", "+Inf -Inf +Inf"},
		{',', '.', "1.#QNAN,-1.#IND,-nan(ind)", "NaN NaN NaN"},
		{',', '.', "null,N/A,-", "_ _ _"},
		{',', '.', "1970-01-01T00:00:01.5Z,1970-01-01 00:00:02,1970-01-01T01:00:00+01:00", "1.5 2 0"},
		{';', ',', "1,5;-2;3,25", "1.5 -2 3.25"},
		{';', '.', "1.5;-2;3.25", "1.5 -2 3.25"},
		{'\t', '.', "1\t\t3", "1 _ 3"},
		{'|', '.', "1|2|3|", "1 2 3"},
		{' ', '.', "  1   2\t3 ", "1 2 3"},
		{' ', '.', `"1" nan 3`, "1 NaN 3"},
		{' ', ',', `1,5 2 3`, "1.5 2 3"},
	} {
		table, cells := table(c.delimiter, c.point, 3)
		fault := table.Row([]byte(c.record), cells)
		assert.Equal(t, Fault{}, fault, c.record)
		assert.Equal(t, c.want, shown(cells), c.record)
	}
}

func TestFaults(t *testing.T) {
	for _, c := range []struct {
		delimiter byte
		record    string
		want      Fault
	}{
		{',', "1,2", Fault{Ragged, 2}},
		{',', "1", Fault{Ragged, 1}},
		{',', "1,2,3,4", Fault{Ragged, 4}},
		{',', "1,2,3,,", Fault{Ragged, 5}},
		{',', "1,two,3", Fault{NotNumber, 1}},
		{',', "1,2 3,4", Fault{NotNumber, 1}},
		{',', "1,\"2,3", Fault{NotNumber, 1}}, // the quote is not closed
		{',', "\x00\xff,2,3", Fault{NotNumber, 0}},
		{' ', "1 2", Fault{Ragged, 2}},
		{' ', "1 2 3 4", Fault{Ragged, 4}},
		{' ', "1 x 3", Fault{NotNumber, 1}},
		{',', strings.Repeat("1", MaxRecord+1), Fault{Kind: TooLong}},
	} {
		table, cells := table(c.delimiter, '.', 3)
		assert.Equal(t, c.want, table.Row([]byte(c.record), cells), "%.20s", c.record)
	}
}

// Words in columns that nobody asked for are no fault, and quotes there hide delimiters.
func TestOtherColumns(t *testing.T) {
	table, cells := table(',', '.', 4)
	table.Cells = []int{-1, 0, -1, 1}
	require.Equal(t, Fault{}, table.Row([]byte(`"a ""b"", c",1,"x,y",2`), cells))
	assert.Equal(t, "1 2", shown(cells[:2]))
}

func TestRowDoesNotAllocate(t *testing.T) {
	for _, record := range []string{"1.5,0.70710678118654757,1403715524907143168", `"1","2",nan`, "1,,null", "1,2", "1,x,2", "2026-03-01T08:30:00Z,1,2"} {
		table, cells := table(',', '.', 3)
		line := []byte(record)
		assert.Zero(t, testing.AllocsPerRun(100, func() { table.Row(line, cells) }), record)
	}
}

// records splits a text to its end.
func records(t *Table, text string) []string {
	var all []string
	rest := []byte(text)
	for len(rest) > 0 {
		record, next, _, ok := t.Record(rest, true)
		if !ok {
			panic("the last record is not one")
		}
		all = append(all, string(record))
		rest = next
	}
	return all
}

func TestRecord(t *testing.T) {
	table, _ := table(',', '.', 3)
	for text, want := range map[string][]string{
		"":                          nil,
		"1,2,3":                     {"1,2,3"},
		"1,2,3\n":                   {"1,2,3"},
		"1,2,3\r\n4,5,6\r\n":        {"1,2,3", "4,5,6"},
		"\n\n1,2,3":                 {"", "", "1,2,3"},
		"1,\"a\nb\",3\n4,5,6":       {"1,\"a\nb\",3", "4,5,6"},
		"1,\"a\n\"\"b\n\",3\n4,5,6": {"1,\"a\n\"\"b\n\",3", "4,5,6"},
		"1,\"a\nb,3\n4,5,6":         {"1,\"a", "b,3", "4,5,6"},       // never closed
		"1,5\" pipe,3\n4,6\",6\n":   {"1,5\" pipe,3", "4,6\",6"},     // inches
		"1,\"a\n4,5,6\n7,\"b\",9":   {"1,\"a", "4,5,6", "7,\"b\",9"}, // closed, but then the row is not three wide
		"1,2,\"a\nb\"":              {"1,2,\"a\nb\""},
	} {
		assert.Equal(t, want, records(table, text), text)
	}
}

// Whatever the buffer holds of the file, the records are the same.
func TestCutAnywhere(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		table, _ := table(',', '.', 3)
		text := strings.Join(rapid.SliceOf(rapid.SampledFrom([]string{"\"", "\"\"", "\n", "\r\n", ",", "1", "a", " ", ",\"", "\",", "1,\"\n\",2\n"})).Draw(t, "text"), "")
		want := records(table, text)
		var got []string
		rest := ""
		for len(text) > 0 || rest != "" {
			n := min(len(text), rapid.IntRange(0, 20).Draw(t, "piece"))
			rest += text[:n]
			text = text[n:]
			if len(text) == 0 {
				got = append(got, records(table, rest)...)
				break
			}
			cut := table.Cut([]byte(rest))
			got = append(got, records(table, rest[:cut])...)
			rest = rest[cut:]
		}
		require.Equal(t, want, got)
	})
}

// A quote that nothing closes costs one look ahead, not the rest of the file.
func TestOpenQuoteIsBounded(t *testing.T) {
	table, _ := table(',', '.', 3)
	data := []byte("1,\"a\n" + strings.Repeat("1,2,3\n", MaxRecord/4))
	record, _, lines, ok := table.Record(data, false)
	require.True(t, ok)
	assert.Equal(t, "1,\"a", string(record))
	assert.Equal(t, 1, lines)
	_, _, _, ok = table.Record(data[:1000], false)
	assert.False(t, ok, "more is needed to tell")
}

func TestSniff(t *testing.T) {
	for _, c := range []struct {
		name, text string
		delimiter  byte
		point      byte
		width      int
		line       int64
		headers    string
	}{
		{"comma", "t,qw,qx\n1,0.5,2\n", ',', '.', 3, 2, "t qw qx"},
		{"byte order mark, CRLF, blanks", "\ufefft , qw,\"qx\"\r\n\r\n1, 0.5, 2\r\n", ',', '.', 3, 3, "t qw qx"},
		{"comment as header", "#timestamp, a [m], b []\n1403715524907143168,0.5,0.1\n", ',', '.', 3, 2, "timestamp/a [m]/b []"},
		{"percent sign", "%time,field.a\n1,2\n", ',', '.', 2, 2, "time field.a"},
		{"blanks", "# ground truth\n# timestamp tx ty\n1305031102.16 -0.5 0.25\n", ' ', '.', 3, 3, "timestamp tx ty"},
		{"no header", "1 2 3\n4 5 6\n", ' ', '.', 3, 1, ""},
		{"decimal comma", "t;q\n0,5;1\n0,6;0,25\n", ';', ',', 2, 2, "t q"},
		{"semicolon", "t;q\n0.5;1\n0.6;0.25\n", ';', '.', 2, 2, "t q"},
		{"tab", "t [s]\troll angle\n0\t\n1\t0.5\n", '\t', '.', 2, 2, "t [s]/roll angle"},
		{"row of units", "t,roll\ns,deg\n0,1\n", ',', '.', 2, 3, "s deg;t roll"},
		{"words beside numbers", "t,id,q\n0,RH_IMU,1\n1,RH_IMU,2\n", ',', '.', 3, 2, "t id q"},
		{"header with another delimiter", "# ID, QW, QX\n1 0.5 0.5\n2 0.5 0.5\n", ' ', '.', 3, 2, "ID QW QX"},
		{"rows end with a delimiter", "a,b\n1,2,\n3,4,\n", ',', '.', 2, 2, "a b"},
		{"header does so too", "a,b,\n1,2,\n3,4,\n", ',', '.', 3, 2, "a b "},
		{"rows end with an empty column", "a,b,c\n1,2,\n3,4,\n", ',', '.', 3, 2, "a b c"},
		{"first row ragged", "a,b,c\n1,2\n1,2,3\n4,5,6\n", ',', '.', 3, 3, "a b c"},
		{"preamble", "Recorder 7\nserial,12\n\na,b,c\n1,2,3\n4,5,6\n7,8,9\n", ',', '.', 3, 5, "a b c"},
		{"times", "t,x\n2026-03-01 08:30:00.25,1\n", ',', '.', 2, 2, "t x"},
	} {
		h, ok := Sniff("f", []byte(c.text), true)
		if !assert.True(t, ok, c.name) {
			continue
		}
		assert.Equal(t, string(c.delimiter), string(h.Delimiter), c.name)
		assert.Equal(t, string(c.point), string(h.Point), c.name)
		assert.Equal(t, c.width, h.Width, c.name)
		assert.Equal(t, c.line, h.Line, c.name)
		var headers []string
		for _, header := range h.Headers {
			var names []string
			for _, f := range header {
				names = append(names, f.Text)
			}
			separator := " "
			if strings.Contains(c.headers, "/") {
				separator = "/"
			}
			headers = append(headers, strings.Join(names, separator))
		}
		assert.Equal(t, c.headers, strings.Join(headers, ";"), c.name)
		assert.True(t, strings.HasPrefix(c.text[h.Offset:], string(h.Rows[0].Text)), c.name)
	}
	for _, text := range []string{"", "\n\n", "hello", "Dear all,\nthe results, 12 of 15, are in.\n", "a,b,c\n", "12\n13\n14\n", "1,2\x003,4\n", "{\n  \"a\": 1\n}\n", "key: 1\nother: 2\n"} {
		_, ok := Sniff("f", []byte(text), true)
		assert.False(t, ok, text)
	}
}

// Every name stands where its place says.
func TestSniffPlaces(t *testing.T) {
	text := "\ufeff\u00e4\u00f6, \"q w\",\tyaw [\u00b0]\n 1,2 , 3\n"
	h, ok := Sniff("f", []byte(text), true)
	require.True(t, ok)
	lines := strings.Split(strings.TrimPrefix(text, "\ufeff"), "\n")
	for _, f := range append(h.Headers[0], h.Fields("f", h.Rows[0])...) {
		p := f.Place
		require.Equal(t, p.Line, p.EndLine)
		assert.Equal(t, f.Text, string([]rune(lines[p.Line-1])[p.Column-1:p.EndColumn-1]))
	}
	assert.Equal(t, "yaw [\u00b0]", h.Headers[0][2].Text)
}

func TestReadTime(t *testing.T) {
	for text, want := range map[string]int64{
		"1970-01-01T00:00:00Z":            0,
		"2026-03-01T08:30:00Z":            1772353800000000000,
		"2026-03-01 08:30:00.000000001":   1772353800000000001,
		"2026-03-01T08:30:00,5+02:00":     1772346600500000000,
		"2026-03-01T08:30:00-0530":        1772373600000000000,
		"1969-12-31t23:59:59.25z":         -750000000,
		"2026-03-01T08:30:00.0000000009Z": 1772353800000000000,
	} {
		var c fold.Cell
		require.True(t, readTime([]byte(text), &c), text)
		s := fold.StampOf(&c)
		assert.Equal(t, want, s.Mantissa, text)
		assert.Equal(t, int32(-9), s.Exponent, text)
		assert.Equal(t, float64(want)/1e9, c.Value())
	}
	for _, text := range []string{"", "2026-03-01", "2026-13-01T00:00:00", "2026-03-01T08:30", "2026-03-01T08:30:00 UTC", "2026-03-01T08:30:00+1", "9999-03-01T08:30:00", "2026-03-01X08:30:00"} {
		var c fold.Cell
		assert.False(t, readTime([]byte(text), &c), text)
	}
}

// Row, Record and Sniff hold for any bytes: no panic, no record lost, and numbers are those
// that stand there.
func FuzzText(f *testing.F) {
	for _, s := range []string{"t,qw,qx\n1,0.5,2\n", "1 2 3\n4 5 6", "0,5;1\n", "\"a\nb\",1\n", "#a b\n1 2\n", "1,nan,\n", "\xef\xbb\xbf1,2\r\n"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, s string) {
		h, ok := Sniff("f", []byte(s), true)
		if !ok {
			return
		}
		require.NotEmpty(t, h.Rows)
		require.Len(t, h.Cells, h.Width)
		cells := make([]fold.Cell, h.Width)
		for i := range h.Cells {
			h.Cells[i] = i
		}
		rest := []byte(s)[h.Offset:]
		length := 0
		for len(rest) > 0 {
			record, next, lines, ok := h.Record(rest, true)
			require.True(t, ok)
			require.Equal(t, strings.Count(string(rest[:len(rest)-len(next)]), "\n"), lines)
			h.Table.Row(record, cells)
			length += len(rest) - len(next)
			rest = next
		}
		require.Equal(t, len(s)-h.Offset, length)
	})
}

func BenchmarkRow(b *testing.B) {
	table, cells := table(',', '.', 8)
	line := []byte("1403715524907143168,0.515356,1.996773,0.971104,0.161996,0.789985,-0.205376,0.554528")
	b.SetBytes(int64(len(line) + 1))
	b.ReportAllocs()
	for b.Loop() {
		if f := table.Row(line, cells); f.Kind != None {
			b.Fatal(fmt.Sprint(f))
		}
	}
	if math.IsNaN(cells[7].Value()) {
		b.Fatal("not read")
	}
}

// Row, which passes over what nobody asked for, against a reading of every
// field by itself.
func TestRowAgainstFields(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		field := rapid.OneOf(
			rapid.SampledFrom([]string{"", "1", "-2.5", "0.123456789012345", "word", " 3 ", "\"a,b\"", "\"\"\"\"", "\"", "a\"b", "nan", "\"4\""}),
			rapid.StringOfN(rapid.RuneFrom([]rune("ab01\"; ")), 0, 20, -1),
		)
		width := rapid.IntRange(1, 9).Draw(t, "width")
		table := &Table{Delimiter: ',', Point: '.', Width: width}
		for i := range width {
			table.Cells = append(table.Cells, rapid.SampledFrom([]int{-1, i}).Draw(t, "cell"))
		}
		record := []byte(strings.Join(rapid.SliceOfN(field, max(1, width-2), width+2).Draw(t, "fields"), ","))
		if blank(record) {
			return
		}
		cells := make([]fold.Cell, width)
		fault := table.Row(record, cells)
		all := table.fields(record)
		want := make([]fold.Cell, width)
		for i, f := range all[:min(width, len(all))] {
			if table.Cells[i] >= 0 && !table.read(record[f[0]:f[1]], &want[i]) {
				require.Equal(t, Fault{NotNumber, i}, fault, "%q", record)
				return
			}
		}
		n := len(all)
		if last := all[n-1]; n != width && (n != width+1 || last[0] != last[1]) {
			require.Equal(t, Fault{Ragged, n}, fault, "%q", record)
			return
		}
		require.Equal(t, Fault{}, fault, "%q", record)
		require.Equal(t, shown(want), shown(cells), "%q", record)
	})
}
