package report

import (
	_ "embed"
	"encoding/json"
	"io"
	"math"

	"dextral/rules"
)

// ReviewSchema is the JSON Schema (2020-12) of what ReviewJSON writes.
//
//go:embed review.schema.json
var ReviewSchema []byte

// reviewVersion is the version of the format: it counts up when a member changes
// its meaning or goes.
const reviewVersion = 1

// reviewDoc is a review in JSON. Numbers are at full precision, angles in degrees.
type reviewDoc struct {
	Format    string        `json:"format"`
	Version   int           `json:"version"`
	Base      string        `json:"base"`
	Head      string        `json:"head"` // "" is the working tree
	Files     int           `json:"files"`
	Changes   []changeRow   `json:"changes"`
	Functions []functionRow `json:"functions"`
	Moves     []moveRow     `json:"moves"`
	Loops     []loopRow     `json:"loops"`
	Findings  findingSets   `json:"findings"`
	Gate      string        `json:"gate"`
	Failing   int           `json:"failing"`
	LeftOut   []Skipped     `json:"leftOut"`
	Failed    []Failure     `json:"failed"`
}

// functionRow is a function whose text differs; was and is are "" where what it
// computes is not known.
type functionRow struct {
	Name  string `json:"name"`
	Place string `json:"place"`
	Was   string `json:"was"`
	Is    string `json:"is"`
}

type findingSets struct {
	New   []findingRow `json:"new"`
	Fixed []findingRow `json:"fixed"`
	Same  []findingRow `json:"same"`
}

// findingRow is a finding in JSON.
type findingRow struct {
	Rule        string        `json:"rule"`
	Level       string        `json:"level"`
	Place       rules.Place   `json:"place"`
	Key         string        `json:"key"`
	Message     string        `json:"message"`
	Claim       string        `json:"claim,omitempty"`
	Evidence    []evidenceRow `json:"evidence"`
	Remedy      string        `json:"remedy,omitempty"`
	Fingerprint string        `json:"fingerprint"`
	Waived      bool          `json:"waived"`
}

func findingRows(list []*rules.Finding) []findingRow {
	rows := make([]findingRow, 0, len(list))
	for _, f := range list {
		rows = append(rows, findingRow{f.Rule, f.Level.String(), f.Place, f.Key, f.Message, f.Claim, evidenceRows(f.Evidence), f.Remedy, f.Fingerprint(), f.Waiver != nil})
	}
	return rows
}

type moveRow struct {
	Graph   string   `json:"graph"`
	Root    string   `json:"root"`
	Frame   string   `json:"frame"`
	Degrees float64  `json:"degrees"`
	UpTo    bool     `json:"upTo"`  // depending on how bare labels are read
	Lever   float64  `json:"lever"` // per unit of distance from the frame's origin
	Through []string `json:"through"`
}

type loopRow struct {
	Graph  string   `json:"graph"`
	Frames []string `json:"frames"`
	Was    float64  `json:"was"` // degrees left open
	Is     float64  `json:"is"`
	Closes bool     `json:"closes"`
}

// ReviewJSON writes a review as one JSON document, described by ReviewSchema.
func ReviewJSON(w io.Writer, r *Review) error {
	doc := reviewDoc{
		Format: "dextral review", Version: reviewVersion, Base: r.Base, Head: r.Head, Files: r.Files,
		Changes: changeRows(r.Changes), Functions: []functionRow{}, Moves: []moveRow{}, Loops: []loopRow{},
		Findings: findingSets{findingRows(r.New), findingRows(r.Fixed), findingRows(r.Same)},
		Gate:     r.Audit.Gate.String(), Failing: r.Failing(),
		LeftOut: append([]Skipped{}, r.LeftOut...), Failed: append([]Failure{}, r.Audit.Failed...),
	}
	for _, c := range r.Functions {
		doc.Functions = append(doc.Functions, functionRow{c.Name, c.At, c.Was, c.Is})
	}
	const degrees = 180 / math.Pi
	for _, d := range r.Downstream {
		for _, m := range d.Moves {
			row := moveRow{d.Title, m.Root, m.Frame, m.Angle * degrees, m.UpTo, m.Lever(1), []string{}}
			for _, v := range m.Through {
				row.Through = append(row.Through, v.Key)
			}
			doc.Moves = append(doc.Moves, row)
		}
		for _, l := range d.Loops {
			doc.Loops = append(doc.Loops, loopRow{d.Title, l.Frames, l.Was * degrees, l.Is * degrees, l.Closes})
		}
	}
	e := json.NewEncoder(w)
	e.SetIndent("", "  ")
	e.SetEscapeHTML(false)
	return e.Encode(doc)
}

// changeRow is a change in machine formats.
type changeRow struct {
	Effect  string    `json:"effect"`
	Text    string    `json:"text"`
	Degrees float64   `json:"degrees,omitempty"` // in the reading where it is largest
	Shift   float64   `json:"shift,omitempty"`   // of the translation, in its unit
	Before  *valueRow `json:"before,omitempty"`
	After   *valueRow `json:"after,omitempty"`
}

// valueRow is one side of a change.
type valueRow struct {
	Place   rules.Place `json:"place"`
	Key     string      `json:"key"`
	Reading string      `json:"reading"`
	Numbers []string    `json:"numbers"` // as written
}

func changeRows(list []rules.Change) []changeRow {
	rows := make([]changeRow, 0, len(list))
	for _, c := range list {
		rows = append(rows, changeRow{c.Effect.String(), c.Text, c.Angle * 180 / math.Pi, c.Shift, newValueRow(c.Before), newValueRow(c.After)})
	}
	return rows
}

func newValueRow(v *rules.Value) *valueRow {
	if v == nil {
		return nil
	}
	row := &valueRow{Place: v.Place, Key: v.Key, Reading: v.Reading(), Numbers: []string{}}
	for _, n := range v.Numbers {
		row.Numbers = append(row.Numbers, n.Text)
	}
	return row
}
