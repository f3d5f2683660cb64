package measure

import (
	"go/types"
	"slices"

	"dextral/core/operation"
)

// identify asks what every case of the function computes, for each way to
// see its numbers until one is known.
func (f *Function) identify() {
	for _, c := range f.Cases {
		f.identifyCase(c)
	}
	f.Layout = f.Cases[0].Layout
}

func (f *Function) identifyCase(c *Case) {
	for i, l := range f.Layouts {
		c.Layout = l
		if id := f.Question(c).Identify(); id.Known() || i == 0 {
			c.Identity = id
			if id.Known() {
				return
			}
		}
	}
	c.Layout = f.Layouts[0]
}

// Question is a case of the function as package operation sees it: Identify and Explain are
// asked of it.
func (f *Function) Question(c *Case) *operation.Function {
	q := &operation.Function{Single: f.Single, Eval: func(s []operation.Sample) { f.Evaluate(c, s) }}
	for _, o := range c.In {
		q.In = append(q.In, o.Operand)
	}
	for _, o := range c.Out {
		q.Out = append(q.Out, o.Operand)
	}
	return q
}

// settle finds out how types are stored and asks again with that knowledge: it
// leaves fewer readings, and storage that is not customary is tried at all only then.
func (r *Result) settle() {
	table := typesOf(r.Funcs, func(name *types.TypeName) *Type {
		if m := r.imported(name.Pkg()).Type(types.TypeString(name.Type(), nil)); m != nil {
			return &Type{Kind: m.Kind, Orders: m.Orders, Storage: m.Storage}
		}
		return nil
	})
	r.Types = table.sorted()
	for _, f := range r.Funcs {
		changed := false
		for i := range f.Layouts {
			changed = f.Layouts[i].settle(table) || changed
		}
		if !changed {
			continue
		}
		outlier := slices.ContainsFunc(r.Types, func(t *Type) bool { return slices.Contains(t.Outliers, f) })
		for _, c := range f.Cases {
			c.settle(table)
			if before := c.Identity; !outlier && (!before.Known() || len(before.Readings) > 1 || c.strays()) {
				if f.identifyCase(c); !c.Identity.Known() && before.Known() && !c.strays() {
					c.Identity = before
				}
			}
		}
		f.Layout = f.Cases[0].Layout
	}
}

// settle gives the quaternions of a layout the order that is known of their
// types, or suggested by names. It reports whether any got one.
func (l *Layout) settle(table *typeTable) bool {
	changed := false
	for _, list := range [][]Operand{l.In, l.Out} {
		for i := range list {
			o := &list[i]
			if o.Kind != operation.Quaternion || o.Order.Known() {
				continue
			}
			if order, ok := table.byName[o.Type].order(o.Names); ok {
				o.Order = order
				changed = true
			}
		}
	}
	return changed
}

// strays reports whether a case was identified in another storage than is known by
// now of its operands.
func (c *Case) strays() bool {
	if !c.Identity.Known() {
		return false
	}
	at := 0
	orders := c.Identity.Readings[0].Orders
	for _, o := range slices.Concat(c.In, c.Out) {
		if o.Kind != operation.Quaternion {
			continue
		}
		if at < len(orders) && o.Order.Known() && orders[at] != o.Order {
			return true
		}
		at++
	}
	return false
}
