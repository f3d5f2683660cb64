package tape

import (
	"fmt"
	"math"
	"math/rand/v2"
	"testing"
)

// interesting are float64 values at which programs go wrong.
var interesting = []float64{0, math.Copysign(0, -1), 1, -1, 0.5, 2, 3, math.Pi, 1e-300, 1e300, math.Inf(1), math.Inf(-1), math.NaN(), 7, -2.25}

func randomWord(r *rand.Rand, k Kind) uint64 {
	f := r.NormFloat64()
	if r.IntN(3) == 0 {
		f = interesting[r.IntN(len(interesting))]
	}
	switch {
	case k == F64:
		return word(f)
	case k == F32:
		return word32(float32(f))
	case k == Bool:
		return uint64(r.IntN(2))
	}
	return wrap(k, uint64(r.IntN(9)-3))
}

// sameBits compares a word with a value of the reference; any NaN is as good
// as any other.
func sameBits(k Kind, w uint64, v any) bool {
	if v == nil {
		return w == 0
	}
	if f, ok := v.(float64); ok && f != f {
		return float(w) != float(w)
	}
	if f, ok := v.(float32); ok && f != f {
		return float32of(w) != float32of(w)
	}
	return w == toWord(v)
}

// compare runs a program through machine and reference on n samples.
func compare(p *Program, lib Library, r *rand.Rand, n int) error {
	m, err := Link(p, lib)
	if err != nil {
		return err
	}
	b := m.NewBatch(n)
	for s := range n {
		for i, in := range b.Inputs() {
			b.SetInBits(s, i, randomWord(r, in.Kind))
		}
	}
	m.Run(b)
	m.Run(b) // nothing may be left over from the run before
	for s := range n {
		if err := compareSample(p, lib, m, b, s); err != nil {
			return fmt.Errorf("sample %d of %d: %w", s, n, err)
		}
	}
	return nil
}

func compareSample(p *Program, lib Library, m *Machine, b *Batch, s int) error {
	var in []uint64
	for i := range b.Inputs() {
		in = append(in, b.InBits(s, i))
	}
	want, outcome, why, taken := refRun(p, lib, in)
	if got := b.Outcome(s); got != outcome {
		return fmt.Errorf("outcome %v (%s), want %v (%s)", got, b.Reason(s), outcome, why)
	}
	for i, br := range m.Branches() {
		sides := taken[br.Program][branchIndex(br)]
		if b.Took(s, i, false) != sides[0] || b.Took(s, i, true) != sides[1] {
			return fmt.Errorf("branch %d: sides %v %v, want %v", i, b.Took(s, i, false), b.Took(s, i, true), sides)
		}
	}
	for i := range want {
		_, unknown := want[i].(unknownValue)
		if b.Known(s, i) == unknown {
			return fmt.Errorf("output %d: known %v", i, b.Known(s, i))
		}
		if !unknown && !sameBits(b.Outputs()[i].Kind, b.OutBits(s, i), want[i]) {
			return fmt.Errorf("output %d: %v (%#x), want %v", i, b.Out(s, i), b.OutBits(s, i), want[i])
		}
	}
	return nil
}

func branchIndex(br BranchRef) int32 {
	for i := range br.Program.Branches {
		if &br.Program.Branches[i] == br.Branch {
			return int32(i)
		}
	}
	return -1
}

// programs generates a program with two others that it may call.
func programs(seed uint64, size int, wild bool) (*rand.Rand, *Program, Library) {
	r := rand.New(rand.NewPCG(seed, 7))
	lib := Library{}
	var list []*Program
	for i := range 3 {
		p := generate(r, fmt.Sprintf("f%d", i), list, size, wild)
		list = append(list, p)
		lib[p.Name] = p
	}
	return r, list[2], lib
}

func text(lib Library) string {
	s := ""
	for _, n := range []string{"f0", "f1", "f2"} {
		s += lib[n].String()
	}
	return s
}

// The machine computes what the reference computes, bit for bit, with the same
// outcome, the same unknown values and the same branches taken.
func TestMachineAgainstReference(t *testing.T) {
	returned := 0
	for seed := range uint64(1500) {
		r, p, lib := programs(seed, 30+int(seed%200), seed%2 == 1)
		if err := compare(p, lib, r, 1+int(seed%130)); err != nil {
			t.Fatalf("seed %d: %v\n%s", seed, err, text(lib))
		}
		returned++
	}
}

// An optimised program computes what it did before.
func TestOptimiseKeepsMeaning(t *testing.T) {
	for seed := range uint64(1500) {
		r, p, lib := programs(seed, 30+int(seed%200), seed%2 == 1)
		before := text(lib)
		n := len(p.Code)
		for _, q := range lib {
			q.Optimize()
		}
		if err := p.Check(); err != nil {
			t.Fatalf("seed %d: %v\n%s\n%s", seed, err, before, text(lib))
		}
		if len(p.Code) > n {
			t.Errorf("seed %d: %d instructions became %d", seed, n, len(p.Code))
		}
		again, _, _ := programs(seed, 30+int(seed%200), seed%2 == 1)
		_ = again
		if err := sameMeaning(seed, p, lib, r); err != nil {
			t.Fatalf("seed %d: %v\nbefore\n%s\nafter\n%s", seed, err, before, text(lib))
		}
	}
}

// sameMeaning compares the machine on the optimised program with the reference
// on the original.
func sameMeaning(seed uint64, p *Program, lib Library, r *rand.Rand) error {
	_, original, originals := programs(seed, 30+int(seed%200), seed%2 == 1)
	m, err := Link(p, lib)
	if err != nil {
		return err
	}
	const n = 70
	b := m.NewBatch(n)
	for s := range n {
		for i, in := range b.Inputs() {
			b.SetInBits(s, i, randomWord(r, in.Kind))
		}
	}
	m.Run(b)
	for s := range n {
		var in []uint64
		for i := range b.Inputs() {
			in = append(in, b.InBits(s, i))
		}
		want, outcome, why, _ := refRun(original, originals, in)
		if b.Outcome(s) != outcome {
			return fmt.Errorf("outcome %v (%s), want %v (%s)", b.Outcome(s), b.Reason(s), outcome, why)
		}
		for i := range want {
			_, unknown := want[i].(unknownValue)
			if b.Known(s, i) == unknown || !unknown && !sameBits(b.Outputs()[i].Kind, b.OutBits(s, i), want[i]) {
				return fmt.Errorf("sample %d, output %d: %v, want %v", s, i, b.Out(s, i), want[i])
			}
		}
	}
	return nil
}
