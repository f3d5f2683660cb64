package frame

import "slices"

// Path is the pose with v_to = P v_from along the fewest edges, and its steps
// from the frame from. It is false if no edges join the two.
func (g *Graph) Path(to, from string) (Pose, []Step, bool) {
	target, okTo := g.index[to]
	source, okFrom := g.index[from]
	if !okTo || !okFrom || !g.joined().together(source, target) {
		return Still, nil, false
	}
	steps, _ := g.steps(source, g.way(g.at, source, target))
	return compose(steps), steps, true
}

// steps takes edges one after another from a frame; frames[k] is where step k starts.
func (g *Graph) steps(from int, edges []int) (steps []Step, frames []string) {
	for _, e := range edges {
		steps = append(steps, Step{g.edges[e], g.ends[e][1] != from})
		frames = append(frames, g.frames[from])
		from = g.far(e, from)
	}
	return steps, frames
}

// compose is the pose of steps taken in order.
func compose(steps []Step) Pose {
	p := Still
	for _, s := range steps {
		p = s.Pose().Mul(p)
	}
	return p
}

// A search has reached frames through edges, from one end of a way.
type search struct {
	through  map[int]int
	frontier []int
}

// way is a shortest way over known edges between two frames that they join. Both
// ends search breadth first, the one with fewer frames to look at next.
func (g *Graph) way(known [][]int, from, to int) []int {
	if from == to {
		return nil
	}
	near := &search{map[int]int{from: -1}, []int{from}}
	far := &search{map[int]int{to: -1}, []int{to}}
	for {
		own, other := near, far
		if len(far.frontier) < len(near.frontier) {
			own, other = far, near
		}
		if meeting := g.widen(known, own, other); meeting >= 0 {
			edges := g.retrace(near, meeting)
			slices.Reverse(edges)
			return append(edges, g.retrace(far, meeting)...)
		}
	}
}

// widen goes one edge further everywhere, and returns a frame that the other has reached, or -1.
func (g *Graph) widen(known [][]int, own, other *search) (meeting int) {
	var next []int
	for _, at := range own.frontier {
		for _, e := range known[at] {
			f := g.far(e, at)
			if _, again := own.through[f]; again {
				continue
			}
			own.through[f] = e
			if _, met := other.through[f]; met {
				return f
			}
			next = append(next, f)
		}
	}
	own.frontier = next
	return -1
}

// retrace lists the edges from a frame back to where the search began.
func (g *Graph) retrace(s *search, at int) (edges []int) {
	for e := s.through[at]; e >= 0; e = s.through[at] {
		edges = append(edges, e)
		at = g.far(e, at)
	}
	return edges
}
