package lower

import (
	"go/ast"
	"go/token"
	"go/types"

	"golang.org/x/tools/go/ssa"

	"dextral/core/tape"
)

// pending is an edge to a block with phis.
type pending struct {
	from, to *ssa.BasicBlock
	index    int // of from among the predecessors of to
	block    int // tape block to fill
}

// jump ends the current block with a jump to successor i of block.
func (b *builder) target(block *ssa.BasicBlock, i int) int32 {
	to := block.Succs[i]
	if _, ok := to.Instrs[0].(*ssa.Phi); !ok {
		return int32(to.Index)
	}
	// The edge gets a block of its own, filled when all operands are known.
	at := len(b.blocks)
	b.blocks = append(b.blocks, nil)
	index := 0
	seen := 0
	for k, p := range to.Preds {
		// Both sides of an if may go to one block: the order of predecessors
		// is that of the sides.
		if p == block {
			if seen == sameBefore(block, i) {
				index = k
			}
			seen++
		}
	}
	b.pending = append(b.pending, pending{block, to, index, at})
	return int32(at)
}

// sameBefore counts the successors before i that are the same block.
func sameBefore(block *ssa.BasicBlock, i int) int {
	n := 0
	for k := range i {
		if block.Succs[k] == block.Succs[i] {
			n++
		}
	}
	return n
}

// edges fills the blocks of edges: the phis of the target get their values all
// at once, so those that are phis of the target themselves are saved first.
func (b *builder) edges() (why string) {
	defer func() {
		if r := recover(); r != nil {
			u, ok := r.(unsupported)
			if !ok {
				panic(r)
			}
			why = string(u)
		}
	}()
	for _, e := range b.pending {
		b.current, b.place = e.block, 0
		type move struct{ dst, src, n int32 }
		var moves []move
		phis := map[int32]bool{}
		for _, in := range e.to.Instrs {
			phi, ok := in.(*ssa.Phi)
			if !ok {
				break
			}
			d := b.value(phi)
			src := b.value(phi.Edges[e.index])
			for k := range d.n {
				phis[d.slot+k] = true
			}
			moves = append(moves, move{d.slot, src.slot, d.n})
		}
		for i, m := range moves {
			if m.n > 0 && phis[m.src] && len(moves) > 1 {
				s := b.temp(m.n)
				b.emit(tape.Instr{Op: tape.Copy, Dst: s, A: m.src, C: m.n})
				moves[i].src = s
			}
		}
		for _, m := range moves {
			b.emit(tape.Instr{Op: tape.Copy, Dst: m.dst, A: m.src, C: m.n})
		}
		b.emit(tape.Instr{Op: tape.Jump, A: int32(e.to.Index)})
	}
	return ""
}

func (b *builder) branch(in *ssa.If) {
	cond := b.value(in.Cond).slot
	block := in.Block()
	text, pos := b.condition(in.Cond)
	b.p.Branches = append(b.p.Branches, tape.Branch{Text: text, Place: b.placeOf(pos)})
	b.emit(tape.Instr{Op: tape.If, Dst: int32(len(b.p.Branches) - 1), A: cond, B: b.target(block, 0), C: b.target(block, 1)})
}

// condition returns the text of a condition as the author wrote it.
func (b *builder) condition(v ssa.Value) (string, token.Pos) {
	pos := v.Pos()
	if e := b.expr(pos); e != nil {
		return types.ExprString(e), pos
	}
	return "", pos
}

// expr returns the expression whose designated position is pos.
func (b *builder) expr(pos token.Pos) ast.Expr {
	if !pos.IsValid() {
		return nil
	}
	if b.exprs == nil {
		b.exprs = map[token.Pos]ast.Expr{}
		for _, f := range b.files {
			ast.Inspect(f, func(n ast.Node) bool {
				switch n := n.(type) {
				case *ast.BinaryExpr:
					b.exprs[n.OpPos] = n
				case *ast.UnaryExpr:
					b.exprs[n.OpPos] = n
				case *ast.CallExpr:
					b.exprs[n.Lparen] = n
				}
				return true
			})
		}
	}
	return b.exprs[pos]
}

func (b *builder) ret(in *ssa.Return) {
	var rs []tape.Range
	for _, r := range in.Results {
		v := b.value(r)
		if v.n == 0 {
			continue
		}
		if k := len(rs); k > 0 && rs[k-1].Slot+rs[k-1].N == v.slot && v.slot < constBase {
			rs[k-1].N += v.n
			continue
		}
		rs = append(rs, tape.Range{Slot: v.slot, N: v.n})
	}
	b.p.Returns = append(b.p.Returns, rs)
	b.emit(tape.Instr{Op: tape.Return, A: int32(len(b.p.Returns) - 1)})
}

// panicText says what a panic says, where it says it as a constant.
func panicText(v ssa.Value) string {
	if m, ok := v.(*ssa.MakeInterface); ok {
		if c, ok := m.X.(*ssa.Const); ok && c.Value != nil {
			return "panics: " + c.Value.ExactString()
		}
	}
	return "panics"
}
