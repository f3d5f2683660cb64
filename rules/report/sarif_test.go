package report

import (
	"bytes"
	"encoding/json"
	"math"
	"os"
	"strings"
	"testing"

	"github.com/santhosh-tekuri/jsonschema/v6"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"dextral/rules"
)

func schema(t *testing.T) *jsonschema.Schema {
	t.Helper()
	f, err := os.Open("testdata/sarif-schema-2.1.0.json")
	require.NoError(t, err)
	defer f.Close()
	doc, err := jsonschema.UnmarshalJSON(f)
	require.NoError(t, err)
	c := jsonschema.NewCompiler()
	c.AssertFormat()
	require.NoError(t, c.AddResource("sarif.json", doc))
	s, err := c.Compile("sarif.json")
	require.NoError(t, err)
	return s
}

func validate(t *testing.T, s *jsonschema.Schema, log []byte) error {
	t.Helper()
	doc, err := jsonschema.UnmarshalJSON(bytes.NewReader(log))
	require.NoError(t, err)
	return s.Validate(doc)
}

// a small catalogue keeps the golden file readable; the whole one is validated
// below.
var two = []RuleInfo{
	{Name: rules.RotorNotUnit, Summary: "A quaternion is not of unit norm.", Help: "# rotor-not-unit\n\nA *page* with `code` and <angles>.\n", Level: rules.Error},
	{Name: rules.SignJump, Summary: "A logged rotor jumps from R to -R.", Level: rules.Warning},
}

func log(t *testing.T, r *Report, catalogue []RuleInfo) []byte {
	t.Helper()
	var b bytes.Buffer
	require.NoError(t, SARIF(&b, r, "0.1.0", catalogue))
	return b.Bytes()
}

func TestSARIFIsValid(t *testing.T) {
	s := schema(t)
	quiet := sample()
	for _, f := range quiet.Findings {
		f.Waiver = nil
	}
	for name, r := range map[string]*Report{"full": sample(), "nothing waived": quiet, "empty": {}} {
		assert.NoError(t, validate(t, s, log(t, r, RuleInfos(rules.Catalogue()))), name)
		assert.NoError(t, validate(t, s, log(t, r, nil)), name)
		assert.Equal(t, log(t, r, two), log(t, r, two), "the same bytes")
	}
}

// The validation must be able to fail.
func TestSchemaRejects(t *testing.T) {
	s := schema(t)
	good := string(log(t, sample(), two))
	for _, change := range [][2]string{
		{`"level": "error"`, `"level": "fatal"`}, {`"version": "2.1.0"`, `"version": "2.2"`},
		{`"startLine": 7`, `"startLine": 0`}, {`"kind": "external"`, `"kind": "elsewhere"`},
		{`"uri": "calib/imu.yaml"`, `"uri": "calib/%zz.yaml"`}, {`"columnKind": "unicodeCodePoints"`, `"columnKind": "bytes"`},
	} {
		require.Contains(t, good, change[0])
		assert.Error(t, validate(t, s, []byte(strings.Replace(good, change[0], change[1], 1))), change[1])
	}
}

// decoded are the parts of a log that consumers look at.
type decoded struct {
	Schema string `json:"$schema"`
	Runs   []struct {
		ColumnKind  string
		Invocations []struct {
			ExecutionSuccessful        bool
			ToolExecutionNotifications []struct {
				Level   string
				Message struct{ Text string }
			}
		}
		Results []struct {
			RuleID              string
			RuleIndex           *int
			Level               string
			Message             struct{ Text string }
			PartialFingerprints map[string]string
			Locations           []struct {
				PhysicalLocation struct {
					ArtifactLocation struct{ URI string }
					Region           *struct{ StartLine, StartColumn, EndLine, EndColumn int }
				}
				LogicalLocations []struct{ FullyQualifiedName string }
				Properties       struct {
					Row  int64
					Time string
				}
			}
			RelatedLocations []struct{ Message struct{ Text string } }
			Suppressions     *[]struct {
				Kind, Status, Justification string
				Properties                  struct{ Until, Owner string }
			}
			Properties struct {
				Claim, Remedy, Command string
				Evidence               []struct {
					What     string
					Computed struct {
						Value float64
						Text  string
						Unit  string
					}
				}
			}
		}
	}
}

func TestSARIFContent(t *testing.T) {
	r := sample()
	var d decoded
	require.NoError(t, json.Unmarshal(log(t, r, two), &d))
	require.Len(t, d.Runs, 1)
	run := d.Runs[0]
	assert.Equal(t, "unicodeCodePoints", run.ColumnKind)
	require.Len(t, run.Invocations, 1)
	assert.False(t, run.Invocations[0].ExecutionSuccessful)
	require.Len(t, run.Invocations[0].ToolExecutionNotifications, 4)
	assert.Equal(t, "error", run.Invocations[0].ToolExecutionNotifications[0].Level)
	require.Len(t, run.Results, len(r.Findings))
	for i, res := range run.Results {
		f := r.Findings[i]
		assert.Equal(t, f.Rule, res.RuleID)
		assert.Equal(t, f.Level.String(), res.Level)
		assert.Equal(t, f.Message, res.Message.Text)
		assert.Equal(t, map[string]string{"dextral/v1": f.Fingerprint()}, res.PartialFingerprints)
		require.Len(t, res.Locations, 1)
		loc := res.Locations[0]
		require.Len(t, loc.LogicalLocations, 1)
		assert.Equal(t, f.Key, loc.LogicalLocations[0].FullyQualifiedName)
		if region := loc.PhysicalLocation.Region; f.Place.Line == 0 {
			assert.Nil(t, region, "a whole file has no region")
		} else {
			assert.Equal(t, [4]int{f.Place.Line, f.Place.Column, f.Place.EndLine, f.Place.EndColumn},
				[4]int{region.StartLine, region.StartColumn, region.EndLine, region.EndColumn})
		}
		assert.Equal(t, f.Place.Row, loc.Properties.Row)
		assert.Len(t, res.RelatedLocations, len(f.Related))
		require.NotNil(t, res.Suppressions, "on all results or on none")
		assert.Equal(t, f.Waiver != nil, len(*res.Suppressions) == 1)
		for j, e := range res.Properties.Evidence {
			if want := f.Evidence[j].Computed; want.Known && want.Text == "" && !math.IsNaN(want.Value) && !math.IsInf(want.Value, 0) {
				assert.Equal(t, want.Value, e.Computed.Value, "full precision")
			}
		}
		switch f.Rule {
		case rules.RotorNotUnit:
			assert.Equal(t, 0, *res.RuleIndex)
		case rules.SignJump:
			assert.Equal(t, 1, *res.RuleIndex)
			assert.Equal(t, "logs/tern%202/flight.csv", loc.PhysicalLocation.ArtifactLocation.URI)
		case rules.NotFinite:
			assert.Nil(t, res.RuleIndex, "it is not in this catalogue")
			assert.Equal(t, "NaN", res.Properties.Evidence[0].Computed.Text)
		case rules.MirroredRotation:
			s := (*res.Suppressions)[0]
			assert.Equal(t, [5]string{"external", "accepted", f.Waiver.Because, f.Waiver.Until, f.Waiver.Owner},
				[5]string{s.Kind, s.Status, s.Justification, s.Properties.Until, s.Properties.Owner})
		}
	}
	golden(t, "sarif", log(t, r, two))
}

// Without waivers the log says nothing about suppressions.
func TestNoSuppressionsWithoutWaivers(t *testing.T) {
	r := sample()
	for _, f := range r.Findings {
		f.Waiver = nil
	}
	assert.NotContains(t, string(log(t, r, two)), "suppressions")
}

func TestURI(t *testing.T) {
	for path, want := range map[string]string{
		"calib/a.yaml": "calib/a.yaml", "../a b.yaml": "../a%20b.yaml", "a:b/c": "./a:b/c", "100%.csv": "100%25.csv", "é#?.csv": "%C3%A9%23%3F.csv",
		"/data/a.csv": "file:///data/a.csv", "C:/data/a.csv": "file:///C:/data/a.csv",
	} {
		assert.Equal(t, want, uri(path))
	}
}
