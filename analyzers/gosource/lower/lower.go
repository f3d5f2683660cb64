package lower

import (
	"go/ast"
	"go/token"
	"go/types"
	"reflect"
	"slices"
	"strings"

	"golang.org/x/tools/go/analysis"
	"golang.org/x/tools/go/ssa"

	"dextral/core/tape"
)

// Analyzer lowers the numeric functions of a package to tapes.
var Analyzer = &analysis.Analyzer{
	Name:       "lower",
	Doc:        "lower numeric functions to tapes, small programs that can be evaluated on samples",
	Run:        run,
	ResultType: reflect.TypeFor[*Result](),
	FactTypes:  []analysis.Fact{(*Tapes)(nil)},
}

// Func is one function of the package, or one instance of a generic one.
type Func struct {
	Object   *types.Func
	Decl     *ast.FuncDecl
	Args     []types.Type // of an instance
	Name     string       // of the tape, such as "example.org/q.Mul" or "(example.org/q.Vec[float64]).Dot"
	Program  *tape.Program
	Reason   string      // why there is no tape
	Stops    []string    // parts of the function that are not translated: samples that come there are undecided
	Unknown  []string    // what the function uses that is not known
	Position []token.Pos // of the places of the program
}

// Result is what is known of a package.
type Result struct {
	Funcs   []*Func      // in the order of the source
	Library tape.Library // every tape that a function here may call
	byFunc  map[*types.Func][]*Func
}

// Of returns the tapes of a declared function: one, or one for each instance.
func (r *Result) Of(f *types.Func) []*Func { return r.byFunc[f] }

// Link prepares a function for evaluation.
func (r *Result) Link(f *Func) (*tape.Machine, error) { return tape.Link(f.Program, r.Library) }

func run(pass *analysis.Pass) (any, error) {
	result := &Result{Library: tape.Library{}, byFunc: map[*types.Func][]*Func{}}
	if !admits(pass) {
		return result, nil
	}
	p := newPackage(pass, result)
	p.declared()
	p.drain()
	p.initialise()
	p.finish()
	if fact := p.export(); len(fact.Names)+len(fact.Globals) > 0 {
		pass.ExportPackageFact(fact)
	}
	return result, nil
}

// packageLowerer lowers the functions of one package, those that are asked
// for and those they call.
type packageLowerer struct {
	pass     *analysis.Pass
	pkg      *types.Package
	fset     *token.FileSet
	files    []*ast.File
	ssaPkg   *ssa.Package
	allFuncs []*ssa.Function
	layouts  layouts
	ctx      *types.Context
	exprs    map[token.Pos]ast.Expr
	result   *Result

	funcs        map[string]*Func // every name requested
	own          tape.Library     // of this package
	library      tape.Library     // with those of others
	queue        []*job
	facts        map[*types.Package]*Tapes
	globals      map[*ssa.Global][]tape.Const
	initialised  bool
	initialising bool   // the functions that initialisers call are being lowered
	early        []*job // those of them that use what is not known by then
}

// job is a function to be lowered.
type job struct {
	fn   *ssa.Function
	env  *env
	name string
	into *Func
}

func newPackage(pass *analysis.Pass, result *Result) *packageLowerer {
	p := &packageLowerer{pass: pass, pkg: pass.Pkg, fset: pass.Fset, files: pass.Files, result: result,
		layouts: layouts{known: map[types.Type]*layout{}}, ctx: types.NewContext(),
		funcs: map[string]*Func{}, own: tape.Library{}, library: result.Library,
		facts: map[*types.Package]*Tapes{}, globals: map[*ssa.Global][]tape.Const{}}
	prog := ssa.NewProgram(pass.Fset, 0)
	seen := map[*types.Package]bool{}
	for _, q := range pass.Pkg.Imports() {
		p.create(prog, q, seen)
	}
	p.ssaPkg = prog.CreatePackage(pass.Pkg, pass.Files, pass.TypesInfo, false)
	p.ssaPkg.Build()
	p.collect()
	return p
}

// create makes the members of an imported package known, without bodies.
func (p *packageLowerer) create(prog *ssa.Program, q *types.Package, seen map[*types.Package]bool) {
	if seen[q] {
		return
	}
	seen[q] = true
	prog.CreatePackage(q, nil, nil, true)
}

// collect lists all functions of the package, with the literals in them.
func (p *packageLowerer) collect() {
	var add func(*ssa.Function)
	add = func(fn *ssa.Function) {
		p.allFuncs = append(p.allFuncs, fn)
		for _, a := range fn.AnonFuncs {
			add(a)
		}
	}
	for _, file := range p.files {
		for _, decl := range file.Decls {
			if d, ok := decl.(*ast.FuncDecl); ok {
				if obj, ok := p.pass.TypesInfo.Defs[d.Name].(*types.Func); ok {
					if fn := p.ssaPkg.Prog.FuncValue(obj); fn != nil {
						add(fn)
					}
				}
			}
		}
	}
	if init := p.ssaPkg.Func("init"); init != nil {
		add(init)
	}
}

// declared asks for every declared function that deals in numbers.
func (p *packageLowerer) declared() {
	for _, file := range p.files {
		for _, decl := range file.Decls {
			d, ok := decl.(*ast.FuncDecl)
			if !ok || d.Body == nil {
				continue
			}
			obj, ok := p.pass.TypesInfo.Defs[d.Name].(*types.Func)
			if !ok {
				continue
			}
			fn := p.ssaPkg.Prog.FuncValue(obj)
			if fn == nil || fn.Name() == "_" {
				continue
			}
			p.declare(obj, d, fn)
		}
	}
}

func (p *packageLowerer) declare(obj *types.Func, d *ast.FuncDecl, fn *ssa.Function) {
	instances := [][]types.Type{nil}
	if fn.TypeParams().Len() > 0 {
		instances = floatArgs(fn.TypeParams())
	}
	for _, args := range instances {
		var e *env
		if args != nil {
			e = newEnv(p.ctx, fn.TypeParams(), args)
		}
		switch {
		case p.deals(fn.Signature, e) && (args == nil || args[0] != types.Typ[types.Int]):
			p.add(fn, e, nameOf(obj, args), obj, d, args)
		case p.onlyNumbers(fn.Signature, e):
			// Not worth a look by itself, but others may call it.
			p.add(fn, e, nameOf(obj, args), obj, nil, args)
		}
	}
}

// add asks for a function, unless it has been asked for.
func (p *packageLowerer) add(fn *ssa.Function, e *env, name string, obj *types.Func, d *ast.FuncDecl, args []types.Type) {
	if _, ok := p.funcs[name]; ok {
		return
	}
	f := &Func{Object: obj, Decl: d, Args: args, Name: name}
	p.funcs[name] = f
	if d != nil {
		p.result.Funcs = append(p.result.Funcs, f)
		p.result.byFunc[obj] = append(p.result.byFunc[obj], f)
	}
	p.queue = append(p.queue, &job{fn, e, name, f})
}

// request asks for a function that is called in environment e, and returns
// the name of its tape.
func (p *packageLowerer) request(fn *ssa.Function, e *env) string {
	var args []types.Type
	body := fn
	if o := fn.Origin(); o != nil {
		for _, a := range fn.TypeArgs() {
			args = append(args, e.subst(a))
		}
		body, e = o, newEnv(p.ctx, o.TypeParams(), args)
	} else if fn.Parent() == nil {
		e = nil
	}
	name := ""
	obj, _ := body.Object().(*types.Func)
	switch {
	case obj != nil:
		name = nameOf(obj, args)
	case fn.Parent() != nil:
		name = p.literalName(fn, e)
	default:
		name = fn.String()
	}
	if len(body.Blocks) > 0 {
		p.add(body, e, name, obj, nil, args)
	} else if obj != nil && obj.Pkg() != nil {
		if p.fetch(obj.Pkg(), name); p.library[name] == nil && len(args) > 0 {
			// An instance for a named type computes what that for its
			// underlying type does, unless methods come in.
			name = nameOf(obj, underlying(args))
			p.fetch(obj.Pkg(), name)
		}
	}
	return name
}

func underlying(args []types.Type) []types.Type {
	out := make([]types.Type, len(args))
	for i, a := range args {
		out[i] = a.Underlying()
	}
	return out
}

// fetch gets the tape of an imported function, and of what it calls, from the
// facts of its package.
func (p *packageLowerer) fetch(pkg *types.Package, name string) {
	if _, ok := p.library[name]; ok {
		return
	}
	fact := p.imported(pkg)
	if fact == nil {
		return
	}
	q := fact.program(name)
	if q == nil {
		return
	}
	p.library[name] = q
	for i := range q.Calls {
		p.fetchAny(q.Calls[i].Callee)
	}
}

// fetchAny is fetch where only the name is known. The facts of packages that
// are imported indirectly are at hand too.
func (p *packageLowerer) fetchAny(name string) {
	for _, f := range p.pass.AllPackageFacts() {
		if t, ok := f.Fact.(*Tapes); ok && t.program(name) != nil {
			p.fetch(f.Package, name)
			return
		}
	}
}

// imported returns what an imported package exported, or nil.
func (p *packageLowerer) imported(pkg *types.Package) *Tapes {
	if t, ok := p.facts[pkg]; ok {
		return t
	}
	t := new(Tapes)
	if pkg == p.pkg || !p.pass.ImportPackageFact(pkg, t) {
		t = nil
	}
	p.facts[pkg] = t
	return t
}

// drain lowers what has been asked for, and what that asks for.
func (p *packageLowerer) drain() {
	for len(p.queue) > 0 {
		j := p.queue[0]
		p.queue = p.queue[1:]
		p.lower(j)
	}
}

func (p *packageLowerer) newBuilder(fn *ssa.Function, e *env, name string) *builder {
	return &builder{packageLowerer: p, fn: fn, env: e, p: &tape.Program{Name: name},
		vals: map[ssa.Value]val{}, consts: map[tape.Const]int32{}, data: map[*ssa.Global]int32{}, places: map[token.Pos]int32{}}
}

func (p *packageLowerer) lower(j *job) {
	b := p.newBuilder(j.fn, j.env, j.name)
	if why := b.build(); why != "" {
		j.into.Reason = why
		return
	}
	b.p.Optimize()
	if err := b.p.Check(); err != nil {
		j.into.Reason = "is not translated correctly: " + err.Error()
		return
	}
	j.into.Stops, j.into.Unknown = b.stops, b.unknowns
	if p.initialising && len(b.unknowns) > 0 {
		p.early = append(p.early, j)
	}
	if !b.p.MayReturn() {
		j.into.Reason = "never returns"
		if len(b.stops) > 0 {
			j.into.Reason = b.stops[0]
		}
		return
	}
	j.into.Program, j.into.Position = b.p, b.pos
	p.own[j.name], p.library[j.name] = b.p, b.p
}

// noteCallees adds the functions that a tape calls and nobody knows to what is
// unknown to it.
func (p *packageLowerer) noteCallees() {
	for _, f := range p.funcs {
		if f.Program == nil {
			continue
		}
		for i := range f.Program.Calls {
			name := f.Program.Calls[i].Callee
			if what := "function " + name; p.library[name] == nil && !slices.Contains(f.Unknown, what) {
				f.Unknown = append(f.Unknown, what)
			}
		}
	}
}

// finish withdraws tapes that cannot return because of what they call.
func (p *packageLowerer) finish() {
	for changed := true; changed; {
		changed = false
		for name, f := range p.funcs {
			if f.Program == nil || f.Program.MayReturnWith(p.library) {
				continue
			}
			f.Reason = "calls " + f.Program.Blocker(p.library)
			f.Program = nil
			delete(p.own, name)
			delete(p.library, name)
			changed = true
		}
	}
	p.noteCallees()
}

// nameOf names the tape of a function.
func nameOf(obj *types.Func, args []types.Type) string {
	return obj.Origin().FullName() + argsText(args)
}

// literalName names the tape of a function literal after the function it
// stands in.
func (p *packageLowerer) literalName(fn *ssa.Function, e *env) string {
	root := fn
	for root.Parent() != nil {
		root = root.Parent()
	}
	name := p.pkg.Path() + "." + root.Name()
	if obj, ok := root.Object().(*types.Func); ok {
		var args []types.Type
		if e != nil {
			args = e.list
		}
		name = nameOf(obj, args)
	}
	return name + strings.TrimPrefix(fn.Name(), root.Name())
}

// deals reports whether a signature deals in floating-point numbers, directly
// or by address.
func (p *packageLowerer) deals(sig *types.Signature, e *env) bool {
	return slices.ContainsFunc(variables(sig), func(v *types.Var) bool { return p.layouts.floating(e.subst(v.Type())) })
}

// onlyNumbers reports whether all parameters and results are numbers, by value
// or address.
func (p *packageLowerer) onlyNumbers(sig *types.Signature, e *env) bool {
	for _, v := range variables(sig) {
		if !p.layouts.numbers(e.subst(v.Type())) {
			return false
		}
	}
	return true
}

// numbers reports whether a type is numbers, or the address of numbers.
func (ls *layouts) numbers(t types.Type) bool {
	switch u := t.Underlying().(type) {
	case *types.Pointer:
		t = u.Elem()
	case *types.Slice:
		t = u.Elem()
	}
	l := ls.of(t)
	return l != nil && l.numeric
}

// variables lists receiver, parameters and results.
func variables(sig *types.Signature) []*types.Var {
	var vars []*types.Var
	if r := sig.Recv(); r != nil {
		vars = append(vars, r)
	}
	for i := range sig.Params().Len() {
		vars = append(vars, sig.Params().At(i))
	}
	for i := range sig.Results().Len() {
		vars = append(vars, sig.Results().At(i))
	}
	return vars
}

// floating reports whether a type is numbers, or the address of numbers, some
// of them floating point.
func (ls *layouts) floating(t types.Type) bool {
	switch u := t.Underlying().(type) {
	case *types.Pointer:
		t = u.Elem()
	case *types.Slice:
		t = u.Elem()
	}
	l := ls.of(t)
	return l != nil && l.numeric && l.floats > 0
}

// admits is the cheap filter: it looks at the types of a package only.
func admits(pass *analysis.Pass) bool {
	if path := pass.Pkg.Path(); path == "math/bits" || isStandard(pass) && path != "math/cmplx" {
		return path == "math/bits"
	}
	ls := layouts{known: map[types.Type]*layout{}}
	scope := pass.Pkg.Scope()
	for _, name := range scope.Names() {
		switch obj := scope.Lookup(name).(type) {
		case *types.Func:
			if ls.signature(obj.Signature()) {
				return true
			}
		case *types.TypeName:
			named, ok := obj.Type().(*types.Named)
			if !ok {
				continue
			}
			for i := range named.NumMethods() {
				if ls.signature(named.Method(i).Signature()) {
					return true
				}
			}
		}
	}
	return false
}

// standard are the first elements of the paths of the standard library.
const standard = " archive bufio bytes cmp compress container context crypto database debug embed encoding errors expvar " +
	"flag fmt go hash html image index internal io iter log maps math mime net os path plugin reflect regexp runtime simd " +
	"slices sort strconv strings structs sync syscall testing text time unicode unique unsafe vendor weak "

// isStandard reports whether a package belongs to the standard library. Its
// numeric functions are those of package math, which tapes know.
func isStandard(pass *analysis.Pass) bool {
	if m := pass.Module; m != nil && m.Path != "" && m.Path != "std" {
		return false
	}
	first, _, _ := strings.Cut(pass.Pkg.Path(), "/")
	return strings.Contains(standard, " "+first+" ")
}

// signature reports whether a function may deal in floating-point numbers; a
// generic one may.
func (ls *layouts) signature(sig *types.Signature) bool {
	if sig.TypeParams().Len() > 0 || sig.RecvTypeParams().Len() > 0 {
		return true
	}
	p := packageLowerer{layouts: *ls}
	return p.deals(sig, nil)
}
