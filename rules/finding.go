package rules

import (
	"crypto/sha256"
	"encoding/hex"
	"math"
	"slices"
	"strings"
)

// Level says how bad a finding is; the names are those of SARIF.
type Level uint8

// The levels, mildest first.
const (
	Note    Level = iota // no claim is contradicted, but worth knowing
	Warning              // an inferred claim is contradicted, or a hazard measured
	Error                // a stated claim is contradicted
)

// String is the SARIF name of the level.
func (l Level) String() string { return [...]string{"note", "warning", "error"}[l] }

// ParseLevel reads a level's name.
func ParseLevel(s string) (Level, bool) {
	i := slices.Index([]string{"note", "warning", "error"}, s)
	return Level(max(i, 0)), i >= 0
}

// Quantity is a number with its unit, or words where there is no number.
type Quantity struct {
	Text  string  // words; "" to print the number
	Value float64 // at full precision; radians are never used: angles come in degrees
	Unit  string  // "deg", "" and so on
	Known bool    // false: the cell is empty
}

// Words makes a quantity of words.
func Words(s string) Quantity { return Quantity{Text: s, Known: s != ""} }

// Degrees makes a quantity in degrees of an angle in radians.
func Degrees(rad float64) Quantity {
	return Quantity{Value: rad * 180 / math.Pi, Unit: "deg", Known: true}
}

// Plain makes a quantity without unit.
func Plain(x float64) Quantity { return Quantity{Value: x, Known: true} }

// Evidence is one row of the table under a finding: what was stated, what the
// core computes, and how far apart they are.
type Evidence struct {
	What     string
	Stated   Quantity
	Computed Quantity
	Residual Quantity
}

// Related is another place that the finding speaks of.
type Related struct {
	Place   Place
	Message string
}

// Finding is a claim and its evidence that cannot both be right.
type Finding struct {
	Rule     string // name in the catalogue
	Level    Level
	Place    Place
	Key      string // place in the structure, for fingerprints and waivers
	Message  string // one sentence: claim, contradiction, effect in degrees
	Evidence []Evidence
	Claim    string // the claim contradicted, in words that do not change with the numbers
	Remedy   string // what to do; "" where nothing reconciles the numbers
	Edit     *Edit  // not nil: what to write instead
	Command  string // reproduces the computation; "" if there is none
	Related  []Related
	Turn     *Turn   // not nil: the two orientations held against each other
	Waiver   *Waiver // not nil: accepted
	Lapsed   *Waiver // not nil: was accepted until a day that has passed
}

// Fingerprint identifies the finding across edits elsewhere in the file: it
// depends on rule, path, structural place and claim, never on line numbers or
// residuals.
func (f *Finding) Fingerprint() string {
	sum := sha256.Sum256([]byte(strings.Join([]string{f.Rule, f.Place.Path, f.Key, f.Claim}, "\x00")))
	return hex.EncodeToString(sum[:16])
}

// Compare orders findings for reports: by place, then rule, then message.
func (f *Finding) Compare(g *Finding) int {
	if c := f.Place.Compare(g.Place); c != 0 {
		return c
	}
	if c := strings.Compare(f.Rule, g.Rule); c != 0 {
		return c
	}
	return strings.Compare(f.Message, g.Message)
}

// Waiver says that somebody accepted a finding.
type Waiver struct {
	Rule    string // rule name
	Place   string // path, or path#key, where path may be a glob; "" for a comment beside the value
	Until   string // last day it holds, YYYY-MM-DD
	Because string
	Owner   string
	At      Place // where the waiver itself stands
	InFile  bool  // in a file of waivers that dextral.toml names
}

// Inline reports whether the waiver is a comment beside the value.
func (w *Waiver) Inline() bool { return w.Place == "" }
