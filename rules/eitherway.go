package rules

import (
	"fmt"
	"slices"
	"strings"

	"dextral/core/frame"
	"dextral/core/identify"
)

// turned is edges with the keys such as T_a_b read in the other sense.
func (c *Chain) turned(l frame.Loop) []identify.Edge {
	edges := c.edges(l)
	for i, step := range l.Steps {
		if c.link(step).Subscript {
			e := &edges[len(edges)-1-i]
			e.Backward = !e.Backward
		}
	}
	return edges
}

// OpenEitherWay reports whether a loop that hangs on the meaning of keys such as T_a_b
// closes in neither.
func (l Loop) OpenEitherWay() bool {
	return !l.Decidable && isOpen(l.Result) && isOpen(l.Turned)
}

func isOpen(r identify.LoopResult) bool {
	return r.Verdict == identify.Contradicted || r.Verdict == identify.Unexplained
}

// openEitherWay reports a loop that does not close, whatever keys such as T_a_b mean: a
// warning if a single change closes it in one of the meanings, else a note. Which
// of the keys is wrong stays open where both meanings have an explanation.
func (c *Chain) openEitherWay(l Loop) *Finding {
	if !l.OpenEitherWay() {
		return nil
	}
	steps := slices.Clone(l.Steps)
	slices.Reverse(steps) // as identify counts the edges
	v := c.link(steps[len(steps)-1]).Value
	f := &Finding{Rule: LoopOpen, Level: Note, Claim: "closes: " + claimText(l.Frames)}
	f.Message = fmt.Sprintf("%s, whatever keys such as T_a_b mean: read as v_a = R v_b %s, read as v_b = R v_a %s",
		c.headline(l.Frames, steps), missText(l.Result), missText(l.Turned))
	var closes []string
	for i, r := range []identify.LoopResult{l.Result, l.Turned} {
		sense := [...]string{"v_a = R v_b", "v_b = R v_a"}[i]
		f.Evidence = append(f.Evidence, Evidence{What: "rotation around the loop, with " + sense, Stated: Degrees(0), Computed: Degrees(r.Angle), Residual: Degrees(r.Angle)})
		if r.Gap > 0 {
			f.Evidence = append(f.Evidence, Evidence{What: "translation around the loop, with " + sense, Stated: Plain(0), Computed: Plain(r.Gap), Residual: Plain(r.Gap)})
		}
		for _, repair := range r.Repairs {
			edge := c.link(steps[repair.Edge]).Value
			how := fmt.Sprintf("with %s and %s %s", sense, edge.name(), withMapNames(repair.Words()))
			f.Evidence = append(f.Evidence, Evidence{What: how, Residual: Degrees(repair.Angle)})
			if r.Verdict != identify.Contradicted {
				continue // numbers this special fit by accident too
			}
			if f.Level = Warning; len(closes) == 0 {
				v = edge
			}
			closes = append(closes, how)
		}
	}
	switch len(closes) {
	case 0:
		f.Message += "; no single change of convention explains it"
	case 1:
		f.Message += "; it closes " + closes[0]
	default:
		f.Message += "; which key is wrong cannot be decided: it closes " + strings.Join(closes, ", or ")
	}
	f.Remedy = "say in dextral.toml what the keys mean: a [[claim]] with a direction"
	f.Place, f.Key = v.Place, v.Key
	for _, s := range steps {
		if other := c.link(s).Value; other != v {
			f.Related = append(f.Related, Related{other.Place, other.name()})
		}
	}
	return f
}

// missText says by what a loop misses.
func missText(r identify.LoopResult) string {
	if r.Angle <= r.Open && r.Gap > 0 {
		return "the translations miss by " + digits(r.Gap) + " (in the unit of the file)"
	}
	return "the rotation is off by " + degrees(r.Angle)
}
