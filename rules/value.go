package rules

import (
	"dextral/core/angle"
	"dextral/core/convention"
)

// Number is one number as it stands in a file.
type Number struct {
	Text  string  // as written, without quotes
	Value float64 // may be NaN or infinite where the format can write that
	Place Place
}

// Value is a group of numbers that says something about an orientation.
//
// Numbers keeps the written order, except that named quaternion components
// come as w, x, y, z (with a Label claim of ScalarFirst) and the rows of a
// matrix come one after the other unless a Storage claim says otherwise. For a
// triad the numbers are its first, second and third axis, one after the other.
// An axis map is its 3x3, row by row.
type Value struct {
	Form      convention.Form
	Key       string        // where it stands in the structure of the file: cameras.front.q_body_cam
	Moment    string        // when it holds, of one state of a motion; "": always
	Of        string        // the orientation it states: values of one file with equal non-empty Of state the same one
	Subscript [2]string     // the two frames of a key such as T_a_b, in written order; which of them the coordinates come from is open
	Place     Place         // from the first to the last number, or the whole bracket
	KeyAt     Place         // where the key stands; zero if there is none
	Numbers   []Number      // see above
	Rows      int           // matrices: 3 or 4
	Cols      int           // matrices: 3 or 4
	Nested    bool          // matrices: each row has brackets of its own, or the format fills row by row
	Roles     [3]angle.Role // angles: what the numbers are called, in written order
	Claims    Claims
	Why       string // why it is undecided; "" if it is read

	Uncertainty float64 // declared uncertainty of the orientation in radians; 0 = none declared
	Offset      float64 // declared uncertainty of the translation, in its unit; 0 = none declared
	Double      bool    // declared to carry double precision

	trial bool // made up to judge an edit
}

// Decided reports whether the value is read as one thing. Rules judge no other.
func (v *Value) Decided() bool { return v.Why == "" && v.Form != convention.NoForm }

// Floats returns the numbers alone.
func (v *Value) Floats() []float64 {
	f := make([]float64, len(v.Numbers))
	for i, n := range v.Numbers {
		f[i] = n.Value
	}
	return f
}

// FormClaim is the claim that decides what the value is. Rules take the level
// of a finding from it.
func (v *Value) FormClaim() (Claim, bool) { return v.Claims.On(convention.OfForm) }
