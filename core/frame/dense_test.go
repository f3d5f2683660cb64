package frame

import (
	"fmt"
	"testing"
)

// BenchmarkDenseLoops finds the loops of graphs in which every two frames are joined,
// whose cycles are more than can be counted: the independent ones are as many as
// there are edges more than the tree needs.
func BenchmarkDenseLoops(b *testing.B) {
	for _, n := range []int{20, 40, 80} {
		b.Run(fmt.Sprint(n), func(b *testing.B) {
			var g Graph
			for i := range n {
				for j := range i {
					g.Add(Edge{To: fmt.Sprint(j), From: fmt.Sprint(i)})
				}
			}
			edges := n * (n - 1) / 2
			for range b.N {
				if got := len(g.Loops()); got != edges-n+1 {
					b.Fatal(got)
				}
			}
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/float64(edges), "ns/edge")
		})
	}
}
