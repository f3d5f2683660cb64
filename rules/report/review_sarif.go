package report

import (
	"io"

	"github.com/owenrumney/go-sarif/v3/pkg/report/v210/sarif"

	"dextral/rules"
)

// ReviewSARIF writes the findings of a review as a SARIF 2.1.0 log of one run
// with baseline states: new, unchanged, and absent for those that are fixed, at
// their old places. What changed without a finding stands in the properties of
// the run.
func ReviewSARIF(w io.Writer, r *Review, version string, catalogue []RuleInfo) error {
	run := sarif.NewRun()
	run.WithColumnKind("unicodeCodePoints")
	run.WithTool(sarif.NewTool().WithDriver(driver(version, catalogue)))
	run.WithInvocations([]*sarif.Invocation{invocation(&r.Audit)})
	waived := false
	for _, group := range []struct {
		state string
		list  []*rules.Finding
	}{{"new", r.New}, {"unchanged", r.Same}, {"absent", r.Fixed}} {
		for _, f := range group.list {
			run.AddResult(result(f, catalogue).WithBaselineState(group.state))
			waived = waived || f.Waiver != nil
		}
	}
	run.WithProperties(bag("base", r.Base, "head", r.Head, "changes", changeRows(r.Changes), "gate", r.Audit.Gate.String(), "failing", r.Failing()))
	log := sarif.NewReport().AddRun(run)
	log.Schema = schemaURI
	return encode(w, log, waived)
}
