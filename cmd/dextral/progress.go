package main

import (
	"fmt"
	"io"
	"os"
	"sync"
	"time"

	"golang.org/x/term"
)

// progress tells on a terminal how far the big logs are, how fast they are read
// and how long the rest will take.
type progress struct {
	w     io.Writer
	now   func() time.Time
	mu    sync.Mutex
	begin time.Time
	last  time.Time
	files map[string][2]int64 // done, of
}

// every is the time between two lines.
const every = 200 * time.Millisecond

// newProgress is nil where nobody looks.
func newProgress(w io.Writer) *progress {
	if f, ok := w.(*os.File); !ok || !term.IsTerminal(int(f.Fd())) {
		return nil
	}
	return &progress{w: w, now: time.Now, files: map[string][2]int64{}}
}

// tell is called for each piece read.
func (p *progress) tell(path string, done, of int64) {
	p.mu.Lock()
	defer p.mu.Unlock()
	now := p.now()
	if p.begin.IsZero() {
		p.begin, p.last = now, now
	}
	p.files[path] = [2]int64{done, of}
	if now.Sub(p.last) < every {
		return
	}
	p.last = now
	var all [2]int64
	for _, f := range p.files {
		all[0], all[1] = all[0]+f[0], all[1]+f[1]
	}
	spent := now.Sub(p.begin)
	left := time.Duration(float64(spent) * float64(all[1]-all[0]) / float64(all[0]))
	rate := float64(all[0]) / 1e6 / spent.Seconds()
	fmt.Fprintf(p.w, "\r\x1b[Kreading logs: %d %% of %.0f MB, %.0f MB/s, %s left", 100*all[0]/all[1], float64(all[1])/1e6, rate, left.Round(time.Second))
}

// done wipes the line.
func (p *progress) done() {
	if p != nil && !p.last.Equal(p.begin) {
		fmt.Fprint(p.w, "\r\x1b[K")
	}
}
