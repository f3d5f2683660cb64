// Package convention is the vocabulary of orientation conventions, as data.
//
// An orientation written down as numbers means nothing until a handful of
// choices are fixed: where the scalar of a quaternion stands, which of the two
// quaternion algebras multiplies it, how nine numbers fill a matrix, in which
// unit angles are given, which frame's coordinates go in and which come out.
// Each choice is a small type here. The zero value of each means "unstated",
// so that a claim that says nothing is the zero claim.
//
// The 24 angle sequences belong to the same vocabulary but live in package
// angle, beside the numbers that define them.
//
// # Direction
//
// A direction is always an equation of coordinates, v_B = R v_A, and never
// "from A to B": some standards mean by these words the rotation that carries
// the axes of A onto those of B, whose sandwich is the inverse of the
// coordinate map (CCSDS 504.0-B-2, annex F).
package convention

import (
	"math"
	"strconv"
	"strings"
)

// A Term is one stated choice: a value of one of this package's types, or an
// angle label. Subject names the question that it answers.
type Term interface {
	Subject() Subject
	String() string
}

// Subject is a question that a convention answers.
type Subject uint8

// The subjects, in the order in which reports list them.
const (
	OfNothing   Subject = iota
	OfForm              // what kind of object the numbers are
	OfScalar            // where the scalar stands
	OfProduct           // which quaternion algebra
	OfStorage           // how numbers fill a matrix
	OfUnit              // unit of angles
	OfSequence          // order of turns, moving or fixed axes
	OfDirection         // which coordinates go in and come out
	OfHand              // handedness of a triad
	OfRates             // axes in which angular rates are resolved
	OfRange             // range that angles keep to
	subjects
)

var subjectNames = [...]string{"", "form", "scalar place", "product", "storage", "unit", "sequence", "direction", "hand", "rate axes", "range"}

// String names the subject in lower case; "" for OfNothing.
func (s Subject) String() string { return subjectNames[s] }

// Subjects lists every subject in report order.
func Subjects() []Subject {
	all := make([]Subject, 0, subjects-1)
	for s := OfForm; s < subjects; s++ {
		all = append(all, s)
	}
	return all
}

// Form is what a group of numbers claims to be.
type Form uint8

// The forms. Rotation-claiming forms are Quaternion, Rotation, Transform,
// Angles, RotationVector and AxisAngle; a bare Matrix claims nothing.
const (
	NoForm         Form = iota
	Quaternion          // four numbers, a unit rotor
	Rotation            // 3x3 that claims to be a proper rotation
	Transform           // 3x4 or 4x4 that claims to be a rigid transform
	Angles              // three angles of a sequence, or of a part of one
	RotationVector      // axis times angle
	AxisAngle           // unit axis and angle
	Axis                // unit direction
	Triad               // three named axes of one frame
	AxisMap             // signed permutation between two frames
	Matrix              // 3x3 without a claim to be a rotation
)

var formNames = [...]string{"", "quaternion", "rotation matrix", "rigid transform", "angles", "rotation vector", "axis and angle", "axis", "triad", "axis map", "matrix"}

// Subject is OfForm.
func (Form) Subject() Subject { return OfForm }

// String names the form.
func (f Form) String() string { return formNames[f] }

// ScalarPlace says where the scalar of four numbers stands.
type ScalarPlace uint8

// The places of the scalar.
const (
	ScalarUnstated ScalarPlace = iota
	ScalarFirst                // w x y z
	ScalarLast                 // x y z w
)

// Subject is OfScalar.
func (ScalarPlace) Subject() Subject { return OfScalar }

func (p ScalarPlace) String() string {
	return [...]string{"scalar place unstated", "scalar first (w x y z)", "scalar last (x y z w)"}[p]
}

// Product is one of the two quaternion algebras.
//
// Hamilton's has ij = k, Shuster's ij = -k. With the same numbers a b in one
// is b a in the other (M. D. Shuster, "A survey of attitude representations",
// J. Astronautical Sciences 41 (1993) 439).
type Product uint8

// The products.
const (
	ProductUnstated Product = iota
	Hamilton
	Shuster
)

// Subject is OfProduct.
func (Product) Subject() Subject { return OfProduct }

func (p Product) String() string {
	return [...]string{"product unstated", "Hamilton (ij = k)", "Shuster (ij = -k)"}[p]
}

// Storage says how a flat list of numbers fills a matrix.
type Storage uint8

// The storage orders.
const (
	StorageUnstated Storage = iota
	RowMajor
	ColumnMajor
)

// Subject is OfStorage.
func (Storage) Subject() Subject { return OfStorage }

func (s Storage) String() string {
	return [...]string{"storage unstated", "row by row", "column by column"}[s]
}

// Unit is the unit of an angle.
type Unit uint8

// The units.
const (
	UnitUnstated Unit = iota
	Radian
	Degree
)

// Subject is OfUnit.
func (Unit) Subject() Subject { return OfUnit }

func (u Unit) String() string { return [...]string{"unit unstated", "radian", "degree"}[u] }

// InRadians is the size of one unit in radians; an unstated unit counts as radian.
func (u Unit) InRadians() float64 {
	if u == Degree {
		return 0.017453292519943295769236907684886 // pi/180
	}
	return 1
}

// Hand is the handedness of a triad.
type Hand uint8

// The hands.
const (
	HandUnstated Hand = iota
	RightHanded
	LeftHanded
)

// Subject is OfHand.
func (Hand) Subject() Subject { return OfHand }

func (h Hand) String() string { return [...]string{"hand unstated", "right-handed", "left-handed"}[h] }

// RateAxes says in which axes an angular rate is resolved.
type RateAxes uint8

// The axes of a rate: of the turning body, or of the space it turns in.
const (
	RateAxesUnstated RateAxes = iota
	BodyRates
	SpaceRates
)

// Subject is OfRates.
func (RateAxes) Subject() Subject { return OfRates }

func (a RateAxes) String() string {
	return [...]string{"rate axes unstated", "rates in body axes", "rates in space axes"}[a]
}

// Range is the range that angles keep to, in radians, both ends included. The zero
// value is unstated.
type Range struct{ Low, High float64 }

// Subject is OfRange.
func (Range) Subject() Subject { return OfRange }

// Stated reports whether the range has any width.
func (r Range) Stated() bool { return r.Low < r.High }

// String prints the range in degrees.
func (r Range) String() string {
	if !r.Stated() {
		return "range unstated"
	}
	deg := func(rad float64) string { return strconv.FormatFloat(rad*180/math.Pi, 'g', 6, 64) }
	return deg(r.Low) + " to " + deg(r.High) + " deg"
}

// Direction is the equation v_To = R v_From. Empty names are unstated.
type Direction struct{ To, From string }

// Subject is OfDirection.
func (Direction) Subject() Subject { return OfDirection }

// Stated reports whether both frames are named.
func (d Direction) Stated() bool { return d.To != "" && d.From != "" }

// Reverse is the direction of the inverse.
func (d Direction) Reverse() Direction { return Direction{To: d.From, From: d.To} }

// String prints the equation of coordinates, such as v_body = R v_cam.
func (d Direction) String() string {
	if !d.Stated() {
		return "direction unstated"
	}
	return "v_" + d.To + " = R v_" + d.From
}

// ParseDirection reads "v_body = R v_cam" or the short form "body<-cam".
func ParseDirection(text string) (Direction, bool) {
	t := strings.ReplaceAll(text, " ", "")
	if left, right, ok := strings.Cut(t, "=R"); ok {
		right = strings.TrimPrefix(right, "*")
		to, okTo := strings.CutPrefix(left, "v_")
		from, okFrom := strings.CutPrefix(right, "v_")
		d := Direction{To: to, From: from}
		return d, okTo && okFrom && d.Stated()
	}
	if to, from, ok := strings.Cut(t, "<-"); ok {
		d := Direction{To: to, From: from}
		return d, d.Stated()
	}
	return Direction{}, false
}
