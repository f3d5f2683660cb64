package angle

import (
	"regexp"
	"slices"
	"strings"
)

// turnNames are the names of turns about the axes of a vehicle, as letters r
// (about x), p (about y) and w (about z).
var turnNames = map[string]string{
	"roll": "r", "bank": "r",
	"pitch": "p", "elevation": "p",
	"yaw": "w", "heading": "w", "azimuth": "w",
	"hpr": "wpr", "rph": "rpw",
}

// kinds are the words for fixed (true) and moving axes. The letters s and r
// before three axes, as in sxyz, are static and rotating in the notation of
// C. Gohlke's transformations.py (from memory).
var kinds = map[string]bool{
	"intrinsic": false, "intrinsically": false, "moving": false, "rotating": false, "rotated": false,
	"extrinsic": true, "extrinsically": true, "fixed": true, "static": true,
}

// bearers own the axes when "axes" or "fixed" follows: body-fixed axes move,
// space-fixed axes do not.
var bearers = map[string]bool{
	"body": false, "vehicle": false, "local": false,
	"space": true, "world": true, "global": true, "earth": true, "inertial": true, "reference": true,
}

// fillers say nothing about the sequence.
var fillers = wordSet(`euler eulers tait bryan cardan proper classic angle angles order sequence seq
	convention rotation rotations rotate rot turn turns about around axis axes frame frames
	a an as in is are the of and by with using then first second third
	deg degree degrees rad radian radians orientation attitude`)

func wordSet(text string) map[string]bool {
	set := map[string]bool{}
	for _, w := range strings.Fields(text) {
		set[w] = true
	}
	return set
}

// typographic turns the marks that are written for primes into apostrophes.
var typographic = strings.NewReplacer(
	"\u2032", "'", "\u2033", "''", "\u2034", "'''", "\u2057", "''''",
	"\u02b9", "'", "\u02ba", "''", "\u00b4", "'",
	"\u2018", "'", "\u2019", "'", "\u201c", "''", "\u201d", "''", "\"", "''",
)

// Where a text is cut: at everything that is no letter, apostrophe or digit,
// between letters and digits, and where case changes as in eulerZYX and XYZOrder.
var (
	hump  = regexp.MustCompile(`(\p{Ll})(\p{Lu})|(\p{Lu})(\p{Lu}\p{Ll})`)
	token = regexp.MustCompile(`[\p{L}']+|\p{Nd}+`)
)

// split cuts a text into lower-case words. Apostrophes behind axis letters are
// their primes; others separate.
func split(text string) []word {
	var words []word
	spaced := hump.ReplaceAllString(typographic.Replace(text), "$1$3 $2$4")
	for _, t := range token.FindAllString(strings.ToLower(spaced), -1) {
		if letters := strings.ReplaceAll(t, "'", ""); strings.Trim(letters, "xyz") == "" {
			words = append(words, word{letters, primesIn(t)})
			continue
		}
		for part := range strings.SplitSeq(t, "'") {
			words = append(words, word{text: part})
		}
	}
	return slices.DeleteFunc(words, func(w word) bool { return w.text == "" })
}

// primesIn counts the apostrophes behind each letter.
func primesIn(t string) (primes []int) {
	for _, c := range t {
		switch {
		case c != '\'':
			primes = append(primes, 0)
		case len(primes) > 0:
			primes[len(primes)-1]++
		}
	}
	return primes
}
