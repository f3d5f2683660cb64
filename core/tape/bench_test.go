package tape

import (
	"syscall"
	"testing"
)

// cpuNanos is the processor time that this process has used: unlike the clock,
// it does not count what other processes do.
func cpuNanos() float64 {
	var u syscall.Rusage
	if syscall.Getrusage(syscall.RUSAGE_SELF, &u) != nil {
		return 0
	}
	return float64(u.Utime.Nano())
}

func BenchmarkProduct(b *testing.B) {
	p, lib := MustParse(product)
	m, err := Link(p, lib)
	if err != nil {
		b.Fatal(err)
	}
	batch := m.NewBatch(256)
	for s := range batch.Len() {
		for i := range batch.Inputs() {
			batch.Set(s, i, float64(s*7+i*3)*0.037-1)
		}
	}
	b.ReportAllocs()
	start := cpuNanos()
	for range b.N {
		m.Run(batch)
	}
	b.ReportMetric((cpuNanos()-start)/float64(b.N)/256/float64(len(p.Code)), "cpu-ns/instr-sample")
}
