package wrongterm

import (
	_ "embed" // of the package's essay
	"fmt"
	"slices"
	"strings"

	"golang.org/x/tools/go/analysis"

	"dextral/analyzers/gosource/doc"
	"dextral/analyzers/gosource/found"
	"dextral/analyzers/gosource/measure"
	"dextral/analyzers/gosource/named"
	"dextral/core/operation"
	"dextral/rules"
)

//go:embed doc.go
var essay string

// Analyzer reports operations with a wrong term.
var Analyzer = &analysis.Analyzer{
	Name:       "wrongterm",
	Doc:        doc.Section(essay),
	Run:        run,
	Requires:   []*analysis.Analyzer{measure.Analyzer},
	ResultType: found.Type,
}

// suspect is a function that is not what it is called.
type suspect struct {
	f     *measure.Function
	c     *measure.Case
	claim named.Claim
	ask   *operation.Function
	miss  *operation.Miss
}

func run(pass *analysis.Pass) (any, error) {
	measured := pass.ResultOf[measure.Analyzer].(*measure.Result)
	var suspects []suspect
	for _, f := range measured.Funcs {
		if s, ok := examine(measured, f); ok {
			suspects = append(suspects, s)
		}
	}
	c := found.In(pass)
	for _, f := range measured.Funcs {
		if x := slip(measured, f); x != nil {
			c.Add(x, f.Decl.Name)
		}
	}
	for _, s := range suspects {
		if !blamed(s.f, suspects) {
			c.Add(s.finding(), s.f.Decl.Name)
		}
	}
	return c.Done()
}

// blamed reports whether a function calls a suspect: then that one is reported.
func blamed(f *measure.Function, suspects []suspect) bool {
	return slices.ContainsFunc(suspects, func(s suspect) bool { return s.f != f && f.Uses(s.f.Name) })
}

// examine compares a function with what it is called. Of several cases the first
// that is no known operation counts.
func examine(measured *measure.Result, f *measure.Function) (suspect, bool) {
	if len(f.Unknown) > 0 || len(f.Args) > 0 && f != measured.Of(f.Object)[0] {
		return suspect{}, false
	}
	for _, c := range f.Cases {
		for _, layout := range f.Layouts {
			try := *c
			try.Layout = layout
			claim := named.Of(f, &try)
			if !claim.Claimed() || c.Identity.Known() && (slices.ContainsFunc(claim.Ops, c.Identity.Is) || !general(c.Identity.Op())) || !measured.Orients(f, &try, claim.Ops) {
				continue
			}
			ask := f.Question(&try)
			if miss := ask.Explain(claim.Ops...); miss != nil && convincing(ask, miss) {
				return suspect{f, &try, claim, ask, miss}, true
			}
		}
	}
	return suspect{}, false
}

// general reports whether an operation is one by which nobody calls a function: a linear
// map of some kind may be any operation with a slip.
func general(op operation.Op) bool {
	switch op {
	case operation.AxisMapped, operation.LinearMap, operation.NegConjugate, operation.Negative, operation.Copy, "":
		return true
	}
	return false
}

// convincing reports whether a function is so near to an operation that it must
// have been meant.
func convincing(ask *operation.Function, m *operation.Miss) bool {
	const visible = 1e-4 // less may be an approximation
	if m.Error < visible || !generic(m) {
		return false
	}
	n := len(m.Expected[0])
	few := 2*len(m.Components) <= n || n == 3 && len(m.Components) == 1
	switch {
	case len(m.Terms) > 0:
		if m.Multiple() && m.Reading.Op.Anywhere() {
			return false // a multiple of what is no rotation is as good
		}
		return few || len(m.Terms) <= 2*len(m.Components) && (wrongTerms(m) < 0.8 || len(m.Terms) < 3)
	case m.Edit != "", m.Factor != "":
		return true
	case m.Share() >= 0.2:
		return true
	}
	return n > 3 && few || n == 3 && len(m.Components) == 1
}

// wrongTerms is the share of terms that differ among those listed with a factor:
// a result without any of the terms expected is another one.
func wrongTerms(m *operation.Miss) float64 {
	missing := 0
	for _, t := range m.Terms {
		if t.Found == 0 {
			missing++
		}
	}
	return float64(missing) / float64(len(m.Terms))
}

// generic reports whether ordinary samples differ: large angles and tiny ones have
// limits of their own, unless they are far off.
func generic(m *operation.Miss) bool {
	for i, wrong := range m.Wrong {
		if wrong && (m.Samples[i].Family == operation.Unit || m.Samples[i].Family == operation.Tiny && m.Error > 0.01) {
			return true
		}
	}
	return false
}

func (s suspect) finding() *rules.Finding {
	key := s.f.Key()
	what := s.ask.Difference(s.miss)
	if what == "" {
		what = s.components()
	}
	condition := s.condition()
	if condition != "" {
		what = "for " + condition + " " + what
	}
	message := fmt.Sprintf("%s is not quite the %s that its %s says: %s", key, s.miss.Reading.Op, speaker(s.claim.Source), what)
	if s.c.Label != "" {
		message += " (with " + s.c.Label + ")"
	}
	if angle := s.ask.Angle(s.miss); angle > 1e-6 {
		message += fmt.Sprintf("; off by up to %.3g deg", angle*180/3.141592653589793)
	}
	level := rules.Warning
	if s.miss.Multiple() && s.miss.Terms[0].Found == -1 {
		level = rules.Note // the same rotation
	} else if len(s.miss.Terms) > 0 || s.miss.Edit != "" || condition != "" {
		level = rules.Error
	}
	f := &rules.Finding{
		Rule: rules.WrongTerm, Level: level, Key: key, Message: message,
		Claim:  fmt.Sprintf("%s, by %s %q", s.miss.Reading.Op, s.claim.Source, s.claim.Word),
		Remedy: "compare the term, component or branch named with a reference and correct it, or rename the function if it means something else",
	}
	f.Evidence = s.evidence()
	return f
}

// components names the results that differ.
func (s suspect) components() string {
	var names []string
	for _, k := range s.miss.Components {
		names = append(names, s.ask.ResultName(k))
	}
	if len(names) == len(s.miss.Expected[0]) {
		return "all results differ"
	}
	return strings.Join(names, ", ") + " differ, all other results agree"
}

// condition names the branch in which all wrong samples lie, and no right one.
func (s suspect) condition() string {
	if !slices.Contains(s.miss.Wrong, false) {
		return ""
	}
	return s.f.Separates(s.miss.Samples, s.miss.Wrong)
}

func (s suspect) evidence() []rules.Evidence {
	m := s.miss
	worst := m.Samples[m.Worst]
	rows := []rules.Evidence{{
		What: m.Reading.String(), Stated: rules.Words("by " + s.claim.Source.String() + " " + s.claim.Word),
		Computed: rules.Words(fmt.Sprintf("agrees in %.0f %% of the samples", 100*m.Share())), Residual: rules.Plain(m.Error),
	}, {What: "sample: " + s.f.Inputs(s.c, worst.In)}}
	for _, k := range m.Components[:min(len(m.Components), 4)] {
		rows = append(rows, rules.Evidence{
			What: s.ask.ResultName(k), Stated: rules.Plain(m.Expected[m.Worst][k]), Computed: rules.Plain(worst.Out[k]),
			Residual: rules.Plain(worst.Out[k] - m.Expected[m.Worst][k]),
		})
	}
	return rows
}
