// Package rates reads the orientations and the angular rates of a log side by
// side and asks package identify which conventions they obey together.
//
// It reads delimited text with a header, once, in constant memory. The
// orientation is the first quaternion of the log that the names of its columns
// decide (package columns); the rates are three columns, x, y and z, whose common
// name speaks of an angular rate and not of a bias or a covariance.
package rates

import (
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"math"
	"regexp"
	"slices"
	"strconv"
	"strings"

	"dextral/analyzers/series/columns"
	"dextral/core/convention"
	"dextral/core/identify"
	"dextral/core/rotor"
	"dextral/rules"
)

// Log is what identify found out about a log.
type Log struct {
	Quaternion rules.Value // form, key and claims of the channel
	Columns    []string    // of the quaternion, then of the rates, then of time
	Claim      identify.SeriesClaim
	Rows       int64 // rows without a gap
	Result     identify.SeriesResult
}

// ErrNone is returned for a log without a quaternion or without rates.
var ErrNone = errors.New("it has no quaternion with angular rates beside it")

// Identify reads a log and identifies it. Time names the column of time stamps;
// "" leaves that to the names of the columns.
func Identify(path string, r io.Reader, time string) (*Log, error) {
	in := csv.NewReader(r)
	in.ReuseRecord, in.FieldsPerRecord, in.LazyQuotes, in.TrimLeadingSpace = true, -1, true, true
	first, err := in.Read()
	header := slices.Clone(first) // the reader uses the record again
	if err == io.EOF {
		return nil, ErrNone
	}
	if err != nil {
		return nil, fmt.Errorf("%s: the header could not be read: %w", path, err)
	}
	l, pick, err := choose(header, time)
	if err != nil {
		return nil, fmt.Errorf("%s: %w", path, err)
	}
	var fold identify.SeriesFold
	for {
		row, err := in.Read()
		if err == io.EOF {
			break
		}
		if err != nil && !errors.Is(err, csv.ErrFieldCount) {
			return nil, fmt.Errorf("%s: %w", path, err)
		}
		if s, ok := pick.sample(row); ok {
			fold.Add(s)
			l.Rows++
		}
	}
	l.Result = fold.Result(l.Claim)
	return l, nil
}

// picks are the columns of one sample.
type picks struct {
	quaternion [4]int
	rate       [3]int
	time       int
	unit       string // of time
	perSecond  float64
	start      float64
	started    bool
}

// sample takes one row apart; rows with a gap are left out.
func (p *picks) sample(row []string) (identify.Sample, bool) {
	ok := true
	number := func(i int) float64 {
		if i >= len(row) {
			ok = false
			return 0
		}
		x, err := strconv.ParseFloat(strings.TrimSpace(row[i]), 64)
		ok = ok && err == nil && !math.IsNaN(x) && !math.IsInf(x, 0)
		return x
	}
	var s identify.Sample
	t := number(p.time)
	if ok && !p.started {
		p.start, p.started = t, true // large stamps keep their digits in the difference
		p.perSecond = perSecond(p.unit, t)
	}
	s.T = (t - p.start) / p.perSecond
	for i, c := range p.quaternion {
		s.Q[i] = number(c)
	}
	s.W = rotor.Vec{X: number(p.rate[0]), Y: number(p.rate[1]), Z: number(p.rate[2])}
	return s, ok
}

// choose finds the columns by their names.
func choose(header []string, time string) (*Log, *picks, error) {
	cols := make([]columns.Column, len(header))
	for i, h := range header {
		header[i] = strings.Clone(strings.TrimLeft(strings.TrimSpace(h), "#%\ufeff "))
		cols[i] = columns.Column{Text: header[i], Place: rules.Place{Line: 1}}
	}
	found := columns.Find(cols)
	l, p := &Log{}, &picks{perSecond: 1}
	quaternion := false
	for _, c := range found.Channels {
		if c.Value.Form == convention.Quaternion && len(c.Columns) == 4 {
			l.Quaternion, p.quaternion, quaternion = c.Value, [4]int(c.Columns), true
			break
		}
	}
	group, ok := rateColumns(header)
	if !quaternion || !ok {
		return nil, nil, ErrNone
	}
	p.rate = group
	switch at := slices.Index(header, time); {
	case time != "" && at < 0:
		return nil, nil, fmt.Errorf("no column is called %q", time)
	case time != "":
		p.time = at
	case found.Time == nil:
		return nil, nil, errors.New("no column is called time; name the one with the time stamps with --time")
	default:
		p.time, p.unit = found.Time.Column, found.Time.Unit
	}
	if p.unit == "" && topic(header, header[p.time]) {
		p.unit = "ns"
	}
	for _, i := range append(append(p.quaternion[:], p.rate[:]...), p.time) {
		l.Columns = append(l.Columns, header[i])
	}
	l.Claim = identify.SeriesClaim{Scalar: l.Quaternion.Claims.Scalar(), Unit: rateUnit(header[p.rate[0]])}
	return l, p, nil
}

var (
	speaksOfRate = regexp.MustCompile(`(?i)(angular_?vel|ang_?vel|angular_?rate|gyro|omega|(^|[^a-z])rates?([^a-z]|$))`)
	notRate      = regexp.MustCompile(`(?i)bias|cov|std|sigma|var|noise|temp|accel|quat`)
	component    = regexp.MustCompile(`(?i)([._ \[]?)([xyz])(\]?)\s*([\[(].*[\])])?$`)
)

// rateColumns finds three columns x, y, z of one angular rate. It reports
// false for none, and for several, of which nothing says which belongs to the
// orientation.
func rateColumns(header []string) ([3]int, bool) {
	groups := map[string]*[3]int{}
	for i, h := range header {
		m := component.FindStringSubmatchIndex(h)
		if m == nil || !speaksOfRate.MatchString(h) || notRate.MatchString(h) {
			continue
		}
		stem := h[:m[0]]
		if groups[stem] == nil {
			groups[stem] = &[3]int{-1, -1, -1}
		}
		groups[stem][strings.Index("xyz", strings.ToLower(h[m[4]:m[5]]))] = i
	}
	var only [3]int
	n := 0
	for _, g := range groups {
		if g[0] >= 0 && g[1] >= 0 && g[2] >= 0 {
			only = *g
			n++
		}
	}
	return only, n == 1
}

var (
	degreesPerSecond = regexp.MustCompile(`(?i)deg(rees?)?\s*(/|per|_p?)?\s*s|dps|°`)
	radiansPerSecond = regexp.MustCompile(`(?i)rad(ians?)?\s*(/|per|_p?)?\s*s`)
)

// rateUnit is the unit of angle that the name of a rate states.
func rateUnit(name string) convention.Unit {
	switch {
	case degreesPerSecond.MatchString(name):
		return convention.Degree
	case radiansPerSecond.MatchString(name):
		return convention.Radian
	}
	return convention.UnitUnstated
}

// topic reports whether the log is a topic printed by a robot's tools, whose
// columns are called field.something and whose time is in nanoseconds (common
// practice, no source).
func topic(header []string, time string) bool {
	return time == "time" && slices.ContainsFunc(header, func(h string) bool { return strings.HasPrefix(h, "field.") })
}

// perSecond is how many units of a time stamp make a second. Where the name of
// the column does not say, stamps that big are nanoseconds, microseconds or
// milliseconds since 1970; seconds are 1e9 to 2e9 then.
func perSecond(unit string, first float64) float64 {
	switch a := math.Abs(first); {
	case unit == "ns" || unit == "" && a > 1e17:
		return 1e9
	case unit == "us" || unit == "" && a > 1e14:
		return 1e6
	case unit == "ms" || unit == "" && a > 1e11:
		return 1e3
	}
	return 1
}
