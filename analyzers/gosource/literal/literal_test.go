package literal_test

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"golang.org/x/tools/go/analysis"

	"dextral/analyzers/gosource/literal"
)

func TestLiterals(t *testing.T) {
	for _, pkg := range []string{"attitude", "quat", "colour", "matrix", "angles", "context", "twins"} {
		t.Run(pkg, func(t *testing.T) { run(t, pkg) })
	}
}

// TestDoc shows that the analyzer's help is the section of the package's essay.
func TestDoc(t *testing.T) {
	assert.True(t, strings.HasPrefix(literal.Analyzer.Doc, literal.Analyzer.Name+": "), literal.Analyzer.Doc)
	assert.NotContains(t, literal.Analyzer.Doc, "//")
	assert.NoError(t, analysis.Validate([]*analysis.Analyzer{literal.Analyzer}))
}
