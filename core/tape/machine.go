package tape

import (
	"errors"
	"fmt"
	"slices"
)

// Limits of one sample.
const (
	// DefaultFuel is the number of instructions that one sample may execute.
	DefaultFuel = 1 << 20
	// maxWords is the memory of one sample in words, frames included.
	maxWords = 1 << 20
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

// step is an instruction as the machine executes it: blocks are positions.
type step struct {
	op      Op
	dst     int32
	a, b, c int32
}

// linked is a program within a machine.
type linked struct {
	p       *Program
	code    []step
	callee  []int32 // for each call site: index into programs, or -1
	reason  int32   // index of its first reason in the machine
	branch  int32   // index of its first branch
	dataAt  int32   // address of its data
	words   int32   // words of the parameters
	consts  []uint64
	results int32
}

// Machine is a program linked with everything it calls, ready to be evaluated.
// It holds the memory of one sample and is used by one goroutine at a time.
type Machine struct {
	Sig      *Signature
	Fuel     int // instructions that one sample may execute
	programs []linked
	branches []BranchRef
	reasons  []string
	panics   []bool // for each reason whether a Panic states it
	alias    []int  // for each parameter the one whose object it is given; nil if its own
	objects  []int32
	mem      []uint64
	unk      []bool // parallel to mem; nil if nothing can be unknown
	data     []Const
	root     int32 // address of the objects of the outermost parameters
	inputs   []Port
	outputs  []Port
	frames   []activation
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
	index := map[*Program]int32{}
	unknown, err := m.link(p, lib, index)
	if err != nil {
		return nil, err
	}
	m.root = 1 + int32(len(m.data))
	m.objects = make([]int32, len(p.Sig.Params))
	objects := p.Sig.ResultWords()
	for i := range p.Sig.Params {
		if p.Sig.Params[i].Mode != Value {
			objects += len(p.Sig.Params[i].Fields)
		}
	}
	size := int(m.root) + objects + int(p.Slots) + 64
	if size > maxWords {
		return nil, fmt.Errorf("tape %s: a frame of %d words is too large", p.Name, p.Slots)
	}
	m.mem = make([]uint64, size)
	if unknown {
		m.unk = make([]bool, size)
	}
	for i, d := range m.data {
		m.mem[1+i] = d.Bits
	}
	return m, nil
}

// link appends p and what it calls and reports whether anything may be unknown.
func (m *Machine) link(p *Program, lib Library, index map[*Program]int32) (bool, error) {
	if err := p.Check(); err != nil {
		return false, err
	}
	if len(m.programs) >= maxPrograms {
		return false, errors.New("tape: too many programs call each other")
	}
	at := int32(len(m.programs))
	index[p] = at
	l := linked{p: p, reason: int32(len(m.reasons)), branch: int32(len(m.branches)), dataAt: 1 + int32(len(m.data)),
		words: int32(p.Sig.Words()), results: int32(p.Sig.ResultWords())}
	m.reasons = append(m.reasons, p.Reasons...)
	m.panics = append(m.panics, make([]bool, len(p.Reasons))...)
	for i := range p.Branches {
		m.branches = append(m.branches, BranchRef{p, &p.Branches[i]})
	}
	m.data = append(m.data, p.Data...)
	unknown := slices.ContainsFunc(p.Data, func(c Const) bool { return c.Kind == Any })
	for _, c := range p.Consts {
		l.consts = append(l.consts, c.Bits)
	}
	l.code = make([]step, len(p.Code))
	for i, in := range p.Code {
		s := step{in.Op, in.Dst, in.A, in.B, in.C}
		switch in.Op {
		case Jump:
			s.a = p.Blocks[in.A]
		case If:
			s.b, s.c = p.Blocks[in.B], p.Blocks[in.C]
			s.dst += l.branch
		case Panic, Stop:
			m.panics[int(l.reason+s.a)] = in.Op == Panic
			s.a += l.reason
		case DataAddr:
			s.a += l.dataAt
		case Unknown:
			unknown = true
		}
		l.code[i] = s
	}
	m.programs = append(m.programs, l)
	callees := make([]int32, len(p.Calls))
	for i := range p.Calls {
		site := &p.Calls[i]
		callee, ok := lib[site.Callee]
		if !ok {
			callees[i], unknown = -1, true
			continue
		}
		if err := fits(site, callee, p); err != nil {
			return false, err
		}
		if _, ok := index[callee]; !ok {
			u, err := m.link(callee, lib, index)
			if err != nil {
				return false, err
			}
			unknown = unknown || u
		}
		callees[i] = index[callee]
	}
	m.programs[at].callee = callees
	return unknown, nil
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
