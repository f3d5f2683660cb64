package tape

// Run evaluates every sample of b, which must be a batch of m. It allocates
// nothing, unless samples need more memory than any before them.
func (m *Machine) Run(b *Batch) {
	for first := 0; first < b.n; first += Lanes {
		m.runLanes(b, first, min(Lanes, b.n-first))
	}
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
	ni := len(m.inputs)
	slot, input := m.frame, 0
	for i := range m.Sig.Params {
		p := &m.Sig.Params[i]
		at := slot
		if p.Mode != Value {
			at = m.objects[i]
		}
		for l := range n {
			in := b.in[(first+l)*ni+input:]
			for k := range p.Fields {
				m.mem[at+int32(k)][l&63] = in[k]
			}
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
	no := len(m.outputs)
	for l := range n {
		s := first + l
		var unknown []bool
		if b.unknown != nil {
			unknown = b.unknown[s*no : (s+1)*no]
		}
		if m.faults[l] == noFault {
			m.faults[l] = m.collectLane(uint8(l), b.out[s*no:(s+1)*no], unknown)
		}
		b.faults[s], b.outcomes[s] = m.faults[l], m.outcome(m.faults[l])
		clear(b.edges[s*b.edgeWords : (s+1)*b.edgeWords])
	}
}

func (m *Machine) collectLane(lane uint8, out []uint64, unknown []bool) fault {
	n := 0
	take := func(at int64, fields int) {
		for k := range int64(fields) {
			out[n] = m.get(at+k, lane)
			if unknown != nil {
				unknown[n] = m.marked(at+k, lane)
			}
			n++
		}
	}
	at := int64(m.results)
	for i := range m.Sig.Results {
		r := &m.Sig.Results[i]
		switch {
		case len(r.Fields) == 0:
		case r.Mode == Value:
			take(at, len(r.Fields))
		default:
			if f := m.follow(at, r, lane); f != noFault {
				return f
			}
			take(int64(m.get(at, lane)), len(r.Fields))
		}
		at += int64(r.Words)
	}
	for i := range m.Sig.Params {
		if p := &m.Sig.Params[i]; p.Mode == Pointer || p.Mode == Slice {
			take(int64(m.object(i)), len(p.Fields))
		}
	}
	return noFault
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
