package measure

import (
	"fmt"
	"slices"
	"strings"

	"dextral/core/operation"
	"dextral/core/tape"
)

// Uses reports whether a function calls another, by the name of its tape, directly or
// through others.
func (f *Function) Uses(name string) bool {
	seen := map[string]bool{}
	var visit func(string) bool
	visit = func(n string) bool {
		if seen[n] {
			return false
		}
		seen[n] = true
		p := f.library[n]
		if n == f.Name {
			p = f.Program
		}
		if p == nil {
			return false
		}
		return slices.ContainsFunc(p.Calls, func(c tape.CallSite) bool { return c.Callee == name || visit(c.Callee) })
	}
	return visit(f.Name)
}

// Inputs prints the inputs of a sample by operand: "a = (0.5, 0.5, 0.5, 0.5)".
func (f *Function) Inputs(c *Case, in []float64) string {
	var parts []string
	for _, o := range c.In {
		var numbers []string
		for _, x := range in[:o.Size] {
			numbers = append(numbers, fmt.Sprintf("%.4g", x))
		}
		in = in[o.Size:]
		text := strings.Join(numbers, ", ")
		if o.Size > 1 {
			text = "(" + text + ")"
		}
		name := o.Name
		if strings.Contains(name, ", ") {
			name = "(" + name + ")"
		}
		parts = append(parts, name+" = "+text)
	}
	if c.Label != "" {
		parts = append(parts, c.Label)
	}
	return strings.Join(parts, ", ")
}

// quaternionWords are words in names of types, packages and functions that say
// that four numbers are a quaternion; typeWords say it in the name of a type.
var (
	quaternionWords = []string{"quat", "rotor", "versor"}
	typeWords       = []string{"attitude", "orientation", "rotation"}
)

// Orients reports whether the operands of a case are orientations as far as operations
// of the given kinds need it: some other function treats the type as rotations,
// or its name, the package's, the function's or those of the numbers say it.
func (r *Result) Orients(f *Function, c *Case, ops []operation.Op) bool {
	for _, o := range slices.Concat(c.In, c.Out) {
		if o.Kind == operation.Quaternion && !r.rotates(f, o) {
			return false
		}
	}
	return true
}

func (r *Result) rotates(f *Function, o Operand) bool {
	if t := r.Type(o.Type); t != nil {
		if slices.ContainsFunc(t.Rotational, func(g *Function) bool { return g != f }) {
			return true
		}
		if m := r.imported(t.Object.Pkg()).Type(t.Name); m != nil && m.Rotational {
			return true
		}
	}
	if speaks(f.Name+" "+o.Type, quaternionWords) || speaks(o.Type, typeWords) {
		return true
	}
	_, named := orderOfNames(o.Names) // w, x, y, z may still be a homogeneous vector
	return named && speaks(docText(f), quaternionWords)
}

func speaks(text string, words []string) bool {
	text = strings.ToLower(text)
	return slices.ContainsFunc(words, func(w string) bool { return strings.Contains(text, w) })
}

func docText(f *Function) string {
	if f.Decl == nil || f.Decl.Doc == nil {
		return ""
	}
	return f.Decl.Doc.Text()
}
