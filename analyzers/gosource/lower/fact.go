package lower

import (
	"fmt"
	"sort"

	"dextral/core/tape"
)

// Tapes is what a package exports to those that import it: the tapes of its
// functions, in serialised form, and the values of its variables. Lists are
// sorted by name, so that the bytes of a fact depend on the package only.
type Tapes struct {
	Names   []string
	Bytes   [][]byte
	Globals []Global
}

// Global is the value of a package variable. A word of kind Any is unknown.
type Global struct {
	Name  string
	Words []tape.Const
}

// AFact makes Tapes a fact of package go/analysis.
func (*Tapes) AFact() {}

func (t *Tapes) String() string { return fmt.Sprintf("tapes of %d functions", len(t.Names)) }

// program decodes the tape of a name, or returns nil.
func (t *Tapes) program(name string) *tape.Program {
	i := sort.SearchStrings(t.Names, name)
	if i == len(t.Names) || t.Names[i] != name {
		return nil
	}
	p := new(tape.Program)
	if p.UnmarshalBinary(t.Bytes[i]) != nil {
		return nil
	}
	return p
}

func (t *Tapes) global(name string) []tape.Const {
	i := sort.Search(len(t.Globals), func(i int) bool { return t.Globals[i].Name >= name })
	if i == len(t.Globals) || t.Globals[i].Name != name {
		return nil
	}
	return t.Globals[i].Words
}

// export collects the tapes of the package as a fact.
func (p *packageLowerer) export() *Tapes {
	t := &Tapes{}
	for name := range p.own {
		t.Names = append(t.Names, name)
	}
	sort.Strings(t.Names)
	for _, name := range t.Names {
		bytes, err := p.own[name].Stripped().MarshalBinary()
		if err != nil {
			bytes = nil
		}
		t.Bytes = append(t.Bytes, bytes)
	}
	for g, words := range p.globals {
		if g.Pkg == p.ssaPkg && g.Object() != nil && g.Object().Exported() && len(words) > 0 {
			t.Globals = append(t.Globals, Global{Name: g.Name(), Words: words})
		}
	}
	sort.Slice(t.Globals, func(i, j int) bool { return t.Globals[i].Name < t.Globals[j].Name })
	return t
}
