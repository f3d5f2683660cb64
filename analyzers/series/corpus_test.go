package series

import (
	"context"
	"fmt"
	"os"
	"path/filepath"
	"testing"
)

func TestTry(t *testing.T) {
	files, _ := filepath.Glob("../../../shared/corpus/logs/*")
	for _, name := range files {
		f, _ := os.Open(name)
		head := make([]byte, HeadSize)
		n, _ := f.Read(head)
		f.Seek(0, 0)
		k := Recognise(name, head[:n])
		fmt.Println("==", filepath.Base(name), k)
		r, err := Read(context.Background(), filepath.Base(name), f, Options{})
		fmt.Println(r.Format, r.Rows, err, "bad", r.BadRows, r.FirstBad)
		if r.Clock != nil {
			c := r.Clock
			fmt.Printf("clock %q %s %s count %d missing %d rep %d rev %d %s..%s span %g steps %v %v at %v\n", c.Column, c.Unit, c.Source, c.Count, c.Missing.Count, c.Repeated.Count, c.Reversed.Count, c.First, c.Last, c.Span, c.Shortest, c.Longest, c.ReversedAt)
		}
		for _, s := range r.Channels {
			c := s.Continuity
			fmt.Println(" ", s.Value.Key, s.Value.Form, s.Columns, s.Value.Place, "half", s.Half, s.Float32, s.Scale, "why", s.Value.Why)
			fmt.Println("   norm", c.MinNorm, c.MaxNorm, "jumps", c.JumpCount, "wide", c.Wide.Count, "neg", c.NegativeScalar.Count, "largest", c.Largest.Angle*57.3)
			if c.JumpCount > 0 {
				fmt.Println("   first", s.RowPlace(c.Jumps[0].Row), s.Stamp(c.Jumps[0].T))
			}
			fmt.Println("   mat", s.Matrices)
			for _, n := range s.Value.Numbers[:3] {
				fmt.Println("   ", n)
			}
		}
		for _, u := range r.Undecided {
			fmt.Println("  undecided", u.Key, u.Why)
		}
	}
}
