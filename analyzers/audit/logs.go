package audit

import (
	"bytes"
	"context"
	"fmt"
	"io"

	"dextral/analyzers/message"
	"dextral/analyzers/series"
	"dextral/analyzers/walk"
	"dextral/rules"
	"dextral/rules/report"
)

// readLog streams a file that may be a log. What its first bytes or its name
// show to be of another kind is said so.
func readLog(ctx context.Context, f walk.File, head []byte, r io.Reader, o *Options) *found {
	switch kind := series.Recognise(f.Path, head); {
	case !kind.None() && !kind.Readable:
		return &found{kind: unreadable, skipped: []report.Skipped{{Path: f.Path, Why: kind.Name}}}
	case kind.None() && bytes.IndexByte(head, 0) >= 0:
		return &found{kind: binary}
	case kind.None():
		if name := unreadConfig(f.Name, head); name != "" {
			return &found{kind: unreadable, skipped: []report.Skipped{{Path: f.Path, Why: name}}}
		}
		return &found{kind: other}
	}
	read, err := series.Read(ctx, f.Path, r, o.series(f))
	result := logged(ctx, f, read, err)
	if result.kind == logFile {
		result.waiversInHead(f.Path, head)
	}
	return result
}

// readParquet reads a log of columns, whose directory stands at its end.
func readParquet(ctx context.Context, f walk.File, file io.ReaderAt) *found {
	read, err := series.ReadParquet(ctx, f.Path, file, f.Size, series.Options{Declare: f.Policy.Declare})
	if err != nil && !f.Asked && read.Rows == 0 { // met on the way, and nothing says that it holds orientations
		limited := failure(rules.Place{Path: f.Path}, err)
		return &found{kind: other, limited: []report.Failure{limited}}
	}
	return logged(ctx, f, read, err)
}

// logged is what was found in a log.
func logged(ctx context.Context, f walk.File, read series.Result, err error) *found {
	result := &found{kind: logFile, series: read.Channels, pairs: read.Pairs, rows: read.Rows, values: read.Undecided}
	if len(read.Channels) == 0 && len(read.Undecided) == 0 {
		result.kind = other
	}
	if read.BadRows > 0 {
		result.limited = append(result.limited, badRows(f.Path, read))
	}
	result.broken(ctx, f, err)
	return result
}

// broken says why a log was not read to its end.
func (r *found) broken(ctx context.Context, f walk.File, err error) {
	switch {
	case err == nil:
	case ctx.Err() == nil:
		r.failures = append(r.failures, failure(rules.Place{Path: f.Path}, err))
	case r.kind == logFile:
		r.limited = append(r.limited, report.Failure{Place: rules.Place{Path: f.Path}, Message: fmt.Sprintf("interrupted after %d rows, which were audited", r.rows)})
	}
}

// bigLog is the size from which on a log is worth several workers of its own and
// news of its progress.
const bigLog = 8 << 20

// series are the options for reading a log.
func (o *Options) series(f walk.File) series.Options {
	s := series.Options{Declare: f.Policy.Declare}
	if f.Size >= bigLog {
		s.Workers = o.Workers
	}
	return s
}

// watched tells Progress what is read from a big file.
func (o *Options) watched(f walk.File, r io.Reader) io.Reader {
	if o.Progress == nil || f.Size < bigLog {
		return r
	}
	return &watched{r: r, file: f, tell: o.Progress}
}

type watched struct {
	r    io.Reader
	file walk.File
	done int64
	tell func(path string, done, of int64)
}

func (w *watched) Read(p []byte) (int, error) {
	n, err := w.r.Read(p)
	w.done += int64(n)
	w.tell(w.file.Path, w.done, w.file.Size)
	return n, err
}

// readEphemeris streams an attitude ephemeris message.
func readEphemeris(ctx context.Context, f walk.File, r io.Reader) *found {
	e, err := message.ReadEphemeris(ctx, f.Path, r, series.Options{Declare: f.Policy.Declare})
	result := &found{kind: logFile, series: e.Series, rows: e.Rows, values: append(e.Values, e.Undecided...), findings: e.Findings}
	if e.BadRows > 0 {
		result.limited = append(result.limited, badRows(f.Path, series.Result{BadRows: e.BadRows, FirstBad: e.FirstBad}))
	}
	if err != nil && ctx.Err() == nil {
		result.failures = append(result.failures, failure(rules.Place{Path: f.Path}, err))
	}
	return result
}

// badRows says in one line which rows were passed over.
func badRows(path string, r series.Result) report.Failure {
	first := r.FirstBad[0]
	text := first.Reason
	if r.BadRows > 1 {
		text = fmt.Sprintf("%s; and %d more rows of this file could not be read; the others were audited", text, r.BadRows-1)
	}
	return report.Failure{Place: first.Place, Message: text}
}
