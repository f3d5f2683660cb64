package tape

// Run evaluates every sample of b, which must be a batch of m. It allocates
// nothing, unless samples need more memory than any before them.
func (m *Machine) Run(b *Batch) {
	for first := 0; first < b.n; first += Lanes {
		m.runLanes(b, first, min(Lanes, b.n-first))
	}
}

// Peek reads the word at an address that a sample of the batch run last, which
// must have been one of the last [Lanes], gave as a result. It reports whether
// there is such a word and its value is known.
func (m *Machine) Peek(sample int, address uint64) (word uint64, ok bool) {
	lane := uint8(sample % Lanes)
	if address == 0 || address >= uint64(len(m.mem)) {
		return 0, false
	}
	if m.unk != nil && m.marked(int64(address), lane) {
		return 0, false
	}
	return m.get(int64(address), lane), true
}

// runLanes evaluates n samples from first on, one in each lane.
func (m *Machine) runLanes(b *Batch, first, n int) {
	clear(m.taken)
	m.fill(b, first, n)
	g := m.newGroup()
	*g = group{base: m.frame, top: m.frame + m.programs[0].slots, frames: append(g.frames[:0], activation{dst: m.results})}
	g.kept = g.top
	mask := ^uint64(0) >> (Lanes - n)
	g.set(mask)
	for l := range n {
		m.fuel[l], m.heap[l], m.faults[l] = m.Fuel, 0, noFault
	}
	if m.unk != nil {
		clear(m.unk)
	}
	m.exec(g)
	m.collect(b, first, n)
	for i := range m.branches {
		no, yes := m.taken[2*i], m.taken[2*i+1]
		for l := range n {
			sides := no>>l&1 | yes>>l&1<<1
			b.edges[(first+l)*b.edgeWords+i>>5] |= sides << (2 * (i & 31))
		}
	}
}

// Alias makes parameter i share the object of parameter j from now on: the
// inputs of i are not used. Both must be pointers or slices of the same type;
// it reports whether they are. Alias(i, i) undoes it.
func (m *Machine) Alias(i, j int) bool {
	p, q := &m.Sig.Params[i], &m.Sig.Params[j]
	if p.Mode == Value || p.Mode != q.Mode || p.Type != q.Type || len(p.Fields) != len(q.Fields) {
		return false
	}
	if m.alias == nil {
		m.alias = make([]int, len(m.Sig.Params))
		for k := range m.alias {
			m.alias[k] = k
		}
	}
	m.alias[i] = j
	return true
}

// object returns the address of the object that parameter i is given.
func (m *Machine) object(i int) int32 {
	if m.alias != nil {
		i = m.alias[i]
	}
	return m.objects[i]
}

// fill lays out the inputs of n samples: the objects that pointers point to,
// and the parameters in the outermost frame.
func (m *Machine) fill(b *Batch, first, n int) {
	slot, input := m.frame, 0
	for i := range m.Sig.Params {
		p := &m.Sig.Params[i]
		at := slot
		if p.Mode != Value {
			at = m.objects[i]
		}
		for k := range p.Fields {
			copy(m.mem[at+int32(k)][:n], b.in[(input+k)*b.n+first:])
		}
		if p.Mode == Pointer || p.Mode == Slice {
			m.address(slot, i)
		}
		slot += int32(p.Words)
		input += len(p.Fields)
	}
}

// address sets the words of a pointer or slice parameter.
func (m *Machine) address(slot int32, i int) {
	p := &m.Sig.Params[i]
	for l := range Lanes {
		m.mem[slot][l] = uint64(m.object(i))
		if p.Mode == Slice {
			m.mem[slot+1][l], m.mem[slot+2][l] = uint64(p.Len), uint64(p.Len)
		}
	}
}

// collect copies results and objects to the outputs, and how lanes ended.
func (m *Machine) collect(b *Batch, first, n int) {
	at, out := m.results, 0
	for i := range m.Sig.Results {
		r := &m.Sig.Results[i]
		switch {
		case len(r.Fields) == 0:
		case r.Mode == Value:
			m.take(b, first, n, at, out, len(r.Fields))
		default:
			for l := range n {
				m.takeFrom(b, uint8(l), first, at, out, r)
			}
		}
		at += int32(r.Words)
		out += len(r.Fields)
	}
	for i := range m.Sig.Params {
		if p := &m.Sig.Params[i]; p.Mode == Pointer || p.Mode == Slice {
			m.take(b, first, n, m.object(i), out, len(p.Fields))
			out += len(p.Fields)
		}
	}
	for l := range n {
		b.faults[first+l], b.outcomes[first+l] = m.faults[l], m.outcome(m.faults[l])
		clear(b.edges[(first+l)*b.edgeWords : (first+l+1)*b.edgeWords])
	}
}

// take copies the words at address at to the outputs from out on.
func (m *Machine) take(b *Batch, first, n int, at int32, out, fields int) {
	for k := range fields {
		to := (out+k)*b.n + first
		copy(b.out[to:to+n], m.mem[at+int32(k)][:n])
		if b.unknown != nil {
			for l := range n {
				b.unknown[to+l] = m.unk[at+int32(k)]>>l&1 != 0
			}
		}
	}
}

// takeFrom copies what result r of one lane points to.
func (m *Machine) takeFrom(b *Batch, lane uint8, first int, at int32, out int, r *Result) {
	if m.faults[lane] != noFault {
		return
	}
	if m.faults[lane] = m.follow(int64(at), r, lane); m.faults[lane] != noFault {
		return
	}
	a := int64(m.get(int64(at), lane))
	for k := range r.Fields {
		to := (out+k)*b.n + first + int(lane)
		b.out[to] = m.get(a+int64(k), lane)
		if b.unknown != nil {
			b.unknown[to] = m.marked(a+int64(k), lane)
		}
	}
}

// follow checks that the address of a result at word at can be followed.
func (m *Machine) follow(at int64, r *Result, lane uint8) fault {
	if m.unk != nil && m.marked(at, lane) {
		return faultAddress
	}
	if m.get(at, lane) == 0 {
		return faultAbsent
	}
	if r.Mode == Slice && m.get(at+1, lane) != uint64(r.Len) {
		return faultResultLength
	}
	return m.at(int64(m.get(at, lane)), int64(len(r.Fields)), false)
}

func (m *Machine) outcome(f fault) Outcome {
	switch {
	case f == noFault:
		return Returned
	case f < 0:
		return faults[f].outcome
	case m.panics[f]:
		return Panicked
	}
	return Undecided
}
