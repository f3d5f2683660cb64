package rules

import (
	"strings"

	"dextral/core/convention"
)

// Reading says in words how the claims have the value read, the parts that
// matter for its form only: "quaternion, scalar last (x y z w)".
func (v *Value) Reading() string {
	parts := []string{v.Form.String()}
	for _, s := range readSubjects[v.Form] {
		if c, ok := v.Claims.On(s); ok {
			parts = append(parts, c.Says.String())
		}
	}
	if c, ok := v.Claims.On(convention.OfDirection); ok {
		parts = append(parts, c.Says.String())
	}
	return strings.Join(parts, ", ")
}

// readSubjects are the subjects that matter for a form, direction aside.
var readSubjects = map[convention.Form][]convention.Subject{
	convention.Quaternion:     {convention.OfScalar, convention.OfProduct},
	convention.Rotation:       {convention.OfStorage},
	convention.Transform:      {convention.OfStorage},
	convention.Angles:         {convention.OfSequence, convention.OfUnit},
	convention.RotationVector: {convention.OfUnit},
	convention.AxisAngle:      {convention.OfUnit},
	convention.Triad:          {convention.OfHand},
	convention.AxisMap:        {convention.OfHand},
}
