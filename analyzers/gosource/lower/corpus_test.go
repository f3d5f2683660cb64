package lower

import (
	"flag"
	"fmt"
	"go/types"
	"os"
	"sort"
	"strings"
	"testing"

	"golang.org/x/tools/go/analysis"
	"golang.org/x/tools/go/analysis/checker"
	"golang.org/x/tools/go/packages"

	"dextral/core/tape"
)

// A corpus is a directory of a module that requires others; its coverage is
// printed, not tested:
//
//	go test -run Corpus -v ./analyzers/gosource/lower -corpus DIR -packages gonum.org/v1/gonum/...
var (
	corpus         = flag.String("corpus", "", "directory of a module whose dependencies are to be lowered")
	corpusPackages = flag.String("packages", "all", "patterns of packages, separated by commas")
)

// load lowers packages and their dependencies.
func load(t testing.TB, dir string, patterns ...string) (map[string]*Result, map[string]*packages.Package) {
	t.Helper()
	cfg := &packages.Config{Mode: packages.LoadAllSyntax, Dir: dir, Env: append(os.Environ(), "GOFLAGS=-mod=mod")}
	pkgs, err := packages.Load(cfg, patterns...)
	if err != nil {
		t.Fatal(err)
	}
	g, err := checker.Analyze([]*analysis.Analyzer{Analyzer}, pkgs, nil)
	if err != nil {
		t.Fatal(err)
	}
	results, loaded := map[string]*Result{}, map[string]*packages.Package{}
	for _, a := range g.Roots {
		if a.Err != nil {
			t.Logf("%s: %v", a.Package.PkgPath, a.Err)
			continue
		}
		results[a.Package.PkgPath], loaded[a.Package.PkgPath] = a.Result.(*Result), a.Package
	}
	return results, loaded
}

// allNumeric reports whether a function takes and returns only numbers, some
// of them floating point, by value, address or slice.
func allNumeric(f *Func) bool {
	ls := layouts{known: map[types.Type]*layout{}}
	sig := f.Object.Signature()
	var e *env
	if len(f.Args) > 0 {
		params := sig.TypeParams()
		if params.Len() == 0 {
			params = sig.RecvTypeParams()
		}
		e = newEnv(types.NewContext(), params, f.Args)
	}
	floats := false
	check := func(v *types.Var) bool {
		t := e.subst(v.Type())
		floats = floats || ls.floating(t)
		return ls.numbers(t)
	}
	if r := sig.Recv(); r != nil && !check(r) {
		return false
	}
	for _, tuple := range []*types.Tuple{sig.Params(), sig.Results()} {
		for i := range tuple.Len() {
			if !check(tuple.At(i)) && !isError(tuple.At(i).Type()) {
				return false
			}
		}
	}
	return floats
}

// trial evaluates a function on a few samples and says what happens.
func trial(r *Result, f *Func) string {
	if f.Program == nil {
		return f.Reason
	}
	m, err := r.Link(f)
	if err != nil {
		return err.Error()
	}
	b := m.NewBatch(64)
	for s := range b.Len() {
		for i, in := range b.Inputs() {
			v := float64((s*7+i*3)%11)*0.37 - 1
			if !in.Kind.IsFloat() {
				v = float64((s + i) % 4)
			}
			b.Set(s, i, v)
		}
	}
	m.Run(b)
	why := "no output"
	for s := range b.Len() {
		if b.Outcome(s) == tape.Returned {
			for o := range b.Outputs() {
				if b.Known(s, o) {
					return ""
				}
			}
			why = "only unknown outputs"
		} else if why == "no output" {
			why = b.Outcome(s).String() + ": " + b.Reason(s)
		}
	}
	if len(b.Outputs()) == 0 {
		return ""
	}
	if len(f.Unknown) > 0 {
		why += " (" + strings.Join(f.Unknown, ", ") + ")"
	}
	return why
}

func TestCorpus(t *testing.T) {
	if *corpus == "" {
		t.Skip("no -corpus")
	}
	results, _ := load(t, *corpus, strings.Split(*corpusPackages, ",")...)
	reasons := map[string][]string{}
	type row struct{ all, ok, other int }
	rows := map[string]*row{}
	total := row{}
	bytes, instrs := 0, 0
	for path, r := range results {
		module := strings.Join(strings.SplitN(path, "/", 4)[:min(3, strings.Count(path, "/")+1)], "/")
		if rows[module] == nil {
			rows[module] = &row{}
		}
		for _, f := range r.Funcs {
			if !allNumeric(f) {
				rows[module].other++
				total.other++
				continue
			}
			rows[module].all++
			total.all++
			why := trial(r, f)
			if why == "" {
				rows[module].ok++
				total.ok++
			} else {
				reasons[why] = append(reasons[why], f.Name)
			}
			if f.Program != nil {
				b, _ := f.Program.Stripped().MarshalBinary()
				bytes += len(b)
				instrs += len(f.Program.Code)
			}
		}
	}
	var names []string
	for n := range rows {
		names = append(names, n)
	}
	sort.Strings(names)
	var out strings.Builder
	fmt.Fprintf(&out, "\n%-44s %10s %10s %10s\n", "module", "numeric", "evaluated", "others")
	for _, n := range names {
		if rows[n].all > 0 {
			fmt.Fprintf(&out, "%-44s %10d %10d %10d\n", n, rows[n].all, rows[n].ok, rows[n].other)
		}
	}
	fmt.Fprintf(&out, "%-44s %10d %10d %10d\n", "all", total.all, total.ok, total.other)
	fmt.Fprintf(&out, "%d bytes, %d instructions in the numeric ones\n", bytes, instrs)
	var whys []string
	for w := range reasons {
		whys = append(whys, w)
	}
	sort.Slice(whys, func(i, j int) bool {
		return len(reasons[whys[i]]) > len(reasons[whys[j]]) || len(reasons[whys[i]]) == len(reasons[whys[j]]) && whys[i] < whys[j]
	})
	for _, w := range whys {
		sort.Strings(reasons[w])
		fmt.Fprintf(&out, "%4d %s: %s\n", len(reasons[w]), w, strings.Join(reasons[w][:min(4, len(reasons[w]))], " "))
	}
	t.Log(out.String())
}
