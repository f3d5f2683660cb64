package roundtrip_test

import (
	"testing"

	"golang.org/x/tools/go/analysis/analysistest"

	"dextral/analyzers/gosource/roundtrip"
)

func TestRoundTrip(t *testing.T) {
	analysistest.Run(t, analysistest.TestData(), roundtrip.Analyzer, "broken", "whole")
}
