package mislabelled

import (
	"fmt"
	"regexp"
	"slices"

	"dextral/analyzers/gosource/measure"
	"dextral/analyzers/gosource/named"
	"dextral/core/operation"
	"dextral/rules"
)

// unitStated are words of authors who restrict a function to unit quaternions, or know
// what it computes.
var unitStated = regexp.MustCompile(`(?i)\bunit\b|normali[sz]ed|conjugate|versor`)

// other holds a name to the operation that it is for, where another operation that is
// known is computed: an interpolation of another kind, and a conjugate called an inverse
// in a package that makes quaternions which are not of unit norm.
func (f *function) other() *contradiction {
	r, ok := f.one()
	if !ok || !f.measured.Orients(f.Function, f.c, nil) {
		return nil
	}
	words := named.Words(f.Object.Name())
	switch {
	case slices.Contains(words, "slerp") && (r.Op == operation.Nlerp || r.Op == operation.Lerp):
		return &contradiction{subject: "operation", stated: string(operation.Slerp), by: rules.Name, measured: "the " + string(r.Op),
			effect: "the turn is not in proportion to the fraction of the way"}
	case r.Op == operation.Conjugate && slices.ContainsFunc(words, isInverse) && (f.comment == nil || !unitStated.MatchString(f.comment.Text)):
		if by := f.leavesUnit(); by != "" {
			return &contradiction{subject: "operation", stated: string(operation.Inverse), by: rules.Name, measured: "the conjugate",
				effect: fmt.Sprintf("that is the inverse at norm one only, and %s makes quaternions of other norms: at norm 2 it is 4 times too large", by)}
		}
	}
	return nil
}

func isInverse(word string) bool {
	switch word {
	case "inv", "inverse", "invert", "inverted":
		return true
	}
	return false
}

// leavesUnit names an exported function of the package that makes quaternions of the
// same type which are not of unit norm from such as are.
func (f *function) leavesUnit() string {
	typ := f.c.In[0].Type
	for _, g := range f.measured.Funcs {
		if !g.Object.Exported() || g.Decl == nil {
			continue
		}
		for _, c := range g.Cases {
			if len(c.Out) == 1 && c.Out[0].Type == typ && typ != "" && leaves(c) {
				return g.Key()
			}
		}
	}
	return ""
}

func leaves(c *measure.Case) bool {
	switch c.Identity.Op() {
	case operation.Sum, operation.Scaled, operation.Lerp:
		return true
	}
	return false
}
