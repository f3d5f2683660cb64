package lower

import (
	"go/constant"
	"go/types"

	"golang.org/x/tools/go/ssa"

	"dextral/core/tape"
)

// alloc makes an object. It lies in the frame if no pointer to it can outlive
// the call, in fresh memory otherwise.
func (b *builder) alloc(v *ssa.Alloc) {
	n := b.words(b.typeOf(v).Underlying().(*types.Pointer).Elem())
	if v.Heap && escapes(v, map[ssa.Value]bool{}) {
		d := b.define(v)
		b.emit(tape.Instr{Op: tape.New, Dst: d.slot, C: n})
		return
	}
	s := b.temp(n)
	b.vals[v] = val{n: 1, at: objectAt(s, n)}
	if n > 0 {
		b.emit(tape.Instr{Op: tape.Zero, Dst: s, C: n})
	}
}

// escapes reports whether a pointer derived from v may be held anywhere when
// the function is done or the statement is executed again.
func escapes(v ssa.Value, seen map[ssa.Value]bool) bool {
	if seen[v] {
		return false
	}
	seen[v] = true
	for _, r := range *v.Referrers() {
		switch r := r.(type) {
		case *ssa.FieldAddr:
			if escapes(r, seen) {
				return true
			}
		case *ssa.IndexAddr:
			if escapes(r, seen) {
				return true
			}
		case *ssa.Slice:
			if escapes(r, seen) {
				return true
			}
		case *ssa.ChangeType:
			if escapes(r, seen) {
				return true
			}
		case *ssa.UnOp, *ssa.DebugRef, *ssa.BinOp:
		case *ssa.Store:
			if r.Val == v {
				return true
			}
		case *ssa.Call:
			if !borrows(r) {
				return true
			}
		default:
			return true
		}
	}
	return false
}

// borrows reports whether a call cannot keep an address that it is given: the
// results hold none, and no argument points to a place that could.
func borrows(c *ssa.Call) bool {
	if holdsAddress(c.Type(), 0) {
		if bi, ok := c.Call.Value.(*ssa.Builtin); !ok || bi.Name() == "append" {
			return false
		}
	}
	for _, a := range c.Call.Args {
		switch t := a.Type().Underlying().(type) {
		case *types.Pointer:
			if holdsAddress(t.Elem(), 0) {
				return false
			}
		case *types.Slice:
			if holdsAddress(t.Elem(), 0) {
				return false
			}
		case *types.Basic, *types.Struct, *types.Array:
		default:
			return false
		}
	}
	return c.Call.StaticCallee() != nil || isBuiltin(c)
}

func isBuiltin(c *ssa.Call) bool {
	_, ok := c.Call.Value.(*ssa.Builtin)
	return ok
}

// holdsAddress reports whether a value of type t may hold an address.
func holdsAddress(t types.Type, depth int) bool {
	if depth > 20 {
		return true
	}
	switch u := t.Underlying().(type) {
	case *types.Basic:
		return u.Kind() == types.UnsafePointer
	case *types.Array:
		return holdsAddress(u.Elem(), depth+1)
	case *types.Struct:
		for i := range u.NumFields() {
			if holdsAddress(u.Field(i).Type(), depth+1) {
				return true
			}
		}
		return false
	case *types.Tuple:
		for i := range u.Len() {
			if holdsAddress(u.At(i).Type(), depth+1) {
				return true
			}
		}
		return false
	}
	return true
}

func (b *builder) fieldAddr(v *ssa.FieldAddr) {
	t := b.typeOf(v.X).Underlying().(*types.Pointer).Elem()
	a := b.address(v.X)
	f := t.Underlying().(*types.Struct).Field(v.Field).Type()
	b.vals[v] = val{n: 1, at: a.field(b.fieldOffset(t, v.Field), b.words(f))}
}

// indexAddr is the address of an element of an array or slice.
func (b *builder) indexAddr(v *ssa.IndexAddr) {
	switch t := b.typeOf(v.X).Underlying().(type) {
	case *types.Pointer:
		array := t.Elem().Underlying().(*types.Array)
		n := b.words(array.Elem())
		a := b.address(v.X).array(n * int32(array.Len()))
		if i, ok := constIndex(v.Index); ok && i >= 0 && i < array.Len() {
			b.vals[v] = val{n: 1, at: a.element(int32(i) * n)}
			return
		}
		base := b.addressWord(a)
		b.vals[v] = val{n: 1, at: b.element(base, v.Index, b.integer(array.Len()), n)}
	case *types.Slice:
		x := b.value(v.X)
		b.vals[v] = val{n: 1, at: b.element(x.slot, v.Index, x.slot+1, b.words(t.Elem()))}
	default:
		b.fail("indexes a %v", b.typeOf(v.X))
	}
}

// element is the address of an element at an index known only at run time.
func (b *builder) element(base int32, index ssa.Value, length, words int32) *spot {
	i := b.value(index).slot
	b.emit(tape.Instr{Op: tape.Bound, A: i, B: length})
	if k, ok := constIndex(index); ok && k*int64(words) < 1<<17 {
		return &spot{base: inSlot, slot: base, off: int32(k) * words}
	}
	d := b.temp(1)
	b.emit(tape.Instr{Op: tape.Elem, Dst: d, A: base, B: i, C: words})
	return &spot{base: inSlot, slot: d}
}

func constIndex(v ssa.Value) (int64, bool) {
	c, ok := v.(*ssa.Const)
	if !ok || c.Value == nil {
		return 0, false
	}
	return c.Int64(), true
}

// index is an element of an array that is a value, or of a constant string.
func (b *builder) index(v *ssa.Index) {
	if c, ok := v.X.(*ssa.Const); ok && c.Value != nil && c.Value.Kind() == constant.String {
		b.indexString(v, constant.StringVal(c.Value))
		return
	}
	array, ok := b.typeOf(v.X).Underlying().(*types.Array)
	if !ok {
		b.fail("indexes a %v", b.typeOf(v.X))
	}
	x := b.value(v.X)
	n := b.words(array.Elem())
	if i, ok := constIndex(v.Index); ok {
		b.vals[v] = val{slot: x.slot + int32(i)*n, n: n}
		return
	}
	// An address is needed, and so a copy that has one.
	s := b.temp(x.n)
	b.emit(tape.Instr{Op: tape.Copy, Dst: s, A: x.slot, C: x.n})
	base := b.addressWord(objectAt(s, x.n))
	a := b.element(base, v.Index, b.integer(array.Len()), n)
	d := b.define(v)
	b.load(a, n, d.slot)
}

// indexString is a byte of a constant string, which becomes data.
func (b *builder) indexString(v *ssa.Index, text string) {
	if len(text) == 0 || len(text) > maxWords {
		b.fail("indexes a string")
	}
	a := &spot{base: inData, slot: int32(len(b.p.Data))}
	for _, c := range []byte(text) {
		b.p.Data = append(b.p.Data, tape.Const{Kind: tape.U8, Bits: uint64(c)})
	}
	e := b.element(b.addressWord(a), v.Index, b.integer(int64(len(text))), 1)
	d := b.define(v)
	b.load(e, 1, d.slot)
}

// arrayPointer converts a slice to the address of an array, which panics if
// the slice is shorter.
func (b *builder) arrayPointer(v *ssa.SliceToArrayPointer) {
	x := b.value(v.X)
	n := b.typeOf(v).Underlying().(*types.Pointer).Elem().Underlying().(*types.Array).Len()
	b.emit(tape.Instr{Op: tape.BoundSlice, A: b.integer(0), B: b.integer(n), C: x.slot + 1})
	b.vals[v] = val{slot: x.slot, n: 1}
}

// slice is x[low:high:max] of a slice or of an array by its address.
func (b *builder) slice(v *ssa.Slice) {
	var addr, length, room, words int32
	switch t := b.typeOf(v.X).Underlying().(type) {
	case *types.Pointer:
		array := t.Elem().Underlying().(*types.Array)
		addr = b.addressWord(b.address(v.X).array(b.words(t.Elem())))
		length = b.integer(array.Len())
		room, words = length, b.words(array.Elem())
	case *types.Slice:
		x := b.value(v.X)
		addr, length, room, words = x.slot, x.slot+1, x.slot+2, b.words(t.Elem())
	default:
		b.fail("slices a %v", b.typeOf(v.X))
	}
	d := b.define(v)
	low := b.integer(0)
	high := length
	if v.Low != nil {
		low = b.value(v.Low).slot
	}
	if v.High != nil {
		high = b.value(v.High).slot
	}
	if v.Max != nil {
		most := b.value(v.Max).slot
		b.emit(tape.Instr{Op: tape.BoundSlice, A: high, B: most, C: room})
		room = most
	}
	if v.Low != nil || v.High != nil {
		b.emit(tape.Instr{Op: tape.BoundSlice, A: low, B: high, C: room})
	}
	if v.Low == nil {
		b.emit(tape.Instr{Op: tape.Copy, Dst: d.slot, A: addr, C: 1})
		b.emit(tape.Instr{Op: tape.Copy, Dst: d.slot + 1, A: high, C: 1})
		b.emit(tape.Instr{Op: tape.Copy, Dst: d.slot + 2, A: room, C: 1})
		return
	}
	b.emit(tape.Instr{Op: tape.Elem, Dst: d.slot, A: addr, B: low, C: words})
	b.emit(tape.Instr{Op: tape.SubI, Dst: d.slot + 1, A: high, B: low})
	b.emit(tape.Instr{Op: tape.SubI, Dst: d.slot + 2, A: room, B: low})
}

// makeSlice is make([]T, length, capacity).
func (b *builder) makeSlice(v *ssa.MakeSlice) {
	n := b.words(b.typeOf(v).Underlying().(*types.Slice).Elem())
	length, room := b.value(v.Len).slot, b.value(v.Cap).slot
	if n == 0 {
		b.fail("makes a slice of nothing")
	}
	d := b.define(v)
	if length != room {
		b.emit(tape.Instr{Op: tape.BoundSlice, A: b.integer(0), B: length, C: room})
	}
	b.emit(tape.Instr{Op: tape.Make, Dst: d.slot, A: room, C: n})
	b.emit(tape.Instr{Op: tape.Copy, Dst: d.slot + 1, A: length, C: 1})
	b.emit(tape.Instr{Op: tape.Copy, Dst: d.slot + 2, A: room, C: 1})
}
