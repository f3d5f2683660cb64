package singular_test

import (
	"testing"

	"golang.org/x/tools/go/analysis/analysistest"

	"dextral/analyzers/gosource/singular"
)

func TestSingular(t *testing.T) {
	analysistest.Run(t, analysistest.TestData(), singular.Analyzer, "a")
}
