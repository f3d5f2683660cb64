package rules

import (
	"cmp"
	"fmt"
	"math"
	"strings"

	"dextral/core/convention"
	"dextral/core/matrix"
	"dextral/core/tolerance"
)

// rewritten says in words how the numbers of a value were rewritten, if it is one
// of the ways in which people rewrite them; "" if not, or if they are the same.
func rewritten(a, b *Value) string {
	if a.Form != b.Form || sameText(a, b) || !finite(a) || !finite(b) {
		return ""
	}
	switch a.Form {
	case convention.Quaternion:
		return rewrittenFour(halves(a), halves(b), b.Claims.Scalar())
	case convention.Angles, convention.RotationVector:
		return rewrittenThree(halves(a), halves(b))
	case convention.Rotation, convention.Transform, convention.AxisMap:
		return rewrittenMatrix(a, b)
	}
	return ""
}

// written is a number and how far it may be from what was meant.
type written struct{ value, half float64 }

// halves gives the numbers of a value the precision of their digits, and
// float32's where they have more.
func halves(v *Value) []written {
	list := make([]written, len(v.Numbers))
	for i, n := range v.Numbers {
		list[i] = written{value: n.Value, half: math.Abs(n.Value) * 0x1p-23}
		if read, ok := tolerance.Read(n.Text); ok && !read.Integer() {
			list[i].half = max(list[i].half, read.Half)
		}
	}
	return list
}

// is reports whether q is p times f, as far as digits tell. Where f changes a sign
// only, one is the other or rounds it; else both are rounded.
func (p written) is(q written, f float64) bool {
	slack := p.half*math.Abs(f) + q.half
	if math.Abs(f) == 1 {
		slack = max(p.half, q.half)
	}
	return math.Abs(p.value*f-q.value) <= slack*(1+1e-9)
}

// all reports whether b[i] is a[order[i]] with the given signs, all scaled.
func all(a, b []written, order []int, signs []float64, f float64) bool {
	for i := range b {
		if !a[order[i]].is(b[i], signs[i]*f) {
			return false
		}
	}
	return true
}

var (
	inOrder = []int{0, 1, 2, 3}
	toLast  = []int{1, 2, 3, 0} // what stood first stands last
	toFirst = []int{3, 0, 1, 2}
	plus    = []float64{1, 1, 1, 1}
	minus   = []float64{-1, -1, -1, -1}
)

// orders are the ways in which the places of a quaternion's numbers change.
var orders = []struct {
	order []int
	text  string
}{
	{inOrder, ""},
	{toLast, "the first of the four numbers moved to the end"},
	{toFirst, "the last of the four numbers moved to the front"},
	{[]int{3, 2, 1, 0}, "the four numbers are in the opposite order"},
}

// rewrittenFour compares quaternions, of which the new one is said to have its
// scalar at a place, or at none.
func rewrittenFour(a, b []written, scalar convention.ScalarPlace) string {
	for _, o := range orders {
		switch {
		case all(a, b, o.order, plus, 1):
			return cmp.Or(o.text, "other digits of the same numbers")
		case all(a, b, o.order, minus, 1):
			return joined(o.text, "all four signs are reversed")
		}
		for i := range 4 {
			signs := []float64{1, 1, 1, 1}
			signs[i] = -1
			one := all(a, b, o.order, signs, 1)
			for j := range signs {
				signs[j] = -signs[j]
			}
			if one || all(a, b, o.order, signs, 1) {
				return joined(o.text, signWords(i, one, scalar))
			}
		}
	}
	was, is := length(a), length(b)
	if was > 0 && all(a, b, inOrder, plus, is/was) {
		return fmt.Sprintf("the norm was %.6g and is %.6g", was, is)
	}
	return ""
}

func joined(a, b string) string {
	if a == "" {
		return b
	}
	return a + ", and " + b
}

// signWords says that the sign of one number, or those of all others, were
// reversed: the conjugate, if that one is the scalar.
func signWords(i int, one bool, scalar convention.ScalarPlace) string {
	first, last := i == 0 && scalar != convention.ScalarLast, i == 3 && scalar != convention.ScalarFirst
	text := fmt.Sprintf("the signs of all numbers but number %d are reversed", i+1)
	if one {
		text = fmt.Sprintf("the sign of number %d is reversed", i+1)
	}
	switch {
	case (first || last) && scalar != convention.ScalarUnstated:
		return text + ": the conjugate, so that the direction is reversed"
	case first:
		return text + ": the conjugate, if the scalar stands first"
	case last:
		return text + ": the conjugate, if the scalar stands last"
	}
	return text
}

func length(x []written) float64 {
	sum := 0.0
	for _, p := range x {
		sum = math.Hypot(sum, p.value)
	}
	return sum
}

func rewrittenThree(a, b []written) string {
	const degree = math.Pi / 180
	switch order := []int{0, 1, 2}; {
	case all(a, b, order, plus, 1):
		return "other digits of the same numbers"
	case all(a, b, order, plus, degree):
		return "the numbers went from degrees to radians"
	case all(a, b, order, plus, 1/degree):
		return "the numbers went from radians to degrees"
	case all(a, b, order, minus, 1):
		return "all signs are reversed"
	}
	for _, order := range [][]int{{2, 1, 0}, {1, 2, 0}, {2, 0, 1}, {1, 0, 2}, {0, 2, 1}} {
		if all(a, b, order, plus, 1) {
			return fmt.Sprintf("the three numbers changed places: number %d stands first, then number %d, then number %d", order[0]+1, order[1]+1, order[2]+1)
		}
	}
	for i := range 3 {
		signs := []float64{1, 1, 1}
		signs[i] = -1
		if all(a, b, []int{0, 1, 2}, signs, 1) {
			return fmt.Sprintf("the sign of number %d is reversed", i+1)
		}
	}
	return ""
}

// rewrittenMatrix compares the 3x3 parts.
func rewrittenMatrix(a, b *Value) string {
	m, okA := a.rotationPart()
	n, okB := b.rotationPart()
	if !okA || !okB {
		return ""
	}
	near := func(x, y matrix.Mat3) bool {
		return x.Sub(y).Norm() <= 3*(a.precision().Half+b.precision().Half)+1e-6 // nine entries, each off by both roundings
	}
	switch {
	case near(m, n):
		if a.Form == convention.Transform {
			return "" // the translation, or digits
		}
		return "other digits of the same numbers"
	case near(m.Transpose(), n):
		return "transposed" + inverseTranslation(a, b)
	}
	for i, x := range [...]string{"first", "second", "third"} {
		for _, side := range [...]string{"row", "column"} {
			flipped := m
			for j := range 3 {
				if side == "row" {
					flipped[i][j] = -m[i][j]
				} else {
					flipped[j][i] = -m[j][i]
				}
			}
			if near(flipped, n) {
				return fmt.Sprintf("the signs of the %s %s are reversed", x, side)
			}
		}
	}
	return exchanged(m, n, near)
}

func exchanged(m, n matrix.Mat3, near func(x, y matrix.Mat3) bool) string {
	for _, p := range [][2]int{{0, 1}, {1, 2}, {0, 2}} {
		rows := m
		rows[p[0]], rows[p[1]] = m[p[1]], m[p[0]]
		if near(rows, n) {
			return fmt.Sprintf("rows %d and %d changed places", p[0]+1, p[1]+1)
		}
		cols := m.Transpose()
		cols[p[0]], cols[p[1]] = cols[p[1]], cols[p[0]]
		if near(cols.Transpose(), n) {
			return fmt.Sprintf("columns %d and %d changed places", p[0]+1, p[1]+1)
		}
	}
	return ""
}

// inverseTranslation says whether the translation went along when a rigid
// transform was transposed: the inverse has -R^T t.
func inverseTranslation(a, b *Value) string {
	t, slackA, okA := a.translation()
	u, slackB, okB := b.translation()
	m, ok := a.rotationPart()
	if !okA || !okB || !ok {
		return ""
	}
	if u.Add(m.Transpose().Apply(t)).Norm() <= 3*(slackA+slackB)+a.tolerance()*t.Norm() {
		return ", and the translation with it: the inverse"
	}
	return ", the translation left as it was or another"
}

// leaf is the last part of a key.
func leaf(key string) string { return key[strings.LastIndexByte(key, '.')+1:] }

// parent is a key without its last part.
func parent(key string) string {
	if at := strings.LastIndexByte(key, '.'); at >= 0 {
		return key[:at]
	}
	return ""
}
