package longway_test

import (
	"testing"

	"golang.org/x/tools/go/analysis/analysistest"

	"dextral/analyzers/gosource/longway"
)

func TestLongWay(t *testing.T) {
	analysistest.Run(t, analysistest.TestData(), longway.Analyzer, "a")
}
