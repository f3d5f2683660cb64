package rules

import (
	"fmt"
	"slices"

	"dextral/core/angle"
	"dextral/core/convention"
	"dextral/core/identify"
)

// checkTwins compares the values that state one orientation, each with the
// first of its group, and the others among themselves only if the first agrees
// with neither: one wrong value then gives one finding, not many.
func checkTwins(values []*Value) []*Finding {
	var found []*Finding
	for _, group := range twins(values) {
		found = append(found, checkGroup(group)...)
	}
	return found
}

// checkGroup chooses as reference the value with which most others agree, in
// doubt the first, and reports the rest against it.
func checkGroup(group []*Value) []*Finding {
	type pair struct{ i, j int }
	results := map[pair]identify.Result{}
	same := func(i, j int) identify.Result {
		p := pair{min(i, j), max(i, j)}
		r, done := results[p]
		if !done {
			r = identify.Same(group[p.i].statement(), group[p.j].statement())
			results[p] = r
		}
		return r
	}
	reference, most := 0, -1
	for i := range group {
		agree := 0
		for j := range group {
			if i != j && same(i, j).Verdict == identify.Agree {
				agree++
			}
		}
		if agree > most {
			reference, most = i, agree
		}
	}
	var found []*Finding
	for i := range group {
		if i != reference {
			first, second := group[min(i, reference)], group[max(i, reference)]
			found = add(found, disagreement(first, second, group[i], same(reference, i)))
		}
	}
	return found
}

// Compare tells whether two values describe one orientation.
func Compare(a, b *Value) identify.Result { return identify.Same(a.statement(), b.statement()) }

// statement hands a value to package identify.
func (v *Value) statement() identify.Statement {
	s := identify.Statement{
		Form: v.Form, Numbers: v.Floats(), Tolerance: v.tolerance(),
		Claim: identify.Claim{
			Scalar: v.Claims.Scalar(), Product: v.Claims.Product(), Storage: v.Claims.Storage(), Unit: v.Claims.Unit(),
			Direction: v.Claims.Direction(),
		},
	}
	if v.Form == convention.Transform {
		part := v.rotationNumbers() // row by row, whatever the storage
		s.Form, s.Claim.Storage = convention.Rotation, convention.RowMajor
		s.Numbers = make([]float64, len(part))
		for i, n := range part {
			s.Numbers[i] = n.Value
		}
	}
	if c, ok := v.Claims.On(convention.OfSequence); ok {
		if label, ok := c.Says.(angle.Label); ok {
			s.Claim.Label = &label
		}
	}
	return s
}

// ruleOf names the rule of each change that reconciles two values.
var ruleOf = map[identify.Change]string{
	identify.ScalarOrder: ScalarMisplaced,
	identify.Inverse:     DirectionReversed,
	identify.Transposed:  StorageTransposed,
	identify.UnitSlip:    AngleUnitWrong,
	identify.MovingFixed: MovingFixedSwapped,
	identify.HalfAngle:   HalfAngle,
	identify.AngleOrder:  SequenceMislabelled,
	identify.Sequence:    SequenceMislabelled,
	identify.AngleSign:   AngleSignReversed,
	identify.Kind:        ParametersMistaken,
	identify.Remap:       AxesSwapped,
	identify.Mirror:      MirroredRotation,
}

// disagreement turns the result of comparing the first with the second value
// into a finding at the odd one of them, or into nothing where the two agree or
// nothing can be said.
func disagreement(first, second, odd *Value, r identify.Result) *Finding {
	switch r.Verdict {
	case identify.AgreeInverse:
		return reverseOfEachOther(first, second, odd, r)
	case identify.Contradicted:
		return reconciled(first, second, odd, r)
	case identify.Unexplained:
		return unexplained(first, second, odd, r)
	}
	return nil
}

func reverseOfEachOther(first, second, odd *Value, r identify.Result) *Finding {
	f := twinFinding(DirectionReversed, first, second, odd, r,
		"%s and %s are the reverse of each other, and neither states its direction: one is read as active and the other as passive, or they map opposite ways; taken as one rotation they differ by %s",
		first.name(), second.name(), degrees(r.Stated.Residual))
	f.Level = Note
	f.Remedy = "state the direction of each as an equation, such as v_body = R v_cam"
	return f
}

func reconciled(first, second, odd *Value, r identify.Result) *Finding {
	worst := slices.MaxFunc(r.Best.Changes, func(x, y identify.Change) int { return x.Cost() - y.Cost() })
	switch a, b := misread(worst, first.Form), misread(worst, second.Form); {
	case a && !b:
		odd = first // the finding belongs to the value that is read another way
	case b && !a:
		odd = second
	}
	f := twinFinding(ruleOf[worst], first, second, odd, r, "%s and %s state one orientation; they agree, to %s, only if taken %s; as stated they differ by %s",
		first.name(), second.name(), degrees(r.Best.Residual), withMapNames(r.Best.String()), degrees(r.Stated.Residual))
	other := first
	if odd == first {
		other = second
	}
	if len(r.Best.Changes) == 1 && !r.Best.Tie && !misread(worst, other.Form) {
		f.Edit = reordered(odd, other, worst)
	}
	return f
}

// misread reports whether a change concerns the reading of values of a form.
func misread(c identify.Change, f convention.Form) bool {
	switch c {
	case identify.ScalarOrder:
		return f == convention.Quaternion
	case identify.MovingFixed, identify.Sequence, identify.AngleOrder, identify.AngleSign:
		return f == convention.Angles
	case identify.UnitSlip:
		return f == convention.Angles || f == convention.RotationVector || f == convention.AxisAngle
	case identify.Transposed, identify.Mirror:
		return f == convention.Rotation || f == convention.Transform
	case identify.Kind:
		return f == convention.RotationVector || f == convention.Angles
	}
	return false
}

func unexplained(first, second, odd *Value, r identify.Result) *Finding {
	if r.Reason != "" { // something fits, but numbers this special fit by accident too
		return twinFinding(RepresentationsDiffer, first, second, odd, r, "%s and %s state one orientation, and as stated they differ by %s; what went wrong cannot be told: %s",
			first.name(), second.name(), degrees(r.Stated.Residual), r.Reason)
	}
	return twinFinding(RepresentationsDiffer, first, second, odd, r, "%s and %s state one orientation, and no reading of their conventions reconciles them; as stated they differ by %s",
		first.name(), second.name(), degrees(r.Stated.Residual))
}

// twinFinding places a finding at the odd one of two values, with the readings
// tried as evidence: the stated one, the one that fits, and the next. Readings
// speak of the first and the second value, so messages name them in that order.
func twinFinding(rule string, first, second, odd *Value, r identify.Result, message string, args ...any) *Finding {
	f := finding(rule, odd, Claim{}, message, args...)
	f.Level = twinLevel(first, second, r.Best.Changes)
	other := first
	if odd == first {
		other = second
	}
	f.Claim = fmt.Sprintf("one orientation with %s", other.Key)
	f.Related = []Related{{other.Place, fmt.Sprintf("%s: %s", other.name(), other.Reading())}}
	f.Evidence = []Evidence{{What: "as stated", Stated: Words(odd.Reading()), Residual: Degrees(r.Stated.Residual)}}
	f.Turn = turnBetween(odd, other, r.Stated.Residual)
	rows := 1
	for _, c := range r.Classes {
		if len(r.Stated.Readings) > 0 && c.String() == r.Stated.String() {
			continue
		}
		if rows == maxReadings {
			break
		}
		rows++
		f.Evidence = append(f.Evidence, Evidence{What: c.String(), Residual: Degrees(c.Residual)})
	}
	return f
}

// maxReadings bounds the readings listed under a finding, the stated one
// included.
const maxReadings = 3

// subjectOf names the subject on which a change contradicts a claim.
var subjectOf = map[identify.Change]convention.Subject{
	identify.ScalarOrder: convention.OfScalar,
	identify.Inverse:     convention.OfDirection,
	identify.UnitSlip:    convention.OfUnit,
	identify.MovingFixed: convention.OfSequence,
	identify.AngleOrder:  convention.OfSequence,
	identify.Sequence:    convention.OfSequence,
	identify.Transposed:  convention.OfStorage,
}

// twinLevel is Error where both values state by words what they are and the
// subject of every change is stated too, by at least one of them.
func twinLevel(a, b *Value, changes []identify.Change) Level {
	formA, _ := a.FormClaim()
	formB, _ := b.FormClaim()
	if !formA.Source.Stated() || !formB.Source.Stated() {
		return Warning
	}
	for _, c := range changes {
		subject, ok := subjectOf[c]
		if !ok {
			continue
		}
		onA, _ := a.Claims.On(subject)
		onB, _ := b.Claims.On(subject)
		if !onA.Source.Stated() && !onB.Source.Stated() {
			return Warning
		}
	}
	return Error
}
