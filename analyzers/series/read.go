package series

import (
	"bytes"
	"context"
	"errors"
	"fmt"
	"io"

	"dextral/analyzers/series/fold"
	"dextral/analyzers/series/text"
	"dextral/analyzers/series/ulog"
	"dextral/rules"
)

// Options change how logs are read. The zero value is fine.
type Options struct {
	// Declare adds what is declared about a channel to its value, whose key,
	// claims, places and numbers are known. It may change the form, or take the
	// reason away why a channel is undecided.
	Declare func(*rules.Value)
	// Workers is the number of blocks that are folded at a time; below 2 there is
	// one, in the caller's goroutine.
	Workers int
	// Time names the column of time stamps; "" leaves that to the names.
	Time string

	block int // size of blocks in tests
}

// MaxBadRows is the number of bad rows of which Result keeps the particulars.
const MaxBadRows = 8

// Result is what one pass found out about a log.
type Result struct {
	Format    string // such as "comma-separated"; "" if the file is no table of numbers
	Channels  []*rules.Series
	Pairs     []*rules.SeriesPair
	Rows      int64          // rows read; 0 if there is no channel to read them for
	Clock     *rules.Clock   // nil if there are no time stamps
	Undecided []*rules.Value // channels that are not read, with Why; numbers of the first row
	BadRows   int64          // rows that could not be read
	FirstBad  []BadRow       // the first MaxBadRows of them

	RatesWithoutTime bool // there are quaternions and angular rates, and no time stamps to compare them by
}

// BadRow is a row that could not be read.
type BadRow struct {
	Place  rules.Place
	Reason string
}

// Read reads a log to its end. The path is the one to be printed. A file that
// is no log, or one without orientations, gives an empty Result and no error,
// after a look at its beginning. With an error, from the reader or because ctx
// was cancelled, comes the result so far; the error does not repeat the path.
func Read(ctx context.Context, path string, r io.Reader, opts Options) (Result, error) {
	file, err := openInput(r)
	if err != nil {
		return Result{}, err
	}
	defer file.close()
	if bytes.HasPrefix(file.start, []byte(ulog.Magic)) {
		return readULog(ctx, path, io.MultiReader(bytes.NewReader(file.start), file.rest), opts)
	}
	t, ok := sniff(path, file.start, len(file.start) < HeadSize)
	switch {
	case !ok && headTooLong(file.start):
		return Result{}, fmt.Errorf("has no row in its first %d bytes; no log has a header that long", HeadSize)
	case !ok:
		return Result{}, nil
	}
	l := plan(&t.head, opts)
	p := t.parser(l.cells)
	in := &feed{r: io.MultiReader(bytes.NewReader(file.start[t.offset:]), file.rest), cut: p.Cut, line: t.line}
	total, err := &part{fold: fold.New(&l.fold)}, error(nil)
	if len(l.channels) > 0 {
		total, err = run(ctx, in, &l.fold, opts, func() *folder {
			return &folder{parser: p, origin: t.line - 1, cells: make([]fold.Cell, l.width)}
		})
	}
	if err != nil && !errors.Is(err, ctx.Err()) {
		err = fmt.Errorf("reading stopped near line %d: %w", in.line, err)
	}
	return l.result(path, t.format, t.line-1, total), err
}

// headTooLong reports whether text begins with a line that leaves no room for rows.
func headTooLong(start []byte) bool {
	return len(start) == HeadSize && !binary(start) && bytes.LastIndexByte(start, '\n') <= bytes.IndexByte(start, '\n')
}

// result puts the folds in the form that rules judge.
func (l *layout) result(path, format string, origin int64, total *part) Result {
	f := total.fold
	r := Result{Format: format, Rows: f.Rows, Clock: l.clockOf(&f.Clock), Undecided: l.undecided, BadRows: total.bad.count}
	place := func(row int64) rules.Place {
		line := int(origin + row)
		return rules.Place{Path: path, Line: line, Column: 1, EndLine: line + 1, EndColumn: 1, Row: row}
	}
	for i := range l.channels {
		s := l.series(i, &f.Channels[i], place, r.Clock)
		s.Rows = f.Rows
		if s.Clock != nil {
			s.Unit = s.Clock.Unit
			s.Stamp = func(t float64) string { return l.fold.Start.After(t).String() }
		}
		r.Channels = append(r.Channels, s)
	}
	r.RatesWithoutTime = l.timeless
	for i := range l.fold.Rates {
		s := r.Channels[l.fold.Rates[i].Channel]
		s.Rates = l.ratesOf(s, &f.Rates[i])
	}
	for i, p := range l.fold.Pairs {
		pair := &rules.SeriesPair{First: r.Channels[p[0]], Second: r.Channels[p[1]]}
		for k := range f.Pairs[i].Count {
			a, b := f.Pairs[i].Split(k, &l.fold.Channels[p[0]], &l.fold.Channels[p[1]])
			pair.Samples = append(pair.Samples, rules.PairSample{Row: f.Pairs[i].Rows[k], First: a, Second: b})
		}
		r.Pairs = append(r.Pairs, pair)
	}
	for _, b := range total.bad.first[:min(total.bad.count, MaxBadRows)] {
		r.FirstBad = append(r.FirstBad, BadRow{place(b.row), l.reason(b.fault)})
	}
	return r
}

func (l *layout) series(i int, f *fold.Summary, place func(int64) rules.Place, clock *rules.Clock) *rules.Series {
	s := &rules.Series{
		Value: l.channels[i].Value, Columns: l.names[i], Clock: clock,
		Half: f.Digits.Half(), Float32: f.Digits.Single(), Scale: f.Digits.Scale(),
		Gaps: f.Gaps, Continuity: f.Continuity, Matrices: f.Matrices.Rules(), Wraps: f.Wraps.Tally, RowPlace: place,
	}
	for k := range f.Ranges {
		s.Ranges = append(s.Ranges, f.Ranges[k].Range)
	}
	s.Value.Why = doubtAfterwards(s, f)
	if s.Clock != nil && !timesOfOne(s.Clock) {
		s.Clock = nil // its column is no fault of a series
	}
	return s
}

// timesOfOne reports whether a column of times can be that of one series. A log
// that was put together of parts runs backwards here and there, not at every tenth row.
func timesOfOne(c *rules.Clock) bool { return 10*c.Reversed.Count <= c.Count }

// doubtAfterwards says what only all rows together show: that the channel is not
// what it is read as.
//
// Neighbours more than 90 degrees apart are rare in a series, and of independent
// orientations 82 in 100: the angle between two random rotations has density
// (1 - cos a)/pi. Half of them are seen as wide steps, half of the rest as sign
// jumps; where there are more of the first than of the second, the rows are a list.
func doubtAfterwards(s *rules.Series, f *fold.Summary) string {
	c := &s.Continuity
	switch {
	case c.Rows > 0 && f.Digits.Integers():
		return fmt.Sprintf("its numbers are whole, of norm %.6g to %.6g: a quaternion times a scale that nothing states", c.MinNorm.Value, c.MaxNorm.Value)
	case s.Clock == nil && c.Wide.Count > c.JumpCount:
		return fmt.Sprintf("no time stamps, and %d neighbours are more than 90 degrees apart: a list of orientations, not a series", c.Wide.Count)
	case s.Clock != nil && !timesOfOne(s.Clock):
		return fmt.Sprintf("column %s runs backwards at %d of %d rows: not the times of one series", s.Clock.Column, s.Clock.Reversed.Count, s.Clock.Count)
	}
	return ""
}

// reason says what is wrong with a row.
func (l *layout) reason(f text.Fault) string {
	switch f.Kind {
	case text.Ragged:
		return fmt.Sprintf("has %d columns; %d are expected", f.Column, len(l.cells))
	case text.Garbled:
		return "is no JSON object"
	case text.NotNumber:
		for i := range l.channels {
			for k, c := range l.channels[i].Columns {
				if c == f.Column {
					return fmt.Sprintf("column %d (%s) is no number", c+1, l.names[i][k])
				}
			}
		}
		return fmt.Sprintf("column %d, the time stamp, is no number", f.Column+1)
	default:
		return fmt.Sprintf("is longer than %d bytes", text.MaxRecord)
	}
}
