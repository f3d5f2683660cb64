package lower

import (
	"go/types"
	"strings"
)

// env maps type parameters to what they stand for in one instance of a
// generic function.
type env struct {
	args map[*types.TypeParam]types.Type
	list []types.Type // the same in order
	ctx  *types.Context
}

func newEnv(ctx *types.Context, params *types.TypeParamList, args []types.Type) *env {
	e := &env{args: map[*types.TypeParam]types.Type{}, list: args, ctx: ctx}
	for i := range params.Len() {
		e.args[params.At(i)] = args[i]
	}
	return e
}

// subst replaces type parameters in t.
func (e *env) subst(t types.Type) types.Type {
	if e == nil || len(e.args) == 0 {
		return t
	}
	switch t := t.(type) {
	case *types.TypeParam:
		if a, ok := e.args[t]; ok {
			return a
		}
	case *types.Alias:
		return e.subst(types.Unalias(t))
	case *types.Named:
		return e.named(t)
	case *types.Pointer:
		if el := e.subst(t.Elem()); el != t.Elem() {
			return types.NewPointer(el)
		}
	case *types.Slice:
		if el := e.subst(t.Elem()); el != t.Elem() {
			return types.NewSlice(el)
		}
	case *types.Array:
		if el := e.subst(t.Elem()); el != t.Elem() {
			return types.NewArray(el, t.Len())
		}
	case *types.Tuple:
		return e.tuple(t)
	case *types.Struct:
		return e.structure(t)
	case *types.Signature:
		p, r := e.tuple(t.Params()), e.tuple(t.Results())
		if p != t.Params() || r != t.Results() {
			return types.NewSignatureType(nil, nil, nil, p, r, t.Variadic())
		}
	}
	return t
}

func (e *env) named(t *types.Named) types.Type {
	list := t.TypeArgs()
	if list.Len() == 0 {
		return t
	}
	args := make([]types.Type, list.Len())
	changed := false
	for i := range args {
		args[i] = e.subst(list.At(i))
		changed = changed || args[i] != list.At(i)
	}
	if !changed {
		return t
	}
	inst, err := types.Instantiate(e.ctx, t.Origin(), args, false)
	if err != nil {
		return t
	}
	return inst
}

func (e *env) tuple(t *types.Tuple) *types.Tuple {
	vars := make([]*types.Var, t.Len())
	changed := false
	for i := range vars {
		v := t.At(i)
		vars[i] = v
		if s := e.subst(v.Type()); s != v.Type() {
			vars[i] = types.NewVar(v.Pos(), v.Pkg(), v.Name(), s)
			changed = true
		}
	}
	if !changed {
		return t
	}
	return types.NewTuple(vars...)
}

func (e *env) structure(t *types.Struct) types.Type {
	fields := make([]*types.Var, t.NumFields())
	tags := make([]string, t.NumFields())
	changed := false
	for i := range fields {
		f := t.Field(i)
		fields[i], tags[i] = f, t.Tag(i)
		if s := e.subst(f.Type()); s != f.Type() {
			fields[i] = types.NewField(f.Pos(), f.Pkg(), f.Name(), s, f.Embedded())
			changed = true
		}
	}
	if !changed {
		return t
	}
	return types.NewStruct(fields, tags)
}

// argsText prints type arguments as they stand in the name of an instance.
func argsText(args []types.Type) string {
	if len(args) == 0 {
		return ""
	}
	texts := make([]string, len(args))
	for i, a := range args {
		texts[i] = types.TypeString(a, nil)
	}
	return "[" + strings.Join(texts, ",") + "]"
}

// floatArgs returns the instances of a generic function that are lowered though
// nobody may ask for them: every parameter float64, every one float32, and, for
// those who may call it elsewhere, every one int, where the constraints allow
// it.
func floatArgs(params *types.TypeParamList) [][]types.Type {
	var all [][]types.Type
	for _, basic := range []types.BasicKind{types.Float64, types.Float32, types.Int} {
		args := make([]types.Type, params.Len())
		ok := true
		for i := range args {
			args[i] = types.Typ[basic]
			c, _ := params.At(i).Constraint().Underlying().(*types.Interface)
			ok = ok && c != nil && types.Satisfies(args[i], c)
		}
		if ok {
			all = append(all, args)
		}
	}
	return all
}
