package tape

import (
	"fmt"
	"math"
)

// The reference evaluator: one sample at a time, values with their Go types,
// memory as objects that know nothing of each other. It is slow, obvious and
// shares with the machine only the table of package math. It is the oracle of
// the machine.

// pointer is an address: an object and a word in it. The zero pointer is nil.
type pointer struct {
	object *object
	word   int64
}

type object struct {
	words    []any
	readonly bool
}

// Values are float64, float32, int64, bool, pointer, and these two.
type (
	unknownValue struct{}
	otherValue   uint64 // errors and opaque values
)

// ending is how the reference ends early, as a panic.
type ending struct {
	outcome Outcome
	text    string
}

type reference struct {
	lib   Library
	fuel  int
	heap  int64
	depth int
	data  map[*Program]*object
	taken map[*Program]map[int32][2]bool
}

func (r *reference) end(o Outcome, format string, args ...any) {
	panic(ending{o, fmt.Sprintf(format, args...)})
}

// fromWord makes a value of a word.
func fromWord(k Kind, w uint64) any {
	switch {
	case k == F64:
		return math.Float64frombits(w)
	case k == F32:
		return math.Float32frombits(uint32(w))
	case k == Bool:
		return w != 0
	case k.IsInt():
		return int64(w)
	case k == Addr:
		return pointer{}
	case k == Any:
		return unknownValue{}
	}
	return otherValue(w)
}

// toWord makes a word of a value.
func toWord(v any) uint64 {
	switch v := v.(type) {
	case float64:
		return math.Float64bits(v)
	case float32:
		return uint64(math.Float32bits(v))
	case int64:
		return uint64(v)
	case bool:
		if v {
			return 1
		}
		return 0
	case otherValue:
		return uint64(v)
	}
	panic(fmt.Sprintf("no word for %T", v))
}

// refRun evaluates p on one sample of words, in the order of the inputs of a
// batch. Unknown outputs are unknownValue.
func refRun(p *Program, lib Library, in []uint64) (out []any, outcome Outcome, why string, taken map[*Program]map[int32][2]bool) {
	r := &reference{lib: lib, fuel: DefaultFuel, data: map[*Program]*object{}, taken: map[*Program]map[int32][2]bool{}}
	taken = r.taken
	defer func() {
		if e := recover(); e != nil {
			end, ok := e.(ending)
			if !ok {
				panic(e)
			}
			out, outcome, why = nil, end.outcome, end.text
		}
	}()
	var args []any
	objects := map[int]*object{}
	for i, q := range p.Sig.Params {
		var vals []any
		for k, f := range q.Fields {
			vals = append(vals, fromWord(f.Kind, in[k]))
		}
		in = in[len(q.Fields):]
		switch q.Mode {
		case Value:
			args = append(args, vals...)
		case Pointer:
			objects[i] = &object{words: vals}
			args = append(args, pointer{objects[i], 0})
		case Slice:
			objects[i] = &object{words: vals}
			args = append(args, pointer{objects[i], 0}, int64(q.Len), int64(q.Len))
		}
	}
	results := r.call(p, args)
	for _, q := range p.Sig.Results {
		vals := results[:q.Words]
		results = results[q.Words:]
		switch {
		case len(q.Fields) == 0:
		case q.Mode == Value:
			out = append(out, vals...)
		default:
			at, ok := vals[0].(pointer)
			if !ok {
				r.end(Undecided, "an address")
			}
			if at.object == nil {
				r.end(Undecided, "nil")
			}
			if q.Mode == Slice && vals[1] != int64(q.Len) {
				r.end(Undecided, "length")
			}
			out = append(out, at.object.words[at.word:][:len(q.Fields)]...)
		}
	}
	for i, q := range p.Sig.Params {
		if q.Mode == Pointer || q.Mode == Slice {
			out = append(out, objects[i].words...)
		}
	}
	return out, Returned, "", taken
}

func (r *reference) call(p *Program, args []any) []any {
	if r.depth++; r.depth > maxDepth {
		r.end(OutOfFuel, "depth")
	}
	defer func() { r.depth-- }()
	frame := &object{words: make([]any, p.Slots)}
	copy(frame.words, args)
	for i, c := range p.Consts {
		frame.words[p.Sig.Words()+i] = fromWord(c.Kind, c.Bits)
	}
	block := int32(0)
	for {
		next, results, done := r.block(p, block, frame)
		if done {
			return results
		}
		block = next
	}
}

// block executes one block and tells where to go on, or the results.
func (r *reference) block(p *Program, b int32, frame *object) (int32, []any, bool) {
	for i := int(p.Blocks[b]); i < p.blockEnd(int(b)); i++ {
		in := &p.Code[i]
		if r.fuel--; r.fuel < 0 {
			r.end(OutOfFuel, "fuel")
		}
		switch in.Op {
		case Jump:
			return in.A, nil, false
		case If:
			c, ok := frame.words[in.A].(bool)
			if !ok {
				r.end(Undecided, "condition")
			}
			if r.taken[p] == nil {
				r.taken[p] = map[int32][2]bool{}
			}
			sides := r.taken[p][in.Dst]
			if c {
				sides[1] = true
			} else {
				sides[0] = true
			}
			r.taken[p][in.Dst] = sides
			if c {
				return in.B, nil, false
			}
			return in.C, nil, false
		case Return:
			return 0, gather(frame, p.Returns[in.A]), true
		case Panic:
			r.end(Panicked, "%s", p.Reasons[in.A])
		case Stop:
			r.end(Undecided, "%s", p.Reasons[in.A])
		case Call:
			r.callSite(p, in, frame)
		default:
			r.instr(p, in, frame)
		}
	}
	panic("a block without an end")
}

func gather(frame *object, rs []Range) []any {
	var vals []any
	for _, x := range rs {
		vals = append(vals, frame.words[x.Slot:x.Slot+x.N]...)
	}
	return vals
}

func (r *reference) callSite(p *Program, in *Instr, frame *object) {
	site := &p.Calls[in.A]
	callee := r.lib[site.Callee]
	if callee == nil {
		if site.Shared {
			r.end(Undecided, "unknown callee")
		}
		for k := range site.Words {
			frame.words[in.Dst+k] = unknownValue{}
		}
		return
	}
	copy(frame.words[in.Dst:], r.call(callee, gather(frame, site.Args)))
}

// pointerAt returns the pointer in a slot.
func (r *reference) pointerAt(v any) pointer {
	p, ok := v.(pointer)
	if !ok {
		r.end(Undecided, "address")
	}
	return p
}

func (r *reference) dereference(v any, off int32) pointer {
	p := r.pointerAt(v)
	if p.object == nil {
		r.end(Panicked, "nil")
	}
	return pointer{p.object, p.word + int64(off)}
}

func (r *reference) intAt(v any) int64 {
	i, ok := v.(int64)
	if !ok {
		r.end(Undecided, "integer")
	}
	return i
}

// instr executes an instruction other than those of control.
func (r *reference) instr(p *Program, in *Instr, frame *object) {
	w := frame.words
	switch in.Op {
	case Copy:
		copy(w[in.Dst:in.Dst+in.C], append([]any(nil), w[in.A:in.A+in.C]...))
	case Zero:
		for k := range in.C {
			w[in.Dst+k] = nil // the reader gives it a type
		}
	case Unknown:
		for k := range in.C {
			w[in.Dst+k] = unknownValue{}
		}
	case FrameAddr:
		w[in.Dst] = pointer{frame, int64(in.A)}
	case DataAddr:
		w[in.Dst] = pointer{r.dataOf(p), int64(in.A)}
	case Load:
		at := r.dereference(w[in.A], in.B)
		copy(w[in.Dst:in.Dst+in.C], at.object.words[at.word:])
	case Store:
		at := r.dereference(w[in.A], in.Dst)
		if at.object.readonly {
			r.end(Undecided, "global")
		}
		copy(at.object.words[at.word:], w[in.B:in.B+in.C])
	case Elem:
		i := w[in.B]
		if _, ok := w[in.A].(pointer); !ok {
			w[in.Dst] = unknownValue{}
			break
		}
		at := w[in.A].(pointer)
		if _, ok := i.(int64); !ok {
			w[in.Dst] = unknownValue{}
			break
		}
		w[in.Dst] = pointer{at.object, at.word + i.(int64)*int64(in.C)}
	case Offset:
		w[in.Dst] = r.dereference(w[in.A], in.C)
	case Bound:
		if i, n := r.intAt(w[in.A]), r.intAt(w[in.B]); i < 0 || i >= n {
			r.end(Panicked, "index")
		}
	case BoundSlice:
		if i, j, n := r.intAt(w[in.A]), r.intAt(w[in.B]), r.intAt(w[in.C]); i < 0 || i > j || j > n {
			r.end(Panicked, "slice")
		}
	default:
		r.instr2(in, frame)
	}
}

func (r *reference) dataOf(p *Program) *object {
	if r.data[p] == nil {
		o := &object{readonly: true}
		for _, c := range p.Data {
			o.words = append(o.words, fromWord(c.Kind, c.Bits))
		}
		r.data[p] = o
	}
	return r.data[p]
}

// instr2 does allocation and values.
func (r *reference) instr2(in *Instr, frame *object) {
	w := frame.words
	switch in.Op {
	case New:
		w[in.Dst] = r.fresh(int64(in.C))
	case Make:
		n := r.intAt(w[in.A])
		if n < 0 {
			r.end(Panicked, "length")
		}
		w[in.Dst] = r.fresh(n * int64(in.C))
	case Move:
		n := r.intAt(w[in.C])
		if n <= 0 {
			break
		}
		to, from := r.dereference(w[in.A], 0), r.dereference(w[in.B], 0)
		copy(to.object.words[to.word:to.word+n], append([]any(nil), from.object.words[from.word:from.word+n]...))
	case Append:
		r.append(in, w)
	default:
		r.value(in, w)
	}
}

// fresh makes an object; one sample may have maxHeap words in all.
func (r *reference) fresh(words int64) pointer {
	if r.heap += max(words, 1); r.heap > maxHeap {
		r.end(OutOfFuel, "memory")
	}
	return pointer{&object{words: make([]any, words)}, 0}
}

func (r *reference) append(in *Instr, w []any) {
	words := int64(in.C)
	at, n, room := r.pointerAt(w[in.A]), r.intAt(w[in.A+1]), r.intAt(w[in.A+2])
	from, more := r.pointerAt(w[in.B]), r.intAt(w[in.B+1])
	if n+more > room {
		room = 2 * (n + more)
		o := r.fresh(room * words)
		if n > 0 {
			copy(o.object.words, at.object.words[at.word:at.word+n*words])
		}
		at = o
	}
	if more > 0 {
		copy(at.object.words[at.word+n*words:], from.object.words[from.word:from.word+more*words])
	}
	w[in.Dst], w[in.Dst+1], w[in.Dst+2] = at, n+more, room
}

// value does operations from values to a value. A cleared word has the type
// that the operation asks for.
func (r *reference) value(in *Instr, w []any) {
	info := in.Op.info()
	var args []any
	for _, x := range [...]struct {
		o operand
		v int32
	}{{info.a, in.A}, {info.b, in.B}, {info.c, in.C}} {
		if x.o.role != read {
			continue
		}
		for k := range max(x.o.words, 1) {
			v := w[x.v+int32(k)]
			if v == nil && x.o.class != Any {
				v = fromWord(x.o.class, 0)
			}
			args = append(args, v)
		}
	}
	for i, a := range args {
		if a == nil {
			args[i] = zeroLike(args[len(args)-1-i])
		}
	}
	switch in.Op {
	case DivI, RemI, DivU, RemU:
		if r.intAt(args[1]) == 0 {
			r.end(Panicked, "divide")
		}
	}
	for _, a := range args {
		if _, ok := a.(unknownValue); ok {
			for k := range max(info.dst.words, 1) {
				w[in.Dst+int32(k)] = unknownValue{}
			}
			return
		}
	}
	if in.Op == DivC {
		z := complex(args[0].(float64), args[1].(float64)) / complex(args[2].(float64), args[3].(float64))
		w[in.Dst], w[in.Dst+1] = real(z), imag(z)
		return
	}
	switch {
	case in.Op.IsMath():
		mathValue(&mathTable[in.Op-firstMath], w[in.Dst:], args)
	case in.Op <= LeF:
		w[in.Dst] = refFloat64(in.Op, args)
	case in.Op <= LeG:
		w[in.Dst] = refFloat32(in.Op, args)
	case in.Op == Recast:
		w[in.Dst] = fromWord(Kind(in.C), toWord(args[0]))
	case in.Op == EqW || in.Op == NeW:
		w[in.Dst] = (args[0] == args[1]) == (in.Op == EqW)
	case in.Op == NotB:
		w[in.Dst] = !args[0].(bool)
	case in.Op == FtoG:
		w[in.Dst] = float32(args[0].(float64))
	case in.Op == GtoF:
		w[in.Dst] = float64(args[0].(float32))
	default:
		w[in.Dst] = refInt(in, args)
	}
}

// zeroLike is zero with the type of another value.
func zeroLike(v any) any {
	switch v.(type) {
	case float64:
		return 0.0
	case float32:
		return float32(0)
	case bool:
		return false
	case pointer:
		return pointer{}
	}
	return int64(0)
}

func mathValue(f *mathFunc, dst []any, args []any) {
	switch {
	case f.f1 != nil:
		dst[0] = f.f1(args[0].(float64))
	case f.f2 != nil:
		dst[0] = f.f2(args[0].(float64), args[1].(float64))
	default:
		var in [3]uint64
		for i, a := range args {
			in[i] = toWord(a)
		}
		out := f.general(in)
		for i, k := range f.out {
			dst[i] = fromWord(k, out[i])
		}
	}
}

func refFloat64(op Op, args []any) any {
	a := args[0].(float64)
	if op == NegF {
		return -a
	}
	b := args[1].(float64)
	switch op {
	case AddF:
		return a + b
	case SubF:
		return a - b
	case MulF:
		return a * b
	case DivF:
		return a / b
	case EqF:
		return a == b
	case NeF:
		return a != b
	case LtF:
		return a < b
	case LeF:
		return a <= b
	}
	panic(op)
}

func refFloat32(op Op, args []any) any {
	a := args[0].(float32)
	if op == NegG {
		return -a
	}
	b := args[1].(float32)
	switch op {
	case AddG:
		return a + b
	case SubG:
		return a - b
	case MulG:
		return a * b
	case DivG:
		return a / b
	case EqG:
		return a == b
	case NeG:
		return a != b
	case LtG:
		return a < b
	case LeG:
		return a <= b
	}
	panic(op)
}

// refInt does integers, truth values and conversions.
func refInt(in *Instr, args []any) any {
	k := Kind(in.C)
	switch in.Op {
	case FtoI:
		return int64(truncate(k, args[0].(float64)))
	case GtoI:
		return int64(truncate32(k, args[0].(float32)))
	case AndI, OrI, XorI:
		if a, ok := args[0].(bool); ok {
			b := args[1].(bool)
			return map[Op]bool{AndI: a && b, OrI: a || b, XorI: a != b}[in.Op]
		}
	}
	a := args[0].(int64)
	switch in.Op {
	case ItoF:
		if k == U64 {
			return float64(uint64(a))
		}
		return float64(a)
	case ItoG:
		if k == U64 {
			return float32(uint64(a))
		}
		return float32(a)
	case Wrap:
		return int64(wrap(k, uint64(a)))
	case NegI:
		return -a
	}
	b := args[1].(int64)
	switch in.Op {
	case AddI:
		return a + b
	case SubI:
		return a - b
	case MulI:
		return a * b
	case DivI:
		return a / b
	case RemI:
		return a % b
	case DivU:
		return int64(uint64(a) / uint64(b))
	case RemU:
		return int64(uint64(a) % uint64(b))
	case AndI:
		return a & b
	case OrI:
		return a | b
	case XorI:
		return a ^ b
	case AndNotI:
		return a &^ b
	case ShlI:
		return a << uint64(b)
	case ShrI:
		return a >> uint64(b)
	case ShrU:
		return int64(uint64(a) >> uint64(b))
	case LtI:
		return a < b
	case LeI:
		return a <= b
	case LtU:
		return uint64(a) < uint64(b)
	case LeU:
		return uint64(a) <= uint64(b)
	}
	panic(in.Op)
}
