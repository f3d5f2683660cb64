package wrongterm_test

import (
	"testing"

	"golang.org/x/tools/go/analysis/analysistest"

	"dextral/analyzers/gosource/wrongterm"
)

func TestWrongTerm(t *testing.T) {
	analysistest.Run(t, analysistest.TestData(), wrongterm.Analyzer, "a")
}
