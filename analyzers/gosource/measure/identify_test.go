package measure_test

import (
	"encoding/gob"
	"os"
	"path/filepath"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/core/convention"
	"dextral/core/operation"
)

const quaternions = `package a

import "math"

// No field says which of the four is the scalar.
type Q [4]float64
type V [3]float64
type M [9]float64

func (a Q) Mul(b Q) Q {
	return Q{
		a[3]*b[0] + a[0]*b[3] + a[1]*b[2] - a[2]*b[1],
		a[3]*b[1] - a[0]*b[2] + a[1]*b[3] + a[2]*b[0],
		a[3]*b[2] + a[0]*b[1] - a[1]*b[0] + a[2]*b[3],
		a[3]*b[3] - a[0]*b[0] - a[1]*b[1] - a[2]*b[2],
	}
}
func (a *Q) Invert() { a[0], a[1], a[2] = -a[0], -a[1], -a[2] }
func (a Q) Turn(v V) V {
	b := a
	b.Invert()
	r := a.Mul(Q{v[0], v[1], v[2], 0}).Mul(b)
	return V{r[0], r[1], r[2]}
}
func About(axis V, degrees float64, out *Q) {
	s, c := math.Sincos(degrees * math.Pi / 360)
	*out = Q{axis[0] * s, axis[1] * s, axis[2] * s, c}
}
func (m M) Times(n M) (p M) {
	for c := 0; c < 3; c++ {
		for r := 0; r < 3; r++ {
			for k := 0; k < 3; k++ {
				p[3*c+r] += m[3*k+r] * n[3*c+k]
			}
		}
	}
	return p
}
func (m M) Apply(v V) V {
	return V{m[0]*v[0] + m[3]*v[1] + m[6]*v[2], m[1]*v[0] + m[4]*v[1] + m[7]*v[2], m[2]*v[0] + m[5]*v[1] + m[8]*v[2]}
}
func Blend(a, b Q) Q { return Q{a[0] * b[0], a[1] * b[1], a[2] * b[2], a[3] * b[3]} }
`

// A product alone leaves six storage orders; with a function that turns vectors one is
// left. A matrix is stored by columns if that makes its product one in the order given.
func TestTypes(t *testing.T) {
	r := load(t, quaternions)
	q := r.Type("a.Q")
	require.NotNil(t, q)
	assert.Equal(t, []operation.Order{operation.ScalarLast}, q.Orders)
	assert.NotEmpty(t, q.Rotational)
	assert.Empty(t, q.Outliers)
	assert.Equal(t, convention.ColumnMajor, r.Type("a.M").Storage)
	got := map[string]string{}
	for _, f := range r.Funcs {
		text, decided := r.Meaning(f.Cases[0])
		if !decided {
			text = "?"
		}
		got[f.Key()] = text
	}
	assert.Equal(t, map[string]string{
		"Q.Mul": "product", "Q.Invert": "conjugate", "Q.Turn": "rotated vector, active, scaling by the square of the norm",
		"About":   "rotation of axis and angle, in degrees, active, for unit norm only",
		"M.Times": "matrix product, matrix column by column", "M.Apply": "rotated vector, active, by a matrix, matrix column by column",
		"Blend": "?",
	}, got)
}

// Facts tell a package what the types are that it imports, and their bytes depend on the
// source alone.
func TestFacts(t *testing.T) {
	dir := t.TempDir()
	write := func(name, text string) {
		require.NoError(t, os.MkdirAll(filepath.Dir(filepath.Join(dir, name)), 0o755))
		require.NoError(t, os.WriteFile(filepath.Join(dir, name), []byte(text), 0o644))
	}
	write("go.mod", "module tern\n\ngo 1.24\n")
	write("a/a.go", quaternions)
	write("b/b.go", "package b\n\nimport \"tern/a\"\n\nfunc Negative(q a.Q) a.Q { return a.Q{q[0], -q[1], -q[2], q[3]} }\n")
	var last []byte
	for range 3 {
		r := results(t, dir, "./...")["tern/b"]
		imported := r.Imported(r.Type("tern/a.Q").Object.Pkg())
		require.NotNil(t, imported.Type("tern/a.Q"))
		assert.Equal(t, []operation.Order{operation.ScalarLast}, imported.Type("tern/a.Q").Orders)
		assert.Len(t, imported.Func("(tern/a.Q).Mul"), 1)
		assert.Equal(t, []operation.Order{operation.ScalarLast}, r.Type("tern/a.Q").Orders)
		// Without the order this would be the negative of a conjugate with y for the scalar.
		assert.True(t, r.Funcs[0].Cases[0].Identity.Is(operation.AxisMapped), "%v", r.Funcs[0].Cases[0].Identity.Readings)
		var w digest
		require.NoError(t, gob.NewEncoder(&w).Encode(imported))
		if last != nil {
			assert.Equal(t, last, []byte(w))
		}
		last = w
	}
}

type digest []byte

func (d *digest) Write(p []byte) (int, error) { *d = append(*d, p...); return len(p), nil }

// BenchmarkMeasure is the cost of a package of seven functions, from types to
// identities.
func BenchmarkMeasure(b *testing.B) {
	r := load(b, quaternions)
	b.ResetTimer()
	for b.Loop() {
		for _, f := range r.Funcs {
			for _, c := range f.Cases {
				f.Question(c).Identify()
			}
		}
	}
	b.ReportMetric(float64(b.Elapsed().Microseconds())/float64(b.N*len(r.Funcs)), "us/function")
}

// Generic functions are measured for float64 and float32, slices of numbers by the
// length that the function expects, and a list of quaternions is none of them a matrix.
func TestGenericsAndSlices(t *testing.T) {
	r := load(t, `package a

type Number interface{ ~float32 | ~float64 }

type Quat[T Number] struct{ W, X, Y, Z T }

func (a Quat[T]) Mul(b Quat[T]) Quat[T] {
	return Quat[T]{
		W: a.W*b.W - a.X*b.X - a.Y*b.Y - a.Z*b.Z,
		X: a.W*b.X + a.X*b.W + a.Y*b.Z - a.Z*b.Y,
		Y: a.W*b.Y - a.X*b.Z + a.Y*b.W + a.Z*b.X,
		Z: a.W*b.Z + a.X*b.Y - a.Y*b.X + a.Z*b.W,
	}
}

func Conj[T Number](q Quat[T]) Quat[T] { return Quat[T]{q.W, -q.X, -q.Y, -q.Z} }

func Sum(list ...Quat[float64]) (s Quat[float64]) {
	for _, q := range list {
		s.W += q.W
		s.X += q.X
		s.Y += q.Y
		s.Z += q.Z
	}
	return s
}

func Matrix(q []float64) []float64 {
	if len(q) != 4 {
		return nil
	}
	w, x, y, z := q[0], q[1], q[2], q[3]
	return []float64{
		1 - 2*(y*y+z*z), 2 * (x*y - w*z), 2 * (x*z + w*y),
		2 * (x*y + w*z), 1 - 2*(x*x+z*z), 2 * (y*z - w*x),
		2 * (x*z - w*y), 2 * (y*z + w*x), 1 - 2*(x*x+y*y),
	}
}
`)
	got := map[string][]operation.Op{}
	for _, f := range r.Funcs {
		got[f.Object.Name()] = append(got[f.Object.Name()], f.Cases[0].Identity.Op())
		if f.Object.Name() == "Sum" {
			assert.Len(t, f.In, 4)
		}
	}
	assert.Equal(t, map[string][]operation.Op{
		"Mul": {operation.Product, operation.Product}, "Conj": {operation.Conjugate, operation.Conjugate},
		"Sum": {""}, "Matrix": {operation.ToMatrix},
	}, got)
}
