package tape

// col returns the column of slot i of frame r. Slots below zero are constants,
// which belong to no frame.
func (m *Machine) col(r []column, i int32) *column {
	if i < 0 {
		return &m.consts[^i]
	}
	return &r[i]
}

// cols returns the columns of n slots from i on.
func (m *Machine) cols(r []column, i, n int32) []column {
	if i < 0 {
		return m.consts[^i:][:n]
	}
	return r[i:][:n]
}

// exec runs the outermost program for the lanes of g until all have returned
// or failed.
func (m *Machine) exec(g *group) {
	for g != nil {
		m.advance(g)
		g = m.next(g)
	}
}

// advance runs g until it is done, or until another group waits and g comes to
// a place where they might meet.
func (m *Machine) advance(g *group) {
	l := &m.programs[g.program]
	r := m.mem[g.base:][:l.slots]
	for g.n > 0 {
		s := &l.code[g.pc]
		if m.unk != nil {
			m.spread(g, l, s)
			if g.n == 0 {
				return
			}
		}
		g.pc++
		lanes := g.lanes()
		switch f := family[s.op]; f {
		case famFloat64:
			float64Op(s.op, &r[s.dst], m.col(r, s.a), m.col(r, s.b), lanes)
		case famFloat32:
			float32Op(s.op, &r[s.dst], m.col(r, s.a), m.col(r, s.b), lanes)
		case famInt:
			intOp(s.op, &r[s.dst], m.col(r, s.a), m.col(r, s.b), lanes)
		case famDivide:
			m.divide(g, s.op, &r[s.dst], m.col(r, s.a), m.col(r, s.b))
		case famConvert:
			convertOp(s.op, Kind(s.c), &r[s.dst], m.col(r, s.a), lanes)
		case famMath:
			m.math(s, r, lanes)
		case famComplex:
			complexDiv(r[s.dst:], m.cols(r, s.a, 2), m.cols(r, s.b, 2), lanes)
		case famCopy:
			m.copyOp(s, r, g)
		case famMemory:
			m.memory(g, s, r)
		case famAllocate:
			m.allocate(g, s, r)
			r = m.mem[g.base:][:l.slots]
		case famControl:
			m.control(g, l, s, r)
			if len(m.waiting) > 0 || g.n == 0 {
				return
			}
			l = &m.programs[g.program]
			r = m.mem[g.base:][:l.slots]
		}
	}
}

// control does jumps, branches, calls and returns, and ends lanes.
func (m *Machine) control(g *group, l *linked, s *step, r []column) {
	switch s.op {
	case Panic, Stop:
		m.kill(g, g.mask, fault(s.a))
		return
	case Call:
		m.call(g, l, s, r)
		return
	}
	m.burn(g, g.pc-g.start)
	switch s.op {
	case Jump:
		g.pc = s.a
	case If:
		m.branch(g, s, m.col(r, s.a))
	case Return:
		m.ret(g, l, s, r)
	}
	g.start = g.pc
}

// branch sends the lanes of g where the condition is not zero to one block and
// the others to another.
func (m *Machine) branch(g *group, s *step, cond *column) {
	var yes uint64
	for _, l := range g.lanes() {
		yes |= (cond[l&63] & 1) << l
	}
	no := g.mask &^ yes
	m.taken[2*s.dst] |= no
	m.taken[2*s.dst+1] |= yes
	switch {
	case no == 0:
		g.pc = s.b
	case yes == 0:
		g.pc = s.c
	default:
		m.split(g, no, s.c)
		g.pc = s.b
	}
}

// maxDepth bounds the calls within calls.
const maxDepth = 200

// call enters the callee with a new frame on top.
func (m *Machine) call(g *group, l *linked, s *step, r []column) {
	callee := l.callee[s.a]
	if callee < 0 {
		return // spread has marked the results
	}
	m.burn(g, g.pc-g.start+1)
	g.start = g.pc
	next := &m.programs[callee]
	if len(g.frames) >= maxDepth || !m.reserve(int(g.top)+int(next.slots)) {
		m.kill(g, g.mask, faultMemory)
		return
	}
	from := m.mem[g.base:][:l.slots]
	to := m.mem[g.top:][:next.slots]
	d := int32(0)
	for _, x := range l.args[s.a] {
		src := m.cols(from, x.Slot, x.N)
		for k := range src {
			move(&to[d], &src[k], g)
			if m.unk != nil {
				m.mark(g.top+d, m.markOf(g.base, x.Slot+int32(k)), g.mask)
			}
			d++
		}
	}
	g.frames = append(g.frames, activation{program: g.program, pc: g.pc, base: g.base, dst: g.base + s.dst})
	g.program, g.base = callee, g.top
	g.top += next.slots
	g.pc, g.start = 0, 0
}

// ret copies the results to the caller's frame and goes on there.
func (m *Machine) ret(g *group, l *linked, s *step, r []column) {
	n := len(g.frames) - 1
	caller := g.frames[n]
	d := caller.dst
	for _, x := range l.returns[s.a] {
		src := m.cols(r, x.Slot, x.N)
		for k := range src {
			move(&m.mem[d], &src[k], g)
			if m.unk != nil {
				m.mark(d, m.markOf(g.base, x.Slot+int32(k)), g.mask)
			}
			d++
		}
	}
	g.frames = g.frames[:n]
	if n == 0 {
		m.kill(g, g.mask, noFault)
		return
	}
	g.top = max(g.base, g.kept)
	g.program, g.base, g.pc = caller.program, caller.base, caller.pc
}

// move copies a column for the lanes of g.
func move(d, s *column, g *group) {
	if g.n == Lanes {
		*d = *s
		return
	}
	for _, l := range g.lanes() {
		d[l&63] = s[l&63]
	}
}

// copyOp does what only moves words within a frame.
func (m *Machine) copyOp(s *step, r []column, g *group) {
	switch s.op {
	case Copy:
		if s.c > 1 && s.a < s.dst && s.a >= 0 {
			// Runs may overlap: go backwards.
			for k := s.c - 1; k >= 0; k-- {
				move(&r[s.dst+k], &r[s.a+k], g)
			}
			return
		}
		src := m.cols(r, s.a, s.c)
		for k := range src {
			move(&r[s.dst+int32(k)], &src[k], g)
		}
	case Zero, Unknown:
		var zero column
		for k := range s.c {
			move(&r[s.dst+k], &zero, g)
		}
	case FrameAddr:
		fill(&r[s.dst], uint64(g.base+s.a), g.lanes())
	case DataAddr:
		fill(&r[s.dst], uint64(s.a), g.lanes())
	}
}

func fill(d *column, w uint64, lanes []uint8) {
	for _, l := range lanes {
		d[l&63] = w
	}
}

// math calls a function of package math.
func (m *Machine) math(s *step, r []column, lanes []uint8) {
	f := &mathTable[s.op-firstMath]
	d := &r[s.dst]
	switch {
	case f.f1 != nil:
		a := m.col(r, s.a)
		for _, l := range lanes {
			d[l&63] = word(f.f1(float(a[l&63])))
		}
	case f.f2 != nil:
		a, b := m.col(r, s.a), m.col(r, s.b)
		for _, l := range lanes {
			d[l&63] = word(f.f2(float(a[l&63]), float(b[l&63])))
		}
	default:
		m.general(f, s, r, lanes)
	}
}

// general calls a function whose words are not all float64.
func (m *Machine) general(f *mathFunc, s *step, r []column, lanes []uint8) {
	from := [...]int32{s.a, s.b, s.c}
	for _, l := range lanes {
		var in [3]uint64
		for i := range f.in {
			in[i] = m.col(r, from[i])[l&63]
		}
		out := f.general(in)
		for i := range f.out {
			r[s.dst+int32(i)][l&63] = out[i]
		}
	}
}

// The families of operations that one function of the machine does.
const (
	famNone = iota
	famFloat64
	famFloat32
	famInt
	famDivide
	famConvert
	famMath
	famComplex
	famCopy
	famMemory
	famAllocate
	famControl
)

var family = func() [256]uint8 {
	var t [256]uint8
	set := func(f uint8, from, to Op) {
		for op := from; op <= to; op++ {
			t[op] = f
		}
	}
	set(famFloat64, AddF, LeF)
	set(famFloat32, AddG, LeG)
	set(famInt, AddI, NotB)
	set(famDivide, DivI, RemU)
	set(famConvert, FtoG, Recast)
	t[Wrap] = famConvert
	t[DivC] = famComplex
	set(famCopy, Copy, DataAddr)
	set(famMemory, Load, BoundSlice)
	set(famAllocate, New, Append)
	set(famControl, Jump, Call)
	set(famMath, firstMath, firstMath+Op(len(mathTable))-1)
	return t
}()
