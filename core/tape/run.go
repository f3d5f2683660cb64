package tape

// activation is a call in progress.
type activation struct {
	program, pc int32
	base        int32 // address of the frame
	dst         int32 // address of the results in the caller's frame
}

// frameOf returns the words of the frame of program l at base.
func (m *Machine) frameOf(l *linked, base int32) []uint64 {
	return m.mem[base : base+l.p.Slots]
}

// reserve makes sure that words up to address end exist.
func (m *Machine) reserve(end int) bool {
	if end <= len(m.mem) {
		return true
	}
	if end > maxWords {
		return false
	}
	size := min(max(2*len(m.mem), end), maxWords)
	m.mem = append(m.mem, make([]uint64, size-len(m.mem))...)
	if m.unk != nil {
		m.unk = append(m.unk, make([]bool, size-len(m.unk))...)
	}
	return true
}

// at checks that n words at address a may be read, or written.
func (m *Machine) at(a int64, n int32, writing bool) fault {
	switch {
	case a == 0:
		return faultNil
	case a < 0 || n < 0 || a+int64(n) > int64(len(m.mem)), a < int64(m.root) && a+int64(n) > int64(m.root):
		return faultAddress
	case writing && a < int64(m.root):
		return faultGlobal
	}
	return noFault
}

// exec runs the outermost program, whose frame is at base and whose parameters
// are set; results are copied to address results. It sets the bit of each
// branch it takes in edges.
func (m *Machine) exec(base, results int32, edges []uint64) fault {
	at := int32(0)
	l := &m.programs[at]
	code := l.code
	r := m.frameOf(l, base)
	pc, start := int32(0), int32(0)
	top := base + l.p.Slots
	kept := top
	fuel := m.Fuel
	m.frames = append(m.frames[:0], activation{dst: results})
	for {
		s := &code[pc]
		if m.unk != nil {
			if f := m.spread(l, s, base); f != noFault {
				return f
			}
		}
		pc++
		switch s.op {
		case AddF:
			r[s.dst] = word(float(r[s.a]) + float(r[s.b]))
		case SubF:
			r[s.dst] = word(float(r[s.a]) - float(r[s.b]))
		case MulF:
			r[s.dst] = word(float(r[s.a]) * float(r[s.b]))
		case DivF:
			r[s.dst] = word(float(r[s.a]) / float(r[s.b]))
		case NegF:
			r[s.dst] = word(-float(r[s.a]))
		case EqF:
			r[s.dst] = bit(float(r[s.a]) == float(r[s.b]))
		case NeF:
			r[s.dst] = bit(float(r[s.a]) != float(r[s.b]))
		case LtF:
			r[s.dst] = bit(float(r[s.a]) < float(r[s.b]))
		case LeF:
			r[s.dst] = bit(float(r[s.a]) <= float(r[s.b]))
		case AddG:
			r[s.dst] = word32(float32of(r[s.a]) + float32of(r[s.b]))
		case SubG:
			r[s.dst] = word32(float32of(r[s.a]) - float32of(r[s.b]))
		case MulG:
			r[s.dst] = word32(float32of(r[s.a]) * float32of(r[s.b]))
		case DivG:
			r[s.dst] = word32(float32of(r[s.a]) / float32of(r[s.b]))
		case NegG:
			r[s.dst] = word32(-float32of(r[s.a]))
		case EqG:
			r[s.dst] = bit(float32of(r[s.a]) == float32of(r[s.b]))
		case NeG:
			r[s.dst] = bit(float32of(r[s.a]) != float32of(r[s.b]))
		case LtG:
			r[s.dst] = bit(float32of(r[s.a]) < float32of(r[s.b]))
		case LeG:
			r[s.dst] = bit(float32of(r[s.a]) <= float32of(r[s.b]))
		case AddI:
			r[s.dst] = r[s.a] + r[s.b]
		case SubI:
			r[s.dst] = r[s.a] - r[s.b]
		case MulI:
			r[s.dst] = r[s.a] * r[s.b]
		case DivI, RemI, DivU, RemU:
			if r[s.b] == 0 {
				return faultDivide
			}
			r[s.dst] = divide(s.op, r[s.a], r[s.b])
		case AndI:
			r[s.dst] = r[s.a] & r[s.b]
		case OrI:
			r[s.dst] = r[s.a] | r[s.b]
		case XorI:
			r[s.dst] = r[s.a] ^ r[s.b]
		case AndNotI:
			r[s.dst] = r[s.a] &^ r[s.b]
		case ShlI:
			r[s.dst] = r[s.a] << r[s.b]
		case ShrI:
			r[s.dst] = uint64(int64(r[s.a]) >> r[s.b])
		case ShrU:
			r[s.dst] = r[s.a] >> r[s.b]
		case NegI:
			r[s.dst] = -r[s.a]
		case LtI:
			r[s.dst] = bit(int64(r[s.a]) < int64(r[s.b]))
		case LeI:
			r[s.dst] = bit(int64(r[s.a]) <= int64(r[s.b]))
		case LtU:
			r[s.dst] = bit(r[s.a] < r[s.b])
		case LeU:
			r[s.dst] = bit(r[s.a] <= r[s.b])
		case Wrap:
			r[s.dst] = wrap(Kind(s.c), r[s.a])
		case EqW:
			r[s.dst] = bit(r[s.a] == r[s.b])
		case NeW:
			r[s.dst] = bit(r[s.a] != r[s.b])
		case NotB:
			r[s.dst] = r[s.a] ^ 1
		case FtoG:
			r[s.dst] = word32(float32(float(r[s.a])))
		case GtoF:
			r[s.dst] = word(float64(float32of(r[s.a])))
		case ItoF:
			r[s.dst] = intToFloat(Kind(s.c), r[s.a])
		case ItoG:
			r[s.dst] = intToFloat32(Kind(s.c), r[s.a])
		case FtoI:
			r[s.dst] = truncate(Kind(s.c), float(r[s.a]))
		case GtoI:
			r[s.dst] = truncate32(Kind(s.c), float32of(r[s.a]))
		case Recast:
			r[s.dst] = r[s.a]
		case Copy:
			if s.c == 1 {
				r[s.dst] = r[s.a]
			} else {
				copy(r[s.dst:s.dst+s.c], r[s.a:s.a+s.c])
			}
		case Zero, Unknown:
			clear(r[s.dst : s.dst+s.c])
		case FrameAddr:
			r[s.dst] = uint64(base + s.a)
		case DataAddr:
			r[s.dst] = uint64(s.a)
		case Load:
			if r[s.a] == 0 {
				return faultNil
			}
			a := int64(r[s.a]) + int64(s.b)
			if f := m.at(a, s.c, false); f != noFault {
				return f
			}
			if s.c == 1 {
				r[s.dst] = m.mem[a]
			} else {
				copy(r[s.dst:s.dst+s.c], m.mem[a:])
			}
		case Store:
			if r[s.a] == 0 {
				return faultNil
			}
			a := int64(r[s.a]) + int64(s.dst)
			if f := m.at(a, s.c, true); f != noFault {
				return f
			}
			if s.c == 1 {
				m.mem[a] = r[s.b]
			} else {
				copy(m.mem[a:], r[s.b:s.b+s.c])
			}
		case Move:
			n := int64(r[s.c])
			if n <= 0 {
				break
			}
			if fuel -= int(min(n, maxWords)); fuel < 0 {
				return faultFuel
			}
			if f := m.at(int64(r[s.a]), int32(n), true); f != noFault {
				return f
			}
			if f := m.at(int64(r[s.b]), int32(n), false); f != noFault {
				return f
			}
			copy(m.mem[r[s.a]:][:n], m.mem[r[s.b]:][:n])
		case Elem:
			r[s.dst] = r[s.a] + r[s.b]*uint64(s.c)
		case Offset:
			if r[s.a] == 0 {
				return faultNil
			}
			r[s.dst] = r[s.a] + uint64(s.c)
		case Bound:
			if r[s.a] >= r[s.b] {
				return faultIndex
			}
		case BoundSlice:
			if r[s.a] > r[s.b] || r[s.b] > r[s.c] {
				return faultIndex
			}
		case New, Make, Append:
			f, used := m.allocate(s, base, top, fuel)
			if f != noFault {
				return f
			}
			fuel -= used
			if used > 0 {
				top += int32(used)
				kept = top
			}
			r = m.frameOf(l, base)
		case Jump:
			if fuel -= int(pc - start); fuel < 0 {
				return faultFuel
			}
			pc = s.a
			start = pc
		case If:
			if fuel -= int(pc - start); fuel < 0 {
				return faultFuel
			}
			if r[s.a] != 0 {
				edges[s.dst>>5] |= 2 << (2 * (s.dst & 31))
				pc = s.b
			} else {
				edges[s.dst>>5] |= 1 << (2 * (s.dst & 31))
				pc = s.c
			}
			start = pc
		case Call:
			callee := l.callee[s.a]
			if callee < 0 {
				clear(r[s.dst : s.dst+l.p.Calls[s.a].Words])
				break
			}
			if fuel -= int(pc-start) + 1; fuel < 0 {
				return faultFuel
			}
			next := &m.programs[callee]
			if !m.reserve(int(top) + int(next.p.Slots)) {
				return faultMemory
			}
			m.enter(l, next, s.a, base, top)
			m.frames[len(m.frames)-1].pc = pc
			m.frames[len(m.frames)-1].program = at
			m.frames[len(m.frames)-1].base = base
			m.frames = append(m.frames, activation{dst: base + s.dst})
			at, l, base = callee, next, top
			top += l.p.Slots
			code, r, pc, start = l.code, m.frameOf(l, base), 0, 0
		case Return:
			if fuel -= int(pc - start); fuel < 0 {
				return faultFuel
			}
			d := m.frames[len(m.frames)-1].dst
			for _, x := range l.p.Returns[s.a] {
				copy(m.mem[d:d+x.N], r[x.Slot:])
				if m.unk != nil {
					copy(m.unk[d:d+x.N], m.unk[base+x.Slot:])
				}
				d += x.N
			}
			m.frames = m.frames[:len(m.frames)-1]
			if len(m.frames) == 0 {
				return noFault
			}
			top = max(base, kept)
			caller := &m.frames[len(m.frames)-1]
			at, base, pc = caller.program, caller.base, caller.pc
			l = &m.programs[at]
			code, r, start = l.code, m.frameOf(l, base), pc
		case Panic, Stop:
			return fault(s.a)
		case Nop:
		default:
			f := &mathTable[s.op-firstMath]
			switch {
			case f.f1 != nil:
				r[s.dst] = word(f.f1(float(r[s.a])))
			case f.f2 != nil:
				r[s.dst] = word(f.f2(float(r[s.a]), float(r[s.b])))
			default:
				m.general(f, s, r)
			}
		}
	}
}

// general calls a function of package math whose words are not all float64.
func (m *Machine) general(f *mathFunc, s *step, r []uint64) {
	var in [3]uint64
	from := [...]int32{s.a, s.b, s.c}
	for i := range f.in {
		in[i] = r[from[i]]
	}
	out := f.general(in)
	copy(r[s.dst:], out[:len(f.out)])
}

// enter copies the arguments of call site k of l to the frame of next at base
// to, and sets its constants.
func (m *Machine) enter(l, next *linked, k, base, to int32) {
	d := to
	for _, x := range l.p.Calls[k].Args {
		from := base + x.Slot
		if x.N == 1 {
			m.mem[d] = m.mem[from]
		} else {
			copy(m.mem[d:d+x.N], m.mem[from:from+x.N])
		}
		if m.unk != nil {
			copy(m.unk[d:d+x.N], m.unk[from:from+x.N])
		}
		d += x.N
	}
	copy(m.mem[d:], next.consts)
	if m.unk != nil {
		clear(m.unk[d : d+int32(len(next.consts))])
	}
}

// allocate does New, Make and Append with fresh memory at top. It returns the
// number of words taken.
func (m *Machine) allocate(s *step, base, top int32, fuel int) (fault, int) {
	r := m.mem[base:]
	switch s.op {
	case New:
		return m.fresh(top, int(s.c), base+s.dst)
	case Make:
		n := int64(r[s.a])
		if n < 0 {
			return faultLength, 0
		}
		if n*int64(max(s.c, 1)) > int64(min(fuel, maxWords)) || n > maxWords {
			return faultMemory, 0
		}
		return m.fresh(top, int(n)*int(s.c), base+s.dst)
	}
	return m.extend(s, base, top, fuel)
}

// fresh clears n words at top and writes their address to word at. An object
// of no words gets one, so that its address is its own.
func (m *Machine) fresh(top int32, n int, at int32) (fault, int) {
	n = max(n, 1)
	if !m.reserve(int(top) + n) {
		return faultMemory, 0
	}
	clear(m.mem[top : int(top)+n])
	if m.unk != nil {
		clear(m.unk[top : int(top)+n])
	}
	m.mem[at] = uint64(top)
	return noFault, n
}

// extend appends slice b to slice a, in place where the capacity allows. The
// capacity of a new array is twice the length: like Go's, it is not to be
// relied on.
func (m *Machine) extend(s *step, base, top int32, fuel int) (fault, int) {
	r := m.mem[base:]
	addr, n, room := int64(r[s.a]), int64(r[s.a+1]), int64(r[s.a+2])
	from, more := int64(r[s.b]), int64(r[s.b+1])
	words := int64(s.c)
	used := 0
	if n+more > room {
		room = 2 * (n + more)
		if room*max(words, 1) > int64(min(fuel, maxWords)) {
			return faultMemory, 0
		}
		f, u := m.fresh(top, int(room*words), base+s.dst)
		if f != noFault {
			return f, 0
		}
		used = u
		r = m.mem[base:]
		to := int64(top)
		if n > 0 {
			if f := m.transfer(to, addr, n*words); f != noFault {
				return f, 0
			}
		}
		addr = to
	}
	if more > 0 {
		if f := m.transfer(addr+n*words, from, more*words); f != noFault {
			return f, 0
		}
	}
	r[s.dst], r[s.dst+1], r[s.dst+2] = uint64(addr), uint64(n+more), uint64(room)
	return noFault, used
}

// transfer copies n words between addresses, with what is unknown about them.
func (m *Machine) transfer(to, from, n int64) fault {
	if n == 0 {
		return noFault
	}
	if f := m.at(to, int32(n), true); f != noFault {
		return f
	}
	if f := m.at(from, int32(n), false); f != noFault {
		return f
	}
	copy(m.mem[to:to+n], m.mem[from:from+n])
	if m.unk != nil {
		copy(m.unk[to:to+n], m.unk[from:from+n])
	}
	return noFault
}
