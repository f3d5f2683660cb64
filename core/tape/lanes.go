package tape

import "math/bits"

// Lanes is the number of samples that are evaluated together.
const Lanes = 64

// column is one word of memory for every lane.
type column [Lanes]uint64

// group is a set of lanes that are at the same instruction of the same calls.
// All lanes start as one group. A branch that they take differently splits it,
// and groups that meet again are merged.
type group struct {
	order     [Lanes]uint8 // the lanes, ascending; the first n count
	n         int
	mask      uint64 // the same lanes as bits
	program   int32  // index of the program being executed
	pc, start int32  // next instruction, and the first since the last transfer
	base, top int32  // addresses of the frame, and after all memory in use
	kept      int32  // address after what the lanes have allocated for good
	frames    []activation
}

// activation is a call in progress: where to go on in the caller.
type activation struct {
	program, pc int32
	base        int32
	dst         int32 // address of the results in the caller's frame
}

// set makes mask the lanes of g.
func (g *group) set(mask uint64) {
	g.mask, g.n = mask, 0
	for ; mask != 0; mask &= mask - 1 {
		g.order[g.n] = uint8(bits.TrailingZeros64(mask))
		g.n++
	}
}

// lanes returns the lanes of g.
func (g *group) lanes() []uint8 { return g.order[:g.n] }

// before reports whether g should go on before h: the deeper one, then the one
// that is less far, so that they meet.
//
// As the deepest go first, nobody enters a call while others are within one:
// groups at one depth are within the same calls.
func (g *group) before(h *group) bool {
	if len(g.frames) != len(h.frames) {
		return len(g.frames) > len(h.frames)
	}
	return g.pc < h.pc
}

// meets reports whether two groups are at the same place.
func (g *group) meets(h *group) bool { return g.pc == h.pc && len(g.frames) == len(h.frames) }

// newGroup takes a group from those not in use.
func (m *Machine) newGroup() *group {
	if n := len(m.free); n > 0 {
		g := m.free[n-1]
		m.free = m.free[:n-1]
		return g
	}
	return new(group)
}

// split takes the lanes of mask out of g into a group of their own, which
// waits.
func (m *Machine) split(g *group, mask uint64, pc int32) {
	h := m.newGroup()
	frames := append(h.frames[:0], g.frames...)
	*h = group{program: g.program, pc: pc, start: pc, base: g.base, top: g.top, kept: g.kept, frames: frames}
	h.set(mask)
	g.set(g.mask &^ mask)
	m.waiting = append(m.waiting, h)
}

// next picks the group that goes on, g among them unless it is empty, and
// merges with it those that are at the same place. It returns nil when all
// lanes are done.
func (m *Machine) next(g *group) *group {
	if g.n > 0 {
		m.waiting = append(m.waiting, g)
	} else {
		m.free = append(m.free, g)
	}
	if len(m.waiting) == 0 {
		return nil
	}
	best := 0
	for i, h := range m.waiting {
		if h.before(m.waiting[best]) {
			best = i
		}
	}
	g = m.waiting[best]
	keep := m.waiting[:0]
	mask := g.mask
	for _, h := range m.waiting {
		switch {
		case h == g:
		case h.meets(g):
			mask |= h.mask
			g.top, g.kept = max(g.top, h.top), max(g.kept, h.kept)
			m.free = append(m.free, h)
		default:
			keep = append(keep, h)
		}
	}
	m.waiting = keep
	if mask != g.mask {
		g.set(mask)
	}
	return g
}

// kill ends the lanes of mask with a fault.
func (m *Machine) kill(g *group, mask uint64, f fault) {
	if mask == 0 {
		return
	}
	for w := mask; w != 0; w &= w - 1 {
		m.faults[bits.TrailingZeros64(w)] = f
	}
	g.set(g.mask &^ mask)
}

// fail notes the fault of one lane and returns its bit, for drop.
func (m *Machine) fail(lane uint8, f fault) uint64 {
	m.faults[lane&63] = f
	return 1 << lane
}

// drop takes the lanes of mask, which have failed, out of g.
func (g *group) drop(mask uint64) {
	if mask != 0 {
		g.set(g.mask &^ mask)
	}
}

// burn takes fuel from every lane of g and ends those that have none left.
func (m *Machine) burn(g *group, n int32) {
	var out uint64
	for _, l := range g.lanes() {
		m.fuel[l&63] -= n
		if m.fuel[l&63] < 0 {
			out |= 1 << l
		}
	}
	m.kill(g, out, faultFuel)
}
