package rules

import (
	"fmt"
	"math"

	"dextral/core/convention"
	"dextral/core/frame"
	"dextral/core/matrix"
	"dextral/core/rotor"
)

// turnWords says about which axis a rotation was turned. The same turn has one
// axis after the old rotation, in the axes it leads to, and another before it, in
// those it comes from; of the two, that is named which lies along an axis.
func turnWords(p pairOfRotors, by string, d convention.Direction) string {
	after, _ := p.after.Mul(p.before.Reverse()).AxisAngle()
	before, _ := p.before.Reverse().Mul(p.after).AxisAngle()
	axis, of, side := after, d.To, "after the old rotation"
	if largest(before) > largest(after)+1e-9 {
		axis, of, side = before, d.From, "before the old rotation"
	}
	if of != "" {
		side = "axes of " + of
	}
	return fmt.Sprintf("turned by %s about %s (%s)", by, axisWords(axis), side)
}

func largest(v rotor.Vec) float64 { return max(math.Abs(v.X), math.Abs(v.Y), math.Abs(v.Z)) }

// axisWords names a unit vector within a degree of a coordinate axis by it.
func axisWords(v rotor.Vec) string {
	for i, x := range [...]float64{v.X, v.Y, v.Z} {
		if math.Abs(x) > math.Cos(math.Pi/180) {
			name := string("xyz"[i])
			if x < 0 {
				name = "-" + name
			}
			return name
		}
	}
	return vector(v)
}

// remapWords names an exchange of axes between the old and the new rotation R:
// P R or R P with axes renamed on one side, or P R P^T with both.
func remapWords(p pairOfRotors, open float64) string {
	for _, m := range axisMaps() {
		r := m.matrix.Rotor()
		switch {
		case rotor.Angle(r.Mul(p.before), p.after) <= open:
			return "axes exchanged in what comes out: " + m.text
		case rotor.Angle(p.before.Mul(r.Reverse()), p.after) <= open:
			return "axes exchanged in what goes in: " + m.text
		case rotor.Angle(r.Mul(p.before).Mul(r.Reverse()), p.after) <= open:
			return "axes exchanged on both sides: " + m.text
		}
	}
	return ""
}

type axisMap struct {
	matrix matrix.Mat3
	text   string
}

// triads are those whose names people exchange: common practice, no source.
var triads = [][2]string{{"ENU", "NED"}, {"FLU", "FRD"}, {"RDF", "FLU"}, {"FLU", "RDF"}, {"RDF", "FRD"}, {"FRD", "RDF"}, {"NWU", "NED"}, {"NWU", "ENU"}, {"ENU", "NWU"}, {"RUB", "FLU"}, {"FLU", "RUB"}}

// axisMaps are the 23 rotations that exchange axes, those with well-known names
// first; half turns about one axis and the like have none.
func axisMaps() []axisMap {
	var list []axisMap
	for _, t := range triads {
		to, errTo := frame.ParseTriad(t[0])
		from, errFrom := frame.ParseTriad(t[1])
		if m, ok := frame.AxisMap(to, from); errTo == nil && errFrom == nil && ok {
			list = append(list, axisMap{m, mapWords(m) + ", as from " + t[1] + " to " + t[0]})
		}
	}
	for _, perm := range [][3]int{{0, 1, 2}, {1, 2, 0}, {2, 0, 1}, {0, 2, 1}, {2, 1, 0}, {1, 0, 2}} {
		for signs := range 8 {
			var m matrix.Mat3
			for i, j := range perm {
				m[i][j] = 1 - 2*float64(signs>>i&1)
			}
			if m.Det() > 0 && m != matrix.Identity {
				list = append(list, axisMap{m, mapWords(m)})
			}
		}
	}
	return list
}

// mapWords shows where x, y and z come from.
func mapWords(m matrix.Mat3) string {
	text := ""
	for i := range 3 {
		for j := range 3 {
			if m[i][j] != 0 {
				sign := ""
				if m[i][j] < 0 {
					sign = "-"
				}
				if text != "" {
					text += ", "
				}
				text += fmt.Sprintf("%c = %s%c", "xyz"[i], sign, "xyz"[j])
			}
		}
	}
	return text
}
