package frame

// Orphans of one parent each make a tree; these are the ways to fail at it.

// SharedChildren are the frames that are the child (From) of edges to two or
// more parents (To), each with those edges, in the order first met.
func (g *Graph) SharedChildren() [][]Edge {
	var shared [][]Edge
	for f := range g.frames {
		var edges []Edge
		first, several := -1, false
		for _, e := range g.at[f] {
			if g.ends[e][1] != f {
				continue
			}
			edges = append(edges, g.edges[e])
			several = several || first >= 0 && g.ends[e][0] != first
			first = g.ends[e][0]
		}
		if several {
			shared = append(shared, edges)
		}
	}
	return shared
}
