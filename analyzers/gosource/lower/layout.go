package lower

import (
	"go/types"
	"strconv"

	"dextral/core/tape"
)

// maxWords bounds the words of one value: larger arrays are not numbers that
// state an orientation.
const maxWords = 4096

// layout is how a type lies in words.
type layout struct {
	fields  []tape.Field // one for each word; the paths are the author's
	numeric bool         // nothing but numbers and truth values
	floats  int          // how many words are floating point
}

func (l *layout) words() int32 { return int32(len(l.fields)) }

// layouts computes and remembers layouts. A type that has none, because it is
// too large or refers to a type parameter, gives nil.
type layouts struct {
	known map[types.Type]*layout
}

func (ls *layouts) of(t types.Type) *layout {
	if l, ok := ls.known[t]; ok {
		return l
	}
	l := &layout{numeric: true}
	if !l.add(t, "", 0) {
		l = nil
	} else {
		for _, f := range l.fields {
			if f.Kind.IsFloat() {
				l.floats++
			}
		}
	}
	ls.known[t] = l
	return l
}

// add appends the words of t and reports whether that is possible.
func (l *layout) add(t types.Type, path string, depth int) bool {
	if len(l.fields) >= maxWords || depth > 20 {
		return false
	}
	if _, ok := types.Unalias(t).(*types.TypeParam); ok {
		return false
	}
	switch u := t.Underlying().(type) {
	case *types.Basic:
		return l.basic(u, path)
	case *types.Struct:
		for i := range u.NumFields() {
			if !l.add(u.Field(i).Type(), path+"."+u.Field(i).Name(), depth+1) {
				return false
			}
		}
	case *types.Array:
		if u.Len() > maxWords {
			return false
		}
		for i := range u.Len() {
			if !l.add(u.Elem(), path+"["+strconv.FormatInt(i, 10)+"]", depth+1) {
				return false
			}
		}
	case *types.Tuple:
		for i := range u.Len() {
			if !l.add(u.At(i).Type(), path, depth+1) {
				return false
			}
		}
	case *types.Pointer:
		l.other(path, tape.Addr)
	case *types.Slice:
		l.other(path, tape.Addr)
		l.fields = append(l.fields, tape.Field{Path: path, Kind: tape.I64}, tape.Field{Path: path, Kind: tape.I64})
	case *types.Interface:
		if isError(t) {
			l.other(path, tape.Err)
		} else {
			l.other(path, tape.Opaque)
		}
	default:
		l.other(path, tape.Opaque)
	}
	return len(l.fields) <= maxWords
}

func (l *layout) other(path string, k tape.Kind) {
	l.numeric = false
	l.fields = append(l.fields, tape.Field{Path: path, Kind: k})
}

func (l *layout) basic(b *types.Basic, path string) bool {
	switch b.Kind() {
	case types.Complex64, types.UntypedComplex, types.Complex128:
		k := tape.F64
		if b.Kind() == types.Complex64 {
			k = tape.F32
		}
		l.fields = append(l.fields, tape.Field{Path: path + ".real", Kind: k}, tape.Field{Path: path + ".imag", Kind: k})
	case types.Invalid:
		return false
	case types.UnsafePointer:
		l.other(path, tape.Addr)
	default:
		k, ok := basicKinds[b.Kind()]
		if !ok {
			l.other(path, tape.Opaque)
			break
		}
		l.fields = append(l.fields, tape.Field{Path: path, Kind: k})
	}
	return true
}

// basicKinds gives the kinds of the basic types that are numbers. The width of
// int is that of the machines that fly: 64 bits.
var basicKinds = map[types.BasicKind]tape.Kind{
	types.Float64: tape.F64, types.UntypedFloat: tape.F64, types.Float32: tape.F32,
	types.Int8: tape.I8, types.Int16: tape.I16, types.Int32: tape.I32, types.Int64: tape.I64, types.Int: tape.I64,
	types.Uint8: tape.U8, types.Uint16: tape.U16, types.Uint32: tape.U32, types.Uint64: tape.U64, types.Uint: tape.U64, types.Uintptr: tape.U64,
	types.UntypedInt: tape.I64, types.UntypedRune: tape.I32,
	types.Bool: tape.Bool, types.UntypedBool: tape.Bool,
}

var errorType = types.Universe.Lookup("error").Type()

func isError(t types.Type) bool { return types.Identical(t, errorType) }

// kindOf returns the kind of a type of one word.
func (ls *layouts) kindOf(t types.Type) tape.Kind {
	if l := ls.of(t); l != nil && len(l.fields) == 1 {
		return l.fields[0].Kind
	}
	return tape.Any
}

// hasAddress reports whether any word of t is an address or something opaque
// that may hold one.
func (l *layout) hasAddress() bool {
	for _, f := range l.fields {
		if f.Kind == tape.Addr || f.Kind == tape.Opaque {
			return true
		}
	}
	return false
}
