package tape

import (
	"errors"
	"fmt"
	"slices"
)

const (
	// DefaultFuel is the number of instructions that one sample may execute.
	DefaultFuel = 1 << 20
	// maxPrograms is the number of programs that one machine links.
	maxPrograms = 4096
)

// Outcome says how the evaluation of one sample ended.
type Outcome uint8

const (
	// Returned: the outputs hold the results.
	Returned Outcome = iota
	// Panicked: the program would have panicked; there are no outputs.
	Panicked
	// OutOfFuel: the sample executed too many instructions or asked for too
	// much memory.
	OutOfFuel
	// Undecided: control or an address depended on a value that is not known.
	Undecided
)

var outcomeNames = [...]string{"returned", "panicked", "out of fuel", "undecided"}

func (o Outcome) String() string {
	if int(o) < len(outcomeNames) {
		return outcomeNames[o]
	}
	return fmt.Sprintf("outcome%d", uint8(o))
}

// step is an instruction as the machine executes it: blocks are positions, and
// constants are slots below zero.
type step struct {
	op      Op
	dst     int32
	a, b, c int32
}

// linked is a program within a machine.
type linked struct {
	p             *Program
	code          []step
	slots         int32 // words of the frame, without the constants
	args, returns [][]Range
	callee        []int32 // for each call site: index into programs, or -1
}

// Machine is a program linked with everything it calls, ready to be evaluated.
// It holds the memory of a group of samples and is used by one goroutine at a
// time.
type Machine struct {
	Sig  *Signature
	Fuel int32 // instructions that one sample may execute

	programs []linked
	consts   []column
	data     []Const
	branches []BranchRef
	reasons  []string
	panics   []bool // for each reason whether a Panic states it
	inputs   []Port
	outputs  []Port
	alias    []int // for each parameter the one whose object it is given; nil if its own

	mem     []column // address 0 and those of the data are not used
	unk     []uint64 // marks of unknown words, parallel to mem; nil if nothing can be unknown
	root    int32    // address of the objects of the outermost parameters
	objects []int32  // their addresses
	results int32    // address of the results of the outermost program
	frame   int32    // address of its frame

	taken   []uint64 // lanes that took each side of each branch: no, yes
	faults  [Lanes]fault
	fuel    [Lanes]int32
	heap    [Lanes]int32 // words allocated
	waiting []*group
	free    []*group
}

// BranchRef names a branch of a machine.
type BranchRef struct {
	Program *Program
	Branch  *Branch
}

// Link prepares p, and the programs of lib that it calls, for evaluation. A
// program that is called but not in lib is an unknown function: its results
// are unknown values, and if it is given an address the sample is undecided.
func Link(p *Program, lib Library) (*Machine, error) {
	if !p.Sig.Runnable() {
		return nil, fmt.Errorf("tape %s: a parameter is hidden; such a program can only be called", p.Name)
	}
	m := &Machine{Sig: &p.Sig, Fuel: DefaultFuel, inputs: p.Sig.Inputs(), outputs: p.Sig.Outputs()}
	k := linker{Machine: m, lib: lib, index: map[*Program]int32{}}
	if err := k.link(p); err != nil {
		return nil, err
	}
	m.objects = make([]int32, len(p.Sig.Params))
	m.root = 1 + int32(len(m.data))
	at := m.root
	for i := range p.Sig.Params {
		if p.Sig.Params[i].Mode != Value {
			m.objects[i] = at
			at += int32(len(p.Sig.Params[i].Fields))
		}
	}
	m.results = at
	m.frame = at + int32(p.Sig.ResultWords())
	if k.unknown {
		m.unk = make([]uint64, 0)
	}
	if !m.reserve(int(m.frame + m.programs[0].slots)) {
		return nil, fmt.Errorf("tape %s: a frame of %d words is too large", p.Name, p.Slots)
	}
	m.taken = make([]uint64, 2*len(m.branches))
	return m, nil
}

// linker collects the programs of a machine.
type linker struct {
	*Machine
	lib     Library
	index   map[*Program]int32
	unknown bool // anything may be unknown
}

// link appends p and what it calls.
func (k *linker) link(p *Program) error {
	if err := p.Check(); err != nil {
		return err
	}
	if len(k.programs) >= maxPrograms {
		return errors.New("tape: too many programs call each other")
	}
	at := int32(len(k.programs))
	k.index[p] = at
	k.programs = append(k.programs, k.prepare(p))
	callees := make([]int32, len(p.Calls))
	for i := range p.Calls {
		site := &p.Calls[i]
		callee, ok := k.lib[site.Callee]
		if !ok {
			callees[i], k.unknown = -1, true
			continue
		}
		if err := fits(site, callee, p); err != nil {
			return err
		}
		if _, ok := k.index[callee]; !ok {
			if err := k.link(callee); err != nil {
				return err
			}
		}
		callees[i] = k.index[callee]
	}
	k.programs[at].callee = callees
	return nil
}

// prepare translates the code of p and adds its tables to the machine's.
func (k *linker) prepare(p *Program) linked {
	params, n := int32(p.Sig.Words()), int32(len(p.Consts))
	firstConst := int32(len(k.consts))
	slot := func(s int32) int32 {
		switch {
		case s < params:
			return s
		case s < params+n:
			return ^(s - params + firstConst)
		}
		return s - n
	}
	for _, c := range p.Consts {
		var col column
		for i := range col {
			col[i] = c.Bits
		}
		k.consts = append(k.consts, col)
	}
	l := linked{p: p, slots: max(1, p.Slots-n)}
	for i := range p.Calls {
		l.args = append(l.args, mapRanges(p.Calls[i].Args, slot))
	}
	for _, r := range p.Returns {
		l.returns = append(l.returns, mapRanges(r, slot))
	}
	reason, branch, data := int32(len(k.reasons)), int32(len(k.branches)), 1+int32(len(k.data))
	k.reasons = append(k.reasons, p.Reasons...)
	k.panics = append(k.panics, make([]bool, len(p.Reasons))...)
	for i := range p.Branches {
		k.branches = append(k.branches, BranchRef{p, &p.Branches[i]})
	}
	for _, c := range p.Data {
		if c.Kind == Addr && c.Bits != 0 {
			c.Bits += uint64(data - 1)
		}
		k.data = append(k.data, c)
	}
	k.unknown = k.unknown || slices.ContainsFunc(p.Data, func(c Const) bool { return c.Kind == Any })
	l.code = make([]step, len(p.Code))
	for i, in := range p.Code {
		in.MapSlots(slot)
		s := step{in.Op, in.Dst, in.A, in.B, in.C}
		switch in.Op {
		case Jump:
			s.a = p.Blocks[in.A]
		case If:
			s.b, s.c = p.Blocks[in.B], p.Blocks[in.C]
			s.dst += branch
		case Panic, Stop:
			k.panics[reason+s.a] = in.Op == Panic
			s.a += reason
		case DataAddr:
			s.a += data
		case Unknown:
			k.unknown = true
		}
		l.code[i] = s
	}
	return l
}

func mapRanges(rs []Range, slot func(int32) int32) []Range {
	out := make([]Range, 0, len(rs))
	for _, r := range rs {
		if r.N > 0 {
			out = append(out, Range{slot(r.Slot), r.N})
		}
	}
	return out
}

// fits checks that a call gives what the callee takes.
func fits(site *CallSite, callee, caller *Program) error {
	n := int32(0)
	for _, r := range site.Args {
		n += r.N
	}
	if int(n) != callee.Sig.Words() || int(site.Words) != callee.Sig.ResultWords() {
		return fmt.Errorf("tape %s: call of %s with %d words for %d, %d results for %d",
			caller.Name, site.Callee, n, callee.Sig.Words(), site.Words, callee.Sig.ResultWords())
	}
	return nil
}

// Branches lists the branches of the program and of everything it calls.
// The first ones are its own.
func (m *Machine) Branches() []BranchRef { return m.branches }
