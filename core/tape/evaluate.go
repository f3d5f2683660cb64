package tape

// Run evaluates every sample of b, which must be a batch of m. It allocates
// nothing, unless a sample needs more memory than any before it.
func (m *Machine) Run(b *Batch) {
	ni, no := len(m.inputs), len(m.outputs)
	clear(b.edges)
	for s := range b.n {
		results, base := m.prepare(b.in[s*ni : (s+1)*ni])
		f := m.exec(base, results, b.edges[s*b.edgeWords:(s+1)*b.edgeWords])
		if f == noFault {
			var unknown []bool
			if b.unknown != nil {
				unknown = b.unknown[s*no : (s+1)*no]
			}
			f = m.collect(results, b.out[s*no:(s+1)*no], unknown)
		}
		b.faults[s], b.outcomes[s] = f, m.outcome(f)
	}
}

// Alias makes parameter i share the object of parameter j from now on: the
// inputs of i are not used. Both must be pointers with the same fields; it
// reports whether they are. Alias(i, i) undoes it.
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

// object returns the parameter whose object parameter i is given.
func (m *Machine) object(i int) int {
	if m.alias == nil {
		return i
	}
	return m.alias[i]
}

// prepare lays out the memory of a sample: the objects that pointers point to,
// the results, the outermost frame.
func (m *Machine) prepare(in []uint64) (results, base int32) {
	l := &m.programs[0]
	at := m.root
	input := 0
	for i := range m.Sig.Params {
		p := &m.Sig.Params[i]
		if p.Mode != Value {
			m.objects[i] = at
			at += int32(copy(m.mem[at:], in[input:input+len(p.Fields)]))
		}
		input += len(p.Fields)
	}
	results = at
	base = results + l.results
	slot := base
	input = 0
	for i := range m.Sig.Params {
		p := &m.Sig.Params[i]
		switch p.Mode {
		case Value:
			copy(m.mem[slot:], in[input:input+len(p.Fields)])
		case Pointer:
			m.mem[slot] = uint64(m.objects[m.object(i)])
		case Slice:
			m.mem[slot] = uint64(m.objects[m.object(i)])
			m.mem[slot+1], m.mem[slot+2] = uint64(p.Len), uint64(p.Len)
		}
		slot += int32(p.Words)
		input += len(p.Fields)
	}
	copy(m.mem[slot:], l.consts)
	if m.unk != nil {
		clear(m.unk[m.root:min(int(base+l.p.Slots), len(m.unk))])
	}
	return results, base
}

// collect copies results and objects to the outputs.
func (m *Machine) collect(results int32, out []uint64, unknown []bool) fault {
	n := 0
	take := func(at int64, fields int) {
		copy(out[n:n+fields], m.mem[at:])
		if unknown != nil {
			copy(unknown[n:n+fields], m.unk[at:])
			for i := range fields {
				if a := at + int64(i); a < int64(m.root) {
					unknown[n+i] = m.data[a-1].Kind == Any
				}
			}
		}
		n += fields
	}
	at := int64(results)
	for i := range m.Sig.Results {
		r := &m.Sig.Results[i]
		switch r.Mode {
		case Value:
			take(at, len(r.Fields))
		case Pointer, Slice:
			if len(r.Fields) == 0 {
				break
			}
			if f := m.follow(at, r); f != noFault {
				return f
			}
			take(int64(m.mem[at]), len(r.Fields))
		}
		at += int64(r.Words)
	}
	for i := range m.Sig.Params {
		if p := &m.Sig.Params[i]; p.Mode == Pointer || p.Mode == Slice {
			take(int64(m.objects[m.object(i)]), len(p.Fields))
		}
	}
	return noFault
}

// follow checks that the address of a result at word at can be followed.
func (m *Machine) follow(at int64, r *Result) fault {
	if m.unk != nil && m.unk[at] {
		return faultAddress
	}
	if m.mem[at] == 0 && (r.Mode == Pointer || r.Len > 0) {
		return faultAbsent
	}
	if r.Mode == Slice && m.mem[at+1] != uint64(r.Len) {
		return faultResultLength
	}
	return m.at(int64(m.mem[at]), int32(len(r.Fields)), false)
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
