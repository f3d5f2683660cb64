package identify

import (
	"fmt"
	"math"
	"slices"
	"sync"

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
	s := searches.Get().(*search)
	defer searches.Put(s)
	if why := s.read(a, b); why != "" {
		return Result{Reason: why}
	}
	return s.run()
}

// searches keeps the memory of searches: a thousand readings for angles.
var searches = sync.Pool{New: func() any { return new(search) }}

// read starts afresh on two statements. It says why not where it cannot.
func (s *search) read(a, b Statement) string {
	*s = search{
		a: side{readings: s.a.readings}, b: side{readings: s.b.readings},
		found: s.found[:0], nearest: s.nearest[:0],
		forward: candidate{residual: math.Inf(1)}, reach: math.Pi,
	}
	if why := s.a.read(a); why != "" {
		return "the first cannot be read: " + why
	}
	if why := s.b.read(b); why != "" {
		return "the second cannot be read: " + why
	}
	s.direct(a.Claim, b.Claim)
	if s.a.mirrored && s.b.mirrored { // compared as the maps that they are
		s.a.unmirror()
		s.b.unmirror()
	}
	return ""
}

// direct settles what the claims say about direction. Where both name their
// frames, one of them may have to be reversed to say what the other says; where one
// does not, or a label leaves it open, both directions are free.
func (s *search) direct(a, b Claim) {
	if s.a.free || s.b.free || !a.Direction.Stated() || !b.Direction.Stated() {
		return
	}
	switch a.Direction {
	case b.Direction:
	case b.Direction.Reverse():
		s.b.reverse()
	default:
		return // of two other frames: nothing is said about these
	}
	s.inverse = Inverse.Cost()
	// Shuster's matrix of the same four numbers is the transpose of Hamilton's.
	if s.a.form == convention.Quaternion && a.Product == convention.Shuster {
		s.a.reverse()
	}
	if s.b.form == convention.Quaternion && b.Product == convention.Shuster {
		s.b.reverse()
	}
}

// run searches from the claims outwards, and a little beyond the first cost
// at which something fits, for rivals.
func (s *search) run() Result {
	for c := range maxCost + 1 {
		s.level(c)
		best, ok := s.cheapest()
		switch {
		case ok:
			return s.fitting(best)
		case c == 0 && len(s.found) > 0:
			return s.close(s.found[0])
		}
	}
	return s.unexplained("")
}

// rivalry is how much dearer a reading may be and still be a rival of the one
// that is found, where the numbers hardly tell the two apart.
const rivalry = 2

// fitting judges the cheapest candidate that fits.
func (s *search) fitting(best candidate) Result {
	e := s.weigh(best, s.tried)
	for c := best.cost + 1; c <= min(best.cost+rivalry, maxCost); c++ {
		s.level(c)
	}
	switch {
	case best.cost > 0 && !e.enough(best.cost):
		return s.unexplained(e.doubt(best))
	case best.cost > 0:
		return s.result(Contradicted, best, e)
	case best.inverse:
		return s.result(AgreeInverse, best, e)
	}
	return s.result(Agree, best, e)
}

// close reports that the claims miss by so little that the digits may be to blame.
func (s *search) close(best candidate) Result {
	r := s.result(Undecided, best, evidence{})
	r.Decided = false
	r.Reason = fmt.Sprintf("as claimed they differ by %s, which is little more than the %s that the digits leave open",
		degrees(best.residual), degrees(best.open))
	return r
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

// doubt says why evidence is not enough.
func (e evidence) doubt(c candidate) string {
	if e.numbers < 3 && c.cost > e.numbers {
		return fmt.Sprintf("a change of %s fits, but that takes %d independent numbers, and of this orientation's all but %d are equal, zero or right angles",
			c.changes, c.cost, e.numbers)
	}
	return fmt.Sprintf("a change of %s fits, but so would %.2g readings of numbers that have nothing to do with each other", c.changes, e.expected)
}

func (s *search) unexplained(reason string) Result {
	r := s.result(Unexplained, s.forward, evidence{})
	r.Best, r.Decided, r.Reason = r.Stated, false, reason
	return r
}
