package tape

import (
	"testing"
)

// An input that Flow says does not matter does not matter: changing it changes
// neither the outputs that it is said not to influence, nor, where it is said
// not to decide, the way taken. Words that are said not to be written are not.
func TestFlowIsSafe(t *testing.T) {
	said, exact := 0, 0
	for seed := range uint64(1200) {
		r, p, lib := programs(seed, 20+int(seed%120), seed%3 == 0)
		f := Analyze(p, lib)
		if !f.Exact {
			continue
		}
		exact++
		m, err := Link(p, lib)
		if err != nil {
			t.Fatal(err)
		}
		const n = 40
		before, after := m.NewBatch(n), m.NewBatch(n)
		ins := p.Sig.Inputs()
		for i := range ins {
			for s := range n {
				for k, in := range ins {
					w := randomWord(r, in.Kind)
					before.SetInBits(s, k, w)
					if k == i {
						w = randomWord(r, in.Kind)
					}
					after.SetInBits(s, k, w)
				}
			}
			m.Run(before)
			m.Run(after)
			for s := range n {
				if before.Outcome(s) != Returned || after.Outcome(s) != Returned {
					if !f.Decides(i) && before.Outcome(s) != after.Outcome(s) && !indexFault(before, s) && !indexFault(after, s) {
						t.Fatalf("seed %d: input %d decides: %v (%s), %v (%s)\n%s", seed, i, before.Outcome(s), before.Reason(s), after.Outcome(s), after.Reason(s), text(lib))
					}
					continue
				}
				for o, out := range p.Sig.Outputs() {
					if f.Influences(i, o) {
						continue
					}
					said++
					if before.OutBits(s, o) != after.OutBits(s, o) && !(before.Out(s, o) != before.Out(s, o) && after.Out(s, o) != after.Out(s, o)) {
						t.Fatalf("seed %d: input %d influences output %d (%s)\n%s", seed, i, o, out.Name, text(lib))
					}
				}
			}
		}
		checkWritten(t, seed, p, f, before)
	}
	t.Logf("%d programs analysed, %d times no influence", exact, said)
	if exact < 1000 || said < 100000 {
		t.Errorf("too little was tested: %d programs, %d times", exact, said)
	}
}

// indexFault reports an end that no branch decides: an index, a division.
func indexFault(b *Batch, s int) bool { return b.faults[s] < noFault || b.outcomes[s] == Undecided }

func checkWritten(t *testing.T, seed uint64, p *Program, f *Flow, b *Batch) {
	for o, out := range p.Sig.Outputs() {
		if out.Param < 0 || f.Written(o) {
			continue
		}
		for s := range b.Len() {
			in := 0
			for i, port := range p.Sig.Inputs() {
				if port.Param == out.Param && port.Field == out.Field {
					in = i
				}
			}
			if b.Outcome(s) == Returned && b.OutBits(s, o) != b.InBits(s, in) {
				t.Fatalf("seed %d: output %d is written\n%s", seed, o, p)
			}
		}
	}
}
