package series

import (
	"bytes"
	"math"

	"dextral/analyzers/series/columns"
	"dextral/analyzers/series/jsonl"
	"dextral/analyzers/series/text"
	"dextral/rules"
)

// table is a file of rows, of whatever text format.
type table struct {
	head   head
	format string
	offset int   // of the first row
	line   int64 // its line
	// parser reads the columns that have a cell.
	parser func(cells []int) parser
}

// sniff finds out from its start which format a file has.
func sniff(path string, start []byte, last bool) (*table, bool) {
	if trimmed := bytes.TrimLeft(start, "\xef\xbb\xbf \t\r\n"); len(trimmed) > 0 && trimmed[0] == '{' {
		if h, ok := jsonl.Sniff(path, start, last); ok {
			return objects(path, h), true
		}
	}
	if h, ok := text.Sniff(path, start, last); ok {
		return delimited(path, h), true
	}
	return nil, false
}

const jsonFormat = "JSON lines"

var formatNames = map[byte]string{',': "comma-separated", ';': "semicolon-separated", '\t': "tab-separated", '|': "bar-separated", ' ': "blank-separated"}

func delimited(path string, h *text.Head) *table {
	t := &table{format: formatNames[h.Delimiter], offset: h.Offset, line: h.Line}
	t.head = head{width: h.Width}
	for _, fields := range h.Headers {
		t.head.headers = append(t.head.headers, header(fields))
	}
	for _, row := range h.Rows {
		t.head.rows = append(t.head.rows, h.Loose(row))
	}
	fields := make([][]text.Field, len(h.Rows))
	t.head.number = func(row, column int) rules.Number {
		if fields[row] == nil {
			fields[row] = h.Fields(path, h.Rows[row])
		}
		n := rules.Number{Value: math.NaN()}
		if fields := fields[row]; column < len(fields) {
			n.Text, n.Place = fields[column].Text, fields[column].Place
		}
		if cells := t.head.rows[row]; cells != nil {
			n.Value = cells[column].Value()
		}
		return n
	}
	t.parser = func(cells []int) parser {
		h.Cells = cells
		return &h.Table
	}
	return t
}

func objects(path string, h *jsonl.Head) *table {
	t := &table{format: jsonFormat, offset: h.Offset, line: h.Rows[0].Line}
	t.head = head{width: h.Width, headers: [][]columns.Column{header(h.Names)}}
	for _, row := range h.Rows {
		t.head.rows = append(t.head.rows, h.Loose(row))
	}
	t.head.number = func(row, column int) rules.Number { return h.Number(path, h.Rows[row], column) }
	t.parser = func(cells []int) parser {
		h.Cells = cells
		return &h.Table
	}
	return t
}

func header(fields []text.Field) []columns.Column {
	var all []columns.Column
	for _, f := range fields {
		all = append(all, columns.Column{Text: f.Text, Place: f.Place})
	}
	return all
}
