package norm

import (
	_ "embed" // of the package's essay
	"fmt"
	"go/ast"
	"math"
	"regexp"

	"golang.org/x/tools/go/analysis"

	"dextral/analyzers/gosource/doc"
	"dextral/analyzers/gosource/found"
	"dextral/analyzers/gosource/measure"
	"dextral/core/operation"
	"dextral/rules"
)

//go:embed doc.go
var essay string

// Analyzer reports functions that are right for unit quaternions only and do not say
// so.
var Analyzer = &analysis.Analyzer{
	Name:       "norm",
	Doc:        doc.Section(essay),
	Run:        run,
	Requires:   []*analysis.Analyzer{measure.Analyzer},
	ResultType: found.Type,
}

var (
	inverse = regexp.MustCompile(`(?i)inv`)
	said    = regexp.MustCompile(`(?i)unit|normali[sz]|norm |versor|conjugate`)
)

func run(pass *analysis.Pass) (any, error) {
	measured := pass.ResultOf[measure.Analyzer].(*measure.Result)
	c := found.In(pass)
	for _, f := range measured.Funcs {
		if f.Decl == nil || f.Decl.Doc != nil && said.MatchString(f.Decl.Doc.Text()) || typeSays(pass, f) {
			continue
		}
		for _, s := range f.Cases {
			if out := judge(measured, f, s); out != nil {
				c.Add(out, f.Decl.Name)
				break
			}
		}
	}
	return c.Done()
}

func judge(r *measure.Result, f *measure.Function, c *measure.Case) *rules.Finding {
	switch op := c.Identity.Op(); {
	case op == operation.Conjugate && inverse.MatchString(f.Object.Name()) && len(c.In) == 1 && others(r, c.In[0].Type) != "":
		return &rules.Finding{Rule: rules.NormNotKept, Level: rules.Warning, Key: f.Key(),
			Message: fmt.Sprintf("%s is called inverse and computes the conjugate, which is the inverse of unit quaternions only; %s shows that the package has others: of a quaternion of norm 2 the product with it is 4, not 1",
				f.Label(c), others(r, c.In[0].Type)),
			Claim:    "the inverse, by name",
			Evidence: []rules.Evidence{{What: "norm of q times its inverse, for |q| = 2", Stated: rules.Plain(1), Computed: rules.Plain(4), Residual: rules.Plain(3)}},
			Remedy:   "divide by the square of the norm, or say that the quaternion has to be a unit one"}
	case op == operation.Step && c.Identity.Readings[0].Detail == "first order":
		const angle, steps = 0.01, 1000
		growth := math.Pow(1+angle*angle/4, steps/2.0)
		return &rules.Finding{Rule: rules.NormNotKept, Level: rules.Warning, Key: f.Key(),
			Message: fmt.Sprintf("%s integrates to first order and does not normalise: after %d steps of %g rad the norm has grown to %.4f",
				f.Label(c), steps, angle, growth),
			Claim:    "a unit quaternion after the step",
			Evidence: []rules.Evidence{{What: fmt.Sprintf("norm after %d steps of %g rad", steps, angle), Stated: rules.Plain(1), Computed: rules.Plain(growth), Residual: rules.Plain(growth - 1)}},
			Remedy:   "multiply by the exponential of the step, or normalise after it; or say in the comment that the caller does"}
	}
	return nil
}

// others names a function by which the package makes quaternions of any norm, or
// measures or corrects theirs.
func others(r *measure.Result, name string) string {
	for _, f := range r.Funcs {
		for _, c := range f.Cases {
			if len(c.In) == 0 || c.In[0].Type != name || f.Decl == nil {
				continue
			}
			switch c.Identity.Op() {
			case operation.Normalise, operation.Scaled, operation.Sum, operation.Exponential, operation.Inverse:
				return f.Key()
			}
		}
	}
	return ""
}

// typeSays reports whether the comment of the function's quaternion type speaks of
// unit norm.
func typeSays(pass *analysis.Pass, f *measure.Function) bool {
	for _, file := range pass.Files {
		for _, d := range file.Decls {
			g, ok := d.(*ast.GenDecl)
			if !ok {
				continue
			}
			for _, s := range g.Specs {
				t, ok := s.(*ast.TypeSpec)
				if !ok || !uses(pass, f, t) {
					continue
				}
				if g.Doc != nil && said.MatchString(g.Doc.Text()) || t.Doc != nil && said.MatchString(t.Doc.Text()) {
					return true
				}
			}
		}
	}
	return false
}

func uses(pass *analysis.Pass, f *measure.Function, t *ast.TypeSpec) bool {
	for _, o := range f.In {
		if o.Type == pass.Pkg.Path()+"."+t.Name.Name {
			return true
		}
	}
	return false
}
