package mixed_test

import (
	"testing"

	"golang.org/x/tools/go/analysis/analysistest"

	"dextral/analyzers/gosource/mixed"
)

func TestMixed(t *testing.T) {
	analysistest.Run(t, analysistest.TestData(), mixed.Analyzer, "a")
}
