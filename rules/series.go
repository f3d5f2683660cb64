package rules

import "dextral/core/kinematics"

// Series is what one pass over a log found out about one orientation channel.
//
// Value describes the channel as it would a single value: form, claims, the
// place of its header; its Numbers are those of the first row. The summaries
// are folds of all rows.
type Series struct {
	Value      Value
	Columns    []string // names of the columns in the order of Value.Numbers
	Rows       int64    // data rows read
	Unit       string   // unit of time stamps as far as it is known: s, ms, us, ns; "" if none
	Half       float64  // half a unit of the coarsest last digit seen in the channel's numbers
	Float32    bool     // the digits show single precision
	Continuity kinematics.Continuity

	// RowPlace gives the place of a data row: rows of text files are lines.
	RowPlace func(row int64) Place
}
