package audit

import (
	"bytes"
	"errors"
	"go/scanner"
	"go/token"
	"math"
	"os"
	"strings"

	"dextral/analyzers/gosource"
	"dextral/analyzers/source"
	"dextral/rules"
	"dextral/rules/policy"
	"dextral/rules/report"
)

// waive applies the waivers of every policy and those beside the values.
func (a *audit) waive(o Options) {
	out := &a.result.Report
	keys := map[rules.Place]int{} // the line of a value's key
	for _, v := range a.result.Values {
		if v.KeyAt.Line > 0 {
			keys[v.Place] = v.KeyAt.Line
		}
	}
	lines := func(f *rules.Finding) (first, last int) {
		first, last = f.Place.Line, max(f.Place.Line, f.Place.EndLine)
		if key, ok := keys[f.Place]; ok {
			first, last = min(first, key), max(last, key)
		}
		return first, last
	}
	groups := map[*policy.Policy]*governed{}
	order := a.tree.Policies
	under := func(path string) *governed {
		p := a.policyOf(path)
		if groups[p] == nil {
			groups[p] = &governed{}
			if p.Path == "" {
				order = append(order[:len(order):len(order)], p)
			}
		}
		return groups[p]
	}
	for _, f := range out.Findings {
		g := under(f.Place.Path)
		g.findings = append(g.findings, f)
	}
	for _, b := range a.beside {
		g := under(b.At.Path)
		g.beside = append(g.beside, b)
	}
	for _, p := range order {
		g := groups[p]
		if g == nil {
			g = &governed{}
		}
		scope := policy.Scope{Today: o.Today, Beside: g.beside, Covered: a.covered(o.Paths), Lines: lines}
		out.Findings = append(out.Findings, p.Waive(g.findings, scope)...)
	}
}

// governed is what one policy judges.
type governed struct {
	findings []*rules.Finding
	beside   []*policy.Beside
}

// waiversIn reads the comments of a file that speak to dextral.
func (f *found) waiversIn(directives []source.Directive) {
	for _, d := range directives {
		b, err := policy.ParseBeside(d.Text, d.Place, rules.Names())
		if err != nil {
			f.failures = append(f.failures, failures(err)...)
			continue
		}
		b.First, b.Last = d.First, d.Last
		f.beside = append(f.beside, b)
	}
}

func failures(err error) []report.Failure {
	var all []report.Failure
	var errs policy.Errors
	if errors.As(err, &errs) {
		for _, e := range errs {
			all = append(all, report.Failure{Place: e.Place, Message: e.Message})
		}
	}
	return all
}

// waiversInHead reads those of a log: comment lines above its header, which
// speak of all of it.
func (f *found) waiversInHead(path string, head []byte) {
	if !bytes.Contains(head, []byte(mark)) {
		return
	}
	text := source.New(path, head)
	directives := text.Directives(text.HeadComments("#", "%", "//", ";"), policy.Addresses)
	for i := range directives {
		directives[i].First, directives[i].Last = 1, math.MaxInt
	}
	f.waiversIn(directives)
}

// mark is in every comment that speaks to dextral.
const mark = "dextral:"

// waiversInGo reads the directives of Go files.
func (f *found) waiversInGo(files []gosource.File) {
	for _, file := range files {
		text, err := os.ReadFile(file.Name)
		if err != nil || !bytes.Contains(text, []byte(mark)) {
			continue // the reader of Go files has said what cannot be read
		}
		indexed := source.New(file.Path, text)
		comments := goComments(text)
		for _, c := range comments {
			if rest, blank := strings.CutPrefix(c.Text, " "); blank && policy.Addresses(strings.TrimSpace(rest)) {
				f.failures = append(f.failures, report.Failure{Place: indexed.Place(c.Span),
					Message: "in Go a comment that speaks to dextral is a directive; write //dextral:waive without a blank before it"})
			}
		}
		f.waiversIn(indexed.Directives(comments, policy.Addresses))
	}
}

// goComments are the // comments of a Go file, behind their marks.
func goComments(text []byte) []source.Comment {
	var found []source.Comment
	fset := token.NewFileSet()
	file := fset.AddFile("", -1, len(text))
	var s scanner.Scanner
	s.Init(file, text, nil, scanner.ScanComments)
	for {
		pos, tok, lit := s.Scan()
		if tok == token.EOF {
			return found
		}
		if tok == token.COMMENT && strings.HasPrefix(lit, "//") {
			from := file.Offset(pos)
			found = append(found, source.Comment{Span: source.Span{From: from, To: from + len(lit)}, Text: strings.TrimRight(lit[2:], " \t\r")})
		}
	}
}
