package rules

import (
	"fmt"
	"slices"
	"strings"

	"dextral/core/convention"
	"dextral/core/identify"
)

// checkRates judges the conventions that the angular rates beside a quaternion
// prove. Rates that no reading explains, or several alike, prove nothing.
func checkRates(s *Series) *Finding {
	if s.Rates == nil || s.Clock == nil {
		return nil
	}
	if len(s.Rates.Stretches) > 1 {
		return conventionChanges(s)
	}
	return gyroDisagrees(s)
}

// gyroDisagrees reports what all readings that the rates leave possible change.
func gyroDisagrees(s *Series) *Finding {
	r := &s.Rates.Result
	certain := r.Certain()
	if r.Verdict != identify.Contradicted || len(certain) == 0 {
		return nil
	}
	f := s.Rates.finding(GyroDisagrees, s, certain)
	f.Message = fmt.Sprintf("the rates %s are those of %s only with another %s than %s: read as %s, %s of them stays unexplained; as stated %s, in the next reading %s",
		strings.Join(s.Rates.Columns, ", "), s.Value.name(), changesWords(certain), saidOrUsual(f.Level),
		r.Best, percent(r.Best.Residual), percent(r.Stated.Residual), percent(r.Next.Residual))
	f.Evidence = []Evidence{
		left("read as "+r.Best.Readings[0].String(), r.Best.Residual),
		left("as stated: "+r.Stated.Readings[0].String(), r.Stated.Residual),
		left("next: "+r.Next.Readings[0].String(), r.Next.Residual),
		{What: "seen", Computed: Words(r.Motion.String())},
	}
	for i, t := range r.Ties[:min(len(r.Ties), 3)] {
		f.Evidence = slices.Insert(f.Evidence, i+1, left("fits alike: "+t.Readings[0].String(), t.Residual))
	}
	if r.Delay.Known {
		f.Evidence = append(f.Evidence, Evidence{What: "rates late by", Computed: Quantity{Value: r.Delay.Value, Unit: "s", Known: true}})
	}
	f.Remedy = remedyOf(certain)
	return f
}

// conventionChanges reports the rows from which on a log obeys another
// convention.
func conventionChanges(s *Series) *Finding {
	stretches := s.Rates.Stretches
	before, second := &stretches[0], &stretches[1]
	f := s.Rates.finding(ConventionChanges, s, second.Changes)
	f.Place = s.at(s.placeOf(&second.From))
	f.Message = fmt.Sprintf("%s and its rates %s change their convention between rows %d and %d: another %s; before, %s, from there on %s",
		s.Value.name(), strings.Join(s.Rates.Columns, ", "), before.To.Row, second.From.Row, changesWords(second.Changes),
		before.Class.Readings[0], second.Class.Readings[0])
	if n := len(stretches); n > 2 {
		f.Message += fmt.Sprintf("; %d changes in all", n-1)
	}
	for _, t := range stretches[:min(len(stretches), listedRows)] {
		f.Evidence = append(f.Evidence, Evidence{
			What:   fmt.Sprintf("rows %d to %d: %s; its neighbour's reading leaves", t.From.Row, t.To.Row, t.Class.Readings[0]),
			Stated: fraction(t.Other), Computed: fraction(t.Residual)})
	}
	f.Remedy = "look for a change of firmware or settings, or files put together; write the rows of one side in the convention of the other"
	return f
}

// finding starts a finding whose level follows what is said about the changes.
func (r *Rates) finding(rule string, s *Series, changes []identify.Change) *Finding {
	claim := Claim{Says: convention.BodyRates, Source: Name, Text: strings.Join(r.Columns, " ")}
	if scalar, ok := s.Value.Claims.On(convention.OfScalar); ok && slices.Contains(changes, identify.ScalarOrder) {
		claim = scalar
	}
	if r.Unit.Says != nil && slices.Contains(changes, identify.UnitSlip) {
		claim = r.Unit
	}
	f := finding(rule, &s.Value, claim, "")
	f.Place = s.Value.Place
	if claim.Place.Line > 0 {
		f.Place = claim.Place
	}
	f.Command = fmt.Sprintf("dextral identify %s", s.Value.Place.Path)
	return f
}

func saidOrUsual(l Level) string {
	if l == Error {
		return "stated"
	}
	return "usual"
}

func changesWords(changes []identify.Change) string {
	var words []string
	for _, c := range changes {
		words = append(words, c.String())
	}
	return strings.Join(words, " and ")
}

func left(what string, residual float64) Evidence {
	return Evidence{What: what, Computed: fraction(residual)}
}

func fraction(x float64) Quantity { return Quantity{Value: 100 * x, Unit: "%", Known: true} }

func percent(x float64) string { return digits(100*x) + " %" }

// remedyOf says what to look at for the changes that are certain.
func remedyOf(changes []identify.Change) string {
	switch {
	case slices.Contains(changes, identify.UnitSlip):
		return "correct the unit in the header, or convert the rates where they are written"
	case slices.Contains(changes, identify.ScalarOrder):
		return "correct the names of the columns, or the order in which the quaternion is written"
	case slices.Contains(changes, identify.Remap):
		return "state how the gyro is mounted, or turn its rates into the axes of the orientation before they are written"
	}
	return "state the direction of the orientation and the axes of the rates, or write them as the name says"
}
