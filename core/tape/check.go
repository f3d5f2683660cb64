package tape

import (
	"fmt"
	"math/bits"
)

// maxSlots bounds the frame of one program.
const maxSlots = 1 << 18

// Check reports what is wrong with a program, or nil: a program that passes
// can be evaluated without harm, whatever it computes. It holds that
//
//   - every block ends in its only terminator and every index is in its table;
//   - parameters and constants are not written;
//   - a slot holds one class of value, and is written before it is read on
//     every path.
func (p *Program) Check() error {
	if p.checked {
		return nil
	}
	c := checker{p: p}
	for _, f := range []func() error{c.tables, c.blocks, c.operands, c.classes, c.defined} {
		if err := f(); err != nil {
			return fmt.Errorf("tape %s: %w", p.Name, err)
		}
	}
	p.checked = true
	return nil
}

type checker struct {
	p     *Program
	class []Kind
}

func (c *checker) tables() error {
	p := c.p
	for i := range p.Sig.Params {
		q := &p.Sig.Params[i]
		want := map[Mode]int{Value: len(q.Fields), Pointer: 1, Slice: 3, Hidden: q.Words}
		if w, ok := want[q.Mode]; !ok || w != q.Words || q.Words < 0 || q.Words > maxSlots {
			return fmt.Errorf("parameter %d takes %d words in mode %v", i, q.Words, q.Mode)
		}
	}
	for i := range p.Sig.Results {
		q := &p.Sig.Results[i]
		want := map[Mode]int{Value: len(q.Fields), Pointer: 1, Slice: 3, Hidden: q.Words}
		if w, ok := want[q.Mode]; !ok || w != q.Words || q.Words < 0 || q.Words > maxSlots {
			return fmt.Errorf("result %d takes %d words in mode %v", i, q.Words, q.Mode)
		}
	}
	if p.Slots < p.firstTemp() || p.Slots > maxSlots {
		return fmt.Errorf("%d slots, of which %d are parameters and constants; at most %d are allowed", p.Slots, p.firstTemp(), maxSlots)
	}
	for i := range p.Calls {
		if p.Calls[i].Words < 0 || p.Calls[i].Words > maxSlots {
			return fmt.Errorf("call %d has %d words of results", i, p.Calls[i].Words)
		}
		if err := c.ranges(p.Calls[i].Args); err != nil {
			return fmt.Errorf("call %d: %w", i, err)
		}
	}
	for i, d := range p.Data {
		if d.Kind == Addr && d.Bits > uint64(len(p.Data)) {
			return fmt.Errorf("word %d of the data is the address of word %d of %d", i, d.Bits-1, len(p.Data))
		}
	}
	for i, r := range p.Returns {
		if err := c.ranges(r); err != nil {
			return fmt.Errorf("return %d: %w", i, err)
		}
		n := 0
		for _, x := range r {
			n += int(x.N)
		}
		if n != p.Sig.ResultWords() {
			return fmt.Errorf("return %d has %d words for %d", i, n, p.Sig.ResultWords())
		}
	}
	return nil
}

func (c *checker) ranges(rs []Range) error {
	for _, r := range rs {
		if err := c.slots(r); err != nil {
			return err
		}
	}
	return nil
}

func (c *checker) slots(r Range) error {
	if r.Slot < 0 || r.N < 0 || int64(r.Slot)+int64(r.N) > int64(c.p.Slots) {
		return fmt.Errorf("slots %d+%d of %d", r.Slot, r.N, c.p.Slots)
	}
	// Parameters, constants and the rest need not lie side by side.
	for _, edge := range [...]int32{int32(c.p.Sig.Words()), c.p.firstTemp()} {
		if r.Slot < edge && r.Slot+r.N > edge {
			return fmt.Errorf("slots %d+%d straddle slot %d, where another kind of slot begins", r.Slot, r.N, edge)
		}
	}
	return nil
}

func (c *checker) blocks() error {
	p := c.p
	if len(p.Blocks) == 0 || p.Blocks[0] != 0 {
		return fmt.Errorf("no first block")
	}
	for b := range p.Blocks {
		from, to := int(p.Blocks[b]), p.blockEnd(b)
		if from < 0 || from >= to || to > len(p.Code) {
			return fmt.Errorf("block %d is empty or out of place", b)
		}
		for i := from; i < to; i++ {
			if !p.Code[i].Op.known() {
				return fmt.Errorf("block %d: operation %d is not known", b, p.Code[i].Op)
			}
			if p.Code[i].Op.info().terminator != (i == to-1) {
				return fmt.Errorf("block %d: %v at %d of %d", b, p.Code[i].Op, i-from+1, to-from)
			}
		}
	}
	return nil
}

func (c *checker) operands() error {
	p := c.p
	for i := range p.Code {
		in := &p.Code[i]
		info := in.Op.info()
		if in.Place < 0 || int(in.Place) > len(p.Places) {
			return fmt.Errorf("instruction %d: place %d", i, in.Place)
		}
		// The index into Calls comes first: the width of results needs it.
		for _, x := range [...]struct {
			o operand
			v int32
		}{{info.c, in.C}, {info.a, in.A}, {info.b, in.B}, {info.dst, in.Dst}} {
			if err := c.operand(in, x.o, x.v); err != nil {
				return fmt.Errorf("instruction %d, %v: %w", i, in.Op, err)
			}
		}
	}
	return nil
}

func (c *checker) operand(in *Instr, o operand, v int32) error {
	p := c.p
	limit := map[role]int{block: len(p.Blocks), call: len(p.Calls), ret: len(p.Returns), reason: len(p.Reasons),
		branch: len(p.Branches), data: len(p.Data), target: len(kindNames), count: maxSlots}
	switch o.role {
	case none:
		if v != 0 && !(in.Op == Call) {
			return fmt.Errorf("an operand that means nothing is %d", v)
		}
	case number:
		if v < 0 || v > maxSlots {
			return fmt.Errorf("number %d", v)
		}
	case read, write, frame:
		r := Range{v, p.width(in, o)}
		if o.role != read && r.N > 0 && v < p.firstTemp() {
			return fmt.Errorf("slot %d is a parameter or constant", v)
		}
		return c.slots(r)
	default:
		if v < 0 || int(v) >= limit[o.role] {
			return fmt.Errorf("index %d of %d", v, limit[o.role])
		}
	}
	return nil
}

// classes finds the class of every slot. Loads and calls may bring anything;
// copies carry it on.
func (c *checker) classes() error {
	p := c.p
	c.class = make([]Kind, p.Slots)
	slot := 0
	for i := range p.Sig.Params {
		q := &p.Sig.Params[i]
		switch q.Mode {
		case Value:
			for j, f := range q.Fields {
				c.class[slot+j] = f.Kind.class()
			}
		case Pointer, Slice:
			c.class[slot] = Addr
			if q.Mode == Slice {
				c.class[slot+1], c.class[slot+2] = I64, I64
			}
		}
		slot += q.Words
	}
	for i, k := range p.Consts {
		c.class[slot+i] = k.Kind.class()
	}
	for changed := true; changed; {
		changed = false
		for i := range p.Code {
			ch, err := c.step(&p.Code[i])
			if err != nil {
				return fmt.Errorf("instruction %d, %v: %w", i, p.Code[i].Op, err)
			}
			changed = changed || ch
		}
	}
	return nil
}

func (c *checker) step(in *Instr) (changed bool, err error) {
	set := func(slot int32, k Kind) {
		if k == Any || c.class[slot] == k {
			return
		}
		if c.class[slot] != Any {
			err = fmt.Errorf("slot %d is %v and %v", slot, c.class[slot], k)
			return
		}
		c.class[slot] = k
		changed = true
	}
	info := in.Op.info()
	switch {
	case in.Op == Copy:
		for i := range in.C {
			set(in.Dst+i, c.class[in.A+i])
		}
	case in.Op == Recast:
		set(in.Dst, Kind(in.C).class())
	case in.Op.IsMath():
		for i, k := range mathTable[in.Op-firstMath].out {
			set(in.Dst+int32(i), k.class())
		}
	case info.dst.role == write && !info.dst.wide && info.dst.words == 0:
		set(in.Dst, info.dst.class)
	}
	for _, x := range [...]struct {
		o operand
		v int32
	}{{info.a, in.A}, {info.b, in.B}, {info.c, in.C}} {
		if x.o.role == read && x.o.class != Any && c.class[x.v] != Any && c.class[x.v] != x.o.class {
			err = fmt.Errorf("slot %d is %v, not %v", x.v, c.class[x.v], x.o.class)
		}
	}
	return changed, err
}

// bitset is a set of slots.
type bitset []uint64

func (b bitset) has(i int32) bool { return b[i>>6]>>(i&63)&1 != 0 }
func (b bitset) add(i int32)      { b[i>>6] |= 1 << (i & 63) }

// count returns the number of members.
func (b bitset) count() int {
	n := 0
	for _, w := range b {
		n += bits.OnesCount64(w)
	}
	return n
}

// join adds the members of c and reports whether there were new ones.
func (b bitset) join(c bitset) bool {
	changed := false
	for i, w := range c {
		if w&^b[i] != 0 {
			b[i] |= w
			changed = true
		}
	}
	return changed
}

// defined holds that every slot read has been written on every path. It
// tracks, per block, the slots that some path leaves unwritten.
func (c *checker) defined() error {
	p := c.p
	words := (int(p.Slots) + 63) / 64
	missing := make([]bitset, len(p.Blocks))
	for i := range missing {
		missing[i] = make(bitset, words)
	}
	for s := p.firstTemp(); s < p.Slots; s++ {
		missing[0].add(s)
	}
	reached := make([]bool, len(p.Blocks))
	reached[0] = true
	now := make(bitset, words)
	work := []int{0}
	for len(work) > 0 {
		b := work[len(work)-1]
		work = work[:len(work)-1]
		copy(now, missing[b])
		for i := int(p.Blocks[b]); i < p.blockEnd(b); i++ {
			in := &p.Code[i]
			bad := int32(-1)
			p.reads(in, func(r Range) {
				for s := r.Slot; s < r.Slot+r.N; s++ {
					if now.has(s) {
						bad = s
					}
				}
			})
			if bad >= 0 {
				return fmt.Errorf("instruction %d, %v: slot %d may not have been written", i, in.Op, bad)
			}
			w := p.writes(in)
			for s := w.Slot; s < w.Slot+w.N; s++ {
				now[s>>6] &^= 1 << (s & 63)
			}
		}
		for _, next := range p.successors(b) {
			if missing[next].join(now) || !reached[next] {
				reached[next] = true
				work = append(work, int(next))
			}
		}
	}
	return nil
}

// successors returns the blocks that block b may go on to.
func (p *Program) successors(b int) []int32 {
	switch in := &p.Code[p.blockEnd(b)-1]; in.Op {
	case Jump:
		return []int32{in.A}
	case If:
		return []int32{in.B, in.C}
	}
	return nil
}
