package identify

import (
	"fmt"
	"math"
	"slices"

	"dextral/core/convention"
	"dextral/core/rotor"
)

// Edge is one orientation of a chain, with its translation if it has one: the
// coordinate map v -> R v + T.
type Edge struct {
	Statement
	T        *rotor.Vec
	Slack    float64 // how far the digits leave T open, in its unit
	Backward bool    // the chain walks the edge from its result to its argument
}

// Repair is one change of one edge that closes a loop.
type Repair struct {
	Edge    int // index of the edge
	How     Hypothesis
	Changes []Change
	Cost    int
	Angle   float64 // rad: what remains open
	Gap     float64 // what remains open, in the unit of the translations; 0 without
	moved   float64 // length of the translation, if the repair changes it
}

// String says what is changed.
func (r Repair) String() string { return fmt.Sprintf("edge %d %s", r.Edge+1, r.Words()) }

// Words says what is changed, without naming the edge.
func (r Repair) Words() string {
	if slices.Contains(r.Changes, Transposed) {
		return "with its rotation transposed and its translation kept"
	}
	if r.How.inverse && len(r.Changes) == 1 {
		return "reversed"
	}
	return r.How.String()
}

// LoopResult says whether a loop closes.
type LoopResult struct {
	Verdict Verdict  // Agree, Contradicted, Unexplained or Undecided
	Angle   float64  // rad: what the loop leaves open as stated
	Open    float64  // rad: what the digits of all edges leave open
	Gap     float64  // what the translations leave open; 0 if an edge has none
	OpenGap float64  // what their digits leave open
	Repairs []Repair // the cheapest that close it at least ten times better; several of one cost are a tie, and Unexplained ones may be accidents
	Reason  string
}

// Decided reports whether a single repair is known.
func (r LoopResult) Decided() bool { return r.Verdict == Contradicted && len(r.Repairs) == 1 }

// better is how many times better a single change must close a loop before
// the loop is called contradicted: calibrations that are no better than they are do
// not close to their digits, but no honest one is ten times worse than its noise.
const better = 10

// Loop composes the edges in order, each applied to the result of the one
// after it, R1 R2 ... Rn, and tells whether they come back to where they began.
//
// If they do not, every edge in turn is compared with what the others want it
// to be. Translations are evidence of their own: an inverse takes T to -R~ T, a
// transpose leaves it.
func Loop(edges []Edge) LoopResult {
	l, why := newLoop(edges)
	if why != "" {
		return LoopResult{Reason: why}
	}
	r := LoopResult{Open: l.open, OpenGap: l.openGap}
	r.Angle, r.Gap = l.closure(l.steps)
	if r.Angle <= r.Open && r.Gap <= r.OpenGap {
		r.Verdict = Agree
		return r
	}
	l.repair(&r)
	return r
}

// Compose tells whether parts, composed in order, give the whole.
func Compose(parts []Edge, whole Edge) LoopResult {
	whole.Backward = !whole.Backward
	return Loop(append(slices.Clone(parts), whole))
}

// InversePair tells whether a and b undo each other.
func InversePair(a, b Edge) LoopResult { return Loop([]Edge{a, b}) }

// step is an edge as it is walked.
type step struct {
	r rotor.Rotor
	t rotor.Vec
}

func (s step) after(u step) step { return step{s.r.Mul(u.r), s.r.Rotate(u.t).Add(s.t)} }

func (s step) reverse() step {
	back := s.r.Reverse()
	return step{back, back.Rotate(s.t).Neg()}
}

type loop struct {
	edges         []Edge
	sides         []*side
	steps         []step
	moving        bool // all edges have translations
	open, openGap float64
	tried         int
}

// maxReadings bounds the combinations of unstated choices that are tried.
const maxReadings = 4096

func newLoop(edges []Edge) (*loop, string) {
	if len(edges) < 2 {
		return nil, "a loop needs two edges"
	}
	l := &loop{edges: edges, moving: true}
	combinations := 1
	for i, e := range edges {
		d := new(side)
		if why := d.read(e.Statement); why != "" {
			return nil, fmt.Sprintf("edge %d cannot be read: %s", i+1, why)
		}
		if len(d.at(0)) == 0 {
			return nil, fmt.Sprintf("edge %d is a mirror, not a rotation", i+1)
		}
		if combinations *= len(d.at(0)); combinations > maxReadings {
			return nil, "too many choices are unstated"
		}
		l.sides = append(l.sides, d)
		l.moving = l.moving && e.T != nil && e.T.Finite()
	}
	length := 0.0
	for i, e := range edges {
		l.open += l.sides[i].at(0)[0].tol + arithmetic
		if l.moving {
			l.openGap += e.Slack
			length += e.T.Norm()
		}
	}
	l.openGap += l.open * length // a rotation that is off moves all that comes after it
	l.settle()
	return l, ""
}

// settle chooses, where claims leave choices, those that close the loop best.
func (l *loop) settle() {
	best := math.Inf(1)
	choice := make([]int, len(l.edges))
	for {
		steps := make([]step, len(l.edges))
		for i, d := range l.sides {
			steps[i] = l.walk(i, d.at(0)[choice[i]].rotor, l.translation(i))
		}
		if angle, _ := l.closure(steps); angle < best {
			best, l.steps = angle, steps
		}
		i := 0
		for ; i < len(choice); i++ {
			if choice[i]++; choice[i] < len(l.sides[i].at(0)) {
				break
			}
			choice[i] = 0
		}
		if i == len(choice) {
			return
		}
	}
}

func (l *loop) translation(i int) rotor.Vec {
	if !l.moving {
		return rotor.Vec{}
	}
	return *l.edges[i].T
}

// walk is edge i with the given rotation, in the direction of the chain.
func (l *loop) walk(i int, r rotor.Rotor, t rotor.Vec) step {
	s := step{r, t}
	if l.edges[i].Backward {
		return s.reverse()
	}
	return s
}

// closure is what a loop leaves open.
func (l *loop) closure(steps []step) (angle, gap float64) {
	all := step{r: rotor.One}
	for _, s := range steps {
		all = all.after(s)
	}
	return all.r.TurnAngle(), all.t.Norm()
}

// wanted is the step that would close the loop in place of step i: the
// reverse of what comes after it and before it.
func (l *loop) wanted(i int) step {
	rest := step{r: rotor.One}
	for k := 1; k < len(l.steps); k++ {
		rest = rest.after(l.steps[(i+k)%len(l.steps)])
	}
	return rest.reverse()
}

// repair looks for the cheapest changes of single edges that close the loop
// and are no accident. Of several that close it at one cost, those count that do it as
// well as the best: within the margin of it or of the digits.
func (l *loop) repair(r *LoopResult) {
	limit := math.Max(r.Open, r.Angle/better)
	gap := math.Max(r.OpenGap, r.Gap/better)
	r.Verdict, r.Reason = Unexplained, "no single change of one edge closes the loop ten times better"
	for c := 1; c <= maxWide; c++ {
		var repairs []Repair
		for i := range l.edges {
			repairs = append(repairs, l.edgeRepairs(i, c, limit, gap)...)
		}
		sound := slices.DeleteFunc(slices.Clone(repairs), func(f Repair) bool { return !l.sound(f, r) })
		if len(sound) > 0 {
			r.Verdict, r.Reason, r.Repairs = Contradicted, "", bestOf(sound, r)
			return
		}
		if len(repairs) > 0 && r.Repairs == nil {
			r.Repairs, r.Reason = bestOf(repairs, r), "a change closes the loop, but so many were tried that it could be an accident"
		}
	}
}

// bestOf keeps the repairs that close as well as the best.
func bestOf(repairs []Repair, r *LoopResult) []Repair {
	angle, gap := math.Inf(1), math.Inf(1)
	for _, f := range repairs {
		angle, gap = min(angle, max(f.Angle, r.Open)), min(gap, max(f.Gap, r.OpenGap))
	}
	return slices.DeleteFunc(repairs, func(f Repair) bool { return f.Angle > margin*angle || f.Gap > margin*gap })
}

// edgeRepairs compares edge i with what the others want, at one cost.
func (l *loop) edgeRepairs(i, cost int, limit, gap float64) []Repair {
	wanted := l.wanted(i)
	if l.edges[i].Backward {
		wanted = wanted.reverse()
	}
	target := Statement{Form: convention.Quaternion, Tolerance: limit, Claim: Claim{Scalar: convention.ScalarFirst}}
	w, x, y, z := wanted.r.Quaternion()
	target.Numbers = []float64{w, x, y, z}
	s := &search{inverse: Inverse.Cost(), forward: candidate{residual: math.Inf(1)}, reach: math.Pi}
	_ = s.a.read(l.edges[i].Statement) // has been read before
	_ = s.b.read(target)
	s.b.readings, s.b.powers = s.b.readings[:1], false // the target is no statement: nothing about it is in doubt
	s.b.sort()
	s.level(cost)
	l.tried += s.tried
	var found []Repair
	var seen []alias
	for _, c := range s.found {
		if c.residual > limit || slices.Contains(seen, c.key) {
			continue
		}
		seen = append(seen, c.key)
		for _, r := range l.withTranslation(i, c) {
			if r.Angle <= limit && r.Gap <= gap {
				found = append(found, r)
			}
		}
	}
	return found
}

// withTranslation turns a reading of the rotation of edge i into repairs of
// the edge, by what it may do to the translation: a reversed edge is an inverse or a
// transpose, and where the axes of the result are mapped T may be meant in either.
func (l *loop) withTranslation(i int, c candidate) []Repair {
	r := Repair{Edge: i, How: c.Hypothesis, Changes: c.Changes(), Cost: c.cost}
	meant, t := c.meant(), l.translation(i)
	steps := slices.Clone(l.steps)
	with := func(to rotor.Vec, changes []Change) Repair {
		steps[i] = l.walk(i, meant, to)
		out := r
		out.Changes = changes
		if to != t {
			out.moved = t.Norm()
		}
		out.Angle, out.Gap = l.closure(steps)
		return out
	}
	repairs := []Repair{with(t, r.Changes)}
	switch {
	case !l.moving:
	case c.inverse:
		kept := slices.Clone(r.Changes)
		kept[slices.Index(kept, Inverse)] = Transposed
		repairs = []Repair{with(meant.Rotate(t).Neg(), r.Changes), with(t, kept)}
	case c.left != 0:
		repairs = append(repairs, with(cubes[inverses[c.left]].Rotate(t), r.Changes))
	}
	return repairs
}

// meant is the rotation that b must be if the hypothesis holds for a.
func (c candidate) meant() rotor.Rotor {
	r := c.at
	if c.power == 1 {
		r = r.Mul(r)
	}
	r = cubes[inverses[c.left]].Mul(r).Mul(cubes[inverses[c.right]])
	if c.power == 2 {
		r = rotor.Exp(r.Log().Scale(0.5))
	}
	if c.inverse {
		r = r.Reverse()
	}
	return r
}

// sound reports whether a repair is no accident. The gap follows the angle as
// long as the translation of the edge is what it was; it is evidence of its own only
// where the repair moves it, which keeps its length: then it ends on a sphere,
// near the right point by accident with a chance of (gap/length)^2 at most.
func (l *loop) sound(f Repair, r *LoopResult) bool {
	p := 1.0
	if r.Angle > r.Open {
		p = rotorWidths(l.wanted(f.Edge).r).chance(math.Max(f.Angle, r.Open))
	}
	if f.moved > 0 && r.Gap > r.OpenGap {
		p *= math.Pow(math.Min(1, math.Max(f.Gap, r.OpenGap)/f.moved), 2)
	}
	return p*float64(l.tried) <= accidents
}
