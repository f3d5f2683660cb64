package identify

import (
	"fmt"
	"math"
	"slices"
	"strings"
)

// Class is a set of hypotheses that the numbers cannot tell apart.
type Class struct {
	Readings []Hypothesis // cheapest first
	Changes  []Change     // of the cheapest
	Cost     int
	Residual float64 // rad
	Tie      bool    // different relations of one cost fit alike: no remedy can be named
}

// result sorts what was found into classes around the best candidate.
func (s *search) result(v Verdict, best candidate, e evidence) Result {
	r := Result{Verdict: v, Margin: math.Inf(1)}
	r.Best = s.class(best)
	r.Stated = r.Best
	if v != Agree {
		r.Stated = s.stated()
	}
	if v == Unexplained {
		r.Best = r.Stated
	}
	if v == Agree || v == AgreeInverse || v == Contradicted {
		r.Classes = append(r.Classes, r.Best)
	}
	for _, c := range s.others(best, v) {
		class := Class{[]Hypothesis{c.Hypothesis}, c.Changes(), c.cost, c.residual, false}
		r.Classes = append(r.Classes, class)
		if r.Next.Readings == nil && (c.cost <= max(best.cost, 1)) {
			r.Next, r.Margin = class, c.residual/best.open
		}
	}
	r.Decided = !r.Best.Tie && v != Unexplained && e.enough(best.cost) && !s.rivalled(best)
	return r
}

// rivalled reports whether a dearer reading fits nearly as well and is another
// rotation. Readings that are the same rotation, as the reverse of a turn
// about z and the turn with its axes mapped are, have the same residual to
// rounding; of these the cheapest is the one to report.
func (s *search) rivalled(best candidate) bool {
	return slices.ContainsFunc(s.found, func(c candidate) bool {
		return c.cost > best.cost && c.key != best.key && math.Abs(c.residual-best.residual) > arithmetic
	})
}

// class gathers what fits as cheaply as best does or shares its alias. All
// candidates of its cost or less that are within the margin belong to it, being rivals
// that the numbers do not exclude.
func (s *search) class(best candidate) Class {
	class := Class{Cost: best.cost, Residual: best.residual, Changes: best.Changes()}
	if best.at.Norm() > 0 {
		class.Readings = []Hypothesis{best.Hypothesis}
	}
	for _, c := range s.found {
		if c.Hypothesis == best.Hypothesis || c.cost > best.cost && c.key != best.key {
			continue
		}
		class.Tie = class.Tie || c.cost <= best.cost && c.key != best.key
		if len(class.Readings) < maxListed {
			class.Readings = append(class.Readings, c.Hypothesis)
		}
	}
	slices.SortStableFunc(class.Readings, func(x, y Hypothesis) int { return x.cost - y.cost })
	return class
}

// stated is the nearest reading of the claims as one rotation.
func (s *search) stated() Class {
	if math.IsInf(s.forward.residual, 1) { // a rotation and a mirror have none
		return Class{Residual: math.Pi}
	}
	return Class{Readings: []Hypothesis{s.forward.Hypothesis}, Residual: s.forward.residual}
}

// others are the candidates outside of the class of best: those that fit at
// a higher cost, and the nearest of the rest, one of each alias.
func (s *search) others(best candidate, v Verdict) []candidate {
	var list []candidate
	seen := []alias{best.key}
	if v == Unexplained {
		seen = nil
	}
	for _, c := range append(slices.Clone(s.found), s.nearest...) {
		if c.cost <= best.cost && c.near() && v != Unexplained || slices.Contains(seen, c.key) {
			continue
		}
		seen = append(seen, c.key)
		if list = append(list, c); len(list) == maxNearest {
			break
		}
	}
	return list
}

// String says what has to be so for the two statements to agree.
func (c Class) String() string {
	if len(c.Readings) == 0 {
		return "no rotation"
	}
	if !c.Tie {
		return c.Readings[0].String()
	}
	var texts []string
	for _, h := range c.Readings {
		if h.cost <= c.Cost && len(texts) < maxTied && !slices.Contains(texts, h.String()) {
			texts = append(texts, h.String())
		}
	}
	return strings.Join(texts, "; or ")
}

// maxTied bounds the readings of a tie that are spelled out, maxListed those
// that are listed: an orientation with coarse numbers fits thousands.
const (
	maxTied   = 6
	maxListed = 48
)

// String says what has to be so: "with the quaternion's scalar last (x y z
// w)". Where nothing is changed it says how both are read.
func (h Hypothesis) String() string {
	first, second := "the", "the"
	if h.A.Form == h.B.Form {
		first, second = "the first", "the second"
	}
	var parts []string
	if h.changes == 0 || h.changesA&^set(Mirror) != 0 {
		parts = append(parts, h.A.words(first))
	}
	if h.changes == 0 || h.changesB&^set(Mirror) != 0 {
		parts = append(parts, h.B.words(second))
	}
	return "with " + strings.Join(append(parts, h.relations()...), ", ")
}

// relations words what stands between the two rotations.
func (h Hypothesis) relations() []string {
	var words []string
	if h.inverse && h.changes.has(Inverse) {
		words = append(words, "one the reverse of the other (a conjugate, a transpose or the opposite direction)")
	} else if h.inverse {
		words = append(words, "one the reverse of the other")
	}
	switch h.power {
	case 1:
		words = append(words, "twice the turn of the first")
	case 2:
		words = append(words, "twice the turn of the second")
	}
	if h.A.Mirrored != h.B.Mirrored {
		words = append(words, h.mirror())
	} else if h.left != 0 && h.right == inverses[h.left] {
		words = append(words, fmt.Sprintf("the axes of both frames mapped %s", h.left))
	} else {
		if h.left != 0 {
			words = append(words, fmt.Sprintf("the axes of the result mapped %s", h.left))
		}
		if h.right != 0 {
			words = append(words, fmt.Sprintf("the axes of the argument mapped %s", h.right))
		}
	}
	return words
}

// mirror words which flip of the matrix makes it the other rotation.
func (h Hypothesis) mirror() string {
	rows, columns := h.left, h.right
	if h.inverse && h.B.Mirrored { // the map before b~ acts on the columns of b
		rows, columns = columns, rows
	}
	switch {
	case rows == 0 && columns == 0:
		return "the matrix negated"
	case rows <= 3 && columns == 0:
		return fmt.Sprintf("row %d of the matrix negated", rows)
	case columns <= 3 && rows == 0:
		return fmt.Sprintf("column %d of the matrix negated", columns)
	}
	return "the matrix mirrored and its axes exchanged"
}

// degrees prints an angle for people.
func degrees(rad float64) string { return fmt.Sprintf("%.3g degrees", rad*180/math.Pi) }
