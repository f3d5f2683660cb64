package tape

import (
	"encoding/binary"
	"errors"
	"slices"
)

// The analysis of what influences what is an evaluation in which a word is not
// a number but two sets: the inputs that may have influenced it, and the
// places that it may be the address of. Memory is a list of objects; a frame
// is one of them. Every instruction is evaluated for every block, until
// nothing changes any more. A call is evaluated in place if it is given an
// address, else by its summary.

var errFlow = errors.New("too much for the analysis")

// setID and spotsID number sets that have been seen: equal numbers are equal
// sets. 0 is the empty set.
type (
	setID   int32
	spotsID int32
)

// cell is the abstract value of a word.
type cell struct {
	deps  setID
	spots spotsID
}

// spot is an address that a word may hold: a word of an object, or any of it.
type spot struct {
	object int32
	word   int32 // -1: any
}

// abstractObject is a piece of abstract memory.
type abstractObject struct {
	at, size int32 // words in the state
	many     bool  // of unknown size: one word stands for all
	weak     bool  // stands for several: what is written joins what was there
	written  []bool
}

// state is the value of every word of every object.
type state []cell

type analysis struct {
	lib       Library
	summaries map[*Program]*summary
	work      int

	sets     [][]uint64
	setIDs   map[string]setID
	spots    [][]spot
	spotIDs  map[string]spotsID
	objects  []abstractObject
	size     int32 // words of all objects
	sites    map[site]int32
	stack    []*Program
	contexts map[contextKey]int32
	frames   map[int32]int32 // the frame of each context
	decides  setID
}

// site is an allocation by an instruction in a context of calls.
type site struct {
	context int32
	code    int32
}

type contextKey struct {
	parent int32
	call   int32
}

func (a *analysis) init() {
	a.sets, a.setIDs = [][]uint64{nil}, map[string]setID{"": 0}
	a.spots, a.spotIDs = [][]spot{nil}, map[string]spotsID{"": 0}
	a.sites, a.contexts = map[site]int32{}, map[contextKey]int32{}
	a.frames = map[int32]int32{}
}

// set numbers a set of inputs.
func (a *analysis) set(words []uint64) setID {
	for len(words) > 0 && words[len(words)-1] == 0 {
		words = words[:len(words)-1]
	}
	key := make([]byte, 0, 8*len(words))
	for _, w := range words {
		key = binary.LittleEndian.AppendUint64(key, w)
	}
	id, ok := a.setIDs[string(key)]
	if !ok {
		id = setID(len(a.sets))
		a.sets = append(a.sets, slices.Clone(words))
		a.setIDs[string(key)] = id
	}
	return id
}

// single is the set of one input.
func (a *analysis) single(i int) setID {
	w := make([]uint64, i/64+1)
	w[i/64] = 1 << (i % 64)
	return a.set(w)
}

func (a *analysis) union(x, y setID) setID {
	if x == y || y == 0 {
		return x
	}
	if x == 0 {
		return y
	}
	long, short := a.sets[x], a.sets[y]
	if len(long) < len(short) {
		long, short = short, long
	}
	w := slices.Clone(long)
	for i, v := range short {
		w[i] |= v
	}
	return a.set(w)
}

// spotSet numbers a set of addresses.
func (a *analysis) spotSet(s []spot) spotsID {
	slices.SortFunc(s, func(x, y spot) int {
		if x.object != y.object {
			return int(x.object - y.object)
		}
		return int(x.word - y.word)
	})
	s = slices.Compact(s)
	// Any word of an object includes each.
	s = slices.DeleteFunc(s, func(x spot) bool { return x.word >= 0 && slices.Contains(s, spot{x.object, -1}) })
	var key []byte
	for _, x := range s {
		key = binary.AppendVarint(binary.AppendVarint(key, int64(x.object)), int64(x.word))
	}
	id, ok := a.spotIDs[string(key)]
	if !ok {
		id = spotsID(len(a.spots))
		a.spots = append(a.spots, slices.Clone(s))
		a.spotIDs[string(key)] = id
	}
	return id
}

func (a *analysis) unionSpots(x, y spotsID) spotsID {
	if x == y || y == 0 {
		return x
	}
	if x == 0 {
		return y
	}
	return a.spotSet(append(slices.Clone(a.spots[x]), a.spots[y]...))
}

func (a *analysis) join(x, y cell) cell {
	return cell{a.union(x.deps, y.deps), a.unionSpots(x.spots, y.spots)}
}

// joinState adds what t says to s and reports whether that was news.
func (a *analysis) joinState(s, t state) bool {
	changed := false
	for i, c := range t {
		if j := a.join(s[i], c); j != s[i] {
			s[i] = j
			changed = true
		}
	}
	return changed
}

// newObject makes an object of size words; one that stands for many has a
// single word for all.
func (a *analysis) newObject(size int32, many bool) int32 {
	if many {
		size = 1
	}
	a.objects = append(a.objects, abstractObject{at: a.size, size: size, many: many, written: make([]bool, size)})
	a.size += size
	a.spend(int(size))
	return int32(len(a.objects) - 1)
}

// spend counts work and gives up when it is too much.
func (a *analysis) spend(n int) {
	if a.work += n + 1; a.work > maxFlowWork {
		panic(errFlow)
	}
}

// grow gives s room for all objects there are.
func (a *analysis) grow(s state) state {
	if n := int(a.size) - len(s); n > 0 {
		s = append(s, make(state, n)...)
	}
	return s
}

// read joins n words from each place that address may mean; the result also
// depends on what the address depends on.
func (a *analysis) read(s state, address cell, off, n int32) []cell {
	out := make([]cell, n)
	for _, x := range a.spots[address.spots] {
		o := &a.objects[x.object]
		for k := range n {
			if x.word >= 0 && !o.many {
				if w := x.word + off + k; w < o.size {
					out[k] = a.join(out[k], s[o.at+w])
				}
				continue
			}
			a.spend(int(o.size))
			for w := range o.size {
				out[k] = a.join(out[k], s[o.at+w])
			}
		}
	}
	for k := range out {
		out[k].deps = a.union(out[k].deps, address.deps)
	}
	return out
}

// write stores values at each place that address may mean. Only if there is
// one such place, and it is one word, is the old value gone.
func (a *analysis) write(s state, address cell, off int32, values []cell, control setID) {
	places := a.spots[address.spots]
	for _, x := range places {
		o := &a.objects[x.object]
		for k, v := range values {
			v.deps = a.union(a.union(v.deps, address.deps), control)
			if x.word >= 0 && !o.many {
				w := x.word + off + int32(k)
				if w >= o.size {
					continue
				}
				o.written[w] = true
				if len(places) > 1 || o.weak {
					v = a.join(v, s[o.at+w])
				}
				s[o.at+w] = v
				continue
			}
			a.spend(int(o.size))
			for w := range o.size {
				o.written[w] = true
				s[o.at+w] = a.join(s[o.at+w], v)
			}
		}
	}
}
