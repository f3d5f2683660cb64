package tape

// Marks of unknown words: one bit for each lane. They are kept only by
// machines in which something can be unknown.

// markOf returns the marks of slot i of the frame at base.
func (m *Machine) markOf(base, i int32) uint64 {
	if i < 0 {
		return 0 // a constant
	}
	return m.unk[base+i]
}

// mark sets the marks of the word at address a in the lanes of mask.
func (m *Machine) mark(a int32, marks, mask uint64) {
	m.unk[a] = m.unk[a]&^mask | marks&mask
}

func (m *Machine) setMark(a int64, lane uint8, on bool) {
	m.unk[a] &^= 1 << lane
	if on {
		m.unk[a] |= 1 << lane
	}
}

// spread does for step s what the machine does for values, but for marks. The
// values of unknown words are zero, or whatever; a lane that would act upon
// one ends.
func (m *Machine) spread(g *group, l *linked, s *step) {
	u := func(slot int32) uint64 { return m.markOf(g.base, slot) & g.mask }
	set := func(slot int32, marks uint64) { m.mark(g.base+slot, marks, g.mask) }
	switch s.op {
	case Jump, Return, Panic, Stop, Nop:
		// Return moves the marks with the words.
	case If:
		m.kill(g, u(s.a), faultBranch)
	case Call:
		if l.callee[s.a] < 0 {
			m.unknownCall(g, l, s)
		}
	case Unknown:
		for k := range s.c {
			set(s.dst+k, g.mask)
		}
	case Zero:
		for k := range s.c {
			set(s.dst+k, 0)
		}
	case FrameAddr, DataAddr, New:
		set(s.dst, 0)
	case Copy:
		m.spreadCopy(g, s)
	case Load:
		m.kill(g, u(s.a), faultAddress)
		m.spreadLoad(g, s)
	case Store:
		m.kill(g, u(s.a), faultAddress)
		m.spreadStore(g, s)
	case Bound:
		m.kill(g, u(s.a)|u(s.b), faultAddress)
	case Move, BoundSlice:
		m.kill(g, u(s.a)|u(s.b)|u(s.c), faultAddress)
	case Make, Offset:
		m.kill(g, u(s.a), faultAddress)
		set(s.dst, 0)
	case Append:
		for k := range int32(3) {
			m.kill(g, u(s.a+k)|u(s.b+k), faultAddress)
		}
		for k := range int32(3) {
			set(s.dst+k, 0)
		}
	case DivI, RemI, DivU, RemU:
		m.kill(g, u(s.b), faultBranch)
		set(s.dst, u(s.a))
	default:
		m.spreadValue(g, s)
	}
}

// spreadValue marks the result of an operation that has an unknown operand.
func (m *Machine) spreadValue(g *group, s *step) {
	info := s.op.info()
	var marks uint64
	for _, x := range [...]struct {
		o operand
		v int32
	}{{info.a, s.a}, {info.b, s.b}, {info.c, s.c}} {
		if x.o.role == read {
			for k := range int32(max(x.o.words, 1)) {
				if x.v < 0 {
					break // constants
				}
				marks |= m.markOf(g.base, x.v+k)
			}
		}
	}
	for k := range int32(max(info.dst.words, 1)) {
		m.mark(g.base+s.dst+k, marks, g.mask)
	}
}

func (m *Machine) spreadCopy(g *group, s *step) {
	for i := range s.c {
		k := i
		if s.a >= 0 && s.a < s.dst {
			k = s.c - 1 - i
		}
		from := s.a + k
		if s.a < 0 {
			from = s.a
		}
		m.mark(g.base+s.dst+k, m.markOf(g.base, from), g.mask)
	}
}

// unknownCall marks the results of a function that is not known.
func (m *Machine) unknownCall(g *group, l *linked, s *step) {
	site := &l.p.Calls[s.a]
	if site.Shared {
		m.kill(g, g.mask, faultCallee)
		return
	}
	for k := range site.Words {
		m.mark(g.base+s.dst+k, g.mask, g.mask)
		fill(&m.mem[g.base+s.dst+k], 0, g.lanes())
	}
}

func (m *Machine) spreadLoad(g *group, s *step) {
	addr := m.col(m.mem[g.base:], s.a)
	for _, l := range g.lanes() {
		a := int64(addr[l&63])
		if a == 0 || m.at(a+int64(s.b), int64(s.c), false) != noFault {
			continue // the machine reports it
		}
		for k := range s.c {
			m.setMark(int64(g.base+s.dst+k), l, m.marked(a+int64(s.b+k), l))
		}
	}
}

func (m *Machine) spreadStore(g *group, s *step) {
	addr := m.col(m.mem[g.base:], s.a)
	for _, l := range g.lanes() {
		a := int64(addr[l&63])
		if a == 0 || m.at(a+int64(s.dst), int64(s.c), true) != noFault {
			continue
		}
		for k := range s.c {
			from := s.b + k
			if s.b < 0 {
				from = s.b
			}
			m.setMark(a+int64(s.dst+k), l, m.markOf(g.base, from)>>l&1 != 0)
		}
	}
}
