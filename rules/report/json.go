package report

import (
	_ "embed"
	"encoding/json"
	"io"

	"dextral/rules"
)

// AuditSchema is the JSON Schema (2020-12) of what JSON writes.
//
//go:embed audit.schema.json
var AuditSchema []byte

// auditVersion is the version of the format: it counts up when a member changes
// its meaning or goes. New members do not count: readers ignore what they do not
// know.
const auditVersion = 1

// auditDoc is a report in JSON. Numbers are at full precision, angles in degrees.
type auditDoc struct {
	Format     string         `json:"format"`
	Version    int            `json:"version"`
	Dextral    string         `json:"dextral"` // version of the command
	Audited    Counts         `json:"audited"`
	Found      foundRow       `json:"found"`
	Gate       string         `json:"gate"`
	Failing    int            `json:"failing"`
	Findings   []auditFinding `json:"findings"`
	Undecided  []Undecided    `json:"undecided"`
	Unreadable []Skipped      `json:"unreadable"`
	Failed     []Failure      `json:"failed"`
	Limited    []Failure      `json:"limited"`
	LeftOut    LeftOut        `json:"leftOut"`
}

type foundRow struct {
	Errors   int `json:"errors"`
	Warnings int `json:"warnings"`
	Notes    int `json:"notes"`
	Waived   int `json:"waived"`
}

// auditFinding is all of a finding.
type auditFinding struct {
	findingRow
	Command string       `json:"command,omitempty"`
	Related []relatedRow `json:"related,omitempty"`
	Edit    *editRow     `json:"edit,omitempty"`
	Waiver  *waiverRow   `json:"waiver,omitempty"`
}

type relatedRow struct {
	Place   rules.Place `json:"place"`
	Message string      `json:"message"`
}

type editRow struct {
	Why          string           `json:"why"`
	Replacements []replacementRow `json:"replacements"`
}

type replacementRow struct {
	Place rules.Place `json:"place"`
	Old   string      `json:"old"`
	New   string      `json:"new"`
}

type waiverRow struct {
	Place   string      `json:"place,omitempty"` // as dextral.toml has it; none for a comment beside the value
	Until   string      `json:"until"`
	Because string      `json:"because"`
	Owner   string      `json:"owner"`
	At      rules.Place `json:"at"`
}

// JSON writes the report as one JSON document, described by AuditSchema.
func JSON(w io.Writer, r *Report, version string) error {
	t := r.Tally()
	doc := auditDoc{
		Format: "dextral audit", Version: auditVersion, Dextral: version,
		Audited: r.Audited, Found: foundRow{t.Errors, t.Warnings, t.Notes, t.Waived},
		Gate: r.Gate.String(), Failing: r.Failing(), Findings: []auditFinding{},
		Undecided: append([]Undecided{}, r.Undecided...), Unreadable: append([]Skipped{}, r.Unreadable...),
		Failed: append([]Failure{}, r.Failed...), Limited: append([]Failure{}, r.Limited...), LeftOut: r.LeftOut,
	}
	for i, row := range findingRows(r.Findings) {
		doc.Findings = append(doc.Findings, newAuditFinding(row, r.Findings[i]))
	}
	e := json.NewEncoder(w)
	e.SetIndent("", "  ")
	e.SetEscapeHTML(false)
	return e.Encode(doc)
}

func newAuditFinding(row findingRow, f *rules.Finding) auditFinding {
	a := auditFinding{findingRow: row, Command: f.Command}
	for _, r := range f.Related {
		a.Related = append(a.Related, relatedRow(r))
	}
	if f.Edit != nil {
		a.Edit = &editRow{Why: f.Edit.Why}
		for _, r := range f.Edit.Replacements {
			a.Edit.Replacements = append(a.Edit.Replacements, replacementRow(r))
		}
	}
	if w := f.Waiver; w != nil {
		a.Waiver = &waiverRow{w.Place, w.Until, w.Because, w.Owner, w.At}
	}
	return a
}
