package frame

import (
	"errors"
	"fmt"
	"strings"

	"dextral/core/convention"
)

// What can be wrong with a triad.
var (
	ErrNoTriad = errors.New("names no triad")
	ErrTriad   = errors.New("is not a triad of perpendicular axes")
)

// parseWords reads ways in order or by axis, and a stated hand.
func parseWords(lower string) (Triad, error) {
	words := strings.FieldsFunc(lower, func(r rune) bool { return strings.ContainsRune(" ,;:=-_/()+", r) })
	var ways [3]Way
	hand := convention.HandUnstated
	axis, next := -1, 0
	for at := 0; at < len(words); at++ {
		w := words[at]
		if k := strings.Index("xyz", w); k >= 0 && len(w) == 1 {
			axis = k
			continue
		}
		if used, h := handWords(words[at:]); used > 0 {
			hand, at = h, at+used-1
			continue
		}
		used, way := wayOf(words[at:])
		if used == 0 {
			if w == "axis" || w == "axes" || w == "is" || w == "points" || w == "and" || w == "frame" || w == "the" || w == "to" {
				continue
			}
			return Triad{}, fmt.Errorf("%w: unknown word %q", ErrNoTriad, w)
		}
		at += used - 1
		if axis < 0 {
			axis = next
		}
		if axis > 2 || ways[axis] != NoWay {
			return Triad{}, fmt.Errorf("%w: an axis has two directions", ErrTriad)
		}
		ways[axis], axis, next = way, -1, axis+1
	}
	return complete(ways, hand)
}

// handWords reads right-handed, left hand and the like.
func handWords(words []string) (used int, hand convention.Hand) {
	if len(words) >= 2 && (words[1] == "handed" || words[1] == "hand") || words[0] == "righthanded" || words[0] == "lefthanded" {
		used = 2
		if strings.HasSuffix(words[0], "handed") {
			used = 1
		}
		switch {
		case strings.HasPrefix(words[0], "right"):
			return used, convention.RightHanded
		case strings.HasPrefix(words[0], "left"):
			return used, convention.LeftHanded
		}
	}
	return 0, hand
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
