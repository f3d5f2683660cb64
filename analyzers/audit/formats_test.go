package audit

import (
	"bytes"
	"context"
	"path/filepath"
	"testing"
	"time"

	"github.com/santhosh-tekuri/jsonschema/v6"
	"github.com/stretchr/testify/require"

	"dextral/rules/report"
)

// What an audit of the demo writes keeps to the schema.
func TestDemoKeepsToTheSchema(t *testing.T) {
	schema, err := jsonschema.UnmarshalJSON(bytes.NewReader(report.AuditSchema))
	require.NoError(t, err)
	c := jsonschema.NewCompiler()
	require.NoError(t, c.AddResource("audit.json", schema))
	compiled, err := c.Compile("audit.json")
	require.NoError(t, err)
	in(t, filepath.Join("..", "..", "fixtures", "demo"), func() {
		result, err := Run(context.Background(), Options{Today: time.Now()})
		require.NoError(t, err)
		var b bytes.Buffer
		require.NoError(t, report.JSON(&b, &result.Report, "dev"))
		doc, err := jsonschema.UnmarshalJSON(&b)
		require.NoError(t, err)
		require.NoError(t, compiled.Validate(doc))
	})
}
