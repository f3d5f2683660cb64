package message

import (
	"bytes"
	"context"
	"encoding/xml"
	"errors"
	"fmt"
	"io"
	"strings"

	"dextral/analyzers/series"
	"dextral/core/convention"
	"dextral/rules"
)

// isXML reports whether a text is an ephemeris in XML notation.
func isXML(text []byte) bool {
	return bytes.HasPrefix(text, []byte("<")) && bytes.Contains(text[:min(len(text), 2048)], []byte("<aem"))
}

// columnsOf are the elements of an attitude state that make the columns of each type
// of package series, in its order.
var columnsOf = map[convention.Form][]string{
	convention.Quaternion: {"Q1", "Q2", "Q3", "QC"},
	convention.Angles:     {"ANGLE_1", "ANGLE_2", "ANGLE_3"},
}

// readXML reads an AEM in XML notation (table 7-5), state by state.
func readXML(ctx context.Context, path string, r io.Reader, o series.Options) (Ephemeris, error) {
	var e Ephemeris
	x := &states{decoder: xml.NewDecoder(r), path: path, second: true}
	x.decoder.CharsetReader = func(_ string, in io.Reader) (io.Reader, error) { return in, nil }
	for {
		ok, err := x.segment()
		switch {
		case err != nil:
			return e, err
		case !ok:
			return e, nil
		}
		if err := e.states(ctx, x, o); err != nil {
			return e, err
		}
		x.index++
	}
}

// states reads the document; as an io.Reader it gives the states of one segment as
// lines of numbers.
type states struct {
	decoder *xml.Decoder
	path    string
	second  bool
	index   int
	meta    *segment
	at      rules.Place // of the segment's first state
	buffer  bytes.Buffer
	lines   []int         // of each state
	first   []rules.Place // of the numbers of the first state
	done    bool
	err     error
}

// segment goes on to the next segment and reads its metadata. It is false at the end.
func (x *states) segment() (bool, error) {
	x.meta, x.done, x.lines, x.first = &segment{meta: map[string]string{}, index: x.index, second: x.second}, false, nil, nil
	x.buffer.Reset()
	for {
		token, err := x.decoder.Token()
		if errors.Is(err, io.EOF) {
			return false, nil
		}
		if err != nil {
			return false, x.wrong(err)
		}
		start, ok := token.(xml.StartElement)
		if !ok {
			continue
		}
		switch name := start.Name.Local; name {
		case "aem":
			for _, a := range start.Attr {
				if a.Name.Local == "version" {
					x.second = strings.HasPrefix(a.Value, "2")
					x.meta.second = x.second
				}
			}
		case "data":
			line, column := x.decoder.InputPos()
			x.at = rules.Place{Path: x.path, Line: line, Column: column, EndLine: line, EndColumn: column}
			return true, nil
		case "header", "body", "segment", "metadata":
		default:
			text, _, err := x.text()
			if err != nil {
				return false, err
			}
			x.meta.meta[name] = text
		}
	}
}

// text reads the text of an element up to its end, and where it stands.
func (x *states) text() (string, rules.Place, error) {
	line, column := x.decoder.InputPos()
	at := rules.Place{Path: x.path, Line: line, Column: column, EndLine: line, EndColumn: column}
	var text strings.Builder
	for depth := 1; ; {
		token, err := x.decoder.Token()
		if err != nil {
			return "", at, x.wrong(err)
		}
		switch t := token.(type) {
		case xml.CharData:
			text.Write(t)
			at.EndLine, at.EndColumn = x.decoder.InputPos()
		case xml.StartElement:
			depth++
		case xml.EndElement:
			if depth--; depth == 0 {
				return strings.TrimSpace(text.String()), at, nil
			}
		}
	}
}

func (x *states) wrong(err error) error {
	line, _ := x.decoder.InputPos()
	return fmt.Errorf("reading stopped near line %d: %w", line, err)
}

// Read gives states as lines: epoch and numbers, - for one that is missing.
func (x *states) Read(p []byte) (int, error) {
	for x.buffer.Len() == 0 {
		if x.done {
			return 0, io.EOF
		}
		if err := x.state(); err != nil {
			x.done, x.err = true, err
			return 0, err
		}
	}
	return x.buffer.Read(p)
}

// state reads up to the end of the next state, or of the segment's data.
func (x *states) state() error {
	k, _ := x.meta.kind()
	wanted := columnsOf[k.form]
	values := map[string]string{}
	places := map[string]rules.Place{}
	line := 0
	for {
		token, err := x.decoder.Token()
		if err != nil {
			return x.wrong(err)
		}
		switch t := token.(type) {
		case xml.StartElement:
			switch name := t.Name.Local; {
			case name == "attitudeState":
				line, _ = x.decoder.InputPos()
			case name == "EPOCH", strings.HasPrefix(name, "Q"), strings.HasPrefix(name, "ANGLE_"):
				text, at, err := x.text()
				if err != nil {
					return err
				}
				values[name], places[name] = text, at
			}
		case xml.EndElement:
			switch t.Name.Local {
			case "data":
				x.done = true
				return nil
			case "attitudeState":
				x.row(wanted, values, places, line)
				return nil
			}
		}
	}
}

func (x *states) row(wanted []string, values map[string]string, places map[string]rules.Place, line int) {
	if len(x.lines) == 0 {
		for _, name := range wanted {
			x.first = append(x.first, places[name])
		}
	}
	x.lines = append(x.lines, line)
	if len(wanted) > 0 {
		x.meta.note(places[wanted[0]].Line, values["EPOCH"])
	}
	x.buffer.WriteString(orDash(values["EPOCH"]))
	for _, name := range wanted {
		x.buffer.WriteString(" " + orDash(values[name]))
	}
	x.buffer.WriteByte('\n')
}

func orDash(s string) string {
	if s == "" || strings.ContainsAny(s, " \t\n") {
		return "-"
	}
	return s
}

// states judges the states of one segment.
func (e *Ephemeris) states(ctx context.Context, x *states, o series.Options) error {
	k, known := x.meta.kind()
	if !known || k.form == convention.NoForm {
		e.undecided(x.meta, x.at)
		_, err := io.Copy(io.Discard, x)
		return err
	}
	columns := "qx qy qz qw"
	if k.form == convention.Angles {
		columns = "roll pitch yaw"
	}
	x.buffer.WriteString("time " + columns + "\n")
	inner := o
	var first *rules.Value
	inner.Declare = func(v *rules.Value) {
		x.meta.describe(v, x.at)
		order := []int{0, 1, 2}
		if k.form == convention.Quaternion {
			order = []int{3, 0, 1, 2} // numbers come as w, x, y, z
		}
		for i, n := range order {
			if n < len(x.first) && i < len(v.Numbers) {
				v.Numbers[i].Place = x.first[n]
			}
		}
		v.Place = x.at
		if len(x.first) > 0 {
			v.Place = x.first[0].To(x.first[len(x.first)-1])
		}
		if o.Declare != nil {
			o.Declare(v)
		}
		first = v
	}
	r, err := series.Read(ctx, x.path, x, inner)
	if _, rest := io.Copy(io.Discard, x); err == nil {
		err = rest
	}
	lines := x.lines
	place := func(p rules.Place) rules.Place {
		p.Column, p.EndColumn = 1, 1
		if i := p.Line - 2; i >= 0 && i < len(lines) { // line 1 is that of the names
			p.Line, p.EndLine = lines[i], lines[i]+1
		}
		return p
	}
	for _, c := range r.Channels {
		lineOf := c.RowPlace
		c.RowPlace = func(row int64) rules.Place { return place(lineOf(row)) }
		if c.Clock != nil {
			c.Clock.Place = x.at
		}
		e.Series = append(e.Series, c)
	}
	for _, b := range r.FirstBad {
		b.Place = place(b.Place)
		e.FirstBad = append(e.FirstBad, b)
	}
	if first != nil {
		e.Values = append(e.Values, x.meta.twin(first))
	}
	e.Rows, e.BadRows = e.Rows+r.Rows, e.BadRows+r.BadRows
	if x.err != nil {
		return x.err
	}
	return err
}
