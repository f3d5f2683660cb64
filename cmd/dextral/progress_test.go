package main

import (
	"strings"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
)

// A line at most every fifth of a second, and the sums of all files.
func TestProgress(t *testing.T) {
	var out strings.Builder
	at := time.Unix(0, 0)
	p := &progress{w: &out, now: func() time.Time { return at }, files: map[string][2]int64{}}
	p.tell("a.csv", 1e6, 100e6)
	at = at.Add(100 * time.Millisecond)
	p.tell("b.csv", 1e6, 100e6)
	assert.Empty(t, out.String())
	at = at.Add(900 * time.Millisecond)
	p.tell("a.csv", 49e6, 100e6)
	assert.Equal(t, "\r\x1b[Kreading logs: 25 % of 200 MB, 50 MB/s, 3s left", out.String())
	p.done()
	assert.True(t, strings.HasSuffix(out.String(), "\r\x1b[K"))
	assert.Nil(t, newProgress(&out), "no terminal")
}
