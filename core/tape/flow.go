package tape

// Flow tells which inputs of a program may influence which outputs, and which
// objects it may write. It errs on one side only: an input that Flow says does
// not matter does not matter, whatever the values.
//
// "Influence" includes deciding which way the program takes, but not whether
// it panics: see Decides.
type Flow struct {
	// Exact is false where the program was too much for the analysis, which
	// then says that everything may influence everything.
	Exact   bool
	inputs  int
	outputs []deps // of each output
	written []bool // of each output that belongs to a parameter
	decides deps
}

// Influences reports whether input i may influence output o.
func (f *Flow) Influences(i, o int) bool { return !f.Exact || f.outputs[o].has(i) }

// Written reports whether the program may write output o, which belongs to a
// pointer or slice parameter. Results always are written.
func (f *Flow) Written(o int) bool { return !f.Exact || f.written[o] }

// Decides reports whether input i may decide which branch is taken, here or in
// a function called, and so also whether the program panics.
func (f *Flow) Decides(i int) bool { return !f.Exact || f.decides.has(i) }

// Matters reports whether input i may influence anything at all beyond its own
// word: a result, another word that is written, or a branch.
func (f *Flow) Matters(i int) bool {
	if !f.Exact || f.decides.has(i) {
		return true
	}
	for o := range f.outputs {
		if f.written[o] && f.outputs[o].has(i) {
			return true
		}
	}
	return false
}

// deps is a set of inputs.
type deps []uint64

func (d deps) has(i int) bool { return i>>6 < len(d) && d[i>>6]>>(i&63)&1 != 0 }

// maxFlowWork bounds the number of words that the analysis may touch.
const maxFlowWork = 1 << 24

// Analyze finds out what influences what in p, which may call programs of lib.
func Analyze(p *Program, lib Library) (f *Flow) {
	f = &Flow{inputs: len(p.Sig.Inputs())}
	a := &analysis{lib: lib, summaries: map[*Program]*summary{}}
	defer func() {
		if r := recover(); r != nil {
			if r != errFlow {
				panic(r)
			}
			f.Exact = false
		}
	}()
	if p.Check() != nil || !p.Sig.Runnable() {
		return f
	}
	a.run(p, f)
	f.Exact = true
	return f
}
