package message

import (
	"bufio"
	"bytes"
	"cmp"
	"context"
	"errors"
	"io"
	"strings"
	"time"

	"dextral/analyzers/series"
	"dextral/core/convention"
	"dextral/rules"
)

// Ephemeris is what one pass over an attitude ephemeris message found.
type Ephemeris struct {
	Series    []*rules.Series
	Values    []*rules.Value // the first state of each segment; what no segment can be read for has Why
	Findings  []*rules.Finding
	Rows      int64
	BadRows   int64
	FirstBad  []series.BadRow
	Undecided []*rules.Value
}

// IsEphemeris reports whether a text begins as an AEM does, in either notation, or as
// a comprehensive message (ACM) in key-value notation.
func IsEphemeris(head []byte) bool {
	text := bytes.TrimLeft(bytes.TrimPrefix(head, []byte("\xef\xbb\xbf")), " \t\r\n")
	return bytes.HasPrefix(text, []byte("CCSDS_AEM_VERS")) || bytes.HasPrefix(text, []byte("CCSDS_ACM_VERS")) || isXML(text)
}

// ReadEphemeris reads an AEM, or the attitude histories of an ACM, to its end, in memory that does not grow with it (in XML
// notation, by some bytes for each state). The path is the one to be printed.
func ReadEphemeris(ctx context.Context, path string, r io.Reader, o series.Options) (Ephemeris, error) {
	var e Ephemeris
	in := bufio.NewReaderSize(r, longest)
	if head, _ := in.Peek(2048); isXML(bytes.TrimLeft(bytes.TrimPrefix(head, []byte("\xef\xbb\xbf")), " \t\r\n")) {
		return readXML(ctx, path, in, o)
	}
	l := newLines(path, in)
	c := &checker{lines: l}
	s := &segment{meta: map[string]string{}}
	inMeta := false
	for {
		n, err := l.next()
		switch {
		case errors.Is(err, io.EOF):
			e.Findings = c.found
			return e, nil
		case err != nil:
			e.Findings = c.found
			return e, err
		}
		switch word := n.word(); {
		case word == "COMMENT":
		case n.key == "CCSDS_AEM_VERS", n.key == "CCSDS_ACM_VERS":
			c.version(n)
		case word == "ATT_START":
			if err := e.history(ctx, &segment{meta: map[string]string{}, index: s.index, second: c.second}, c, o); err != nil {
				e.Findings = c.found
				return e, err
			}
			s.index++
		case word == "META_START":
			s = &segment{meta: map[string]string{}, index: s.index, second: c.second}
			inMeta = true
		case word == "META_STOP":
			inMeta = false
			if s.meta["INTERPOLATION_METHOD"] != "" && s.meta["INTERPOLATION_DEGREE"] == "" {
				c.report(rules.Warning, n, "META_STOP", "INTERPOLATION_METHOD is given without INTERPOLATION_DEGREE, which it needs")
			}
		case n.key != "" && inMeta:
			c.keyword(n)
			s.meta[n.key] = n.value
		case word == "DATA_START":
			if err := e.segment(ctx, s, &data{lines: l, checker: c, segment: s}, o); err != nil {
				e.Findings = c.found
				return e, err
			}
			s.index++
		}
	}
}

// history reads one attitude history of a comprehensive message: keywords, then lines of
// numbers (table 5-4). Its lines are not held against the standard, and its times may be
// seconds from an epoch.
func (e *Ephemeris) history(ctx context.Context, s *segment, c *checker, o series.Options) error {
	for {
		n, err := c.lines.next()
		if errors.Is(err, io.EOF) || n.word() == "ATT_STOP" {
			return nil
		}
		if err != nil {
			return err
		}
		switch {
		case n.word() == "COMMENT" || strings.TrimSpace(n.text) == "":
		case n.key != "":
			s.meta[n.key] = n.value
		default:
			s.meta["ATTITUDE_TYPE"] = s.meta["ATT_TYPE"]
			if k, ok := s.kind(); ok {
				s.extra = max(0, len(strings.Fields(n.text))-1-len(strings.Fields(k.columns)))
			}
			d := &data{lines: c.lines, checker: &checker{lines: c.lines}, segment: s, stop: "ATT_STOP", first: &n}
			return e.segment(ctx, s, d, o)
		}
	}
}

// segment reads the data lines of one segment.
func (e *Ephemeris) segment(ctx context.Context, s *segment, d *data, o series.Options) error {
	start := d.lines.number
	if d.first != nil {
		start-- // that line has been read already
	}
	at := rules.Place{Path: d.lines.path, Line: start, Column: 1, EndLine: start, EndColumn: len("DATA_START") + 1}
	k, known := s.kind()
	if !known || k.form == convention.NoForm {
		e.undecided(s, at)
		_, err := io.Copy(io.Discard, d)
		return err
	}
	inner := o
	var first *rules.Value
	inner.Declare = func(v *rules.Value) {
		shift(v, start-1)
		s.describe(v, at)
		if o.Declare != nil {
			o.Declare(v)
		}
		first = v
	}
	// The column names take the place of the line DATA_START, so that the lines of
	// what is read count from there.
	d.buffer.WriteString("time " + k.columns + "\n")
	r, err := series.Read(ctx, d.lines.path, d, inner)
	if _, rest := io.Copy(io.Discard, d); err == nil {
		err = rest
	}
	for _, c := range r.Channels {
		lineOf := c.RowPlace
		c.RowPlace = func(row int64) rules.Place { return moved(lineOf(row), start-1) }
		if c.Clock != nil {
			c.Clock.Place = moved(c.Clock.Place, start-1)
		}
		e.Series = append(e.Series, c)
	}
	if first != nil {
		e.Values = append(e.Values, s.twin(first))
	}
	for _, b := range r.FirstBad {
		b.Place = moved(b.Place, start-1)
		e.FirstBad = append(e.FirstBad, b)
	}
	e.Rows, e.BadRows = e.Rows+r.Rows, e.BadRows+r.BadRows
	return err
}

// undecided notes a segment whose states are not read.
func (e *Ephemeris) undecided(s *segment, at rules.Place) {
	e.Undecided = append(e.Undecided, &rules.Value{Key: s.key(), Place: at, Why: "attitudes of type " + s.meta["ATTITUDE_TYPE"] + " are not compared"})
}

func shift(v *rules.Value, by int) {
	v.Place, v.KeyAt = moved(v.Place, by), moved(v.KeyAt, by)
	for i := range v.Numbers {
		v.Numbers[i].Place = moved(v.Numbers[i].Place, by)
	}
}

func moved(p rules.Place, by int) rules.Place {
	if p.Line > 0 {
		p.Line, p.EndLine = p.Line+by, p.EndLine+by
	}
	return p
}

// data are the lines between DATA_START and DATA_STOP as a stream. They are held
// against the standard on their way.
type data struct {
	lines   *lines
	checker *checker
	segment *segment
	buffer  bytes.Buffer
	begun   bool
	latest  time.Time // epoch so far
	stop    string    // the word that ends them; "": DATA_STOP
	first   *line     // the first of them, if it has been read
	done    bool
}

// maxLines bounds the lines of a segment that are reported one by one.
const maxLines = 5

func (d *data) Read(p []byte) (int, error) {
	for d.buffer.Len() == 0 {
		if d.done {
			return 0, io.EOF
		}
		n, err := d.line()
		if err != nil {
			d.done = true
			if errors.Is(err, io.EOF) {
				return 0, io.EOF
			}
			return 0, err
		}
		if n.word() == cmp.Or(d.stop, "DATA_STOP") {
			d.done = true
			return 0, io.EOF
		}
		d.check(n)
		if n.word() == "COMMENT" {
			n.text = "" // the line counts
		}
		d.buffer.WriteString(n.text + "\n")
	}
	return d.buffer.Read(p)
}

func (d *data) line() (line, error) {
	if n := d.first; n != nil {
		d.first = nil
		return *n, nil
	}
	return d.lines.next()
}

// check holds a data line against the standard.
func (d *data) check(n line) {
	c, s := d.checker, d.segment
	fields := strings.Fields(n.text)
	if len(fields) > 0 && n.word() != "COMMENT" {
		s.note(n.number, fields[0])
	}
	if !c.second || len(c.found) > maxLines*(s.index+1) {
		return
	}
	if n.word() == "COMMENT" {
		if d.begun {
			c.report(rules.Warning, n, s.key(), "a comment stands between data lines; the standard allows it directly behind DATA_START only")
		}
		return
	}
	if len(fields) == 0 {
		return
	}
	d.begun = true
	k, known := s.kind()
	want := len(strings.Fields(k.columns))
	back := false
	if t, ok := epoch(fields[0]); ok {
		back = t.Before(d.latest)
		if !back {
			d.latest = t
		}
	}
	switch out := s.outside(fields[0]); {
	case back:
		c.report(rules.Error, n, s.key(), "the epoch %s is before the one above; the standard has the epochs of a segment increase", fields[0])
	case strings.Contains(n.text, "["):
		c.report(rules.Error, n, s.key(), "a data line has a unit text, which the standard forbids: %s", fields[len(fields)-1])
	case known && len(fields)-1 != want:
		c.report(rules.Error, n, s.key(), "a data line of type %s holds %d numbers behind its epoch, not %d", s.meta["ATTITUDE_TYPE"], want, len(fields)-1)
	case out != "":
		c.report(rules.Warning, n, s.key(), "the epoch %s lies outside of the segment's span, %s", fields[0], out)
	}
}

func (s *segment) key() string { return "segment." + s.meta["ATTITUDE_TYPE"] }
