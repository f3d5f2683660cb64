package lower

import (
	"go/constant"
	"go/token"
	"go/types"

	"golang.org/x/tools/go/ssa"

	"dextral/core/tape"
)

// signature describes the parameters and results of fn, in one instance.
func (b *builder) signature() bool {
	for i, p := range b.fn.Params {
		param, ok := b.param(p.Name(), b.typeOf(p), p)
		if !ok {
			return false
		}
		param.Receiver = i == 0 && b.fn.Signature.Recv() != nil
		b.p.Sig.Params = append(b.p.Sig.Params, param)
	}
	for _, v := range b.fn.FreeVars {
		l := b.layout(b.typeOf(v))
		if l == nil {
			return false
		}
		b.p.Sig.Params = append(b.p.Sig.Params, tape.Param{Name: v.Name(), Type: typeText(b.typeOf(v)), Mode: tape.Hidden, Words: len(l.fields)})
	}
	results := b.fn.Signature.Results()
	for i := range results.Len() {
		r, ok := b.result(results.At(i), i)
		if !ok {
			return false
		}
		b.p.Sig.Results = append(b.p.Sig.Results, r)
	}
	return true
}

func typeText(t types.Type) string { return types.TypeString(t, nil) }

func (b *builder) param(name string, t types.Type, v ssa.Value) (tape.Param, bool) {
	p := tape.Param{Name: name, Type: typeText(t)}
	l := b.layout(t)
	if l == nil {
		return p, false
	}
	p.Words = len(l.fields)
	switch u := t.Underlying().(type) {
	case *types.Pointer:
		if el := b.layout(u.Elem()); el != nil && el.numeric {
			p.Mode, p.Fields, p.Type = tape.Pointer, el.fields, typeText(u.Elem())
			return p, true
		}
	case *types.Slice:
		if el := b.layout(u.Elem()); el != nil && el.numeric {
			n := sliceLength(v)
			if array := b.layout(types.NewArray(u.Elem(), n)); array != nil {
				p.Mode, p.Len, p.Fields = tape.Slice, int(n), array.fields
				return p, true
			}
		}
	default:
		if l.numeric {
			p.Mode, p.Fields, p.Values = tape.Value, l.fields, enumeration(t)
			return p, true
		}
	}
	p.Mode = tape.Hidden
	return p, true
}

func (b *builder) result(v *types.Var, i int) (tape.Result, bool) {
	t := b.env.subst(v.Type())
	r := tape.Result{Name: v.Name(), Type: typeText(t)}
	l := b.layout(t)
	if l == nil {
		return r, false
	}
	r.Words = len(l.fields)
	switch u := t.Underlying().(type) {
	case *types.Pointer:
		if el := b.layout(u.Elem()); el != nil && el.numeric {
			r.Mode, r.Fields, r.Type = tape.Pointer, el.fields, typeText(u.Elem())
			return r, true
		}
	case *types.Slice:
		if el := b.layout(u.Elem()); el != nil && el.numeric {
			if n := b.returnedLength(i); n > 0 {
				if array := b.layout(types.NewArray(u.Elem(), n)); array != nil {
					r.Mode, r.Len, r.Fields = tape.Slice, int(n), array.fields
					return r, true
				}
			}
		}
	default:
		if l.numeric || isError(t) {
			r.Mode, r.Fields = tape.Value, l.fields
			return r, true
		}
	}
	r.Mode = tape.Hidden
	return r, true
}

// defaultLength is the length of a slice parameter about which the function
// says nothing.
const defaultLength = 4

// sliceLength guesses how many elements a function expects of a slice: the
// number it compares the length with, or the greatest constant index.
func sliceLength(v ssa.Value) int64 {
	most := int64(0)
	for _, r := range *v.Referrers() {
		switch r := r.(type) {
		case *ssa.IndexAddr:
			if c, ok := r.Index.(*ssa.Const); ok && c.Value != nil && r.X == v {
				most = max(most, c.Int64()+1)
			}
		case *ssa.Call:
			if bi, ok := r.Call.Value.(*ssa.Builtin); ok && bi.Name() == "len" {
				if n, ok := comparedWith(r); ok {
					return n
				}
			}
		}
	}
	if most == 0 || most > maxWords {
		return defaultLength
	}
	return most
}

// comparedWith returns the constant that a length is tested against.
func comparedWith(length *ssa.Call) (int64, bool) {
	for _, r := range *length.Referrers() {
		op, ok := r.(*ssa.BinOp)
		if !ok || op.Op != token.EQL && op.Op != token.NEQ && op.Op != token.LSS {
			continue
		}
		if c, ok := op.Y.(*ssa.Const); ok && c.Value != nil && c.Int64() > 0 && c.Int64() <= 64 {
			return c.Int64(), true
		}
	}
	return 0, false
}

// returnedLength returns the length of slice result i, if all returns agree on
// a constant, or 0.
func (b *builder) returnedLength(i int) int64 {
	n := int64(0)
	for _, block := range b.fn.Blocks {
		ret, ok := block.Instrs[len(block.Instrs)-1].(*ssa.Return)
		if !ok {
			continue
		}
		if c, ok := ret.Results[i].(*ssa.Const); ok && c.Value == nil {
			continue
		}
		k := b.constantLength(ret.Results[i])
		if k == 0 || n != 0 && n != k {
			return 0
		}
		n = k
	}
	return n
}

func (b *builder) constantLength(v ssa.Value) int64 {
	switch v := v.(type) {
	case *ssa.Slice:
		if v.Low != nil || v.High != nil {
			return 0
		}
		if p, ok := b.typeOf(v.X).Underlying().(*types.Pointer); ok {
			if a, ok := p.Elem().Underlying().(*types.Array); ok {
				return a.Len()
			}
		}
	case *ssa.MakeSlice:
		if c, ok := v.Len.(*ssa.Const); ok {
			return c.Int64()
		}
	}
	return 0
}

// enumeration returns the constants that the package of a named integer type
// declares of it.
func enumeration(t types.Type) []tape.Named {
	named, ok := types.Unalias(t).(*types.Named)
	if !ok || named.Obj().Pkg() == nil {
		return nil
	}
	if basic, ok := named.Underlying().(*types.Basic); !ok || basic.Info()&types.IsInteger == 0 {
		return nil
	}
	var values []tape.Named
	scope := named.Obj().Pkg().Scope()
	for _, name := range scope.Names() {
		c, ok := scope.Lookup(name).(*types.Const)
		if !ok || !types.Identical(c.Type(), t) {
			continue
		}
		if v, exact := constant.Int64Val(constant.ToInt(c.Val())); exact {
			values = append(values, tape.Named{Name: name, Value: v})
		}
	}
	return values
}
