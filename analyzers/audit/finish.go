package audit

import (
	"path"
	"slices"
	"strings"

	"dextral/core/convention"
	"dextral/rules"
	"dextral/rules/policy"
	"dextral/rules/report"
)

// count adds one file to what was audited.
func (a *audit) count(f *found) {
	out := &a.result.Report
	switch f.kind {
	case configFile, logFile:
		out.Audited.Files++
	case unreadable:
		// counted by name, in finish
	case binary:
		out.LeftOut.NotText++
	case other:
		out.LeftOut.Other++
	}
	out.Audited.LogRows += f.rows
}

// finish applies waivers and puts everything into the order of the output.
func (a *audit) finish(o Options) {
	out := &a.result.Report
	out.LeftOut.Ignored, out.LeftOut.Excluded, out.LeftOut.Links = a.tree.Ignored, a.tree.Excluded, a.tree.Links
	for _, v := range a.result.Values {
		a.value(v)
	}
	for _, s := range a.result.Series {
		a.value(&s.Value)
	}
	slices.SortStableFunc(a.result.Values, func(v, w *rules.Value) int { return v.Place.Compare(w.Place) })
	a.result.Frames = a.frames()
	out.Gate = a.gate(o)
	out.Sort()
	a.waive(o)
	out.Sort()
}

// frames lists the frames whose axes are declared or stated, in order of place.
func (a *audit) frames() []report.Axes {
	var list []report.Axes
	for _, p := range a.tree.Policies {
		for name, f := range p.Frames() {
			list = append(list, report.Axes{Name: name, Axes: f.Triad.String(), Hand: f.Triad.Handedness(), Place: f.Place, Declared: true})
		}
	}
	for _, v := range a.result.Values {
		if hand := v.Hand(); hand != convention.HandUnstated && v.Decided() {
			list = append(list, report.Axes{Name: v.FrameName(), Axes: v.Key, Hand: hand, Place: v.Place})
		}
	}
	slices.SortFunc(list, func(a, b report.Axes) int { return a.Place.Compare(b.Place) })
	return list
}

func (a *audit) value(v *rules.Value) {
	if v.Why != "" {
		a.result.Report.Undecided = append(a.result.Report.Undecided, report.Undecided{Place: v.Place, Key: v.Key, Why: v.Why})
		return
	}
	a.result.Report.Audited.Values++
}

// covered returns a test for whether everything at or below a path was
// audited: it lies below a path that was asked for, and nothing below it
// failed.
func (a *audit) covered(asked []string) func(string) bool {
	return func(p string) bool {
		below := func(q string) bool { return inside(q, p) }
		return slices.ContainsFunc(asked, func(root string) bool { return inside(p, clean(root)) }) &&
			!slices.ContainsFunc(a.result.Report.Failed, func(f report.Failure) bool { return below(f.Place.Path) })
	}
}

func clean(p string) string { return path.Clean(strings.ReplaceAll(p, `\`, "/")) }

// inside reports whether p is dir or lies below it.
func inside(p, dir string) bool {
	return dir == "." && !strings.HasPrefix(p, "..") || p == dir || strings.HasPrefix(p, dir+"/")
}

// gate is the one asked for, or the strictest of the paths asked for.
func (a *audit) gate(o Options) policy.Gate {
	if o.GateSet {
		return o.Gate
	}
	gate := policy.GateNever
	for _, p := range a.tree.Roots {
		gate = stricter(gate, p.Gate)
	}
	if len(a.tree.Roots) == 0 {
		return policy.GateError
	}
	return gate
}

// stricter is the gate of the two that fails more.
func stricter(a, b policy.Gate) policy.Gate {
	for _, level := range []rules.Level{rules.Note, rules.Warning, rules.Error} {
		if a.Fails(level) != b.Fails(level) {
			if a.Fails(level) {
				return a
			}
			return b
		}
	}
	return a
}
