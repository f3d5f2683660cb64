package tape

// Instr is one instruction. What the operand fields mean depends on the
// operation.
type Instr struct {
	Op      Op
	Dst     int32
	A, B, C int32
	Place   int32 // index into Places plus one, or 0
}

// Const is a constant. It is loaded into the frame when the program is entered.
type Const struct {
	Kind Kind
	Bits uint64
}

// Range is a run of slots.
type Range struct{ Slot, N int32 }

// CallSite is a call of another program.
type CallSite struct {
	Callee string  // its name
	Args   []Range // slots that are copied, in order, to the parameters
	Words  int32   // words of the results
	Shared bool    // an argument is an address: an unknown callee may write there
}

// Branch describes the condition of an If for messages.
type Branch struct {
	Text  string // the condition as the author wrote it
	Place int32  // index into Places plus one, or 0
}

// Place is a place in the source text. Line and column count from 1.
type Place struct {
	File      string
	Line, Col int32
}

// Program is a numeric function. Slots are numbered from 0: the words of the
// parameters, the constants, then everything else.
type Program struct {
	Name     string
	Sig      Signature
	Slots    int32 // words of the frame
	Consts   []Const
	Data     []Const // words that are only read, reached by address; one of kind Addr is 0 or an index here plus one
	Code     []Instr
	Blocks   []int32 // index into Code of the first instruction of each block
	Calls    []CallSite
	Returns  [][]Range
	Reasons  []string
	Branches []Branch
	Places   []Place

	checked bool // Check found nothing
}

// Library finds programs by name.
type Library map[string]*Program

// blockEnd returns the index after the last instruction of block b.
func (p *Program) blockEnd(b int) int {
	if b+1 < len(p.Blocks) {
		return int(p.Blocks[b+1])
	}
	return len(p.Code)
}

// firstTemp returns the first slot after parameters and constants.
func (p *Program) firstTemp() int32 { return int32(p.Sig.Words() + len(p.Consts)) }

// width returns the number of words an operand of in takes.
func (p *Program) width(in *Instr, o operand) int32 {
	switch {
	case o.wide:
		return in.C
	case o.words > 0:
		return int32(o.words)
	case o.words < 0:
		return p.Calls[in.A].Words
	}
	return 1
}

// reads calls f for every run of slots that in reads. A slot whose address is
// taken is not read.
func (p *Program) reads(in *Instr, f func(Range)) {
	info := in.Op.info()
	for _, x := range [...]struct {
		o operand
		v int32
	}{{info.a, in.A}, {info.b, in.B}, {info.c, in.C}} {
		if x.o.role == read {
			f(Range{x.v, p.width(in, x.o)})
		}
	}
	switch in.Op {
	case Call:
		for _, r := range p.Calls[in.A].Args {
			f(r)
		}
	case Return:
		for _, r := range p.Returns[in.A] {
			f(r)
		}
	}
}

// writes returns the run of slots that in writes, of no words if none.
func (p *Program) writes(in *Instr) Range {
	if info := in.Op.info(); info.dst.role == write {
		return Range{in.Dst, p.width(in, info.dst)}
	}
	return Range{}
}

// MapSlots renames the slots of an instruction, except those of call sites and
// returns.
func (in *Instr) MapSlots(rename func(int32) int32) {
	info := in.Op.info()
	for _, x := range [...]struct {
		r role
		v *int32
	}{{info.dst.role, &in.Dst}, {info.a.role, &in.A}, {info.b.role, &in.B}, {info.c.role, &in.C}} {
		if x.r == read || x.r == write || x.r == frame {
			*x.v = rename(*x.v)
		}
	}
}
