package text

import (
	"bytes"
	"encoding/binary"
	"math/bits"

	"dextral/analyzers/series/fold"
)

// Table says how the rows of a file are read.
type Table struct {
	Delimiter byte  // ' ' for runs of blanks and tabs
	Point     byte  // '.' or ','
	Width     int   // columns of a row
	Cells     []int // for each column the cell that it goes to, or -1
}

// Fault says why a row is not read.
type Fault struct {
	Kind   FaultKind
	Column int // NotNumber: the column, from 0; Ragged: the columns the row has
}

// FaultKind is the kind of a fault.
type FaultKind uint8

// The faults.
const (
	None      FaultKind = iota
	Ragged              // more or fewer columns than the header has
	NotNumber           // words where a number is expected
	TooLong             // longer than MaxRecord
	Garbled             // not in the format of the file at all
	Empty               // no record: a blank line or a comment
)

// Row reads the cells of a record. What it leaves in cells when there is a
// fault has no meaning.
func (t *Table) Row(record []byte, cells []fold.Cell) Fault {
	record = trimCR(record)
	if len(record) > MaxRecord {
		return Fault{Kind: TooLong}
	}
	if len(record) == 0 || record[0]-'0' > 9 && blank(record) {
		return Fault{Kind: Empty}
	}
	if t.Delimiter == ' ' {
		return t.blankRow(record, cells)
	}
	i := 0
	for column := 0; ; column++ {
		if column < t.Width && t.Cells[column] >= 0 {
			c := &cells[t.Cells[column]]
			// Nearly always a number and a delimiter come next.
			for i < len(record) && record[i] == ' ' {
				i++
			}
			end := c.Scan(record, i, t.Point)
			if end > i && (end == len(record) || record[end] == t.Delimiter) {
				c.State = fold.Written
				i = end
			} else {
				from := i
				i = t.fieldEnd(record, from)
				if !t.read(record[from:i], c) {
					return Fault{NotNumber, column}
				}
			}
		} else {
			var passed int
			i, passed = t.skip(record, i, column)
			column += passed - 1
		}
		if i == len(record) {
			return t.width(column+1, false)
		}
		i++
		if i == len(record) { // a delimiter at the end of the line
			if column+1 < t.Width && t.Cells[column+1] >= 0 {
				cells[t.Cells[column+1]].State = fold.Gap
			}
			return t.width(column+2, true)
		}
	}
}

// skip passes over the field that begins at i and over those behind it that
// nobody asked for. It returns where the last of them ends, and how many they are.
func (t *Table) skip(record []byte, i, column int) (end, passed int) {
	wanted := 1
	for column+wanted < t.Width && t.Cells[column+wanted] < 0 {
		wanted++
	}
	ones := uint64(0x0101010101010101)
	delimiters, quotes := ones*uint64(t.Delimiter), ones*'"'
	for i+8 <= len(record) {
		eight := binary.LittleEndian.Uint64(record[i:])
		if zeroBytes(eight^quotes) != 0 {
			break
		}
		found := zeroBytes(eight ^ delimiters)
		n := bits.OnesCount64(found)
		if passed+n >= wanted {
			for ; passed+1 < wanted; passed++ {
				found &= found - 1
			}
			return i + bits.TrailingZeros64(found)/8, wanted
		}
		passed += n
		i += 8
	}
	return t.skipSlowly(record, i, passed, wanted)
}

// skipSlowly goes on where skip stops: in the middle of a field, before a quote
// or near the end of the record.
func (t *Table) skipSlowly(record []byte, i, passed, wanted int) (end, count int) {
	for i > 0 && record[i-1] != t.Delimiter { // back to where the field begins
		i--
	}
	for {
		i = t.fieldEnd(record, i)
		passed++
		if passed == wanted || i == len(record) {
			return i, passed
		}
		i++
	}
}

// zeroBytes has the top bit of every byte that is zero, and no other.
func zeroBytes(x uint64) uint64 {
	const low = 0x7f7f7f7f7f7f7f7f
	return ^((x&low + low) | x | low)
}

// width judges the number of columns. An empty one may follow the last.
func (t *Table) width(columns int, emptyLast bool) Fault {
	if columns == t.Width || emptyLast && columns == t.Width+1 {
		return Fault{}
	}
	return Fault{Ragged, columns}
}

// fieldEnd is where the field that begins at i ends.
func (t *Table) fieldEnd(record []byte, i int) int {
	start := i
	for start < len(record) && record[start] == ' ' {
		start++
	}
	if start < len(record) && record[start] == '"' {
		if behind := closing(record, start); behind > 0 && t.ends(record, behind) {
			i = behind
		}
	}
	if n := bytes.IndexByte(record[i:], t.Delimiter); n >= 0 {
		return i + n
	}
	return len(record)
}

// ends reports whether only blanks stand between i and a delimiter or the end.
func (t *Table) ends(record []byte, i int) bool {
	for i < len(record) && record[i] == ' ' {
		i++
	}
	return i == len(record) || record[i] == t.Delimiter || record[i] == '\r'
}

// closing is the offset behind the quote that closes the one at i, or 0.
func closing(record []byte, i int) int {
	for {
		n := bytes.IndexByte(record[i+1:], '"')
		if n < 0 {
			return 0
		}
		i += n + 1
		if i+1 == len(record) || record[i+1] != '"' {
			return i + 1
		}
		i++
	}
}

// blankRow reads a record whose columns are set off by blanks.
func (t *Table) blankRow(record []byte, cells []fold.Cell) Fault {
	columns := 0
	for i := 0; ; columns++ {
		for i < len(record) && (record[i] == ' ' || record[i] == '\t') {
			i++
		}
		if i == len(record) {
			return t.width(columns, false)
		}
		from := i
		if columns < t.Width && t.Cells[columns] >= 0 {
			c := &cells[t.Cells[columns]]
			i = c.Scan(record, from, t.Point)
			if i > from && (i == len(record) || record[i] == ' ' || record[i] == '\t') {
				c.State = fold.Written
				continue
			}
			i = blankEnd(record, from)
			if !t.read(record[from:i], c) {
				return Fault{NotNumber, columns}
			}
			continue
		}
		i = blankEnd(record, from)
	}
}

func blankEnd(record []byte, i int) int {
	if record[i] == '"' {
		if behind := closing(record, i); behind > 0 {
			i = behind
		}
	}
	for i < len(record) && record[i] != ' ' && record[i] != '\t' {
		i++
	}
	return i
}

// read reads a field that is not plainly a number.
func (t *Table) read(field []byte, c *fold.Cell) bool { return Read(field, t.Point, c) }

// Read reads a field that need not plainly be a number: one with blanks or quotes
// around it, a word such as nan or null, date and time, or nothing. It reports
// false for any other text.
func Read(field []byte, point byte, c *fold.Cell) bool {
	field = Unquote(field)
	if len(field) == 0 {
		c.State = fold.Gap
		return true
	}
	if end := c.Scan(field, 0, point); end == len(field) {
		c.State = fold.Written
		return true
	}
	return readWord(field, c) || readTime(field, c)
}

// Unquote takes blanks and one pair of quotes off a field, and blanks inside
// them. Doubled quotes are left as they are.
func Unquote(field []byte) []byte {
	field = bytes.Trim(field, " \t")
	if n := len(field); n >= 2 && (field[0] == '"' || field[0] == '\'') && field[n-1] == field[0] {
		field = bytes.Trim(field[1:n-1], " \t")
	}
	return field
}
