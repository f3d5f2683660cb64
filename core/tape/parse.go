package tape

import (
	"fmt"
	"math"
	"strconv"
	"strings"
)

// Parse reads the text form of programs, one after the other, and checks them.
// Empty lines and lines that begin with # are skipped. Errors say the line.
func Parse(text string) (Library, error) {
	lib := Library{}
	var p *parser
	finish := func() error {
		if p == nil {
			return nil
		}
		if err := p.p.Check(); err != nil {
			return err
		}
		lib[p.p.Name] = p.p
		return nil
	}
	for n, line := range strings.Split(text, "\n") {
		line = strings.TrimSpace(line)
		if line == "" || strings.HasPrefix(line, "#") {
			continue
		}
		if strings.HasPrefix(line, "tape ") {
			if err := finish(); err != nil {
				return nil, err
			}
			p = &parser{p: &Program{}}
		}
		if p == nil {
			return nil, fmt.Errorf("tape text, line %d: no tape begins before %q", n+1, line)
		}
		if err := p.line(line); err != nil {
			return nil, fmt.Errorf("tape text, line %d: %w", n+1, err)
		}
	}
	return lib, finish()
}

// MustParse is Parse for text that is known to be right, and returns the first
// program too.
func MustParse(text string) (*Program, Library) {
	lib, err := Parse(text)
	if err != nil {
		panic(err)
	}
	name, _, _ := strings.Cut(strings.TrimSpace(text), "\n")
	unquoted, _ := strconv.Unquote(strings.TrimPrefix(name, "tape "))
	return lib[unquoted], lib
}

type parser struct {
	p      *Program
	tokens []string
	err    error
}

func (q *parser) fail(format string, args ...any) {
	if q.err == nil {
		q.err = fmt.Errorf(format, args...)
	}
}

// line reads one line.
func (q *parser) line(s string) error {
	q.tokens, q.err = tokens(s), nil
	switch word := q.word(); word {
	case "tape":
		q.p.Name = q.quoted()
	case "param":
		q.param()
	case "result":
		q.result()
	case "slots":
		q.p.Slots = q.number()
	case "const":
		q.word() // the slot is for the reader
		q.p.Consts = append(q.p.Consts, q.constant())
	case "data":
		if len(q.tokens) == 2 && !strings.HasPrefix(q.tokens[0], "s") {
			q.p.Data = append(q.p.Data, q.constant())
			break
		}
		q.instr(word)
	case "callsite":
		c := CallSite{Callee: q.quoted(), Words: q.number()}
		c.Shared = q.accept("shared")
		c.Args = q.ranges()
		q.p.Calls = append(q.p.Calls, c)
	case "results":
		q.p.Returns = append(q.p.Returns, q.ranges())
	case "reason":
		q.p.Reasons = append(q.p.Reasons, q.quoted())
	case "branch":
		q.p.Branches = append(q.p.Branches, Branch{q.quoted(), q.number()})
	case "place":
		q.p.Places = append(q.p.Places, Place{q.quoted(), q.number(), q.number()})
	default:
		if word == "b"+strconv.Itoa(len(q.p.Blocks))+":" {
			q.p.Blocks = append(q.p.Blocks, int32(len(q.p.Code)))
			break
		}
		q.instr(word)
	}
	if q.err == nil && len(q.tokens) > 0 {
		q.fail("%q is too much", strings.Join(q.tokens, " "))
	}
	return q.err
}

// tokens cuts a line at spaces, but not within quotes, and leaves out what
// stands in parentheses, which is for the reader.
func tokens(s string) []string {
	var out []string
	for s = strings.TrimSpace(s); s != ""; s = strings.TrimSpace(s) {
		switch s[0] {
		case '"':
			if text, err := strconv.QuotedPrefix(s); err == nil {
				out = append(out, text)
				s = s[len(text):]
				continue
			}
		case '(':
			if i := strings.LastIndexByte(s, ')'); i > 0 {
				s = s[i+1:]
				continue
			}
		}
		i := strings.IndexByte(s, ' ')
		if i < 0 {
			i = len(s)
		}
		out = append(out, s[:i])
		s = s[i:]
	}
	return out
}

func (q *parser) word() string {
	if len(q.tokens) == 0 {
		q.fail("the line is cut short")
		return ""
	}
	w := q.tokens[0]
	q.tokens = q.tokens[1:]
	return w
}

func (q *parser) accept(word string) bool {
	if len(q.tokens) > 0 && q.tokens[0] == word {
		q.tokens = q.tokens[1:]
		return true
	}
	return false
}

func (q *parser) quoted() string {
	s, err := strconv.Unquote(q.word())
	if err != nil {
		q.fail("a text in quotes is missing")
	}
	return s
}

func (q *parser) number() int32 { return q.prefixed("") }

// prefixed reads a number after a prefix, such as b2.
func (q *parser) prefixed(prefix string) int32 {
	w := q.word()
	n, err := strconv.ParseInt(strings.TrimPrefix(w, prefix), 10, 32)
	if err != nil || !strings.HasPrefix(w, prefix) {
		q.fail("%q is not a number %s", w, prefix)
	}
	return int32(n)
}

// slots reads s7 or s7+4.
func (q *parser) slots() Range {
	w := q.word()
	s, n, many := strings.Cut(strings.TrimPrefix(w, "s"), "+")
	slot, err := strconv.ParseInt(s, 10, 32)
	count := int64(1)
	if many && err == nil {
		count, err = strconv.ParseInt(n, 10, 32)
	}
	if err != nil || !strings.HasPrefix(w, "s") {
		q.fail("%q is not a slot", w)
	}
	return Range{int32(slot), int32(count)}
}

func (q *parser) ranges() []Range {
	var rs []Range
	for len(q.tokens) > 0 && q.err == nil {
		rs = append(rs, q.slots())
	}
	return rs
}

func (q *parser) kind(s string) Kind {
	for i, n := range kindNames {
		if n == s {
			return Kind(i)
		}
	}
	q.fail("%q is not a kind", s)
	return Any
}

func (q *parser) mode() Mode {
	w := q.word()
	for i, n := range modeNames {
		if n == w {
			return Mode(i)
		}
	}
	q.fail("%q is not a mode", w)
	return Hidden
}

func (q *parser) name() string {
	if w := q.word(); w != "-" {
		return w
	}
	return ""
}

func (q *parser) param() {
	r := Param{Name: q.name(), Type: q.quoted(), Mode: q.mode()}
	r.Receiver = q.accept("receiver")
	r.Words, r.Len = int(q.number()), int(q.number())
	r.Fields = q.fields()
	for len(q.tokens) > 0 && q.err == nil {
		name, value, _ := strings.Cut(q.word(), "=")
		v, err := strconv.ParseInt(value, 10, 64)
		if err != nil {
			q.fail("%q has no value", name)
		}
		r.Values = append(r.Values, Named{name, v})
	}
	q.p.Sig.Params = append(q.p.Sig.Params, r)
}

func (q *parser) result() {
	r := Result{Name: q.name(), Type: q.quoted(), Mode: q.mode(), Words: int(q.number()), Len: int(q.number())}
	r.Fields = q.fields()
	q.p.Sig.Results = append(q.p.Sig.Results, r)
}

func (q *parser) fields() []Field {
	var fs []Field
	for len(q.tokens) > 0 && q.err == nil {
		i := strings.LastIndexByte(q.tokens[0], ':')
		if i < 0 {
			break
		}
		w := q.word()
		fs = append(fs, Field{w[:i], q.kind(w[i+1:])})
	}
	return fs
}

// constant reads a kind and a value.
func (q *parser) constant() Const {
	c := Const{Kind: q.kind(q.word())}
	w := q.word()
	var err error
	switch {
	case strings.HasPrefix(w, "0x") || !c.Kind.IsFloat() && !c.Kind.IsSigned():
		c.Bits, err = strconv.ParseUint(strings.TrimPrefix(w, "0x"), 16, 64)
	case c.Kind == F64:
		var f float64
		f, err = strconv.ParseFloat(w, 64)
		c.Bits = math.Float64bits(f)
	case c.Kind == F32:
		var f float64
		f, err = strconv.ParseFloat(w, 32)
		c.Bits = word32(float32(f))
	default:
		var i int64
		i, err = strconv.ParseInt(w, 10, 64)
		c.Bits = uint64(i)
	}
	if err != nil {
		q.fail("%q is not a value of kind %v", w, c.Kind)
	}
	return c
}

// instr reads an instruction: its name, then its operands in order.
func (q *parser) instr(name string) {
	op, ok := opByName[name]
	if !ok {
		q.fail("%q is not an operation", name)
		return
	}
	in := Instr{Op: op}
	info := op.info()
	for _, x := range [...]struct {
		o operand
		v *int32
	}{{info.dst, &in.Dst}, {info.a, &in.A}, {info.b, &in.B}, {info.c, &in.C}} {
		q.operand(x.o, x.v, &in)
	}
	if len(q.tokens) > 0 && strings.HasPrefix(q.tokens[0], "@") {
		in.Place = q.prefixed("@")
	}
	q.p.Code = append(q.p.Code, in)
}

func (q *parser) operand(o operand, v *int32, in *Instr) {
	switch o.role {
	case none, count:
	case read, write, frame:
		r := q.slots()
		*v = r.Slot
		if o.wide {
			in.C = r.N
		}
	case block:
		*v = q.prefixed("b")
	case target:
		*v = int32(q.kind(q.word()))
	case number:
		*v = q.number()
	default:
		*v = q.prefixed("#")
	}
}
