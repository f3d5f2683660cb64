package tape

// Op is the operation of an instruction.
type Op uint8

// Operations. The doc of the package has the table of what they do.
const (
	Nop Op = iota

	// float64
	AddF
	SubF
	MulF
	DivF
	NegF
	EqF
	NeF
	LtF
	LeF
	// float32
	AddG
	SubG
	MulG
	DivG
	NegG
	EqG
	NeG
	LtG
	LeG
	// integers
	AddI
	SubI
	MulI
	DivI
	RemI
	DivU
	RemU
	AndI
	OrI
	XorI
	AndNotI
	ShlI
	ShrI
	ShrU
	NegI
	LtI
	LeI
	LtU
	LeU
	Wrap
	// words
	EqW
	NeW
	NotB
	// conversions
	FtoG
	GtoF
	ItoF
	ItoG
	FtoI
	GtoI
	Recast
	// complex128
	DivC
	// moves and memory
	Copy
	Zero
	Unknown
	FrameAddr
	DataAddr
	Load
	Store
	Move
	Elem
	Offset
	Bound
	BoundSlice
	New
	Make
	Append
	// control
	Jump
	If
	Return
	Panic
	Stop
	Call

	firstMath
)

// role says what an operand field of an instruction is.
type role uint8

const (
	none   role = iota
	write       // slot written
	read        // slot read
	frame       // slot whose address is taken
	number      // a number by itself
	count       // a number of words: the width of the operands marked wide
	block       // a block
	call        // an index into Calls
	ret         // an index into Returns
	reason      // an index into Reasons
	branch      // an index into Branches
	data        // an index into Data
	target      // a kind
)

// operand describes one operand field.
type operand struct {
	role  role
	class Kind // class of the slot
	wide  bool // takes as many words as the count operand says
	words int8 // words, if neither one nor wide
}

// opInfo describes an operation; printing, parsing, checking, encoding and the
// analyses all go by it.
type opInfo struct {
	name       string
	dst        operand
	a, b, c    operand
	terminator bool
}

var (
	wF   = operand{role: write, class: F64}
	wG   = operand{role: write, class: F32}
	wI   = operand{role: write, class: I64}
	wB   = operand{role: write, class: Bool}
	wP   = operand{role: write, class: Addr}
	wW   = operand{role: write}
	rF   = operand{role: read, class: F64}
	rG   = operand{role: read, class: F32}
	rI   = operand{role: read, class: I64}
	rB   = operand{role: read, class: Bool}
	rP   = operand{role: read, class: Addr}
	rW   = operand{role: read}
	num  = operand{role: number}
	cnt  = operand{role: count}
	wide = operand{role: write, wide: true}
	from = operand{role: read, wide: true}
	goTo = operand{role: block}
)

func binaryOp(name string, d, s operand) opInfo { return opInfo{name: name, dst: d, a: s, b: s} }
func unaryOp(name string, d, s operand) opInfo  { return opInfo{name: name, dst: d, a: s} }

var opTable = buildOpTable()

func buildOpTable() []opInfo {
	t := make([]opInfo, int(firstMath)+len(mathTable))
	base := map[Op]opInfo{
		Nop:  {name: "nop"},
		AddF: binaryOp("add.f64", wF, rF), SubF: binaryOp("sub.f64", wF, rF), MulF: binaryOp("mul.f64", wF, rF), DivF: binaryOp("div.f64", wF, rF),
		NegF: unaryOp("neg.f64", wF, rF),
		EqF:  binaryOp("eq.f64", wB, rF), NeF: binaryOp("ne.f64", wB, rF), LtF: binaryOp("lt.f64", wB, rF), LeF: binaryOp("le.f64", wB, rF),
		AddG: binaryOp("add.f32", wG, rG), SubG: binaryOp("sub.f32", wG, rG), MulG: binaryOp("mul.f32", wG, rG), DivG: binaryOp("div.f32", wG, rG),
		NegG: unaryOp("neg.f32", wG, rG),
		EqG:  binaryOp("eq.f32", wB, rG), NeG: binaryOp("ne.f32", wB, rG), LtG: binaryOp("lt.f32", wB, rG), LeG: binaryOp("le.f32", wB, rG),
		AddI: binaryOp("add", wI, rI), SubI: binaryOp("sub", wI, rI), MulI: binaryOp("mul", wI, rI),
		DivI: binaryOp("div", wI, rI), RemI: binaryOp("rem", wI, rI), DivU: binaryOp("div.u", wI, rI), RemU: binaryOp("rem.u", wI, rI),
		AndI: binaryOp("and", wW, rW), OrI: binaryOp("or", wW, rW), XorI: binaryOp("xor", wW, rW), AndNotI: binaryOp("andnot", wI, rI),
		ShlI: binaryOp("shl", wI, rI), ShrI: binaryOp("shr", wI, rI), ShrU: binaryOp("shr.u", wI, rI),
		NegI: unaryOp("neg", wI, rI),
		LtI:  binaryOp("lt", wB, rI), LeI: binaryOp("le", wB, rI), LtU: binaryOp("lt.u", wB, rI), LeU: binaryOp("le.u", wB, rI),
		Wrap: {name: "wrap", dst: wI, a: rI, c: operand{role: target}},
		EqW:  binaryOp("eq", wB, rW), NeW: binaryOp("ne", wB, rW), NotB: unaryOp("not", wB, rB),
		FtoG: unaryOp("f64to32", wG, rF), GtoF: unaryOp("f32to64", wF, rG),
		ItoF:   {name: "toF64", dst: wF, a: rI, c: operand{role: target}},
		ItoG:   {name: "toF32", dst: wG, a: rI, c: operand{role: target}},
		FtoI:   {name: "trunc.f64", dst: wI, a: rF, c: operand{role: target}},
		GtoI:   {name: "trunc.f32", dst: wI, a: rG, c: operand{role: target}},
		Recast: {name: "recast", dst: wW, a: rW, c: operand{role: target}},

		DivC: {name: "div.c128", dst: operand{role: write, words: 2}, a: operand{role: read, class: F64, words: 2}, b: operand{role: read, class: F64, words: 2}},

		Copy: {name: "copy", dst: wide, a: from, c: cnt}, Zero: {name: "zero", dst: wide, c: cnt}, Unknown: {name: "unknown", dst: wide, c: cnt},
		FrameAddr: {name: "frame", dst: wP, a: operand{role: frame, wide: true}, c: cnt},
		DataAddr:  {name: "data", dst: wP, a: operand{role: data}},
		Load:      {name: "load", dst: wide, a: rP, b: num, c: cnt},
		Store:     {name: "store", dst: num, a: rP, b: from, c: cnt},
		Move:      {name: "move", a: rP, b: rP, c: rI},
		Elem:      {name: "elem", dst: wP, a: rP, b: rI, c: num},
		Offset:    {name: "offset", dst: wP, a: rP, c: num},
		Bound:     {name: "bound", a: rI, b: rI}, BoundSlice: {name: "bounds", a: rI, b: rI, c: rI},
		New: {name: "new", dst: wP, c: num}, Make: {name: "make", dst: wP, a: rI, c: num},
		Append: {name: "append", dst: operand{role: write, words: 3}, a: operand{role: read, words: 3}, b: operand{role: read, words: 3}, c: num},

		Jump:   {name: "jump", a: goTo, terminator: true},
		If:     {name: "if", dst: operand{role: branch}, a: rB, b: goTo, c: goTo, terminator: true},
		Return: {name: "return", a: operand{role: ret}, terminator: true},
		Panic:  {name: "panic", a: operand{role: reason}, terminator: true},
		Stop:   {name: "stop", a: operand{role: reason}, terminator: true},
		Call:   {name: "call", dst: operand{role: write, words: -1}, a: operand{role: call}},
	}
	for op, info := range base {
		t[op] = info
	}
	for i := range mathTable {
		t[int(firstMath)+i] = mathTable[i].info()
	}
	return t
}

// known reports whether op is an operation.
func (op Op) known() bool { return int(op) < len(opTable) }

func (op Op) info() *opInfo { return &opTable[op] }

func (op Op) String() string {
	if !op.known() {
		return "op?"
	}
	return opTable[op].name
}

// IsMath reports whether op is a function of package math.
func (op Op) IsMath() bool { return op >= firstMath && op.known() }

var opByName = func() map[string]Op {
	m := make(map[string]Op)
	for i := range opTable {
		m[opTable[i].name] = Op(i)
	}
	return m
}()

// MathOp returns the operation of a function of package math by its name,
// such as "Atan2".
func MathOp(name string) (Op, bool) {
	op, ok := opByName["math."+name]
	return op, ok
}
