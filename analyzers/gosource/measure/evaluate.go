package measure

import (
	"encoding/binary"
	"fmt"
	"math"
	"strings"

	"dextral/core/operation"
	"dextral/core/tape"
)

// Evaluate fills in what the function gives for the inputs of samples, which are
// those of the case's operands one after the other. Inputs that belong to no operand
// are zero. It may be called from several goroutines.
func (f *Function) Evaluate(c *Case, samples []operation.Sample) {
	f.mu.Lock()
	defer f.mu.Unlock()
	for first := 0; first < len(samples); first += tape.Lanes {
		f.evaluate(c, samples[first:min(first+tape.Lanes, len(samples))])
	}
}

func (f *Function) evaluate(c *Case, samples []operation.Sample) {
	b := f.batch
	for s := range samples {
		for i := range b.Inputs() {
			b.SetInBits(s, i, 0)
		}
		for i, v := range c.Settings {
			b.SetInt(s, i, v)
		}
		at := 0
		for _, o := range c.In {
			for _, port := range o.Ports {
				b.Set(s, port, samples[s].In[at])
				samples[s].In[at] = b.In(s, port) // as rounded
				at++
			}
		}
	}
	f.machine.Run(b)
	for s := range samples {
		f.read(c, b, s, &samples[s])
	}
}

// read takes the results of one sample out of a batch.
func (f *Function) read(c *Case, b *tape.Batch, s int, sample *operation.Sample) {
	sample.OK = b.Outcome(s) == tape.Returned
	sample.Out = sample.Out[:0]
	for _, o := range c.Out {
		for _, port := range o.Ports {
			sample.OK = sample.OK && b.Known(s, port)
			sample.Out = append(sample.Out, b.Out(s, port))
		}
	}
	for i, p := range b.Outputs() {
		if p.Kind == tape.Err && (!b.Known(s, i) || b.OutBits(s, i) != 0) {
			sample.OK = false
		}
	}
	if !sample.OK {
		for i := range sample.Out {
			sample.Out[i] = math.NaN()
		}
	}
	var path strings.Builder
	for _, w := range b.Path(s) {
		path.Write(binary.LittleEndian.AppendUint64(nil, w))
	}
	sample.Path = path.String()
}

// Branches lists the branches of the function and of what it calls; bit 2i of
// a path is set where branch i was taken with its condition false, bit 2i+1 where
// it was true. See Took.
func (f *Function) Branches() []tape.BranchRef { return f.machine.Branches() }

// Took reports whether a sample went through branch i with the condition true, or
// false.
func Took(s *operation.Sample, i int, condition bool) bool {
	bit := 2 * i
	if condition {
		bit++
	}
	at := bit / 8
	return at < len(s.Path) && s.Path[at]>>(bit%8)&1 != 0
}

// maxCases bounds the settings of one function.
const maxCases = 64

// cases lists the settings of a function: every combination of its integers,
// truth values and named constants, if these are not too many.
func (f *Function) cases() []*Case {
	all := []*Case{{Layout: f.Layout}}
	for i, p := range f.batch.Inputs() {
		if p.Kind.IsFloat() {
			continue
		}
		values := settings(f.machine.Sig, p)
		if len(all)*len(values) > maxCases {
			return all[:1]
		}
		var next []*Case
		for _, c := range all {
			for _, v := range values {
				n := &Case{Layout: f.Layout, Label: v.Name, Settings: map[int]int64{i: v.Value}}
				for k, x := range c.Settings {
					n.Settings[k] = x
				}
				if c.Label != "" {
					n.Label = c.Label + ", " + v.Name
				}
				next = append(next, n)
			}
		}
		all = next
	}
	return all
}

// settings are the values to try for one input that is no floating-point
// number.
func settings(sig *tape.Signature, p tape.Port) []tape.Named {
	if named := sig.Params[p.Param].Values; len(named) > 0 {
		list := make([]tape.Named, len(named))
		for i, v := range named {
			list[i] = tape.Named{Name: p.Name + " == " + v.Name, Value: v.Value}
		}
		return list
	}
	if p.Kind == tape.Bool {
		return []tape.Named{{Name: p.Name + " is false"}, {Name: p.Name + " is true", Value: 1}}
	}
	var list []tape.Named
	for v := range int64(4) {
		list = append(list, tape.Named{Name: fmt.Sprintf("%s == %d", p.Name, v), Value: v})
	}
	return list
}
