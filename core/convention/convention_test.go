package convention

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"
)

// TestDirection: what is printed parses to the same equation, the short form
// too, and nothing else does.
func TestDirection(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		name := rapid.StringMatching(`[A-Za-z][A-Za-z0-9_.]{0,8}`)
		d := Direction{To: name.Draw(t, "to"), From: name.Draw(t, "from")}
		for _, text := range []string{d.String(), d.To + "<-" + d.From, d.To + " <- " + d.From} {
			got, ok := ParseDirection(text)
			if !ok || got != d {
				t.Fatalf("%q: %v", text, got)
			}
		}
		if d.Reverse().Reverse() != d {
			t.Fatal("the reverse of the reverse is the direction")
		}
	})
	for _, text := range []string{"", "body to cam", "v_body = v_cam", "body = R cam", "<-cam", "body<-", "v_ = R v_cam", "v_body = R cam"} {
		_, ok := ParseDirection(text)
		assert.False(t, ok, text)
	}
}

// TestTerms: zero values say that nothing is stated, and every subject has a name.
func TestTerms(t *testing.T) {
	for _, term := range []Term{ScalarUnstated, ProductUnstated, StorageUnstated, UnitUnstated, HandUnstated, RateAxesUnstated, Direction{}, Range{}} {
		assert.Contains(t, term.String(), "unstated")
	}
	for _, s := range Subjects() {
		assert.NotEmpty(t, s.String())
	}
	assert.Equal(t, "-180 to 180 deg", Range{-math.Pi, math.Pi}.String())
	assert.Equal(t, math.Pi/180, Degree.InRadians())
	assert.Equal(t, 1.0, Radian.InRadians())
}
