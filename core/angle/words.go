package angle

import (
	"strings"
	"unicode"
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

// split cuts a text into lower-case words, at everything that is no letter or
// digit, between letters and digits, and where case changes as in eulerZYX or
// XYZOrder. Apostrophes behind axis letters are their primes.
func split(text string) []word {
	var words []word
	var run []rune
	var primes []int
	flush := func() {
		if len(run) > 0 {
			words = append(words, word{strings.ToLower(string(run)), primes})
		}
		run, primes = nil, nil
	}
	for _, r := range typographic.Replace(text) {
		switch last := len(run) - 1; {
		case r == '\'' && last >= 0 && strings.Trim(strings.ToLower(string(run)), "xyz") == "":
			primes = append(primes, make([]int, len(run)-len(primes))...)
			primes[last]++
			continue
		case !unicode.IsLetter(r) && !unicode.IsDigit(r):
			flush()
			continue
		case last >= 0 && (unicode.IsDigit(r) != unicode.IsDigit(run[last]) || unicode.IsUpper(r) && unicode.IsLower(run[last])):
			flush()
		case last >= 1 && unicode.IsLower(r) && unicode.IsUpper(run[last]) && unicode.IsUpper(run[last-1]):
			capital := run[last]
			run = run[:last]
			primes = primes[:min(len(primes), last)]
			flush()
			run = append(run, capital)
		}
		run = append(run, r)
		if primes != nil {
			primes = append(primes, 0)
		}
	}
	flush()
	return words
}
