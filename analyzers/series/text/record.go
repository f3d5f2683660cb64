package text

import "bytes"

// Record takes the first record off data: a line without its line end, or
// several if a quoted field has line ends in it. lines is the number of line
// ends taken. It reports false if data ends before the record does and is not
// the last of the file.
//
// A field that begins with a quote goes on behind its line only if it is closed
// within MaxRecord bytes and the row then has the right number of columns (any,
// while Width is 0). Otherwise the quote was none, and the record is its line.
func (t *Table) Record(data []byte, last bool) (record, rest []byte, lines int, ok bool) {
	end := bytes.IndexByte(data, '\n')
	if end < 0 {
		if !last {
			return nil, data, 0, false
		}
		return trimCR(data), nil, 0, true
	}
	if t.Delimiter != ' ' && bytes.IndexByte(data[:end], '"') >= 0 && t.open(data[:end], false) {
		if n, lines, ok := t.quotedRecord(data, end, last); !ok {
			return nil, data, 0, false
		} else if n > 0 {
			return trimCR(data[:n]), data[min(n+1, len(data)):], lines, true
		}
	}
	return trimCR(data[:end]), data[end+1:], 1, true
}

// quotedRecord is the length of a record whose first line, data[:end], ends
// inside a quoted field; 0 if it is only that line. It reports false if more
// data is needed to tell.
func (t *Table) quotedRecord(data []byte, end int, last bool) (n, lines int, ok bool) {
	window := data[:min(len(data), MaxRecord)]
	for from := end + 1; ; {
		lines++
		stop := len(window)
		next := bytes.IndexByte(window[from:], '\n')
		if next >= 0 {
			stop = from + next
		} else if len(data) < MaxRecord && !last {
			return 0, 0, false
		}
		switch {
		case !t.open(window[from:stop], true):
			whole := next >= 0 || last && stop == len(data)
			if !whole || t.Width > 0 && t.columns(trimCR(data[:stop])) != t.Width {
				return 0, 0, true
			}
			if next >= 0 {
				lines++
			}
			return stop, lines, true
		case next < 0:
			return 0, 0, true
		}
		from = stop + 1
	}
}

// open reports whether a line, which begins inside a quoted field or not, ends
// inside one. Only a quote at the beginning of a field opens one, and two
// quotes inside stand for one.
func (t *Table) open(line []byte, inside bool) bool {
	start, closed := !inside, false
	for _, b := range line {
		switch {
		case inside:
			closed = b == '"'
			inside = !closed
		case b == '"' && (start || closed):
			inside = true
		case b == t.Delimiter:
			start, closed = true, false
		default:
			start, closed = start && b == ' ', false
		}
	}
	return inside
}

// columns counts the columns of a record; an empty one at its end does not count
// if there is one too many.
func (t *Table) columns(record []byte) int {
	n := 0
	for i := 0; ; i++ {
		i = t.fieldEnd(record, i)
		n++
		if i >= len(record) {
			return n
		}
		if i+1 == len(record) && n == t.Width {
			return n
		}
	}
}

func trimCR(line []byte) []byte {
	if n := len(line); n > 0 && line[n-1] == '\r' {
		return line[:n-1]
	}
	return line
}

// Cut returns the length of the longest stretch at the start of data that is
// made of whole records, so that the rest can wait for more of the file.
func (t *Table) Cut(data []byte) int {
	end := bytes.LastIndexByte(data, '\n') + 1
	if t.Delimiter == ' ' || bytes.IndexByte(data[:end], '"') < 0 {
		return end
	}
	rest := data
	for {
		_, next, _, ok := t.Record(rest, false)
		if !ok {
			return len(data) - len(rest)
		}
		rest = next
	}
}

// Plain reports whether every line of data is a record: there are no quotes.
func (t *Table) Plain(data []byte) bool { return t.Delimiter == ' ' || bytes.IndexByte(data, '"') < 0 }

// blank reports whether a record holds no data: nothing but blanks, or a comment.
func blank(record []byte) bool {
	for i, b := range record {
		switch b {
		case ' ', '\t':
			continue
		case '#', '%':
			return true
		case '/':
			return i+1 < len(record) && record[i+1] == '/'
		}
		return false
	}
	return true
}
