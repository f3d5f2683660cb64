// Package found is how the passes over Go functions return what they found.
//
// A pass makes findings of package rules, which the audit of a tree takes as its
// result. For checkers that know diagnostics only, such as go vet, the same findings
// are reported as diagnostics; one adapter for all passes, here.
package found

import (
	"cmp"
	"fmt"
	"go/ast"
	"go/token"
	"reflect"
	"slices"
	"strings"

	"golang.org/x/tools/go/analysis"

	"dextral/analyzers/source"
	"dextral/rules"
)

// Result is what a pass returns.
type Result struct{ Findings []*rules.Finding }

// Type is the ResultType of such a pass.
var Type = reflect.TypeFor[*Result]()

// Collector gathers the findings of one pass over one package.
type Collector struct {
	pass    *analysis.Pass
	sources map[*token.File]*source.File
	list    []located
}

type located struct {
	*rules.Finding
	from, to token.Pos
}

// In makes a collector.
func In(pass *analysis.Pass) *Collector {
	return &Collector{pass: pass, sources: map[*token.File]*source.File{}}
}

// Place is a stretch of the program's text. Line comments that claim another file
// are not followed: the audit names files that it was given.
func (c *Collector) Place(from, to token.Pos) rules.Place {
	file := c.pass.Fset.File(from)
	if file == nil {
		return rules.Place{}
	}
	f := c.sources[file]
	if f == nil {
		text, err := c.pass.ReadFile(file.Name())
		if err != nil || len(text) < file.Size() {
			text = []byte(strings.Repeat(" ", file.Size())) // gone since it was parsed
		}
		f = source.New(file.Name(), text)
		c.sources[file] = f
	}
	start := min(max(file.Offset(from), 0), file.Size())
	end := min(max(int(to)-file.Base(), start), file.Size())
	return f.Place(source.Span{From: start, To: end})
}

// At is the place of a node.
func (c *Collector) At(n ast.Node) rules.Place { return c.Place(n.Pos(), n.End()) }

// Add takes a finding at a node, whose place it gets.
func (c *Collector) Add(f *rules.Finding, n ast.Node) {
	f.Place = c.At(n)
	c.list = append(c.list, located{f, n.Pos(), n.End()})
}

// Done reports the findings as diagnostics and returns them, both in the order of
// their places.
func (c *Collector) Done() (any, error) {
	slices.SortStableFunc(c.list, func(a, b located) int {
		return cmp.Or(cmp.Compare(a.from, b.from), cmp.Compare(a.Rule, b.Rule), cmp.Compare(a.Message, b.Message))
	})
	r := &Result{}
	for _, f := range c.list {
		r.Findings = append(r.Findings, f.Finding)
		if f.Level == rules.Note {
			continue // worth knowing, and no diagnostic
		}
		c.pass.Report(analysis.Diagnostic{Pos: f.from, End: f.to, Category: f.Rule, Message: fmt.Sprintf("%s: %s", f.Rule, f.Message)})
	}
	return r, nil
}
