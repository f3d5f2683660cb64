package mixed

import (
	_ "embed" // of the package's essay
	"fmt"
	"slices"

	"golang.org/x/tools/go/analysis"

	"dextral/analyzers/gosource/doc"
	"dextral/analyzers/gosource/found"
	"dextral/analyzers/gosource/measure"
	"dextral/core/operation"
	"dextral/rules"
)

//go:embed doc.go
var essay string

// Analyzer reports functions that store a type otherwise than the others.
var Analyzer = &analysis.Analyzer{
	Name:       "mixed",
	Doc:        doc.Section(essay),
	Run:        run,
	Requires:   []*analysis.Analyzer{measure.Analyzer},
	ResultType: found.Type,
}

// enough is how many other functions have to agree with each other before the odd one
// is held to be the odd one.
const enough = 2

func run(pass *analysis.Pass) (any, error) {
	measured := pass.ResultOf[measure.Analyzer].(*measure.Result)
	c := found.In(pass)
	for _, t := range measured.Types {
		agree := 0
		for _, f := range t.Rotational {
			if !slices.Contains(t.Outliers, f) {
				agree++
			}
		}
		if t.Kind != operation.Quaternion || len(t.Orders) != 1 || agree < enough || len(t.Outliers) >= agree {
			continue
		}
		for _, f := range t.Outliers {
			if f.Decl == nil {
				continue
			}
			for _, s := range f.Cases {
				order, ok := orderIn(s, t.Name)
				if !ok || order == t.Orders[0] {
					continue
				}
				c.Add(&rules.Finding{Rule: rules.ConventionsMixed, Level: rules.Warning, Key: f.Key(),
					Message: fmt.Sprintf("%s computes the %s with %s stored as %s; %d other functions of the package have it as %s",
						f.Label(s), s.Identity.Readings[0].Op, t.Object.Name(), order, agree, t.Orders[0]),
					Claim: "one storage order for " + t.Object.Name(),
					Evidence: []rules.Evidence{{What: "order of the numbers", Stated: rules.Words(t.Orders[0].String()), Computed: rules.Words(order.String())},
						{What: "it computes", Computed: rules.Words(s.Identity.Readings[0].String())}},
					Remedy: "look for fields or indices that changed places in this function"}, f.Decl.Name)
				break
			}
		}
	}
	return c.Done()
}

// orderIn is where a case has the numbers of a type, if that is known.
func orderIn(c *measure.Case, name string) (operation.Order, bool) {
	if !c.Identity.Known() || len(c.Identity.Readings) != 1 {
		return operation.Order{}, false
	}
	at := 0
	for _, list := range [][]measure.Operand{c.In, c.Out} {
		for _, o := range list {
			if o.Kind != operation.Quaternion {
				continue
			}
			if orders := c.Identity.Readings[0].Orders; o.Type == name && at < len(orders) {
				return orders[at], true
			}
			at++
		}
	}
	return operation.Order{}, false
}
