package lower

import (
	"go/types"
	"strings"

	"golang.org/x/tools/go/ssa"

	"dextral/core/tape"
)

func (b *builder) call(in *ssa.Call) {
	if bi, ok := in.Call.Value.(*ssa.Builtin); ok {
		b.builtin(in, bi)
		return
	}
	callee := in.Call.StaticCallee()
	if callee == nil {
		b.dynamic(in)
		return
	}
	if b.intrinsic(in, callee) {
		return
	}
	if b.initials != nil && strings.HasPrefix(callee.Name(), "init") && callee.Signature.Params().Len() == 0 && callee.Signature.Results().Len() == 0 {
		b.define(in)
		return // of an imported package, or one that the author wrote
	}
	args := in.Call.Args
	if c, ok := in.Call.Value.(*ssa.MakeClosure); ok {
		args = append(args[:len(args):len(args)], c.Bindings...)
	}
	b.callNamed(in, b.request(callee, b.env), args)
}

// dynamic is a call of a function value or of a method of an interface.
func (b *builder) dynamic(in *ssa.Call) {
	what := "a function value"
	if in.Call.IsInvoke() {
		if isError(in.Call.Value.Type()) && in.Call.Method.Name() == "Error" {
			b.vals[in] = val{slot: b.constant(tape.Opaque, 1), n: 1}
			return
		}
		what = "method " + in.Call.Method.Name() + " of an interface"
	}
	b.callNamed(in, what, in.Call.Args)
}

// callNamed calls a program by its name. One that nobody defines is an unknown
// function.
func (b *builder) callNamed(in *ssa.Call, name string, args []ssa.Value) {
	site := tape.CallSite{Callee: name}
	for _, a := range args {
		x := b.value(a)
		if x.n == 0 {
			continue
		}
		site.Args = append(site.Args, tape.Range{Slot: x.slot, N: x.n})
		if l := b.layout(b.typeOf(a)); l == nil || l.hasAddress() {
			site.Shared = b.initials == nil
		}
	}
	d := b.define(in)
	site.Words = d.n
	call := tape.Instr{Op: tape.Call, A: int32(len(b.p.Calls))}
	if d.n > 0 {
		call.Dst = d.slot
	}
	b.p.Calls = append(b.p.Calls, site)
	b.emit(call)
}

// intrinsic translates calls of the standard library that tapes know.
func (b *builder) intrinsic(in *ssa.Call, callee *ssa.Function) bool {
	if callee.Pkg == nil || callee.Signature.Recv() != nil {
		return false
	}
	switch path, name := callee.Pkg.Pkg.Path(), callee.Name(); path {
	case "math":
		op, ok := tape.MathOp(name)
		if !ok {
			return false
		}
		b.math(in, op)
		return true
	case "errors", "fmt":
		switch name {
		case "New", "Errorf":
			b.vals[in] = val{slot: b.constant(tape.Err, 1), n: 1}
			return true
		case "Sprintf", "Sprint", "Sprintln":
			b.vals[in] = val{slot: b.constant(tape.Opaque, 1), n: 1}
			return true
		}
	}
	return false
}

func (b *builder) math(in *ssa.Call, op tape.Op) {
	var slots [3]int32
	for i, a := range in.Call.Args {
		slots[i] = b.value(a).slot
	}
	d := b.define(in)
	b.emit(tape.Instr{Op: op, Dst: d.slot, A: slots[0], B: slots[1], C: slots[2]})
}

// builtin translates a function built into the language.
func (b *builder) builtin(in *ssa.Call, f *ssa.Builtin) {
	args := in.Call.Args
	switch f.Name() {
	case "len", "cap":
		b.length(in, f.Name(), args[0])
	case "append":
		b.appendTo(in, args)
	case "copy":
		b.copySlice(in, args)
	case "min", "max":
		b.extreme(in, f.Name(), args)
	case "real", "imag":
		x := b.value(args[0])
		k := int32(0)
		if f.Name() == "imag" {
			k = 1
		}
		b.vals[in] = val{slot: x.slot + k, n: 1}
	case "complex":
		re, im := b.value(args[0]).slot, b.value(args[1]).slot
		d := b.define(in)
		b.emit(tape.Instr{Op: tape.Copy, Dst: d.slot, A: re, C: 1})
		b.emit(tape.Instr{Op: tape.Copy, Dst: d.slot + 1, A: im, C: 1})
	case "ssa:wrapnilchk":
		b.changeType(in, args[0])
	case "clear":
		b.fail("clears a map or slice")
	case "print", "println":
		b.fail("prints")
	default:
		b.fail("calls %s", f.Name())
	}
}

func (b *builder) length(in *ssa.Call, name string, x ssa.Value) {
	k := int32(1)
	if name == "cap" {
		k = 2
	}
	switch t := b.typeOf(x).Underlying().(type) {
	case *types.Slice:
		b.vals[in] = val{slot: b.value(x).slot + k, n: 1}
	case *types.Array:
		b.vals[in] = val{slot: b.integer(t.Len()), n: 1}
	case *types.Pointer:
		b.vals[in] = val{slot: b.integer(t.Elem().Underlying().(*types.Array).Len()), n: 1}
	default:
		b.unknown(in)
	}
}

func (b *builder) appendTo(in *ssa.Call, args []ssa.Value) {
	t, ok := b.typeOf(args[0]).Underlying().(*types.Slice)
	if !ok {
		b.fail("appends to a %v", b.typeOf(args[0]))
	}
	if _, ok := b.typeOf(args[1]).Underlying().(*types.Slice); !ok {
		b.fail("appends a string")
	}
	x, y := b.value(args[0]).slot, b.value(args[1]).slot
	d := b.define(in)
	b.emit(tape.Instr{Op: tape.Append, Dst: d.slot, A: x, B: y, C: b.words(t.Elem())})
}

func (b *builder) copySlice(in *ssa.Call, args []ssa.Value) {
	t, ok := b.typeOf(args[0]).Underlying().(*types.Slice)
	if !ok {
		b.fail("copies to a %v", b.typeOf(args[0]))
	}
	if _, ok := b.typeOf(args[1]).Underlying().(*types.Slice); !ok {
		b.fail("copies from a string")
	}
	x, y := b.value(args[0]).slot, b.value(args[1]).slot
	n := b.least(x+1, y+1)
	words := b.op2(tape.MulI, n, b.integer(int64(b.words(t.Elem()))))
	b.emit(tape.Instr{Op: tape.Move, A: x, B: y, C: words})
	b.vals[in] = val{slot: n, n: 1}
}

// least is the smaller of two integers in slots x and y, by arithmetic:
// y + (x-y)*(x<y).
func (b *builder) least(x, y int32) int32 {
	less := b.temp(1)
	b.emit(tape.Instr{Op: tape.LtI, Dst: less, A: x, B: y})
	return b.pick(less, x, y)
}

// pick is x if the truth value is true, else y, for integers.
func (b *builder) pick(truth, x, y int32) int32 {
	one := b.temp(1)
	b.emit(tape.Instr{Op: tape.Recast, Dst: one, A: truth, C: int32(tape.I64)})
	d := b.op2(tape.SubI, x, y)
	return b.op2(tape.AddI, y, b.op2(tape.MulI, d, one))
}

// extreme is min or max.
func (b *builder) extreme(in *ssa.Call, name string, args []ssa.Value) {
	k := b.layouts.kindOf(b.typeOf(in))
	s := b.value(args[0]).slot
	for _, a := range args[1:] {
		y := b.value(a).slot
		switch {
		case k.IsInt():
			x := s
			lt := b.op2(operation2(k), x, y)
			if name == "max" {
				lt = b.op2(operation2(k), y, x)
			}
			s = b.pick(lt, x, y)
		case k == tape.F64:
			op, _ := tape.MathOp("builtin_" + name)
			s = b.op2(op, s, y)
		case k == tape.F32:
			op, _ := tape.MathOp("builtin_" + name)
			s = b.op1(tape.FtoG, b.op2(op, b.op1(tape.GtoF, s), b.op1(tape.GtoF, y)))
		default:
			b.fail("%s of strings", name)
		}
	}
	b.vals[in] = val{slot: s, n: 1}
}

// operation2 is the less-than of an integer kind.
func operation2(k tape.Kind) tape.Op {
	if k.IsSigned() {
		return tape.LtI
	}
	return tape.LtU
}
