package main

import (
	"context"
	"fmt"
	"path/filepath"

	"dextral/analyzers/audit"
	"dextral/analyzers/edit"
	"dextral/rules"
	"dextral/rules/report"
)

// showEdits prints the edits that the findings offer as one patch. The summary
// goes to standard error.
func showEdits(s streams, r *audit.Result) error {
	files, refused := edit.Plan(r.Report.Findings, r.Sums)
	for _, f := range files {
		if err := f.Diff(s.out); err != nil {
			return fmt.Errorf("the diff could not be written: %w", err)
		}
	}
	for _, n := range refused {
		fmt.Fprintf(s.err, "%s: %v\n", n.Place, n.Why)
	}
	if len(files) == 0 {
		fmt.Fprintln(s.err, noEdits)
	}
	_ = report.Summary(s.err, &r.Report, layout(s.err)) // beside the point of a patch
	return outcome(&r.Report)
}

const noEdits = "no finding offers an edit: which side of a contradiction is wrong, numbers alone rarely tell"

// applyEdits writes them, audits again, and prints what became of the findings.
// The exit status is that of the second audit, or 2 where an edit was refused.
func applyEdits(ctx context.Context, s streams, r *audit.Result, o audit.Options) error {
	files, refused := edit.Plan(r.Report.Findings, r.Sums)
	written := 0
	for _, f := range files {
		if err := f.Write(); err != nil {
			refused = append(refused, edit.Refused{Place: rules.Place{Path: f.Path}, Why: err})
			continue
		}
		written++
		for _, finding := range f.Findings {
			fmt.Fprintf(s.out, "%s: %s: wrote %s: %s\n", finding.Place, finding.Key, finding.Edit.Words(), finding.Edit.Why)
		}
	}
	for _, n := range refused {
		fmt.Fprintf(s.err, "%s: %v\n", filepath.ToSlash(n.Place.String()), n.Why)
	}
	if written == 0 {
		fmt.Fprintln(s.out, "nothing was written")
		if len(files)+len(refused) == 0 {
			fmt.Fprintln(s.out, noEdits)
		}
	} else {
		again, err := audit.Run(ctx, o)
		if err != nil {
			return err
		}
		became(s, r.Report.Findings, again.Report.Findings)
		r = again
	}
	if err := report.Summary(s.out, &r.Report, layout(s.out)); err != nil {
		return fmt.Errorf("the summary could not be written: %w", err)
	}
	if len(refused) > 0 {
		return status(exitFailed)
	}
	return outcome(&r.Report)
}

// became prints the findings that are gone and those that are new.
func became(s streams, before, after []*rules.Finding) {
	count := func(list []*rules.Finding) map[string]int {
		n := map[string]int{}
		for _, f := range list {
			n[f.Fingerprint()]++
		}
		return n
	}
	print := func(word string, list []*rules.Finding, others map[string]int) {
		for _, f := range list {
			if others[f.Fingerprint()] > 0 {
				others[f.Fingerprint()]--
				continue
			}
			fmt.Fprintf(s.out, "%-5s %s: %s: %s\n", word, f.Place, f.Rule, f.Message)
		}
	}
	print("gone", before, count(after))
	print("new", after, count(before))
}
