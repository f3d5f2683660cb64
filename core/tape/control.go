package tape

// Which blocks a branch decides about.

// deciders returns, for each block, the blocks whose branch decides whether it
// is executed. A side that can only end in a panic or a stop does not count:
// what comes after "if n == 0 { panic }" is not the business of n, as far as
// results go.
func (p *Program) deciders() [][]int32 {
	n := len(p.Blocks)
	good := p.reachesReturn()
	after := p.postDominators(good)
	out := make([][]int32, n)
	for b := range n {
		var sides []int32
		for _, s := range p.successors(b) {
			if good[s] {
				sides = append(sides, s)
			}
		}
		if !good[b] || len(sides) < 2 {
			continue
		}
		for _, s := range sides {
			// s and all that must follow it, up to where the sides meet again.
			for x := s; x >= 0 && x != after[b]; x = after[x] {
				out[x] = append(out[x], int32(b))
			}
		}
	}
	return out
}

// reachesReturn tells for each block whether a return can follow.
func (p *Program) reachesReturn() []bool {
	good := make([]bool, len(p.Blocks))
	for changed := true; changed; {
		changed = false
		for b := len(p.Blocks) - 1; b >= 0; b-- {
			if good[b] {
				continue
			}
			ok := p.Code[p.blockEnd(b)-1].Op == Return
			for _, s := range p.successors(b) {
				ok = ok || good[s]
			}
			if ok {
				good[b], changed = true, true
			}
		}
	}
	return good
}

// postDominators returns for each block the nearest one that every path to a
// return goes through next, or -1 if that is the end. It is the algorithm of
// Cooper, Harvey and Kennedy, "A Simple, Fast Dominance Algorithm" (2001), on
// the reversed graph.
func (p *Program) postDominators(good []bool) []int32 {
	n := len(p.Blocks)
	rank := make([]int32, n+1) // place in a postorder from the end, which is n
	order := p.reversePostorderFromEnd(good, rank)
	idom := make([]int32, n+1)
	for i := range idom {
		idom[i] = -2 // not known yet
	}
	idom[n] = int32(n)
	meet := func(a, b int32) int32 {
		for a != b {
			for rank[a] < rank[b] {
				a = idom[a]
			}
			for rank[b] < rank[a] {
				b = idom[b]
			}
		}
		return a
	}
	for changed := true; changed; {
		changed = false
		for _, b := range order {
			d := int32(-2)
			for _, s := range p.exits(b, good) {
				switch {
				case idom[s] == -2:
				case d == -2:
					d = s
				default:
					d = meet(d, s)
				}
			}
			if d != idom[b] && d != -2 {
				idom[b], changed = d, true
			}
		}
	}
	out := idom[:n]
	for i, d := range out {
		if d == int32(n) || d == -2 {
			out[i] = -1
		}
	}
	return out
}

// exits returns the blocks that follow b and can return; for a return, the
// end.
func (p *Program) exits(b int32, good []bool) []int32 {
	var out []int32
	for _, s := range p.successors(int(b)) {
		if good[s] {
			out = append(out, s)
		}
	}
	if p.Code[p.blockEnd(int(b))-1].Op == Return {
		out = append(out, int32(len(p.Blocks)))
	}
	return out
}

// reversePostorderFromEnd orders the blocks that can return so that each comes
// after one that follows it, and notes their ranks.
func (p *Program) reversePostorderFromEnd(good []bool, rank []int32) []int32 {
	n := int32(len(p.Blocks))
	preds := make([][]int32, n+1)
	for b := range n {
		if good[b] {
			for _, s := range p.exits(b, good) {
				preds[s] = append(preds[s], b)
			}
		}
	}
	seen := make([]bool, n+1)
	var post []int32
	type visit struct {
		b int32
		k int
	}
	seen[n] = true
	stack := []visit{{n, 0}}
	for len(stack) > 0 {
		top := &stack[len(stack)-1]
		if top.k == len(preds[top.b]) {
			rank[top.b] = int32(len(post))
			post = append(post, top.b)
			stack = stack[:len(stack)-1]
			continue
		}
		next := preds[top.b][top.k]
		top.k++
		if !seen[next] {
			seen[next] = true
			stack = append(stack, visit{next, 0})
		}
	}
	order := make([]int32, 0, len(post))
	for i := len(post) - 2; i >= 0; i-- { // without the end, which is last
		order = append(order, post[i])
	}
	return order
}
