package lower

import (
	"go/token"
	"go/types"

	"golang.org/x/tools/go/ssa"

	"dextral/core/tape"
)

// instruction translates one instruction.
func (b *builder) instruction(in ssa.Instruction) {
	b.at(in.Pos())
	switch in := in.(type) {
	case *ssa.DebugRef:
	case *ssa.Phi:
		if _, ok := b.vals[in]; !ok {
			b.define(in)
		}
	case *ssa.Alloc:
		b.alloc(in)
	case *ssa.FieldAddr:
		b.fieldAddr(in)
	case *ssa.IndexAddr:
		b.indexAddr(in)
	case *ssa.Field:
		x := b.value(in.X)
		b.vals[in] = val{slot: x.slot + b.fieldOffset(b.typeOf(in.X), in.Field), n: b.words(b.typeOf(in))}
	case *ssa.Index:
		b.index(in)
	case *ssa.Extract:
		b.extract(in)
	case *ssa.Slice:
		b.slice(in)
	case *ssa.MakeSlice:
		b.makeSlice(in)
	case *ssa.Store:
		x := b.value(in.Val)
		b.store(b.address(in.Addr), x.slot, x.n)
	case *ssa.UnOp:
		b.unary(in)
	case *ssa.BinOp:
		b.binary(in)
	case *ssa.ChangeType:
		b.changeType(in, in.X)
	case *ssa.Convert:
		b.convert(in, in.X)
	case *ssa.MultiConvert:
		b.convert(in, in.X)
	case *ssa.ChangeInterface:
		b.makeInterface(in, in.X)
	case *ssa.MakeInterface:
		b.makeInterface(in, in.X)
	case *ssa.SliceToArrayPointer:
		b.arrayPointer(in)
	case *ssa.MakeClosure:
		// Translated where it is called; as a value it is opaque.
		b.vals[in] = val{slot: b.constant(tape.Opaque, 1), n: 1}
	case *ssa.Call:
		b.call(in)
	case *ssa.Jump:
		b.emit(tape.Instr{Op: tape.Jump, A: b.target(in.Block(), 0)})
	case *ssa.If:
		b.branch(in)
	case *ssa.Return:
		b.ret(in)
	case *ssa.Panic:
		b.emit(tape.Instr{Op: tape.Panic, A: b.reason(panicText(in.X))})
	default:
		b.fail("%s", kindOfInstruction(in))
	}
}

// kindOfInstruction says in the author's words what is not translated.
func kindOfInstruction(in ssa.Instruction) string {
	switch in := in.(type) {
	case *ssa.Defer, *ssa.RunDefers:
		return "defers a call"
	case *ssa.Go:
		return "starts a goroutine"
	case *ssa.MakeChan, *ssa.Send, *ssa.Select:
		return "uses a channel"
	case *ssa.MakeMap, *ssa.MapUpdate, *ssa.Lookup:
		return "uses a map"
	case *ssa.Range, *ssa.Next:
		return "ranges over a string or map"
	case *ssa.TypeAssert:
		return "asserts the type of an interface"
	default:
		return "does " + in.String()
	}
}

func (b *builder) extract(in *ssa.Extract) {
	x := b.value(in.Tuple)
	t := b.typeOf(in.Tuple).(*types.Tuple)
	off := int32(0)
	for i := range in.Index {
		off += b.words(t.At(i).Type())
	}
	b.vals[in] = val{slot: x.slot + off, n: b.words(b.typeOf(in))}
}

func (b *builder) changeType(in ssa.Value, x ssa.Value) {
	v, ok := b.vals[x]
	if !ok {
		v = b.find(x)
	}
	b.vals[in] = v
}

// makeInterface turns a value into an interface: an error that is not nil, or
// something that nobody looks into.
func (b *builder) makeInterface(in, x ssa.Value) {
	if !isError(b.typeOf(in)) {
		b.vals[in] = val{slot: b.constant(tape.Opaque, 1), n: 1}
		return
	}
	if isError(b.typeOf(x)) {
		b.vals[in] = b.value(x)
		return
	}
	b.vals[in] = val{slot: b.constant(tape.Err, 1), n: 1}
}

func (b *builder) unary(in *ssa.UnOp) {
	switch in.Op {
	case token.MUL:
		if g, ok := in.X.(*ssa.Global); ok && b.loadGlobal(in, g) {
			return
		}
		a := b.address(in.X)
		d := b.define(in)
		b.load(a, d.n, d.slot)
	case token.NOT:
		b.vals[in] = val{slot: b.op1(tape.NotB, b.value(in.X).slot), n: 1}
	case token.SUB:
		b.negate(in)
	case token.XOR:
		x := b.value(in.X).slot
		ones := b.integer(-1)
		k := b.layouts.kindOf(b.typeOf(in))
		b.vals[in] = val{slot: b.wrap(k, b.op2(tape.XorI, x, ones)), n: 1}
	default:
		b.fail("receives from a channel")
	}
}

func (b *builder) negate(in *ssa.UnOp) {
	x := b.value(in.X)
	l := b.layout(b.typeOf(in))
	d := b.define(in)
	for i, f := range l.fields {
		op := tape.NegI
		switch {
		case f.Kind == tape.F64:
			op = tape.NegF
		case f.Kind == tape.F32:
			op = tape.NegG
		}
		b.emit(tape.Instr{Op: op, Dst: d.slot + int32(i), A: x.slot + int32(i)})
		if f.Kind.IsInt() && f.Kind.Bits() < 64 {
			b.vals[in] = val{slot: b.wrap(f.Kind, d.slot), n: 1}
		}
	}
}

// wrap reduces an integer to the width of its kind.
func (b *builder) wrap(k tape.Kind, s int32) int32 {
	if k.Bits() == 64 {
		return s
	}
	d := b.temp(1)
	b.emit(tape.Instr{Op: tape.Wrap, Dst: d, A: s, C: int32(k)})
	return d
}

// convert converts between numbers.
func (b *builder) convert(in, x ssa.Value) {
	from, to := b.layout(b.typeOf(x)), b.layout(b.typeOf(in))
	if from == nil || to == nil {
		b.fail("converts to %v", b.typeOf(in))
	}
	if types.Identical(b.typeOf(x).Underlying(), b.typeOf(in).Underlying()) {
		b.changeType(in, x)
		return
	}
	if isPointer(b.typeOf(x)) && isPointer(b.typeOf(in)) {
		b.unsafePointer(in, x)
		return
	}
	if !to.numeric {
		// A string: nobody looks into it. Anything else must be kept apart.
		if basic, ok := b.typeOf(in).Underlying().(*types.Basic); ok && basic.Info()&types.IsString != 0 {
			b.vals[in] = val{slot: b.constant(tape.Opaque, 1), n: 1}
			return
		}
	}
	if !to.numeric || !from.numeric || len(to.fields) != len(from.fields) {
		b.fail("converts %v to %v", b.typeOf(x), b.typeOf(in))
	}
	v := b.value(x)
	d := b.temp(to.words())
	for i := range to.fields {
		b.scalar(from.fields[i].Kind, to.fields[i].Kind, v.slot+int32(i), d+int32(i))
	}
	b.vals[in] = val{slot: d, n: to.words()}
}

func isPointer(t types.Type) bool {
	switch u := t.Underlying().(type) {
	case *types.Pointer:
		return true
	case *types.Basic:
		return u.Kind() == types.UnsafePointer
	}
	return false
}

// unsafePointer converts between addresses by way of unsafe.Pointer. It is
// translated where both ends are numbers of one width throughout, such as an
// array and its first element.
func (b *builder) unsafePointer(in, x ssa.Value) {
	if to, ok := b.typeOf(in).Underlying().(*types.Pointer); ok {
		c, ok := x.(*ssa.Convert)
		if !ok {
			b.fail("converts %v to %v", b.typeOf(x), b.typeOf(in))
		}
		from, ok := b.typeOf(c.X).Underlying().(*types.Pointer)
		if !ok || b.uniform(from.Elem()) == 0 || b.uniform(from.Elem()) != b.uniform(to.Elem()) {
			b.fail("converts %v to %v", b.typeOf(c.X), b.typeOf(in))
		}
	}
	v, ok := b.vals[x]
	if !ok {
		v = b.find(x)
	}
	if v.at != nil {
		v.at = v.at.free()
	}
	b.vals[in] = v
}

// uniform returns the width in bits of the numbers that t consists of, which
// must be held without extension, or 0.
func (b *builder) uniform(t types.Type) int {
	l := b.layout(t)
	if l == nil {
		return 0
	}
	width := 0
	for _, f := range l.fields {
		w := 0
		switch f.Kind {
		case tape.F64, tape.U64, tape.I64:
			w = 64
		case tape.F32, tape.U32:
			w = 32
		}
		if w == 0 || width != 0 && w != width {
			return 0
		}
		width = w
	}
	return width
}

// scalar converts one number of kind from in slot s to kind to in slot d.
func (b *builder) scalar(from, to tape.Kind, s, d int32) {
	in := tape.Instr{Dst: d, A: s}
	switch {
	case from == to:
		in.Op, in.C = tape.Copy, 1
	case from == tape.F64 && to == tape.F32:
		in.Op = tape.FtoG
	case from == tape.F32 && to == tape.F64:
		in.Op = tape.GtoF
	case from.IsInt() && to == tape.F64:
		in.Op, in.C = tape.ItoF, int32(from)
	case from.IsInt() && to == tape.F32:
		in.Op, in.C = tape.ItoG, int32(from)
	case from == tape.F64 && to.IsInt():
		in.Op, in.C = tape.FtoI, int32(to)
	case from == tape.F32 && to.IsInt():
		in.Op, in.C = tape.GtoI, int32(to)
	case from.IsInt() && to.IsInt():
		in.Op, in.C = tape.Wrap, int32(to)
	default:
		b.fail("converts %v to %v", from, to)
	}
	b.emit(in)
}
