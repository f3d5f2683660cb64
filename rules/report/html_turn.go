package report

import (
	"fmt"
	"math"

	"dextral/core/rotor"
	"dextral/rules"
)

// turnDrawing shows two rotations by what they make of the axes x, y and z: in space,
// from a fixed point of view, with the axis about which the one is turned against the
// other; and with that axis pointing at the reader, where the angle between them has its
// true size and is counted against the clock.
type turnDrawing struct {
	Axes         []axisDrawing
	Line         *axisDrawing // the axis of the turn, both ways; nil where there is no turn
	DialX, DialY string       // the end of the second hand; the first points to the right
	Sector       string       // path of the angle between the hands
	Angle        string
	About        string // the axis in numbers
	By, Against  string
}

// axisDrawing is a line from the middle to X, Y with a name beside its end.
type axisDrawing struct {
	Class, Name  string
	X, Y, LX, LY string
}

const axisLength = 80.0 // of the drawing's units, as are all numbers below

func drawTurn(t *rules.Turn) *turnDrawing {
	d := &turnDrawing{Angle: residualText(rules.Degrees(t.Angle())) + " deg", By: t.By, Against: t.Against}
	for _, of := range []struct {
		class string
		by    rotor.Rotor
	}{{"stated", t.Stated}, {"computed", t.Computed}} {
		for i, e := range []rotor.Vec{{X: 1}, {Y: 1}, {Z: 1}} {
			name := string("xyz"[i])
			label := 1.12
			if of.class == "computed" { // where both point the same way, both names can be read
				label = 1.28
				name += "′"
			}
			d.Axes = append(d.Axes, projected(of.class+" "+string("xyz"[i]), name, of.by.Rotate(e), label))
		}
	}
	angle := t.Angle()
	turn, ok := t.Computed.Mul(t.Stated.Reverse()).Unit()
	if ok && angle > 0 {
		axis, _ := turn.AxisAngle()
		line := projected("turn", "", axis, 1)
		d.Line = &line
		d.About = fmt.Sprintf("(%s, %s, %s)", fixed(axis.X, 3), fixed(axis.Y, 3), fixed(axis.Z, 3))
	}
	x, y := axisLength*math.Cos(angle), -axisLength*math.Sin(angle) // y points down
	d.DialX, d.DialY = coordinate(x), coordinate(y)
	d.Sector = fmt.Sprintf("M0 0 L40 0 A40 40 0 0 0 %s %s Z", coordinate(x/2), coordinate(y/2))
	return d
}

// The point of view: 25 degrees above the plane of x and y, 35 degrees from x
// towards y, so that no axis hides another; z points up.
var (
	viewRight = rotor.Vec{X: -math.Sin(azimuth), Y: math.Cos(azimuth)}
	viewUp    = rotor.Vec{X: -math.Sin(elevation) * math.Cos(azimuth), Y: -math.Sin(elevation) * math.Sin(azimuth), Z: math.Cos(elevation)}
)

const (
	azimuth   = 35 * math.Pi / 180
	elevation = 25 * math.Pi / 180
)

// projected draws a unit vector; its name stands at a multiple of its length.
func projected(class, name string, v rotor.Vec, label float64) axisDrawing {
	x, y := axisLength*v.Dot(viewRight), -axisLength*v.Dot(viewUp)
	return axisDrawing{Class: class, Name: name, X: coordinate(x), Y: coordinate(y), LX: coordinate(label * x), LY: coordinate(label * y)}
}

// Back is the other end of a line through the middle.
func (a *axisDrawing) Back() [2]string { return [2]string{negated(a.X), negated(a.Y)} }

func negated(s string) string {
	switch {
	case s == "0":
		return s
	case s[0] == '-':
		return s[1:]
	}
	return "-" + s
}

func coordinate(x float64) string { return fixed(x, 1) }
