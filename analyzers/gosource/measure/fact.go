package measure

import (
	"fmt"
	"slices"
	"strings"

	"dextral/core/convention"
	"dextral/core/operation"
)

// Meanings is what a package exports to those that import it: what its functions
// compute and how its types are stored. Lists are sorted by name, so that the
// bytes of a fact depend on the package only.
type Meanings struct {
	Types []TypeMeaning
	Funcs []FuncMeaning
}

// TypeMeaning is a Type without its functions.
type TypeMeaning struct {
	Name       string
	Kind       operation.Kind
	Orders     []operation.Order
	Storage    convention.Storage
	Rotational bool
}

// FuncMeaning is what one case of a function computes.
type FuncMeaning struct {
	Name     string // as lower.Func has it
	Case     string // its label
	Readings []operation.Reading
	OnUnit   bool
}

// AFact makes Meanings a fact of package go/analysis.
func (*Meanings) AFact() {}

func (m *Meanings) String() string {
	return fmt.Sprintf("meanings of %d types and %d functions", len(m.Types), len(m.Funcs))
}

// Type finds what is known of a type, or nil.
func (m *Meanings) Type(name string) *TypeMeaning {
	i, ok := slices.BinarySearchFunc(m.Types, name, func(t TypeMeaning, n string) int { return strings.Compare(t.Name, n) })
	if !ok {
		return nil
	}
	return &m.Types[i]
}

// Func lists what is known of the cases of a function.
func (m *Meanings) Func(name string) []FuncMeaning {
	i, _ := slices.BinarySearchFunc(m.Funcs, name, func(f FuncMeaning, n string) int { return strings.Compare(f.Name, n) })
	j := i
	for j < len(m.Funcs) && m.Funcs[j].Name == name {
		j++
	}
	return m.Funcs[i:j]
}

// export collects what is known of the package's own types and functions.
func (r *Result) export(path string) *Meanings {
	m := &Meanings{}
	for _, t := range r.Types {
		if t.Object.Pkg() != nil && t.Object.Pkg().Path() == path && (t.Decided() || len(t.Rotational) > 0) {
			m.Types = append(m.Types, TypeMeaning{t.Name, t.Kind, t.Orders, t.Storage, len(t.Rotational) > 0})
		}
	}
	for _, f := range r.Funcs {
		for _, c := range f.Cases {
			if c.Identity.Known() && f.Object.Exported() {
				m.Funcs = append(m.Funcs, FuncMeaning{f.Name, c.Label, c.Identity.Readings, c.Identity.OnUnit})
			}
		}
	}
	slices.SortStableFunc(m.Funcs, func(a, b FuncMeaning) int { return strings.Compare(a.Name, b.Name) })
	return m
}
