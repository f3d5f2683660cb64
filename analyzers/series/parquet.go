package series

import (
	"bytes"
	"context"
	"errors"
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"
	"time"

	"github.com/parquet-go/parquet-go"
	"github.com/parquet-go/parquet-go/format"

	"dextral/analyzers/series/columns"
	"dextral/analyzers/series/fold"
	"dextral/rules"
)

const parquetName = "Parquet"

// parquetMagic is how a Parquet file begins and ends.
const parquetMagic = "PAR1"

// IsParquet reports whether a file begins as Parquet does.
func IsParquet(head []byte) bool { return bytes.HasPrefix(head, []byte(parquetMagic)) }

// Bounds against files made to exhaust memory. Pages of more than maxPage bytes
// unpacked are not read; writers make pages of a megabyte or so.
const (
	maxFooter  = 16 << 20
	maxLeaves  = 2048
	maxItems   = 16 // items of a list that are columns
	maxPage    = 256 << 20
	valueBatch = 256
)

// ReadParquet reads a Parquet file, of which size is the length: columns by name,
// those of nested groups by their path, the items of lists as name[0], name[1]. Null
// is a gap. Only the columns that orientations need are read, one page of each at a
// time, so that memory is bounded by a row group. See Read for what is returned.
func ReadParquet(ctx context.Context, path string, in io.ReaderAt, size int64, opts Options) (r Result, err error) {
	defer func() { // the parser of the format panics on some damaged files
		if p := recover(); p != nil {
			err = fmt.Errorf("is damaged: %v", p)
		}
	}()
	f, err := openParquet(in, size)
	if err != nil {
		return Result{}, err
	}
	r.Format = parquetName
	for _, where := range f.Schema().Columns() {
		found, ok := f.Schema().Lookup(where...)
		if ok && found.MaxRepetitionLevel == 1 { // its first row is looked at to know its length
			if err := checkPages(in, size, f, found.ColumnIndex); err != nil {
				return r, err
			}
		}
	}
	t, err := newParquetTable(f, path, opts)
	if err != nil || t == nil {
		return r, err
	}
	for _, l := range t.leaves {
		if err := checkPages(in, size, f, l.index); err != nil {
			return r, err
		}
	}
	err = t.read(ctx, f)
	t.collector.finish(&r)
	return r, err
}

func openParquet(in io.ReaderAt, size int64) (*parquet.File, error) {
	var tail [8]byte
	if size < 12 {
		return nil, errors.New("is too short for a Parquet file")
	}
	if _, err := in.ReadAt(tail[:], size-8); err != nil && err != io.EOF {
		return nil, err
	}
	footer := int64(tail[0]) | int64(tail[1])<<8 | int64(tail[2])<<16 | int64(tail[3])<<24
	switch {
	case string(tail[4:]) != parquetMagic:
		return nil, errors.New("does not end as a Parquet file does: it is cut off, and what says where its columns are stands at its end")
	case footer > min(maxFooter, size-12):
		return nil, fmt.Errorf("has a footer of %d bytes; its length is damaged", footer)
	}
	if err := checkFooter(in, size, footer); err != nil {
		return nil, err
	}
	f, err := parquet.OpenFile(in, size, parquet.SkipPageIndex(true), parquet.SkipBloomFilters(true), parquet.ReadBufferSize(1<<16))
	if err != nil {
		return nil, fmt.Errorf("cannot be read as Parquet: %w", err)
	}
	return f, nil
}

// parquetTable is a file with the columns that are read of it.
type parquetTable struct {
	collector *collector
	leaves    []*leaf
	row       []fold.Cell
	rows      int64
}

// leaf is a column of the file, and the columns of the log that it fills: one, or
// those of the items of a list.
type leaf struct {
	index int
	list  bool
	cells []int // in the row, by item; -1: not wanted

	pages  parquet.Pages
	page   parquet.Page
	values parquet.ValueReader
	buffer [valueBatch]parquet.Value
	at, n  int
}

// newParquetTable chooses the columns by their names; nil if there are no
// orientations among them.
func newParquetTable(f *parquet.File, path string, opts Options) (*parquetTable, error) {
	type source struct{ leaf, item int }
	var leaves []*leaf
	var all []columns.Column
	var single []bool
	var sources []source
	for _, where := range f.Schema().Columns() {
		found, ok := f.Schema().Lookup(where...)
		if !ok || !found.Node.Leaf() || found.MaxRepetitionLevel > 1 || len(leaves) >= maxLeaves {
			continue
		}
		kind := found.Node.Type().Kind()
		if kind == parquet.ByteArray || kind == parquet.FixedLenByteArray || kind == parquet.Int96 || kind == parquet.Boolean {
			continue
		}
		l := &leaf{index: found.ColumnIndex, list: found.MaxRepetitionLevel == 1}
		items := 1
		if l.list {
			items = l.length(f)
		}
		for i := range items {
			all = append(all, columns.Column{Text: columnName(where, l.list, i), Unit: timestampUnit(found.Node), Place: rules.Place{Path: path}})
			single = append(single, kind == parquet.Float)
			sources = append(sources, source{len(leaves), i})
			l.cells = append(l.cells, -1)
		}
		leaves = append(leaves, l)
	}
	c, which := newCollector(path, parquetName, all, single, opts)
	if c == nil {
		return nil, nil
	}
	t := &parquetTable{collector: c, row: make([]fold.Cell, len(which))}
	used := map[int]bool{}
	for k, i := range which {
		s := sources[i]
		leaves[s.leaf].cells[s.item] = k
		if !used[s.leaf] {
			used[s.leaf] = true
			t.leaves = append(t.leaves, leaves[s.leaf])
		}
	}
	return t, nil
}

// length is the number of items of a list in the first row, maxItems at most.
func (l *leaf) length(f *parquet.File) int {
	groups := f.RowGroups()
	if len(groups) == 0 {
		return 0
	}
	first := leaf{list: true}
	first.pages = groups[0].ColumnChunks()[l.index].Pages()
	defer first.pages.Close()
	for n := range maxItems + 1 {
		v, err := first.peek()
		if err != nil || n > 0 && v.RepetitionLevel() == 0 {
			return n
		}
		first.at++
	}
	return 0 // longer lists are data of another kind
}

// columnName is the path of a column. The two levels that writers put around the items of a list,
// list.element and list.item, say nothing.
func columnName(path []string, list bool, item int) string {
	if !list {
		return strings.Join(path, ".")
	}
	if n := len(path); n > 2 && (path[n-2] == "list" || path[n-2] == "array" || path[n-2] == "bag") {
		path = path[:n-2]
	}
	return strings.Join(path, ".") + "[" + strconv.Itoa(item) + "]"
}

// timestampUnit is the unit of a column of type timestamp; "" for others.
func timestampUnit(n parquet.Node) string {
	t := n.Type().LogicalType()
	if t == nil {
		return ""
	}
	stamp, ok := t.Value.(*format.TimestampType)
	if !ok || stamp.Unit.Value == nil {
		return ""
	}
	return map[time.Duration]string{time.Millisecond: "ms", time.Microsecond: "us", time.Nanosecond: "ns"}[stamp.Unit.Value.Duration()]
}

func (t *parquetTable) read(ctx context.Context, f *parquet.File) error {
	for i, group := range f.RowGroups() {
		if err := t.group(ctx, group); err != nil {
			return fmt.Errorf("row group %d, row %d: %w", i+1, t.rows+1, err)
		}
	}
	return nil
}

func (t *parquetTable) group(ctx context.Context, group parquet.RowGroup) error {
	chunks := group.ColumnChunks()
	for _, l := range t.leaves {
		l.pages, l.values, l.at, l.n = chunks[l.index].Pages(), nil, 0, 0
		defer l.pages.Close()
	}
	for n := range group.NumRows() {
		if n%1024 == 0 && ctx.Err() != nil {
			return ctx.Err()
		}
		for i := range t.row {
			t.row[i] = fold.Cell{}
		}
		for _, l := range t.leaves {
			if err := l.next(t.row); err != nil {
				if err == io.EOF {
					err = errors.New("a column ends before the row group does")
				}
				return err
			}
		}
		t.rows++
		t.collector.push(t.row)
	}
	return nil
}

// next reads the values of one row.
func (l *leaf) next(row []fold.Cell) error {
	for item := 0; ; item++ {
		v, err := l.peek()
		switch {
		case err == io.EOF && item > 0:
			return nil
		case err != nil:
			return err
		case item > 0 && (!l.list || v.RepetitionLevel() == 0):
			return nil
		}
		l.at++
		if item < len(l.cells) && l.cells[item] >= 0 {
			row[l.cells[item]] = parquetCell(v)
		}
		if !l.list {
			return nil
		}
	}
}

// peek is the next value.
func (l *leaf) peek() (*parquet.Value, error) {
	for l.at == l.n {
		if l.values == nil {
			page, err := l.pages.ReadPage()
			if err != nil {
				return nil, err
			}
			if page.Size() > maxPage {
				return nil, fmt.Errorf("a page has %d bytes; %d are the most that is read", page.Size(), maxPage)
			}
			l.page, l.values = page, page.Values()
		}
		n, err := l.values.ReadValues(l.buffer[:])
		l.at, l.n = 0, n
		switch {
		case err != nil && err != io.EOF:
			return nil, err
		case err == io.EOF || n == 0:
			parquet.Release(l.page)
			l.values = nil
		}
	}
	return &l.buffer[l.at], nil
}

func parquetCell(v *parquet.Value) fold.Cell {
	c := fold.Cell{State: fold.Binary}
	switch {
	case v.IsNull():
		return fold.Cell{}
	case v.Kind() == parquet.Float:
		c.Number.Value = float64(v.Float())
	case v.Kind() == parquet.Double:
		c.Number.Value = v.Double()
	case v.Kind() == parquet.Int32:
		return wholeCell(int64(v.Int32()))
	case v.Kind() == parquet.Int64:
		return wholeCell(v.Int64())
	default:
		return fold.Cell{}
	}
	if math.IsNaN(c.Number.Value) {
		return fold.Cell{}
	}
	return c
}

func wholeCell(v int64) fold.Cell {
	c := fold.Cell{State: fold.Written}
	c.Number.Value, c.Number.Exact = float64(v), true
	if c.Number.Mantissa = uint64(v); v < 0 {
		c.Number.Mantissa, c.Number.Negative = -uint64(v), true
	}
	return c
}
