package measure

import (
	"slices"
	"strings"

	"dextral/core/convention"
	"dextral/core/operation"
)

// Meaning words what a case computes, and whether that is decided. The storage of
// matrices is taken into account: active in rows is passive in columns, and where the
// storage is not known, both are said.
func (r *Result) Meaning(c *Case) (text string, decided bool) {
	if !c.Identity.Known() {
		return c.Identity.Why, false
	}
	var all []string
	for _, reading := range c.Identity.Readings {
		if text := r.word(c, reading); !slices.Contains(all, text) {
			all = append(all, text)
		}
	}
	if len(all) > 3 {
		all = append(all[:3], "others")
	}
	return strings.Join(all, "; or "), len(all) == 1
}

// word words one reading.
func (r *Result) word(c *Case, reading operation.Reading) string {
	storage, some := r.storage(c)
	if !some || !reading.Op.Directed() {
		return reading.String()
	}
	switch storage {
	case convention.ColumnMajor:
		return flipped(reading).String() + ", matrix column by column"
	case convention.RowMajor:
		return reading.String() + ", matrix row by row"
	}
	return reading.String() + ", if the matrix stands row by row (else " + direction(flipped(reading)) + ")"
}

// flipped is the reading with the matrix stored the other way.
func flipped(r operation.Reading) operation.Reading {
	if r.Op == operation.MatrixProduct {
		r.Swapped = !r.Swapped
		return r
	}
	r.Reversed[0] = !r.Reversed[0]
	return r
}

func direction(r operation.Reading) string {
	switch {
	case r.Op == operation.MatrixProduct && r.Swapped:
		return "in reverse order"
	case r.Op == operation.MatrixProduct:
		return "in the order given"
	case r.Reversed[0]:
		return "passive"
	}
	return "active"
}

// storage is how the first matrix among the operands is stored, and whether there is one.
func (r *Result) storage(c *Case) (convention.Storage, bool) {
	for _, o := range slices.Concat(c.In, c.Out) {
		if o.Kind != operation.Matrix3 && o.Kind != operation.Matrix4 {
			continue
		}
		if t := r.Type(o.Type); t != nil {
			return t.Storage, true
		}
		return convention.StorageUnstated, true
	}
	return convention.StorageUnstated, false
}
