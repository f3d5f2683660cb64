package rules

import (
	"fmt"
	"slices"
	"strings"

	"dextral/core/convention"
	"dextral/core/frame"
	"dextral/core/identify"
)

// CheckChain judges the loops of a chain, and its frames as a tree of parents
// and children where they are named so.
func CheckChain(c *Chain) []*Finding {
	if c == nil {
		return nil
	}
	var found []*Finding
	for _, l := range c.Loops() {
		if l.Decidable {
			found = add(found, c.openLoop(l))
		} else {
			found = add(found, c.openEitherWay(l))
		}
	}
	return found
}

// Loop is one independent loop of a chain, with what identify says about it.
type Loop struct {
	frame.Loop
	Result identify.LoopResult
	// Decidable: the result does not hang on the meaning of keys such as
	// T_a_b, or that meaning is known. Where it does, Result is that of ToFrom and
	// Turned that of FromTo.
	Decidable bool
	Turned    identify.LoopResult
}

// Loops are the independent loops of the chain that are not settled elsewhere:
// two values of one orientation with equal Of are twins, which are compared as
// such, and the loops of a rig within one file belong to the chain of that file.
func (c *Chain) Loops() []Loop {
	var loops []Loop
	for _, l := range c.loops {
		if c.twins(l) || c.Rig && c.oneFile(l) {
			continue
		}
		loop := Loop{Loop: l, Result: identify.Loop(c.edges(l)), Decidable: c.decidable(l)}
		if !loop.Decidable {
			loop.Turned = identify.Loop(c.turned(l))
		}
		loops = append(loops, loop)
	}
	return loops
}

func (c *Chain) twins(l frame.Loop) bool {
	if len(l.Steps) != 2 {
		return false
	}
	a, b := c.link(l.Steps[0]).Value, c.link(l.Steps[1]).Value
	return a.Of != "" && a.Of == b.Of && a.Place.Path == b.Place.Path
}

func (c *Chain) oneFile(l frame.Loop) bool {
	path := c.link(l.Steps[0]).Value.Place.Path
	return !slices.ContainsFunc(l.Steps, func(s frame.Step) bool { return c.link(s).Value.Place.Path != path })
}

func (c *Chain) link(s frame.Step) *Link { return c.Links[s.Edge.ID] }

// decidable reports whether the loop closes alike in both senses of subscripts,
// or the sense is known: without subscripts, or with two of them, which are
// then both turned about.
func (c *Chain) decidable(l frame.Loop) bool {
	if c.Sense != SenseOpen {
		return true
	}
	n := 0
	for _, s := range l.Steps {
		if c.link(s).Subscript {
			n++
		}
	}
	return n == 0 || n == 2 && len(l.Steps) == 2
}

// openLoop reports a loop that does not close (ruling of the design: an error
// or warning if one discrete change of one edge closes it ten times better, or if
// a declared uncertainty is exceeded; else a note).
func (c *Chain) openLoop(l Loop) *Finding {
	r := l.Result
	if r.Verdict == identify.Agree || r.Verdict == identify.Undecided {
		return nil
	}
	// identify counts the edges from the last step to the first.
	steps := slices.Clone(l.Steps)
	slices.Reverse(steps)
	at := len(steps) - 1
	if len(r.Repairs) == 1 {
		at = r.Repairs[0].Edge
	}
	v := c.link(steps[at]).Value
	f := &Finding{Rule: c.ruleOfLoop(l.Loop), Level: c.levelOfLoop(l), Place: v.Place, Key: v.Key, Claim: "closes: " + claimText(l.Frames)}
	head := c.headline(l.Frames, steps)
	f.Message = fmt.Sprintf("%s: %s; the rotation is off by %s", head, c.verdictText(steps, r), degrees(r.Angle))
	if r.Angle <= r.Open && r.Gap > 0 {
		f.Message = fmt.Sprintf("%s: %s", head, c.gapText(steps, r))
		if c.keptTranslation(steps) {
			f.Level = max(f.Level, Warning)
			f.Remedy = "the inverse of (R, t) is (R~, -R~ t): invert the translation with the rotation"
		}
	}
	if r.Angle > r.Open {
		f.Turn = turnAround(l.Closure.R, r.Angle)
	}
	f.Evidence = []Evidence{
		{What: "rotation around the loop", Stated: Degrees(0), Computed: Degrees(r.Angle), Residual: Degrees(r.Angle)},
		{What: "what the digits leave open", Computed: Degrees(r.Open)},
	}
	if r.Gap > 0 {
		f.Evidence = append(f.Evidence, Evidence{What: "translation around the loop", Stated: Plain(0), Computed: Plain(r.Gap), Residual: Plain(r.Gap)})
	}
	for _, repair := range r.Repairs {
		f.Evidence = append(f.Evidence, Evidence{What: "with " + c.link(steps[repair.Edge]).Value.name() + " " + repair.Words(), Residual: Degrees(repair.Angle)})
	}
	for i, s := range steps {
		if i != at {
			f.Related = append(f.Related, Related{c.link(s).Value.Place, c.link(s).Value.name() + ": " + c.direction(c.link(s)).String()})
		}
	}
	if named, beside := opticalFrame(l.Frames); named != "" && optical(f.Message) {
		f.Remedy = fmt.Sprintf("%s is named optical: by custom its axes point right, down, forward, those of %s forward, left, up; see which value leaves out the turn between them", named, beside)
	}
	if c.Sense == ToFrom || c.Sense == FromTo {
		f.Evidence = append(f.Evidence, Evidence{What: "keys of the kind T_a_b", Computed: Words(c.Sense.String() + ", by the loops that close")})
	}
	return f
}

func (c *Chain) ruleOfLoop(l frame.Loop) string {
	if len(l.Steps) != 2 {
		return LoopOpen
	}
	if l.Steps[0].Reversed != l.Steps[1].Reversed {
		return StatedTwice
	}
	return InversePairBroken
}

func (c *Chain) levelOfLoop(l Loop) Level {
	stated, declared, uncertainty, offsets := true, true, 0.0, true
	for _, s := range l.Steps {
		link := c.link(s)
		stated = stated && !link.Subscript && link.Claim.Source.Stated()
		declared = declared && link.Value.Uncertainty > 0
		uncertainty += link.Value.Uncertainty
		offsets = offsets && link.Value.Offset > 0
	}
	switch {
	case declared && l.Result.Angle > uncertainty, offsets && l.Result.Gap > l.Result.OpenGap:
		return Error
	case l.Result.Verdict != identify.Contradicted:
		return Note
	case stated:
		return Error
	}
	return Warning
}

// headline says which values ought to agree.
func (c *Chain) headline(frames []string, steps []frame.Step) string {
	a := c.link(steps[0]).Value.name()
	if len(steps) != 2 {
		return fmt.Sprintf("the loop of frames %s, %s does not close", strings.Join(frames, ", "), frames[0])
	}
	b := c.link(steps[1]).Value.name()
	if steps[0].Reversed != steps[1].Reversed {
		return fmt.Sprintf("%s and %s state the same orientation with different values", a, b)
	}
	return fmt.Sprintf("%s and %s ought to be the inverse of each other", a, b)
}

// claimText names a loop by its frames, wherever a walk around it began.
func claimText(frames []string) string {
	return "the loop of frames " + strings.Join(slices.Sorted(slices.Values(frames)), ", ")
}

func (c *Chain) verdictText(steps []frame.Step, r identify.LoopResult) string {
	switch {
	case r.Verdict != identify.Contradicted:
		return "no single change of convention explains it"
	case len(r.Repairs) == 1:
		repair := r.Repairs[0]
		return fmt.Sprintf("with %s %s it closes to %s", c.link(steps[repair.Edge]).Value.name(), withMapNames(repair.Words()), degrees(repair.Angle))
	}
	var texts []string
	for _, repair := range r.Repairs {
		texts = append(texts, c.link(steps[repair.Edge]).Value.name()+" "+withMapNames(repair.Words()))
	}
	return fmt.Sprintf("it closes with %s", strings.Join(texts, ", or with "))
}

// gapText describes a loop whose rotations close and whose translations do not.
func (c *Chain) gapText(steps []frame.Step, r identify.LoopResult) string {
	text := fmt.Sprintf("the rotations close, but the translations miss by %s (in the unit of the file)", digits(r.Gap))
	if c.keptTranslation(steps) {
		text += ": the rotation was inverted and the translation kept, or only negated"
	}
	return text
}

// keptTranslation reports whether two transforms that ought to be the inverse of
// each other have the same translation, or opposite ones, to their digits.
func (c *Chain) keptTranslation(steps []frame.Step) bool {
	if len(steps) != 2 || steps[0].Reversed != steps[1].Reversed {
		return false
	}
	a, slackA, okA := c.link(steps[0]).Value.translation()
	b, slackB, okB := c.link(steps[1]).Value.translation()
	return okA && okB && min(a.Sub(b).Norm(), a.Add(b).Norm()) <= slackA+slackB
}

// CheckParents judges the frames that neighbouring keys name parent and child. Of a rig
// it reports what no file shows by itself.
func CheckParents(c *Chain) []*Finding {
	if c == nil {
		return nil
	}
	var g frame.Graph
	for i, l := range c.Links {
		if !l.Subscript && l.Claim.Source == Sibling && namesParent(l.Claim.Text) {
			g.Add(frame.Edge{ID: i, To: l.Direction.To, From: l.Direction.From})
		}
	}
	var found []*Finding
	for _, cycle := range g.ParentCycles() {
		if c.Rig && c.samePath(cycle) {
			continue
		}
		found = append(found, c.tree(ParentCycle, cycle, fmt.Sprintf("frame %s is its own ancestor", cycle[0].From)))
	}
	for _, shared := range g.SharedChildren() {
		if c.Rig && c.samePath(shared) {
			continue
		}
		var parents []string
		for _, e := range shared {
			if !slices.Contains(parents, e.To) {
				parents = append(parents, e.To)
			}
		}
		found = append(found, c.tree(ChildOfTwo, shared, fmt.Sprintf("frame %s has %d parents: %s", shared[0].From, len(parents), strings.Join(parents, ", "))))
	}
	return found
}

// samePath reports whether edges are of one file.
func (c *Chain) samePath(edges []frame.Edge) bool {
	return !slices.ContainsFunc(edges, func(e frame.Edge) bool {
		return c.Links[e.ID].Value.Place.Path != c.Links[edges[0].ID].Value.Place.Path
	})
}

// namesParent reports whether the keys that give a direction speak of a tree.
func namesParent(keys string) bool {
	return strings.Contains(keys, "parent") || strings.Contains(keys, "child")
}

// tree reports edges that keep parents and children from being a tree.
func (c *Chain) tree(rule string, edges []frame.Edge, message string) *Finding {
	last := c.Links[edges[len(edges)-1].ID].Value
	f := &Finding{Rule: rule, Level: Warning, Place: last.Place, Key: last.Key, Claim: "parents and children form a tree",
		Message: message + "; a transform tree has no unique way through it, and what a look-up returns depends on the order in which edges are met"}
	for _, e := range edges {
		link := c.Links[e.ID]
		f.Evidence = append(f.Evidence, Evidence{What: link.Value.name(), Stated: Words(convention.Direction{To: e.To, From: e.From}.String())})
		if link.Value != last {
			f.Related = append(f.Related, Related{link.Value.Place, fmt.Sprintf("%s is the parent of %s here", e.To, e.From)})
		}
	}
	return f
}
