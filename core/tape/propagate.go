package tape

// propagate makes instructions read the origin of a copy instead of the copy,
// word by word. It reports whether anything changed.
//
// A copy may be replaced by its origin everywhere if both are written in one
// place only: every use comes after the copy, and the copy after its origin,
// on every path, also around a loop. Within a block it may be replaced as long
// as neither is written again. A word whose address is taken may be written at
// any time and stays out of it.
func (p *Program) propagate() bool {
	n := int(p.Slots)
	writes := make([]uint8, n) // 0, 1 or more
	taken := p.addressTaken()
	for i := range p.Code {
		w := p.writes(&p.Code[i])
		for s := w.Slot; s < w.Slot+w.N; s++ {
			writes[s] = min(writes[s]+1, 2)
		}
	}
	fixed := func(s int32) bool { return !taken.has(s) && (s < p.firstTemp() || writes[s] == 1) }
	global := make([]int32, n) // origin of a word, or itself
	for s := range global {
		global[s] = int32(s)
	}
	for i := range p.Code {
		if in := &p.Code[i]; in.Op == Copy {
			for k := range in.C {
				if d, s := in.Dst+k, in.A+k; fixed(d) && fixed(s) {
					global[d] = s
				}
			}
		}
	}
	origin := func(s int32) int32 {
		for global[s] != s {
			s = global[s]
		}
		return s
	}
	f := forwarder{p: p, origin: origin, taken: taken, local: map[int32]int32{}, copies: map[int32][]int32{}}
	for b := range p.Blocks {
		clear(f.local)
		clear(f.copies)
		for i := int(p.Blocks[b]); i < p.blockEnd(b); i++ {
			f.rewrite(&p.Code[i])
			f.follow(&p.Code[i])
		}
	}
	return f.changed
}

// addressTaken returns the words whose address is taken.
func (p *Program) addressTaken() bitset {
	taken := make(bitset, (int(p.Slots)+63)/64)
	for i := range p.Code {
		if in := &p.Code[i]; in.Op == FrameAddr {
			for s := in.A; s < in.A+in.C; s++ {
				taken.add(s)
			}
		}
	}
	return taken
}

// forwarder replaces copies within one block.
type forwarder struct {
	p       *Program
	origin  func(int32) int32
	taken   bitset
	local   map[int32]int32   // what a word is a copy of here
	copies  map[int32][]int32 // the words that are copies of a word
	changed bool
}

// source returns the word to be read instead of s.
func (f *forwarder) source(s int32) int32 {
	s = f.origin(s)
	if o, ok := f.local[s]; ok {
		return f.origin(o)
	}
	return s
}

// rewrite changes what in reads. An operand of several words is changed only
// if its origins lie side by side too.
func (f *forwarder) rewrite(in *Instr) {
	info := in.Op.info()
	for _, x := range [...]struct {
		o operand
		v *int32
	}{{info.a, &in.A}, {info.b, &in.B}, {info.c, &in.C}} {
		if x.o.role != read {
			continue
		}
		n := f.p.width(in, x.o)
		if n == 0 {
			continue
		}
		if s, ok := f.run(*x.v, n); ok && s != *x.v {
			*x.v = s
			f.changed = true
		}
	}
	switch in.Op {
	case Call:
		f.p.Calls[in.A].Args = f.ranges(f.p.Calls[in.A].Args)
	case Return:
		f.p.Returns[in.A] = f.ranges(f.p.Returns[in.A])
	}
}

// run returns the first of n origins of the words from s on, if they lie side
// by side and within one kind of slot.
func (f *forwarder) run(s, n int32) (int32, bool) {
	o := f.source(s)
	for k := int32(1); k < n; k++ {
		if f.source(s+k) != o+k {
			return 0, false
		}
	}
	return o, f.p.zone(o) == f.p.zone(o+n-1)
}

// zone tells parameters, constants and the rest apart.
func (p *Program) zone(s int32) int {
	switch {
	case s < int32(p.Sig.Words()):
		return 0
	case s < p.firstTemp():
		return 1
	}
	return 2
}

// ranges rewrites a list of runs word by word.
func (f *forwarder) ranges(rs []Range) []Range {
	var out []Range
	for _, r := range rs {
		for k := range r.N {
			s := f.source(r.Slot + k)
			f.changed = f.changed || s != r.Slot+k
			out = append(out, Range{s, 1})
		}
	}
	return f.p.merged(out)
}

// merged joins runs that lie side by side within one kind of slot.
func (p *Program) merged(rs []Range) []Range {
	var out []Range
	for _, r := range rs {
		if n := len(out) - 1; n >= 0 && out[n].Slot+out[n].N == r.Slot && p.zone(out[n].Slot) == p.zone(r.Slot) {
			out[n].N += r.N
			continue
		}
		if r.N > 0 {
			out = append(out, r)
		}
	}
	return out
}

// mergeRanges joins runs in the tables.
func (p *Program) mergeRanges() {
	for i := range p.Calls {
		p.Calls[i].Args = p.merged(p.Calls[i].Args)
	}
	for i := range p.Returns {
		p.Returns[i] = p.merged(p.Returns[i])
	}
}

// follow keeps account of copies after in.
func (f *forwarder) follow(in *Instr) {
	w := f.p.writes(in)
	for s := w.Slot; s < w.Slot+w.N; s++ {
		f.forget(s)
	}
	if in.Op != Copy {
		return
	}
	for k := range in.C {
		d, s := in.Dst+k, f.source(in.A+k)
		if d != s && !f.taken.has(d) && !f.taken.has(s) && (s < in.Dst || s >= in.Dst+in.C) {
			f.local[d] = s
			f.copies[s] = append(f.copies[s], d)
		}
	}
}

// forget drops what is known about a word that is written, as a copy and as
// an origin.
func (f *forwarder) forget(s int32) {
	delete(f.local, s)
	for _, d := range f.copies[s] {
		if f.local[d] == s {
			delete(f.local, d)
		}
	}
	delete(f.copies, s)
}
