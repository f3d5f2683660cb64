package lower

import (
	"os"
	"sort"
	"testing"

	"golang.org/x/tools/go/analysis"
	"golang.org/x/tools/go/analysis/checker"
	"golang.org/x/tools/go/packages"
)

func analyse(t *testing.T, dir string, patterns ...string) map[string]*Result {
	cfg := &packages.Config{Mode: packages.LoadAllSyntax, Dir: dir, Env: append(os.Environ(), "GOFLAGS=-mod=mod")}
	pkgs, err := packages.Load(cfg, patterns...)
	if err != nil {
		t.Fatal(err)
	}
	g, err := checker.Analyze([]*analysis.Analyzer{Analyzer}, pkgs, nil)
	if err != nil {
		t.Fatal(err)
	}
	out := map[string]*Result{}
	for _, a := range g.Roots {
		if a.Err != nil {
			t.Fatal(a.Package.PkgPath, a.Err)
		}
		out[a.Package.PkgPath] = a.Result.(*Result)
	}
	return out
}

func TestGonum(t *testing.T) {
	rs := analyse(t, "../../..", "gonum.org/v1/gonum/num/...", "gonum.org/v1/gonum/spatial/r3", "gonum.org/v1/gonum/spatial/r2")
	var names []string
	for n := range rs {
		names = append(names, n)
	}
	sort.Strings(names)
	for _, n := range names {
		ok := 0
		for _, f := range rs[n].Funcs {
			if f.Program != nil {
				ok++
				if f.Program.Sig.Runnable() {
					m, err := rs[n].Link(f)
					if err != nil {
						t.Error(err)
						continue
					}
					b := m.NewBatch(4)
					for s := range 4 {
						for i := range b.Inputs() {
							b.Set(s, i, float64(s*7+i*3%5)*0.37-1)
						}
					}
					m.Run(b)
					for s := range 4 {
						if b.Outcome(s) != 0 {
							t.Log(f.Name, b.Outcome(s), b.Reason(s))
						}
					}
				}
			} else {
				t.Log(f.Name, f.Reason)
			}
		}
		t.Log(n, len(rs[n].Funcs), ok)
	}
}
