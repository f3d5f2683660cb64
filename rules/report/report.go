package report

import (
	"cmp"
	"slices"
	"strings"

	"dextral/rules"
	"dextral/rules/policy"
)

// Report is the outcome of one audit.
type Report struct {
	Findings   []*rules.Finding `json:"findings"` // waived ones too
	Audited    Counts           `json:"audited"`
	Undecided  []Undecided      `json:"undecided"`
	Unreadable []Skipped        `json:"unreadable"`
	Failed     []Failure        `json:"failed"`
	Limited    []Failure        `json:"limited"` // audited as far as it could be read
	LeftOut    LeftOut          `json:"leftOut"`
	Gate       policy.Gate      `json:"gate"`
}

// Counts says how much was audited.
type Counts struct {
	GoPackages int   `json:"goPackages"`
	GoFiles    int   `json:"goFiles"`
	Files      int   `json:"files"` // configuration files and logs
	Values     int   `json:"values"`
	LogRows    int64 `json:"logRows"`
}

// Undecided is an orientation value that nothing says how to read.
type Undecided struct {
	Place rules.Place `json:"place"`
	Key   string      `json:"key"`
	Why   string      `json:"why"`
}

// Skipped is a file of a format that dextral recognises but cannot read yet.
type Skipped struct {
	Path string `json:"path"`
	Why  string `json:"why"`
}

// Failure is something that was to be audited and could not.
type Failure struct {
	Place   rules.Place `json:"place"`
	Message string      `json:"message"`
}

// LeftOut counts the files that were not looked at by design.
type LeftOut struct {
	Ignored  int `json:"ignored"`  // by version control
	Excluded int `json:"excluded"` // by dextral.toml
	Links    int `json:"links"`    // symbolic links; what they point to is audited where it stands
	NotText  int `json:"notText"`  // binary files
	Other    int `json:"other"`    // text of no format that can hold orientations
}

// Sort puts everything into the order of the output: by place, then by what
// distinguishes entries at one place.
func (r *Report) Sort() {
	slices.SortStableFunc(r.Findings, (*rules.Finding).Compare)
	slices.SortStableFunc(r.Undecided, func(a, b Undecided) int {
		return cmp.Or(a.Place.Compare(b.Place), strings.Compare(a.Key, b.Key), strings.Compare(a.Why, b.Why))
	})
	slices.SortStableFunc(r.Unreadable, func(a, b Skipped) int {
		return cmp.Or(strings.Compare(a.Path, b.Path), strings.Compare(a.Why, b.Why))
	})
	for _, list := range [][]Failure{r.Failed, r.Limited} {
		slices.SortStableFunc(list, func(a, b Failure) int {
			return cmp.Or(a.Place.Compare(b.Place), strings.Compare(a.Message, b.Message))
		})
	}
}

// Tally counts findings that are not waived by level, and the waived ones.
type Tally struct {
	Errors, Warnings, Notes, Waived int
}

// Tally counts the findings.
func (r *Report) Tally() Tally {
	var t Tally
	for _, f := range r.Findings {
		switch {
		case f.Waiver != nil:
			t.Waived++
		case f.Level == rules.Error:
			t.Errors++
		case f.Level == rules.Warning:
			t.Warnings++
		default:
			t.Notes++
		}
	}
	return t
}

// Failing counts the findings that fail the audit: at or above the gate, and
// not waived.
func (r *Report) Failing() int {
	n := 0
	for _, f := range r.Findings {
		if f.Waiver == nil && r.Gate.Fails(f.Level) {
			n++
		}
	}
	return n
}
