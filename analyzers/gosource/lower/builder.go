package lower

import (
	"fmt"
	"go/token"
	"go/types"
	"slices"

	"golang.org/x/tools/go/ssa"

	"dextral/core/tape"
)

// builder translates one function, or one instance of a generic function.
type builder struct {
	*packageLowerer
	fn   *ssa.Function
	env  *env
	p    *tape.Program
	next int32 // first slot not in use

	vals   map[ssa.Value]val
	consts map[tape.Const]int32
	data   map[*ssa.Global]int32
	places map[token.Pos]int32
	pos    []token.Pos // of p.Places

	blocks   [][]tape.Instr
	current  int       // block being filled
	place    int32     // of the instruction being translated
	ended    []bool    // blocks that stop before their end
	reached  []bool    // blocks that something leads to
	pending  []pending // edges whose phis wait for their operands
	stops    []string  // parts that are not translated
	unknowns []string  // values that are not known

	initials map[*ssa.Global]*spot // while the initialiser is built: the variables
	vars     []*ssa.Global         // the variables in the order of the results
}

// val is where a value lies.
type val struct {
	slot int32 // first word; for an address see at
	n    int32
	at   *spot // for an address that is known better than as a word
}

// spot is an address: in the frame or the data, or of the address in a slot,
// plus an offset in words.
type spot struct {
	base spotBase
	slot int32 // slot, or index into the data
	off  int32
	// In the frame, slot is the first of size slots that the address may be
	// moved within, and whole the object that they belong to.
	size  int32
	whole tape.Range
}

type spotBase uint8

const (
	inSlot spotBase = iota
	inFrame
	inData
)

// objectAt is the address of a new object in the frame.
func objectAt(slot, size int32) *spot {
	return &spot{base: inFrame, slot: slot, size: size, whole: tape.Range{Slot: slot, N: size}}
}

// field is the address of a part of size words, from which one cannot get to
// other parts.
func (a *spot) field(off, size int32) *spot {
	c := *a
	c.off += off
	if a.base == inFrame {
		c.slot, c.off, c.size = a.slot+c.off, 0, size
	}
	return &c
}

// element is the address of an element of an array, from which one may get to
// the others.
func (a *spot) element(off int32) *spot {
	c := *a
	c.off += off
	return &c
}

// array is the address of an array of size words, within which one may move.
func (a *spot) array(size int32) *spot { return a.field(0, size) }

// free is the same address, from which one may get anywhere in the object.
func (a *spot) free() *spot {
	c := *a
	if a.base == inFrame {
		c.off += a.slot - a.whole.Slot
		c.slot, c.size = a.whole.Slot, a.whole.N
	}
	return &c
}

// unsupported is what a part of a function cannot be translated for. It ends
// the block, and the rest of the function stays.
type unsupported string

func (b *builder) fail(format string, args ...any) {
	panic(unsupported(fmt.Sprintf(format, args...)))
}

// note remembers why something is unknown.
func (b *builder) note(what string) {
	if !slices.Contains(b.unknowns, what) {
		b.unknowns = append(b.unknowns, what)
	}
}

func (b *builder) typeOf(v ssa.Value) types.Type { return b.env.subst(v.Type()) }

func (b *builder) layout(t types.Type) *layout { return b.layouts.of(t) }

// words returns the number of words of type t.
func (b *builder) words(t types.Type) int32 {
	l := b.layout(t)
	if l == nil {
		b.fail("type %v is too large or not known", t)
	}
	return l.words()
}

// temp reserves n slots.
func (b *builder) temp(n int32) int32 {
	s := b.next
	b.next += n
	if b.next > 1<<17 {
		b.fail("too many values")
	}
	return s
}

func (b *builder) emit(in tape.Instr) {
	in.Place = b.place
	b.blocks[b.current] = append(b.blocks[b.current], in)
}

func (b *builder) op1(op tape.Op, a int32) int32 {
	d := b.temp(1)
	b.emit(tape.Instr{Op: op, Dst: d, A: a})
	return d
}

func (b *builder) op2(op tape.Op, x, y int32) int32 {
	d := b.temp(1)
	b.emit(tape.Instr{Op: op, Dst: d, A: x, B: y})
	return d
}

// constant slots are numbered from constBase while translating, and moved to
// their place after the parameters at the end.
const constBase = 1 << 20

// constant returns the slot of a constant.
func (b *builder) constant(k tape.Kind, bits uint64) int32 {
	c := tape.Const{Kind: k, Bits: bits}
	s, ok := b.consts[c]
	if !ok {
		s = constBase + int32(len(b.p.Consts))
		b.consts[c] = s
		b.p.Consts = append(b.p.Consts, c)
	}
	return s
}

func (b *builder) integer(i int64) int32 { return b.constant(tape.I64, uint64(i)) }

// at remembers the place of what is translated next.
func (b *builder) at(pos token.Pos) {
	if !pos.IsValid() {
		return
	}
	b.place = b.placeOf(pos)
}

func (b *builder) placeOf(pos token.Pos) int32 {
	if !pos.IsValid() {
		return 0
	}
	if i, ok := b.places[pos]; ok {
		return i
	}
	q := b.fset.Position(pos)
	b.p.Places = append(b.p.Places, tape.Place{File: q.Filename, Line: int32(q.Line), Col: int32(q.Column)})
	b.pos = append(b.pos, pos)
	b.places[pos] = int32(len(b.p.Places))
	return b.places[pos]
}

// reason returns the index of a text in the program's reasons.
func (b *builder) reason(text string) int32 {
	for i, r := range b.p.Reasons {
		if r == text {
			return int32(i)
		}
	}
	b.p.Reasons = append(b.p.Reasons, text)
	return int32(len(b.p.Reasons) - 1)
}

// build translates the function. It returns the reason why it cannot be.
func (b *builder) build() (why string) {
	if len(b.fn.Blocks) == 0 {
		return "has no body"
	}
	if b.fn.Recover != nil {
		return "recovers from panics"
	}
	if len(b.fn.Blocks) > 4000 {
		return "is too large"
	}
	if !b.signature() {
		return "has a parameter or result that is too large"
	}
	b.next = int32(b.p.Sig.Words())
	slot := int32(0)
	for i, p := range b.fn.Params {
		n := int32(b.p.Sig.Params[i].Words)
		b.vals[p] = val{slot: slot, n: n}
		slot += n
	}
	for i, v := range b.fn.FreeVars {
		n := int32(b.p.Sig.Params[len(b.fn.Params)+i].Words)
		b.vals[v] = val{slot: slot, n: n}
		slot += n
	}
	b.blocks = make([][]tape.Instr, len(b.fn.Blocks))
	b.ended = make([]bool, len(b.fn.Blocks))
	b.reached = make([]bool, len(b.fn.Blocks))
	b.reached[0] = true
	for _, block := range b.fn.DomPreorder() {
		b.reached[block.Index] = b.isReached(block)
		if b.reached[block.Index] {
			b.block(block)
		}
	}
	if why := b.edges(); why != "" {
		return why
	}
	if b.initials != nil {
		for i := range b.p.Returns {
			b.p.Returns[i] = b.initialResults()
		}
	}
	b.finish()
	return ""
}

// isReached reports whether a path leads to block that does not stop before:
// at least to its dominator, which has been translated already.
func (b *builder) isReached(block *ssa.BasicBlock) bool {
	d := block.Idom()
	return d == nil && block.Index == 0 || d != nil && b.reached[d.Index] && !b.ended[d.Index]
}

// block translates one block up to its end, or to what cannot be translated.
func (b *builder) block(block *ssa.BasicBlock) {
	b.current = block.Index
	defer func() {
		if r := recover(); r != nil {
			why, ok := r.(unsupported)
			if !ok {
				panic(r)
			}
			b.ended[block.Index] = true
			b.stops = append(b.stops, string(why))
			b.emit(tape.Instr{Op: tape.Stop, A: b.reason(string(why))})
		}
	}()
	for _, in := range block.Instrs {
		if b.initials != nil {
			b.tolerant(in)
		} else {
			b.instruction(in)
		}
	}
}

// tolerant translates an instruction of the initialiser, where what cannot be
// translated is an unknown value.
func (b *builder) tolerant(in ssa.Instruction) {
	defer func() {
		r := recover()
		if r == nil {
			return
		}
		if _, ok := r.(unsupported); !ok {
			panic(r)
		}
		if v, ok := in.(ssa.Value); ok {
			b.unknown(v)
		}
	}()
	b.instruction(in)
}

// finish gives blocks and constants their places.
func (b *builder) finish() {
	params := int32(b.p.Sig.Words())
	n := int32(len(b.p.Consts))
	move := func(s int32) int32 {
		switch {
		case s >= constBase:
			return params + s - constBase
		case s >= params:
			return s + n
		}
		return s
	}
	place := make([]int32, len(b.blocks))
	kept := int32(0)
	for i, code := range b.blocks {
		place[i] = kept
		if len(code) > 0 {
			kept++
		}
	}
	for _, code := range b.blocks {
		if len(code) == 0 {
			continue
		}
		b.p.Blocks = append(b.p.Blocks, int32(len(b.p.Code)))
		for _, in := range code {
			switch in.Op {
			case tape.Jump:
				in.A = place[in.A]
			case tape.If:
				in.B, in.C = place[in.B], place[in.C]
			}
			in.MapSlots(move)
			b.p.Code = append(b.p.Code, in)
		}
	}
	for _, rs := range b.p.Returns {
		for i := range rs {
			rs[i].Slot = move(rs[i].Slot)
		}
	}
	for i := range b.p.Calls {
		for j := range b.p.Calls[i].Args {
			b.p.Calls[i].Args[j].Slot = move(b.p.Calls[i].Args[j].Slot)
		}
	}
	b.p.Slots = b.next + n
}
