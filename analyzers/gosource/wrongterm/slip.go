package wrongterm

import (
	"fmt"
	"regexp"
	"slices"

	"dextral/analyzers/gosource/measure"
	"dextral/analyzers/gosource/named"
	"dextral/core/operation"
	"dextral/rules"
)

// turning are the operations whose result has to turn by the angle, or at the rate,
// that goes in.
var turning = []operation.Op{operation.FromAxisAngle, operation.AxisTurn, operation.FromAngles, operation.FromRotvec, operation.AxisAngleOf, operation.Derivative, operation.Step}

// admits finds words of authors who know of the factor.
var admits = regexp.MustCompile(`(?i)half|halv|twice|double|/ ?2|2 ?\*`)

// slip reports an operation that turns by half or twice the angle: the half of the angle in
// a quaternion is forgotten, or taken twice.
func slip(measured *measure.Result, f *measure.Function) *rules.Finding {
	if f.Decl == nil || len(f.Unknown) > 0 {
		return nil
	}
	for _, c := range f.Cases {
		if !c.Identity.Known() || len(c.Identity.Readings) != 1 {
			continue
		}
		r := c.Identity.Readings[0]
		if r.Scale == 0 || r.Scale == 1 || !slices.Contains(turning, r.Op) || !measured.Orients(f, c, nil) {
			continue
		}
		claim := named.Of(f, c)
		if !slices.Contains(claim.Ops, r.Op) || admits.MatchString(f.Object.Name()) || f.Decl.Doc != nil && admits.MatchString(f.Decl.Doc.Text()) || admitted(c) {
			continue
		}
		return &rules.Finding{
			Rule: rules.WrongTerm, Level: rules.Error, Key: f.Key(),
			Message:  fmt.Sprintf("%s is not quite the %s that its %s says: it turns by %s what it is given, in %s", f.Label(c), r.Op, speaker(claim.Source), times(r.Scale), unit(r)),
			Claim:    fmt.Sprintf("%s, by %s %q", r.Op, claim.Source, claim.Word),
			Remedy:   "a quaternion holds cosine and sine of half the angle, and a rate changes it by half the product: look for the factor that is missing or there twice",
			Evidence: []rules.Evidence{{What: "angle turned, for each given", Stated: rules.Plain(1), Computed: rules.Plain(r.Scale), Residual: rules.Plain(c.Identity.Residual)}},
		}
	}
	return nil
}

// admitted reports whether a number that goes in is called half an angle.
func admitted(c *measure.Case) bool {
	return slices.ContainsFunc(c.In, func(o measure.Operand) bool { return admits.MatchString(o.Name) })
}

func speaker(s rules.Source) string {
	if s == rules.Comment {
		return "comment"
	}
	return "name"
}

func times(scale float64) string {
	switch scale {
	case 0.5:
		return "half of"
	case 2:
		return "twice"
	}
	return fmt.Sprintf("%g times", scale)
}

func unit(r operation.Reading) string {
	if r.Unit.InRadians() != 1 {
		return "degrees"
	}
	return "radians"
}
