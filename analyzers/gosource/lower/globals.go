package lower

import (
	"go/types"
	"slices"

	"golang.org/x/tools/go/ssa"

	"dextral/core/tape"
)

// Package variables. A variable that no function of its package writes has the
// value of its initialiser, which is interpreted once; any other is unknown.

// globalWords returns the words of a package variable; those of kind Any are
// unknown. It returns nil if nothing is known, not even how many there are.
func (p *packageLowerer) globalWords(g *ssa.Global) []tape.Const {
	if words, ok := p.globals[g]; ok {
		return words
	}
	l := p.layouts.of(variableType(g))
	if l == nil {
		p.globals[g] = nil
		return nil
	}
	if g.Pkg == p.ssaPkg {
		p.initialise()
		if words, ok := p.globals[g]; ok {
			return words
		}
	} else if words := p.importedGlobal(g, l); words != nil {
		p.globals[g] = words
		return words
	}
	words := make([]tape.Const, len(l.fields))
	if !p.initialising {
		p.globals[g] = words
	}
	return words
}

// importedGlobal returns the words that the package of g exported for it.
func (p *packageLowerer) importedGlobal(g *ssa.Global, l *layout) []tape.Const {
	fact := p.imported(g.Pkg.Pkg)
	if fact == nil {
		return nil
	}
	words := fact.global(g.Name())
	if len(words) < len(l.fields) {
		return nil
	}
	return words
}

// global returns the address of a package variable as a spot in the data.
func (b *builder) global(g *ssa.Global) *spot {
	if b.initials != nil {
		return b.initialSpot(g)
	}
	i, ok := b.data[g]
	if !ok {
		words := b.globalWords(g)
		if words == nil {
			b.fail("uses package variable %s", g.Name())
		}
		if len(words) == 0 {
			return &spot{base: inFrame} // nothing is ever read there
		}
		if slices.ContainsFunc(words, func(w tape.Const) bool { return w.Kind == tape.Any }) {
			b.note("package variable " + g.Name())
		}
		i = int32(len(b.p.Data))
		for _, w := range words {
			if w.Kind == tape.Addr && w.Bits != 0 {
				w.Bits += uint64(i)
			}
			b.p.Data = append(b.p.Data, w)
		}
		b.data[g] = i
	}
	return &spot{base: inData, slot: i}
}

// loadGlobal reads a variable of one word as the constant it is.
func (b *builder) loadGlobal(in *ssa.UnOp, g *ssa.Global) bool {
	if b.initials != nil {
		return false
	}
	words := b.globalWords(g)
	if l := b.layout(variableType(g)); l != nil && len(words) > len(l.fields) {
		words = words[:len(l.fields)]
	}
	known := words != nil
	for _, w := range words {
		known = known && w.Kind != tape.Any
	}
	switch {
	case !known:
		b.note("package variable " + g.Name())
		b.unknown(in)
	case len(words) == 1 && words[0].Kind != tape.Addr:
		b.vals[in] = val{slot: b.constant(words[0].Kind, words[0].Bits), n: 1}
	default:
		return false
	}
	return true
}

// initialise interprets the initialisers of the package. Functions that they
// call may read variables themselves; as these are not known by then, such
// functions are lowered again, and the initialisers interpreted once more.
func (p *packageLowerer) initialise() {
	if p.initialised {
		return
	}
	p.initialised = true
	waiting := p.queue
	written := p.writtenGlobals()
	for range 2 {
		p.queue, p.early = nil, nil
		p.interpret(written)
		p.queue, p.early = p.early, nil
		if len(p.queue) == 0 {
			break
		}
		p.drain()
	}
	p.queue = waiting
}

// interpret runs the initialisers and notes the values of the variables that
// are not written anywhere else.
func (p *packageLowerer) interpret(written map[*ssa.Global]bool) {
	init := p.ssaPkg.Func("init")
	if init == nil {
		return
	}
	b := p.newBuilder(init, nil, p.pkg.Path()+".init")
	b.initials = map[*ssa.Global]*spot{}
	if why := b.build(); why != "" {
		return
	}
	for _, m := range p.ssaPkg.Members {
		if g, ok := m.(*ssa.Global); ok && b.initials[g] == nil && !written[g] {
			p.globals[g] = p.zeroWords(g)
		}
	}
	p.initialising = true
	p.drain()
	p.initialising = false
	b.p.Optimize()
	m, err := tape.Link(b.p, p.library)
	if err != nil {
		return
	}
	batch := m.NewBatch(1)
	m.Run(batch)
	if batch.Outcome(0) != tape.Returned {
		return
	}
	out := 0
	for i, g := range b.vars {
		n := len(b.p.Sig.Results[i].Fields)
		if written[g] {
			p.globals[g] = make([]tape.Const, n)
		} else {
			snap := snapshot{m: m, ls: &p.layouts}
			snap.addWords(variableType(g), func(k int) (uint64, bool) {
				return batch.OutBits(0, out+k), batch.Known(0, out+k)
			})
			p.globals[g] = snap.words
		}
		out += n
	}
}

// variableType is the type of a package variable.
func variableType(g *ssa.Global) types.Type { return g.Type().Underlying().(*types.Pointer).Elem() }

// zeroWords returns the words of a variable that nobody sets.
func (p *packageLowerer) zeroWords(g *ssa.Global) []tape.Const {
	l := p.layouts.of(variableType(g))
	if l == nil {
		return nil
	}
	words := make([]tape.Const, len(l.fields))
	for i, f := range l.fields {
		words[i].Kind = f.Kind
	}
	return words
}

// initialSpot gives a variable a place in the frame of the initialiser.
func (b *builder) initialSpot(g *ssa.Global) *spot {
	if s, ok := b.initials[g]; ok {
		return s
	}
	t := variableType(g)
	n := b.words(t)
	s := objectAt(b.temp(n), n)
	b.initials[g] = s
	l := b.layout(t)
	if g.Pkg != b.ssaPkg || n == 0 {
		if n > 0 {
			b.blocks[0] = append([]tape.Instr{{Op: tape.Unknown, Dst: s.slot, C: n}}, b.blocks[0]...)
		}
		return s
	}
	b.blocks[0] = append([]tape.Instr{{Op: tape.Zero, Dst: s.slot, C: n}}, b.blocks[0]...)
	if g.Name() != "init$guard" {
		b.vars = append(b.vars, g)
		b.p.Sig.Results = append(b.p.Sig.Results, tape.Result{Name: g.Name(), Words: int(n), Fields: l.fields})
	}
	return s
}

// initialResults returns all variables at the end of the initialiser.
func (b *builder) initialResults() []tape.Range {
	var rs []tape.Range
	for _, g := range b.vars {
		s := b.initials[g]
		rs = append(rs, tape.Range{Slot: s.slot, N: s.size})
	}
	return rs
}

// writtenGlobals finds the variables of the package that some function other
// than the initialiser writes.
func (p *packageLowerer) writtenGlobals() map[*ssa.Global]bool {
	written := map[*ssa.Global]bool{}
	for _, fn := range p.allFuncs {
		if fn.Name() == "init" && fn.Synthetic != "" {
			continue
		}
		for _, block := range fn.Blocks {
			for _, in := range block.Instrs {
				if s, ok := in.(*ssa.Store); ok {
					if g := globalOf(s.Addr); g != nil {
						written[g] = true
					}
				}
			}
		}
	}
	return written
}

// globalOf returns the variable that an address points into, if that is plain.
func globalOf(v ssa.Value) *ssa.Global {
	for {
		switch x := v.(type) {
		case *ssa.Global:
			return x
		case *ssa.FieldAddr:
			v = x.X
		case *ssa.IndexAddr:
			v = x.X
		case *ssa.Slice:
			v = x.X
		case *ssa.UnOp:
			v = x.X // what the variable points to
		default:
			return nil
		}
	}
}
