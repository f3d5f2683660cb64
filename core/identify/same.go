package identify

import (
	"fmt"
	"math"
	"slices"

	"dextral/core/convention"
)

// Verdict is what two statements say to each other.
type Verdict uint8

// The verdicts.
const (
	Undecided    Verdict = iota // see Result.Reason
	Agree                       // an allowed reading of the claims fits
	AgreeInverse                // an allowed reading fits, but only as the reverse, which no stated direction excludes
	Contradicted                // the claims fail, and the fewest changes that reconcile them are known
	Unexplained                 // the claims fail, and no reading in the set can be held responsible
)

// String names the verdict.
func (v Verdict) String() string {
	return [...]string{"undecided", "agree", "agree as reverse", "contradicted", "unexplained"}[v]
}

// Result is the comparison of two statements.
type Result struct {
	Verdict Verdict
	Stated  Class   // the nearest allowed reading of the claims that takes both as one rotation
	Best    Class   // the cheapest class that fits; Stated if the claims agree or nothing fits
	Next    Class   // the nearest class beside Best that costs no more; without readings if there is none
	Classes []Class // all worth listing: those that fit, by cost, then the nearest others
	Decided bool    // Best is the only class within the margin, and no accident
	Margin  float64 // how many times Next misses what the digits leave open
	Reason  string  // why nothing more can be said
}

// Same tells whether two statements describe one orientation and, if they do
// not as claimed, which fewest changes reconcile them.
func Same(a, b Statement) Result {
	first, whyA := newSide(a)
	second, whyB := newSide(b)
	if whyA != "" || whyB != "" {
		return Result{Reason: unreadable(whyA, whyB)}
	}
	s := newSearch(first, second, a.Claim, b.Claim)
	return s.run()
}

func unreadable(whyA, whyB string) string {
	if whyA != "" {
		return "the first cannot be read: " + whyA
	}
	return "the second cannot be read: " + whyB
}

// newSearch settles what the claims say about direction. Where both name their
// frames, one of them may have to be reversed to say what the other says; where one
// does not, or a label leaves it open, both directions are free.
func newSearch(a, b *side, claimA, claimB Claim) *search {
	s := &search{a: a, b: b, forward: candidate{residual: math.Inf(1)}}
	dirA, dirB := claimA.Direction, claimB.Direction
	switch {
	case a.free || b.free || !dirA.Stated() || !dirB.Stated():
	case dirA == dirB:
		s.inverse = Inverse.Cost()
	case dirA == dirB.Reverse():
		s.inverse = Inverse.Cost()
		b.reverse()
	}
	if s.inverse > 0 {
		// Shuster's matrix of the same four numbers is the transpose of Hamilton's.
		if a.form == convention.Quaternion && claimA.Product == convention.Shuster {
			a.reverse()
		}
		if b.form == convention.Quaternion && claimB.Product == convention.Shuster {
			b.reverse()
		}
	}
	if a.mirrored && b.mirrored { // compared as the maps that they are
		a.readings[0].cost, a.readings[0].set = 0, 0
		b.readings[0].cost, b.readings[0].set = 0, 0
		a.sort()
		b.sort()
	}
	return s
}

// run searches from the claims outwards.
func (s *search) run() Result {
	s.level(0)
	if best, ok := s.cheapest(); ok {
		tried := s.tried
		s.level(1)
		return s.result(s.agreement(), best, tried)
	}
	if len(s.found) > 0 {
		best := s.found[0]
		r := s.result(Undecided, best, s.tried)
		r.Decided = false
		r.Reason = fmt.Sprintf("as claimed they differ by %s, which is little more than the %s that the digits leave open",
			degrees(best.residual), degrees(best.open))
		return r
	}
	for c := 1; c <= maxCost; c++ {
		s.level(c)
		if best, ok := s.cheapest(); ok {
			return s.explained(best)
		}
	}
	return s.unexplained("")
}

// cheapest finds the candidate of least cost that fits, and of those the
// nearest; forward ones first.
func (s *search) cheapest() (candidate, bool) {
	slices.SortStableFunc(s.found, func(x, y candidate) int {
		switch {
		case x.fits() != y.fits():
			return order(!x.fits(), !y.fits())
		case x.cost != y.cost:
			return x.cost - y.cost
		case x.inverse != y.inverse:
			return order(x.inverse, y.inverse)
		case x.residual < y.residual:
			return -1
		case x.residual > y.residual:
			return 1
		}
		return 0
	})
	if len(s.found) == 0 || !s.found[0].fits() {
		return candidate{}, false
	}
	return s.found[0], true
}

func order(x, y bool) int {
	switch {
	case x == y:
		return 0
	case x:
		return 1
	}
	return -1
}

// agreement tells agreement from agreement as the reverse.
func (s *search) agreement() Verdict {
	if s.found[0].inverse {
		return AgreeInverse
	}
	return Agree
}

// explained judges a candidate that fits although the claims do not.
func (s *search) explained(best candidate) Result {
	e := s.weigh(best, s.tried)
	if !e.enough(best.cost) {
		return s.unexplained(e.doubt(best))
	}
	return s.result(Contradicted, best, s.tried)
}

// doubt says why evidence is not enough.
func (e evidence) doubt(c candidate) string {
	if e.numbers < 3 && c.cost > e.numbers {
		return fmt.Sprintf("%s fits, but the orientation has only %d numbers that are no multiples of a right angle or of each other", c.changes, e.numbers)
	}
	return fmt.Sprintf("%s fits, but so would %.2g readings of unrelated numbers", c.changes, e.expected)
}

func (s *search) unexplained(reason string) Result {
	r := s.result(Unexplained, s.forward, s.tried)
	r.Best, r.Decided, r.Reason = r.Stated, false, reason
	return r
}
