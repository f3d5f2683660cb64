package angle

import (
	"errors"
	"fmt"
	"slices"

	"dextral/core/convention"
)

// What can be wrong with a label.
var (
	ErrNoSequence = errors.New("names no angle sequence")
	ErrSequence   = errors.New("is not an angle sequence")
	ErrRoles      = errors.New("the three numbers have names that do not go together")
)

// Label is a stated angle sequence: a key, a column header or words of a comment.
//
// A full label says which turns are made in which order about which kind of axes:
//
//	z-y'-x''    intrinsic ZYX    x-y-z about fixed axes    szyx
//
// and has one reading. A label such as ZYX, 321 or rpy is bare: custom gives it
// moving axes here and fixed ones there, numbers in the order of the letters or
// in the order x, y, z, and the rotation or its reverse. It has every reading
// that it may mean and is contradicted only when all of them fail.
//
// A full label does not multiply by direction: it says how axes are turned
// onto others, so only one rotation bears its name. Whether that rotation or its reverse is
// the coordinate map is a claim of its own (convention.Direction), to be
// allowed both ways by whoever compares when nobody states it.
//
// Readings are a slice, so labels, and convention.Terms that hold one, cannot be compared
// with ==; use Same.
type Label struct {
	Text     string
	Full     bool
	Readings []Reading
}

// Subject is OfSequence.
func (Label) Subject() convention.Subject { return convention.OfSequence }

// String is the sequence of a full label; of a bare one the text.
func (l Label) String() string {
	switch {
	case l.Full && len(l.Readings) == 1:
		return l.Readings[0].String()
	case l.Text == "" || len(l.Readings) == 0:
		return "sequence unstated"
	}
	kind := l.Readings[0].Seq.Fixed
	if slices.ContainsFunc(l.Readings, func(r Reading) bool { return r.Seq.Fixed != kind }) {
		return l.Text + " (kind of axes unstated)"
	}
	return l.Text + " (order of turns unstated)"
}

// Same reports whether two labels have the same readings.
func (l Label) Same(other Label) bool {
	if l.Full != other.Full || len(l.Readings) != len(other.Readings) {
		return false
	}
	for _, r := range l.Readings {
		if !other.Means(r) {
			return false
		}
	}
	return true
}

// Means reports whether r, or its twin, is one of the readings.
func (l Label) Means(r Reading) bool {
	return slices.ContainsFunc(l.Readings, func(own Reading) bool { return own.Canonical() == r.Canonical() })
}

// Customary is the label of numbers called roll, pitch and yaw (or x, y and z)
// when nothing else is said: z-y-x about moving axes, which is x-y-z about
// fixed ones, or the other way round, forwards or reversed. It is an error if the roles do not
// name three axes.
func Customary(roles [3]Role) (Label, error) {
	p, err := placesOf(roles)
	if err != nil {
		return Label{}, err
	}
	if p.kind != byAxis {
		return Label{}, fmt.Errorf("%w: roll, pitch and yaw are needed", ErrRoles)
	}
	s := statement{}
	label := Label{Text: fmt.Sprintf("%s, %s, %s", roles[0], roles[1], roles[2])}
	label.Readings, err = s.readings(p)
	return label, err
}

// ParseLabel reads a label, of nothing but a label: "z-y'-x”" with ASCII or
// typographic primes, "z-y-x", "3-2-1", "321", "ZYX", "rpy", "yaw-pitch-roll", "Euler 3-2-1",
// "euler_zyx", "intrinsic ZYX", "extrinsic xyz", "roll, pitch, yaw about fixed
// axes". Upper and lower case are the same: that upper case means moving axes is
// the custom of one library. Roles are the names of the numbers, if they have any; their
// order then follows the names.
//
// An error wraps ErrNoSequence (other words, or none), ErrSequence (331, XXY, two
// sequences, moving and fixed at once) or ErrRoles.
func ParseLabel(text string, roles [3]Role) (Label, error) {
	p, err := placesOf(roles)
	if err != nil {
		return Label{}, fmt.Errorf("angle label %q: %w", text, err)
	}
	s, err := parse(text)
	if err != nil {
		return Label{}, fmt.Errorf("angle label %q %w", text, err)
	}
	label := Label{Text: text, Full: s.full()}
	if label.Readings, err = s.readings(p); err != nil {
		return Label{}, fmt.Errorf("angle label %q: %w", text, err)
	}
	return label, nil
}
