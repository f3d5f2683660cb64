package lower

import (
	"go/constant"
	"go/types"
	"math"

	"golang.org/x/tools/go/ssa"

	"dextral/core/tape"
)

// value returns the slots of v. An address is made a word first.
func (b *builder) value(v ssa.Value) val {
	x, ok := b.vals[v]
	if !ok {
		x = b.find(v)
	}
	if x.at != nil {
		x = val{slot: b.addressWord(x.at), n: 1}
	}
	return x
}

// find gives a place to a value that is not an instruction translated before.
func (b *builder) find(v ssa.Value) val {
	switch v := v.(type) {
	case *ssa.Const:
		return b.constantValue(v)
	case *ssa.Global:
		x := val{n: 1, at: b.global(v)}
		return x
	case *ssa.Function, *ssa.Builtin:
		return val{slot: b.constant(tape.Opaque, 1), n: 1}
	case *ssa.Phi:
		// Operands of phis may come later than the phi.
		x := b.reserve(v)
		b.vals[v] = x
		return x
	}
	b.fail("%s is not translated", v.Name())
	return val{}
}

// reserve reserves the slots of the result of an instruction.
func (b *builder) reserve(v ssa.Value) val {
	n := b.words(b.typeOf(v))
	return val{slot: b.temp(n), n: n}
}

// define reserves the slots of v's result and remembers them.
func (b *builder) define(v ssa.Value) val {
	x := b.reserve(v)
	b.vals[v] = x
	return x
}

func (b *builder) constantValue(c *ssa.Const) val {
	t := b.typeOf(c)
	l := b.layout(t)
	if l == nil {
		b.fail("constant of type %v", t)
	}
	if len(l.fields) == 1 {
		k := l.fields[0].Kind
		return val{slot: b.constant(k, b.constantBits(c, k)), n: 1}
	}
	s := b.temp(l.words())
	if c.Value == nil {
		b.emit(tape.Instr{Op: tape.Zero, Dst: s, C: l.words()})
		return val{slot: s, n: l.words()}
	}
	// A complex number.
	parts := [2]constant.Value{constant.Real(c.Value), constant.Imag(c.Value)}
	for i, part := range parts {
		k := l.fields[i].Kind
		b.emit(tape.Instr{Op: tape.Copy, Dst: s + int32(i), A: b.constant(k, floatBits(part, k)), C: 1})
	}
	return val{slot: s, n: 2}
}

func (b *builder) constantBits(c *ssa.Const, k tape.Kind) uint64 {
	if c.Value == nil {
		return 0
	}
	switch {
	case k.IsFloat():
		return floatBits(c.Value, k)
	case k == tape.Bool:
		if constant.BoolVal(c.Value) {
			return 1
		}
		return 0
	case k == tape.U64:
		u, _ := constant.Uint64Val(constant.ToInt(c.Value))
		return u
	case k.IsInt():
		i, _ := constant.Int64Val(constant.ToInt(c.Value))
		return uint64(i)
	}
	return 1
}

func floatBits(v constant.Value, k tape.Kind) uint64 {
	v = constant.ToFloat(v)
	if k == tape.F32 {
		f, _ := constant.Float32Val(v)
		return uint64(math.Float32bits(f))
	}
	f, _ := constant.Float64Val(v)
	return math.Float64bits(f)
}

// address returns the address that v, a pointer, holds.
func (b *builder) address(v ssa.Value) *spot {
	x, ok := b.vals[v]
	if !ok {
		x = b.find(v)
	}
	if x.at != nil {
		return x.at
	}
	return &spot{base: inSlot, slot: x.slot}
}

// addressWord makes an address a word in a slot.
func (b *builder) addressWord(a *spot) int32 {
	word := a.slot
	switch a.base {
	case inFrame:
		word = b.temp(1)
		b.emit(tape.Instr{Op: tape.FrameAddr, Dst: word, A: a.slot, C: a.size})
	case inData:
		word = b.temp(1)
		b.emit(tape.Instr{Op: tape.DataAddr, Dst: word, A: a.slot + a.off})
		return word
	}
	if a.off == 0 {
		return word
	}
	d := b.temp(1)
	b.emit(tape.Instr{Op: tape.Offset, Dst: d, A: word, C: a.off})
	return d
}

// load copies n words at a to slots of their own.
func (b *builder) load(a *spot, n int32, dst int32) {
	switch {
	case n == 0:
	case a.base == inFrame:
		b.emit(tape.Instr{Op: tape.Copy, Dst: dst, A: a.slot + a.off, C: n})
	case a.base == inData:
		b.emit(tape.Instr{Op: tape.Load, Dst: dst, A: b.addressWord(a), C: n})
	default:
		b.emit(tape.Instr{Op: tape.Load, Dst: dst, A: a.slot, B: a.off, C: n})
	}
}

// store copies n words from slot src to a.
func (b *builder) store(a *spot, src, n int32) {
	switch {
	case n == 0:
	case a.base == inFrame:
		b.emit(tape.Instr{Op: tape.Copy, Dst: a.slot + a.off, A: src, C: n})
	case a.base == inData:
		b.fail("writes a package variable")
	default:
		b.emit(tape.Instr{Op: tape.Store, Dst: a.off, A: a.slot, B: src, C: n})
	}
}

// fieldOffset returns the words before field i of a struct.
func (b *builder) fieldOffset(t types.Type, i int) int32 {
	s := t.Underlying().(*types.Struct)
	n := int32(0)
	for k := range i {
		n += b.words(s.Field(k).Type())
	}
	return n
}
