package series

import (
	"bytes"
	"compress/gzip"
	"errors"
	"fmt"
	"io"
	"strings"

	"github.com/klauspost/compress/zstd"
)

// packing is a compression that is taken off while reading.
type packing struct {
	name, magic string
	open        func(io.Reader) (io.ReadCloser, error)
}

// maxWindow bounds the memory of zstd. Only files packed with its option --long ask for
// more than 8 MB.
const maxWindow = 32 << 20

var packings = []packing{
	{"gzip", "\x1f\x8b", func(r io.Reader) (io.ReadCloser, error) { return gzip.NewReader(r) }},
	{"zstd", "\x28\xb5\x2f\xfd", func(r io.Reader) (io.ReadCloser, error) {
		z, err := zstd.NewReader(r, zstd.WithDecoderConcurrency(1), zstd.WithDecoderLowmem(true), zstd.WithDecoderMaxWindow(maxWindow))
		if err != nil {
			return nil, err
		}
		return z.IOReadCloser(), nil
	}},
}

// packingOf is the compression of a file, by its first bytes.
func packingOf(head []byte) (packing, bool) {
	for _, p := range packings {
		if bytes.HasPrefix(head, []byte(p.magic)) {
			return p, true
		}
	}
	return packing{}, false
}

// unpacked is what of the start of a file can be unpacked from its first bytes.
func (p packing) unpacked(head []byte) []byte {
	z, err := p.open(bytes.NewReader(head))
	if err != nil {
		return nil
	}
	defer z.Close()
	out, _ := io.ReadAll(io.LimitReader(z, HeadSize)) // the head ends in the middle: that is no error here
	return out
}

// input is a file with its compression taken off.
type input struct {
	start []byte    // its first bytes, no more than HeadSize
	rest  io.Reader // what follows
	close func() error
}

// openInput reads the start of a file.
func openInput(r io.Reader) (*input, error) {
	in, err := readStart(r)
	if err != nil {
		return nil, err
	}
	p, ok := packingOf(in.start)
	if !ok {
		return in, nil
	}
	z, err := p.open(io.MultiReader(bytes.NewReader(in.start), in.rest))
	if err == nil {
		in, err = readStart(z)
	}
	if err != nil {
		return nil, fmt.Errorf("cannot be unpacked: %w", describe(p, err))
	}
	in.close = z.Close
	return in, nil
}

// describe makes sure that an error names the compression.
func describe(p packing, err error) error {
	if errors.Is(err, zstd.ErrWindowSizeExceeded) {
		return fmt.Errorf("%w: it needs more than %d MB; pack it again without --long", err, maxWindow>>20)
	}
	if strings.Contains(err.Error(), p.name) {
		return err
	}
	return fmt.Errorf("%s: %w", p.name, err)
}

// readStart reads up to HeadSize bytes. An error that comes after some of them is
// left for the reader of the rest.
func readStart(r io.Reader) (*input, error) {
	in := &input{start: make([]byte, HeadSize), rest: r, close: func() error { return nil }}
	n, err := fill(r, in.start)
	in.start = in.start[:n]
	switch {
	case err == io.EOF || err == nil:
	case n == 0:
		return nil, err
	default:
		in.rest = failing{err}
	}
	return in, nil
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
