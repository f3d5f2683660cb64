package main

import (
	"bytes"
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"runtime"

	"dextral/analyzers/series"
	"dextral/core/identify"
	"dextral/rules"
	"dextral/rules/report"
)

// openLog reads a file as a log. It reports false if the file is none.
func openLog(ctx context.Context, path, time string) (r series.Result, ok bool, err error) {
	f, err := os.Open(path)
	if err != nil {
		return r, false, nil // the audit of the file says why
	}
	defer f.Close()
	head := make([]byte, series.HeadSize)
	n, err := io.ReadFull(f, head)
	if err != nil && err != io.ErrUnexpectedEOF {
		return r, false, nil
	}
	if kind := series.Recognise(path, head[:n]); kind.None() || !kind.Readable {
		return r, false, nil
	}
	r, err = series.Read(ctx, path, io.MultiReader(bytes.NewReader(head[:n]), f), series.Options{Time: time, Workers: runtime.GOMAXPROCS(0)})
	if err != nil {
		err = fmt.Errorf("%s: %w", path, err)
	}
	return r, true, err
}

// identifyLog reads a file as a log with angular rates. It is not done if the
// file is none.
func identifyLog(ctx context.Context, s streams, path, time string) (done bool, err error) {
	r, ok, err := openLog(ctx, path, time)
	switch {
	case !ok:
		return false, nil
	case err != nil:
		return true, err
	case time != "" && r.Clock == nil:
		return true, fmt.Errorf("%s: no column of numbers is called %q", path, time)
	case r.RatesWithoutTime:
		return true, errors.New(path + ": no column is called time; name the one with the time stamps with --time")
	}
	worst := exitClean
	for _, c := range r.Channels {
		if c.Rates == nil {
			continue
		}
		if done {
			fmt.Fprintln(s.out)
		}
		done = true
		if err := report.IdentifiedSeries(s.out, c); err != nil {
			return true, err
		}
		if code := seriesStatus(c.Rates); worst == exitClean || code == exitFindings {
			worst = code
		}
	}
	if worst != exitClean {
		return true, status(worst)
	}
	return done, nil
}

func seriesStatus(r *rules.Rates) int {
	switch {
	case len(r.Stretches) > 1:
		return exitFindings
	case r.Result.Verdict == identify.Agree:
		return exitClean
	case r.Result.Verdict == identify.Undecided:
		return exitUndecided
	}
	return exitFindings
}
