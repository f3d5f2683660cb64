package tape

// MayReturn reports whether any path leads to a return.
func (p *Program) MayReturn() bool { return p.mayReturn(func(*CallSite) bool { return true }) }

// MayReturnWith is MayReturn where a call of a function that is not in lib and
// is given an address ends the path: nobody knows what it does there.
func (p *Program) MayReturnWith(lib Library) bool {
	return p.mayReturn(func(c *CallSite) bool { return !c.Shared || lib[c.Callee] != nil })
}

// Blocker names the first unknown function that is given an address, or "".
func (p *Program) Blocker(lib Library) string {
	for i := range p.Calls {
		if c := &p.Calls[i]; c.Shared && lib[c.Callee] == nil {
			return c.Callee
		}
	}
	return ""
}

func (p *Program) mayReturn(passes func(*CallSite) bool) bool {
	if len(p.Blocks) == 0 {
		return false
	}
	seen := make([]bool, len(p.Blocks))
	seen[0] = true
	work := []int32{0}
block:
	for len(work) > 0 {
		b := work[len(work)-1]
		work = work[:len(work)-1]
		for i := int(p.Blocks[b]); i < p.blockEnd(int(b)); i++ {
			switch in := &p.Code[i]; in.Op {
			case Return:
				return true
			case Call:
				if !passes(&p.Calls[in.A]) {
					continue block
				}
			}
		}
		for _, s := range p.successors(int(b)) {
			if !seen[s] {
				seen[s] = true
				work = append(work, s)
			}
		}
	}
	return false
}

// Stripped returns a copy without places and texts of branches, for storage.
func (p *Program) Stripped() *Program {
	q := *p
	q.Places = nil
	q.Code = append([]Instr(nil), p.Code...)
	for i := range q.Code {
		q.Code[i].Place = 0
	}
	q.Branches = make([]Branch, len(p.Branches))
	return &q
}
