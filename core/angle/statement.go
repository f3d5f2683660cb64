package angle

import (
	"fmt"
	"slices"
)

// statement is what the words of a label say.
type statement struct {
	order  *[3]Axis // letters or digits: the order of the turns
	names  *[3]Axis // roll, pitch and yaw: the order of the numbers, or of the turns
	moving bool
	fixed  bool
}

// customary reports whether order is that in which roll, pitch and yaw are
// customarily turned: yaw first about moving axes, roll first about fixed ones.
func customary(order [3]Axis, fixed bool) bool {
	if fixed {
		return order == [3]Axis{X, Y, Z}
	}
	return order == [3]Axis{Z, Y, X}
}

// full reports whether one sequence is stated. Roll, pitch and yaw with a kind
// of axes are enough only in the customary order: "moving roll-pitch-yaw" may list
// turns or merely name the numbers.
func (s statement) full() bool {
	if !s.moving && !s.fixed {
		return false
	}
	return s.order != nil || s.names != nil && customary(*s.names, s.fixed)
}

// readings are the readings of the statement for numbers with these places;
// an error for numbers named by axes in a sequence that uses one axis twice.
func (s statement) readings(p places) ([]Reading, error) {
	if p.kind == unnamed && s.names != nil {
		p.kind = byAxis
		for number, axis := range s.names {
			p.index[axis] = number
		}
	}
	var all []Reading
	for _, seq := range s.sequences() {
		orders, err := p.orders(seq, !s.full())
		if err != nil {
			return nil, err
		}
		for _, order := range orders {
			all = append(all, Reading{Seq: seq, Order: order})
		}
	}
	all = distinct(all)
	if !s.full() {
		for _, r := range all {
			r.Inverse = true
			all = append(all, r)
		}
	}
	return all, nil
}

// sequences are those that the statement may mean, the customary one first.
func (s statement) sequences() []Sequence {
	kinds := []bool{false, true}
	if s.moving || s.fixed {
		kinds = []bool{s.fixed}
	}
	var all []Sequence
	for _, fixed := range kinds {
		switch {
		case s.order != nil:
			all = append(all, Sequence{*s.order, fixed})
			continue
		case s.names != nil:
			all = append(all, Sequence{*s.names, fixed})
		}
		if !s.full() { // the names may not list the turns
			all = append(all, Sequence{[3]Axis{Z, Y, X}, fixed}, Sequence{[3]Axis{X, Y, Z}, fixed})
		}
	}
	slices.SortStableFunc(all, func(a, b Sequence) int { return rank(a) - rank(b) })
	return all
}

// rank puts the sequences that custom prefers for roll, pitch and yaw first.
func rank(s Sequence) int {
	if customary(s.Axes, s.Fixed) {
		return 0
	}
	return 1
}

// orders are the orders in which three numbers may be meant. Unnamed numbers of a
// bare label stand in the order of the turns or in that of the axes x, y, z.
func (p places) orders(seq Sequence, bare bool) ([][3]int, error) {
	listed := [3]int{0, 1, 2}
	switch {
	case p.kind == byTurn:
		return [][3]int{p.index}, nil
	case p.kind == byAxis && seq.Proper():
		return nil, fmt.Errorf("%w: %s turns twice about %s, so its numbers cannot be called by axes", ErrRoles, seq, seq.Axes[0])
	case p.kind == byAxis:
		return [][3]int{p.along(seq)}, nil
	case seq.Proper() || !bare:
		return [][3]int{listed}, nil
	}
	return [][3]int{listed, places{index: listed}.along(seq)}, nil
}

// along are the numbers by axis, in the order of the turns.
func (p places) along(seq Sequence) [3]int {
	return [3]int{p.index[seq.Axes[0]], p.index[seq.Axes[1]], p.index[seq.Axes[2]]}
}

// distinct keeps one of the readings that say the same: the one with the
// numbers in the order of the turns, if there is such, else the first.
func distinct(all []Reading) []Reading {
	var kept []Reading
	for _, r := range all {
		at := slices.IndexFunc(kept, func(k Reading) bool { return k.Canonical() == r.Canonical() })
		switch {
		case at < 0:
			kept = append(kept, r)
		case r.Order == [3]int{0, 1, 2}:
			kept[at] = r
		}
	}
	return kept
}
