package tape

// Limits of one sample.
const (
	// maxHeap is the number of words that a sample may allocate.
	maxHeap = 1 << 14
	// maxWords is the memory of a machine in words, for every lane.
	maxWords = 1 << 18
)

// reserve makes sure that words up to address end exist.
func (m *Machine) reserve(end int) bool {
	if end <= len(m.mem) {
		return true
	}
	if end > maxWords {
		return false
	}
	size := min(max(2*len(m.mem), end), maxWords)
	m.mem = append(m.mem, make([]column, size-len(m.mem))...)
	if m.unk != nil {
		m.unk = append(m.unk, make([]uint64, size-len(m.unk))...)
	}
	return true
}

// at checks that n words at address a may be read, or written. Addresses below
// root are data, which is the same in all lanes and never written.
func (m *Machine) at(a int64, n int64, writing bool) fault {
	switch {
	case a == 0:
		return faultNil
	case a < 0 || n < 0 || n > maxWords || a+n > int64(len(m.mem)), a < int64(m.root) && a+n > int64(m.root):
		return faultAddress
	case writing && a < int64(m.root):
		return faultGlobal
	}
	return noFault
}

// get reads the word at address a of a lane.
func (m *Machine) get(a int64, lane uint8) uint64 {
	if a < int64(m.root) {
		return m.data[a-1].Bits
	}
	return m.mem[a][lane&63]
}

// marked reports whether the word at address a of a lane is unknown.
func (m *Machine) marked(a int64, lane uint8) bool {
	if a < int64(m.root) {
		return m.data[a-1].Kind == Any
	}
	return m.unk[a]>>lane&1 != 0
}

// put writes the word at address a of a lane.
func (m *Machine) put(a int64, lane uint8, w uint64) { m.mem[a][lane&63] = w }

// memory does what goes through addresses, lane by lane: they may differ.
func (m *Machine) memory(g *group, s *step, r []column) {
	switch s.op {
	case Load:
		m.load(g, s, r)
	case Store:
		m.store(g, s, r)
	case Move:
		m.moveWords(g, s, r)
	case Elem:
		a, b := m.col(r, s.a), m.col(r, s.b)
		for _, l := range g.lanes() {
			r[s.dst][l&63] = a[l&63] + b[l&63]*uint64(s.c)
		}
	case Offset:
		var bad uint64
		a := m.col(r, s.a)
		for _, l := range g.lanes() {
			if a[l&63] == 0 {
				bad |= 1 << l
			}
			r[s.dst][l&63] = a[l&63] + uint64(s.c)
		}
		m.kill(g, bad, faultNil)
	case Bound, BoundSlice:
		var bad uint64
		a, b, c := m.col(r, s.a), m.col(r, s.b), m.col(r, s.c)
		for _, l := range g.lanes() {
			if s.op == Bound && a[l&63] >= b[l&63] || s.op == BoundSlice && (a[l&63] > b[l&63] || b[l&63] > c[l&63]) {
				bad |= 1 << l
			}
		}
		m.kill(g, bad, faultIndex)
	}
}

func (m *Machine) load(g *group, s *step, r []column) {
	addr := m.col(r, s.a)
	var bad uint64
	for _, l := range g.lanes() {
		a := int64(addr[l&63])
		f := faultNil
		if a != 0 {
			a += int64(s.b)
			f = m.at(a, int64(s.c), false)
		}
		if f != noFault {
			bad |= m.fail(l, f)
			continue
		}
		for k := range s.c {
			r[s.dst+k][l&63] = m.get(a+int64(k), l)
		}
	}
	g.drop(bad)
}

func (m *Machine) store(g *group, s *step, r []column) {
	addr := m.col(r, s.a)
	src := m.cols(r, s.b, s.c)
	var bad uint64
	for _, l := range g.lanes() {
		a := int64(addr[l&63])
		f := faultNil
		if a != 0 {
			a += int64(s.dst)
			f = m.at(a, int64(s.c), true)
		}
		if f != noFault {
			bad |= m.fail(l, f)
			continue
		}
		for k := range src {
			m.put(a+int64(k), l, src[k][l&63])
		}
	}
	g.drop(bad)
}

func (m *Machine) moveWords(g *group, s *step, r []column) {
	to, from, count := m.col(r, s.a), m.col(r, s.b), m.col(r, s.c)
	var bad uint64
	for _, l := range g.lanes() {
		n := int64(count[l&63])
		if n <= 0 {
			continue
		}
		m.fuel[l&63] -= int32(min(n, maxWords))
		if f := m.transfer(int64(to[l&63]), int64(from[l&63]), n, l); f != noFault {
			bad |= m.fail(l, f)
		}
	}
	g.drop(bad)
}

// transfer copies n words of a lane between addresses, whose runs may overlap,
// with the marks of what is unknown.
func (m *Machine) transfer(to, from, n int64, lane uint8) fault {
	if n == 0 {
		return noFault
	}
	if f := m.at(to, n, true); f != noFault {
		return f
	}
	if f := m.at(from, n, false); f != noFault {
		return f
	}
	for i := range n {
		k := i
		if from < to {
			k = n - 1 - i
		}
		m.put(to+k, lane, m.get(from+k, lane))
		if m.unk != nil {
			m.setMark(to+k, lane, m.marked(from+k, lane))
		}
	}
	return noFault
}

// allocate does New, Make and Append with fresh memory at the top.
func (m *Machine) allocate(g *group, s *step, r []column) {
	top := g.top
	var bad uint64
	for _, l := range g.lanes() {
		var n int64
		f := noFault
		switch s.op {
		case New:
			n, f = m.fresh(g.top, int64(s.c), g.base+s.dst, l)
		case Make:
			n, f = m.makeWords(g, s, l)
		case Append:
			n, f = m.extend(g, s, l)
		}
		if f != noFault {
			bad |= m.fail(l, f)
			continue
		}
		if n > 0 {
			top = max(top, g.top+int32(n))
		}
	}
	g.drop(bad)
	if top > g.top {
		g.top, g.kept = top, top
	}
}

// fresh clears n words of a lane at top and writes their address to the word at
// address at. An object of no words gets one, so that its address is its own.
func (m *Machine) fresh(top int32, n int64, at int32, lane uint8) (int64, fault) {
	n = max(n, 1)
	if int64(m.heap[lane&63])+n > maxHeap || !m.reserve(int(top)+int(n)) {
		return 0, faultMemory
	}
	m.heap[lane&63] += int32(n)
	m.fuel[lane&63] -= int32(n)
	for a := int64(top); a < int64(top)+n; a++ {
		m.mem[a][lane&63] = 0
		if m.unk != nil {
			m.setMark(a, lane, false)
		}
	}
	m.mem[at][lane&63] = uint64(top)
	return n, noFault
}

func (m *Machine) makeWords(g *group, s *step, lane uint8) (int64, fault) {
	n := int64(m.col(m.mem[g.base:], s.a)[lane&63])
	if n < 0 {
		return 0, faultLength
	}
	if n > maxHeap {
		return 0, faultMemory
	}
	return m.fresh(g.top, n*int64(s.c), g.base+s.dst, lane)
}

// extend appends slice b to slice a, in place where the capacity allows. The
// capacity of a new array is twice the length: like Go's, it is not to be
// relied on.
func (m *Machine) extend(g *group, s *step, lane uint8) (int64, fault) {
	word := func(slot int32) int64 { return int64(m.col(m.mem[g.base:], slot)[lane&63]) }
	addr, n, room := word(s.a), word(s.a+1), word(s.a+2)
	from, more := word(s.b), word(s.b+1)
	words := int64(s.c)
	if n < 0 || more < 0 || n > maxHeap || more > maxHeap {
		return 0, faultMemory
	}
	used := int64(0)
	if n+more > room {
		room = 2 * (n + more)
		u, f := m.fresh(g.top, room*words, g.base+s.dst, lane)
		if f != noFault {
			return 0, f
		}
		used = u
		if f := m.transfer(int64(g.top), addr, n*words, lane); f != noFault {
			return 0, f
		}
		addr = int64(g.top)
	}
	if f := m.transfer(addr+n*words, from, more*words, lane); f != noFault {
		return 0, f
	}
	for k, w := range [...]int64{addr, n + more, room} {
		m.mem[g.base+s.dst+int32(k)][lane&63] = uint64(w)
	}
	return used, noFault
}
