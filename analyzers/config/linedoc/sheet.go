package linedoc

import (
	"bytes"
	"slices"
	"strings"

	"dextral/analyzers/config/tree"
	"dextral/analyzers/source"
)

// maxSheet is how many rows a table by name may have; a longer one is a log.
const maxSheet = 200

// Sheet reads a table of things by name: a header, and rows of which a column holds
// names that are all different. Each row is a map under its name, with an entry for
// every column. What is no such table has an empty tree; a table with a column of
// times is none.
func Sheet(f *source.File) (*tree.Document, error) {
	r, err := newReader(f)
	if err != nil {
		return nil, err
	}
	var lines []source.Span
	r.each(func(s source.Span) {
		if f.Text[s.From] == '#' {
			r.note(s, "#")
		} else if len(lines) <= maxSheet+1 {
			lines = append(lines, s)
		}
	})
	if len(lines) < 2 || len(lines) > maxSheet+1 {
		return r.doc, nil
	}
	delimiter := r.delimiter(lines[0])
	header := r.cells(lines[0], delimiter)
	rows := make([][]source.Span, len(lines)-1)
	for i, line := range lines[1:] {
		if rows[i] = r.cells(line, delimiter); len(rows[i]) != len(header) {
			return r.doc, nil
		}
	}
	names, ok := r.names(header, rows)
	if !ok {
		return r.doc, nil
	}
	for _, row := range rows {
		m := &tree.Node{Kind: tree.Map, Span: row[0].Cover(row[len(row)-1])}
		for i, cell := range row {
			if i != names && !cell.Empty() && !header[i].Empty() {
				n := r.scalar(cell)
				m.Entries = append(m.Entries, tree.Entry{Key: columnName(r.file.Slice(header[i])), KeyAt: header[i], Value: n})
			}
		}
		gatherMatrix(m)
		r.entry(r.root, row[names], m)
	}
	return r.doc, nil
}

// gatherMatrix makes one list of the columns r11 to r33, or r00 to r22, of a row.
func gatherMatrix(m *tree.Node) {
	for _, first := range []string{"11", "00"} {
		for i, e := range m.Entries {
			prefix, ok := strings.CutSuffix(e.Key, first)
			if !ok || prefix == "" {
				continue
			}
			list := &tree.Node{Kind: tree.List, Span: e.Value.Span}
			for k := range 9 {
				index := string([]byte{first[0] + byte(k/3), first[0] + byte(k%3)})
				n := m.Get(prefix + index)
				if n == nil {
					return
				}
				list.Items, list.Span = append(list.Items, n), list.Span.Cover(n.Span)
			}
			key := strings.TrimRight(prefix, "_")
			if key == "r" {
				key = "R"
			}
			m.Entries[i] = tree.Entry{Key: key, KeyAt: e.KeyAt, Value: list}
			m.Entries = slices.DeleteFunc(m.Entries, func(e tree.Entry) bool { return slices.Contains(list.Items, e.Value) })
			return
		}
	}
}

// delimiter is that of the three that makes most of the header.
func (r *reader) delimiter(header source.Span) string {
	best := ","
	for _, d := range []string{";", "\t"} {
		if strings.Count(r.file.Slice(header), d) > strings.Count(r.file.Slice(header), best) {
			best = d
		}
	}
	return best
}

// cells are the cells of a line, without blanks and quotes around them.
func (r *reader) cells(s source.Span, delimiter string) []source.Span {
	var cells []source.Span
	add := func(from, to int) {
		c := r.trim(source.Span{From: from, To: to})
		if text := r.file.Slice(c); len(text) > 1 && text[0] == '"' && text[len(text)-1] == '"' {
			c = r.trim(source.Span{From: c.From + 1, To: c.To - 1})
		}
		cells = append(cells, c)
	}
	from, quoted := s.From, false
	for i := s.From; i < s.To; i++ {
		switch c := r.file.Text[i]; {
		case c == '"':
			quoted = !quoted
		case c == delimiter[0] && !quoted:
			add(from, i)
			from = i + 1
		}
	}
	add(from, s.To)
	return cells
}

// names finds the column that names the rows. It is false if there is none, if a cell
// of the header is a number, and if a column holds times.
func (r *reader) names(header []source.Span, rows [][]source.Span) (column int, ok bool) {
	column = -1
	for i, h := range header {
		if r.numeric(h) || isTime(r.file.Slice(h)) {
			return 0, false
		}
		if column < 0 && r.distinct(rows, i) {
			column = i
		}
	}
	return column, column >= 0
}

// distinct reports whether the cells of a column are different words.
func (r *reader) distinct(rows [][]source.Span, column int) bool {
	seen := map[string]bool{}
	for _, row := range rows {
		text := r.file.Slice(row[column])
		if text == "" || !isWord(text) || r.numeric(row[column]) || seen[text] {
			return false
		}
		seen[text] = true
	}
	return true
}

func (r *reader) numeric(s source.Span) bool {
	_, ok := tree.Float(r.file.Slice(s))
	return ok
}

// isWord reports whether a text begins as a name does, and no date.
func isWord(text string) bool {
	return bytes.IndexByte([]byte("0123456789+-.:"), text[0]) < 0
}

// isTime reports whether a column's name is one of times.
func isTime(name string) bool {
	lower := strings.ToLower(name)
	for _, word := range []string{"time", "stamp", "epoch", "date", "utc", "tow", "frame_no", "sec", "msec", "nsec"} {
		if strings.Contains(lower, word) && !strings.Contains(lower, "arcsec") {
			return true
		}
	}
	return lower == "t" || strings.HasPrefix(lower, "t [") || strings.HasPrefix(lower, "t(")
}

// columnName is the name of a column, with its unit as the last word: yaw [deg] is
// yaw_deg.
func columnName(text string) string {
	name, unit, ok := strings.Cut(strings.NewReplacer("(", "[", ")", "]").Replace(text), "[")
	if unit = strings.TrimSpace(strings.TrimSuffix(strings.TrimSpace(unit), "]")); ok && unit != "" {
		if unit == "°" {
			unit = "deg"
		}
		return strings.TrimSpace(name) + "_" + unit
	}
	return strings.TrimSpace(text)
}
