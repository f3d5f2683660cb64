package longway

import (
	_ "embed" // of the package's essay
	"fmt"
	"math"
	"regexp"
	"slices"

	"golang.org/x/tools/go/analysis"

	"dextral/analyzers/gosource/doc"
	"dextral/analyzers/gosource/found"
	"dextral/analyzers/gosource/measure"
	"dextral/core/operation"
	"dextral/core/rotor"
	"dextral/rules"
)

//go:embed doc.go
var essay string

// Analyzer reports functions of two rotations that depend on the signs of their
// quaternions.
var Analyzer = &analysis.Analyzer{
	Name:       "longway",
	Doc:        doc.Section(essay),
	Run:        run,
	Requires:   []*analysis.Analyzer{measure.Analyzer},
	ResultType: found.Type,
}

func run(pass *analysis.Pass) (any, error) {
	measured := pass.ResultOf[measure.Analyzer].(*measure.Result)
	c := found.In(pass)
	for _, f := range measured.Funcs {
		if f.Decl == nil || admitted(f) || shorter(f) || !rotations(measured, f) {
			continue
		}
		for _, s := range f.Cases {
			if finding := judge(f, s); finding != nil {
				c.Add(finding, f.Decl.Name)
				break
			}
		}
	}
	return c.Done()
}

// said are words by which an author admits that the longer way may be taken, or that
// the signs are the caller's business.
var said = regexp.MustCompile(`(?i)long(er|est)? (way|path|arc|route)|short(er|est) (way|path|arc|route)|hemisphere|sign|negat|antipod|does not check|no check`)

// named are parts of names that say the same.
var named = regexp.MustCompile(`(?i)long|raw|unchecked|no_?(invert|flip)`)

func admitted(f *measure.Function) bool {
	return f.Decl.Doc != nil && said.MatchString(f.Decl.Doc.Text()) || named.MatchString(f.Object.Name())
}

// shorter reports whether one of the function's settings takes the shorter way.
func shorter(f *measure.Function) bool {
	return slices.ContainsFunc(f.Cases, func(c *measure.Case) bool {
		return c.Identity.Known() && c.Identity.Readings[0].Way == operation.Shorter
	})
}

// rotations reports whether the quaternions of a function are known to be treated as
// rotations by some other function.
func rotations(r *measure.Result, f *measure.Function) bool {
	for _, o := range f.In {
		if o.Kind != operation.Quaternion {
			continue
		}
		if t := r.Type(o.Type); t != nil && len(t.Rotational) > 0 {
			return true
		}
	}
	return false
}

func judge(f *measure.Function, c *measure.Case) *rules.Finding {
	if !c.Identity.Known() {
		return nil
	}
	way := c.Identity.Readings[0].Way
	if way != operation.AsGiven && way != operation.Longer || slices.ContainsFunc(c.Identity.Readings, func(r operation.Reading) bool { return r.Way != way }) {
		return nil
	}
	switch op := c.Identity.Op(); op {
	case operation.Slerp, operation.Nlerp:
		return interpolation(f, c, op)
	case operation.AngleBetween:
		return distance(f, c)
	}
	return nil
}

// interpolation evaluates half way between two orientations that are close, with
// the signs alike and with the sign of the second reversed.
func interpolation(f *measure.Function, c *measure.Case, op operation.Op) *rules.Finding {
	s := ends(c)
	f.Evaluate(c, s)
	if !s[0].OK || !s[1].OK {
		return nil
	}
	var turns [2]float64
	for i := range s {
		r, ok := stored(s[i].Out, order(c, len(c.Identity.Readings[0].Orders)-1)).Unit()
		if !ok {
			return nil
		}
		turns[i] = rotor.Angle(start, r)
	}
	evidence := []rules.Evidence{
		{What: "turn at half way, signs alike", Stated: rules.Degrees(small / 2), Computed: rules.Degrees(turns[0]), Residual: rules.Degrees(turns[0] - small/2)},
		{What: "turn at half way, the second negated", Stated: rules.Degrees(small / 2), Computed: rules.Degrees(turns[1]), Residual: rules.Degrees(turns[1] - small/2)},
	}
	if way := c.Identity.Readings[0].Way; way == operation.Longer {
		if min(turns[0], turns[1]) < small {
			return nil
		}
		out := finding(f, c, "%s computes the %s by %s always: half way between two orientations %.3g deg apart it has turned by %.4g deg instead of %.4g deg",
			f.Label(c), op, way, deg(small), deg(turns[0]), deg(small/2))
		out.Evidence = evidence
		out.Remedy = "reverse the comparison of the scalar product with zero, or say in the comment that the longer way is taken"
		return out
	}
	if math.Abs(turns[1]-turns[0]) < small {
		return nil // whatever it does, it does not show here
	}
	evidence[0].Residual = rules.Quantity{}
	out := finding(f, c, "%s computes the %s of quaternions as they come: half way between two orientations %.3g deg apart it has turned by %.4g deg if their signs differ, instead of %.4g deg",
		f.Label(c), op, deg(small), deg(turns[1]), deg(turns[0]))
	out.Evidence = evidence
	out.Remedy = "negate one of the two where their scalar product is negative, or say in the comment that the longer way may be taken"
	return out
}

// distance evaluates the angle between two orientations that are close.
func distance(f *measure.Function, c *measure.Case) *rules.Finding {
	s := ends(c)
	f.Evaluate(c, s)
	if !s[0].OK || !s[1].OK {
		return nil
	}
	out := finding(f, c, "%s computes the angle between quaternions as they come: two orientations %.3g deg apart are %.4g apart for it if their signs differ, instead of %.4g",
		f.Label(c), deg(small), s[1].Out[0], s[0].Out[0])
	out.Evidence = []rules.Evidence{
		{What: "result, signs alike", Computed: rules.Plain(s[0].Out[0])},
		{What: "result, the second negated", Stated: rules.Plain(s[0].Out[0]), Computed: rules.Plain(s[1].Out[0]), Residual: rules.Plain(s[1].Out[0] - s[0].Out[0])},
	}
	out.Remedy = "take the absolute value of the scalar product"
	return out
}

func finding(f *measure.Function, c *measure.Case, message string, args ...any) *rules.Finding {
	return &rules.Finding{Rule: rules.LongWayRound, Level: rules.Warning, Key: f.Key(),
		Message: fmt.Sprintf(message, args...), Claim: "R and -R are one rotation"}
}

func deg(rad float64) float64 { return rad * 180 / math.Pi }

// small is the angle between the two orientations of the example.
const small = 10 * math.Pi / 180

// start is the first of them: any but a special one.
var start, _ = rotor.FromQuaternion(0.7, 0.3, -0.5, 0.4).Unit()

// ends are two samples with both orientations, halfway where there is a fraction: the
// second as it is, and negated.
func ends(c *measure.Case) []operation.Sample {
	turn, _ := rotor.FromAxisAngle(rotor.Vec{X: 0.48, Y: 0.6, Z: 0.64}, small)
	samples := make([]operation.Sample, 2)
	for i := range samples {
		list := []rotor.Rotor{start, start.Mul(turn)}
		if i == 1 {
			list[1] = list[1].Neg()
		}
		n := 0
		for _, o := range c.In {
			if o.Kind != operation.Quaternion {
				samples[i].In = append(samples[i].In, slices.Repeat([]float64{0.5}, o.Size)...)
				continue
			}
			w, x, y, z := list[min(n, 1)].Quaternion()
			places, numbers := order(c, n), make([]float64, 4)
			for k, v := range []float64{w, x, y, z} {
				numbers[places[k]] = v
			}
			samples[i].In = append(samples[i].In, numbers...)
			n++
		}
	}
	return samples
}

// order is where the n-th quaternion has its numbers.
func order(c *measure.Case, n int) operation.Order {
	if list := c.Identity.Readings[0].Orders; n >= 0 && n < len(list) {
		return list[n]
	}
	return operation.ScalarFirst
}

func stored(n []float64, o operation.Order) rotor.Rotor {
	return rotor.FromQuaternion(n[o[0]], n[o[1]], n[o[2]], n[o[3]])
}
