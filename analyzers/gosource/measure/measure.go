package measure

import (
	_ "embed" // of the package's essay
	"go/types"
	"reflect"
	"slices"
	"sync"

	"golang.org/x/tools/go/analysis"

	"dextral/analyzers/gosource/doc"
	"dextral/analyzers/gosource/lower"
	"dextral/core/operation"
	"dextral/core/tape"
)

//go:embed doc.go
var essay string

// Analyzer measures the numeric functions of a package.
var Analyzer = &analysis.Analyzer{
	Name:       "measure",
	Doc:        doc.Section(essay),
	Run:        run,
	Requires:   []*analysis.Analyzer{lower.Analyzer},
	ResultType: reflect.TypeFor[*Result](),
	FactTypes:  []analysis.Fact{(*Meanings)(nil)},
}

// Result is what the functions of a package compute.
type Result struct {
	Funcs    []*Function   // in the order of the source
	Types    []*Type       // named types of four, nine or sixteen numbers that they deal in, by name; also imported ones
	Unread   []*lower.Func // declared functions that deal in numbers and could not be evaluated
	byFunc   map[*types.Func][]*Function
	imported func(*types.Package) *Meanings
}

// Imported is what is known of an imported package, which may be nothing.
func (r *Result) Imported(pkg *types.Package) *Meanings { return r.imported(pkg) }

// Type finds what is known of a type by its name with the path of its package,
// or nil.
func (r *Result) Type(name string) *Type {
	for _, t := range r.Types {
		if t.Name == name {
			return t
		}
	}
	return nil
}

// Of returns what is known of a declared function: one entry, or one for each
// instance of a generic one; none if it could not be evaluated.
func (r *Result) Of(f *types.Func) []*Function { return r.byFunc[f] }

// Operand is a group of numbers that go into a function or come out of it.
type Operand struct {
	operation.Operand
	Name     string     // as the author calls it: "q", "p.Rot", "roll, pitch, yaw"
	Go       types.Type // nil for a run of parameters
	Ports    []int      // of the tape's inputs or outputs, in order
	Receiver bool       // it is, or is part of, the receiver
	Written  bool       // an output: a parameter that the function writes
}

// Layout is one way to see the numbers of a function as operands.
type Layout struct{ In, Out []Operand }

// Case is a function with its integers, truth values and named constants set.
type Case struct {
	Label    string        // such as "order == XYZ"; "" where there is nothing to set
	Settings map[int]int64 // by tape input
	Layout                 // the one that Identity speaks of
	Identity *operation.Identity
}

// Function is a numeric function that can be evaluated.
type Function struct {
	*lower.Func
	Layout             // of the first case
	Layouts []Layout   // all ways to see its numbers, likeliest first
	Cases   []*Case    // at least one
	Flow    *tape.Flow // which input may influence which output; not Exact where it was not asked for
	Single  bool       // it computes in float32

	library tape.Library
	mu      sync.Mutex
	machine *tape.Machine
	batch   *tape.Batch
}

func run(pass *analysis.Pass) (any, error) {
	lowered := pass.ResultOf[lower.Analyzer].(*lower.Result)
	r := &Result{byFunc: map[*types.Func][]*Function{}, imported: importer(pass)}
	for _, l := range lowered.Funcs {
		f := newFunction(lowered, l)
		if f == nil {
			r.Unread = append(r.Unread, l)
			continue
		}
		r.Funcs = append(r.Funcs, f)
		r.byFunc[l.Object] = append(r.byFunc[l.Object], f)
		f.identify()
	}
	r.settle()
	if m := r.export(pass.Pkg.Path()); len(m.Types)+len(m.Funcs) > 0 {
		pass.ExportPackageFact(m)
	}
	return r, nil
}

// importer reads the facts of imported packages, each once.
func importer(pass *analysis.Pass) func(*types.Package) *Meanings {
	known := map[*types.Package]*Meanings{}
	return func(pkg *types.Package) *Meanings {
		m, ok := known[pkg]
		if !ok {
			m = new(Meanings)
			if pkg != nil && pkg != pass.Pkg {
				pass.ImportPackageFact(pkg, m)
			}
			known[pkg] = m
		}
		return m
	}
}

// newFunction prepares a function for evaluation, or returns nil if it cannot
// be evaluated or has no numbers to look at.
func newFunction(lowered *lower.Result, l *lower.Func) *Function {
	if l.Program == nil || !l.Program.Sig.Runnable() {
		return nil
	}
	if instructions(l.Program, lowered.Library) > maxInstructions {
		return nil
	}
	machine, err := lowered.Link(l)
	if err != nil {
		return nil
	}
	f := &Function{Func: l, library: lowered.Library, machine: machine, batch: machine.NewBatch(tape.Lanes), Flow: &tape.Flow{}}
	if f.Layouts = f.layouts(); f.flows() {
		f.Flow = tape.Analyze(l.Program, lowered.Library)
		f.Layouts = f.layouts()
	}
	if len(f.Layouts) == 0 {
		return nil
	}
	f.Layout = f.Layouts[0]
	for _, p := range f.batch.Outputs() {
		f.Single = f.Single || p.Kind == tape.F32
	}
	for _, p := range f.batch.Inputs() {
		f.Single = f.Single || p.Kind == tape.F32
	}
	f.Cases = f.cases()
	return f
}

// flows reports whether it is worth the time to find out which input influences which
// output: a parameter may be a result, some operand may be a quaternion or a matrix, or the
// operands are those of a known operation.
func (f *Function) flows() bool {
	for _, p := range f.machine.Sig.Params {
		if p.Mode != tape.Value {
			return true
		}
	}
	for _, l := range f.Layouts {
		if slices.ContainsFunc(slices.Concat(l.In, l.Out), func(o Operand) bool { return o.Kind >= operation.Quaternion }) ||
			f.Question(&Case{Layout: l}).Shape().Known() {
			return true
		}
	}
	return false
}

// maxInstructions is the size of a function, with all that it calls, beyond which nobody
// asks what it computes: the inverse of a 4x4 matrix, written out, has some 300.
const maxInstructions = 2000

// instructions counts those of a program and of all that it calls.
func instructions(p *tape.Program, library tape.Library) int {
	seen := map[*tape.Program]bool{}
	n := 0
	var visit func(*tape.Program)
	visit = func(p *tape.Program) {
		if p == nil || seen[p] || n > maxInstructions {
			return
		}
		seen[p] = true
		n += len(p.Code)
		for i := range p.Calls {
			visit(library[p.Calls[i].Callee])
		}
	}
	visit(p)
	return n
}
