package identify

import (
	"testing"

	"dextral/core/rotor"
)

// unrelated is an orientation that no reading of the aircraft's angles gives, so that
// the whole set is searched.
var unrelated = rotor.FromQuaternion(0.1825741858350554, 0.3651483716701107, 0.5477225575051661, 0.7302967433402214)

// The whole documented set, for angles against a quaternion.
func BenchmarkAnglesQuaternionWholeSet(b *testing.B) {
	a, q := ternAngles(b), quaternion(unrelated)
	b.ReportAllocs()
	for b.Loop() {
		Same(a, q)
	}
}

func BenchmarkAnglesQuaternionNothingClaimed(b *testing.B) {
	a, q := ternAngles(b), quaternion(unrelated)
	a.Claim, q.Claim = Claim{}, Claim{}
	b.ReportAllocs()
	for b.Loop() {
		Same(a, q)
	}
}

func BenchmarkAnglesQuaternionAgree(b *testing.B) {
	a, q := ternAngles(b), quaternion(tern)
	b.ReportAllocs()
	for b.Loop() {
		Same(a, q)
	}
}

func BenchmarkQuaternionMatrixWholeSet(b *testing.B) {
	m, q := matrixOf(tern), quaternion(unrelated)
	b.ReportAllocs()
	for b.Loop() {
		Same(q, m)
	}
}

func BenchmarkAnglesAnglesWholeSet(b *testing.B) {
	a, c := ternAngles(b), ternAngles(b)
	c.Numbers = []float64{11, 22, 47}
	b.ReportAllocs()
	for b.Loop() {
		Same(a, c)
	}
}

// The inner loops allocate nothing.
func TestSearchDoesNotAllocate(t *testing.T) {
	a, q := ternAngles(t), quaternion(unrelated)
	var s search
	walk := func() {
		if why := s.read(a, q); why != "" {
			t.Fatal(why)
		}
		for c := range maxCost + 1 {
			s.level(c)
		}
	}
	walk()
	if n := testing.AllocsPerRun(50, walk); n > 4 { // the label's table
		t.Errorf("%g allocations in a search of %d hypotheses", n, s.tried)
	}
	t.Logf("%d hypotheses", s.tried)
}
