package frame

import "dextral/core/rotor"

// Loop is a closed path. Its poses ought to compose to nothing.
type Loop struct {
	Steps   []Step
	Frames  []string // Frames[k] is where step k starts
	Closure Pose     // the composition, in the first frame
	Angle   float64  // rotation of the closure, rad
	Length  float64  // translation of the closure at the first frame's origin
	Shifted bool     // the translation of every edge is known, so Length means something
}

// Loops are independent loops that all others are made of, in the order in
// which edges were added: one for every edge whose two frames were joined
// already, of that edge and a short way back over earlier edges. With e edges
// between f frames in p parts there are e - f + p.
//
// Each loop has an edge that no earlier loop has, hence they are independent. The way back
// is searched from both ends at once, so the work for a loop is that of the
// frames within half its length; cycles are never enumerated.
func (g *Graph) Loops() []Loop {
	var loops []Loop
	known := make([][]int, len(g.frames)) // earlier edges at each frame
	joined := newUnion(len(g.frames))
	for e, ends := range g.ends {
		to, from := ends[0], ends[1]
		if !joined.join(to, from) {
			loops = append(loops, g.loop(e, g.way(known, to, from)))
		}
		known[to] = append(known[to], e)
		known[from] = append(known[from], e)
	}
	return loops
}

// loop goes along edge e and the way back.
func (g *Graph) loop(e int, back []int) Loop {
	l := Loop{Shifted: true}
	l.Steps, l.Frames = g.steps(g.ends[e][1], append([]int{e}, back...))
	for _, s := range l.Steps {
		l.Shifted = l.Shifted && s.Edge.Shifted
	}
	l.Closure = compose(l.Steps)
	l.Angle = rotor.Angle(rotor.One, l.Closure.R)
	l.Length = l.Closure.T.Norm()
	return l
}
