package frame

// Read as parent (To) and child (From), the edges of a well-made description
// form trees: every frame has one parent at most, and no chain of parents
// comes back to where it began. These are the two ways to fail at it.

// SharedChildren are the frames that are the child of edges to two or more
// different parents: for each, in the order first met, those edges.
func (g *Graph) SharedChildren() [][]Edge {
	var shared [][]Edge
	for f := range g.frames {
		var edges []Edge
		parents := map[int]bool{}
		for _, e := range g.at[f] {
			if g.ends[e][1] == f {
				edges = append(edges, g.edges[e])
				parents[g.ends[e][0]] = true
			}
		}
		if len(parents) > 1 {
			shared = append(shared, edges)
		}
	}
	return shared
}

// ParentCycles are chains of edges, each from a child to its parent, that end
// where they began: one at least in every knot of frames that are ancestors of
// themselves. No frame is in two of them.
func (g *Graph) ParentCycles() [][]Edge {
	parents := make([]int, len(g.frames)) // edges to parents not yet taken away
	for _, ends := range g.ends {
		parents[ends[1]]++
	}
	gone := make([]bool, len(g.frames))
	var cycles [][]Edge
	for f := range g.frames {
		if parents[f] == 0 {
			g.remove(f, parents, gone)
		}
	}
	for f := range g.frames {
		for !gone[f] { // whoever is left has a parent that is left
			cycle := g.climb(f, gone)
			cycles = append(cycles, cycle)
			for _, e := range cycle {
				g.remove(g.index[e.From], parents, gone)
			}
		}
	}
	return cycles
}

// remove takes a frame away, and then every frame that is left without a parent.
func (g *Graph) remove(f int, parents []int, gone []bool) {
	queue := []int{f}
	for len(queue) > 0 {
		f := queue[len(queue)-1]
		queue = queue[:len(queue)-1]
		if gone[f] {
			continue
		}
		gone[f] = true
		for _, e := range g.at[f] {
			child := g.ends[e][1]
			if g.ends[e][0] != f {
				continue
			}
			if parents[child]--; parents[child] == 0 {
				queue = append(queue, child)
			}
		}
	}
}

// climb follows parents from f until a frame comes again, and returns the part
// of the way that is closed.
func (g *Graph) climb(f int, gone []bool) []Edge {
	var way []Edge
	met := map[int]int{}
	for {
		if start, again := met[f]; again {
			return way[start:]
		}
		met[f] = len(way)
		for _, e := range g.at[f] {
			if ends := g.ends[e]; ends[1] == f && !gone[ends[0]] {
				way = append(way, g.edges[e])
				f = ends[0]
				break
			}
		}
	}
}
