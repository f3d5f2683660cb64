package report

import (
	"bytes"
	"encoding/json"
	"encoding/xml"
	"fmt"
	"io"
	"slices"
	"strconv"
	"strings"
	"testing"

	"github.com/santhosh-tekuri/jsonschema/v6"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/rules"
	"dextral/rules/policy"
)

func auditSchema(t *testing.T) *jsonschema.Schema {
	t.Helper()
	doc, err := jsonschema.UnmarshalJSON(bytes.NewReader(AuditSchema))
	require.NoError(t, err)
	c := jsonschema.NewCompiler()
	require.NoError(t, c.AddResource("audit.json", doc))
	s, err := c.Compile("audit.json")
	require.NoError(t, err)
	return s
}

// reports are the sample, an empty one, and one of hostile texts.
func reports() map[string]*Report {
	hostile := "<&\"'`|\x1b[2J\x00\ufffe\u202e]]>\n"
	bad := &Report{
		Findings: []*rules.Finding{{Rule: "a rule nobody knows", Place: rules.Place{Path: hostile}, Key: hostile, Message: hostile, Claim: hostile, Remedy: hostile,
			Evidence: []rules.Evidence{{What: hostile, Stated: rules.Words(hostile)}}},
			{Rule: rules.SignJump, Level: rules.Error, Message: hostile, Waiver: &rules.Waiver{Until: "2031-01-01", Because: hostile, Owner: hostile, At: rules.Place{Path: hostile}}}},
		Undecided: []Undecided{{rules.Place{Path: hostile}, hostile, hostile}}, Failed: []Failure{{rules.Place{Path: hostile}, hostile}},
		Limited: []Failure{{rules.Place{Path: hostile}, hostile}}, Unreadable: []Skipped{{hostile, hostile}}, Gate: policy.GateNote,
	}
	return map[string]*Report{"sample": sample(), "empty": {}, "hostile": bad}
}

func TestJSON(t *testing.T) {
	schema := auditSchema(t)
	for name, r := range reports() {
		var b bytes.Buffer
		require.NoError(t, JSON(&b, r, "1.2.3"), name)
		if name == "sample" {
			golden(t, "json", b.Bytes())
		}
		doc, err := jsonschema.UnmarshalJSON(&b)
		require.NoError(t, err)
		assert.NoError(t, schema.Validate(doc), name)
	}
}

// The schema is worth something: it knows every member that is written, and each
// of these changes breaks it.
func TestAuditSchemaIsStrict(t *testing.T) {
	schema := auditSchema(t)
	var b bytes.Buffer
	require.NoError(t, JSON(&b, sample(), "1.2.3"))
	for name, change := range map[string]func(doc map[string]any){
		"version":     func(d map[string]any) { d["version"] = 2 },
		"format":      func(d map[string]any) { d["format"] = "dextral review" },
		"no findings": func(d map[string]any) { delete(d, "findings") },
		"level":       func(d map[string]any) { first(d)["level"] = "fatal" },
		"fingerprint": func(d map[string]any) { first(d)["fingerprint"] = "x" },
		"no place":    func(d map[string]any) { delete(first(d), "place") },
		"waived without waiver": func(d map[string]any) {
			first(d)["waived"] = true
			delete(first(d), "waiver")
		},
		"count": func(d map[string]any) { d["audited"].(map[string]any)["values"] = "many" },
	} {
		var doc map[string]any
		require.NoError(t, json.Unmarshal(b.Bytes(), &doc))
		change(doc)
		text, err := json.Marshal(doc)
		require.NoError(t, err)
		read, err := jsonschema.UnmarshalJSON(bytes.NewReader(text))
		require.NoError(t, err)
		assert.Error(t, schema.Validate(read), name)
	}
	var described map[string]any
	require.NoError(t, json.Unmarshal(AuditSchema, &described))
	var doc any
	require.NoError(t, json.Unmarshal(b.Bytes(), &doc))
	assertDescribed(t, described, described, doc, "report")
}

func first(doc map[string]any) map[string]any {
	for _, f := range doc["findings"].([]any) {
		if !f.(map[string]any)["waived"].(bool) {
			return f.(map[string]any)
		}
	}
	panic("no finding")
}

// assertDescribed holds that the schema names every member of a document.
func assertDescribed(t *testing.T, root, schema map[string]any, doc any, at string) {
	t.Helper()
	if ref, ok := schema["$ref"].(string); ok {
		schema = root["$defs"].(map[string]any)[strings.TrimPrefix(ref, "#/$defs/")].(map[string]any)
	}
	switch doc := doc.(type) {
	case map[string]any:
		for name, member := range doc {
			property, ok := schema["properties"].(map[string]any)[name].(map[string]any)
			if assert.True(t, ok, "%s.%s is not described", at, name) {
				assertDescribed(t, root, property, member, at+"."+name)
			}
		}
	case []any:
		for i, e := range doc {
			assertDescribed(t, root, schema["items"].(map[string]any), e, at+"["+strconv.Itoa(i)+"]")
		}
	}
}

// rule is what the schema of JUnit XML says about an element: its attributes, of
// which those with a star must be there, and its children in their order.
type junitRule struct{ attributes, children []string }

// junitSchema are the elements that dextral writes, as junit-10.xsd of Jenkins'
// xunit plug-in has them (from memory).
var junitSchema = map[string]junitRule{
	"testsuites": {[]string{"name", "time", "tests", "failures", "disabled", "errors"}, []string{"testsuite"}},
	"testsuite": {[]string{"name*", "tests*", "failures", "errors", "time", "disabled", "skipped", "timestamp", "hostname", "id", "package", "group", "url", "version", "file", "line", "log"},
		[]string{"properties", "testcase", "system-out", "system-err"}},
	"testcase": {[]string{"name*", "assertions", "time", "classname", "status", "class", "file", "line"},
		[]string{"skipped", "error", "failure", "system-out", "system-err"}},
	"skipped":    {[]string{"message", "type"}, nil},
	"error":      {[]string{"message", "type"}, nil},
	"failure":    {[]string{"message", "type"}, nil},
	"system-out": {nil, nil},
}

// checkJUnit walks a document by the schema.
func checkJUnit(text []byte) error {
	d := xml.NewDecoder(bytes.NewReader(text))
	type open struct {
		name string
		last int // index of the last child's name
	}
	var stack []open
	for {
		token, err := d.Token()
		if err == io.EOF {
			return nil
		}
		if err != nil {
			return err
		}
		switch e := token.(type) {
		case xml.StartElement:
			name := e.Name.Local
			rule, known := junitSchema[name]
			if !known {
				return fmt.Errorf("no element %s", name)
			}
			if len(stack) == 0 && name != "testsuites" {
				return fmt.Errorf("%s is no root", name)
			}
			if len(stack) > 0 {
				parent := &stack[len(stack)-1]
				i := slices.Index(junitSchema[parent.name].children, name)
				if i < parent.last || i < 0 {
					return fmt.Errorf("%s cannot stand here in %s", name, parent.name)
				}
				parent.last = i
			}
			seen := map[string]bool{}
			for _, a := range e.Attr {
				if !slices.Contains(rule.attributes, a.Name.Local) && !slices.Contains(rule.attributes, a.Name.Local+"*") {
					return fmt.Errorf("%s has no attribute %s", name, a.Name.Local)
				}
				seen[a.Name.Local] = true
			}
			for _, a := range rule.attributes {
				if must, ok := strings.CutSuffix(a, "*"); ok && !seen[must] {
					return fmt.Errorf("%s lacks %s", name, must)
				}
			}
			stack = append(stack, open{name: name})
		case xml.EndElement:
			stack = stack[:len(stack)-1]
		}
	}
}

func TestJUnit(t *testing.T) {
	for name, r := range reports() {
		var b bytes.Buffer
		require.NoError(t, JUnit(&b, r, RuleInfos(rules.Catalogue())), name)
		require.NoError(t, checkJUnit(b.Bytes()), name)
		var doc junitSuites
		require.NoError(t, xml.Unmarshal(b.Bytes(), &doc))
		assert.Equal(t, r.Failing(), doc.Failures, name)
		assert.Equal(t, len(r.Failed), doc.Errors, name)
		tests, skipped := 0, 0
		for _, s := range doc.Suites {
			assert.Equal(t, s.Tests, len(s.Cases))
			assert.NotEmpty(t, s.Cases, "a rule that found nothing has passed")
			tests += s.Tests
			skipped += s.Skipped
		}
		assert.Equal(t, tests, doc.Tests)
		assert.Equal(t, r.Tally().Waived, skipped, name)
		if name == "sample" {
			// Of the rules that found nothing two are enough.
			few := slices.DeleteFunc(rules.Catalogue(), func(rule rules.Rule) bool {
				found := slices.ContainsFunc(r.Findings, func(f *rules.Finding) bool { return f.Rule == rule.Name })
				return !found && rule.Name != rules.NormLoss && rule.Name != rules.WaiverUnused
			})
			b.Reset()
			require.NoError(t, JUnit(&b, r, RuleInfos(few)))
			golden(t, "junit", b.Bytes())
		}
	}
	for _, wrong := range []string{"<testsuite name='a' tests='1'/>", "<testsuites><testsuite name='a'/></testsuites>",
		"<testsuites><testsuite name='a' tests='1'><testcase name='a'><system-out/><failure/></testcase></testsuite></testsuites>",
		"<testsuites colour='a'/>", "<testsuites><testcase name='a'/></testsuites>", "<testsuites>"} {
		assert.Error(t, checkJUnit([]byte(wrong)), wrong)
	}
}

func TestMarkdown(t *testing.T) {
	for name, r := range reports() {
		var b bytes.Buffer
		require.NoError(t, Markdown(&b, r), name)
		if name == "sample" {
			golden(t, "markdown", b.Bytes())
		}
		text := b.String()
		assert.NotContains(t, text, "\x1b")
		assert.Equal(t, strings.Count(text, "<details>"), strings.Count(text, "</details>"), name)
		assert.Contains(t, text, caution)
		for line := range strings.Lines(text) {
			if strings.HasPrefix(line, "| ") {
				assert.Equal(t, 4, strings.Count(line, "|")-strings.Count(line, `\|`), line)
			}
		}
	}
}
