package rules

import (
	"testing"

	"dextral/core/convention"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// Whole numbers that stand for parts of one are a unit quaternion, known to half a
// step: a twin may differ by that and no more.
func TestQuantised(t *testing.T) {
	for text, silent := range map[string]bool{
		"32767 0 0 0": true, "28377 0 16384 0": true, "707 0 707 0": true, "-90 90 0 0": true, "11585 11585 0 0": true,
		"3 4 0 0": false, "30000 0 0 0": false, "32767.0 0 0 0": false,
	} {
		v := value(convention.Quaternion, text, convention.ScalarFirst)
		assert.Equal(t, silent, len(CheckValues([]*Value{v})) == 0, text)
	}
	q := value(convention.Quaternion, "28377 0 16384 0", convention.ScalarFirst) // 60.0 deg about y, rounded
	near := value(convention.Quaternion, "0.866025 0 0.5 0", convention.ScalarFirst)
	far := value(convention.Quaternion, "0.866 0 0.4976 0.05", convention.ScalarFirst)
	assert.Empty(t, CheckValues([]*Value{q, near}))
	assert.NotEmpty(t, CheckValues([]*Value{q, far}))
}

// Whole numbers near a scale are judged as parts of it, far from all scales as they are.
func TestNearlyQuantised(t *testing.T) {
	message := func(numbers string) string {
		found := CheckValues([]*Value{value(convention.Quaternion, numbers, convention.ScalarFirst)})
		require.Len(t, found, 1, numbers)
		return found[0].Message
	}
	assert.Contains(t, message("14190 3000 2000 7300"), "as parts of 16384 its norm is 0.99853")
	assert.Contains(t, message("32600 0 0 0"), "as parts of 32767 its norm is 0.9949")
	assert.Contains(t, message("20000 0 0 0"), "but its norm is 20000")
}
