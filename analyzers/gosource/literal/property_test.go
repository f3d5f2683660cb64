package literal_test

import (
	"fmt"
	"go/ast"
	"go/importer"
	"go/parser"
	"go/token"
	"go/types"
	"os"
	"path/filepath"
	"strconv"
	"testing"

	"github.com/stretchr/testify/require"
	"golang.org/x/tools/go/analysis"
	"golang.org/x/tools/go/analysis/checker"
	"golang.org/x/tools/go/packages"
	"pgregory.net/rapid"

	"dextral/analyzers/gosource/literal"
	"dextral/core/convention"
)

// analyse runs the analyzer over one file, whose imports are unknown but for
// those of the importer. Errors of parser and type checker are passed over.
func analyse(t require.TestingT, src string, from types.Importer) *literal.Result {
	dir, err := os.MkdirTemp("", "literal")
	require.NoError(t, err)
	defer os.RemoveAll(dir)
	name := filepath.Join(dir, "a.go")
	require.NoError(t, os.WriteFile(name, []byte(src), 0o644))
	fset := token.NewFileSet()
	var files []*ast.File
	if f, _ := parser.ParseFile(fset, name, src, parser.ParseComments|parser.SkipObjectResolution); f != nil {
		files = append(files, f)
	}
	info := &types.Info{Types: map[ast.Expr]types.TypeAndValue{}, Defs: map[*ast.Ident]types.Object{}, Uses: map[*ast.Ident]types.Object{},
		Selections: map[*ast.SelectorExpr]*types.Selection{}}
	config := types.Config{Importer: from, Error: func(error) {}, FakeImportC: true}
	typed, _ := config.Check("p", fset, files, info)
	pkg := &packages.Package{ID: "p", Name: "p", PkgPath: "p", Fset: fset, Syntax: files, Types: typed, TypesInfo: info,
		TypesSizes: types.SizesFor("gc", "amd64"), IllTyped: true, Errors: []packages.Error{{}}}
	graph, err := checker.Analyze([]*analysis.Analyzer{literal.Analyzer}, []*packages.Package{pkg}, nil)
	require.NoError(t, err)
	require.NoError(t, graph.Roots[0].Err)
	return graph.Roots[0].Result.(*literal.Result)
}

// written draws a spelling of a number that a program may use.
func written(t *rapid.T, x float64) string {
	digits := strconv.FormatFloat(x, 'g', -1, 64)
	switch rapid.IntRange(0, 3).Draw(t, "spelling") {
	case 0:
		return "(" + digits + ")"
	case 1:
		return "float64(" + digits + ")"
	case 2:
		return "-(" + strconv.FormatFloat(-x, 'g', -1, 64) + ")"
	}
	return digits
}

// styles are ways to store the quaternion w, x, y, z. The verbs take the four in
// this order.
var styles = []string{
	"type Quat struct{ W, X, Y, Z float64 }\nvar mountQuat = Quat{%[1]s, %[2]s, %[3]s, %[4]s}",
	"type Quat struct{ X, Y, Z, W float64 }\nvar mountQuat = Quat{%[2]s, %[3]s, %[4]s, %[1]s}",
	"type Quat struct{ X, Y, Z, W float64 }\nvar mountQuat = Quat{W: %[1]s, Z: %[4]s, Y: %[3]s, X: %[2]s}",
	"type Quat struct{ Real, Imag, Jmag, Kmag float64 }\nvar mountQuat = &Quat{Kmag: %[4]s, Real: %[1]s, Jmag: %[3]s, Imag: %[2]s}",
	"type Quat struct{ J, K, S, I float64 }\nvar mountQuat = Quat{%[3]s, %[4]s, %[1]s, %[2]s}",
	"type Vec [3]float64\ntype Quat struct { W float64; V Vec }\nvar mountQuat = Quat{%[1]s, Vec{%[2]s, %[3]s, %[4]s}}",
	"type Vec struct{ X, Y, Z float64 }\ntype Quat struct { V Vec; W float64 }\nvar mountQuat = Quat{W: %[1]s, V: Vec{Z: %[4]s, X: %[2]s, Y: %[3]s}}",
	"var mountQuatWXYZ = [4]float64{%[1]s, %[2]s, %[3]s, %[4]s}",
	"var mountQuatXYZW = []float64{3: %[1]s, 0: %[2]s, %[3]s, %[4]s}",
	"var mountQuat = [...]float64{%[2]s, %[3]s, %[4]s, %[1]s} // x y z w",
	"type Pose struct{ T, Qx, Qy, Qz, Qw float64 }\nvar mount = Pose{Qz: %[4]s, Qy: %[3]s, T: 5, Qw: %[1]s, Qx: %[2]s}",
	"const ( mountQz = %[4]s; mountQw = %[1]s; mountQx = %[2]s; mountQy = %[3]s )",
}

// TestStoragesAgree writes one quaternion in every style and reads the same
// four numbers back from each.
func TestStoragesAgree(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		var want [4]float64
		spelled := make([]any, 4)
		for i := range want {
			want[i] = rapid.Float64Range(-1, 1).Draw(t, "component")
			spelled[i] = written(t, want[i])
		}
		style := rapid.SampledFrom(styles).Draw(t, "style")
		found := analyse(t, "package p\n\n"+fmt.Sprintf(style, spelled...)+"\n", importer.Default())
		require.Len(t, found.Values, 1)
		v := found.Values[0]
		require.Equal(t, convention.Quaternion, v.Form)
		require.Empty(t, v.Why)
		got := v.Floats()
		if v.Claims.Scalar() == convention.ScalarLast {
			got = append([]float64{got[3]}, got[:3]...)
		} else {
			require.Equal(t, convention.ScalarFirst, v.Claims.Scalar())
		}
		require.Equal(t, want[:], got)
		require.Empty(t, v.Claims.Conflicts(convention.OfScalar))
	})
}

// FuzzAnyText shows that no text makes the analyzer panic, and that what it finds
// lies in the text.
func FuzzAnyText(f *testing.F) {
	seeds, err := filepath.Glob("testdata/src/*/*.go")
	require.NoError(f, err)
	require.NotEmpty(f, seeds)
	for _, name := range seeds {
		text, err := os.ReadFile(name)
		require.NoError(f, err)
		f.Add(string(text))
	}
	f.Fuzz(func(t *testing.T, src string) {
		for _, v := range analyse(t, src, nothing{}).Values {
			require.NotEmpty(t, v.Key)
			require.Positive(t, v.Place.Line)
			for _, n := range v.Numbers {
				require.Equal(t, v.Place.Path, n.Place.Path)
			}
		}
	})
}

// nothing is an importer that knows no package.
type nothing struct{}

func (nothing) Import(path string) (*types.Package, error) {
	return nil, fmt.Errorf("package %s is unknown", path)
}
