package operation

import (
	"fmt"
	"math"
	"strconv"
	"strings"
)

// Difference says in words what stands between a function and the operation that it
// nearly computes, in the author's names; "" if nothing was found out.
func (f *Function) Difference(m *Miss) string {
	switch {
	case len(m.Terms) > 0:
		return f.termWords(m)
	case m.Edit != "":
		return "it equals the operation " + m.Edit
	case m.Factor != "":
		return m.Factor
	}
	return ""
}

// maxGroups bounds the results that a message names.
const maxGroups = 3

func (f *Function) termWords(m *Miss) string {
	var groups [][]Term
	for _, t := range m.Terms {
		if n := len(groups); n > 0 && groups[n-1][0].Result == t.Result && groups[n-1][0].Of == t.Of {
			groups[n-1] = append(groups[n-1], t)
			continue
		}
		groups = append(groups, []Term{t})
	}
	var parts []string
	for i, g := range groups {
		if i == maxGroups {
			parts = append(parts, fmt.Sprintf("and %d more", len(groups)-i))
			break
		}
		parts = append(parts, f.groupWords(g))
	}
	return strings.Join(parts, "; ")
}

// groupWords words the terms of one result.
func (f *Function) groupWords(g []Term) string {
	if math.IsNaN(g[0].Found) {
		if name := f.ResultName(g[0].Result); name != "" {
			return name + " is wrong before the result is normalised; the others keep their proportions"
		}
		return g[0].Of + " are wrong"
	}
	head := ""
	if name := f.ResultName(g[0].Result); name != "" {
		head = name
		if g[0].Of != "" {
			head += " (" + g[0].Of + ")"
		}
		head += ": "
	} else if g[0].Of != "" {
		head = g[0].Of + ": "
	}
	if len(g) == 1 {
		return head + g[0].words()
	}
	if len(g) == 2 {
		a, b := g[0], g[1]
		if b.Found == 0 {
			a, b = b, a
		}
		if a.Found == 0 && b.Expected == 0 && a.What != "" && b.What != "" {
			return head + fmt.Sprintf("found %s where %s is expected", product(b.Found, b.What), product(a.Expected, a.What))
		}
	}
	var expected, found []Term
	for _, t := range g[:min(len(g), 4)] {
		expected, found = append(expected, t), append(found, t)
	}
	text := head + "expected " + sum(expected, func(t Term) float64 { return t.Expected }) + ", found " + sum(found, func(t Term) float64 { return t.Found })
	if len(g) > 4 {
		text += " and more"
	}
	return text
}

// words words a single term.
func (t Term) words() string {
	what := t.What
	if what == "" {
		switch {
		case t.Found == -t.Expected:
			return "the sign is wrong"
		case t.Expected == 1:
			return fmt.Sprintf("it is %s times what it should be", number(t.Found))
		}
		return fmt.Sprintf("the constant is %s instead of %s", number(t.Found), number(t.Expected))
	}
	switch {
	case t.Found == 0:
		return fmt.Sprintf("the term %s is missing", product(t.Expected, what))
	case t.Expected == 0:
		return fmt.Sprintf("the term %s does not belong there", product(t.Found, what))
	case math.Abs(t.Found+t.Expected) < 1e-9:
		return fmt.Sprintf("the term %s enters with the wrong sign", product(math.Abs(t.Expected), what))
	}
	return fmt.Sprintf("the term %s has the factor %s instead of %s", what, number(t.Found), number(t.Expected))
}

// product is a factor times a term, as people write it.
func product(factor float64, what string) string {
	switch {
	case what == "":
		return number(factor)
	case factor == 1:
		return what
	case factor == -1:
		return "-" + what
	}
	return number(factor) + "*" + what
}

func sum(terms []Term, factor func(Term) float64) string {
	var b strings.Builder
	for _, t := range terms {
		x := factor(t)
		if x == 0 {
			continue
		}
		switch {
		case b.Len() == 0:
			b.WriteString(product(x, t.What))
		case x < 0:
			b.WriteString(" - " + product(-x, t.What))
		default:
			b.WriteString(" + " + product(x, t.What))
		}
	}
	if b.Len() == 0 {
		return "0"
	}
	return b.String()
}

func number(x float64) string { return strconv.FormatFloat(x, 'g', 4, 64) }

// ResultName is what the author calls result number place, or "" if there is no
// such.
func (f *Function) ResultName(place int) string {
	for _, o := range f.Out {
		if place < 0 {
			return ""
		}
		if place < o.Size {
			if place < len(o.Names) {
				return o.Names[place]
			}
			return fmt.Sprintf("result %d", place+1)
		}
		place -= o.Size
	}
	return ""
}
