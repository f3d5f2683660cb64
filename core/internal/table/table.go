// Package table reads the check tables of fixtures/reference for tests: CSV
// with comment lines that begin with #, then a header, then rows.
package table

import (
	"encoding/csv"
	"os"
	"strconv"
	"testing"
)

// Row is a line of a table. A column that is not there, or not a number where
// one is asked for, fails the test.
type Row struct {
	t       testing.TB
	path    string
	columns map[string]int
	cells   []string
}

// Read returns the rows of the table at path, of which there must be some.
func Read(t testing.TB, path string) []Row {
	t.Helper()
	file, err := os.Open(path)
	if err != nil {
		t.Fatal(err)
	}
	defer file.Close()
	lines := csv.NewReader(file)
	lines.Comment = '#'
	all, err := lines.ReadAll()
	if err != nil {
		t.Fatalf("%s: %v", path, err)
	}
	if len(all) < 2 {
		t.Fatalf("%s: no rows", path)
	}
	columns := make(map[string]int)
	for i, name := range all[0] {
		columns[name] = i
	}
	rows := make([]Row, 0, len(all)-1)
	for _, cells := range all[1:] {
		rows = append(rows, Row{t, path, columns, cells})
	}
	return rows
}

// Text returns a cell as it stands.
func (r Row) Text(column string) string {
	r.t.Helper()
	i, ok := r.columns[column]
	if !ok {
		r.t.Fatalf("%s: no column %q", r.path, column)
	}
	return r.cells[i]
}

// Number returns a cell as a number.
func (r Row) Number(column string) float64 {
	r.t.Helper()
	x, err := strconv.ParseFloat(r.Text(column), 64)
	if err != nil {
		r.t.Fatalf("%s: row %q, column %q: %v", r.path, r.cells[0], column, err)
	}
	return x
}

// Numbers returns the cells prefix+suffix as numbers, one for each suffix.
func (r Row) Numbers(prefix string, suffixes ...string) []float64 {
	r.t.Helper()
	xs := make([]float64, 0, len(suffixes))
	for _, s := range suffixes {
		xs = append(xs, r.Number(prefix+s))
	}
	return xs
}
