package series

import (
	"bytes"
	"cmp"
	"context"

	"dextral/analyzers/series/fold"
	"dextral/analyzers/series/text"
)

// part is the fold over some consecutive blocks.
type part struct {
	fold *fold.Fold
	bad  badRows
}

// badRows counts rows that cannot be read, and keeps the first few.
type badRows struct {
	count int64
	first [MaxBadRows]badRow
}

type badRow struct {
	row   int64
	fault text.Fault
}

func (b *badRows) add(r badRow) {
	if b.count < MaxBadRows {
		b.first[b.count] = r
	}
	b.count++
}

func (b *badRows) merge(next *badRows) {
	if b.count < MaxBadRows {
		copy(b.first[b.count:], next.first[:min(next.count, MaxBadRows)])
	}
	b.count += next.count
}

// folder folds blocks. Every worker has one of its own.
type folder struct {
	parser parser
	origin int64 // line before that of row 1
	cells  []fold.Cell
}

// block adds a block to a part.
func (f *folder) block(b block, p *part) {
	row := b.line - f.origin
	if b.long {
		p.bad.add(badRow{row, text.Fault{Kind: text.TooLong}})
		return
	}
	if f.parser.Plain(b.data) {
		for rest := b.data; len(rest) > 0; row++ {
			end := bytes.IndexByte(rest, '\n')
			if end < 0 {
				f.record(rest, row, p)
				return
			}
			f.record(rest[:end], row, p)
			rest = rest[end+1:]
		}
		return
	}
	for rest := b.data; len(rest) > 0; {
		record, next, lines, _ := f.parser.Record(rest, true)
		f.record(record, row, p)
		rest = next
		row += int64(lines)
	}
}

func (f *folder) record(record []byte, row int64, p *part) {
	switch fault := f.parser.Row(record, f.cells); fault.Kind {
	case text.None:
		p.fold.Row(row, f.cells)
	case text.Empty:
	default:
		p.bad.add(badRow{row, fault})
	}
}

// run folds all of a feed.
func run(ctx context.Context, in *feed, l *fold.Layout, opts Options, newFolder func() *folder) (*part, error) {
	total := &part{fold: fold.New(l)}
	size := cmp.Or(opts.block, blockSize)
	if opts.Workers > 1 {
		return total, parallel(ctx, in, l, opts.Workers, size, newFolder, total)
	}
	f := newFolder()
	buffer := make([]byte, size)
	for ctx.Err() == nil {
		b, ok := in.next(buffer)
		if !ok {
			return total, in.failure()
		}
		f.block(b, total)
	}
	return total, ctx.Err()
}

// job is a block on its way through a worker.
type job struct {
	buffer []byte
	block  block
	part   part
	done   chan struct{}
}

// parallel folds blocks as workers become free and merges them in the order of the
// file. The jobs that go round bound the memory.
func parallel(ctx context.Context, in *feed, l *fold.Layout, workers, size int, newFolder func() *folder, total *part) error {
	jobs := 2 * workers
	free, todo, order := make(chan *job, jobs), make(chan *job, jobs), make(chan *job, jobs)
	for range jobs {
		free <- &job{buffer: make([]byte, size), part: part{fold: fold.New(l)}, done: make(chan struct{}, 1)}
	}
	for range workers {
		f := newFolder()
		go func() {
			for j := range todo {
				f.block(j.block, &j.part)
				j.done <- struct{}{}
			}
		}()
	}
	go func() {
		defer close(order)
		defer close(todo)
		for ctx.Err() == nil {
			j := <-free
			var ok bool
			if j.block, ok = in.next(j.buffer); !ok {
				return
			}
			order <- j
			todo <- j
		}
	}()
	for j := range order {
		<-j.done
		total.fold.Merge(j.part.fold)
		total.bad.merge(&j.part.bad)
		j.part.fold.Reset()
		j.part.bad = badRows{}
		free <- j
	}
	if err := ctx.Err(); err != nil {
		return err
	}
	return in.failure()
}
