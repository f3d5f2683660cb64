package series

import (
	"bytes"
	"compress/gzip"
	"fmt"
	"io"
)

// unpack reads the start of a file, unzipped if it is a gzip file, and returns
// it with the reader of the rest.
func unpack(r io.Reader) ([]byte, io.Reader, error) {
	start, rest, err := readHead(r)
	if err != nil || !bytes.HasPrefix(start, []byte(gzipMagic)) {
		return start, rest, err
	}
	z, err := gzip.NewReader(io.MultiReader(bytes.NewReader(start), rest))
	if err != nil {
		return nil, nil, fmt.Errorf("is damaged: %w", err)
	}
	return readHead(z)
}

// readHead reads up to HeadSize bytes. An error that comes after some of them is left
// for the reader of the rest.
func readHead(r io.Reader) ([]byte, io.Reader, error) {
	start := make([]byte, HeadSize)
	n, err := fill(r, start)
	switch {
	case err == io.EOF || err == nil:
	case n == 0:
		return nil, nil, err
	default:
		r = failing{err}
	}
	return start[:n], r, nil
}

// fill reads until the buffer is full or the reader has an error. Unlike
// io.ReadFull it returns the reader's own error, which tells a file that was cut
// off from one that ends.
func fill(r io.Reader, buffer []byte) (n int, err error) {
	for n < len(buffer) && err == nil {
		var more int
		more, err = r.Read(buffer[n:])
		n += more
	}
	return n, err
}

// failing is a reader with nothing but an error.
type failing struct{ err error }

func (f failing) Read([]byte) (int, error) { return 0, f.err }
