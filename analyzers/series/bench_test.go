package series

import (
	"bytes"
	"context"
	"encoding/csv"
	"fmt"
	"io"
	"runtime"
	"strconv"
	"sync"
	"testing"

	"dextral/core/kinematics"
	"dextral/core/rotor"
)

// bigLog is a log of a million rows and eight columns, about 90 MB.
var bigLog = sync.OnceValue(func() []byte {
	const rows = 1000000
	out := []byte("t,x,y,z,qw,qx,qy,qz\n")
	for i := range rows {
		s := float64(i) * 1e-4
		q := rotor.FromRotationVector(rotor.Vec{X: 0.3 + 0.01*s, Y: 0.2, Z: 0.1 - 0.005*s})
		w, x, y, z := q.Quaternion()
		for k, v := range []float64{1700000000 + 0.005*float64(i), 100 + s, 200 - s, 0.5 * s, w, x, y, z} {
			if k > 0 {
				out = append(out, ',')
			}
			out = strconv.AppendFloat(out, v, 'f', 9, 64)
		}
		out = append(out, '\n')
	}
	return out
})

// BenchmarkRead measures a log in memory against encoding/csv and strconv, which read
// the same columns and fold the quaternion alone.
func BenchmarkRead(b *testing.B) {
	data := bigLog()
	rows := float64(bytes.Count(data, []byte{'\n'}) - 1)
	run := func(name string, f func() int64) {
		b.Run(name, func(b *testing.B) {
			b.SetBytes(int64(len(data)))
			b.ReportAllocs()
			var before, after runtime.MemStats
			runtime.ReadMemStats(&before)
			for b.Loop() {
				if got := f(); float64(got) != rows {
					b.Fatalf("%d rows of %g", got, rows)
				}
			}
			runtime.ReadMemStats(&after)
			b.ReportMetric(rows*float64(b.N)/b.Elapsed().Seconds(), "rows/s")
			b.ReportMetric(float64(after.Mallocs-before.Mallocs)/float64(b.N)/rows, "allocs/row")
		})
	}
	for _, workers := range []int{1, 2} {
		run(fmt.Sprintf("workers=%d", workers), func() int64 {
			r, err := Read(context.Background(), "big.csv", bytes.NewReader(data), Options{Workers: workers})
			if err != nil {
				b.Fatal(err)
			}
			return r.Rows
		})
	}
	run("encoding-csv", func() int64 { return foldWithLibrary(b, bytes.NewReader(data)) })
}

// foldWithLibrary is the peer.
func foldWithLibrary(b *testing.B, r io.Reader) int64 {
	in := csv.NewReader(r)
	in.ReuseRecord = true
	if _, err := in.Read(); err != nil {
		b.Fatal(err)
	}
	var c kinematics.Continuity
	for row := int64(1); ; row++ {
		record, err := in.Read()
		if err == io.EOF {
			return c.Rows
		}
		if err != nil {
			b.Fatal(err)
		}
		var v [5]float64
		for i, column := range []int{0, 4, 5, 6, 7} {
			if v[i], err = strconv.ParseFloat(record[column], 64); err != nil {
				b.Fatal(err)
			}
		}
		c.Push(row, v[0], rotor.FromQuaternion(v[1], v[2], v[3], v[4]))
	}
}

// TestHeapDoesNotGrow streams a log that is nowhere held as a whole, and looks at the
// heap in the meantime.
func TestHeapDoesNotGrow(t *testing.T) {
	if testing.Short() {
		t.Skip("short")
	}
	chunk := bigLog()[:1<<20]
	chunk = chunk[:bytes.LastIndexByte(chunk, '\n')+1]
	rows := chunk[bytes.IndexByte(chunk, '\n')+1:]
	peak := func(times int) uint64 {
		in := &repeated{head: chunk[:len(chunk)-len(rows)], rows: rows, times: times}
		runtime.GC()
		var base runtime.MemStats
		runtime.ReadMemStats(&base)
		in.base = base.HeapAlloc
		if _, err := Read(context.Background(), "big.csv", in, Options{Workers: 2}); err != nil {
			t.Fatal(err)
		}
		return in.peak
	}
	short, long := peak(5), peak(50)
	t.Logf("heap beyond the start: %d kB for 5 MB, %d kB for 50 MB", short>>10, long>>10)
	// Four blocks on their way, the head of the file, the folds; and as much again
	// that is garbage already.
	if long > 8<<20 {
		t.Errorf("heap of %d bytes", long)
	}
}

// repeated is a log of the same rows over and over. It samples the heap.
type repeated struct {
	head, rows []byte
	times      int
	base, peak uint64
	at         int
}

func (r *repeated) Read(p []byte) (int, error) {
	if len(r.head) > 0 {
		n := copy(p, r.head)
		r.head = r.head[n:]
		return n, nil
	}
	if r.at == len(r.rows) {
		r.at = 0
		r.times--
		var m runtime.MemStats
		runtime.ReadMemStats(&m)
		if m.HeapAlloc > r.base {
			r.peak = max(r.peak, m.HeapAlloc-r.base)
		}
	}
	if r.times <= 0 {
		return 0, io.EOF
	}
	n := copy(p, r.rows[r.at:])
	r.at += n
	return n, nil
}
