package operation

import "math"

// Identity is what a function computes, as far as samples tell.
type Identity struct {
	Readings []Reading // all that agree with every sample; none if it is no known operation
	Residual float64   // the largest error of the first reading, relative to the size of the result
	OnUnit   bool      // it was told from others on the unit manifold only: off it, nothing known fits
	Why      string    // why nothing is said
	matches  []match   // what the readings come from, one for each
}

// Known reports whether anything is known of the function.
func (id *Identity) Known() bool { return id != nil && len(id.Readings) > 0 }

// Op is the operation if all readings agree on it, else "".
func (id *Identity) Op() Op {
	if !id.Known() {
		return ""
	}
	for _, r := range id.Readings[1:] {
		if r.Op != id.Readings[0].Op {
			return ""
		}
	}
	return id.Readings[0].Op
}

// Is reports whether one of the readings is of an operation.
func (id *Identity) Is(op Op) bool {
	if id == nil {
		return false
	}
	for _, r := range id.Readings {
		if r.Op == op {
			return true
		}
	}
	return false
}

// Miss is how far the result of another sample is from what the identity has it
// be, relative to its size, in the reading that it fits best; infinite where a number
// is none. It is false where the operation is not defined for these inputs, or the
// function did not return.
func (f *Function) Miss(id *Identity, s *Sample) (miss float64, ok bool) {
	if !id.Known() || !s.OK {
		return 0, false
	}
	scratch := make([]float64, 16)
	miss = math.Inf(1)
	for _, m := range id.matches {
		t := trial{f: f}
		n := t.canonical(s, m.stored)
		if e := m.of.error(n.in, n.out, scratch); !math.IsNaN(e) {
			miss, ok = math.Min(miss, e), true
		}
	}
	return miss, ok
}

// Function is a function to be identified.
type Function struct {
	In, Out []Operand
	Single  bool           // it computes in float32
	Eval    func([]Sample) // fills in results; it may round the inputs
}

// Shape is the kinds of operands.
func (f *Function) Shape() Shape { return shapeOf(f.In, f.Out) }

// Tolerance is the largest error of a result of size one that is taken for
// rounding: the square root of the rounding unit, which is what an acos, an asin
// or a square root near its end makes of one.
func (f *Function) Tolerance() float64 {
	if f.Single {
		return 0x1p-12
	}
	return 0x1p-26
}

// Counts of samples of each family. The first of them exclude nearly all hypotheses.
const (
	unitSamples    = 20
	wideSamples    = 12
	tinySamples    = 6
	generalSamples = 12
)

// Identify tells what the function computes.
func (f *Function) Identify() *Identity {
	if !f.Shape().Known() {
		return &Identity{Why: "no known operation has these operands"}
	}
	t := newTrial(f)
	if why := t.useless(); why != "" {
		return &Identity{Why: why}
	}
	found := t.search(f.Shape().hypotheses())
	if len(found) == 0 {
		if solve := solvers[f.Shape()]; solve != nil {
			found = t.search(solve(t))
		}
	}
	if len(found) > 0 {
		found = t.confirm(found)
	}
	return t.conclude(found)
}

// match is a hypothesis that agrees with every sample on the manifold.
type match struct {
	reading Reading
	error   float64
	general bool // off it too
	of      *hypothesis
	stored  combo
}

// conclude prefers what also holds off the manifold.
func (t *trial) conclude(found []match) *Identity {
	id := &Identity{}
	general := false
	for _, m := range found {
		general = general || m.general
	}
	for _, m := range found {
		if general && !m.general {
			continue
		}
		if !general {
			if t.constant {
				continue // anything is a constant on the manifold
			}
			m.reading.Formula = AnyNorm
			id.OnUnit = true
		}
		if len(id.Readings) == 0 || m.error < id.Residual {
			id.Residual = m.error
		}
		if !contains(id.Readings, m.reading) {
			id.Readings = append(id.Readings, m.reading)
			id.matches = append(id.matches, m)
		}
	}
	if len(id.Readings) == 0 {
		id.OnUnit = false
		id.Why = "it computes none of the operations known for its operands"
	}
	return id
}

func contains(list []Reading, r Reading) bool {
	for _, k := range list {
		if sameButOrders(k, r) && equalOrders(k.Orders, r.Orders) {
			return true
		}
	}
	return false
}

func equalOrders(a, b []Order) bool {
	if len(a) != len(b) {
		return false
	}
	for i := range a {
		if a[i] != b[i] {
			return false
		}
	}
	return true
}
