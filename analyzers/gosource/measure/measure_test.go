package measure_test

import (
	"os"
	"path/filepath"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"golang.org/x/tools/go/analysis"
	"golang.org/x/tools/go/analysis/checker"
	"golang.org/x/tools/go/packages"

	"dextral/analyzers/gosource/measure"
	"dextral/core/operation"
)

// load measures the package of one source text.
func load(t testing.TB, src string) *measure.Result {
	t.Helper()
	dir := t.TempDir()
	require.NoError(t, os.WriteFile(filepath.Join(dir, "go.mod"), []byte("module a\n\ngo 1.24\n"), 0o644))
	require.NoError(t, os.WriteFile(filepath.Join(dir, "a.go"), []byte(src), 0o644))
	return results(t, dir, ".")["a"]
}

// results measures packages and what they import.
func results(t testing.TB, dir string, patterns ...string) map[string]*measure.Result {
	t.Helper()
	pkgs, err := packages.Load(&packages.Config{Mode: packages.LoadAllSyntax, Dir: dir}, patterns...)
	require.NoError(t, err)
	g, err := checker.Analyze([]*analysis.Analyzer{measure.Analyzer}, pkgs, nil)
	require.NoError(t, err)
	all := map[string]*measure.Result{}
	for _, a := range g.Roots {
		require.NoError(t, a.Err)
		all[a.Package.PkgPath] = a.Result.(*measure.Result)
	}
	return all
}

func TestAnalyzer(t *testing.T) {
	assert.NoError(t, analysis.Validate([]*analysis.Analyzer{measure.Analyzer}))
}

func kinds(list []measure.Operand) (all []operation.Kind) {
	for _, o := range list {
		all = append(all, o.Kind)
	}
	return all
}

const (
	scalar = operation.Scalar
	three  = operation.Three
	four   = operation.Quaternion
	nine   = operation.Matrix3
)

// Operands by type, and what is in, out or both by the flow of the numbers.
func TestOperands(t *testing.T) {
	r := load(t, `package a

import ("errors"; "math")

type V struct{ X, Y, Z float64 }
type Q struct { V V; W float64 }
type M [3][3]float64
type Pose struct { At V; Turn [4]float64 }

func (q *Q) Set(p Q)                                    { *q = p }
func (q *Q) Scale(s float64) *Q                         { q.W *= s; q.V.X *= s; return q }
func (q Q) Rotate(v V) V                                { return V{q.W * v.X, v.Y, v.Z} }
func Euler(roll, pitch, yaw float64) (w, x, y, z float64) { return roll, pitch, yaw, 1 }
func AxisAngle(x, y, z, angle float64) (m M)            { m[0][0] = x * y * z * angle; return }
func Invert(m M) (M, error)                             { if m[0][0] == 0 { return m, errors.New("singular") }; return m, nil }
func Apply(p *Pose, v *V, out *V)                       { *out = V{p.At.X + p.Turn[0]*v.X, v.Y, v.Z} }
func Ints(n int) int                                    { return n }
func Big(x [7]float64) float64                          { return math.Sqrt(x[0]) }
`)
	want := map[string][2][]operation.Kind{
		"Set":       {{four}, {four}},
		"Scale":     {{four, scalar}, {four}},
		"Rotate":    {{four, three}, {three}},
		"Euler":     {{three}, {four}},
		"AxisAngle": {{three, scalar}, {nine}},
		"Invert":    {{nine}, {nine}},
		"Apply":     {{three, four, three}, {three}},
		"Big":       {{operation.Numbers}, {scalar}},
	}
	got := map[string][2][]operation.Kind{}
	for _, f := range r.Funcs {
		got[f.Object.Name()] = [2][]operation.Kind{kinds(f.In), kinds(f.Out)}
	}
	assert.Equal(t, want, got)
}

func TestCases(t *testing.T) {
	r := load(t, `package a

type Order int
const ( XYZ Order = iota; ZYX )

func Pick(o Order, degrees bool, x, y, z float64) (a, b, c float64) {
	if degrees { x, y, z = x/2, y/2, z/2 }
	if o == ZYX { return z, y, x }
	return x, y, z
}
`)
	f := r.Funcs[0]
	var labels []string
	for _, c := range f.Cases {
		samples := operation.Draw([]operation.Operand{{Kind: three, Size: 3}}, operation.General, 5, 1)
		f.Evaluate(c, samples)
		labels = append(labels, c.Label)
		for _, s := range samples {
			require.True(t, s.OK)
			want := []float64{s.In[0], s.In[1], s.In[2]}
			if c.Label == "o == ZYX, degrees is true" {
				want = []float64{s.In[2] / 2, s.In[1] / 2, s.In[0] / 2}
				assert.Equal(t, want, s.Out)
			}
		}
	}
	assert.Equal(t, []string{"o == XYZ, degrees is false", "o == XYZ, degrees is true", "o == ZYX, degrees is false", "o == ZYX, degrees is true"}, labels)
}

// What fails or returns an error gives no numbers.
func TestErrors(t *testing.T) {
	r := load(t, `package a

import "errors"

func F(x float64) (float64, error) {
	if x < 0.5 { return 0, errors.New("too small") }
	return x, nil
}
`)
	f := r.Funcs[0]
	samples := operation.Draw([]operation.Operand{{Kind: scalar, Size: 1}}, operation.Unit, 40, 1)
	f.Evaluate(f.Cases[0], samples)
	for _, s := range samples {
		assert.Equal(t, s.In[0] >= 0.5, s.OK)
	}
	paths := map[string]bool{}
	for i := range samples {
		paths[samples[i].Path] = true
		assert.Equal(t, !samples[i].OK, measure.Took(&samples[i], 0, true))
	}
	assert.Len(t, paths, 2)
}
