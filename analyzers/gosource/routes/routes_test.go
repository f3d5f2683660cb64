package routes_test

import (
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"golang.org/x/tools/go/analysis/analysistest"

	"dextral/analyzers/gosource/found"
	"dextral/analyzers/gosource/routes"
)

func TestRoutes(t *testing.T) {
	analysistest.Run(t, analysistest.TestData(), routes.Analyzer, "a")
}

// The order of products is a note, which is no diagnostic.
func TestOrder(t *testing.T) {
	results := analysistest.Run(t, analysistest.TestData(), routes.Analyzer, "b")
	require.Len(t, results, 1)
	list := results[0].Result.(*found.Result).Findings
	require.Len(t, list, 1)
	assert.Equal(t, "the matrix of Quat.Mul(a, b) is Mat.Mul of the matrices of b and a: quaternions and matrices of this package compose in opposite orders", list[0].Message)
}
