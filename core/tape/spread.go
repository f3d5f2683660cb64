package tape

// spread does for step s what the machine does for values, but for the marks
// of unknown words. Values of unknown words are zero, or whatever; a step that
// would act upon one ends the sample.
func (m *Machine) spread(l *linked, s *step, base int32) fault {
	u := m.unk[base : base+l.p.Slots]
	switch s.op {
	case Jump, Return, Panic, Stop, Nop, Append, New:
		// Return and Append move the marks with the words.
		if s.op == Append && (anyOf(u[s.a:s.a+3]) || anyOf(u[s.b:s.b+3])) {
			return faultAddress
		}
		if s.op == New {
			u[s.dst] = false
		}
		if s.op == Append {
			clear(u[s.dst : s.dst+3])
		}
	case If:
		if u[s.a] {
			return faultBranch
		}
	case Call:
		if l.callee[s.a] < 0 {
			return m.unknownCall(l, s, u)
		}
	case Unknown:
		for i := s.dst; i < s.dst+s.c; i++ {
			u[i] = true
		}
	case Zero:
		clear(u[s.dst : s.dst+s.c])
	case FrameAddr, DataAddr:
		u[s.dst] = false
	case Copy:
		copy(u[s.dst:s.dst+s.c], u[s.a:s.a+s.c])
	case Load:
		return m.spreadLoad(s, u, base)
	case Store:
		return m.spreadStore(s, u, base)
	case Move:
		return m.spreadMove(s, u, base)
	case Bound:
		if u[s.a] || u[s.b] {
			return faultAddress
		}
	case BoundSlice:
		if u[s.a] || u[s.b] || u[s.c] {
			return faultAddress
		}
	case Make:
		if u[s.a] {
			return faultAddress
		}
		u[s.dst] = false
	case Offset:
		if u[s.a] {
			return faultAddress
		}
		u[s.dst] = false
	case DivI, RemI, DivU, RemU:
		if u[s.b] {
			return faultBranch
		}
		u[s.dst] = u[s.a]
	default:
		info := s.op.info()
		mark := info.a.role == read && u[s.a] || info.b.role == read && u[s.b] || info.c.role == read && u[s.c]
		u[s.dst] = mark
		if info.dst.words == 2 {
			u[s.dst+1] = mark
		}
	}
	return noFault
}

func anyOf(u []bool) bool {
	for _, x := range u {
		if x {
			return true
		}
	}
	return false
}

// unknownCall marks the results of a function that is not known.
func (m *Machine) unknownCall(l *linked, s *step, u []bool) fault {
	site := &l.p.Calls[s.a]
	if site.Shared {
		return faultCallee
	}
	for i := s.dst; i < s.dst+site.Words; i++ {
		u[i] = true
	}
	return noFault
}

func (m *Machine) spreadLoad(s *step, u []bool, base int32) fault {
	if u[s.a] {
		return faultAddress
	}
	a := int64(m.mem[base+s.a])
	if a == 0 {
		return noFault // the machine reports it
	}
	a += int64(s.b)
	if m.at(a, s.c, false) != noFault {
		return noFault
	}
	if a < int64(m.root) {
		for i := range s.c {
			u[s.dst+i] = m.data[a-1+int64(i)].Kind == Any
		}
		return noFault
	}
	copy(u[s.dst:s.dst+s.c], m.unk[a:])
	return noFault
}

func (m *Machine) spreadStore(s *step, u []bool, base int32) fault {
	if u[s.a] {
		return faultAddress
	}
	a := int64(m.mem[base+s.a])
	if a == 0 || m.at(a+int64(s.dst), s.c, true) != noFault {
		return noFault
	}
	copy(m.unk[a+int64(s.dst):], u[s.b:s.b+s.c])
	return noFault
}

func (m *Machine) spreadMove(s *step, u []bool, base int32) fault {
	if u[s.a] || u[s.b] || u[s.c] {
		return faultAddress
	}
	to, from, n := int64(m.mem[base+s.a]), int64(m.mem[base+s.b]), int64(m.mem[base+s.c])
	if n <= 0 || n > maxWords || m.at(to, int32(n), true) != noFault || m.at(from, int32(n), false) != noFault {
		return noFault
	}
	copy(m.unk[to:to+n], m.unk[from:from+n])
	return noFault
}
