package singular

import (
	"cmp"
	_ "embed" // of the package's essay
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"golang.org/x/tools/go/analysis"

	"dextral/analyzers/gosource/doc"
	"dextral/analyzers/gosource/found"
	"dextral/analyzers/gosource/measure"
	"dextral/core/operation"
	"dextral/rules"
)

//go:embed doc.go
var essay string

// Analyzer reports functions that fail at singular points.
var Analyzer = &analysis.Analyzer{
	Name:       "singular",
	Doc:        doc.Section(essay),
	Run:        run,
	Requires:   []*analysis.Analyzer{measure.Analyzer},
	ResultType: found.Type,
}

func run(pass *analysis.Pass) (any, error) {
	measured := pass.ResultOf[measure.Analyzer].(*measure.Result)
	c := found.In(pass)
	for _, f := range measured.Funcs {
		if f.Decl == nil {
			continue
		}
		for _, s := range f.Cases {
			if p := examine(f, s); p != nil {
				c.Add(p.finding(f, s), f.Decl.Name)
				break // one setting is enough
			}
		}
	}
	return c.Done()
}

// perEdge is how many samples are drawn at each singular place: about half of those
// at gimbal lock exceed one by rounding.
const perEdge = 8

// noticeable is the error of a result of size one that is worth a finding. Some
// authors change the formula within a tenth of a degree of a singular point and so
// are off by less; common practice, no source.
const noticeable = 2e-3

// failure is the worst that was seen of one function.
type failure struct {
	sample operation.Sample
	nan    bool
	miss   float64
	same   int // samples that failed alike
	of     int // samples at singular points
}

// examine evaluates one setting of a function and returns how it fails, or nil.
func examine(f *measure.Function, c *measure.Case) *failure {
	if !c.Identity.Known() || !defined[c.Identity.Op()] {
		return nil
	}
	q := f.Question(c)
	samples := append(valid(q, c.Identity), operation.Brink(q.In, perEdge)...)
	f.Evaluate(c, samples)
	var worst *failure
	of, same := 0, 0
	for _, s := range samples {
		if !s.OK { // an error or a panic is an honest answer
			continue
		}
		if undetermined(c.Identity, s) && (finite(s.Out) || c.Identity.Is(operation.Exponential)) {
			continue
		}
		p := judge(q, c, s)
		of++
		if p == nil {
			continue
		}
		same++
		if worst == nil || cmp.Or(compareBool(p.nan, worst.nan), cmp.Compare(p.miss, worst.miss)) > 0 {
			worst = p
		}
	}
	if worst != nil {
		worst.of, worst.same = of, same
	}
	return worst
}

func finite(list []float64) bool {
	return !slices.ContainsFunc(list, func(x float64) bool { return math.IsNaN(x) || math.IsInf(x, 0) })
}

func compareBool(a, b bool) int {
	switch {
	case a == b:
		return 0
	case a:
		return 1
	}
	return -1
}

// defined are the operations that have a value at every valid input, and what may
// not be: a Gibbs vector is infinite for a half turn, and so on.
var defined = map[operation.Op]bool{
	operation.ToMatrix: true, operation.FromMatrix: true, operation.AnglesOf: true, operation.FromAngles: true,
	operation.FromAxisAngle: true, operation.AxisAngleOf: true, operation.RotvecOf: true, operation.FromRotvec: true,
	operation.RotateVector: true, operation.Product: true, operation.Quotient: true, operation.Conjugate: true, operation.Inverse: true,
	operation.Normalise: true, operation.TwoVectors: true, operation.Slerp: true, operation.Nlerp: true,
	operation.TurnAngle: true, operation.AngleBetween: true, operation.Derivative: true, operation.Step: true,
	operation.Exponential: true, operation.AxisTurn: true,
}

// valid are the singular samples whose inputs are what a caller may hand over: no
// zero quaternions, matrices or axes, and axes of unit length.
func valid(q *operation.Function, id *operation.Identity) []operation.Sample {
	axes := id.Is(operation.FromAxisAngle) || id.Is(operation.TwoVectors) || id.Readings[0].Detail == "about an axis" || id.Readings[0].Detail == "between vectors"
	return slices.DeleteFunc(operation.Draw(q.In, operation.Singular, 0, 0), func(s operation.Sample) bool {
		at := 0
		for _, o := range q.In {
			n := 0.0
			for _, x := range s.In[at : at+o.Size] {
				n = math.Hypot(n, x)
			}
			at += o.Size
			switch o.Kind {
			case operation.Quaternion, operation.Matrix3, operation.Matrix4:
				if n == 0 {
					return true
				}
			case operation.Three:
				if axes && math.Abs(n-1) > 1e-6 || len(q.In) > 1 && n == 0 {
					return true
				}
			}
		}
		return false
	})
}

// undetermined reports whether any of many results will do: halfway between opposite
// rotations, from a vector to its negative, a root of -1.
func undetermined(id *operation.Identity, s operation.Sample) bool {
	opposite := strings.HasPrefix(s.Note, "opposite") || strings.HasPrefix(s.Note, "the second is the negative")
	switch id.Op() {
	case operation.Slerp, operation.Nlerp, operation.TwoVectors:
		return opposite
	case operation.Exponential:
		return s.Note == "identity with the sign changed"
	}
	return false
}

// judge returns how a sample fails, or nil.
func judge(q *operation.Function, c *measure.Case, s operation.Sample) *failure {
	if !finite(s.Out) {
		return &failure{sample: s, nan: true}
	}
	miss, ok := q.Miss(c.Identity, &s)
	if !ok || miss <= noticeable {
		return nil
	}
	return &failure{sample: s, miss: miss}
}

func (p *failure) finding(f *measure.Function, c *measure.Case) *rules.Finding {
	reading := c.Identity.Readings[0]
	what := "a result that is off by " + number(p.miss)
	if p.nan {
		what = numbers(p.sample.Out, 6)
	}
	out := &rules.Finding{
		Rule: rules.SingularPoint, Level: rules.Warning, Key: f.Key(),
		Message: fmt.Sprintf("%s computes the %s; for a valid input, %s, it gives %s",
			f.Label(c), reading, p.sample.Note, what),
		Claim:  "defined for every rotation, by what it computes",
		Remedy: remedy(p, reading.Op),
	}
	at := 0
	for _, o := range c.In {
		out.Evidence = append(out.Evidence, rules.Evidence{What: o.Name, Stated: rules.Words(numbers(p.sample.In[at:at+o.Size], 17))})
		at += o.Size
	}
	row := rules.Evidence{What: "result", Computed: rules.Words(numbers(p.sample.Out, 17))}
	if !p.nan {
		row.Residual = rules.Plain(p.miss)
	}
	out.Evidence = append(out.Evidence, row,
		rules.Evidence{What: "samples at singular points that fail", Computed: rules.Words(fmt.Sprintf("%d of %d", p.same, p.of))})
	return out
}

func remedy(p *failure, op operation.Op) string {
	switch {
	case !p.nan:
		return "treat this case apart; what the operation has to give there is defined"
	case op == operation.AnglesOf, op == operation.TurnAngle, op == operation.AngleBetween, op == operation.Slerp, op == operation.AxisAngleOf:
		return "clamp what goes into the arc sine or cosine to -1..1, or use the arc tangent of two numbers"
	}
	return "treat this case apart: a length or a divisor is zero there"
}

func numbers(list []float64, digits int) string {
	words := make([]string, len(list))
	for i, x := range list {
		words[i] = strconv.FormatFloat(x, 'g', digits, 64)
	}
	return strings.Join(words, " ")
}

func number(x float64) string { return strconv.FormatFloat(x, 'g', 3, 64) }
