package lower

import (
	"go/token"
	"go/types"

	"golang.org/x/tools/go/ssa"

	"dextral/core/tape"
)

// arithmetic gives the operation for each operator: float64, float32, signed
// and unsigned.
var arithmetic = map[token.Token][4]tape.Op{
	token.ADD:     {tape.AddF, tape.AddG, tape.AddI, tape.AddI},
	token.SUB:     {tape.SubF, tape.SubG, tape.SubI, tape.SubI},
	token.MUL:     {tape.MulF, tape.MulG, tape.MulI, tape.MulI},
	token.QUO:     {tape.DivF, tape.DivG, tape.DivI, tape.DivU},
	token.REM:     {0, 0, tape.RemI, tape.RemU},
	token.AND:     {0, 0, tape.AndI, tape.AndI},
	token.OR:      {0, 0, tape.OrI, tape.OrI},
	token.XOR:     {0, 0, tape.XorI, tape.XorI},
	token.AND_NOT: {0, 0, tape.AndNotI, tape.AndNotI},
	token.SHL:     {0, 0, tape.ShlI, tape.ShlI},
	token.SHR:     {0, 0, tape.ShrI, tape.ShrU},
	token.EQL:     {tape.EqF, tape.EqG, tape.EqW, tape.EqW},
	token.NEQ:     {tape.NeF, tape.NeG, tape.NeW, tape.NeW},
	token.LSS:     {tape.LtF, tape.LtG, tape.LtI, tape.LtU},
	token.LEQ:     {tape.LeF, tape.LeG, tape.LeI, tape.LeU},
}

// operation returns the operation of op on kind k.
func operation(op token.Token, k tape.Kind) tape.Op {
	ops := arithmetic[op]
	switch {
	case k == tape.F64:
		return ops[0]
	case k == tape.F32:
		return ops[1]
	case k.IsSigned():
		return ops[2]
	}
	return ops[3]
}

func (b *builder) binary(in *ssa.BinOp) {
	t := b.typeOf(in.X)
	l := b.layout(t)
	if l == nil {
		b.fail("computes with a %v", t)
	}
	switch in.Op {
	case token.EQL, token.NEQ:
		b.compare(in, l)
		return
	case token.LSS, token.LEQ, token.GTR, token.GEQ:
		b.order(in, l)
		return
	}
	if isComplex(t) {
		b.complexOp(in, l)
		return
	}
	if !l.numeric || len(l.fields) != 1 {
		// Strings.
		b.vals[in] = val{slot: b.constant(tape.Opaque, 1), n: 1}
		return
	}
	k := l.fields[0].Kind
	op := operation(in.Op, k)
	if op == tape.Nop {
		b.fail("does %v on %v", in.Op, k)
	}
	x, y := b.value(in.X).slot, b.value(in.Y).slot
	if in.Op == token.SHL || in.Op == token.SHR {
		b.shiftCount(in.Y, y)
	}
	s := b.op2(op, x, y)
	switch in.Op {
	case token.ADD, token.SUB, token.MUL, token.QUO, token.SHL:
		if k.IsInt() {
			s = b.wrap(k, s)
		}
	}
	b.vals[in] = val{slot: s, n: 1}
}

// shiftCount makes sure that a negative count panics.
func (b *builder) shiftCount(v ssa.Value, s int32) {
	if _, ok := constIndex(v); ok || !b.layouts.kindOf(b.typeOf(v)).IsSigned() {
		return
	}
	b.emit(tape.Instr{Op: tape.Bound, A: s, B: b.integer(1<<63 - 1)})
}

// order is < <= > >=. The latter two swap the sides, so that a NaN makes them
// false too.
func (b *builder) order(in *ssa.BinOp, l *layout) {
	if !l.numeric || len(l.fields) != 1 {
		b.unknown(in)
		return
	}
	k := l.fields[0].Kind
	x, y := b.value(in.X).slot, b.value(in.Y).slot
	op := in.Op
	switch op {
	case token.GTR:
		op, x, y = token.LSS, y, x
	case token.GEQ:
		op, x, y = token.LEQ, y, x
	}
	b.vals[in] = val{slot: b.op2(operation(op, k), x, y), n: 1}
}

// compare is == or !=, of aggregates word by word.
func (b *builder) compare(in *ssa.BinOp, l *layout) {
	if !l.numeric && !comparable(in, l) {
		b.unknown(in)
		return
	}
	x, y := b.value(in.X), b.value(in.Y)
	if len(l.fields) == 0 {
		b.vals[in] = val{slot: b.constant(tape.Bool, bit(in.Op == token.EQL)), n: 1}
		return
	}
	result := int32(-1)
	for i, f := range l.fields {
		if _, ok := b.typeOf(in.X).Underlying().(*types.Slice); ok && i > 0 {
			break // a slice is compared with nil only
		}
		s := b.op2(operation(in.Op, f.Kind), x.slot+int32(i), y.slot+int32(i))
		switch {
		case result < 0:
			result = s
		case in.Op == token.EQL:
			result = b.op2(tape.AndI, result, s)
		default:
			result = b.op2(tape.OrI, result, s)
		}
	}
	b.vals[in] = val{slot: result, n: 1}
}

// comparable reports whether values that are not numbers can be compared:
// pointers and slices by address, errors with nil.
func comparable(in *ssa.BinOp, l *layout) bool {
	switch l.fields[0].Kind {
	case tape.Addr:
		return true
	case tape.Err:
		return isNil(in.X) || isNil(in.Y)
	}
	return false
}

func isNil(v ssa.Value) bool {
	c, ok := v.(*ssa.Const)
	return ok && c.Value == nil
}

// unknown gives v a value that is not known.
func (b *builder) unknown(v ssa.Value) {
	d := b.define(v)
	b.emit(tape.Instr{Op: tape.Unknown, Dst: d.slot, C: d.n})
}

func bit(b bool) uint64 {
	if b {
		return 1
	}
	return 0
}

func isComplex(t types.Type) bool {
	basic, ok := t.Underlying().(*types.Basic)
	return ok && basic.Info()&types.IsComplex != 0
}

// complexOp is complex arithmetic as the compiler does it: part by part, but
// for division, which heeds infinities and always is that of complex128.
func (b *builder) complexOp(in *ssa.BinOp, l *layout) {
	x, y := b.value(in.X).slot, b.value(in.Y).slot
	k := l.fields[0].Kind
	add, sub, mul := operation(token.ADD, k), operation(token.SUB, k), operation(token.MUL, k)
	switch in.Op {
	case token.ADD, token.SUB:
		d := b.define(in)
		for i := range int32(2) {
			b.emit(tape.Instr{Op: operation(in.Op, k), Dst: d.slot + i, A: x + i, B: y + i})
		}
	case token.MUL:
		re := [2]int32{b.op2(mul, x, y), b.op2(mul, x+1, y+1)}
		im := [2]int32{b.op2(mul, x, y+1), b.op2(mul, x+1, y)}
		d := b.define(in)
		b.emit(tape.Instr{Op: sub, Dst: d.slot, A: re[0], B: re[1]})
		b.emit(tape.Instr{Op: add, Dst: d.slot + 1, A: im[0], B: im[1]})
	default:
		d := b.define(in)
		if k == tape.F64 {
			b.emit(tape.Instr{Op: tape.DivC, Dst: d.slot, A: x, B: y})
			return
		}
		q := b.temp(2)
		b.emit(tape.Instr{Op: tape.DivC, Dst: q, A: b.widened(x), B: b.widened(y)})
		for i := range int32(2) {
			b.emit(tape.Instr{Op: tape.FtoG, Dst: d.slot + i, A: q + i})
		}
	}
}

// widened is a complex64 as a complex128.
func (b *builder) widened(x int32) int32 {
	d := b.temp(2)
	for i := range int32(2) {
		b.emit(tape.Instr{Op: tape.GtoF, Dst: d + i, A: x + i})
	}
	return d
}
