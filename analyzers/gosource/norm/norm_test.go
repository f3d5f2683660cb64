package norm_test

import (
	"testing"

	"golang.org/x/tools/go/analysis/analysistest"

	"dextral/analyzers/gosource/norm"
)

func TestNorm(t *testing.T) {
	analysistest.Run(t, analysistest.TestData(), norm.Analyzer, "a")
}
