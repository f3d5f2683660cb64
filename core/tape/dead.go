package tape

// dropDead removes instructions whose results nobody reads, and shortens
// copies of which only a part is read. It reports whether anything changed.
func (p *Program) dropDead() bool {
	live := p.liveOut()
	taken := p.addressTaken()
	changed := false
	var code []Instr
	blocks := make([]int32, len(p.Blocks))
	for b := range p.Blocks {
		now := live[b]
		start := len(code)
		for i := p.blockEnd(b) - 1; i >= int(p.Blocks[b]); i-- {
			in := p.Code[i]
			if in.pure() && !p.wanted(&in, now, taken) {
				changed = true
				continue
			}
			if p.trim(&in, now, taken) {
				changed = true
			}
			p.stepBack(&in, now)
			code = append(code, in)
		}
		reverse(code[start:])
		blocks[b] = int32(start)
	}
	p.Code, p.Blocks = code, blocks
	return changed
}

func reverse(c []Instr) {
	for i, j := 0, len(c)-1; i < j; i, j = i+1, j-1 {
		c[i], c[j] = c[j], c[i]
	}
}

// pure reports whether an instruction does nothing but write its result.
func (in *Instr) pure() bool {
	switch in.Op {
	case DivI, RemI, DivU, RemU, Load, Store, Move, Offset, Bound, BoundSlice, Make, Append, Call:
		return false
	}
	return !in.Op.info().terminator
}

// wanted reports whether any word that in writes is read later.
func (p *Program) wanted(in *Instr, live, taken bitset) bool {
	w := p.writes(in)
	for s := w.Slot; s < w.Slot+w.N; s++ {
		if live.has(s) || taken.has(s) {
			return true
		}
	}
	return false
}

// trim shortens a copy or clearing to the words that are read later.
func (p *Program) trim(in *Instr, live, taken bitset) bool {
	if in.Op != Copy && in.Op != Zero && in.Op != Unknown {
		return false
	}
	used := func(s int32) bool { return live.has(s) || taken.has(s) }
	before := *in
	for in.C > 1 && !used(in.Dst+in.C-1) {
		in.C--
	}
	for in.C > 1 && !used(in.Dst) {
		in.C--
		in.Dst++
		if in.Op == Copy {
			in.A++
		}
	}
	return *in != before
}

// stepBack turns the words live after in into those live before it.
func (p *Program) stepBack(in *Instr, live bitset) {
	w := p.writes(in)
	for s := w.Slot; s < w.Slot+w.N; s++ {
		live[s>>6] &^= 1 << (s & 63)
	}
	p.reads(in, func(r Range) {
		for s := r.Slot; s < r.Slot+r.N; s++ {
			live.add(s)
		}
	})
}

// liveOut returns for each block the words that may be read after it.
func (p *Program) liveOut() []bitset {
	words := (int(p.Slots) + 63) / 64
	out := make([]bitset, len(p.Blocks))
	in := make([]bitset, len(p.Blocks))
	for b := range out {
		out[b], in[b] = make(bitset, words), make(bitset, words)
	}
	now := make(bitset, words)
	for changed := true; changed; {
		changed = false
		for b := len(p.Blocks) - 1; b >= 0; b-- {
			for _, s := range p.successors(b) {
				out[b].join(in[s])
			}
			copy(now, out[b])
			for i := p.blockEnd(b) - 1; i >= int(p.Blocks[b]); i-- {
				p.stepBack(&p.Code[i], now)
			}
			if in[b].join(now) {
				changed = true
			}
		}
	}
	return out
}

// compact renumbers slots and constants so that none is left unused, and drops
// tables entries that nothing refers to.
func (p *Program) compact() {
	used := make([]bool, p.Slots)
	note := func(r Range) {
		for s := r.Slot; s < r.Slot+r.N; s++ {
			used[s] = true
		}
	}
	for i := range p.Code {
		in := &p.Code[i]
		p.reads(in, note)
		note(p.writes(in))
		if in.Op == FrameAddr {
			note(Range{in.A, in.C})
		}
	}
	params := int32(p.Sig.Words())
	first := p.firstTemp()
	to := make([]int32, p.Slots)
	var consts []Const
	n := params
	for s := range p.Slots {
		to[s] = n
		switch {
		case s < params:
			to[s] = s
		case used[s]:
			n++
			if s < first {
				consts = append(consts, p.Consts[s-params])
			}
		}
	}
	rename := func(s int32) int32 {
		if int(s) < len(to) {
			return to[s]
		}
		return s
	}
	for i := range p.Code {
		p.Code[i].MapSlots(rename)
	}
	for i := range p.Calls {
		renameRanges(p.Calls[i].Args, rename)
	}
	for i := range p.Returns {
		renameRanges(p.Returns[i], rename)
	}
	p.Consts, p.Slots = consts, n
	p.dropUnused()
}

func renameRanges(rs []Range, rename func(int32) int32) {
	for i := range rs {
		rs[i].Slot = rename(rs[i].Slot)
	}
}

// dropUnused removes call sites, returns, reasons and branches that no
// instruction refers to any more.
func (p *Program) dropUnused() {
	calls, rets := keeper{}, keeper{}
	reasons, branches := keeper{}, keeper{}
	var newCalls []CallSite
	var newRets [][]Range
	var newReasons []string
	var newBranches []Branch
	for i := range p.Code {
		switch in := &p.Code[i]; in.Op {
		case Call:
			in.A = keep(calls, in.A, p.Calls, &newCalls)
		case Return:
			in.A = keep(rets, in.A, p.Returns, &newRets)
		case Panic, Stop:
			in.A = keep(reasons, in.A, p.Reasons, &newReasons)
		case If:
			in.Dst = keep(branches, in.Dst, p.Branches, &newBranches)
		}
	}
	p.Calls, p.Returns, p.Reasons, p.Branches = newCalls, newRets, newReasons, newBranches
}

// keeper maps an index into a table to one into the table of those kept.
type keeper map[int32]int32

func keep[T any](k keeper, i int32, from []T, to *[]T) int32 {
	j, ok := k[i]
	if !ok {
		j = int32(len(*to))
		k[i] = j
		*to = append(*to, from[i])
	}
	return j
}
