// Package audit reads a whole tree and judges it.
//
// The files of the tree are read in parallel, each by the reader of its kind;
// Go files go to package gosource, which reads them package by package. What
// the readers found is then put in order, declared upon by the nearest
// dextral.toml, and handed to the rules: values file by file, and across the
// files of a rig. Everything that could not be read is part of the result;
// nothing stops the audit of the rest. The same tree gives the same result to
// the byte, whatever the number of processors.
package audit

import (
	"context"
	"errors"
	"fmt"
	"maps"
	"os"
	"runtime"
	"slices"
	"sync"
	"time"

	"dextral/analyzers/gosource"
	"dextral/analyzers/rewrite"
	"dextral/analyzers/source"
	"dextral/analyzers/walk"
	"dextral/rules"
	"dextral/rules/policy"
	"dextral/rules/report"
)

// Options say what to audit.
type Options struct {
	Paths   []string    // files and directories; none: the working directory
	Today   time.Time   // the day on which waivers are held against
	Gate    policy.Gate // used if GateSet; else that of the nearest dextral.toml of the first path
	GateSet bool
	Workers int // files read at a time, and blocks of a big log; 0: as many as there are processors
	// Progress is told how many bytes of a big log have been read, of how many, from
	// several goroutines at a time; nil if nobody wants to know.
	Progress func(path string, done, of int64)
}

// Result is an audit with the values it rests on.
type Result struct {
	Report report.Report
	Values []*rules.Value  // of files and Go packages, in order of place
	Series []*rules.Series // channels of logs, in order of place
	Frames []report.Axes   // frames whose axes are declared or stated, in order of place
	Chains []*rules.Chain  // frames and what joins them, file by file, then rig by rig

	Sums map[string]rewrite.Sum // of the texts of files with edits, as they were read
}

// Run audits. Everything that goes wrong is part of the result, but a cancelled
// context while the tree is listed. If it is cancelled later, the result is what was found so
// far, and says so.
func Run(ctx context.Context, o Options) (*Result, error) {
	if len(o.Paths) == 0 {
		o.Paths = []string{"."}
	}
	tree, err := walk.List(ctx, o.Paths)
	if err != nil {
		return nil, err
	}
	return Tree(ctx, tree, o)
}

// Tree audits files that were listed by other means, each under its printed
// path, such as those of a revision that is not checked out.
func Tree(ctx context.Context, tree *walk.Tree, o Options) (*Result, error) {
	a := &audit{result: &Result{}, tree: tree, policies: map[string]*policy.Policy{}}
	for _, f := range tree.Files {
		a.policies[f.Path] = f.Policy
	}
	for _, f := range tree.Failed {
		a.fail(f.Place, f.Err)
	}
	found, err := a.read(ctx, o)
	if err != nil {
		return nil, err
	}
	a.judge(found)
	a.finish(o)
	return a.result, nil
}

type audit struct {
	result   *Result
	tree     *walk.Tree
	policies map[string]*policy.Policy // by printed path
	beside   []*policy.Beside
}

// found is what the readers made of one file.
type found struct {
	kind     kind
	values   []*rules.Value
	series   []*rules.Series
	pairs    []*rules.SeriesPair
	findings []*rules.Finding // on functions
	beside   []*policy.Beside // waivers
	rows     int64
	sum      rewrite.Sum      // of a configuration file
	skipped  []report.Skipped // unreadable files
	failures []report.Failure
	limited  []report.Failure // what was read only in part
}

// read reads all files. The list is in the order of the tree; Go files, which
// are read together, come last.
func (a *audit) read(ctx context.Context, o Options) ([]*found, error) {
	if o.Workers <= 0 {
		o.Workers = runtime.GOMAXPROCS(0)
	}
	list := make([]*found, len(a.tree.Files)+1)
	next := make(chan int)
	var pool sync.WaitGroup
	for range o.Workers {
		pool.Go(func() {
			for i := range next {
				list[i] = readFile(ctx, a.tree.Files[i], &o)
			}
		})
	}
	var goFiles []gosource.File
	for i, f := range a.tree.Files {
		if kindOf(f.Name) == goFile {
			goFiles = append(goFiles, gosource.File{Path: f.Path, Name: f.Name})
			continue
		}
		next <- i
	}
	close(next)
	pool.Wait()
	code, err := a.readGo(ctx, goFiles)
	if ctx.Err() != nil {
		code, err = &found{failures: []report.Failure{interrupted(list, len(goFiles))}}, nil
	}
	list[len(list)-1] = code
	return slices.DeleteFunc(list, func(f *found) bool { return f == nil }), err
}

// readFile reads one file that is not Go. A reader that panics has a mistake
// of its own; it costs that file, not the audit.
func readFile(ctx context.Context, f walk.File, o *Options) (result *found) {
	if ctx.Err() != nil {
		return nil
	}
	defer func() {
		if p := recover(); p != nil {
			result = &found{failures: []report.Failure{{Place: rules.Place{Path: f.Path},
				Message: fmt.Sprintf("the reader failed on this file, which is a mistake in dextral: %v", p)}}}
		}
	}()
	return readerOf(f)(ctx, f, o)
}

// interrupted says how much was not read.
func interrupted(list []*found, goFiles int) report.Failure {
	left := goFiles
	for _, f := range list[:len(list)-1] {
		if f == nil {
			left++
		}
	}
	left -= goFiles // those stand in the list without a reader
	return report.Failure{Message: fmt.Sprintf("interrupted: %d files and %d Go files were not read; what was read until then was audited", left, goFiles)}
}

func (a *audit) readGo(ctx context.Context, files []gosource.File) (*found, error) {
	if len(files) == 0 {
		return nil, nil
	}
	r, err := gosource.Load(ctx, files)
	if err != nil {
		return nil, err
	}
	a.result.Report.Audited.GoPackages = r.Packages
	a.result.Report.Audited.GoFiles = r.Files
	code := &found{kind: goFile, values: r.Values, findings: r.Findings}
	code.waiversInGo(files)
	for _, f := range r.Failures {
		failed := report.Failure{Place: f.Place, Message: f.Err.Error()}
		if f.Partial {
			code.limited = append(code.limited, failed)
		} else {
			code.failures = append(code.failures, failed)
		}
	}
	return code, nil
}

// judge declares, checks and waives.
func (a *audit) judge(list []*found) {
	out := &a.result.Report
	rigs := map[string][]*rules.Value{}
	for _, f := range list {
		out.Failed = append(out.Failed, f.failures...)
		out.Limited = append(out.Limited, f.limited...)
		out.Unreadable = append(out.Unreadable, f.skipped...)
		a.count(f)
		a.beside = append(a.beside, f.beside...)
		for _, v := range f.values {
			p := a.policyOf(v.Place.Path)
			if f.kind != logFile { // a log is declared upon while it is read
				p.Declare(v)
			}
			if rig := p.RigOf(v.Place.Path); rig != "" {
				rigs[p.Path+"#"+rig] = append(rigs[p.Path+"#"+rig], v)
			}
		}
		out.Findings = append(out.Findings, f.findings...)
		out.Findings = append(out.Findings, a.edits(f, rules.CheckValues(f.values))...)
		for _, chain := range chains(f) {
			a.result.Chains = append(a.result.Chains, chain)
			out.Findings = append(out.Findings, rules.CheckChain(chain)...)
			out.Findings = append(out.Findings, rules.CheckParents(chain)...)
		}
		for _, s := range f.series {
			out.Findings = append(out.Findings, rules.CheckSeries(s)...)
		}
		for i, s := range f.series {
			if i == 0 || s.Clock != f.series[i-1].Clock { // the channels of a log share one
				out.Findings = append(out.Findings, rules.CheckClock(s)...)
			}
		}
		for _, p := range f.pairs {
			out.Findings = append(out.Findings, rules.CheckPair(p)...)
		}
		a.result.Values = append(a.result.Values, f.values...)
		a.result.Series = append(a.result.Series, f.series...)
	}
	for _, name := range slices.Sorted(maps.Keys(rigs)) {
		out.Findings = append(out.Findings, rules.CheckRigHands(rigs[name])...)
		if rig := rules.NewRig(rigs[name]); rig != nil {
			a.result.Chains = append(a.result.Chains, rig)
			out.Findings = append(out.Findings, rules.CheckChain(rig)...)
			out.Findings = append(out.Findings, rules.CheckParents(rig)...)
		}
	}
}

// edits keeps the edits of findings in configuration files, whose numbers stand in
// the text as they are, and drops those of others: a number in code may be an
// expression, and a log is a record.
func (a *audit) edits(f *found, findings []*rules.Finding) []*rules.Finding {
	for _, finding := range findings {
		switch {
		case f.kind != configFile:
			finding.Edit = nil
		case finding.Edit != nil:
			if a.result.Sums == nil {
				a.result.Sums = map[string]rewrite.Sum{}
			}
			a.result.Sums[finding.Place.Path] = f.sum
		}
	}
	return findings
}

// policyOf is the policy of a file. Files that were not listed by the walk,
// such as one that a Go package pulled in, have the default one.
func (a *audit) policyOf(path string) *policy.Policy {
	if p := a.policies[path]; p != nil {
		return p
	}
	return policy.Default()
}

func (a *audit) fail(at rules.Place, err error) {
	a.result.Report.Failed = append(a.result.Report.Failed, failure(at, err))
}

// failure gives an error its place: its own, if it has one.
func failure(at rules.Place, err error) report.Failure {
	var placed *source.Error
	if errors.As(err, &placed) {
		return report.Failure{Place: placed.Place, Message: placed.Problem + "; " + placed.Remedy}
	}
	var pathErr *os.PathError
	if errors.As(err, &pathErr) {
		err = pathErr.Err // the place names the path already
	}
	return report.Failure{Place: at, Message: err.Error()}
}
