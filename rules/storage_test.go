package rules

import (
	"testing"

	"dextral/core/convention"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// A turn by 2 acos 0.72 = 87.891 deg in exact decimals, with a translation.
const (
	byRows = "0.4976 -0.768 -0.4032 1.5  -0.0768 0.424 -0.9024 -0.3  0.864 0.48 0.152 0.25  0 0 0 1"
	byCols = "0.4976 -0.0768 0.864 0  -0.768 0.424 0.48 0  -0.4032 -0.9024 0.152 0  1.5 -0.3 0.25 1"
)

func TestStorageOfTransform(t *testing.T) {
	wrong := storedByRows(value(convention.Transform, byRows, convention.ColumnMajor))
	require.NotNil(t, wrong)
	assert.Equal(t, StorageTransposed, wrong.Rule)
	assert.Equal(t, Error, wrong.Level)
	assert.Contains(t, wrong.Message, "off by 175.8 deg") // twice the turn, 360 - 2*87.891 at most
	assert.Equal(t, "1.5 -0.3 0.25 1", wrong.Evidence[0].Computed.Text)

	for name, v := range map[string]*Value{
		"stored as stated":    value(convention.Transform, byCols, convention.ColumnMajor),
		"rows":                value(convention.Transform, byRows, convention.RowMajor),
		"for row vectors":     value(convention.Transform, byCols, convention.RowMajor),
		"nothing stated":      value(convention.Transform, byRows),
		"no translation":      value(convention.Transform, "0.8 -0.6 0 0  0.6 0.8 0 0  0 0 1 0  0 0 0 1", convention.ColumnMajor),
		"neither way":         value(convention.Transform, "1 0 0 1.5  0 1 0 2.5  0 0 1 3.5  0 0 0 2", convention.ColumnMajor),
		"three rows, no tell": value(convention.Transform, "1 0 0 1.5  0 1 0 2.5  0 0 1 3.5", convention.ColumnMajor),
	} {
		assert.Nil(t, storedByRows(v), name)
	}
	assert.Equal(t, Warning, storedByRows(inferred(value(convention.Transform, byRows, convention.ColumnMajor))).Level)
}
