package mislabelled_test

import (
	"testing"

	"golang.org/x/tools/go/analysis/analysistest"

	"dextral/analyzers/gosource/mislabelled"
)

func TestMislabelled(t *testing.T) {
	analysistest.Run(t, analysistest.TestData(), mislabelled.Analyzer, "a")
}
