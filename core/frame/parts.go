package frame

// Parts are the sets of frames that edges join, in the order first met.
func (g *Graph) Parts() [][]string {
	u := g.joined()
	var parts [][]string
	place := map[int]int{}
	for f, name := range g.frames {
		root := u.root(f)
		at, met := place[root]
		if !met {
			at = len(parts)
			place[root] = at
			parts = append(parts, nil)
		}
		parts[at] = append(parts[at], name)
	}
	return parts
}

// joined tells which frames edges join.
func (g *Graph) joined() union {
	u := newUnion(len(g.frames))
	for _, ends := range g.ends {
		u.join(ends[0], ends[1])
	}
	return u
}

// union tells which frames are joined: each points to another one of its part, or
// is the root of it.
type union []int

func newUnion(n int) union {
	u := make(union, n)
	for k := range u {
		u[k] = k
	}
	return u
}

func (u union) root(k int) int {
	for u[k] != k {
		u[k] = u[u[k]]
		k = u[k]
	}
	return k
}

// join joins two, and reports whether they were apart.
func (u union) join(a, b int) bool {
	ra, rb := u.root(a), u.root(b)
	u[ra] = rb
	return ra != rb
}

func (u union) together(a, b int) bool { return u.root(a) == u.root(b) }
