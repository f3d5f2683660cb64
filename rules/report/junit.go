package report

import (
	"bytes"
	"encoding/xml"
	"io"
	"strings"

	"dextral/rules"
)

// JUnit writes the report as JUnit XML, for services that show test results: one
// suite for each rule of the catalogue and one for the inputs. A finding that
// fails the audit is a failed case, one below the gate a passed case with its
// text, a waived one is skipped with its waiver. A rule that found nothing is one
// passed case, so that its silence is seen. An input that could not be audited is
// a case in error.
//
// The document keeps to the schema that Jenkins publishes for its plug-in, which
// is the common one. It has no times: the same tree gives the same bytes.
func JUnit(w io.Writer, r *Report, catalogue []RuleInfo) error {
	root := junitSuites{Name: "dextral audit"}
	root.add(inputs(r))
	known := map[string]bool{}
	for _, rule := range catalogue {
		known[rule.Name] = true
		root.add(suiteOf(r, rule.Name, rule.Summary))
	}
	for _, f := range r.Findings { // of a rule that the catalogue given does not list
		if !known[f.Rule] {
			known[f.Rule] = true
			root.add(suiteOf(r, f.Rule, ""))
		}
	}
	text, err := xml.MarshalIndent(root, "", "  ")
	if err != nil {
		return err
	}
	_, err = w.Write(append(append([]byte(xml.Header), text...), '\n'))
	return err
}

type junitSuites struct {
	XMLName  xml.Name     `xml:"testsuites"`
	Name     string       `xml:"name,attr"`
	Tests    int          `xml:"tests,attr"`
	Failures int          `xml:"failures,attr"`
	Errors   int          `xml:"errors,attr"`
	Suites   []junitSuite `xml:"testsuite"`
}

type junitSuite struct {
	Name     string      `xml:"name,attr"`
	Tests    int         `xml:"tests,attr"`
	Failures int         `xml:"failures,attr"`
	Errors   int         `xml:"errors,attr"`
	Skipped  int         `xml:"skipped,attr"`
	Cases    []junitCase `xml:"testcase"`
}

type junitCase struct {
	Name    string       `xml:"name,attr"`
	Class   string       `xml:"classname,attr"`
	Skipped *junitResult `xml:"skipped"`
	Error   *junitResult `xml:"error"`
	Failure *junitResult `xml:"failure"`
	Out     *junitText   `xml:"system-out"`
}

type junitResult struct {
	Message string `xml:"message,attr"`
	Type    string `xml:"type,attr,omitempty"`
	Text    string `xml:",cdata"`
}

type junitText struct {
	Text string `xml:",cdata"`
}

// words makes text that XML can hold: what its characters cannot be, which cdata
// does not check, is replaced. (Control characters are escapes already.)
func words(s string) *junitText {
	return &junitText{strings.Map(func(r rune) rune {
		if r == 0xFFFE || r == 0xFFFF {
			return 0xFFFD
		}
		return r
	}, s)}
}

func (s *junitSuites) add(suite junitSuite) {
	for _, c := range suite.Cases {
		suite.Tests++
		switch {
		case c.Skipped != nil:
			suite.Skipped++
		case c.Error != nil:
			suite.Errors++
		case c.Failure != nil:
			suite.Failures++
		}
	}
	s.Tests += suite.Tests
	s.Failures += suite.Failures
	s.Errors += suite.Errors
	s.Suites = append(s.Suites, suite)
}

// inputs says whether everything could be audited.
func inputs(r *Report) junitSuite {
	s := junitSuite{Name: "inputs", Cases: []junitCase{{Name: "audited", Class: "inputs", Out: words(summaryOf(r))}}}
	for _, f := range r.Failed {
		message := clean(f.Message)
		s.Cases = append(s.Cases, junitCase{Name: clean(f.Place.String()), Class: "inputs", Error: &junitResult{Message: message, Type: "not audited", Text: words(message).Text}})
	}
	return s
}

// suiteOf holds the findings of a rule.
func suiteOf(r *Report, rule, summary string) junitSuite {
	s := junitSuite{Name: rule}
	for _, f := range r.Findings {
		if f.Rule == rule {
			s.Cases = append(s.Cases, caseOf(r, f))
		}
	}
	if len(s.Cases) == 0 {
		s.Cases = []junitCase{{Name: "nothing found", Class: rule, Out: words(summary)}}
	}
	return s
}

func caseOf(r *Report, f *rules.Finding) junitCase {
	c := junitCase{Name: clean(strings.TrimSpace(f.Place.String() + " " + f.Key)), Class: f.Rule}
	switch {
	case f.Waiver != nil:
		c.Skipped = &junitResult{Message: "waived: " + waiverText(f)}
		c.Out = words(textOf(f))
	case r.Gate.Fails(f.Level):
		c.Failure = &junitResult{Message: clean(f.Message), Type: f.Level.String(), Text: words(textOf(f)).Text}
	default:
		c.Out = words(textOf(f))
	}
	return c
}

// textOf is a finding as the text report has it.
func textOf(f *rules.Finding) string {
	var b bytes.Buffer
	p := newPrinter(&b, Options{})
	p.finding(f)
	p.Flush()
	return b.String()
}

func summaryOf(r *Report) string {
	var b bytes.Buffer
	p := newPrinter(&b, Options{})
	p.summary(r)
	p.Flush()
	return b.String()
}
