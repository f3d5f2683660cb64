package frame

import (
	"slices"

	"dextral/core/rotor"
)

// A walk is a spanning forest: for each frame the edge through which it was
// first reached, breadth first, and the frame that it was reached from.
type walk struct {
	part, depth, parent, through []int
	parts                        int
}

// walkFrom visits the frames reachable from start, then, if all is set, the rest.
func (g *Graph) walkFrom(start int, all bool) walk {
	n := len(g.frames)
	w := walk{part: filled(n), depth: make([]int, n), parent: filled(n), through: filled(n)}
	for offset := range n {
		root := (start + offset) % n
		if w.part[root] >= 0 {
			continue
		}
		w.part[root] = w.parts
		queue := []int{root}
		for len(queue) > 0 {
			at := queue[0]
			queue = queue[1:]
			for _, e := range g.at[at] {
				next := g.ends[e][0] + g.ends[e][1] - at
				if w.part[next] < 0 {
					w.part[next], w.depth[next] = w.parts, w.depth[at]+1
					w.parent[next], w.through[next] = at, e
					queue = append(queue, next)
				}
			}
		}
		w.parts++
		if !all {
			break
		}
	}
	return w
}

func filled(n int) []int {
	s := make([]int, n)
	for i := range s {
		s[i] = -1
	}
	return s
}

// Parts are the sets of frames that edges join, in the order first met.
func (g *Graph) Parts() [][]string {
	w := g.walkFrom(0, true)
	parts := make([][]string, w.parts)
	for f, part := range w.part {
		parts[part] = append(parts[part], g.frames[f])
	}
	return parts
}

// Path is the pose with v_to = P v_from along the fewest edges, and its steps from
// the frame from; of equally short ones the edges added earlier. It is false if no edges join the two.
func (g *Graph) Path(to, from string) (Pose, []Step, bool) {
	target, okTo := g.index[to]
	source, okFrom := g.index[from]
	if !okTo || !okFrom {
		return Still, nil, false
	}
	w := g.walkFrom(source, false)
	if w.part[target] < 0 {
		return Still, nil, false
	}
	var steps []Step
	for at := target; at != source; at = w.parent[at] {
		steps = append(steps, g.step(w.through[at], w.parent[at]))
	}
	slices.Reverse(steps)
	return compose(steps), steps, true
}

// step is edge e taken from a frame.
func (g *Graph) step(e, from int) Step { return Step{g.edges[e], g.ends[e][1] != from} }

// compose is the pose of steps taken in order.
func compose(steps []Step) Pose {
	p := Still
	for _, s := range steps {
		p = s.Pose().Mul(p)
	}
	return p
}

// Loop is a closed path. Its poses ought to compose to nothing.
type Loop struct {
	Steps   []Step
	Frames  []string // Frames[k] is where step k starts
	Closure Pose     // the composition, in the first frame
	Angle   float64  // rotation of the closure, rad
	Length  float64  // translation of the closure at the first frame's origin
	Shifted bool     // the translation of every edge is known, so Length means something
}

// Loops are independent loops that all others are made of: one for each edge that a
// spanning forest leaves out, of that edge and the forest's path between its
// ends. An edge list with f frames, e edges and p parts has e - f + p of them.
func (g *Graph) Loops() []Loop {
	w := g.walkFrom(0, true)
	var loops []Loop
	for e, ends := range g.ends {
		to, from := ends[0], ends[1]
		if w.through[to] == e || w.through[from] == e {
			continue
		}
		steps, starts := g.around(w, e, from, to)
		loops = append(loops, g.loop(steps, starts))
	}
	return loops
}

// around lists the steps of edge e and of the tree path from its end back to its start.
func (g *Graph) around(w walk, e, from, to int) (steps []Step, starts []int) {
	steps, starts = []Step{g.step(e, from)}, []int{from}
	var down []int // frames below the meeting point, on the side of from
	for at, target := to, from; at != target; {
		if w.depth[at] >= w.depth[target] {
			steps, starts = append(steps, g.step(w.through[at], at)), append(starts, at)
			at = w.parent[at]
		} else {
			down = append(down, target)
			target = w.parent[target]
		}
	}
	for _, at := range slices.Backward(down) {
		steps, starts = append(steps, g.step(w.through[at], w.parent[at])), append(starts, w.parent[at])
	}
	return steps, starts
}

func (g *Graph) loop(steps []Step, starts []int) Loop {
	l := Loop{Steps: steps, Closure: compose(steps), Shifted: true}
	for k, s := range steps {
		l.Frames = append(l.Frames, g.frames[starts[k]])
		l.Shifted = l.Shifted && s.Edge.Shifted
	}
	l.Angle = rotor.Angle(rotor.One, l.Closure.R)
	l.Length = l.Closure.T.Norm()
	return l
}
