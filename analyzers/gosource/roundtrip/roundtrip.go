package roundtrip

import (
	_ "embed" // of the package's essay
	"fmt"
	"math"
	"regexp"
	"slices"
	"strings"

	"golang.org/x/tools/go/analysis"

	"dextral/analyzers/gosource/doc"
	"dextral/analyzers/gosource/found"
	"dextral/analyzers/gosource/measure"
	"dextral/core/matrix"
	"dextral/core/operation"
	"dextral/core/rotor"
	"dextral/rules"
)

//go:embed doc.go
var essay string

// Analyzer reports conversions that do not undo each other.
var Analyzer = &analysis.Analyzer{
	Name:       "roundtrip",
	Doc:        doc.Section(essay),
	Run:        run,
	Requires:   []*analysis.Analyzer{measure.Analyzer},
	ResultType: found.Type,
}

// back names the operation that undoes each one that makes a rotation.
var back = map[operation.Op]operation.Op{
	operation.ToMatrix: operation.FromMatrix, operation.FromAngles: operation.AnglesOf, operation.FromAxisAngle: operation.AxisAngleOf,
	operation.FromRotvec: operation.RotvecOf, operation.FromGibbs: operation.Gibbs, operation.FromMRP: operation.MRP,
}

// way is one setting of a conversion.
type way struct {
	f *measure.Function
	c *measure.Case
}

func run(pass *analysis.Pass) (any, error) {
	measured := pass.ResultOf[measure.Analyzer].(*measure.Result)
	c := found.In(pass)
	for to, from := range back {
		there, undoing := ways(measured, to), ways(measured, from)
		for _, w := range undoing {
			if f, ok := w.unpaired(there); ok {
				finding := w.finding(f)
				finding.Related = []rules.Related{{Place: c.At(f.f.Decl.Name), Message: f.f.Label(f.c) + ": " + f.c.Identity.Readings[0].String()}}
				c.Add(finding, w.f.Decl.Name)
			}
		}
	}
	return c.Done()
}

// ways lists the settings of functions that compute an operation beyond doubt.
func ways(r *measure.Result, op operation.Op) (list []way) {
	for _, f := range r.Funcs {
		for _, c := range f.Cases {
			if f.Decl != nil && len(f.Args) == 0 && c.Identity.Op() == op && c.Identity.Residual < 1e-3 {
				list = append(list, way{f, c})
			}
		}
	}
	return list
}

// unpaired returns the conversion that w ought to undo and does not, if w undoes
// none of those that it might: with the types of the other one, and a name that does
// not speak of another sequence or direction.
func (w way) unpaired(there []way) (partner way, ok bool) {
	for _, f := range there {
		if !f.fits(w) {
			continue
		}
		switch angle, known := f.opens(w); {
		case !known:
		case angle < closed:
			return way{}, false
		case f.meant(w):
			partner, ok = f, true
		}
	}
	return partner, ok
}

// closed is what a round trip may leave open, rad: the square root of float32's
// rounding unit, which an arc sine near its end makes of one.
const closed = 1e-3

// fits reports whether what f gives is what w takes, and the other way round.
func (f way) fits(w way) bool {
	return kinds(f.c.In) == kinds(w.c.Out) && kinds(f.c.Out) == kinds(w.c.In) && f.f != w.f
}

// kinds are the types of operands. Three angles are the same whether they come in a
// vector or as three numbers.
func kinds(list []measure.Operand) string {
	var names []string
	for _, o := range list {
		if o.Kind == operation.Three || o.Kind == operation.Scalar {
			names = append(names, o.Kind.String())
			continue
		}
		names = append(names, o.Kind.String()+" "+o.Type)
	}
	slices.Sort(names)
	return strings.Join(names, ", ")
}

var (
	sequence = regexp.MustCompile(`(?i)[xyz]{3}|[1-3]{3}`)
	other    = regexp.MustCompile(`(?i)transpos|passive|active|inverse|conj|intrinsic|extrinsic|fixed|moving|deg|rad`)
)

// meant reports whether the names of two conversions allow them to be a pair.
func (f way) meant(w way) bool {
	a, b := f.f.Label(f.c), w.f.Label(w.c)
	for _, words := range []*regexp.Regexp{sequence, other} {
		if strings.ToLower(words.FindString(a)) != strings.ToLower(words.FindString(b)) {
			return false
		}
	}
	return true
}

// opens is the largest angle between a rotation and the one that comes out of f after
// w has taken it apart. It is not known where one gives no result.
func (f way) opens(w way) (worst float64, known bool) {
	samples := operation.Draw(f.f.Question(f.c).In, operation.Unit, 8, 3)
	f.f.Evaluate(f.c, samples)
	for _, s := range samples {
		first, ok := rotation(f.c, s)
		if !ok {
			continue
		}
		parts := []operation.Sample{{In: s.Out}}
		w.f.Evaluate(w.c, parts)
		again := []operation.Sample{{In: arranged(parts[0].Out, w.c.Out, f.c.In)}}
		if !parts[0].OK || again[0].In == nil {
			continue
		}
		f.f.Evaluate(f.c, again)
		if second, ok := rotation(f.c, again[0]); ok {
			worst, known = max(worst, rotor.Angle(first, second)), true
		}
	}
	return worst, known
}

// arranged puts the numbers that came out of one function into the order of the
// operands of another: an axis and an angle may change places.
func arranged(numbers []float64, out, in []measure.Operand) []float64 {
	var list []float64
	for _, want := range in {
		at, ok := 0, false
		for _, o := range out {
			if o.Kind == want.Kind && o.Size == want.Size {
				list, ok = append(list, numbers[at:at+o.Size]...), true
				break
			}
			at += o.Size
		}
		if !ok {
			return nil
		}
	}
	return list
}

// rotation is the result of a conversion as a rotor.
func rotation(c *measure.Case, s operation.Sample) (rotor.Rotor, bool) {
	if !s.OK || slices.ContainsFunc(s.Out, math.IsNaN) {
		return rotor.Rotor{}, false
	}
	if n := s.Out; len(n) == 4 {
		o := operation.ScalarFirst
		if list := c.Identity.Readings[0].Orders; len(list) > 0 {
			o = list[len(list)-1]
		}
		return rotor.FromQuaternion(n[o[0]], n[o[1]], n[o[2]], n[o[3]]).Unit()
	}
	size := 3
	if len(s.Out) == 16 {
		size = 4
	}
	var m matrix.Mat3
	for i := range 3 {
		copy(m[i][:], s.Out[size*i:size*i+3])
	}
	return m.Rotor(), true
}

func (w way) finding(f way) *rules.Finding {
	angle, _ := f.opens(w)
	there, back := f.c.Identity.Readings[0], w.c.Identity.Readings[0]
	return &rules.Finding{
		Rule: rules.RoundTripBroken, Level: rules.Warning, Key: w.f.Key(),
		Message: fmt.Sprintf("%s does not undo %s: what one takes apart the other puts together as another rotation, up to %.3g deg away; %s computes the %s, and %s the %s",
			w.f.Label(w.c), f.f.Label(f.c), angle*180/math.Pi, w.f.Key(), back, f.f.Key(), there),
		Claim: "the inverse of " + f.f.Key() + ", by their types",
		Evidence: []rules.Evidence{
			{What: f.f.Label(f.c), Computed: rules.Words(there.String())},
			{What: w.f.Label(w.c), Computed: rules.Words(back.String())},
			{What: "left open after both, at most", Stated: rules.Degrees(0), Computed: rules.Degrees(angle), Residual: rules.Degrees(angle)},
		},
		Remedy: "make both follow one convention, or say in their names which one each follows",
	}
}
