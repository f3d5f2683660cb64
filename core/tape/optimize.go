package tape

import "slices"

// Optimize makes a program shorter without changing what it computes: copies
// that only rename, values that nobody uses, and blocks that nothing leads to
// or that could be one, go. It expects a program that Check passes, and leaves
// one. Except for slots that hold objects or join branches, every slot is then
// written in one place only.
func (p *Program) Optimize() {
	p.checked = false
	p.arrange()
	p.mergeBlocks()
	if len(p.Blocks)*int(p.Slots) > 1<<25 {
		return // a giant: not worth the memory
	}
	for range 4 {
		moved, dropped := p.propagate(), p.dropDead()
		if !moved && !dropped {
			break
		}
	}
	p.mergeRanges()
	p.compact()
}

// mergeBlocks joins a block with the one it jumps to where nothing else leads
// there.
func (p *Program) mergeBlocks() {
	preds := make([]int, len(p.Blocks))
	preds[0]++
	for b := range p.Blocks {
		for _, s := range p.successors(b) {
			preds[s]++
		}
	}
	var code []Instr
	var blocks []int32
	at := make([]int32, len(p.Blocks))
	merged := make([]bool, len(p.Blocks))
	for first := range p.Blocks {
		if merged[first] {
			continue
		}
		at[first] = int32(len(blocks))
		blocks = append(blocks, int32(len(code)))
		for b := first; ; {
			code = append(code, p.Code[p.Blocks[b]:p.blockEnd(b)]...)
			last := &code[len(code)-1]
			// Only forwards: what lies before has been placed already.
			if last.Op != Jump || preds[last.A] != 1 || int(last.A) <= b {
				break
			}
			b = int(last.A)
			merged[b] = true
			code = code[:len(code)-1]
		}
	}
	for i := range code {
		switch in := &code[i]; in.Op {
		case Jump:
			in.A = at[in.A]
		case If:
			in.B, in.C = at[in.B], at[in.C]
		}
	}
	p.Code, p.Blocks = code, blocks
}

// arrange orders the blocks so that each comes after those that lead to it, but
// for loops, and drops those that no path leads to. Lanes that part at a branch
// go on in this order, and so meet again as soon as they can.
func (p *Program) arrange() {
	if len(p.Blocks) == 0 {
		return
	}
	order := p.postorder()
	slices.Reverse(order)
	at := make([]int32, len(p.Blocks))
	for i, b := range order {
		at[b] = int32(i)
	}
	var code []Instr
	var blocks []int32
	for _, b := range order {
		blocks = append(blocks, int32(len(code)))
		for i := int(p.Blocks[b]); i < p.blockEnd(int(b)); i++ {
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

// postorder lists the blocks that can be reached, each after all it leads to.
// The first side of a branch comes later, so that the body of a loop will stand
// before what follows it.
func (p *Program) postorder() []int32 {
	type visit struct {
		block int32
		next  []int32
	}
	seen := make([]bool, len(p.Blocks))
	var order []int32
	push := func(stack []visit, b int32) []visit {
		seen[b] = true
		next := p.successors(int(b))
		slices.Reverse(next)
		return append(stack, visit{b, next})
	}
	stack := push(nil, 0)
	for len(stack) > 0 {
		top := &stack[len(stack)-1]
		if len(top.next) == 0 {
			order = append(order, top.block)
			stack = stack[:len(stack)-1]
			continue
		}
		b := top.next[0]
		top.next = top.next[1:]
		if !seen[b] {
			stack = push(stack, b)
		}
	}
	return order
}
