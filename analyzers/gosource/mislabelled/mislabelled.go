package mislabelled

import (
	_ "embed" // of the package's essay
	"fmt"
	"slices"

	"golang.org/x/tools/go/analysis"

	"dextral/analyzers/claims"
	"dextral/analyzers/gosource/doc"
	"dextral/analyzers/gosource/found"
	"dextral/analyzers/gosource/measure"
	"dextral/core/operation"
	"dextral/rules"
)

//go:embed doc.go
var essay string

// Analyzer reports functions that contradict their labels.
var Analyzer = &analysis.Analyzer{
	Name:       "mislabelled",
	Doc:        doc.Section(essay),
	Run:        run,
	Requires:   []*analysis.Analyzer{measure.Analyzer},
	ResultType: found.Type,
}

// contradiction is a statement with what is measured instead.
type contradiction struct {
	subject  string // "angle sequence"
	stated   string // as written
	by       rules.Source
	measured string
	effect   string // "by up to 90 deg", or ""
}

// checks compare one setting of a function with what is written about it.
var checks = []func(*function) *contradiction{(*function).sequence, (*function).roles, (*function).unit, (*function).algebra, (*function).direction, (*function).other}

// function is a setting of a function that computes a known operation, with what is
// said of it.
type function struct {
	*measure.Function
	c        *measure.Case
	measured *measure.Result
	comment  *claims.Comment // nil if there is none, or it cannot be told which setting it speaks of
}

func run(pass *analysis.Pass) (any, error) {
	measured := pass.ResultOf[measure.Analyzer].(*measure.Result)
	c := found.In(pass)
	for _, f := range measured.Funcs {
		if f.Decl == nil || len(f.Args) > 0 && f != measured.Of(f.Object)[0] || len(f.Unknown) > 0 {
			continue
		}
		if x := examine(measured, f); x != nil {
			c.Add(x, f.Decl.Name)
		}
	}
	for _, t := range scalarPlaces(pass, measured) {
		c.Add(t.finding, t.at)
	}
	return c.Done()
}

// examine returns the first contradiction of a function.
func examine(measured *measure.Result, f *measure.Function) *rules.Finding {
	for _, c := range f.Cases {
		if !c.Identity.Known() {
			continue
		}
		x := &function{Function: f, c: c, measured: measured}
		if f.Decl.Doc != nil && len(f.Cases) == 1 {
			x.comment = claims.ReadComment(f.Decl.Doc.Text())
		}
		for _, check := range checks {
			if contrary := check(x); contrary != nil {
				return contrary.finding(x)
			}
		}
	}
	return nil
}

// one is the reading, if the samples leave only one; storage does not count.
func (f *function) one() (operation.Reading, bool) {
	all := f.c.Identity.Readings
	same := !slices.ContainsFunc(all, func(r operation.Reading) bool { return r.String() != all[0].String() })
	return all[0], same
}

func (x *contradiction) finding(f *function) *rules.Finding {
	level := rules.Warning
	if x.by.Stated() {
		level = rules.Error
	}
	message := fmt.Sprintf("%s computes %s; its %s %s", f.Label(f.c), x.measured, x.speaks(), x.stated)
	if x.effect != "" {
		message += "; " + x.effect
	}
	return &rules.Finding{
		Rule: rules.FunctionMislabelled, Level: level, Key: f.Key(), Message: message,
		Claim:  fmt.Sprintf("%s: %s, by %s", x.subject, x.stated, said(x.by)),
		Remedy: "make the words and the formula agree; what calls this function relies on one of them",
		Evidence: []rules.Evidence{{
			What: x.subject, Stated: rules.Words(x.stated), Computed: rules.Words(x.measured), Residual: rules.Plain(f.c.Identity.Residual),
		}},
	}
}

func (x *contradiction) speaks() string {
	if x.subject == "axes of the angles" {
		return "parameters say"
	}
	return said(x.by) + " says"
}

func said(by rules.Source) string {
	switch by {
	case rules.Comment:
		return "comment"
	}
	return "name"
}
