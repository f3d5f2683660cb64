package measure

import (
	"slices"
	"strings"

	"dextral/core/operation"
	"dextral/core/tape"
)

// maxLayouts bounds the ways to see the numbers of one function.
const maxLayouts = 8

// layouts lists the ways to see the function's numbers as operands; none if it
// has no floating-point result.
func (f *Function) layouts() []Layout {
	params, results := signature(f.Object, f.Args)
	sig := f.machine.Sig
	if len(params) != len(sig.Params) || len(results) != len(sig.Results) {
		return nil // hidden parameters of a closure
	}
	var all []Layout
	for _, parted := range []bool{false, true} {
		var in, out []Operand
		at := 0
		for i := range sig.Params {
			p := &sig.Params[i]
			for _, part := range piecesOf(params[i], p.Len, parted) {
				o := operandOf(part, sig.ParamName(i), fieldNames(sig.ParamName(i), p.Fields), at)
				o.Receiver = p.Receiver
				in = append(in, o)
			}
			at += len(p.Fields)
		}
		at = 0
		for i := range sig.Results {
			r := &sig.Results[i]
			if len(r.Fields) == 0 {
				continue
			}
			for _, part := range piecesOf(results[i], r.Len, parted) {
				out = append(out, operandOf(part, sig.ResultName(i), fieldNames(sig.ResultName(i), r.Fields), at))
			}
			at += len(r.Fields)
		}
		for i := range sig.Params {
			p := &sig.Params[i]
			if p.Mode != tape.Pointer && p.Mode != tape.Slice {
				continue
			}
			for _, part := range piecesOf(params[i], p.Len, parted) {
				o := operandOf(part, sig.ParamName(i), fieldNames(sig.ParamName(i), p.Fields), at)
				o.Receiver, o.Written = p.Receiver, true
				if f.written(o) && !f.returned(p.Type, p.Mode) {
					out = append(out, o)
				}
			}
			at += len(p.Fields)
		}
		out = slices.DeleteFunc(out, func(o Operand) bool { return o.Size == 0 || !f.floats(o, f.batch.Outputs()) })
		in = slices.DeleteFunc(in, func(o Operand) bool { return !f.floats(o, f.batch.Inputs()) || !f.matters(o, out) })
		for _, i := range joined(in) {
			for _, o := range joined(out) {
				all = addLayout(all, Layout{i, o})
			}
		}
	}
	for _, l := range all {
		if len(l.Out) > 1 {
			for _, o := range l.Out {
				all = addLayout(all, Layout{l.In, []Operand{o}})
			}
		}
	}
	return all[:min(len(all), maxLayouts)]
}

func addLayout(all []Layout, l Layout) []Layout {
	if len(l.In) == 0 || len(l.Out) == 0 || slices.ContainsFunc(all, func(k Layout) bool { return same(k.In, l.In) && same(k.Out, l.Out) }) {
		return all
	}
	return append(all, l)
}

func same(a, b []Operand) bool {
	return slices.EqualFunc(a, b, func(x, y Operand) bool { return x.Kind == y.Kind && slices.Equal(x.Ports, y.Ports) })
}

func fieldNames(name string, fields []tape.Field) []string {
	names := make([]string, len(fields))
	for i, f := range fields {
		names[i] = name + f.Path
	}
	return names
}

func operandOf(p piece, name string, fields []string, at int) Operand {
	o := Operand{Operand: operation.Operand{Kind: p.kind, Size: p.size}, Name: name + p.path, Go: p.typ}
	if p.first+p.size > len(fields) {
		return Operand{} // laid out otherwise than expected
	}
	o.Names = fields[p.first : p.first+p.size]
	if p.typ != nil && p.size > 1 {
		o.Type = typeName(p.typ)
	}
	for k := range p.size {
		o.Ports = append(o.Ports, at+p.first+k)
	}
	return o
}

// floats reports whether all numbers of an operand are floating point.
func (f *Function) floats(o Operand, ports []tape.Port) bool {
	return o.Size > 0 && !slices.ContainsFunc(o.Ports, func(p int) bool { return !ports[p].Kind.IsFloat() })
}

// written reports whether any number of an output is written.
func (f *Function) written(o Operand) bool {
	return slices.ContainsFunc(o.Ports, f.Flow.Written)
}

// returned reports whether a parameter that is passed by address may also be
// the result: what a chained method returns is its receiver.
func (f *Function) returned(typ string, mode tape.Mode) bool {
	return slices.ContainsFunc(f.machine.Sig.Results, func(r tape.Result) bool { return r.Mode == mode && r.Type == typ })
}

// matters reports whether any number of an input influences any of the
// outputs.
func (f *Function) matters(o Operand, out []Operand) bool {
	for _, i := range o.Ports {
		if f.Flow.Decides(i) {
			return true
		}
		for _, r := range out {
			if slices.ContainsFunc(r.Ports, func(p int) bool { return f.Flow.Influences(i, p) }) {
				return true
			}
		}
	}
	return false
}

// joined lists the ways to put runs of single numbers together.
func joined(list []Operand) [][]Operand {
	ways := [][]Operand{nil}
	for i := 0; i < len(list); {
		j := i
		for j < len(list) && list[j].Kind == operation.Scalar && list[j].Written == list[i].Written {
			j++
		}
		if j-i < 3 {
			j = i + 1
			for w := range ways {
				ways[w] = append(slices.Clip(ways[w]), list[i])
			}
			i = j
			continue
		}
		var next [][]Operand
		for _, w := range ways {
			for _, sizes := range groupings(list[i:j]) {
				next = append(next, append(slices.Clone(w), group(list[i:j], sizes)...))
			}
		}
		ways, i = next, j
	}
	return ways
}

// groupings says how many single numbers may belong together.
func groupings(run []Operand) [][]int {
	switch len(run) {
	case 3:
		return [][]int{{3}}
	case 4:
		switch {
		case scalarPlace(run) >= 0:
			return [][]int{{4}}
		case isAngle(run[3]):
			return [][]int{{3, 1}, {4}}
		case isAngle(run[0]):
			return [][]int{{1, 3}, {4}}
		}
		return [][]int{{4}, {3, 1}, {1, 3}}
	case 6:
		return [][]int{{3, 3}}
	case 7:
		return [][]int{{4, 3}, {3, 4}}
	case 8:
		return [][]int{{4, 4}}
	case 9:
		return [][]int{{9}}
	case 12:
		return [][]int{{9, 3}}
	case 16:
		return [][]int{{16}}
	}
	ones := make([]int, len(run))
	for i := range ones {
		ones[i] = 1
	}
	return [][]int{ones}
}

// scalarPlace is where among four numbers one is called as the scalar of a
// quaternion is, or -1.
func scalarPlace(run []Operand) int {
	return slices.IndexFunc(run, func(o Operand) bool {
		switch strings.ToLower(baseName(o.Name)) {
		case "w", "qw", "q0", "real", "scalar", "aw", "bw":
			return true
		}
		return false
	})
}

// isAngle reports whether a number is called as an angle is.
func isAngle(o Operand) bool {
	switch n := strings.ToLower(baseName(o.Name)); n {
	case "angle", "theta", "phi", "rad", "radians", "deg", "degrees", "alpha", "a", "rot", "rotation", "ang":
		return true
	default:
		return strings.Contains(n, "angle")
	}
}

// group puts a run together in groups of the given sizes.
func group(run []Operand, sizes []int) []Operand {
	var all []Operand
	for _, n := range sizes {
		if n == 1 {
			all = append(all, run[0])
			run = run[1:]
			continue
		}
		o := Operand{Operand: operation.Operand{Kind: operation.KindOf(n), Size: n}, Written: run[0].Written}
		var names []string
		for _, r := range run[:n] {
			o.Names = append(o.Names, r.Names...)
			o.Ports = append(o.Ports, r.Ports...)
			names = append(names, r.Name)
		}
		o.Name = strings.Join(names, ", ")
		all = append(all, o)
		run = run[n:]
	}
	return all
}
