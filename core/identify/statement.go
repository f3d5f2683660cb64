package identify

import (
	"fmt"
	"math"

	"dextral/core/angle"
	"dextral/core/convention"
)

// Statement is one representation of an orientation, with what is claimed
// about it.
//
// The rotation that a statement means is the sandwich of its quaternion in
// Hamilton's algebra, the matrix that acts on column vectors, the active
// rotation of its angles, rotation vector or axis and angle.
type Statement struct {
	Form      convention.Form // Quaternion, Rotation, Angles, RotationVector or AxisAngle
	Numbers   []float64       // in the order and unit as written; AxisAngle as axis, then angle
	Tolerance float64         // rad: how far the digits leave the orientation open, the unit being as claimed
	Claim     Claim
}

// Claim is what is said about a statement; zero fields are unstated.
type Claim struct {
	Scalar    convention.ScalarPlace
	Product   convention.Product
	Storage   convention.Storage // unstated: row by row
	Unit      convention.Unit    // unstated: the twin decides; Tolerance is then for radians
	Label     *angle.Label       // nil: any of the 24 sequences, numbers as the turns or as the axes come
	Direction convention.Direction
	Named     bool // the components carry their names, so that only a wrong name can misplace the scalar
}

// Parameters is a kind of three-number rotation.
type Parameters uint8

// The kinds: axis times angle, times tan(angle/2), times tan(angle/4), and the
// vector part of a unit quaternion.
const (
	AxisTimesAngle Parameters = iota
	Gibbs
	MRP
	VectorPart
)

func (p Parameters) String() string {
	return [...]string{"axis times angle", "Gibbs vector", "modified Rodrigues parameters", "vector part of a quaternion"}[p]
}

// Reading is one way to take the numbers of a statement. Fields that do not
// belong to its form are zero.
type Reading struct {
	Form       convention.Form
	Scalar     convention.ScalarPlace
	Unit       convention.Unit
	Parameters Parameters
	Turns      Turns
	Mirrored   bool // the matrix has determinant -1; the rotation is that of its negative
}

// String says how the numbers are read.
func (r Reading) String() string { return r.words("the") }

// words says it of one of two statements: article is "the", or tells two of
// one form apart.
func (r Reading) words(article string) string {
	switch r.Form {
	case convention.Quaternion:
		return fmt.Sprintf("%s quaternion's %s", article, r.Scalar)
	case convention.Angles:
		return fmt.Sprintf("%s angles read as %s in %ss", article, r.Turns, r.Unit)
	case convention.RotationVector:
		if r.Parameters == AxisTimesAngle {
			return fmt.Sprintf("%s rotation vector in %ss", article, r.Unit)
		}
		return fmt.Sprintf("%s three numbers read as %s", article, r.Parameters)
	case convention.AxisAngle:
		return fmt.Sprintf("%s axis and angle in %ss", article, r.Unit)
	case convention.Rotation:
		if r.Mirrored {
			return article + " matrix with its mirror taken out"
		}
		return article + " matrix as it stands"
	}
	return article + " " + r.Form.String()
}

// unreadable says why a statement is no orientation at all; "" if it is one.
func (s Statement) unreadable() string {
	for _, x := range s.Numbers {
		if math.IsNaN(x) || math.IsInf(x, 0) {
			return "it is not finite"
		}
	}
	if !(s.Tolerance >= 0) {
		return "its tolerance is no number"
	}
	want := map[convention.Form]int{
		convention.Quaternion: 4, convention.Rotation: 9, convention.Angles: 3,
		convention.RotationVector: 3, convention.AxisAngle: 4,
	}[s.Form]
	switch {
	case want == 0:
		return "its form is not compared: " + s.Form.String()
	case len(s.Numbers) != want:
		return fmt.Sprintf("it has %d numbers, not %d", len(s.Numbers), want)
	}
	return ""
}
