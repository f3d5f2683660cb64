package rules

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"dextral/core/convention"
	"dextral/core/identify"
	"dextral/core/matrix"
	"dextral/core/tolerance"
)

// Edit is a change of the numbers of one value that mends a finding.
//
// Numbers rarely tell which side of a contradiction is wrong, so an edit exists
// in two cases only. Either the numbers are made a rotation again and this
// moves the orientation by no more than its tolerance; or a file format or a
// declaration fixes an order, a twin value shows that the numbers stand in the
// other one, and no other claim contradicts either.
//
// An edit is offered only after the value as edited was judged again and
// nothing was found.
type Edit struct {
	Why          string   // what settles it
	Was, Now     []string // all numbers judged, as written and as they are to be
	Replacements []Replacement
}

// Replacement puts another text in the place of one number.
type Replacement struct {
	Place Place
	Old   string
	New   string
}

// Words say what is written for what.
func (e *Edit) Words() string {
	return fmt.Sprintf("%s for %s", strings.Join(e.Now, " "), strings.Join(e.Was, " "))
}

// ComponentText begins the text of a claim that is made by the names of
// components. Such numbers stand where their names are, not in an order.
const ComponentText = "components "

// edited makes the edit that writes the given texts for numbers of the value, by
// index, if the value is found right afterwards; else nil.
func (v *Value) edited(why string, texts map[int]string, right func(*Value) bool) *Edit {
	w := *v
	w.trial = true
	w.Numbers = append([]Number(nil), v.Numbers...)
	e := &Edit{Why: why}
	for i, n := range v.Numbers {
		text, ok := texts[i]
		if !ok {
			continue
		}
		read, ok := tolerance.Read(text)
		if _, plain := tolerance.Read(n.Text); !ok || !plain || n.Place.Line == 0 {
			return nil
		}
		e.Was, e.Now = append(e.Was, n.Text), append(e.Now, text)
		if text != n.Text {
			w.Numbers[i].Text, w.Numbers[i].Value = text, read.Value
			e.Replacements = append(e.Replacements, Replacement{n.Place, n.Text, text})
		}
	}
	if len(e.Replacements) == 0 || len(checkOne(&w)) > 0 || !right(&w) {
		return nil
	}
	return e
}

// normalised offers numbers divided or turned into the nearest rotation, by index,
// where this moves the orientation by no more than the tolerance.
func (v *Value) normalised(numbers map[int]float64, moved float64) *Edit {
	why := "the numbers are normalised, which stays within what float32 leaves open"
	allowed := v.precision()
	allowed.Double = false
	if v.Uncertainty > 0 {
		why = fmt.Sprintf("the numbers are normalised, which stays within the declared uncertainty of %s", degrees(v.Uncertainty))
	}
	if v.trial || !(moved <= v.toleranceOf(allowed)) {
		return nil
	}
	decimals := 0
	for i := range numbers {
		decimals = max(decimals, decimalsOf(v.Numbers[i].Text))
	}
	texts := map[int]string{}
	for i, x := range numbers {
		// Each number keeps its digits, unless the group is known better than they
		// show: where a writer drops zeros, 0.5 has as many digits as the others.
		least := 1
		if n, ok := tolerance.Read(v.Numbers[i].Text); !ok || n.Half > allowed.Half*(1+1e-9) {
			least = decimals
		}
		texts[i] = restyle(v.Numbers[i].Text, x, least, decimals)
	}
	return v.edited(why, texts, func(*Value) bool { return true })
}

// normalisedVector is the edit that gives the first n numbers of the value, which
// form a vector of the given length, the length one.
func (v *Value) normalisedVector(n int, length float64) *Edit {
	numbers := map[int]float64{}
	for i := range n {
		numbers[i] = v.Numbers[i].Value / length
	}
	moved := math.Asin(math.Min(1, math.Abs(length-1)))
	if v.Form == convention.Quaternion || v.Form == convention.AxisAngle {
		moved *= 2
	}
	return v.normalised(numbers, moved)
}

// normalisedMatrix is the edit that writes the nearest rotation, at the given
// Frobenius distance: 2 sqrt(2) sin(t/2) for rotations an angle t apart.
func (v *Value) normalisedMatrix(near matrix.Mat3, distance float64) *Edit {
	numbers := map[int]float64{}
	for i := range 3 {
		for j := range 3 {
			numbers[v.entry(i, j)] = near[i][j]
		}
	}
	return v.normalised(numbers, 2*math.Asin(math.Min(1, distance/(2*math.Sqrt2))))
}

// reordered is the edit for a quaternion whose scalar stands at the other end than
// a format or a declaration fixes, as its twin shows. The order of a flat matrix is
// not settled so: the other order is the reverse rotation, which may be meant.
func reordered(odd, twin *Value, change identify.Change) *Edit {
	claim, ok := odd.Claims.On(convention.OfScalar)
	if !ok || change != identify.ScalarOrder || odd.Form != convention.Quaternion || len(odd.Numbers) != 4 ||
		claim.Source < Declaration || len(odd.Claims.Conflicts(convention.OfScalar)) > 0 || odd.namedComponents() {
		return nil
	}
	order := []int{1, 2, 3, 0} // of the numbers as written, those to write
	if claim.Says == convention.ScalarFirst {
		order = []int{3, 0, 1, 2}
	}
	texts := map[int]string{}
	for to, from := range order {
		texts[to] = odd.Numbers[from].Text
	}
	why := fmt.Sprintf("the %s fixes %s, and only so do the numbers agree with %s", claim.Source, claim.Says, twin.name())
	return odd.edited(why, texts, func(w *Value) bool { return Compare(w, twin).Verdict == identify.Agree })
}

// namedComponents reports whether each number of a quaternion carries its name.
func (v *Value) namedComponents() bool {
	for _, c := range v.Claims {
		if c.Says.Subject() == convention.OfScalar && strings.HasPrefix(c.Text, ComponentText) {
			return true
		}
	}
	return false
}

// decimalsOf counts the digits behind the point.
func decimalsOf(text string) int {
	mantissa, _ := cutExponent(text)
	_, fraction, _ := strings.Cut(mantissa, ".")
	return len(fraction)
}

func cutExponent(text string) (mantissa, exponent string) {
	if i := strings.IndexAny(text, "eEdD"); i >= 0 {
		return text[:i], text[i:]
	}
	return text, ""
}

// restyle writes a number as another one is written: with its exponent, its plus
// sign, its bare point and its digits behind the point, unless these are fewer than
// least: then as many as are given.
func restyle(like string, x float64, least, decimals int) string {
	mantissa, exponent := cutExponent(like)
	switch {
	case x == 0:
		return like // a zero stays as it is
	case strings.ContainsAny(like, "xX_"):
		return "" // a style of its own: nothing is offered
	}
	if d := decimalsOf(like); d >= least {
		decimals = d
	}
	if exponent != "" {
		e, err := strconv.Atoi(strings.TrimPrefix(exponent[1:], "+"))
		if err != nil {
			return ""
		}
		x /= math.Pow10(e)
	}
	s := strconv.FormatFloat(x, 'f', decimals, 64)
	if strings.Trim(s, "-0.") == "" {
		s = strings.TrimPrefix(s, "-")
	}
	unsigned := strings.TrimLeft(mantissa, "+-")
	if strings.HasPrefix(unsigned, ".") {
		s = strings.Replace(s, "0.", ".", 1)
	}
	if strings.HasPrefix(mantissa, "+") && x > 0 {
		s = "+" + s
	}
	return s + exponent
}
