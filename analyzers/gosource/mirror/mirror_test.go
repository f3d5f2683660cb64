package mirror_test

import (
	"testing"

	"golang.org/x/tools/go/analysis/analysistest"

	"dextral/analyzers/gosource/mirror"
)

func TestMirror(t *testing.T) {
	analysistest.Run(t, analysistest.TestData(), mirror.Analyzer, "a")
}
