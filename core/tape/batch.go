package tape

import "math"

// Batch holds the inputs of a number of samples and, after [Machine.Run], what
// came out. It is allocated once and used again.
type Batch struct {
	m         *Machine
	n         int
	in, out   []uint64 // input by input, output by output
	unknown   []bool   // parallel to out; nil if nothing can be unknown
	outcomes  []Outcome
	faults    []fault
	edges     []uint64 // two bits for each branch, sample by sample
	edgeWords int
}

// NewBatch returns a batch of n samples, all inputs zero.
func (m *Machine) NewBatch(n int) *Batch {
	b := &Batch{m: m, n: n, edgeWords: (len(m.branches) + 31) / 32}
	b.in = make([]uint64, n*len(m.inputs))
	b.out = make([]uint64, n*len(m.outputs))
	if m.unk != nil {
		b.unknown = make([]bool, len(b.out))
	}
	b.outcomes = make([]Outcome, n)
	b.faults = make([]fault, n)
	b.edges = make([]uint64, n*b.edgeWords)
	return b
}

// Len returns the number of samples.
func (b *Batch) Len() int { return b.n }

// Inputs describes the inputs, as [Signature.Inputs].
func (b *Batch) Inputs() []Port { return b.m.inputs }

// Outputs describes the outputs, as [Signature.Outputs].
func (b *Batch) Outputs() []Port { return b.m.outputs }

// Set sets input i of sample s to f, rounded to float32 or cut to an integer
// as the kind of the input demands. For a bool anything but 0 is true.
func (b *Batch) Set(s, i int, f float64) {
	b.in[i*b.n+s] = fromFloat(b.m.inputs[i].Kind, f)
}

// SetInt sets input i of sample s to an integer, wrapped to the width of the
// input.
func (b *Batch) SetInt(s, i int, v int64) {
	k := b.m.inputs[i].Kind
	w := wrap(k, uint64(v))
	if k.IsFloat() || k == Bool {
		w = fromFloat(k, float64(v))
	}
	b.in[i*b.n+s] = w
}

// In returns input i of sample s as a number.
func (b *Batch) In(s, i int) float64 {
	return toFloat(b.m.inputs[i].Kind, b.in[i*b.n+s])
}

// SetInBits sets input i of sample s as the word that holds it.
func (b *Batch) SetInBits(s, i int, w uint64) { b.in[i*b.n+s] = w }

// InBits returns input i of sample s as the word that holds it.
func (b *Batch) InBits(s, i int) uint64 { return b.in[i*b.n+s] }

// Out returns output i of sample s as a number: NaN where it is unknown or the
// program did not return. A bool is 0 or 1, an error 0 (nil) or 1.
func (b *Batch) Out(s, i int) float64 {
	if !b.Known(s, i) {
		return math.NaN()
	}
	return toFloat(b.m.outputs[i].Kind, b.out[i*b.n+s])
}

// OutBits returns output i of sample s as the word that holds it.
func (b *Batch) OutBits(s, i int) uint64 { return b.out[i*b.n+s] }

// Known reports whether output i of sample s is a known value of a program
// that returned.
func (b *Batch) Known(s, i int) bool {
	return b.outcomes[s] == Returned && (b.unknown == nil || !b.unknown[i*b.n+s])
}

// Outcome tells how sample s ended.
func (b *Batch) Outcome(s int) Outcome { return b.outcomes[s] }

// Reason says in words why sample s did not return, "" if it did.
func (b *Batch) Reason(s int) string {
	switch f := b.faults[s]; {
	case f == noFault:
		return ""
	case f >= 0:
		return b.m.reasons[f]
	default:
		return faults[f].text
	}
}

// Took reports whether sample s went through branch i of [Machine.Branches]
// with its condition being true, or false.
func (b *Batch) Took(s, i int, condition bool) bool {
	w := b.edges[s*b.edgeWords+i>>5] >> (2 * (i & 31))
	if condition {
		return w&2 != 0
	}
	return w&1 != 0
}

// Path returns the branches that sample s took, two bits for each branch of
// [Machine.Branches]: two samples with the same path took the same sides.
func (b *Batch) Path(s int) []uint64 { return b.edges[s*b.edgeWords : (s+1)*b.edgeWords] }

func fromFloat(k Kind, f float64) uint64 {
	switch {
	case k == F64:
		return word(f)
	case k == F32:
		return word32(float32(f))
	case k == Bool:
		return bit(f != 0)
	}
	return truncate(k, f)
}

func toFloat(k Kind, w uint64) float64 {
	switch {
	case k == F64:
		return float(w)
	case k == F32:
		return float64(float32of(w))
	case k == Err:
		return float64(bit(w != 0))
	case k == U64:
		return float64(w)
	}
	return float64(int64(w))
}
