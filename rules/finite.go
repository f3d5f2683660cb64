package rules

import (
	"math"
)

func isFinite(x float64) bool { return !math.IsNaN(x) && !math.IsInf(x, 0) }

func finite(v *Value) bool {
	for _, n := range v.Numbers {
		if !isFinite(n.Value) {
			return false
		}
	}
	return true
}

// notFinite reports an orientation that contains NaN or an infinity. All-NaN is
// a customary way to write "unset" and is left alone.
func notFinite(v *Value) *Finding {
	nans := 0
	for _, n := range v.Numbers {
		if math.IsNaN(n.Value) {
			nans++
		}
	}
	if nans == len(v.Numbers) {
		return nil
	}
	claim, _ := v.FormClaim()
	f := finding(NotFinite, v, claim, "%s claims to be a %s, but contains a number that is not finite: no orientation can be computed from it", v.name(), v.Form)
	for i, n := range v.Numbers {
		if !isFinite(n.Value) {
			f.Evidence = append(f.Evidence, Evidence{What: ordinal(i) + " number", Stated: Words("finite"), Computed: Words(n.Text)})
		}
	}
	f.Remedy = "write the number, or leave the whole value out where the orientation is unknown"
	return f
}

func ordinal(i int) string {
	names := [...]string{"first", "second", "third", "fourth", "fifth", "sixth", "seventh", "eighth", "ninth",
		"tenth", "eleventh", "twelfth", "thirteenth", "fourteenth", "fifteenth", "sixteenth"}
	return names[min(i, len(names)-1)]
}
