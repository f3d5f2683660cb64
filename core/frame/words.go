package frame

import (
	"errors"
	"fmt"
	"regexp"
	"slices"
	"strings"

	"dextral/core/convention"
)

// What can be wrong with a triad.
var (
	ErrNoTriad = errors.New("names no triad")
	ErrTriad   = errors.New("is not a triad of perpendicular axes")
)

// named are triads known by other names than their letters. RSW, RTN, RIC and
// QSW are one triad; LVLH is two in common use. Orbital triads are those of a
// circular orbit (CCSDS and Orekit usage, see frame_axes.csv of the check values).
var named = map[string][]Triad{
	"optical": {{X: Right, Y: Down, Z: Forward}}, // robotics: suffix of camera frames
	"sez":     {{X: South, Y: East, Z: Up}},
	"rsw":     {radial}, "rtn": {radial}, "ric": {radial}, "qsw": {radial}, "ntw": {radial},
	"vvlh": {nadirPointing},
	"lvlh": {radial, nadirPointing},
	"tnw":  {{X: AlongTrack, Y: Down, Z: OrbitNormal}},
	"vnc":  {{X: AlongTrack, Y: OrbitNormal, Z: Up}},
}

var (
	radial        = Triad{X: Up, Y: AlongTrack, Z: OrbitNormal}
	nadirPointing = Triad{X: AlongTrack, Y: AntiNormal, Z: Down}
)

// ordinary are codes that are also words; they are codes in capitals only.
var ordinary = []string{"bur", "den", "des", "end", "fur", "rub", "sed", "sue", "use"}

// ParseTriad reads a code such as FLU or NED, a name such as optical, ways in
// order (forward-left-up), or by axis (x forward, y left, z up). With right- or
// left-handed stated, two of the axes are enough; with all three the statement
// is kept in Hand, true or not.
//
// An error wraps ErrNoTriad (other words, or too few) or ErrTriad (axes that are
// not perpendicular, a name with two meanings, a code that the words contradict).
func ParseTriad(text string) (Triad, error) {
	t, err := parse(strings.TrimSpace(text))
	if err != nil {
		return Triad{}, fmt.Errorf("triad %q: %w", text, err)
	}
	return t, nil
}

func parse(text string) (Triad, error) {
	switch triads := named[strings.ToLower(text)]; len(triads) {
	case 0:
		return parseWords(text)
	case 1:
		return triads[0], nil
	default:
		return Triad{}, fmt.Errorf("%w: the name is in use for %s and for %s; name the axes", ErrTriad, triads[0], triads[1])
	}
}

// parseCode reads three letters.
func parseCode(word string) (Triad, bool) {
	code := strings.ToUpper(word)
	if len(code) != 3 || slices.Contains(ordinary, word) {
		return Triad{}, false
	}
	t := Triad{X: letter(code[0]), Y: letter(code[1]), Z: letter(code[2])}
	return t, t.Valid()
}

// links are words between the ways.
var links = []string{"axis", "axes", "is", "points", "pointing", "and", "frame", "the", "to", "towards"}

// minus finds an axis with a sign, as in "-z forward".
var minus = regexp.MustCompile(`(?i)(^|[^\w])-([xyz])\b`)

// A description is what has been read of the words for a triad.
type description struct {
	code     Triad // what a code says
	ways     [3]Way
	hand     convention.Hand
	axis     int  // named, and waiting for its way; -1 for none
	next     int  // the axis whose turn it is where axes are not named
	opposite bool // the named axis has a minus
}

// parseWords reads a code, ways in order or by axis, and a stated hand.
func parseWords(text string) (Triad, error) {
	separated := minus.ReplaceAllString(text, "$1 minus $2")
	words := strings.FieldsFunc(separated, func(r rune) bool { return strings.ContainsRune(" ,;:=-_/()+>\u2192", r) })
	d := description{axis: -1}
	for len(words) > 0 {
		used, err := d.take(words)
		if err != nil {
			return Triad{}, err
		}
		words = words[used:]
	}
	if d.code.Valid() {
		if d.ways == [3]Way{} {
			d.ways = d.code.ways()
		}
		if d.ways != d.code.ways() {
			return Triad{}, fmt.Errorf("%w: its words are not those of %s", ErrTriad, d.code)
		}
	}
	return complete(d.ways, d.hand)
}

// take reads the first word, or several that belong together, and reports how many.
func (d *description) take(words []string) (used int, err error) {
	w := strings.ToLower(words[0])
	if k := strings.Index("xyz", w); k >= 0 && len(w) == 1 {
		d.axis = k
		return 1, nil
	}
	if w == "minus" {
		d.opposite = true
		return 1, nil
	}
	if used, hand := handWords(words); used > 0 {
		d.hand = hand
		return used, nil
	}
	if t, ok := parseCode(words[0]); ok && !d.code.Valid() {
		d.code = t
		return 1, nil
	}
	if used, way := wayOf(words); used > 0 {
		return used, d.point(way)
	}
	if slices.Contains(links, w) {
		return 1, nil
	}
	return 0, fmt.Errorf("%w: unknown word %q", ErrNoTriad, w)
}

// point gives the axis that was named, or whose turn it is, its way.
func (d *description) point(way Way) error {
	at := d.axis
	if at < 0 {
		at = d.next
	}
	if at > 2 || d.ways[at] != NoWay {
		return fmt.Errorf("%w: an axis has two directions", ErrTriad)
	}
	if d.opposite {
		way = way.Opposite()
	}
	d.ways[at] = way
	d.axis, d.next, d.opposite = -1, at+1, false
	return nil
}

// handWords reads right-handed, left hand and the like.
func handWords(words []string) (used int, hand convention.Hand) {
	first, used := strings.ToLower(words[0]), 1
	if len(words) > 1 && slices.Contains([]string{"handed", "hand"}, strings.ToLower(words[1])) {
		first, used = first+"handed", 2
	}
	switch first {
	case "righthanded":
		return used, convention.RightHanded
	case "lefthanded":
		return used, convention.LeftHanded
	}
	return 0, convention.HandUnstated
}

// wayOf reads the longest way that the words begin with.
func wayOf(words []string) (used int, way Way) {
	for n := min(3, len(words)); n > 0; n-- {
		if w, ok := ParseWay(strings.Join(words[:n], "")); ok {
			return n, w
		}
	}
	return 0, NoWay
}

// complete finds the third axis of two from the stated hand.
func complete(ways [3]Way, hand convention.Hand) (Triad, error) {
	t := Triad{ways[0], ways[1], ways[2], hand}
	if t.Valid() {
		return t, nil
	}
	missing := -1
	for k, w := range ways {
		if w == NoWay && missing < 0 {
			missing = k
		} else if w == NoWay {
			return t, fmt.Errorf("%w: fewer than two axes are named", ErrNoTriad)
		}
	}
	if missing < 0 {
		return t, fmt.Errorf("%w: %s", ErrTriad, t)
	}
	if hand == convention.HandUnstated {
		return t, fmt.Errorf("%w: name the third axis, or say right- or left-handed", ErrNoTriad)
	}
	for way := Forward; way <= IntoScreen; way++ {
		ways[missing] = way
		if full := (Triad{ways[0], ways[1], ways[2], hand}); full.Handedness() == hand {
			return full, nil
		}
	}
	return t, fmt.Errorf("%w: %s", ErrTriad, t)
}
