package series

import (
	varint "encoding/binary"
	"errors"
	"fmt"
	"io"

	"github.com/parquet-go/parquet-go"
)

// The Parquet library allocates what a file says it will need before it looks
// whether it is there. So footers and page headers, which are structs of Thrift's compact
// protocol, are walked first: no list and no text may be longer than what follows it,
// and no page larger than maxPage.
//
// Encoding: github.com/apache/thrift, doc/specs/thrift-compact-protocol.md.

var errThrift = errors.New("is damaged: a length in it goes beyond its end")

// thriftWalk walks one struct.
type thriftWalk struct {
	text   []byte
	at     int
	fields map[int64]int64 // whole numbers of the outermost struct
}

// Types of the compact protocol.
const (
	thriftTrue   = 1
	thriftFalse  = 2
	thriftByte   = 3
	thriftI64    = 6
	thriftDouble = 7
	thriftText   = 8
	thriftList   = 9
	thriftSet    = 10
	thriftMap    = 11
	thriftStruct = 12
)

// maxThriftDepth bounds structs in structs; the format has six.
const maxThriftDepth = 24

func (w *thriftWalk) byte() (byte, error) {
	if w.at >= len(w.text) {
		return 0, errThrift
	}
	w.at++
	return w.text[w.at-1], nil
}

func (w *thriftWalk) uvarint() (uint64, error) {
	x, n := varint.Uvarint(w.text[w.at:])
	if n <= 0 {
		return 0, errThrift
	}
	w.at += n
	return x, nil
}

func (w *thriftWalk) skip(n uint64) error {
	if n > uint64(len(w.text)-w.at) {
		return errThrift
	}
	w.at += int(n)
	return nil
}

// object walks a struct.
func (w *thriftWalk) object(depth int) error {
	if depth > maxThriftDepth {
		return errThrift
	}
	id := int64(0)
	for {
		head, err := w.byte()
		if err != nil || head == 0 {
			return err
		}
		if delta := int64(head >> 4); delta > 0 {
			id += delta
		} else {
			x, err := w.uvarint()
			if err != nil {
				return err
			}
			id = unzigzag(x)
		}
		kind := head & 0xf
		if kind == thriftTrue || kind == thriftFalse {
			continue // the value is the type
		}
		start := w.at
		if err := w.value(kind, depth); err != nil {
			return err
		}
		if depth == 0 && kind > thriftByte && kind <= thriftI64 && w.fields != nil {
			x, _ := varint.Uvarint(w.text[start:])
			w.fields[id] = unzigzag(x)
		}
	}
}

func unzigzag(x uint64) int64 { return int64(x>>1) ^ -int64(x&1) }

func (w *thriftWalk) value(kind byte, depth int) error {
	switch kind {
	case thriftTrue, thriftFalse, thriftByte:
		return w.skip(1)
	case 4, 5, thriftI64:
		_, err := w.uvarint()
		return err
	case thriftDouble:
		return w.skip(8)
	case thriftText:
		n, err := w.uvarint()
		if err != nil {
			return err
		}
		return w.skip(n)
	case thriftList, thriftSet:
		return w.list(depth)
	case thriftMap:
		return w.pairs(depth)
	case thriftStruct:
		return w.object(depth + 1)
	}
	return errThrift
}

func (w *thriftWalk) list(depth int) error {
	head, err := w.byte()
	if err != nil {
		return err
	}
	n := uint64(head >> 4)
	if n == 15 {
		if n, err = w.uvarint(); err != nil {
			return err
		}
	}
	if n > uint64(len(w.text)-w.at) || depth > maxThriftDepth { // an item takes a byte at least
		return errThrift
	}
	for range n {
		if err := w.value(head&0xf, depth+1); err != nil {
			return err
		}
	}
	return nil
}

func (w *thriftWalk) pairs(depth int) error {
	n, err := w.uvarint()
	if err != nil || n == 0 {
		return err
	}
	kinds, err := w.byte()
	if err != nil || n > uint64(len(w.text)-w.at) || depth > maxThriftDepth {
		return errThrift
	}
	for range n {
		if err := w.value(kinds>>4, depth+1); err != nil {
			return err
		}
		if err := w.value(kinds&0xf, depth+1); err != nil {
			return err
		}
	}
	return nil
}

// checkFooter walks the footer of a file.
func checkFooter(in io.ReaderAt, size, footer int64) error {
	text := make([]byte, footer)
	if _, err := in.ReadAt(text, size-8-footer); err != nil {
		return err
	}
	return (&thriftWalk{text: text}).object(0)
}

// maxPageHeader is how much of a page header is looked at; statistics make the largest
// part of it.
const maxPageHeader = 1 << 16

// checkPages walks the page headers of one column in all row groups.
func checkPages(in io.ReaderAt, size int64, f *parquet.File, column int) error {
	for _, g := range f.Metadata().RowGroups {
		if column >= len(g.Columns) {
			return errThrift
		}
		m := g.Columns[column].MetaData
		at := m.DataPageOffset
		if d := m.DictionaryPageOffset; d > 0 && d < at {
			at = d
		}
		end := at + m.TotalCompressedSize
		if at < 4 || end < at || end > size {
			return errors.New("is damaged: a column lies outside of the file")
		}
		head := make([]byte, min(maxPageHeader, size-at))
		for at < end {
			n, err := in.ReadAt(head[:min(int64(len(head)), size-at)], at)
			if err != nil && err != io.EOF {
				return err
			}
			w := thriftWalk{text: head[:n], fields: map[int64]int64{}}
			if err := w.object(0); err != nil {
				return err
			}
			// PageHeader: 2 is the size unpacked, 3 as it stands in the file.
			unpacked, packed := w.fields[2], w.fields[3]
			if unpacked < 0 || unpacked > maxPage || packed < 0 || packed > end-at-int64(w.at) {
				return fmt.Errorf("is damaged, or has pages of more than %d MB", maxPage>>20)
			}
			at += int64(w.at) + packed
		}
	}
	return nil
}
