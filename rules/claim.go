package rules

import (
	"slices"

	"dextral/core/angle"
	"dextral/core/convention"
)

// Source says who makes a claim; a later constant is a stronger claim.
type Source uint8

// The sources, weakest first. Shape, Name and Sibling are inferred by custom;
// the others are stated by somebody.
const (
	Shape       Source = iota // the count and arrangement of the numbers
	Name                      // customary short names: R, q, T_cam_imu
	Sibling                   // a neighbouring key: units: deg
	Label                     // a word that says it: rotation_matrix, quaternion_xyzw, yaw [deg]
	Comment                   // a comment on the line or just above
	Declaration               // dextral.toml
	Format                    // the file format's own specification
)

var sourceNames = [...]string{"shape", "name", "neighbouring key", "label", "comment", "declaration", "format specification"}

// String names the source in lower case.
func (s Source) String() string { return sourceNames[s] }

// Stated reports whether somebody said it, as opposed to inferred by custom. A
// contradiction of stated claims is an error, of an inferred one a warning.
func (s Source) Stated() bool { return s >= Label }

// Claim is one thing that an author says about a value.
type Claim struct {
	Says   convention.Term // what is claimed: a scalar place, a unit, an angle.Label, a direction...
	Source Source
	Text   string // the words that say it, as they stand in the file
	Place  Place  // where these words stand
}

// Claims holds what is said about one value, in the order found.
type Claims []Claim

// On returns the strongest claim on a subject; of equally strong ones the
// first. It reports false if nobody says anything.
func (cs Claims) On(s convention.Subject) (Claim, bool) {
	var best Claim
	found := false
	for _, c := range cs {
		if c.Says.Subject() == s && (!found || c.Source > best.Source) {
			best, found = c, true
		}
	}
	return best, found
}

// Conflicts returns the claims on a subject that cannot be true together with the
// strongest one: stated ones, and beside a comment or a label the unit and the scalar
// place that a neighbouring key gives, which is often an exception on purpose.
func (cs Claims) Conflicts(s convention.Subject) []Claim {
	best, ok := cs.On(s)
	if !ok {
		return nil
	}
	var others []Claim
	for _, c := range cs {
		neighbour := c.Source == Sibling && (s == convention.OfUnit || s == convention.OfScalar) && (best.Source == Label || best.Source == Comment)
		if c.Says.Subject() == s && (c.Source.Stated() || neighbour) && exclude(best.Says, c.Says) {
			others = append(others, c)
		}
	}
	return others
}

// exclude reports whether two terms on one subject cannot both be true. Angle
// labels that share a reading can; so can directions between other frames, ranges, one
// of which may be the wider one, and forms, since a key may name both the thing and its
// container.
func exclude(a, b convention.Term) bool {
	switch a := a.(type) {
	case convention.Form, convention.Range:
		return false
	case convention.Direction:
		d, ok := b.(convention.Direction)
		return ok && a.Stated() && d == a.Reverse()
	case angle.Label:
		l, ok := b.(angle.Label)
		return ok && !slices.ContainsFunc(a.Readings, l.Means)
	}
	return a != b
}

// term returns the strongest claim's term as type T, or T's zero value.
func term[T convention.Term](cs Claims) T {
	var zero T
	if c, ok := cs.On(zero.Subject()); ok {
		if t, ok := c.Says.(T); ok {
			return t
		}
	}
	return zero
}

// Scalar is the claimed place of the scalar.
func (cs Claims) Scalar() convention.ScalarPlace { return term[convention.ScalarPlace](cs) }

// Storage is the claimed storage order.
func (cs Claims) Storage() convention.Storage { return term[convention.Storage](cs) }

// Unit is the claimed unit of angles.
func (cs Claims) Unit() convention.Unit { return term[convention.Unit](cs) }

// Direction is the claimed equation of coordinates.
func (cs Claims) Direction() convention.Direction { return term[convention.Direction](cs) }

// Product is the claimed quaternion algebra.
func (cs Claims) Product() convention.Product { return term[convention.Product](cs) }

// Range is the claimed range of angles.
func (cs Claims) Range() convention.Range { return term[convention.Range](cs) }
