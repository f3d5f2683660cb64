package text

import (
	"bytes"
	"slices"
	"unicode/utf8"

	"dextral/analyzers/series/fold"
	"dextral/rules"
)

// Field is a field of a header or of a row as it stands in the file, without quotes.
type Field struct {
	Text  string
	Place rules.Place
}

// Head is what the start of a file says about all of it.
type Head struct {
	Table
	Headers [][]Field // lines above the first row that could name the columns, the nearest first
	Rows    []Row     // the first rows, no more than a few dozen
	Offset  int       // of the first row
	Line    int64     // its line, from 1
}

// Row is a row as it stands in the file.
type Row struct {
	Text []byte
	Line int64
}

// sample is how many rows Sniff looks at, and preamble how many lines it allows
// for words, comments and a header before them.
const (
	sample   = 64
	preamble = 1000
)

// delimiters in the order of preference where all else is equal.
var delimiters = []byte{',', ';', '\t', '|', ' '}

// line is a line of the head.
type line struct {
	text    []byte
	offset  int
	number  int64
	comment bool
}

// Sniff looks at the start of a file, of which last says that it is all. It
// reports false if no row of a table of numbers stands there.
func Sniff(path string, head []byte, last bool) (*Head, bool) {
	if bytes.IndexByte(head, 0) >= 0 {
		return nil, false
	}
	skip := 0
	if bytes.HasPrefix(head, []byte("\xef\xbb\xbf")) {
		skip = 3
	}
	var best *candidate
	for _, d := range delimiters {
		c := judge(d, lines(&Table{Delimiter: d}, head[skip:], skip, last))
		if c != nil && (best == nil || c.better(best)) {
			best = c
		}
	}
	if best == nil {
		return nil, false
	}
	return best.head(path), true
}

// lines splits the head for one delimiter. Only so many rows of data are looked
// at, wherever they begin.
func lines(t *Table, head []byte, offset int, last bool) []line {
	var found []line
	var memory tally
	rest := head
	number := int64(1)
	for data := 0; len(rest) > 0 && data < sample && len(found) < preamble+sample; {
		record, next, n, ok := t.Record(rest, last)
		if !ok {
			break
		}
		if trimmed := bytes.TrimSpace(record); len(trimmed) > 0 {
			l := line{text: record, offset: offset + len(head) - len(rest), number: number, comment: blank(record)}
			found = append(found, l)
			if !l.comment && t.looksLikeData(record, &memory) {
				data++
			}
		}
		rest, number = next, number+int64(n)
	}
	return found
}

// candidate is a delimiter with what it makes of the head.
type candidate struct {
	table   Table
	lines   []line
	first   int     // index of the first row
	open    bool    // all rows end with a delimiter
	numbers float64 // sum over the rows of the part of fields that are numbers
}

// better prefers the delimiter that makes more of the text numbers, then the one
// that makes more columns.
func (c *candidate) better(than *candidate) bool {
	if c.numbers != than.numbers {
		return c.numbers > than.numbers
	}
	return c.table.Width > than.table.Width
}

// tally counts what the fields of a row are.
type tally struct {
	fields, numbers, points, commas int
	open                            bool // the last field is empty

	memory [][2]int // of the fields, for the next record
}

// judge finds the width that most rows have, and the first row.
func judge(delimiter byte, all []line) *candidate {
	t := Table{Delimiter: delimiter, Point: '.'}
	widths := map[int]int{}
	var sum, n tally
	tallies := make([]tally, len(all))
	for i, l := range all {
		if l.comment || !t.looksLikeData(l.text, &n) {
			continue
		}
		tallies[i] = n
		widths[n.fields]++
		if n.open { // an empty last column, or a delimiter too many
			widths[n.fields-1]++
		}
		sum.points += n.points
		sum.commas += n.commas
	}
	for w, n := range widths {
		if m := widths[t.Width]; n > m || n == m && w > t.Width {
			t.Width = w
		}
	}
	if t.Width < 2 {
		return nil
	}
	if sum.commas > 0 && sum.points == 0 {
		t.Point = ','
	}
	c := &candidate{table: t, lines: all, first: -1, open: true}
	for i := range all {
		if n := &tallies[i]; n.fields == t.Width || n.open && n.fields == t.Width+1 {
			if c.first < 0 {
				c.first = i
			}
			c.open = c.open && n.open
			c.numbers += float64(tallies[i].numbers) / float64(tallies[i].fields)
		}
	}
	return c
}

// looksLikeData reports whether at least half of the fields of a line, and no
// fewer than two, are numbers or stand for one that is missing, and one is a number.
func (t *Table) looksLikeData(record []byte, n *tally) bool {
	*n = tally{memory: t.appendFields(n.memory[:0], record)}
	some := false
	for _, f := range n.memory {
		n.fields++
		n.open = f[0] == f[1]
		text := Unquote(record[f[0]:f[1]])
		var c fold.Cell
		switch {
		case len(text) > 0 && t.number(text, '.', &c):
			n.numbers++
			if c.State == fold.Written {
				some = true
				if bytes.IndexByte(text, '.') >= 0 {
					n.points++
				}
			}
		case t.Delimiter != ',' && t.number(text, ',', &c):
			n.numbers++
			n.commas++
			some = true
		case len(text) == 0:
			n.numbers++
		}
	}
	return some && n.numbers >= 2 && 2*n.numbers >= n.fields
}

func (t *Table) number(text []byte, point byte, c *fold.Cell) bool {
	with := Table{Point: point}
	return with.read(text, c)
}

// fields are the stretches of a record that its columns are.
func (t *Table) fields(record []byte) [][2]int { return t.appendFields(nil, record) }

func (t *Table) appendFields(all [][2]int, record []byte) [][2]int {
	for i := 0; ; i++ {
		if t.Delimiter == ' ' {
			for i < len(record) && (record[i] == ' ' || record[i] == '\t') {
				i++
			}
			if i == len(record) {
				return all
			}
		}
		from := i
		if t.Delimiter == ' ' {
			i = blankEnd(record, from)
		} else {
			i = t.fieldEnd(record, from)
		}
		all = append(all, [2]int{from, i})
		if i == len(record) {
			return all
		}
	}
}

// head gathers what is known of the best candidate.
func (c *candidate) head(path string) *Head {
	first := c.lines[c.first]
	h := &Head{Table: c.table, Offset: first.offset, Line: first.number}
	for _, l := range c.lines[c.first:] {
		if !l.comment {
			h.Rows = append(h.Rows, Row{l.text, l.number})
		}
	}
	for i := c.first - 1; i >= 0 && len(h.Headers) < 8; i-- {
		names := c.table.names(path, c.lines[i])
		if len(names) == h.Width || c.open && len(names) == h.Width-1 {
			h.Headers = append(h.Headers, names)
		}
	}
	if len(h.Headers) > 0 && len(h.Headers[0]) < h.Width {
		h.Width--
	}
	h.Headers = slices.DeleteFunc(h.Headers, func(f []Field) bool { return len(f) != h.Width })
	h.Cells = slices.Repeat([]int{-1}, h.Width)
	return h
}

// names reads a line above the first row as names of columns. A header may be a
// comment, and the header of a table set off by blanks may have delimiters.
func (t *Table) names(path string, l line) []Field {
	from := behindComment(l.text)
	if t.Delimiter == ' ' {
		for _, d := range delimiters {
			other := Table{Delimiter: d}
			if fields := other.named(path, l, from); len(fields) == t.Width {
				return fields
			}
		}
	}
	return t.named(path, l, from)
}

// Fields are the fields of a row with their places.
func (t *Table) Fields(path string, r Row) []Field {
	return t.named(path, line{text: r.Text, number: r.Line}, 0)
}

// behindComment is where the words of a line begin that may be a comment.
func behindComment(text []byte) int {
	trimmed := bytes.TrimLeft(text, " \t")
	if !bytes.HasPrefix(trimmed, []byte("//")) && !bytes.HasPrefix(trimmed, []byte("#")) && !bytes.HasPrefix(trimmed, []byte("%")) {
		return 0
	}
	return len(text) - len(bytes.TrimLeft(trimmed, "#%/ \t"))
}

// named are the fields of a line, from an offset on, with their places.
func (t *Table) named(path string, l line, from int) []Field {
	var fields []Field
	here := cursor{line: int(l.number), column: 1}
	for _, f := range t.fields(l.text[from:]) {
		whole := l.text[from+f[0] : from+f[1]]
		text := Unquote(whole)
		at := from + f[0] + bytes.Index(whole, text)
		p := rules.Place{Path: path}
		p.Line, p.Column = here.move(l.text, at)
		p.EndLine, p.EndColumn = here.move(l.text, at+len(text))
		fields = append(fields, Field{Text: string(text), Place: p})
	}
	return fields
}

// cursor follows line and column through the text of a record.
type cursor struct{ at, line, column int }

// move goes on to an offset.
func (c *cursor) move(text []byte, to int) (line, column int) {
	passed := text[c.at:to]
	if end := bytes.LastIndexByte(passed, '\n'); end >= 0 {
		c.line += bytes.Count(passed, []byte{'\n'})
		c.column = 1
		passed = passed[end+1:]
	}
	c.column += utf8.RuneCount(passed)
	c.at = to
	return c.line, c.column
}

// Loose reads all columns of a row, as far as they are numbers; words count as
// gaps. It is nil for a row that is not as wide as the table.
func (t *Table) Loose(r Row) []fold.Cell {
	all := t.fields(r.Text)
	if n := len(all); n != t.Width && (n != t.Width+1 || all[n-1][0] != all[n-1][1]) {
		return nil
	}
	cells := make([]fold.Cell, t.Width)
	for i := range cells {
		if !t.read(r.Text[all[i][0]:all[i][1]], &cells[i]) {
			cells[i] = fold.Cell{}
		}
	}
	return cells
}
