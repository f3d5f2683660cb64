package series

import (
	"bytes"
	"io"

	"dextral/analyzers/series/fold"
	"dextral/analyzers/series/text"
)

// parser turns records into cells.
type parser interface {
	// Record takes the first record off data, and Cut finds how much of data is
	// whole records, as those of text.Table do.
	Record(data []byte, last bool) (record, rest []byte, lines int, ok bool)
	Cut(data []byte) int
	// Plain reports whether every line of data is a record.
	Plain(data []byte) bool
	// Row reads a record into cells. A fault of the kind text.Empty is none.
	Row(record []byte, cells []fold.Cell) text.Fault
}

// feed cuts a file into blocks of whole records.
type feed struct {
	r     io.Reader
	cut   func([]byte) int
	carry []byte // what is read and not yet part of a block
	hold  []byte // memory of carry
	line  int64  // number of its first line
	err   error  // of the reader; io.EOF at the end

	skipping bool // in the middle of a line that is too long
}

// blockSize is the size of a block. Of four records of any length, all but the
// last are whole.
const blockSize = 4 * text.MaxRecord

// block is a stretch of whole records.
type block struct {
	data []byte
	line int64 // of its first line
	last bool  // the file ends here
	long bool  // instead of data: a line that is too long
}

// next fills buffer, always the same size, with the next block. It reports
// false at the end of the file, and when the reader fails.
func (f *feed) next(buffer []byte) (block, bool) {
	for {
		n := copy(buffer, f.carry)
		f.carry = nil
		if f.err == nil {
			var more int
			more, f.err = fill(f.r, buffer[n:])
			n += more
		}
		data := buffer[:n]
		if n == 0 {
			return block{}, false
		}
		if !f.skipping {
			return f.block(data)
		}
		if end := bytes.IndexByte(data, '\n'); end >= 0 {
			f.skipping = false
			f.line++
			f.keep(data[end+1:])
		}
	}
}

// block takes the whole records off data and keeps the rest. At the end of the
// file all is whole.
func (f *feed) block(data []byte) (block, bool) {
	b := block{data: data, line: f.line, last: f.err == io.EOF}
	if !b.last {
		cut := f.cut(data)
		if cut == 0 { // a line longer than the buffer, or half a one where the reader failed
			f.skipping = true
			return block{line: f.line, long: true}, f.err == nil
		}
		b.data = data[:cut]
		f.keep(data[cut:])
	}
	f.line += int64(bytes.Count(b.data, []byte{'\n'}))
	return b, true
}

func (f *feed) keep(rest []byte) {
	f.hold = append(f.hold[:0], rest...)
	f.carry = f.hold
}

// failure is the error of the reader, if it is not the end of the file.
func (f *feed) failure() error {
	if f.err == io.EOF {
		return nil
	}
	return f.err
}
