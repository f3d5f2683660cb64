package tape

import (
	"fmt"
	"math"
	"strconv"
	"strings"
)

// String returns the text form of a program, which [Parse] reads. Slots print
// as s7, runs of slots as s7+4, blocks as b2.
func (p *Program) String() string {
	w := &writer{p: p}
	w.line("tape %s", strconv.Quote(p.Name))
	for i := range p.Sig.Params {
		q := &p.Sig.Params[i]
		mode := q.Mode.String()
		if q.Receiver {
			mode += " receiver"
		}
		w.line("param %s %s %s %d %d%s%s", name(q.Name), strconv.Quote(q.Type), mode, q.Words, q.Len, fieldText(q.Fields), namedText(q.Values))
	}
	for i := range p.Sig.Results {
		q := &p.Sig.Results[i]
		w.line("result %s %s %s %d %d%s", name(q.Name), strconv.Quote(q.Type), q.Mode, q.Words, q.Len, fieldText(q.Fields))
	}
	w.line("slots %d", p.Slots)
	for i, c := range p.Consts {
		w.line("const s%d %s", p.Sig.Words()+i, constText(c))
	}
	for _, c := range p.Data {
		w.line("data %s", constText(c))
	}
	for i := range p.Calls {
		c := &p.Calls[i]
		shared := ""
		if c.Shared {
			shared = " shared"
		}
		w.line("callsite %s %d%s%s", strconv.Quote(c.Callee), c.Words, shared, rangesText(c.Args))
	}
	for _, r := range p.Returns {
		w.line("results%s", rangesText(r))
	}
	for _, r := range p.Reasons {
		w.line("reason %s", strconv.Quote(r))
	}
	for i := range p.Branches {
		w.line("branch %s %d", strconv.Quote(p.Branches[i].Text), p.Branches[i].Place)
	}
	for _, q := range p.Places {
		w.line("place %s %d %d", strconv.Quote(q.File), q.Line, q.Col)
	}
	for b := range p.Blocks {
		w.line("b%d:", b)
		for i := int(p.Blocks[b]); i < p.blockEnd(b); i++ {
			w.line("\t%s", p.instrText(&p.Code[i]))
		}
	}
	return w.b.String()
}

type writer struct {
	p *Program
	b strings.Builder
}

func (w *writer) line(format string, args ...any) { fmt.Fprintf(&w.b, format+"\n", args...) }

func name(s string) string {
	if s == "" {
		return "-"
	}
	return s
}

func fieldText(fs []Field) string {
	var b strings.Builder
	for _, f := range fs {
		fmt.Fprintf(&b, " %s:%v", f.Path, f.Kind)
	}
	return b.String()
}

func namedText(ns []Named) string {
	var b strings.Builder
	for _, n := range ns {
		fmt.Fprintf(&b, " %s=%d", n.Name, n.Value)
	}
	return b.String()
}

func rangesText(rs []Range) string {
	var b strings.Builder
	for _, r := range rs {
		b.WriteString(" " + rangeText(r))
	}
	return b.String()
}

func rangeText(r Range) string {
	if r.N == 1 {
		return fmt.Sprintf("s%d", r.Slot)
	}
	return fmt.Sprintf("s%d+%d", r.Slot, r.N)
}

// constText prints a constant so that reading it gives the same bits.
func constText(c Const) string {
	switch c.Kind {
	case F64:
		if f := math.Float64frombits(c.Bits); f == f {
			return "f64 " + strconv.FormatFloat(f, 'g', -1, 64)
		}
	case F32:
		if f := float32of(c.Bits); f == f {
			return "f32 " + strconv.FormatFloat(float64(f), 'g', -1, 32)
		}
	}
	if c.Kind.IsSigned() {
		return fmt.Sprintf("%v %d", c.Kind, int64(c.Bits))
	}
	return fmt.Sprintf("%v %#x", c.Kind, c.Bits)
}

// instrText prints one instruction: its name, then its operands in order.
func (p *Program) instrText(in *Instr) string {
	info := in.Op.info()
	var b strings.Builder
	b.WriteString(info.name)
	for _, x := range [...]struct {
		o operand
		v int32
	}{{info.dst, in.Dst}, {info.a, in.A}, {info.b, in.B}, {info.c, in.C}} {
		switch x.o.role {
		case none, count:
		case read, write, frame:
			b.WriteString(" " + rangeText(Range{x.v, p.width(in, x.o)}))
		case block:
			fmt.Fprintf(&b, " b%d", x.v)
		case target:
			b.WriteString(" " + Kind(x.v).String())
		case number:
			fmt.Fprintf(&b, " %d", x.v)
		case ret:
			fmt.Fprintf(&b, " #%d%s", x.v, comment(rangesText(p.Returns[x.v])))
		case call:
			fmt.Fprintf(&b, " #%d%s", x.v, comment(" "+p.Calls[x.v].Callee+rangesText(p.Calls[x.v].Args)))
		default:
			fmt.Fprintf(&b, " #%d", x.v)
		}
	}
	if in.Place != 0 {
		fmt.Fprintf(&b, " @%d", in.Place)
	}
	return b.String()
}

func comment(s string) string { return " (" + strings.TrimSpace(s) + ")" }
