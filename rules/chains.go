package rules

import (
	"slices"
	"strings"

	"dextral/core/convention"
	"dextral/core/frame"
	"dextral/core/identify"
	"dextral/core/rotor"
)

// Chain is the orientations of one file, or of one rig, as edges between named
// frames.
//
// Frames that a neighbouring key, a declaration or a format names are the same
// wherever they are named in the file. Names out of a key such as T_cam_imu, or
// out of a comment, hold within the mapping they stand in: the cam of cam0 is not
// the cam of cam1. In a rig, whose files are declared to share their frames, names
// in comments and labels are shared as well.
//
// What T_a_b means differs from team to team, but seldom within a file. All
// such edges of a chain are therefore read one way or all the other, whichever
// closes the loops that can tell.
type Chain struct {
	Graph frame.Graph
	Sense Sense // how keys such as T_a_b are read
	Rig   bool  // of several files
	Links []*Link
	loops []frame.Loop
}

// Sense is the meaning of T_a_b in a chain.
type Sense uint8

// The senses. NoSubscripts: no key of that kind; SenseOpen: nothing decides, and
// the first is assumed where it makes no difference.
const (
	NoSubscripts Sense = iota
	SenseOpen
	ToFrom // v_a = R v_b
	FromTo // v_b = R v_a
)

// String prints the sense as an equation.
func (s Sense) String() string {
	return [...]string{"no keys of the kind T_a_b", "T_a_b: direction cannot be decided", "T_a_b is v_a = R v_b", "T_a_b is v_b = R v_a"}[s]
}

// Link is one edge of a chain: a value and how its direction is known.
type Link struct {
	Value     *Value
	Direction convention.Direction // with the scoped names of its frames
	Subscript bool                 // out of a key such as T_a_b, in the order written
	Claim     Claim                // that states the direction; of no weight for a subscript
}

// NewChain joins the values of one file that state an orientation between two
// named frames. It is nil if there are fewer than two.
func NewChain(values []*Value) *Chain { return newChain(values, false) }

// NewRig is NewChain for the values of all files of a rig.
func NewRig(values []*Value) *Chain { return newChain(values, true) }

func newChain(values []*Value, rig bool) *Chain {
	c := &Chain{Rig: rig}
	for _, v := range values {
		if l := newLink(v, rig); l != nil {
			c.Links = append(c.Links, l)
		}
	}
	if len(c.Links) < 2 {
		return nil
	}
	c.settle()
	return c
}

func newLink(v *Value, rig bool) *Link {
	if !v.Decided() || !v.orients() || !finite(v) || v.zero() || v.Moment != "" {
		return nil
	}
	if m, ok := v.rotationPart(); ok && m.Det() <= 0 {
		return nil // a mirror is reported by itself
	}
	if c, ok := v.Claims.On(convention.OfDirection); ok {
		d := v.Claims.Direction()
		if !d.Stated() {
			return nil
		}
		if c.Source != Sibling && c.Source < Declaration && !(rig && c.Source.Stated()) {
			d = convention.Direction{To: v.scoped(d.To), From: v.scoped(d.From)}
		}
		return &Link{Value: v, Direction: d, Claim: c}
	}
	if v.Subscript[0] == "" || v.Subscript[0] == v.Subscript[1] {
		return nil
	}
	return &Link{Value: v, Direction: convention.Direction{To: v.scoped(v.Subscript[0]), From: v.scoped(v.Subscript[1])}, Subscript: true}
}

func (v *Value) zero() bool {
	for _, n := range v.Numbers {
		if n.Value != 0 {
			return false
		}
	}
	return v.Form != convention.Angles && v.Form != convention.RotationVector
}

// scoped is a frame's name within the mapping of the value.
func (v *Value) scoped(name string) string {
	if at := strings.LastIndexByte(v.Key, '.'); at >= 0 {
		return v.Key[:at] + "." + name
	}
	return name
}

// settle decides the sense of subscripts by the loops that they close.
func (c *Chain) settle() {
	if !slices.ContainsFunc(c.Links, func(l *Link) bool { return l.Subscript }) {
		c.build(ToFrom)
		c.Sense = NoSubscripts
		return
	}
	c.build(FromTo)
	back, backLoops := c.open(), len(c.loops)
	c.build(ToFrom)
	forth := c.open()
	switch {
	case backLoops == 0 || forth == back:
		c.Sense = SenseOpen
	case forth < back:
		c.Sense = ToFrom
	default:
		c.build(FromTo)
		c.Sense = FromTo
	}
}

// build makes the graph with subscripts read in one sense.
func (c *Chain) build(s Sense) {
	c.Graph = frame.Graph{}
	c.Sense = s
	for i, l := range c.Links {
		d := c.direction(l)
		c.Graph.Add(frame.Edge{ID: i, To: d.To, From: d.From})
	}
	c.loops = c.Graph.Loops()
}

// direction of a link in the sense of the chain.
func (c *Chain) direction(l *Link) convention.Direction {
	if l.Subscript && c.Sense == FromTo {
		return l.Direction.Reverse()
	}
	return l.Direction
}

// open counts the loops that do not close to their digits.
func (c *Chain) open() int {
	n := 0
	for _, l := range c.loops {
		if identify.Loop(c.edges(l)).Verdict != identify.Agree {
			n++
		}
	}
	return n
}

// edges hands a loop to package identify, which composes R1 R2 ... Rn, each
// applied to the result of the next: the steps from last to first.
func (c *Chain) edges(l frame.Loop) []identify.Edge {
	var edges []identify.Edge
	for _, step := range slices.Backward(l.Steps) {
		v := c.Links[step.Edge.ID].Value
		e := identify.Edge{Statement: v.statement(), Backward: step.Reversed}
		e.Claim.Direction = convention.Direction{}
		if t, slack, ok := v.translation(); ok {
			e.T, e.Slack = &t, slack
		}
		edges = append(edges, e)
	}
	return edges
}

// translation is that of a rigid transform, and how far its digits, or a declaration,
// leave it open as a length.
func (v *Value) translation() (t rotor.Vec, slack float64, ok bool) {
	if v.Form != convention.Transform {
		return t, 0, false
	}
	var three []Number
	for i := range 3 {
		three = append(three, v.Numbers[v.entry(i, 3)])
	}
	t = rotor.Vec{X: three[0].Value, Y: three[1].Value, Z: three[2].Value}
	if v.Offset > 0 {
		return t, v.Offset, true
	}
	return t, precisionOf(three).Norm(3, t.Norm()), true
}
