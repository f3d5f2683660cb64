package measure

import (
	"cmp"
	"go/types"
	"slices"

	"dextral/core/convention"
	"dextral/core/operation"
)

// Type is a named type whose values are four, nine or sixteen numbers, with what
// all functions of the package together say of it.
type Type struct {
	Name       string // with the path of its package
	Object     *types.TypeName
	Kind       operation.Kind
	Orders     []operation.Order  // of a quaternion: those that agree with all functions but Outliers; all 24 where nothing tells
	Storage    convention.Storage // of a matrix: as its products and its images of vectors have it
	Rotational []*Function        // functions that treat its values as rotations
	Outliers   []*Function        // functions that store it otherwise than most
}

// Decided reports whether the storage order is known.
func (t *Type) Decided() bool {
	if t.Kind == operation.Quaternion {
		return len(t.Orders) == 1
	}
	return t.Storage != convention.StorageUnstated
}

// tells lists the operations that depend on the storage order of a quaternion, and whose
// hypotheses are tried in all orders. An accessor tells nothing: any
// component may be the one that is asked for.
var tells = map[operation.Op]bool{
	operation.Product: true, operation.Quotient: true, operation.Conjugate: true, operation.NegConjugate: true,
	operation.Inverse: true, operation.RotateVector: true, operation.ToMatrix: true, operation.FromMatrix: true,
	operation.FromAxisAngle: true, operation.AxisAngleOf: true, operation.RotvecOf: true, operation.FromRotvec: true,
	operation.TwoVectors: true, operation.Exponential: true, operation.Logarithm: true, operation.Derivative: true,
	operation.Step: true, operation.TurnAngle: true, operation.AxisTurn: true,
}

// typeTable collects types.
type typeTable struct {
	byName map[string]*Type
	votes  map[*Type][]vote
}

// vote is what one function says of a quaternion type.
type vote struct {
	f      *Function
	orders []operation.Order
	weak   bool // a change of signs, which is a conjugate only if it is one for the others
}

// typesOf finds out what the named types of the package's functions are. Types
// of imported packages start with what is known of them there.
func typesOf(funcs []*Function, imported func(*types.TypeName) *Type) *typeTable {
	t := &typeTable{byName: map[string]*Type{}, votes: map[*Type][]vote{}}
	for _, f := range funcs {
		for _, c := range f.Cases {
			t.see(f, c, imported)
		}
	}
	for typ, votes := range t.votes {
		typ.settle(votes)
	}
	return t
}

func (t *typeTable) entry(o Operand, imported func(*types.TypeName) *Type) *Type {
	named, ok := types.Unalias(o.Go).(*types.Named)
	if o.Go == nil || !ok || o.Kind < operation.Quaternion {
		return nil
	}
	typ := t.byName[o.Type]
	if typ == nil {
		typ = &Type{Name: o.Type, Object: named.Obj(), Kind: o.Kind, Orders: operation.Orders}
		if known := imported(named.Obj()); known != nil && known.Kind == o.Kind {
			typ.Orders, typ.Storage = known.Orders, known.Storage
		}
		t.byName[o.Type] = typ
	}
	return typ
}

// see notes what one case says of the types of its operands.
func (t *typeTable) see(f *Function, c *Case, imported func(*types.TypeName) *Type) {
	at := 0
	for _, o := range slices.Concat(c.In, c.Out) {
		typ := t.entry(o, imported)
		if o.Kind == operation.Quaternion {
			at++
		}
		if typ == nil || !c.Identity.Known() {
			continue
		}
		r := c.Identity.Readings[0]
		if r.Rotational() && !slices.Contains(typ.Rotational, f) {
			typ.Rotational = append(typ.Rotational, f)
		}
		if o.Kind == operation.Quaternion && !f.Untold(c) {
			t.votes[typ] = append(t.votes[typ], vote{f, ordersAt(c.Identity.Readings, at-1), !r.Rotational()})
		}
		if storage := storageBy(c.Identity); o.Kind != operation.Quaternion && storage != 0 && (typ.Storage == 0 || c.Identity.Is(operation.RotateVector)) {
			typ.Storage = storage
		}
	}
}

// Untold reports whether a case says nothing of the storage of its
// quaternions.
func (f *Function) Untold(c *Case) bool {
	return slices.ContainsFunc(c.Identity.Readings, func(r operation.Reading) bool { return !tells[r.Op] })
}

// storageBy is how a matrix type is stored if what the function does is meant
// to be a product in the order of the operands, or the image of a column.
func storageBy(id *operation.Identity) convention.Storage {
	if len(id.Readings) != 1 {
		return 0
	}
	r := id.Readings[0]
	columns := false
	switch {
	case r.Op == operation.MatrixProduct && r.Reversed == [2]bool{}:
		columns = r.Swapped
	case r.Op == operation.RotateVector && r.Axis == "" && len(r.Detail) > 10, r.Op == operation.LinearMap && r.Map == nil:
		columns = r.Reversed[0]
	default:
		return 0
	}
	if columns {
		return convention.ColumnMajor
	}
	return convention.RowMajor
}

func ordersAt(readings []operation.Reading, at int) []operation.Order {
	var all []operation.Order
	for _, r := range readings {
		if at < len(r.Orders) && !slices.Contains(all, r.Orders[at]) {
			all = append(all, r.Orders[at])
		}
	}
	return all
}

// settle keeps the orders that most functions agree with.
func (t *Type) settle(votes []vote) {
	count := func(o operation.Order) (n int) {
		for _, v := range votes {
			if slices.Contains(v.orders, o) {
				n++
			}
		}
		return n
	}
	most := 0
	for _, o := range t.Orders {
		most = max(most, count(o))
	}
	if most == 0 {
		return
	}
	t.Orders = slices.DeleteFunc(slices.Clone(t.Orders), func(o operation.Order) bool { return count(o) < most })
	for _, v := range votes {
		if !v.weak && !slices.ContainsFunc(v.orders, func(o operation.Order) bool { return slices.Contains(t.Orders, o) }) && !slices.Contains(t.Outliers, v.f) {
			t.Outliers = append(t.Outliers, v.f)
		}
	}
}

// order is the one to assume of a type: the one known, or the one that its
// field names suggest, if that is possible.
func (t *Type) order(names []string) (operation.Order, bool) {
	if t != nil && len(t.Orders) == 1 {
		return t.Orders[0], true
	}
	o, ok := orderOfNames(names)
	if !ok || t != nil && !slices.Contains(t.Orders, o) {
		return operation.Order{}, false
	}
	return o, true
}

// orderOfNames reads the order off what the four numbers are called.
func orderOfNames(names []string) (operation.Order, bool) {
	var o operation.Order
	var seen [4]bool
	for place, name := range names {
		k, ok := component(name)
		if !ok || seen[k] {
			return operation.Order{}, false
		}
		seen[k] = true
		o[k] = uint8(place)
	}
	return o, len(names) == 4
}

// sorted lists the types by name.
func (t *typeTable) sorted() []*Type {
	var all []*Type
	for _, typ := range t.byName {
		all = append(all, typ)
	}
	slices.SortFunc(all, func(a, b *Type) int { return cmp.Compare(a.Name, b.Name) })
	return all
}
