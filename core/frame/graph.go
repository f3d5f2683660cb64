package frame

import (
	"dextral/core/rotor"
)

// Pose is the map v -> R v R~ + T.
type Pose struct {
	R rotor.Rotor
	T rotor.Vec
}

// Still is the pose that moves nothing.
var Still = Pose{R: rotor.One}

// Apply maps the coordinates of a point.
func (p Pose) Apply(v rotor.Vec) rotor.Vec { return p.R.Rotate(v).Add(p.T) }

// Mul is q first, p second.
func (p Pose) Mul(q Pose) Pose { return Pose{p.R.Mul(q.R), p.Apply(q.T)} }

// Inverse is (R~, -R~ T R).
func (p Pose) Inverse() Pose {
	r := p.R.Reverse()
	return Pose{r, r.Rotate(p.T).Neg()}
}

// Edge states v_To = R v_From R~ + T. As parent and child: To is the parent.
type Edge struct {
	ID       int // the caller's own
	To, From string
	Pose     Pose
	Shifted  bool // T is known
}

// Graph is named frames joined by edges. The zero value is empty and ready.
type Graph struct {
	frames []string
	index  map[string]int
	edges  []Edge
	ends   [][2]int // frames To and From of each edge
	at     [][]int  // edges at each frame, in the order added
}

// Add joins two frames. Several edges may join the same two, and one may join a
// frame to itself; each closes a loop.
func (g *Graph) Add(e Edge) {
	to, from := g.frame(e.To), g.frame(e.From)
	n := len(g.edges)
	g.edges = append(g.edges, e)
	g.ends = append(g.ends, [2]int{to, from})
	g.at[to] = append(g.at[to], n)
	if from != to {
		g.at[from] = append(g.at[from], n)
	}
}

func (g *Graph) frame(name string) int {
	if at, ok := g.index[name]; ok {
		return at
	}
	if g.index == nil {
		g.index = map[string]int{}
	}
	g.index[name] = len(g.frames)
	g.frames = append(g.frames, name)
	g.at = append(g.at, nil)
	return len(g.frames) - 1
}

// far is the other end of an edge.
func (g *Graph) far(edge, at int) int { return g.ends[edge][0] + g.ends[edge][1] - at }

// Frames are the names, in the order in which they were first met.
func (g *Graph) Frames() []string { return g.frames }

// Edges are the edges, in the order added.
func (g *Graph) Edges() []Edge { return g.edges }

// Step is one edge of a path.
type Step struct {
	Edge     Edge
	Reversed bool // taken from its To to its From
}

// Pose is that of the step: the edge's, or its inverse.
func (s Step) Pose() Pose {
	if s.Reversed {
		return s.Edge.Pose.Inverse()
	}
	return s.Edge.Pose
}
