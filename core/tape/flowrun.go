package tape

import "slices"

// summary is what a program does that is given no address: for each word of
// its results, the words of its parameters that may influence it.
type summary struct {
	results []deps
	decides deps
	busy    bool // being computed: the program calls itself
}

// run analyses p as the outermost program.
func (a *analysis) run(p *Program, f *Flow) {
	a.init()
	var args []cell
	objects := make([]int32, len(p.Sig.Params))
	input := 0
	var s state
	for i := range p.Sig.Params {
		q := &p.Sig.Params[i]
		var fields []cell
		for range q.Fields {
			fields = append(fields, cell{deps: a.single(input)})
			input++
		}
		if q.Mode == Value {
			args = append(args, fields...)
			continue
		}
		objects[i] = a.newObject(int32(len(fields)), false)
		s = append(s, fields...)
		args = append(args, cell{spots: a.spotSet([]spot{{objects[i], 0}})})
		if q.Mode == Slice {
			args = append(args, cell{}, cell{})
		}
	}
	results, s := a.call(p, args, s, 0, 0)
	if results == nil {
		results = make([]cell, p.Sig.ResultWords())
	}
	a.outputs(p, f, results, objects, a.grow(s))
}

// outputs reads the outputs off the state at the end.
func (a *analysis) outputs(p *Program, f *Flow, results []cell, objects []int32, s state) {
	add := func(c cell, written bool) {
		f.outputs = append(f.outputs, deps(a.sets[c.deps]))
		f.written = append(f.written, written)
	}
	for i := range p.Sig.Results {
		q := &p.Sig.Results[i]
		switch {
		case len(q.Fields) == 0:
		case q.Mode == Value:
			for _, c := range results[:q.Words] {
				add(c, true)
			}
		default:
			for _, c := range a.read(s, results[0], 0, int32(len(q.Fields))) {
				add(c, true)
			}
		}
		results = results[q.Words:]
	}
	for i := range p.Sig.Params {
		q := &p.Sig.Params[i]
		if q.Mode != Pointer && q.Mode != Slice {
			continue
		}
		o := a.objects[objects[i]]
		for k := range q.Fields {
			add(s[o.at+int32(k)], o.written[k])
		}
	}
	f.decides = a.sets[a.decides]
}

// call evaluates p on args in state s, and returns its results and the state
// after it; nil results if it never returns. Everything it writes depends on
// control too.
func (a *analysis) call(p *Program, args []cell, s state, control setID, context int32) ([]cell, state) {
	if slices.Contains(a.stack, p) || len(a.stack) > 60 {
		panic(errFlow)
	}
	a.stack = append(a.stack, p)
	defer func() { a.stack = a.stack[:len(a.stack)-1] }()
	frame, ok := a.frames[context]
	if !ok {
		frame = a.newObject(p.Slots, false)
		a.frames[context] = frame
	}
	s = a.grow(s)
	at := a.objects[frame].at
	clear(s[at:][:p.Slots])
	copy(s[at:], args)
	b := &body{analysis: a, p: p, frame: at, object: frame, context: context, control: control,
		deciders: p.deciders(), before: make([]state, len(p.Blocks)), conditions: make([]setID, len(p.Blocks)), dirty: make([]bool, len(p.Blocks))}
	b.before[0], b.dirty[0] = s, true
	for k := 0; k < len(p.Blocks); k++ {
		if b.dirty[k] {
			b.dirty[k] = false
			b.block(k)
			k = b.first(k)
		}
	}
	return b.results, b.after
}

// body is a program being evaluated in one context.
type body struct {
	*analysis
	p        *Program
	frame    int32 // word of the state where the frame begins
	object   int32 // the frame
	context  int32
	control  setID
	deciders [][]int32

	before     []state // at the beginning of each block, nil if not reached
	conditions []setID // what the branch of each block depends on
	results    []cell  // joined over all returns
	after      state
	dirty      []bool // blocks to be evaluated, again or at all
}

// first returns the number before the first dirty block up to k, so that the
// search goes on there, or k.
func (b *body) first(k int) int {
	if i := slices.Index(b.dirty[:k+1], true); i >= 0 {
		return i - 1
	}
	return k
}

// again marks the blocks that block k decides about.
func (b *body) again(k int) {
	for i, ds := range b.deciders {
		if b.before[i] != nil && slices.Contains(ds, int32(k)) {
			b.dirty[i] = true
		}
	}
}

// controls returns what decides whether block k is executed.
func (b *body) controls(k int) setID {
	c := b.control
	for _, d := range b.deciders[k] {
		c = b.union(c, b.conditions[d])
	}
	return c
}

// block evaluates one block and passes its state on.
func (b *body) block(k int) {
	control := b.controls(k)
	s := slices.Clone(b.before[k])
	b.spend(len(s))
	for i := int(b.p.Blocks[k]); i < b.p.blockEnd(k); i++ {
		in := &b.p.Code[i]
		b.spend(4)
		switch in.Op {
		case Jump:
			b.pass(s, in.A)
		case If:
			// Whoever decides whether this branch comes up decides with it.
			c := b.union(s[b.frame+in.A].deps, control)
			b.decides = b.union(b.decides, c)
			if c = b.union(b.conditions[k], c); c != b.conditions[k] {
				b.conditions[k] = c
				b.again(k)
			}
			b.pass(s, in.B)
			b.pass(s, in.C)
		case Return:
			b.ret(s, in, control)
		case Panic, Stop:
		case Call:
			var alive bool
			if s, alive = b.callSite(s, in, int32(i), control); !alive {
				return
			}
		default:
			s = b.instr(s, in, int32(i), control)
		}
	}
}

// pass joins s to what is known at the beginning of block k.
func (b *body) pass(s state, k int32) {
	b.spend(len(s))
	if b.before[k] == nil {
		b.before[k], b.dirty[k] = slices.Clone(s), true
		return
	}
	b.before[k] = b.grow(b.before[k])
	if b.joinState(b.before[k], s) {
		b.dirty[k] = true
	}
}

// ret joins results, and the state after the call. Which return it is depends
// on control.
func (b *body) ret(s state, in *Instr, control setID) {
	var results []cell
	for _, r := range b.p.Returns[in.A] {
		for k := range r.N {
			c := s[b.frame+r.Slot+k]
			c.deps = b.union(c.deps, control)
			results = append(results, c)
		}
	}
	if b.after == nil {
		b.results, b.after = results, slices.Clone(s)
		if b.results == nil {
			b.results = []cell{}
		}
		return
	}
	b.after = b.grow(b.after)
	b.joinState(b.after, s)
	for i, c := range results {
		b.results[i] = b.join(b.results[i], c)
	}
}

// callSite evaluates a call. It reports whether the call can return.
func (b *body) callSite(s state, in *Instr, code int32, control setID) (state, bool) {
	site := &b.p.Calls[in.A]
	var args []cell
	addresses := false
	for _, r := range site.Args {
		for k := range r.N {
			c := s[b.frame+r.Slot+k]
			addresses = addresses || c.spots != 0
			args = append(args, c)
		}
	}
	callee := b.lib[site.Callee]
	if callee == nil {
		if site.Shared {
			return s, false
		}
		b.setAll(s, in.Dst, site.Words, cell{deps: b.union(b.all(args), control)})
		return s, true
	}
	if !addresses && !returnsAddress(callee) {
		results, decides := b.bySummary(callee, args)
		b.decides = b.union(b.decides, decides)
		for k, c := range results {
			c.deps = b.union(c.deps, control)
			s[b.frame+in.Dst+int32(k)] = c
		}
		return s, true
	}
	key := contextKey{b.context, code}
	context, ok := b.contexts[key]
	if !ok {
		context = int32(len(b.contexts) + 1)
		b.contexts[key] = context
	}
	results, after := b.call(callee, args, s, control, context)
	if results == nil {
		return s, false
	}
	copy(after[b.frame+in.Dst:], results)
	return after, true
}

func returnsAddress(p *Program) bool {
	return slices.ContainsFunc(p.Sig.Results, func(r Result) bool { return r.Mode != Value })
}

// all joins what a list of words depends on.
func (a *analysis) all(cells []cell) setID {
	var d setID
	for _, c := range cells {
		d = a.union(d, c.deps)
	}
	return d
}

func (b *body) setAll(s state, slot, n int32, c cell) {
	for k := range n {
		s[b.frame+slot+k] = c
	}
}

// bySummary applies the summary of a program that is given no address.
func (a *analysis) bySummary(p *Program, args []cell) ([]cell, setID) {
	sum := a.summaries[p]
	if sum == nil {
		sum = a.summarise(p)
	}
	if sum.busy {
		c := cell{deps: a.all(args)}
		return slices.Repeat([]cell{c}, p.Sig.ResultWords()), c.deps
	}
	choose := func(d deps) setID {
		var out setID
		for i, c := range args {
			if d.has(i) {
				out = a.union(out, c.deps)
			}
		}
		return out
	}
	out := make([]cell, len(sum.results))
	for k, d := range sum.results {
		out[k].deps = choose(d)
	}
	return out, choose(sum.decides)
}

// summarise analyses a program by itself, its inputs being the words of its
// parameters.
func (a *analysis) summarise(p *Program) *summary {
	sum := &summary{busy: true}
	a.summaries[p] = sum
	inner := &analysis{lib: a.lib, summaries: a.summaries, work: a.work}
	inner.init()
	var args []cell
	for i := range p.Sig.Words() {
		args = append(args, cell{deps: inner.single(i)})
	}
	results, _ := inner.call(p, args, nil, 0, 0)
	a.work = inner.work
	for _, c := range results {
		sum.results = append(sum.results, inner.sets[c.deps])
	}
	if results == nil {
		sum.results = make([]deps, p.Sig.ResultWords())
	}
	sum.decides, sum.busy = inner.sets[inner.decides], false
	return sum
}

// instr evaluates an instruction that is neither control nor a call.
func (b *body) instr(s state, in *Instr, code int32, control setID) state {
	at := func(slot int32) cell { return s[b.frame+slot] }
	put := func(slot int32, c cell) {
		c.deps = b.union(c.deps, control)
		s[b.frame+slot] = c
	}
	switch in.Op {
	case Copy:
		values := slices.Clone(s[b.frame+in.A : b.frame+in.A+in.C])
		for k, c := range values {
			put(in.Dst+int32(k), c)
		}
	case Zero, Unknown, DataAddr:
		for k := range b.p.writes(in).N {
			put(in.Dst+k, cell{})
		}
	case FrameAddr:
		put(in.Dst, cell{spots: b.spotSet([]spot{{b.object, in.A}})})
	case Load:
		for k, c := range b.read(s, at(in.A), in.B, in.C) {
			put(in.Dst+int32(k), c)
		}
	case Store:
		b.write(s, at(in.A), in.Dst, slices.Clone(s[b.frame+in.B:b.frame+in.B+in.C]), control)
	case Move:
		b.moveAll(s, at(in.A), at(in.B), at(in.C).deps, control)
	case Elem, Offset:
		put(in.Dst, b.shifted(in, at(in.A), at(in.B)))
	case New, Make:
		o := b.allocation(code, in)
		s = b.grow(s)
		s[b.frame+in.Dst] = cell{spots: b.spotSet([]spot{{o, 0}}), deps: control}
		if in.Op == Make {
			// How many there are is what the length says; the zeros depend on nothing.
			s[b.frame+in.Dst].deps = b.union(control, at(in.A).deps)
		}
	case Append:
		s = b.appendAll(s, in, code, control)
	case Bound, BoundSlice, Nop:
	default:
		b.operation(s, in, control)
	}
	return s
}

// operation joins what the operands depend on.
func (b *body) operation(s state, in *Instr, control setID) {
	c := cell{deps: control}
	b.p.reads(in, func(r Range) {
		for k := range r.N {
			c = b.join(c, s[b.frame+r.Slot+k])
		}
	})
	if in.Op != AndI && in.Op != OrI && in.Op != Recast {
		c.spots = 0
	}
	w := b.p.writes(in)
	b.setAll(s, w.Slot, w.N, c)
}

// shifted is an address that moves within its object.
func (b *body) shifted(in *Instr, address, index cell) cell {
	var spots []spot
	for _, x := range b.spots[address.spots] {
		switch {
		case in.Op == Elem || x.word < 0:
			x.word = -1
		default:
			x.word += in.C
		}
		spots = append(spots, x)
	}
	out := cell{deps: address.deps, spots: b.spotSet(spots)}
	if in.Op == Elem {
		out.deps = b.union(out.deps, index.deps)
	}
	return out
}

// allocation returns the object that an instruction makes. As it may be
// executed again, it stands for many.
func (b *body) allocation(code int32, in *Instr) int32 {
	key := site{b.context, code}
	o, ok := b.sites[key]
	if !ok {
		o = b.newObject(in.C, in.Op != New)
		b.objects[o].weak = true
		b.sites[key] = o
	}
	return o
}

// moveAll copies any words of one set of objects to any words of another.
func (b *body) moveAll(s state, to, from cell, count, control setID) {
	anywhere := func(c cell) cell {
		var spots []spot
		for _, x := range b.spots[c.spots] {
			spots = append(spots, spot{x.object, -1})
		}
		return cell{c.deps, b.spotSet(spots)}
	}
	v := b.read(s, anywhere(from), 0, 1)
	v[0].deps = b.union(v[0].deps, count)
	b.write(s, anywhere(to), 0, v, control)
}

// appendAll is append: the result is the old array or a new one, and either
// may hold any element of both.
func (b *body) appendAll(s state, in *Instr, code int32, control setID) state {
	o := b.allocation(code, in)
	s = b.grow(s)
	x, y := s[b.frame+in.A], s[b.frame+in.B]
	fresh := cell{spots: b.spotSet([]spot{{o, -1}})}
	b.moveAll(s, fresh, x, 0, control)
	if x.spots != 0 {
		b.moveAll(s, x, y, 0, control)
	}
	b.moveAll(s, fresh, y, 0, control)
	lengths := b.union(b.all(s[b.frame+in.A+1:b.frame+in.A+3]), b.all(s[b.frame+in.B+1:b.frame+in.B+3]))
	lengths = b.union(lengths, control)
	s[b.frame+in.Dst] = cell{deps: b.union(lengths, b.union(x.deps, y.deps)), spots: b.unionSpots(x.spots, fresh.spots)}
	b.setAll(s, in.Dst+1, 2, cell{deps: lengths})
	return s
}
