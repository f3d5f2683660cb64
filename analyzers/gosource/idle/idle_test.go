package idle_test

import (
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"golang.org/x/tools/go/analysis/analysistest"

	"dextral/analyzers/gosource/found"
	"dextral/analyzers/gosource/idle"
)

// Receivers that change are diagnostics; an idle argument is a note, which is none.
func TestIdle(t *testing.T) {
	results := analysistest.Run(t, analysistest.TestData(), idle.Analyzer, "a")
	require.Len(t, results, 1)
	var messages []string
	for _, f := range results[0].Result.(*found.Result).Findings {
		messages = append(messages, f.Rule+" "+f.Key)
	}
	assert.Equal(t, []string{"argument-idle Mix", "receiver-changed Quat.Conjugate"}, messages)
}
