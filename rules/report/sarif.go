package report

import (
	"bytes"
	"encoding/json"
	"io"
	"math"
	"net/url"
	"path"
	"strconv"

	"github.com/owenrumney/go-sarif/v3/pkg/report/v210/sarif"

	"dextral/rules"
)

// schemaURI is where the standard publishes its schema.
const schemaURI = "https://docs.oasis-open.org/sarif/sarif/v2.1.0/errata01/os/schemas/sarif-schema-2.1.0.json"

// fingerprintName is the key of a finding's fingerprint. Its number counts up
// if Finding.Fingerprint ever hashes something else.
const fingerprintName = "dextral/v1"

// RuleInfo is what a log says about a rule.
type RuleInfo struct {
	Name    string
	Summary string // one sentence
	Help    string // Markdown
	Level   rules.Level
}

// RuleInfos describes the rules of a catalogue by their pages.
func RuleInfos(catalogue []rules.Rule) []RuleInfo {
	infos := make([]RuleInfo, len(catalogue))
	for i, r := range catalogue {
		infos[i] = RuleInfo{r.Name, r.Summary, r.Page(), r.Level}
	}
	return infos
}

// SARIF writes the report as a SARIF 2.1.0 log of one run. The catalogue becomes
// the tool's rules; version is the tool's. URIs are relative to the directory
// in which the command was started, columns count code points, and evidence
// stands in the properties of each result at full precision.
func SARIF(w io.Writer, r *Report, version string, catalogue []RuleInfo) error {
	run := sarif.NewRun()
	run.WithColumnKind("unicodeCodePoints")
	run.WithTool(sarif.NewTool().WithDriver(driver(version, catalogue)))
	run.WithInvocations([]*sarif.Invocation{invocation(r)})
	for _, f := range r.Findings {
		run.AddResult(result(f, catalogue))
	}
	run.WithProperties(bag("audited", r.Audited, "leftOut", r.LeftOut, "gate", r.Gate.String(),
		"failing", r.Failing(), "undecided", len(r.Undecided)))
	log := sarif.NewReport().AddRun(run)
	log.Schema = schemaURI
	return encode(w, log, r.Tally().Waived > 0)
}

// encode writes the log without what the library writes for members that were
// never set: empty arrays and numbers of -1, which are the defaults of the
// standard and half of the bytes. Where one result has suppressions the
// standard wants them on all (3.27.23), if empty; the library cannot say that.
func encode(w io.Writer, log *sarif.Report, suppressions bool) error {
	text, err := json.Marshal(log)
	if err != nil {
		return err
	}
	decoder := json.NewDecoder(bytes.NewReader(text))
	decoder.UseNumber() // keeps every digit
	var tree any
	if err := decoder.Decode(&tree); err != nil {
		return err
	}
	tidy(tree, suppressions)
	if text, err = json.MarshalIndent(tree, "", "  "); err != nil {
		return err
	}
	_, err = w.Write(append(text, '\n'))
	return err
}

// kept are the arrays that mean something when they are empty.
var kept = map[string]bool{"results": true, "rules": true, "runs": true}

// unset are the members whose default is -1.
var unset = map[string]bool{"id": true, "index": true, "parentIndex": true, "ruleIndex": true, "byteOffset": true, "charOffset": true, "rank": true}

func tidy(tree any, suppressions bool) {
	switch v := tree.(type) {
	case []any:
		for _, e := range v {
			tidy(e, suppressions)
		}
	case map[string]any:
		for key, e := range v {
			list, isList := e.([]any)
			switch {
			case key == "properties": // ours
				if bag, ok := e.(map[string]any); ok && len(bag) == 0 {
					delete(v, key)
				}
			case isList && len(list) == 0 && !kept[key], unset[key] && e == json.Number("-1"):
				delete(v, key)
			default:
				tidy(e, suppressions)
			}
		}
		if _, isResult := v["partialFingerprints"]; isResult && suppressions && v["suppressions"] == nil {
			v["suppressions"] = []any{}
		}
	}
}

func driver(version string, catalogue []RuleInfo) *sarif.ToolComponent {
	d := sarif.NewToolComponent().WithName("dextral").WithVersion(version)
	for _, r := range catalogue {
		rule := sarif.NewRule(r.Name).WithDescription(r.Summary).
			WithDefaultConfiguration(sarif.NewReportingConfiguration().WithLevel(r.Level.String()))
		if r.Help != "" {
			rule.WithMarkdownHelp(r.Help)
		}
		d.AddRule(rule)
	}
	return d
}

// invocation carries what could not be audited.
func invocation(r *Report) *sarif.Invocation {
	i := sarif.NewInvocation().WithExecutionSuccessful(len(r.Failed) == 0)
	for _, f := range r.Failed {
		i.AddToolExecutionNotification(notification(sarif.LevelError, f.Message, f.Place))
	}
	for _, s := range r.Unreadable {
		i.AddToolExecutionNotification(notification(sarif.LevelNote, "recognised but cannot be read yet: "+s.Why, rules.Place{Path: s.Path}))
	}
	return i
}

func notification(level, message string, at rules.Place) *sarif.Notification {
	n := sarif.NewNotification().WithLevel(level).WithMessage(sarif.NewTextMessage(message))
	if at.Path != "" {
		n.AddLocation(location(at))
	}
	return n
}

func result(f *rules.Finding, catalogue []RuleInfo) *sarif.Result {
	index := -1
	for i, r := range catalogue {
		if r.Name == f.Rule {
			index = i
		}
	}
	at := location(f.Place)
	if f.Key != "" {
		at.AddLogicalLocation(sarif.NewLogicalLocation().WithFullyQualifiedName(f.Key))
	}
	res := sarif.NewRuleResult(f.Rule).WithRuleIndex(index).WithLevel(f.Level.String()).
		WithMessage(sarif.NewTextMessage(f.Message)).
		WithPartialFingerprints(map[string]string{fingerprintName: f.Fingerprint()})
	res.AddLocation(at)
	for i, r := range f.Related {
		res.AddRelatedLocation(location(r.Place).WithID(i).WithMessage(sarif.NewTextMessage(r.Message)))
	}
	if f.Edit != nil {
		res.AddFixe(fix(f))
	}
	if f.Waiver != nil {
		res.AddSuppression(suppression(f.Waiver))
	}
	return res.WithProperties(bag("claim", f.Claim, "evidence", evidenceRows(f.Evidence), "remedy", f.Remedy, "command", f.Command))
}

// fix is an edit as replacements in the file of the finding.
func fix(f *rules.Finding) *sarif.Fix {
	change := sarif.NewArtifactChange().WithArtifactLocation(sarif.NewSimpleArtifactLocation(uri(f.Place.Path)))
	for _, r := range f.Edit.Replacements {
		change.AddReplacement(sarif.NewReplacement().WithDeletedRegion(region(r.Place)).
			WithInsertedContent(sarif.NewArtifactContent().WithText(r.New)))
	}
	return sarif.NewFix().WithDescription(sarif.NewTextMessage(f.Edit.Why)).AddArtifactChange(change)
}

func suppression(w *rules.Waiver) *sarif.Suppression {
	kind := "external"
	if w.Inline() {
		kind = "inSource"
	}
	return sarif.NewSuppression().WithKind(kind).WithStatus("accepted").WithJustification(w.Because).
		WithLocation(location(w.At)).
		WithProperties(bag("until", w.Until, "owner", w.Owner, "place", w.Place))
}

// location is a place in a file. Rows of logs that are no text have no region,
// so row and time stand in the properties.
func location(p rules.Place) *sarif.Location {
	physical := sarif.NewPhysicalLocation().WithArtifactLocation(sarif.NewSimpleArtifactLocation(uri(p.Path)))
	if p.Line > 0 {
		physical.WithRegion(region(p))
	}
	l := sarif.NewLocationWithPhysicalLocation(physical)
	if p.Row > 0 {
		l.WithProperties(bag("row", p.Row, "time", p.Time))
	}
	return l
}

func region(p rules.Place) *sarif.Region {
	r := sarif.NewRegion().WithStartLine(p.Line)
	if p.Column > 0 {
		r.WithStartColumn(p.Column)
	}
	if p.EndLine > 0 {
		r.WithEndLine(p.EndLine)
	}
	if p.EndColumn > 0 {
		r.WithEndColumn(p.EndColumn)
	}
	return r
}

// uri is a path as a URI reference: relative paths stay relative.
func uri(name string) string {
	u := url.URL{Path: name}
	if path.IsAbs(name) {
		u.Scheme = "file"
	} else if len(name) > 2 && name[1] == ':' && name[2] == '/' { // a drive letter
		u.Scheme, u.Path = "file", "/"+name
	}
	return u.String()
}

// evidenceRow is a row of evidence in the properties of a result.
type evidenceRow struct {
	What     string         `json:"what"`
	Stated   map[string]any `json:"stated,omitempty"`
	Computed map[string]any `json:"computed,omitempty"`
	Residual map[string]any `json:"residual,omitempty"`
}

func evidenceRows(all []rules.Evidence) []evidenceRow {
	rows := make([]evidenceRow, len(all))
	for i, e := range all {
		rows[i] = evidenceRow{e.What, quantity(e.Stated), quantity(e.Computed), quantity(e.Residual)}
	}
	return rows
}

// quantity is a number with its unit, or words; nil for an empty cell. JSON has
// no numbers that are not finite: they become words.
func quantity(q rules.Quantity) map[string]any {
	switch {
	case !q.Known:
		return nil
	case q.Text != "":
		return map[string]any{"text": q.Text}
	}
	m := map[string]any{"value": q.Value}
	if math.IsNaN(q.Value) || math.IsInf(q.Value, 0) {
		m = map[string]any{"text": strconv.FormatFloat(q.Value, 'g', -1, 64)}
	}
	if q.Unit != "" {
		m["unit"] = q.Unit
	}
	return m
}

// bag makes a property bag of names and values; empty ones are left out.
func bag(pairs ...any) *sarif.PropertyBag {
	b := sarif.NewPropertyBag()
	for i := 0; i < len(pairs); i += 2 {
		switch v := pairs[i+1].(type) {
		case string:
			if v == "" {
				continue
			}
		case []evidenceRow:
			if len(v) == 0 {
				continue
			}
		}
		b.Add(pairs[i].(string), pairs[i+1])
	}
	return b
}
