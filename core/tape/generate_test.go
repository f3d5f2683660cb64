package tape

import (
	"fmt"
	"math/rand/v2"
)

// generator writes random programs that Check passes: arithmetic of all kinds,
// branches, loops, objects in the frame and in fresh memory, calls, and now
// and then something unknown, a stop or a panic.
type generator struct {
	*rand.Rand
	p      *Program
	lib    []*Program // may be called
	pool   map[Kind][]int32
	vars   []int32 // float64 slots that are written again and again
	held   int32   // an address that is
	object int32   // objectWords words in the frame
	limit  int     // instructions still to be written, about
	wild   bool    // unknown values, stops and panics too
}

const objectWords = 6

// frameAddr is the pool of addresses that may point into the frame, which must
// not outlive it.
const frameAddr Kind = 200

// generate returns a program that may call those of lib.
func generate(r *rand.Rand, name string, lib []*Program, size int, wild bool) *Program {
	g := &generator{Rand: r, p: &Program{Name: name}, lib: lib, pool: map[Kind][]int32{}, limit: size, wild: wild}
	g.signature()
	for range 3 {
		v := g.slot()
		g.emit(Instr{Op: Copy, Dst: v, A: g.pick(F64), C: 1})
		g.vars = append(g.vars, v)
	}
	g.pool[F64] = append(g.pool[F64], g.vars...)
	g.object = g.p.Slots
	g.p.Slots += objectWords
	if g.IntN(2) == 0 {
		g.emit(Instr{Op: Zero, Dst: g.object, C: objectWords})
	} else {
		for i := range int32(objectWords) {
			g.emit(Instr{Op: Copy, Dst: g.object + i, A: g.pick(F64), C: 1})
		}
	}
	g.held = g.define(Addr)
	g.emit(Instr{Op: Copy, Dst: g.held, A: g.pool[Addr][0], C: 1})
	g.statements(0)
	g.ret()
	return g.p
}

func (g *generator) signature() {
	scalar := func(k Kind) {
		g.p.Sig.Params = append(g.p.Sig.Params, Param{Name: fmt.Sprintf("p%d", len(g.p.Sig.Params)), Type: k.String(), Words: 1, Fields: []Field{{"", k}}})
		g.pool[k.class()] = append(g.pool[k.class()], g.p.Slots)
		g.p.Slots++
	}
	for _, k := range []Kind{F64, F64, F64, F32, F32, I64, I32, Bool} {
		scalar(k)
	}
	g.p.Sig.Params = append(g.p.Sig.Params, Param{Name: "q", Type: "q", Mode: Pointer, Words: 1, Fields: []Field{{".X", F64}, {".Y", F64}, {".Z", F64}}})
	g.pool[Addr] = append(g.pool[Addr], g.p.Slots)
	g.p.Slots++
	consts := []Const{{F64, word(0)}, {F64, word(1)}, {F64, word(-0.5)}, {F32, word32(2)}, {I64, 0}, {I64, 1}, {I64, 3}, {I64, ^uint64(0)}, {Bool, 1}, {I64, objectWords}}
	for _, c := range consts {
		g.p.Consts = append(g.p.Consts, c)
		g.pool[c.Kind.class()] = append(g.pool[c.Kind.class()], g.p.Slots)
		g.p.Slots++
	}
	g.p.Data = []Const{{F64, word(1.5)}, {F64, word(-2)}, {F64, word(1e300)}}
	if g.wild && g.IntN(3) == 0 {
		g.p.Data[1].Kind = Any
	}
	for _, k := range []Kind{F64, F64, F32, I64, Bool} {
		g.p.Sig.Results = append(g.p.Sig.Results, Result{Type: k.String(), Words: 1, Fields: []Field{{"", k}}})
	}
	xyz := []Field{{".X", F64}, {".Y", F64}, {".Z", F64}}
	g.p.Sig.Results = append(g.p.Sig.Results, Result{Type: "q", Mode: Pointer, Words: 1, Fields: xyz})
	g.p.Reasons = []string{"gives up", "cannot say"}
	g.p.Blocks = []int32{0}
}

// constant returns the slot of an integer constant of the generator's list.
func (g *generator) constant(i int) int32 { return int32(g.p.Sig.Words() + i) }

func (g *generator) slot() int32 {
	g.p.Slots++
	return g.p.Slots - 1
}

func (g *generator) emit(in Instr) {
	g.p.Code = append(g.p.Code, in)
	g.limit--
}

func (g *generator) pick(k Kind) int32 {
	l := g.pool[k]
	if n := len(l); n > 4 && g.IntN(2) == 0 {
		return l[n-1-g.IntN(4)] // recent ones more often
	}
	return l[g.IntN(len(l))]
}

func (g *generator) define(k Kind) int32 {
	s := g.slot()
	g.pool[k] = append(g.pool[k], s)
	return s
}

func (g *generator) statements(depth int) {
	for range 2 + g.IntN(12) {
		if g.limit < 0 {
			return
		}
		switch n := g.IntN(22); {
		case n < 9:
			g.arithmetic()
		case n < 14:
			g.memory()
		case n == 14 && len(g.lib) > 0:
			g.call()
		case n == 15 && g.wild:
			g.emit(Instr{Op: Unknown, Dst: g.define(F64), C: 1})
		case n < 18 && depth < 4:
			g.branch(depth)
		case n == 18 && depth < 3:
			g.loop(depth)
		default:
			g.emit(Instr{Op: Copy, Dst: g.vars[g.IntN(3)], A: g.pick(F64), C: 1})
		}
	}
}

// arithmetic writes one operation from values to a value.
func (g *generator) arithmetic() {
	for {
		op := Op(1 + g.IntN(len(opTable)-1))
		if g.IntN(3) == 0 {
			op = AddF + Op(g.IntN(int(LeF)))
		}
		info := op.info()
		if op >= Copy && op < firstMath || info.dst.role != write || op == Recast || op == DivC {
			continue
		}
		if op.IsMath() && g.IntN(8) > 0 {
			continue
		}
		if op >= DivI && op <= RemU && g.IntN(4) > 0 {
			continue
		}
		in := Instr{Op: op}
		class := F64
		for _, x := range [...]struct {
			o operand
			v *int32
		}{{info.a, &in.A}, {info.b, &in.B}, {info.c, &in.C}} {
			switch {
			case x.o.role == target:
				*x.v = int32([]Kind{I8, I16, I32, I64, U8, U16, U32, U64}[g.IntN(8)])
			case x.o.role == read && x.o.class != Any:
				*x.v = g.pick(x.o.class)
			case x.o.role == read && x.v == &in.A:
				class = []Kind{I64, Bool, Addr}[g.IntN(3)]
				if op == AndI || op == OrI || op == XorI {
					class = []Kind{I64, Bool}[g.IntN(2)]
				}
				*x.v = g.pick(class)
			case x.o.role == read:
				*x.v = g.pick(class)
			}
		}
		switch {
		case op.IsMath():
			f := &mathTable[op-firstMath]
			if f.name == "Jn" || f.name == "Yn" {
				continue // their time grows with the order
			}
			in.Dst = g.p.Slots
			for _, k := range f.out {
				g.define(k.class())
			}
		case info.dst.class == Any:
			in.Dst = g.define(class)
		default:
			in.Dst = g.define(info.dst.class)
		}
		g.emit(in)
		return
	}
}

// memory reads or writes an object, or makes one.
func (g *generator) memory() {
	switch g.IntN(13) {
	case 0:
		g.emit(Instr{Op: Copy, Dst: g.object + int32(g.IntN(objectWords)), A: g.pick(F64), C: 1})
	case 1:
		g.emit(Instr{Op: Copy, Dst: g.define(F64), A: g.object + int32(g.IntN(objectWords)), C: 1})
	case 2:
		g.emit(Instr{Op: FrameAddr, Dst: g.define(frameAddr), A: g.object, C: objectWords})
	case 3:
		d := g.slot()
		g.emit(Instr{Op: DataAddr, Dst: d, A: int32(g.IntN(3))})
		g.emit(Instr{Op: Load, Dst: g.define(F64), A: d, C: 1})
	case 4:
		// All objects that an address may mean have three words at least.
		g.emit(Instr{Op: Load, Dst: g.define(F64), A: g.anyAddr(), B: int32(g.IntN(3)), C: 1})
	case 5:
		g.emit(Instr{Op: Store, Dst: int32(g.IntN(3)), A: g.anyAddr(), B: g.pick(F64), C: 1})
	case 6:
		a, i := g.slot(), g.index()
		g.emit(Instr{Op: FrameAddr, Dst: a, A: g.object, C: objectWords})
		g.emit(Instr{Op: Bound, A: i, B: g.constant(9)})
		e := g.slot()
		g.emit(Instr{Op: Elem, Dst: e, A: a, B: i, C: 1})
		g.emit(Instr{Op: Load, Dst: g.define(F64), A: e, C: 1})
	case 7:
		d := g.define(Addr)
		g.emit(Instr{Op: New, Dst: d, C: 3})
		g.emit(Instr{Op: Store, Dst: 1, A: d, B: g.pick(F64), C: 1})
	case 8:
		g.slices()
	case 12:
		d := g.p.Slots
		g.emit(Instr{Op: DivC, Dst: d, A: g.object, B: g.object + 2})
		g.define(F64)
		g.define(F64)
	case 9:
		g.emit(Instr{Op: Copy, Dst: g.held, A: g.pick(Addr), C: 1})
	case 10:
		from := int32(g.IntN(2))
		g.emit(Instr{Op: Copy, Dst: g.object + 1 - from, A: g.object + from, C: 4})
	case 11:
		d := g.p.Slots
		g.p.Slots += 3
		g.emit(Instr{Op: Load, Dst: d, A: g.anyAddr(), C: 3})
		g.emit(Instr{Op: Store, A: g.anyAddr(), B: d, C: 3})
	}
}

// index returns an integer that is mostly a good index.
func (g *generator) index() int32 {
	i := g.pick(I64)
	if g.IntN(8) > 0 {
		d := g.slot()
		g.emit(Instr{Op: AndI, Dst: d, A: i, B: g.constant(6)})
		return d
	}
	return i
}

// anyAddr returns an address of three words at least.
func (g *generator) anyAddr() int32 {
	if len(g.pool[frameAddr]) > 0 && g.IntN(2) == 0 {
		return g.pick(frameAddr)
	}
	return g.pick(Addr)
}

// slices makes a slice of three, appends another slice to it, and reads one
// element.
func (g *generator) slices() {
	s := g.p.Slots
	g.p.Slots += 3
	g.emit(Instr{Op: Make, Dst: s, A: g.constant(6), C: 1})
	g.emit(Instr{Op: Copy, Dst: s + 1, A: g.constant(6), C: 1})
	g.emit(Instr{Op: Copy, Dst: s + 2, A: g.constant(6), C: 1})
	g.emit(Instr{Op: Store, A: s, B: g.pick(F64), C: 1})
	d := g.p.Slots
	g.p.Slots += 3
	g.emit(Instr{Op: Append, Dst: d, A: s, B: s, C: 1})
	i := g.index()
	g.emit(Instr{Op: Bound, A: i, B: d + 1})
	e := g.slot()
	g.emit(Instr{Op: Elem, Dst: e, A: d, B: i, C: 1})
	g.emit(Instr{Op: Load, Dst: g.define(F64), A: e, C: 1})
	g.emit(Instr{Op: Move, A: d, B: s, C: g.constant(5)})
	g.pool[I64] = append(g.pool[I64], d+1)
	g.pool[Addr] = append(g.pool[Addr], d)
}

func (g *generator) call() {
	callee := g.lib[g.IntN(len(g.lib))]
	site := CallSite{Callee: callee.Name, Words: int32(callee.Sig.ResultWords()), Shared: true}
	if g.wild && g.IntN(8) == 0 {
		site.Callee, site.Shared = "nobody", g.IntN(2) == 0
	}
	address := Addr
	if len(g.pool[frameAddr]) > 0 && g.IntN(2) == 0 {
		address = frameAddr
	}
	for _, p := range callee.Sig.Params {
		k := address
		if p.Mode == Value {
			k = p.Fields[0].Kind.class()
		}
		site.Args = append(site.Args, Range{g.pick(k), 1})
	}
	g.p.Calls = append(g.p.Calls, site)
	d := g.p.Slots
	for _, r := range callee.Sig.Results {
		k := address
		if r.Mode == Value {
			k = r.Fields[0].Kind.class()
		}
		g.define(k)
	}
	g.emit(Instr{Op: Call, Dst: d, A: int32(len(g.p.Calls) - 1)})
}

// within runs f, whose values are not to be seen after it.
func (g *generator) within(f func()) {
	before := map[Kind]int{}
	for k, l := range g.pool {
		before[k] = len(l)
	}
	f()
	for k := range g.pool {
		g.pool[k] = g.pool[k][:before[k]]
	}
}

// block begins a new block and returns its number.
func (g *generator) block() int32 {
	g.p.Blocks = append(g.p.Blocks, int32(len(g.p.Code)))
	return int32(len(g.p.Blocks) - 1)
}

func (g *generator) condition() (at int) {
	g.p.Branches = append(g.p.Branches, Branch{Text: "?"})
	g.emit(Instr{Op: If, Dst: int32(len(g.p.Branches) - 1), A: g.pick(Bool)})
	return len(g.p.Code) - 1
}

func (g *generator) branch(depth int) {
	if g.IntN(2) == 0 {
		g.emit(Instr{Op: LtF, Dst: g.define(Bool), A: g.pick(F64), B: g.pick(F64)})
	}
	at := g.condition()
	g.p.Code[at].B = g.block()
	g.within(func() { g.statements(depth + 1) })
	end := -1
	switch n := g.IntN(12); {
	case n == 0:
		g.ret()
	case n == 1 && g.wild:
		g.emit(Instr{Op: Panic, A: 0})
	case n == 2 && g.wild:
		g.emit(Instr{Op: Stop, A: 1})
	default:
		g.emit(Instr{Op: Jump})
		end = len(g.p.Code) - 1
	}
	g.p.Code[at].C = g.block()
	g.within(func() { g.statements(depth + 1) })
	g.emit(Instr{Op: Jump})
	other := len(g.p.Code) - 1
	join := g.block()
	g.p.Code[other].A = join
	if end >= 0 {
		g.p.Code[end].A = join
	}
}

// loop repeats a few times.
func (g *generator) loop(depth int) {
	i, stop := g.slot(), g.slot()
	g.emit(Instr{Op: Copy, Dst: i, A: g.constant(4), C: 1})
	g.emit(Instr{Op: Jump, A: int32(len(g.p.Blocks))})
	head := g.block()
	g.emit(Instr{Op: LtI, Dst: stop, A: i, B: g.constant(6)})
	g.p.Branches = append(g.p.Branches, Branch{Text: "loop"})
	g.emit(Instr{Op: If, Dst: int32(len(g.p.Branches) - 1), A: stop})
	at := len(g.p.Code) - 1
	g.p.Code[at].B = g.block()
	g.within(func() { g.statements(depth + 1) })
	g.emit(Instr{Op: AddI, Dst: i, A: i, B: g.constant(5)})
	g.emit(Instr{Op: Jump, A: head})
	g.p.Code[at].C = g.block()
}

func (g *generator) ret() {
	var rs []Range
	for _, k := range []Kind{F64, F64, F32, I64, Bool, Addr} {
		s := g.pick(k)
		if k == F64 && g.IntN(2) == 0 {
			s = g.vars[g.IntN(3)]
		}
		rs = append(rs, Range{s, 1})
	}
	g.p.Returns = append(g.p.Returns, rs)
	g.emit(Instr{Op: Return, A: int32(len(g.p.Returns) - 1)})
}
