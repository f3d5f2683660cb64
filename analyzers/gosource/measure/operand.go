package measure

import (
	"go/types"
	"strconv"
	"strings"

	"dextral/core/operation"
)

// piece is a part of a parameter or result: a run of its words with the role that
// its type gives them.
type piece struct {
	kind  operation.Kind
	path  string     // within the parameter: ".Rot"; "" for the whole
	typ   types.Type // of the part; nil for a run of parameters
	first int        // word within the parameter
	size  int        // words
	float bool       // all words are floating point
}

// pieces takes a type apart into operands: a type of 3, 4, 9 or 16 floats is one
// operand, any other struct is those of its fields. A vector and a scalar in one
// struct make a quaternion; parted is the other way to see them.
func pieces(t types.Type, parted bool) []piece {
	return split(t, "", 0, parted)
}

func split(t types.Type, path string, first int, parted bool) []piece {
	n, float := words(t)
	whole := piece{kind: operation.KindOf(n), path: path, typ: t, first: first, size: n, float: float}
	if n == 0 {
		return nil
	}
	if !float && n == 1 {
		return []piece{whole}
	}
	s, isStruct := t.Underlying().(*types.Struct)
	if float && whole.kind != operation.Numbers && !squareOfTwo(t) && !(parted && isStruct && divided(s)) {
		return []piece{whole}
	}
	if !isStruct {
		whole.kind = operation.Numbers
		return []piece{whole}
	}
	var all []piece
	for i := range s.NumFields() {
		f := s.Field(i)
		all = append(all, split(f.Type(), path+"."+f.Name(), first, parted)...)
		k, _ := words(f.Type())
		first += k
	}
	return all
}

// divided reports whether a struct of four numbers is a vector and a scalar.
func divided(s *types.Struct) bool {
	return s.NumFields() == 2
}

// squareOfTwo reports whether four numbers are a 2x2 array, which is no quaternion.
func squareOfTwo(t types.Type) bool {
	a, ok := t.Underlying().(*types.Array)
	if !ok || a.Len() != 2 {
		return false
	}
	b, ok := a.Elem().Underlying().(*types.Array)
	return ok && b.Len() == 2
}

// words counts the words of a type, as package lower lays them out, and says
// whether all are floating point. Types without a layout have none.
func words(t types.Type) (n int, float bool) {
	switch u := t.Underlying().(type) {
	case *types.Basic:
		switch {
		case u.Info()&types.IsComplex != 0:
			return 2, true
		case u.Info()&(types.IsFloat|types.IsInteger|types.IsBoolean) != 0:
			return 1, u.Info()&types.IsFloat != 0
		}
	case *types.Array:
		k, f := words(u.Elem())
		return k * int(u.Len()), f
	case *types.Struct:
		float = true
		for i := range u.NumFields() {
			k, f := words(u.Field(i).Type())
			n += k
			float = float && f
		}
		return n, float
	}
	return 0, false
}

// typeName is how facts and operands call a type: with the path of its package; ""
// for an unnamed one.
func typeName(t types.Type) string {
	if _, ok := types.Unalias(t).(*types.Named); !ok {
		return ""
	}
	return types.TypeString(t, nil)
}

// signature returns the types of receiver, parameters and results of a
// function's instance, addresses followed.
func signature(f *types.Func, args []types.Type) (params, results []types.Type) {
	sig := f.Signature()
	switch {
	case len(args) == 0:
	case sig.TypeParams().Len() > 0:
		if t, err := types.Instantiate(nil, sig, args, false); err == nil {
			sig = t.(*types.Signature)
		}
	case sig.RecvTypeParams().Len() > 0:
		recv := sig.Recv().Type()
		if p, ok := recv.(*types.Pointer); ok {
			recv = p.Elem()
		}
		named, ok := types.Unalias(recv).(*types.Named)
		if !ok {
			break
		}
		t, err := types.Instantiate(nil, named.Origin(), args, false)
		if err != nil {
			break
		}
		obj, _, _ := types.LookupFieldOrMethod(t, true, f.Pkg(), f.Name())
		if m, ok := obj.(*types.Func); ok {
			sig = m.Signature()
		}
	}
	if r := sig.Recv(); r != nil {
		params = append(params, pointee(r.Type()))
	}
	for i := range sig.Params().Len() {
		params = append(params, pointee(sig.Params().At(i).Type()))
	}
	for i := range sig.Results().Len() {
		results = append(results, pointee(sig.Results().At(i).Type()))
	}
	return params, results
}

func pointee(t types.Type) types.Type {
	if p, ok := t.Underlying().(*types.Pointer); ok {
		return p.Elem()
	}
	return t
}

// piecesOf takes the type of a parameter or result apart. A slice is taken for an array
// of n numbers, or for n operands if its elements are more than numbers.
func piecesOf(t types.Type, n int, parted bool) []piece {
	s, ok := t.Underlying().(*types.Slice)
	if !ok {
		return pieces(t, parted)
	}
	k, _ := words(s.Elem())
	if k <= 1 {
		return pieces(types.NewArray(s.Elem(), int64(n)), parted)
	}
	var all []piece
	for i := range n {
		for _, p := range pieces(s.Elem(), parted) {
			p.path = "[" + strconv.Itoa(i) + "]" + p.path
			p.first += i * k
			all = append(all, p)
		}
	}
	return all
}

// baseName is the name at the end of a path such as "q.Rot.W".
func baseName(name string) string {
	if i := strings.LastIndexAny(name, "."); i >= 0 {
		name = name[i+1:]
	}
	return name
}

// index is the number in a name such as "q[2]", or -1.
func index(name string) int {
	i := strings.LastIndexByte(name, '[')
	if i < 0 || !strings.HasSuffix(name, "]") {
		return -1
	}
	n, err := strconv.Atoi(name[i+1 : len(name)-1])
	if err != nil {
		return -1
	}
	return n
}
