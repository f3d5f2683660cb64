package tape

import (
	"encoding/binary"
	"errors"
	"fmt"
	"math/bits"
)

// The serialised form starts with this byte, raised when the form changes.
const formVersion = 1

// MarshalBinary returns the serialised form: the same bytes for the same
// program, always. It makes programs fit for gob.
func (p *Program) MarshalBinary() ([]byte, error) {
	e := &encoder{strings: map[string]uint64{}}
	e.b = append(e.b, formVersion)
	e.string(p.Name)
	e.signature(&p.Sig)
	e.uint(uint64(p.Slots))
	e.constants(p.Consts)
	e.constants(p.Data)
	e.uint(uint64(len(p.Calls)))
	for i := range p.Calls {
		c := &p.Calls[i]
		e.string(c.Callee)
		e.uint(uint64(c.Words)<<1 | bit(c.Shared))
		e.ranges(c.Args)
	}
	e.uint(uint64(len(p.Returns)))
	for _, r := range p.Returns {
		e.ranges(r)
	}
	e.uint(uint64(len(p.Reasons)))
	for _, r := range p.Reasons {
		e.string(r)
	}
	e.uint(uint64(len(p.Branches)))
	for _, b := range p.Branches {
		e.string(b.Text)
		e.uint(uint64(b.Place))
	}
	e.uint(uint64(len(p.Places)))
	for _, q := range p.Places {
		e.string(q.File)
		e.uint(uint64(q.Line))
		e.uint(uint64(q.Col))
	}
	e.uint(uint64(len(p.Blocks)))
	last := int32(0)
	for _, s := range p.Blocks {
		e.uint(uint64(s - last))
		last = s
	}
	e.uint(uint64(len(p.Code)))
	for i := range p.Code {
		e.instr(&p.Code[i], len(p.Places) > 0)
	}
	return e.b, nil
}

type encoder struct {
	b       []byte
	strings map[string]uint64 // strings written so far and their numbers
	next    int32             // slot after the last one written
}

func (e *encoder) uint(v uint64) { e.b = binary.AppendUvarint(e.b, v) }
func (e *encoder) int(v int64)   { e.b = binary.AppendVarint(e.b, v) }

// string writes a string, or the number of one that has been written.
func (e *encoder) string(s string) {
	if n, ok := e.strings[s]; ok {
		e.uint(n)
		return
	}
	e.strings[s] = uint64(len(e.strings) + 1)
	e.uint(0)
	e.uint(uint64(len(s)))
	e.b = append(e.b, s...)
}

func (e *encoder) signature(s *Signature) {
	e.uint(uint64(len(s.Params)))
	for i := range s.Params {
		q := &s.Params[i]
		e.string(q.Name)
		e.string(q.Type)
		e.uint(uint64(q.Mode)<<1 | bit(q.Receiver))
		e.uint(uint64(q.Words))
		e.uint(uint64(q.Len))
		e.fields(q.Fields)
		e.uint(uint64(len(q.Values)))
		for _, v := range q.Values {
			e.string(v.Name)
			e.int(v.Value)
		}
	}
	e.uint(uint64(len(s.Results)))
	for i := range s.Results {
		q := &s.Results[i]
		e.string(q.Name)
		e.string(q.Type)
		e.uint(uint64(q.Mode))
		e.uint(uint64(q.Words))
		e.uint(uint64(q.Len))
		e.fields(q.Fields)
	}
}

func (e *encoder) fields(fs []Field) {
	e.uint(uint64(len(fs)))
	for _, f := range fs {
		e.string(f.Path)
		e.b = append(e.b, byte(f.Kind))
	}
}

// constants writes words with their bytes reversed for floats, so that the
// zeros at the end of a short fraction cost nothing.
func (e *encoder) constants(cs []Const) {
	e.uint(uint64(len(cs)))
	for _, c := range cs {
		e.b = append(e.b, byte(c.Kind))
		switch {
		case c.Kind == F64:
			e.uint(bits.ReverseBytes64(c.Bits))
		case c.Kind.IsSigned():
			e.int(int64(c.Bits))
		default:
			e.uint(c.Bits)
		}
	}
}

func (e *encoder) ranges(rs []Range) {
	e.uint(uint64(len(rs)))
	for _, r := range rs {
		e.uint(uint64(r.Slot))
		e.uint(uint64(r.N))
	}
}

// instr writes an instruction. The slot written is mostly the one after the
// last written, so the difference is kept.
func (e *encoder) instr(in *Instr, places bool) {
	e.b = append(e.b, byte(in.Op))
	info := in.Op.info()
	if info.dst.role == write {
		e.int(int64(in.Dst - e.next))
		e.next = in.Dst + 1
	} else if info.dst.role != none {
		e.uint(uint64(in.Dst))
	}
	for _, x := range [...]struct {
		o operand
		v int32
	}{{info.a, in.A}, {info.b, in.B}, {info.c, in.C}} {
		if x.o.role != none {
			e.uint(uint64(x.v))
		}
	}
	if places {
		e.uint(uint64(in.Place))
	}
}

// UnmarshalBinary reads the serialised form and checks the program.
func (p *Program) UnmarshalBinary(data []byte) (err error) {
	d := &decoder{b: data}
	defer func() {
		if r := recover(); r != nil {
			if r != errShort {
				panic(r)
			}
			err = errShort
		}
	}()
	if len(data) == 0 || data[0] != formVersion {
		return errors.New("tape: not a serialised program of this version")
	}
	d.b = d.b[1:]
	*p = Program{Name: d.string()}
	d.signature(&p.Sig)
	p.Slots = d.int32()
	p.Consts, p.Data = d.constants(), d.constants()
	p.Calls = list(d, func(c *CallSite) {
		c.Callee = d.string()
		w := d.uint()
		c.Words, c.Shared = int32(w>>1), w&1 != 0
		c.Args = d.ranges()
	})
	p.Returns = list(d, func(r *[]Range) { *r = d.ranges() })
	p.Reasons = list(d, func(r *string) { *r = d.string() })
	p.Branches = list(d, func(b *Branch) { b.Text, b.Place = d.string(), d.int32() })
	p.Places = list(d, func(q *Place) { q.File, q.Line, q.Col = d.string(), d.int32(), d.int32() })
	last := int32(0)
	p.Blocks = list(d, func(b *int32) { last += d.int32(); *b = last })
	next := int32(0)
	p.Code = list(d, func(in *Instr) { d.instr(in, &next, len(p.Places) > 0) })
	if len(d.b) != 0 {
		return fmt.Errorf("tape %s: %d bytes too many", p.Name, len(d.b))
	}
	return p.Check()
}

var errShort = errors.New("tape: serialised program is cut short")

type decoder struct {
	b       []byte
	strings []string
}

func (d *decoder) uint() uint64 {
	v, n := binary.Uvarint(d.b)
	if n <= 0 {
		panic(errShort)
	}
	d.b = d.b[n:]
	return v
}

func (d *decoder) int() int64 {
	v, n := binary.Varint(d.b)
	if n <= 0 {
		panic(errShort)
	}
	d.b = d.b[n:]
	return v
}

func (d *decoder) int32() int32 { return int32(d.uint()) }

func (d *decoder) byte() byte {
	if len(d.b) == 0 {
		panic(errShort)
	}
	c := d.b[0]
	d.b = d.b[1:]
	return c
}

func (d *decoder) string() string {
	if n := d.uint(); n != 0 {
		if n > uint64(len(d.strings)) {
			panic(errShort)
		}
		return d.strings[n-1]
	}
	n := d.uint()
	if n > uint64(len(d.b)) {
		panic(errShort)
	}
	s := string(d.b[:n])
	d.b = d.b[n:]
	d.strings = append(d.strings, s)
	return s
}

// list reads a counted list. Every element takes at least one byte, which
// bounds what a wrong count can ask for.
func list[T any](d *decoder, read func(*T)) []T {
	n := d.uint()
	if n == 0 {
		return nil
	}
	if n > uint64(len(d.b)) {
		panic(errShort)
	}
	l := make([]T, n)
	for i := range l {
		read(&l[i])
	}
	return l
}

func (d *decoder) signature(s *Signature) {
	s.Params = list(d, func(q *Param) {
		q.Name, q.Type = d.string(), d.string()
		m := d.uint()
		q.Mode, q.Receiver = Mode(m>>1), m&1 != 0
		q.Words, q.Len = int(d.int32()), int(d.int32())
		q.Fields = d.fields()
		q.Values = list(d, func(v *Named) { v.Name, v.Value = d.string(), d.int() })
	})
	s.Results = list(d, func(q *Result) {
		q.Name, q.Type, q.Mode = d.string(), d.string(), Mode(d.uint())
		q.Words, q.Len = int(d.int32()), int(d.int32())
		q.Fields = d.fields()
	})
}

func (d *decoder) fields() []Field {
	return list(d, func(f *Field) { f.Path, f.Kind = d.string(), Kind(d.byte()) })
}

func (d *decoder) constants() []Const {
	return list(d, func(c *Const) {
		c.Kind = Kind(d.byte())
		switch {
		case c.Kind == F64:
			c.Bits = bits.ReverseBytes64(d.uint())
		case c.Kind.IsSigned():
			c.Bits = uint64(d.int())
		default:
			c.Bits = d.uint()
		}
	})
}

func (d *decoder) ranges() []Range {
	return list(d, func(r *Range) { r.Slot, r.N = d.int32(), d.int32() })
}

func (d *decoder) instr(in *Instr, next *int32, places bool) {
	in.Op = Op(d.byte())
	if !in.Op.known() {
		panic(errShort)
	}
	info := in.Op.info()
	if info.dst.role == write {
		in.Dst = *next + int32(d.int())
		*next = in.Dst + 1
	} else if info.dst.role != none {
		in.Dst = d.int32()
	}
	for _, x := range [...]struct {
		o operand
		v *int32
	}{{info.a, &in.A}, {info.b, &in.B}, {info.c, &in.C}} {
		if x.o.role != none {
			*x.v = d.int32()
		}
	}
	if places {
		in.Place = d.int32()
	}
}
