package rules

import (
	"math"
	"slices"
	"strings"

	"dextral/core/frame"
	"dextral/core/identify"
	"dextral/core/rotor"
)

// Move is a frame whose orientation in another one, the root of its part of the
// graph, is not what it was, since an edge between the two changed.
type Move struct {
	Root, Frame string
	Angle       float64  // rad
	UpTo        bool     // depending on how angles with a bare label are read
	Through     []*Value // the edges on the way that turned
}

// Lever is how far a point at a distance from the frame's origin moves, seen
// from the root, by the turn alone; in the unit of the distance.
func (m Move) Lever(distance float64) float64 { return 2 * distance * math.Sin(m.Angle/2) }

// LoopChange is a loop through a changed edge that closed and does not, or the
// other way round.
type LoopChange struct {
	Frames []string
	Was    float64 // rad: what it left open
	Is     float64
	Closes bool // now
}

// Downstream says which frames and loops of a graph moved between two versions of
// it. Frames are seen from the one frame of their part that is the source of no
// edge, or else from the first. Edges whose reading nobody states tell nothing.
func Downstream(before, after *Chain) (moves []Move, loops []LoopChange) {
	if before == nil || after == nil {
		return nil, nil
	}
	for _, part := range after.Graph.Parts() {
		root := after.root(part)
		for _, f := range part {
			if f == root {
				continue
			}
			if m, ok := move(before, after, root, f); ok {
				moves = append(moves, m)
			}
		}
	}
	return moves, loopChanges(before, after)
}

func (c *Chain) root(part []string) string {
	sources := map[string]bool{}
	for _, e := range c.Graph.Edges() {
		sources[e.From] = true
	}
	for _, f := range part {
		if !sources[f] {
			return f
		}
	}
	return part[0]
}

func move(before, after *Chain, root, f string) (Move, bool) {
	m := Move{Root: root, Frame: f}
	least := math.Inf(1)
	for k := range max(before.readings(), after.readings()) {
		was, slackWas, old, okWas := before.along(root, f, k)
		is, slackIs, now, okIs := after.along(root, f, k)
		angle := rotor.Angle(was, is)
		if !okWas || !okIs || angle <= slackWas+slackIs {
			return m, false // or not in every reading, which is no certain move
		}
		m.Angle, least = max(m.Angle, angle), min(least, angle)
		m.UpTo = m.Angle-least > slackWas+slackIs
		m.Through = changed(old, now)
	}
	return m, m.Angle > 0
}

// changed are the values of now that were not the same before.
func changed(old, now []*Value) []*Value {
	return slices.DeleteFunc(now, func(v *Value) bool {
		return slices.ContainsFunc(old, func(w *Value) bool { return w.Key == v.Key && sameText(w, v) })
	})
}

// readings is how many ways the most ambiguous edge can be read.
func (c *Chain) readings() int {
	n := 0
	for _, l := range c.Links {
		n = max(n, len(l.Value.stances()))
	}
	return n
}

// along is the rotation with v_to = R v_from in the k-th reading of every edge,
// how far the digits leave it open, and the values that it is made of. Edges with
// fewer readings keep their last one: teams read all their angles one way.
func (c *Chain) along(to, from string, k int) (r rotor.Rotor, slack float64, values []*Value, ok bool) {
	_, steps, ok := c.Graph.Path(to, from)
	r = rotor.One
	for _, s := range steps {
		v := c.Links[s.Edge.ID].Value
		readings := v.stances()
		if len(readings) == 0 {
			return r, 0, nil, false
		}
		q := readings[min(k, len(readings)-1)].Rotor
		if s.Reversed {
			q = q.Reverse()
		}
		r = q.Mul(r)
		slack += v.tolerance()
		values = append(values, v)
	}
	return r, slack, values, ok
}

func loopChanges(before, after *Chain) []LoopChange {
	was := map[string]Loop{}
	for _, l := range before.Loops() {
		was[loopName(l.Loop)] = l
	}
	var list []LoopChange
	for _, l := range after.Loops() {
		old, known := was[loopName(l.Loop)]
		if !known || !l.Decidable || !old.Decidable {
			continue
		}
		closes, closed := l.Result.Verdict == identify.Agree, old.Result.Verdict == identify.Agree
		if closes != closed {
			list = append(list, LoopChange{Frames: l.Frames, Was: old.Result.Angle, Is: l.Result.Angle, Closes: closes})
		}
	}
	return list
}

// loopName names a loop by its frames, whatever the first one.
func loopName(l frame.Loop) string {
	return strings.Join(slices.Sorted(slices.Values(l.Frames)), "\x00")
}
