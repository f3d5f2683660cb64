package frame_test

import (
	"fmt"
	"math"
	"math/rand/v2"
	"slices"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/core/frame"
	"dextral/core/rotor"
)

func randomVec(rng *rand.Rand) rotor.Vec {
	return rotor.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()}
}

// poses gives each of n frames a pose in one world.
func poses(rng *rand.Rand, n int) []frame.Pose {
	all := make([]frame.Pose, n)
	for k := range all {
		all[k] = frame.Pose{R: random(rng), T: randomVec(rng)}
	}
	return all
}

// edge joins frames a (to) and b (from) truthfully.
func edge(world []frame.Pose, id, a, b int) frame.Edge {
	return frame.Edge{ID: id, To: name(a), From: name(b), Pose: world[a].Inverse().Mul(world[b]), Shifted: true}
}

func name(k int) string { return fmt.Sprint("f", k) }

func TestPose(t *testing.T) {
	rng := source()
	for range 200 {
		p, q, v := frame.Pose{R: random(rng), T: randomVec(rng)}, frame.Pose{R: random(rng), T: randomVec(rng)}, randomVec(rng)
		assert.Less(t, p.Mul(q).Apply(v).Sub(p.Apply(q.Apply(v))).Norm(), 64*ulp)
		assert.Less(t, p.Inverse().Apply(p.Apply(v)).Sub(v).Norm(), 64*ulp)
	}
	assert.Equal(t, rotor.Vec{X: 1}, frame.Still.Apply(rotor.Vec{X: 1}))
}

// TestPath: along random trees and graphs the path composes to the pose that
// the frames' own poses give, starts and ends where it should, and is a shortest one.
func TestPath(t *testing.T) {
	rng := source()
	for range 50 {
		n := 2 + rng.IntN(20)
		world := poses(rng, n)
		var g frame.Graph
		for k := 1; k < n; k++ {
			a, b := k, rng.IntN(k)
			if rng.IntN(2) == 0 {
				a, b = b, a
			}
			g.Add(edge(world, k, a, b))
		}
		for range rng.IntN(10) {
			g.Add(edge(world, -1, rng.IntN(n), rng.IntN(n)))
		}
		for range 20 {
			to, from := rng.IntN(n), rng.IntN(n)
			got, steps, ok := g.Path(name(to), name(from))
			require.True(t, ok)
			want := world[to].Inverse().Mul(world[from])
			assert.Less(t, rotor.Angle(got.R, want.R), 1e-14)
			assert.Less(t, got.T.Sub(want.T).Norm(), 1e-13)
			assert.Equal(t, name(to), walked(t, name(from), steps))
			assert.LessOrEqual(t, len(steps), n)
		}
	}
}

// walked follows steps and returns where they lead.
func walked(t *testing.T, at string, steps []frame.Step) string {
	for _, s := range steps {
		from, to := s.Edge.From, s.Edge.To
		if s.Reversed {
			from, to = to, from
		}
		require.Equal(t, at, from)
		at = to
	}
	return at
}

func TestPathIsShortest(t *testing.T) {
	world := poses(source(), 5)
	var g frame.Graph
	for k := range 4 {
		g.Add(edge(world, k, k+1, k))
	}
	g.Add(edge(world, 9, 0, 4))
	_, steps, ok := g.Path("f4", "f0")
	assert.True(t, ok)
	assert.Len(t, steps, 1)
	assert.True(t, steps[0].Reversed)
	assert.Equal(t, 9, steps[0].Edge.ID)
	_, steps, ok = g.Path("f2", "f2")
	assert.True(t, ok)
	assert.Empty(t, steps)
	for _, pair := range [][2]string{{"f0", "elsewhere"}, {"elsewhere", "f0"}} {
		_, _, ok = g.Path(pair[0], pair[1])
		assert.False(t, ok)
	}
}

func TestParts(t *testing.T) {
	world := poses(source(), 8)
	var g frame.Graph
	assert.Empty(t, g.Parts())
	assert.Empty(t, g.Loops())
	for _, ends := range [][2]int{{0, 1}, {2, 3}, {4, 3}, {5, 5}, {1, 6}} {
		g.Add(edge(world, 0, ends[0], ends[1]))
	}
	assert.Equal(t, []string{"f0", "f1", "f2", "f3", "f4", "f5", "f6"}, g.Frames())
	assert.Equal(t, [][]string{{"f0", "f1", "f6"}, {"f2", "f3", "f4"}, {"f5"}}, g.Parts())
	_, _, ok := g.Path("f0", "f2")
	assert.False(t, ok)
}

// TestLoops: in random graphs with several edges between two frames and edges
// from a frame to itself there are edges - frames + parts loops; each is closed and names
// its frames; truthful edges close, and the errors of wrong ones appear in
// the loops through them, with the size that was put in.
func TestLoops(t *testing.T) {
	rng := source()
	for range 200 {
		n := 1 + rng.IntN(15)
		world := poses(rng, n)
		var g frame.Graph
		edges := rng.IntN(30)
		wrong := -1
		if edges > 0 {
			wrong = rng.IntN(edges)
		}
		axis, _ := randomVec(rng).Unit()
		turn, _ := rotor.FromAxisAngle(axis, 0.3)
		for id := range edges {
			e := edge(world, id, rng.IntN(n), rng.IntN(n))
			if id == wrong {
				e.Pose.R = e.Pose.R.Mul(turn)
			}
			g.Add(e)
		}
		loops := g.Loops()
		assert.Len(t, loops, edges-len(g.Frames())+len(g.Parts()))
		for _, l := range loops {
			through := 0
			for _, s := range l.Steps {
				if s.Edge.ID == wrong {
					through++
				}
			}
			assert.LessOrEqual(t, through, 1, "an edge comes once")
			assert.InDelta(t, 0.3*float64(through), l.Angle, 1e-13)
			if through == 0 {
				assert.Less(t, l.Length, 1e-12)
			}
			assert.Equal(t, l.Frames[0], walked(t, l.Frames[0], l.Steps))
			assert.Len(t, l.Frames, len(l.Steps))
			assert.Len(t, slices.Compact(slices.Sorted(slices.Values(l.Frames))), len(l.Frames), "no frame twice")
			assert.True(t, l.Shifted)
		}
	}
}

// TestLoopTranslation: a shift of one edge is the length of the closure, and an
// edge without a known translation makes it unknown.
func TestLoopTranslation(t *testing.T) {
	world := poses(source(), 3)
	var g frame.Graph
	for k := range 3 {
		e := edge(world, k, k, (k+1)%3)
		if k == 1 {
			e.Pose.T = e.Pose.T.Add(rotor.Vec{X: 0.03, Y: 0.04})
		}
		g.Add(e)
	}
	loops := g.Loops()
	require.Len(t, loops, 1)
	assert.InDelta(t, 0.05, loops[0].Length, 1e-14)
	assert.InDelta(t, 0, loops[0].Angle, 1e-14)
	assert.True(t, loops[0].Shifted)

	e := edge(world, 7, 2, 2)
	e.Shifted = false
	g.Add(e)
	loops = g.Loops()
	require.Len(t, loops, 2)
	assert.False(t, loops[1].Shifted)
	assert.Equal(t, []string{"f2"}, loops[1].Frames)
}

// TestSignOfRotorDoesNotMatter: R and -R on an edge close alike.
func TestSignOfRotorDoesNotMatter(t *testing.T) {
	world := poses(source(), 3)
	var g frame.Graph
	for k := range 3 {
		e := edge(world, k, k, (k+1)%3)
		e.Pose.R = e.Pose.R.Neg()
		g.Add(e)
	}
	assert.Less(t, g.Loops()[0].Angle, 1e-14)
}

// TestLargeGraphs: a hundred thousand edges, in a ladder with a loop per rung,
// where simple cycles are beyond counting, and in a wheel, where every frame is
// two edges from every other.
func TestLargeGraphs(t *testing.T) {
	const n = 33_000
	for kind, add := range map[string]func(g *frame.Graph, k int){
		"ladder": func(g *frame.Graph, k int) {
			g.Add(frame.Edge{To: name(2 * k), From: name(2*k + 1), Pose: frame.Still})
			if k > 0 {
				g.Add(frame.Edge{To: name(2*k - 2), From: name(2 * k), Pose: frame.Still})
				g.Add(frame.Edge{To: name(2*k - 1), From: name(2*k + 1), Pose: frame.Still})
			}
		},
		"wheel": func(g *frame.Graph, k int) {
			g.Add(frame.Edge{To: "hub", From: name(k), Pose: frame.Still})
			if k > 0 {
				g.Add(frame.Edge{To: name(k - 1), From: name(k), Pose: frame.Still})
				g.Add(frame.Edge{To: name(k / 2), From: name(k), Pose: frame.Still})
			}
		},
	} {
		var g frame.Graph
		for k := range n {
			add(&g, k)
		}
		start := time.Now()
		loops := g.Loops()
		assert.Len(t, loops, len(g.Edges())-len(g.Frames())+1)
		for _, l := range loops {
			if len(l.Steps) > 4 {
				t.Fatalf("%s: a loop of %d edges", kind, len(l.Steps))
			}
		}
		t.Logf("%s: %d edges, %d loops in %v", kind, len(g.Edges()), len(loops), time.Since(start).Round(time.Millisecond))
		assert.Less(t, time.Since(start), 30*time.Second, "generous: about a second is measured")
	}
}

func TestSharedChildren(t *testing.T) {
	var g frame.Graph
	add := func(id int, parent, child string) {
		g.Add(frame.Edge{ID: id, To: parent, From: child, Pose: frame.Still})
	}
	add(1, "map", "base")
	add(2, "base", "camera")
	add(3, "base", "lidar")
	assert.Empty(t, g.SharedChildren())
	add(4, "map", "base") // twice the same parent is a duplicate, not a second parent
	assert.Empty(t, g.SharedChildren())
	add(5, "lidar", "camera")
	add(6, "odom", "base")
	add(7, "base", "base")
	shared := g.SharedChildren()
	require.Len(t, shared, 2)
	assert.Equal(t, []int{1, 4, 6, 7}, ids(shared[0]))
	assert.Equal(t, []int{2, 5}, ids(shared[1]))
}

func ids(edges []frame.Edge) (all []int) {
	for _, e := range edges {
		all = append(all, e.ID)
	}
	return all
}

func TestParentCycles(t *testing.T) {
	var g frame.Graph
	add := func(id int, parent, child string) {
		g.Add(frame.Edge{ID: id, To: parent, From: child, Pose: frame.Still})
	}
	add(1, "map", "base")
	add(2, "base", "camera")
	add(3, "map", "camera") // a loop, and two parents, but no cycle of parents
	assert.Empty(t, g.ParentCycles())
	add(4, "camera", "lens")
	add(5, "lens", "mount")
	add(6, "mount", "camera")
	add(7, "mount", "screw") // hangs from the cycle
	add(8, "self", "self")
	cycles := g.ParentCycles()
	require.Len(t, cycles, 2)
	assert.ElementsMatch(t, []int{4, 5, 6}, ids(cycles[0]))
	assert.Equal(t, []int{8}, ids(cycles[1]))
}

// TestParentCyclesOfRandomGraphs: chains are closed and share no frame, and without their
// frames no cycle is left; a graph without cycles has none.
func TestParentCyclesOfRandomGraphs(t *testing.T) {
	rng := source()
	for range 500 {
		n := 1 + rng.IntN(10)
		acyclic := rng.IntN(2) == 0
		var g frame.Graph
		for id := range rng.IntN(20) {
			a, b := rng.IntN(n), rng.IntN(n)
			if acyclic {
				if a == b {
					continue
				}
				a, b = min(a, b), max(a, b)
			}
			g.Add(frame.Edge{ID: id, To: name(a), From: name(b), Pose: frame.Still})
		}
		cycles := g.ParentCycles()
		if acyclic {
			assert.Empty(t, cycles)
		}
		met := map[string]bool{}
		for _, c := range cycles {
			for k, e := range c {
				assert.Equal(t, e.To, c[(k+1)%len(c)].From)
				assert.False(t, met[e.From])
				met[e.From] = true
			}
		}
		var rest frame.Graph
		for _, e := range g.Edges() {
			if !met[e.To] && !met[e.From] {
				rest.Add(e)
			}
		}
		assert.Empty(t, rest.ParentCycles())
	}
}

func TestNaNEdge(t *testing.T) {
	var g frame.Graph
	g.Add(frame.Edge{To: "a", From: "b", Pose: frame.Pose{R: rotor.Rotor{S: math.NaN()}}})
	g.Add(frame.Edge{To: "a", From: "b", Pose: frame.Still})
	require.Len(t, g.Loops(), 1)
	assert.True(t, math.IsNaN(g.Loops()[0].Angle))
}
