package idle

import (
	_ "embed" // of the package's essay
	"fmt"
	"go/types"
	"regexp"
	"slices"

	"golang.org/x/tools/go/analysis"

	"dextral/analyzers/gosource/doc"
	"dextral/analyzers/gosource/found"
	"dextral/analyzers/gosource/measure"
	"dextral/core/operation"
	"dextral/core/tape"
	"dextral/rules"
)

//go:embed doc.go
var essay string

// Analyzer reports idle arguments and receivers that change unasked.
var Analyzer = &analysis.Analyzer{
	Name:       "idle",
	Doc:        doc.Section(essay),
	Run:        run,
	Requires:   []*analysis.Analyzer{measure.Analyzer},
	ResultType: found.Type,
}

func run(pass *analysis.Pass) (any, error) {
	measured := pass.ResultOf[measure.Analyzer].(*measure.Result)
	c := found.In(pass)
	for _, f := range measured.Funcs {
		if f.Decl == nil || f.Decl.Body == nil || !f.Flow.Exact || !rotational(measured, f) {
			continue
		}
		for _, o := range idle(f) {
			c.Add(&rules.Finding{Rule: rules.ArgumentIdle, Level: rules.Note, Key: f.Key(),
				Message: fmt.Sprintf("%s does not depend on %s: no value of it can change a result", f.Key(), o),
				Claim:   "an argument has an influence",
				Remedy:  "use it, leave it out, or name it _"}, f.Decl.Name)
		}
		if changes(f) {
			c.Add(&rules.Finding{Rule: rules.ReceiverChanged, Level: rules.Warning, Key: f.Key(),
				Message: fmt.Sprintf("%s returns a value and changes its receiver as well: whoever calls it for the value has another rotation in the receiver afterwards", f.Key()),
				Claim:   "reads its receiver, by name and result",
				Remedy:  "work on a copy, or return nothing and say in the name that it changes its receiver"}, f.Decl.Name)
		}
	}
	return c.Done()
}

// rotational reports whether a type of the function is known to hold rotations.
func rotational(r *measure.Result, f *measure.Function) bool {
	for _, list := range [][]measure.Operand{f.In, f.Out} {
		for _, o := range list {
			if t := r.Type(o.Type); t != nil && len(t.Rotational) > 0 {
				return true
			}
		}
	}
	return false
}

// idle are the named parameters, not the receiver, of which nothing matters.
func idle(f *measure.Function) (names []string) {
	if f.Decl.Recv != nil || !f.Object.Exported() {
		return nil // an interface may want the argument
	}
	sig := &f.Program.Sig
	matters := make([]bool, len(sig.Params))
	for i, p := range sig.Inputs() {
		if p.Param >= 0 && (f.Flow.Matters(i) || f.Flow.Decides(i)) {
			matters[p.Param] = true
		}
	}
	written := writtenParams(f)
	for i, p := range sig.Params {
		if !matters[i] && !written[i] && p.Name != "" && p.Name != "_" && len(p.Fields) > 0 && p.Mode != tape.Hidden {
			names = append(names, p.Name)
		}
	}
	return names
}

// writtenParams tells which parameters the function may write.
func writtenParams(f *measure.Function) []bool {
	sig := &f.Program.Sig
	written := make([]bool, len(sig.Params))
	for i, p := range sig.Outputs() {
		if p.Param >= 0 && p.Result < 0 && f.Flow.Written(i) {
			written[p.Param] = true
		}
	}
	return written
}

// reads are names of what one gets from a rotation.
var reads = regexp.MustCompile(`^(Get|To|As|Is)[A-Z]|^(Conj|Inverse|Inv|Norm|Length|Len|Dot|Angle|Euler|Matrix|Mat|Rotated|Conjugated|Inverted|Normali[sz]ed|Transposed|Transpose|Mul|Product)`)

// changes reports a method with a pointer receiver that is named as if it only read,
// returns a quaternion or matrix by value, and writes its receiver.
func changes(f *measure.Function) bool {
	recv := f.Object.Signature().Recv()
	if recv == nil || !reads.MatchString(f.Object.Name()) || f.Object.Signature().Results().Len() != 1 {
		return false
	}
	if _, pointer := recv.Type().(*types.Pointer); !pointer {
		return false
	}
	if _, pointer := f.Object.Signature().Results().At(0).Type().(*types.Pointer); pointer {
		return false // it returns the receiver, which is a style
	}
	if !slices.ContainsFunc(f.Out, func(o measure.Operand) bool { return !o.Written && o.Kind != operation.Scalar }) {
		return false
	}
	written := writtenParams(f)
	return len(written) > 0 && f.Program.Sig.Params[0].Receiver && written[0]
}
