package routes

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
	"dextral/rules"
)

//go:embed doc.go
var essay string

// Analyzer reports routes that do not lead to one rotation.
var Analyzer = &analysis.Analyzer{
	Name:       "routes",
	Doc:        doc.Section(essay),
	Run:        run,
	Requires:   []*analysis.Analyzer{measure.Analyzer},
	ResultType: found.Type,
}

// step is one function of a route.
type step struct {
	f *measure.Function
	c *measure.Case
}

func run(pass *analysis.Pass) (any, error) {
	measured := pass.ResultOf[measure.Analyzer].(*measure.Result)
	c := found.In(pass)
	steps := steps(measured)
	for _, m := range steps {
		if !m.is(operation.ToMatrix) {
			continue
		}
		if other, by, ok := m.otherWay(steps); ok {
			f := finding(rules.Warning, m, "%s and %s followed by %s are two ways to turn a vector by a quaternion, and they turn it opposite ways: for 90 deg about z one takes x to y and the other to -y",
				other.f.Label(other.c), m.f.Label(m.c), by.f.Label(by.c))
			f.Evidence = []rules.Evidence{
				{What: other.f.Label(other.c), Computed: rules.Words(other.c.Identity.Readings[0].String())},
				{What: m.f.Label(m.c), Computed: rules.Words(m.c.Identity.Readings[0].String())},
				{What: "angle between the two, up to", Stated: rules.Degrees(0), Computed: rules.Degrees(math.Pi), Residual: rules.Degrees(math.Pi)},
			}
			f.Remedy = "transpose the matrix, or reverse the quaternion, in one of them; then hold both against a rotation by hand"
			f.Related = []rules.Related{{Place: c.At(other.f.Decl.Name), Message: other.f.Label(other.c)}, {Place: c.At(by.f.Decl.Name), Message: by.f.Label(by.c)}}
			c.Add(f, m.f.Decl.Name)
		}
		if q, p, ok := m.composes(steps); ok {
			f := finding(rules.Note, m, "the matrix of %s(a, b) is %s of the matrices of b and a: quaternions and matrices of this package compose in opposite orders", q.f.Label(q.c), p.f.Label(p.c))
			f.Remedy = "say so in the comments of both, or make one product follow the other"
			f.Related = []rules.Related{{Place: c.At(q.f.Decl.Name), Message: q.f.Label(q.c)}, {Place: c.At(p.f.Decl.Name), Message: p.f.Label(p.c)}}
			c.Add(f, m.f.Decl.Name)
		}
	}
	return c.Done()
}

func finding(level rules.Level, s step, message string, args ...any) *rules.Finding {
	return &rules.Finding{Rule: rules.RoutesDiffer, Level: level, Key: s.f.Key(), Message: fmt.Sprintf(message, args...), Claim: "one rotation, by whichever way"}
}

// turned are words of names that announce the other direction.
var turned = regexp.MustCompile(`(?i)inv|transp|conj|passive|frame|world|body|local|global|unrot|back|dcm|axes`)

// steps lists the functions that may be part of a route, with what they compute beyond
// doubt.
func steps(r *measure.Result) (list []step) {
	for _, f := range r.Funcs {
		for _, c := range f.Cases {
			if f.Decl == nil || len(f.Args) > 0 || !c.Identity.Known() || turned.MatchString(f.Object.Name()) {
				continue
			}
			first := c.Identity.Readings[0]
			if !slices.ContainsFunc(c.Identity.Readings, func(o operation.Reading) bool { return o.Op != first.Op || o.Reversed != first.Reversed }) {
				list = append(list, step{f, c})
			}
		}
	}
	return list
}

func (s step) is(op operation.Op) bool { return s.c.Identity.Op() == op }

// in returns the first operand of a kind, or nil.
func operand(list []measure.Operand, kind operation.Kind) *measure.Operand {
	for i := range list {
		if list[i].Kind == kind {
			return &list[i]
		}
	}
	return nil
}

// apply evaluates a step on numbers for its operands, by kind; of two of one kind in
// order.
func (s step) apply(numbers map[operation.Kind][][]float64) ([]float64, bool) {
	used := map[operation.Kind]int{}
	var in []float64
	for _, o := range s.c.In {
		list := numbers[o.Kind]
		if used[o.Kind] >= len(list) || len(list[used[o.Kind]]) != o.Size {
			return nil, false
		}
		in = append(in, list[used[o.Kind]]...)
		used[o.Kind]++
	}
	samples := []operation.Sample{{In: in}}
	s.f.Evaluate(s.c, samples)
	return samples[0].Out, samples[0].OK
}

// rotations draws quaternions as a step stores them.
func (s step) rotations(n int) []operation.Sample {
	return operation.Draw([]operation.Operand{s.c.In[0].Operand}, operation.Unit, n, 5)
}

var vector = []float64{0.3, -0.5, 0.8}

// otherWay finds a function that turns vectors by quaternions and one that applies
// matrices, with the types of m, where the two ways lead to opposite turns; and none
// where they agree.
func (m step) otherWay(all []step) (rotate, apply step, ok bool) {
	q, out := operand(m.c.In, operation.Quaternion), m.c.Out
	if q == nil || len(out) != 1 || out[0].Kind != operation.Matrix3 || out[0].Type == "" || q.Type == "" || len(m.c.In) != 1 {
		return step{}, step{}, false
	}
	for _, r := range all {
		a := operand(r.c.In, operation.Quaternion)
		if !r.is(operation.RotateVector) || a == nil || a.Type != q.Type || len(r.c.In) != 2 {
			continue
		}
		for _, by := range all {
			b := operand(by.c.In, operation.Matrix3)
			if !by.is(operation.RotateVector) || b == nil || b.Type != out[0].Type || len(by.c.In) != 2 {
				continue
			}
			switch same, opposite := m.compare(r, by); {
			case same:
				return step{}, step{}, false
			case opposite:
				rotate, apply, ok = r, by, true
			}
		}
	}
	return rotate, apply, ok
}

// compare turns a vector both ways by several rotations, and by their reverse.
func (m step) compare(rotate, by step) (same, opposite bool) {
	same, opposite = true, true
	for _, s := range m.rotations(4) {
		matrix, ok := m.apply(map[operation.Kind][][]float64{operation.Quaternion: {s.In}})
		direct, okDirect := rotate.apply(map[operation.Kind][][]float64{operation.Quaternion: {s.In}, operation.Three: {vector}})
		if !ok || !okDirect {
			return false, false
		}
		image, ok := by.apply(map[operation.Kind][][]float64{operation.Matrix3: {matrix}, operation.Three: {vector}})
		back, okBack := by.apply(map[operation.Kind][][]float64{operation.Matrix3: {transpose(matrix)}, operation.Three: {vector}})
		if !ok || !okBack {
			return false, false
		}
		same = same && near(direct, image)
		opposite = opposite && near(direct, back)
	}
	return same, opposite
}

// composes finds a product of quaternions and one of matrices that compose in
// opposite orders, and none that compose in one.
func (m step) composes(all []step) (q, p step, ok bool) {
	a, out := operand(m.c.In, operation.Quaternion), m.c.Out
	if a == nil || len(m.c.In) != 1 || len(out) != 1 || out[0].Kind != operation.Matrix3 || out[0].Type == "" || a.Type == "" {
		return step{}, step{}, false
	}
	for _, x := range all {
		if !x.is(operation.Product) || x.c.Identity.Readings[0].Reversed != [2]bool{} || len(x.c.In) != 2 || x.c.In[0].Type != a.Type {
			continue
		}
		for _, y := range all {
			if !y.is(operation.MatrixProduct) || y.c.Identity.Readings[0].Reversed != [2]bool{} || len(y.c.In) != 2 || y.c.In[0].Type != out[0].Type {
				continue
			}
			switch same, opposite := m.order(x, y); {
			case same:
				return step{}, step{}, false
			case opposite:
				q, p, ok = x, y, true
			}
		}
	}
	return q, p, ok
}

func (m step) order(x, y step) (same, opposite bool) {
	s := m.rotations(2)
	first, second := s[0].In, s[1].In
	both, ok := x.apply(map[operation.Kind][][]float64{operation.Quaternion: {first, second}})
	if !ok {
		return false, false
	}
	whole, ok1 := m.apply(map[operation.Kind][][]float64{operation.Quaternion: {both}})
	a, ok2 := m.apply(map[operation.Kind][][]float64{operation.Quaternion: {first}})
	b, ok3 := m.apply(map[operation.Kind][][]float64{operation.Quaternion: {second}})
	if !ok1 || !ok2 || !ok3 {
		return false, false
	}
	ab, ok1 := y.apply(map[operation.Kind][][]float64{operation.Matrix3: {a, b}})
	ba, ok2 := y.apply(map[operation.Kind][][]float64{operation.Matrix3: {b, a}})
	return ok1 && near(whole, ab), ok2 && near(whole, ba)
}

func transpose(m []float64) []float64 {
	t := make([]float64, 9)
	for i := range 3 {
		for j := range 3 {
			t[3*i+j] = m[3*j+i]
		}
	}
	return t
}

// near allows what float32 makes of a few products.
func near(a, b []float64) bool {
	for i := range a {
		if !(math.Abs(a[i]-b[i]) <= 1e-5) {
			return false
		}
	}
	return len(a) == len(b)
}
